"""One audit from end to end: open the issue, look at every part of it, report."""

from __future__ import annotations

import tempfile
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from datetime import date
from pathlib import Path
from typing import Any

from generator import pipeline
from generator.audit.archive import ArchiveError, unpack_archive
from generator.audit.completeness import completeness
from generator.audit.derivation import derivation, under_the_law_of
from generator.audit.documents import DocumentError, attachments_agree, unpack_document
from generator.audit.integrity import integrity, listed_files, read_manifest
from generator.audit.report import AuditFinding, AuditReport, SignatureFinding
from generator.audit.signatures import (
    document_signatures,
    manifest_signature,
    signature_failures,
)
from generator.audit.withheld import proves_public
from generator.errors import DataProblems, LampassayError
from generator.publish.inputs import INPUTS
from generator.publish.manifest import MANIFEST

__all__ = ["audit"]

_FACTS = ("edition", "campaign", "reference", "lamp_id", "assessed_on", "versions", "digest")


@dataclass(slots=True)
class _Audit:
    """One audit at work: what was found so far."""

    trust: tuple[Path, ...]
    today: date
    facts: dict[str, Any] = field(default_factory=dict)
    checked: dict[str, int] = field(default_factory=dict)
    findings: list[AuditFinding] = field(default_factory=list)
    signatures: list[SignatureFinding] = field(default_factory=list)

    def add(self, findings: Sequence[AuditFinding]) -> None:
        """Keep what was found."""
        self.findings += findings

    def fail(self, part: str, subject: str, message: str) -> None:
        """Keep one failure."""
        self.findings.append(AuditFinding(part, "failure", subject, message))


def audit(
    subject: str | Path,
    *,
    today: date,
    trust: Sequence[Path] = (),
    full: Path | None = None,
) -> AuditReport:
    """Audit an issued folder, an archive of one, or one of its PDF documents.

    Parameters
    ----------
    subject
        The folder, the ``.zip`` file or the ``.pdf`` file.
    today
        Day of the audit; the law as it stands then is compared with that of the recorded day.
    trust
        Certificates that the auditor trusts; without any, signatures are verified but no
        certificate is called trusted.
    full
        Folder of the full edition, where a public edition is audited by somebody who has both.

    Returns
    -------
    AuditReport
        What was found; nothing is changed.

    Raises
    ------
    LampassayError
        If the subject is not there or is nothing that can be audited.
    """
    path = Path(subject)
    at_work = _Audit(tuple(trust), today)
    if path.is_dir():
        kind = "folder"
        _audit_folder(path, at_work, full)
    elif path.is_file() and path.suffix.lower() == ".pdf":
        kind = "document"
        _audit_document(path, at_work)
    elif path.is_file():
        kind = "archive"
        _audit_archive(path, at_work, full)
    else:
        raise LampassayError(f"{path}: there is no such folder or file")
    return AuditReport(
        str(path),
        kind,
        at_work.facts,
        at_work.checked,
        tuple(at_work.findings),
        tuple(at_work.signatures),
    )


def _audit_archive(file: Path, at_work: _Audit, full: Path | None) -> None:
    with tempfile.TemporaryDirectory(prefix="lampassay-") as scratch:
        try:
            folder = unpack_archive(file, Path(scratch))
        except ArchiveError as error:
            at_work.fail("integrity", file.name, f"archive refused: {error}")
            return
        _audit_folder(folder, at_work, full)


def _audit_folder(folder: Path, at_work: _Audit, full: Path | None) -> None:
    if not (folder / MANIFEST).is_file():
        at_work.fail("integrity", MANIFEST, "missing; this is no issued folder")
        return
    manifest, found = read_manifest((folder / MANIFEST).read_bytes())
    at_work.add(found)
    if manifest is None:
        return
    _state(manifest, at_work)
    listed = listed_files(manifest)
    at_work.checked["files"] = len(listed)
    at_work.add(integrity(folder, listed))
    documents = [entry.path for entry in listed if entry.path.endswith(".pdf")]
    for name in documents:
        if (folder / name).is_file():
            at_work.add(attachments_agree(folder, name, manifest))
            _signed(name, (folder / name).read_bytes(), at_work)
    at_work.checked["documents"] = len(documents)
    signed = any(entry.unsigned for entry in listed)
    _verified(manifest_signature(folder, at_work.trust, expected=signed), at_work)
    _derived(folder, manifest, at_work)
    if full is not None:
        _proved(full, manifest, at_work)
    at_work.add(tuple(signature_failures(at_work.signatures)))


def _audit_document(file: Path, at_work: _Audit) -> None:
    _signed(file.name, file.read_bytes(), at_work)
    if not at_work.signatures:
        message = "not signed: its attachments are verified, its pages are not"
        at_work.add([AuditFinding("signature", "note", file.name, message)])
    with tempfile.TemporaryDirectory(prefix="lampassay-") as scratch:
        folder = Path(scratch)
        try:
            evidence, found = unpack_document(file, folder)
        except DocumentError as error:
            at_work.fail("integrity", file.name, str(error))
            return
        at_work.add(found)
        if evidence is not None:
            _state(evidence, at_work)
            at_work.checked["attachments"] = len(listed_files(evidence))
            if all(entry["attached_as"] for entry in evidence["inputs"]):
                _derived(folder, evidence, at_work)
            else:
                message = "not all inputs are attached; audit the issued folder"
                at_work.add([AuditFinding("derivation", "note", file.name, message)])
    at_work.add(tuple(signature_failures(at_work.signatures)))


def _state(manifest: Mapping[str, Any], at_work: _Audit) -> None:
    at_work.facts |= {name: manifest[name] for name in _FACTS if name in manifest}


def _signed(name: str, content: bytes, at_work: _Audit) -> None:
    _verified(document_signatures(name, content, at_work.trust), at_work)


def _verified(
    found: tuple[tuple[SignatureFinding, ...], tuple[AuditFinding, ...]], at_work: _Audit
) -> None:
    signatures, findings = found
    at_work.signatures += signatures
    at_work.add(findings)


def _derived(folder: Path, manifest: Mapping[str, Any], at_work: _Audit) -> None:
    recorded = date.fromisoformat(manifest["assessed_on"])
    inputs = folder / INPUTS
    try:
        assessment = pipeline.assess(inputs, recorded)
        current = (
            pipeline.assess(inputs, at_work.today) if at_work.today != recorded else assessment
        )
    except DataProblems as error:
        at_work.fail("derivation", INPUTS, f"cannot be assessed: {error}")
        return
    versions = pipeline.versions_of(assessment)
    at_work.checked["figures"] = len(assessment.figures)
    at_work.checked["verdicts"] = len(assessment.verdicts)
    at_work.add(derivation(folder, manifest, assessment, versions))
    at_work.add(under_the_law_of(at_work.today, assessment, current))
    at_work.add(completeness(assessment))


def _proved(full: Path, manifest: Mapping[str, Any], at_work: _Audit) -> None:
    if manifest.get("edition") != "public":
        at_work.fail("redaction", MANIFEST, "not a public edition")
        return
    try:
        campaign = pipeline.assess(full / INPUTS, at_work.today).campaign
        at_work.add(proves_public(full, campaign, manifest))
    except (LampassayError, OSError) as error:
        at_work.fail("redaction", str(full), f"cannot prove the public edition: {error}")
    at_work.checked["withheld"] = len(manifest["withheld"])
