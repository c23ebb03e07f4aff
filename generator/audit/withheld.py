"""The public edition against the full one: does it withhold what it says, and nothing else."""

from __future__ import annotations

import hashlib
import json
from collections.abc import Mapping
from pathlib import Path
from typing import Any

from generator.audit.integrity import integrity, listed_files, read_manifest
from generator.audit.report import AuditFinding
from generator.publish.editions import REDACTION, public_campaign, read_salt
from generator.publish.inputs import INPUTS
from generator.publish.manifest import MANIFEST
from generator.records.campaign import Campaign

__all__ = ["proves_public"]


def proves_public(
    full: Path, campaign: Campaign, public: Mapping[str, Any]
) -> tuple[AuditFinding, ...]:
    """Make the public campaign again from the full edition, and compare.

    Parameters
    ----------
    full
        Folder of the full edition, which holds the salt.
    campaign
        The campaign read from its inputs.
    public
        Manifest of the public edition.

    Returns
    -------
    tuple of AuditFinding
        Failures where inputs or salted digests are not those that follow from the full
        edition.
    """
    manifest, found = read_manifest((full / MANIFEST).read_bytes())
    if manifest is None:
        return found
    damaged = integrity(full, listed_files(manifest))
    salt = read_salt(full / REDACTION)
    with public_campaign(full / INPUTS, campaign, salt) as made:
        again = {
            path.relative_to(made.folder).as_posix(): hashlib.sha256(path.read_bytes()).hexdigest()
            for path in made.folder.rglob("*")
            if path.is_file()
        }
        withheld = {(part.path, part.place): part.salted_sha256 for part in made.withheld}
    issued = {entry["path"]: entry["sha256"] for entry in public["inputs"]}
    stated = {(part["path"], part["place"]): part["salted_sha256"] for part in public["withheld"]}
    return (
        *found,
        *damaged,
        *_unlike("input", again, issued),
        *_unlike("withheld", withheld, stated),
    )


def _unlike(
    what: str, again: Mapping[Any, str], issued: Mapping[Any, str]
) -> tuple[AuditFinding, ...]:
    return tuple(
        AuditFinding(
            "redaction",
            "failure",
            name if isinstance(name, str) else ": ".join(name),
            f"the {what} does not follow from the full edition",
        )
        for name in sorted(again.keys() | issued.keys(), key=json.dumps)
        if again.get(name) != issued.get(name)
    )
