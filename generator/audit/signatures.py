"""Signatures: who signed, with which certificate, and whether anything changed afterwards."""

from __future__ import annotations

import asyncio
import io
import logging
from collections.abc import Iterable, Iterator, Sequence
from contextlib import contextmanager
from pathlib import Path
from typing import Any

from generator.audit.report import AuditFinding, SignatureFinding
from generator.errors import LampassayError
from generator.publish.manifest import MANIFEST, MANIFEST_SIGNATURE

__all__ = ["document_signatures", "has_signature", "manifest_signature", "signature_failures"]

_MARK = b"/ByteRange"
_CURE = "verifying signatures needs the extra: pip install 'lampassay[sign]'"


def has_signature(content: bytes) -> bool:
    """Whether a PDF holds a signature, without looking at it."""
    return _MARK in content


@contextmanager
def _quiet() -> Iterator[None]:
    """Keep the library from telling of untrusted certificates; the finding does."""
    before = logging.root.manager.disable
    logging.disable(logging.CRITICAL)
    try:
        yield
    finally:
        logging.disable(before)


def _roots(trust: Iterable[Path]) -> list[Any]:
    from asn1crypto import pem, x509

    roots: list[Any] = []
    for file in trust:
        content = file.read_bytes()
        try:
            blocks = [content]
            if pem.detect(content):
                blocks = [der for _, _, der in pem.unarmor(content, multiple=True)]
            roots.extend(x509.Certificate.load(der, strict=True) for der in blocks)
        except ValueError:
            raise LampassayError(f"{file}: not a certificate (PEM or DER)") from None
    return roots


def _context(trust: Sequence[Path]) -> Any:
    from pyhanko_certvalidator import ValidationContext

    return ValidationContext(trust_roots=_roots(trust), allow_fetching=False)


def document_signatures(
    name: str, content: bytes, trust: Sequence[Path] = ()
) -> tuple[tuple[SignatureFinding, ...], tuple[AuditFinding, ...]]:
    """Verify the signatures of a PDF.

    Parameters
    ----------
    name
        The document, as it is to be named.
    content
        Its bytes.
    trust
        Certificates that the auditor trusts, PEM or DER.

    Returns
    -------
    tuple
        The signatures, and what is wrong where they cannot be verified.
    """
    if not has_signature(content):
        return (), ()
    try:
        from pyhanko.pdf_utils.misc import PdfError
        from pyhanko.pdf_utils.reader import PdfFileReader
        from pyhanko.sign.validation import validate_pdf_signature
        from pyhanko.sign.validation.errors import SignatureValidationError
        from pyhanko.sign.validation.status import SignatureCoverageLevel
    except ImportError:
        return (), (AuditFinding("signature", "note", name, _CURE),)
    try:
        with _quiet():
            signatures = PdfFileReader(io.BytesIO(content)).embedded_signatures
            found = []
            for signature in signatures:
                status = validate_pdf_signature(signature, _context(trust), skip_diff=True)
                untouched = status.coverage is SignatureCoverageLevel.ENTIRE_FILE
                found.append(_finding(name, status, added=not untouched, asked=bool(trust)))
    except (PdfError, SignatureValidationError, ValueError, KeyError, TypeError) as error:
        return (), (_broken(name, error),)
    if not found:
        return (), (_broken(name, "the signature is no longer there"),)
    return tuple(found), ()


def _broken(name: str, why: object) -> AuditFinding:
    return AuditFinding("signature", "failure", name, f"the signature cannot be verified: {why}")


def manifest_signature(
    folder: Path, trust: Sequence[Path] = (), *, expected: bool = False
) -> tuple[tuple[SignatureFinding, ...], tuple[AuditFinding, ...]]:
    """Verify the detached signature of a manifest.

    Parameters
    ----------
    folder
        The issued folder.
    trust
        Certificates that the auditor trusts, PEM or DER.
    expected
        Whether the manifest says that its documents are signed, so that its own signature
        must be there.

    Returns
    -------
    tuple
        The signature, and what is wrong where it cannot be verified; nothing where the manifest
        is not signed.
    """
    file = folder / MANIFEST_SIGNATURE
    if not file.is_file():
        missing = AuditFinding("signature", "failure", MANIFEST_SIGNATURE, "missing")
        return (), ((missing,) if expected else ())
    try:
        from asn1crypto.cms import ContentInfo
        from pyhanko.sign.validation import async_validate_detached_cms
        from pyhanko.sign.validation.errors import SignatureValidationError
    except ImportError:
        return (), (AuditFinding("signature", "note", MANIFEST_SIGNATURE, _CURE),)
    try:
        der = file.read_bytes()
        info = ContentInfo.load(der, strict=True)
        with _quiet():
            status = asyncio.run(
                async_validate_detached_cms(
                    (folder / MANIFEST).read_bytes(),
                    info["content"],
                    signer_validation_context=_context(trust),
                )
            )
            rewritten = info.dump(force=True) != der or not _plain(info["content"])
    except (SignatureValidationError, ValueError, KeyError, TypeError, AttributeError) as error:
        return (), (_broken(MANIFEST_SIGNATURE, error),)
    if rewritten:
        return (), (_broken(MANIFEST_SIGNATURE, "not written as it was issued"),)
    return (_finding(MANIFEST, status, added=False, asked=bool(trust)),), ()


def _plain(signed: Any) -> bool:
    """Whether the parts that no signature covers are as the program writes them."""
    signers = signed["signer_infos"]
    if len(signers) != 1:
        return False
    named = signers[0]["sid"].chosen
    issuers = {item.chosen.issuer.dump() for item in signed["certificates"]}
    digests = [item.dump() for item in signed["digest_algorithms"]]
    return (
        signed["version"].native == signers[0]["version"].native == "v1"
        and signed["encap_content_info"]["content_type"].native == "data"
        and signed["encap_content_info"]["content"].native is None
        and named["issuer"].dump() in issuers
        and digests == [signers[0]["digest_algorithm"].dump()]
    )


def _finding(name: str, status: Any, *, added: bool, asked: bool) -> SignatureFinding:
    certificate = status.signing_cert
    begin, end = certificate.not_valid_before, certificate.not_valid_after
    stated = status.signer_reported_dt
    return SignatureFinding(
        file=name,
        signer=certificate.subject.human_friendly,
        issuer=certificate.issuer.human_friendly,
        serial=str(certificate.serial_number),
        valid_from=begin.isoformat(),
        valid_to=end.isoformat(),
        signed_at=stated.isoformat() if stated else "",
        intact=bool(status.intact and status.valid),
        changed_afterwards=added,
        trusted=bool(status.trusted) if asked else None,
    )


def signature_failures(signatures: Iterable[SignatureFinding]) -> Iterator[AuditFinding]:
    """The findings that follow from verified signatures.

    Parameters
    ----------
    signatures
        What was found.

    Yields
    ------
    AuditFinding
        A failure for a broken, changed or untrusted signature.
    """
    for item in signatures:
        if not item.intact:
            message = f"signed by {item.signer}, but changed since"
            yield AuditFinding("signature", "failure", item.file, message)
        if item.changed_afterwards:
            message = f"something was added after {item.signer} signed"
            yield AuditFinding("signature", "failure", item.file, message)
        if item.trusted is False:
            message = f"the certificate of {item.signer} does not lead to a trusted one"
            yield AuditFinding("signature", "failure", item.file, message)
