"""Integrity: is every file there, unchanged, under its name, and nothing else."""

from __future__ import annotations

import hashlib
import json
import re
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from datetime import date
from pathlib import Path
from typing import Any

from generator.audit.report import AuditFinding
from generator.publish.inputs import INPUTS
from generator.publish.manifest import (
    MANIFEST,
    MANIFEST_SIGNATURE,
    manifest_bytes,
    manifest_digest,
)

__all__ = ["Listed", "integrity", "listed_files", "read_manifest"]

_SHA256 = re.compile(r"[0-9a-f]{64}")
_BESIDE = (MANIFEST, MANIFEST_SIGNATURE)


@dataclass(frozen=True, slots=True)
class Listed:
    """One file that the manifest lists: path inside the folder, size [bytes], SHA-256."""

    path: str
    size: int
    sha256: str
    unsigned: Mapping[str, Any] | None = None


def _failure(subject: str, message: str) -> AuditFinding:
    return AuditFinding("integrity", "failure", subject, message)


def read_manifest(content: bytes) -> tuple[dict[str, Any] | None, tuple[AuditFinding, ...]]:
    """Read a manifest, or the list inside a document, and check it against its own digest.

    Parameters
    ----------
    content
        Its bytes.

    Returns
    -------
    tuple
        The manifest, or ``None`` where it cannot be used; and what is wrong with it.
    """
    try:
        manifest = json.loads(content)
    except (ValueError, RecursionError):
        return None, (_failure(MANIFEST, "changed: it cannot be read"),)
    if not isinstance(manifest, dict) or not _usable(manifest):
        return None, (_failure(MANIFEST, "changed: it has not the shape of a manifest"),)
    found = []
    if manifest.get("digest") != manifest_digest(manifest):
        found.append(_failure(MANIFEST, "changed: it does not agree with its own digest"))
    if manifest_bytes(manifest) != content:
        found.append(_failure(MANIFEST, "changed: it is not written as it was issued"))
    return manifest, tuple(found)


def _usable(manifest: Mapping[str, Any]) -> bool:
    entries = [manifest.get("inputs"), manifest.get("outputs")]
    if not all(isinstance(group, list) and all(map(_is_entry, group)) for group in entries):
        return False
    versions = manifest.get("versions")
    try:
        date.fromisoformat(str(manifest.get("assessed_on")))
    except ValueError:
        return False
    return isinstance(versions, dict)


def _is_entry(entry: object) -> bool:
    if not isinstance(entry, dict):
        return False
    path, size, digest = (entry.get(name) for name in ("path", "size", "sha256"))
    named = isinstance(path, str) and path and not path.startswith("/") and "\\" not in path
    if not named or {"..", ".", ""} & set(str(path).split("/")):
        return False
    return (
        isinstance(size, int) and isinstance(digest, str) and _SHA256.fullmatch(digest) is not None
    )


def listed_files(manifest: Mapping[str, Any]) -> tuple[Listed, ...]:
    """The files that a manifest lists, inputs under their folder.

    Parameters
    ----------
    manifest
        The manifest.
    """
    inputs = [{**entry, "path": f"{INPUTS}/{entry['path']}"} for entry in manifest["inputs"]]
    return tuple(
        Listed(entry["path"], entry["size"], entry["sha256"], entry.get("unsigned"))
        for entry in [*inputs, *manifest["outputs"]]
    )


def integrity(folder: Path, listed: Iterable[Listed]) -> tuple[AuditFinding, ...]:
    """Compare a folder with its list.

    Parameters
    ----------
    folder
        The issued folder.
    listed
        What the manifest lists.

    Returns
    -------
    tuple of AuditFinding
        A failure for every file that is changed, missing, extra or renamed.
    """
    wanted = {entry.path: entry for entry in listed}
    there = dict(_there(folder))
    found = [
        _failure(name, "a link; an issued folder has none")
        for name, path in there.items()
        if path is None
    ]
    present = {name: path for name, path in there.items() if path and name not in _BESIDE}
    found += [
        item for name in wanted if name in present for item in _changed(present[name], wanted[name])
    ]
    missing = [entry for name, entry in wanted.items() if name not in there]
    extra = {name: path for name, path in present.items() if name not in wanted}
    found += _moved(missing, extra)
    return tuple(sorted(found, key=lambda item: item.subject))


def _there(folder: Path) -> Iterator[tuple[str, Path | None]]:
    """Every file of a folder by its name; ``None`` for a link."""
    for path in sorted(folder.rglob("*")):
        name = path.relative_to(folder).as_posix()
        if path.is_symlink():
            yield name, None
        elif not path.is_dir():
            yield name, path


def _changed(path: Path, entry: Listed) -> Iterator[AuditFinding]:
    content = path.read_bytes()
    if len(content) != entry.size:
        message = f"changed: {len(content)} bytes, {entry.size} when it was issued"
        yield _failure(entry.path, message)
    elif hashlib.sha256(content).hexdigest() != entry.sha256:
        yield _failure(entry.path, "changed: same size, other content")
    elif entry.unsigned is not None:
        before = content[: entry.unsigned["size"]]
        if hashlib.sha256(before).hexdigest() != entry.unsigned["sha256"]:
            yield _failure(entry.path, "does not begin with the document as it was before signing")


def _moved(missing: list[Listed], extra: Mapping[str, Path]) -> Iterator[AuditFinding]:
    digests = {name: hashlib.sha256(path.read_bytes()).hexdigest() for name, path in extra.items()}
    taken = set()
    for entry in missing:
        match = next(
            (
                name
                for name, digest in digests.items()
                if digest == entry.sha256 and name not in taken
            ),
            None,
        )
        if match is None:
            yield _failure(entry.path, "missing")
        else:
            taken.add(match)
            yield _failure(entry.path, f"renamed to {match}")
    for name in extra:
        if name not in taken:
            yield _failure(name, "extra: the manifest does not list it")
