"""The manifest: every input and output with size, digest and media type, and a digest over all."""

from __future__ import annotations

import hashlib
import json
from collections.abc import Iterable, Mapping
from dataclasses import asdict, dataclass, field
from importlib.resources import files
from pathlib import Path
from typing import Any

from generator.publish.inputs import INPUTS
from generator.publish.media_types import media_type
from generator.records.assessment import Assessment

__all__ = [
    "MANIFEST",
    "MANIFEST_SCHEMA",
    "MANIFEST_SIGNATURE",
    "Edition",
    "FileEntry",
    "Withheld",
    "file_entry",
    "manifest_bytes",
    "manifest_digest",
    "manifest_json",
    "manifest_schema",
    "write_manifest",
]

MANIFEST = "manifest.json"
MANIFEST_SIGNATURE = "manifest.json.p7s"
MANIFEST_SCHEMA = "manifest.schema.json"


@dataclass(frozen=True, slots=True)
class FileEntry:
    """One file: path, size [bytes], SHA-256, media type."""

    path: str
    size: int
    sha256: str
    media_type: str


@dataclass(frozen=True, slots=True)
class Withheld:
    """One part of an input that an edition leaves out, with the salted digest that binds it.

    Parameters
    ----------
    path
        Input that it was taken from, as this edition names it.
    place
        ``row 2, unit_price`` of a table, dotted key of a TOML file, or ``whole file``.
    salted_sha256
        SHA-256 of the part's own salt followed by its content.
    """

    path: str
    place: str
    salted_sha256: str


@dataclass(frozen=True, slots=True)
class Edition:
    """What kind of issue it is.

    Parameters
    ----------
    kind
        ``full`` or ``public``.
    withheld
        What a public edition leaves out.
    unsigned
        Path of a signed document -> its entry before it was signed; the signed document begins
        with those bytes.
    seed
        Seed of every random number behind a figure or a rank.
    """

    kind: str = "full"
    withheld: tuple[Withheld, ...] = ()
    unsigned: Mapping[str, FileEntry] = field(default_factory=dict)
    seed: int | None = None


def file_entry(path: str, content: bytes) -> FileEntry:
    """Describe one file.

    Parameters
    ----------
    path
        Path as the manifest names it.
    content
        Its bytes.
    """
    return FileEntry(path, len(content), hashlib.sha256(content).hexdigest(), media_type(path))


def manifest_bytes(content: Mapping[str, Any]) -> bytes:
    """Write a manifest in the one form that is accepted: a reader compares byte by byte.

    Parameters
    ----------
    content
        The manifest.

    Returns
    -------
    bytes
        JSON, UTF-8, indented by one, closed by a line end.
    """
    return (json.dumps(content, ensure_ascii=False, indent=1) + "\n").encode()


def manifest_digest(content: Mapping[str, Any]) -> str:
    """Digest over everything a manifest says, its own ``digest`` left out.

    Parameters
    ----------
    content
        The manifest, with or without ``digest``.

    Returns
    -------
    str
        SHA-256 of the content as compact JSON with sorted keys.
    """
    rest = {key: value for key, value in content.items() if key != "digest"}
    text = json.dumps(rest, ensure_ascii=False, sort_keys=True, separators=(",", ":"))
    return hashlib.sha256(text.encode()).hexdigest()


def manifest_schema() -> bytes:
    """Give the JSON Schema of the manifest."""
    return files(__package__).joinpath(MANIFEST_SCHEMA).read_bytes()


def manifest_json(
    assessment: Assessment,
    folder: Path,
    versions: Mapping[str, str],
    edition: Edition | None = None,
) -> bytes:
    """Write ``manifest.json``: every input and output, versions, dates, rules, digest over all.

    Parameters
    ----------
    assessment
        The assessment.
    folder
        The folder being issued, complete but for the manifest; its ``inputs`` are taken from
        the campaign's own list.
    versions
        Program, law book and libraries -> version.
    edition
        What kind of issue it is; a full one by default.

    Returns
    -------
    bytes
        JSON, UTF-8; its shape is published as ``data/manifest.schema.json``.
    """
    kind = edition or Edition()
    campaign = assessment.campaign
    decision = campaign.settings.decision
    content: dict[str, Any] = {
        "$schema": f"data/{MANIFEST_SCHEMA}",
        "edition": kind.kind,
        "campaign": campaign.name,
        "reference": campaign.settings.campaign.reference,
        "assessed_on": assessment.assessed_on.isoformat(),
        "decision_rule": decision.rule,
        "decision": {
            "guard_band_factor": str(decision.guard_band_factor),
            "probability": str(decision.probability),
        },
        "seed": kind.seed,
        "versions": dict(versions),
        "inputs": [
            asdict(FileEntry(file.path, file.size, file.sha256, media_type(file.path)))
            for file in campaign.files
        ],
        "outputs": list(_outputs(folder, kind)),
        "withheld": [asdict(part) for part in kind.withheld],
    }
    content["digest"] = manifest_digest(content)
    return manifest_bytes(content)


def _outputs(folder: Path, edition: Edition) -> Iterable[dict[str, Any]]:
    paths = (path for path in folder.rglob("*") if path.is_file())
    for name in sorted(path.relative_to(folder).as_posix() for path in paths):
        if name.startswith(f"{INPUTS}/"):
            continue
        entry = asdict(file_entry(name, (folder / name).read_bytes()))
        before = edition.unsigned.get(name)
        if before is not None:
            entry["unsigned"] = {"size": before.size, "sha256": before.sha256}
        yield entry


def write_manifest(
    folder: Path,
    assessment: Assessment,
    versions: Mapping[str, str],
    edition: Edition | None = None,
) -> None:
    """Write the manifest; the last file of an issue but for its signature.

    Parameters
    ----------
    folder
        Folder being built, complete but for the manifest.
    assessment
        The assessment.
    versions
        Program, law book and libraries -> version.
    edition
        What kind of issue it is; a full one by default.
    """
    (folder / MANIFEST).write_bytes(manifest_json(assessment, folder, versions, edition))
