"""PDF documents: the files inside them, taken out and compared with what they should be."""

from __future__ import annotations

import hashlib
from collections.abc import Iterator, Mapping
from pathlib import Path
from typing import Any

from generator.audit.integrity import Listed, listed_files, read_manifest
from generator.audit.report import AuditFinding
from generator.errors import LampassayError
from generator.publish.inputs import INPUTS
from generator.publish.lamp_evidence import EVIDENCE

__all__ = ["DocumentError", "attached_files", "attachments_agree", "unpack_document"]

_MOST_BYTES = 256 * 1024 * 1024
_MOST_FILES = 10_000


class DocumentError(LampassayError):
    """The document cannot be audited alone; says why."""


def attached_files(file: Path) -> dict[str, bytes]:
    """Take the attached files out of a PDF.

    Parameters
    ----------
    file
        The document.

    Returns
    -------
    dict
        Name -> content.

    Raises
    ------
    DocumentError
        If it cannot be read, or carries more than any sheet does.
    """
    import pikepdf

    files: dict[str, bytes] = {}
    try:
        with pikepdf.open(file) as document:
            if len(document.attachments) > _MOST_FILES:
                raise DocumentError(f"{file}: more than {_MOST_FILES} attachments")
            for name, attached in document.attachments.items():
                files[name] = attached.get_file().read_bytes()
                if sum(map(len, files.values())) > _MOST_BYTES:
                    raise DocumentError(f"{file}: more than {_MOST_BYTES} bytes attached")
    except (pikepdf.PdfError, ValueError, KeyError, RuntimeError) as error:
        raise DocumentError(f"{file}: cannot be read as PDF: {error}") from None
    return files


def unpack_document(
    file: Path, target: Path
) -> tuple[dict[str, Any] | None, tuple[AuditFinding, ...]]:
    """Lay the attached files out as the small issue they are.

    Parameters
    ----------
    file
        The document.
    target
        Empty folder; gets ``inputs`` and ``data``.

    Returns
    -------
    tuple
        The list inside the document, or ``None`` where it has none that can be used; and what
        is wrong with it and with the files.
    """
    files = attached_files(file)
    if EVIDENCE not in files:
        raise DocumentError(f"{file}: carries no {EVIDENCE}; it is not a sheet of lampassay")
    evidence, found = read_manifest(files[EVIDENCE])
    if evidence is None:
        return None, found
    names = _attached_names(evidence)
    for entry in listed_files(evidence):
        name = names[entry.path]
        if name is not None and name in files:
            place = target / entry.path
            place.parent.mkdir(parents=True, exist_ok=True)
            place.write_bytes(files[name])
    return evidence, (*found, *_compared(evidence, files))


def _attached_names(evidence: Mapping[str, Any]) -> dict[str, str | None]:
    inputs = {f"{INPUTS}/{entry['path']}": entry.get("attached_as") for entry in evidence["inputs"]}
    return inputs | {entry["path"]: entry.get("attached_as") for entry in evidence["outputs"]}


def _compared(evidence: Mapping[str, Any], files: Mapping[str, bytes]) -> Iterator[AuditFinding]:
    names = _attached_names(evidence)
    for entry in listed_files(evidence):
        name = names[entry.path]
        if name is None:
            message = "not attached; only its digest is known"
            yield AuditFinding("integrity", "note", entry.path, message)
        elif name not in files:
            yield AuditFinding("integrity", "failure", name, "missing attachment")
        elif not _agrees(files[name], entry):
            yield AuditFinding("integrity", "failure", name, "changed attachment")
    for name in files:
        if name != EVIDENCE and name not in names.values():
            yield AuditFinding("integrity", "failure", name, "extra attachment")


def _agrees(content: bytes, entry: Listed) -> bool:
    return len(content) == entry.size and hashlib.sha256(content).hexdigest() == entry.sha256


def attachments_agree(
    folder: Path, name: str, manifest: Mapping[str, Any]
) -> tuple[AuditFinding, ...]:
    """Compare what a document of an issue carries with the inputs of the issue.

    Parameters
    ----------
    folder
        The issued folder.
    name
        Path of the document in it.
    manifest
        Manifest of the issue.

    Returns
    -------
    tuple of AuditFinding
        Failures for attachments that are damaged, or not the raw files of the issue.
    """
    try:
        files = attached_files(folder / name)
    except DocumentError as error:
        return (AuditFinding("integrity", "failure", name, str(error)),)
    if EVIDENCE not in files:
        return ()  # a letter or a report of a tender; its bytes are compared as a whole
    evidence, found = read_manifest(files[EVIDENCE])
    if evidence is None:
        return found
    whole = {entry["path"]: entry["sha256"] for entry in manifest["inputs"]}
    strange = [
        AuditFinding("integrity", "failure", name, f"{entry['path']} inside is not the issue's")
        for entry in evidence["inputs"]
        if "/" in entry["path"] and whole.get(entry["path"]) != entry["sha256"]
    ]
    damaged = [item for item in _compared(evidence, files) if item.level == "failure"]
    return (*found, *strange, *damaged)
