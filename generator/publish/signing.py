"""Signatures: PAdES for PDF documents, a detached CMS signature for the manifest.

They need the extra ``sign``. The private key stays in the memory of the library that signs: it is
read from a PKCS#12 file and is neither written, logged nor handed on.
"""

from __future__ import annotations

import asyncio
import io
import logging
from contextlib import contextmanager
from dataclasses import dataclass, field
from pathlib import Path
from typing import TYPE_CHECKING, Any

from generator.publish.folders import PublishError
from generator.publish.manifest import MANIFEST, MANIFEST_SIGNATURE, FileEntry, file_entry

if TYPE_CHECKING:
    from collections.abc import Iterator

__all__ = ["SIGNATURE_FIELD", "Signer", "open_signer", "sign_documents", "sign_manifest"]

SIGNATURE_FIELD = "Signature"
_DIGEST = "sha256"
_CURE = "signing needs the extra: pip install 'lampassay[sign]'"


@dataclass(frozen=True, slots=True)
class Signer:
    """Who signs: the name in the certificate, and the opened key, which is never shown."""

    name: str
    key: Any = field(repr=False)


@contextmanager
def _quiet() -> Iterator[None]:
    """Keep the library from saying what it could not read; the error is reported here."""
    logger = logging.getLogger("pyhanko")
    before = logger.disabled
    logger.disabled = True
    for name in ("pyhanko.sign.signers.pdf_cms", "pyhanko.sign.signers"):
        logging.getLogger(name).disabled = True
    try:
        yield
    finally:
        logger.disabled = before
        for name in ("pyhanko.sign.signers.pdf_cms", "pyhanko.sign.signers"):
            logging.getLogger(name).disabled = before


def open_signer(file: Path, passphrase: str) -> Signer:
    """Open the key and certificate in a PKCS#12 file.

    Parameters
    ----------
    file
        The file, ``.p12`` or ``.pfx``.
    passphrase
        Its passphrase; empty text for none.

    Returns
    -------
    Signer
        Ready to sign.

    Raises
    ------
    PublishError
        If the extra is not installed, or the file cannot be opened; the passphrase is not in
        the message.
    """
    try:
        from pyhanko.sign.signers import SimpleSigner
    except ImportError:
        raise PublishError(_CURE) from None
    if not file.is_file():
        raise PublishError(f"{file}: there is no such key file")
    with _quiet():
        load: Any = SimpleSigner.load_pkcs12  # the library gives it no types
        key = load(str(file), passphrase=passphrase.encode() or None)
    if key is None or key.signing_cert is None:
        raise PublishError(f"{file}: not a PKCS#12 file, or not its passphrase")
    return Signer(str(key.signing_cert.subject.human_friendly), key)


def sign_documents(folder: Path, signer: Signer) -> dict[str, FileEntry]:
    """Sign every PDF of an issue that is still being built.

    Parameters
    ----------
    folder
        Folder being built.
    signer
        Who signs.

    Returns
    -------
    dict
        Path -> entry of the document as it was before; the signed one begins with its bytes.
    """
    before = {}
    for path in sorted(folder.rglob("*.pdf")):
        name = path.relative_to(folder).as_posix()
        content = path.read_bytes()
        before[name] = file_entry(name, content)
        path.write_bytes(_signed_pdf(content, signer))
    return before


def _signed_pdf(content: bytes, signer: Signer) -> bytes:
    """Add a PAdES signature (profile B-B) to a PDF, as an increment at its end."""
    from pyhanko.pdf_utils.incremental_writer import IncrementalPdfFileWriter
    from pyhanko.sign.fields import SigSeedSubFilter
    from pyhanko.sign.signers import PdfSignatureMetadata, PdfSigner

    metadata = PdfSignatureMetadata(
        field_name=SIGNATURE_FIELD, md_algorithm=_DIGEST, subfilter=SigSeedSubFilter.PADES
    )
    writer = IncrementalPdfFileWriter(io.BytesIO(content))
    output = PdfSigner(metadata, signer=signer.key).sign_pdf(writer)
    signed: bytes = output.getvalue()
    return signed


def sign_manifest(folder: Path, signer: Signer) -> None:
    """Write the detached signature of the manifest beside it.

    Parameters
    ----------
    folder
        Folder being built, with its manifest.
    signer
        Who signs.
    """
    content = (folder / MANIFEST).read_bytes()
    signature = asyncio.run(
        signer.key.async_sign_general_data(content, digest_algorithm=_DIGEST, detached=True)
    )
    (folder / MANIFEST_SIGNATURE).write_bytes(signature.dump())
