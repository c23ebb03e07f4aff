"""The inputs of an issue, copied byte by byte, so that it can be derived again from itself."""

from __future__ import annotations

import hashlib
from pathlib import Path

from generator.publish.folders import PublishError
from generator.records.campaign import Campaign

__all__ = ["INPUTS", "write_inputs"]

INPUTS = "inputs"
"""Folder of an issue that holds the copies."""


def write_inputs(folder: Path, source: Path, campaign: Campaign) -> None:
    """Copy every file that was read into the issue.

    Parameters
    ----------
    folder
        Folder being built.
    source
        The campaign folder.
    campaign
        The campaign as it was read from there.

    Raises
    ------
    PublishError
        If a file is no longer what was read; names it.
    """
    for file in campaign.files:
        content = (source / file.path).read_bytes()
        if hashlib.sha256(content).hexdigest() != file.sha256:
            raise PublishError(f"{file.path} changed while the campaign was being issued")
        copy = folder / INPUTS / file.path
        copy.parent.mkdir(parents=True, exist_ok=True)
        copy.write_bytes(content)
