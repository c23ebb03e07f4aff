"""The full and the public edition of one campaign, and the salt that ties them together."""

from __future__ import annotations

import json
import re
import secrets
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

from generator.publish.folders import PublishError
from generator.publish.manifest import Withheld
from generator.publish.redaction import CodeNames, code_names, redact
from generator.records.campaign import Campaign

__all__ = [
    "REDACTION",
    "PublicCampaign",
    "edition_salt",
    "public_campaign",
    "public_place",
    "read_salt",
    "write_redaction",
]

REDACTION = "data/redaction.json"
"""File of a full edition that holds the salt and the code names of its public edition."""

_SALT = re.compile(r"[0-9a-f]{64}")


@dataclass(frozen=True, slots=True)
class PublicCampaign:
    """A campaign as the public may see it.

    Parameters
    ----------
    folder
        The campaign folder, written again.
    withheld
        What was left out or changed.
    names
        What stands for what.
    """

    folder: Path
    withheld: tuple[Withheld, ...]
    names: CodeNames


def public_place(place: Path) -> Path:
    """Folder of the public edition: beside the full one, with ``-public`` at its name."""
    return place.with_name(f"{place.name}-public")


def read_salt(file: Path) -> bytes:
    """Read the salt out of the ``redaction.json`` of a full edition.

    Parameters
    ----------
    file
        The file.

    Returns
    -------
    bytes
        32 bytes.

    Raises
    ------
    PublishError
        If the file cannot be read or holds no salt.
    """
    try:
        salt = json.loads(file.read_bytes())["salt"]
    except (OSError, ValueError, KeyError, TypeError):
        raise PublishError(f"{file} holds no salt of a full edition") from None
    if not isinstance(salt, str) or not _SALT.fullmatch(salt):
        raise PublishError(f"{file}: the salt is not 64 hexadecimal digits")
    return bytes.fromhex(salt)


def edition_salt(place: Path, file: Path | None) -> bytes:
    """Choose the salt: that of a file, else of the former edition in place, else a new one.

    Parameters
    ----------
    place
        Where the full edition goes.
    file
        ``redaction.json`` of a full edition, or ``None``.

    Returns
    -------
    bytes
        32 bytes.
    """
    former = place / REDACTION
    if file is not None:
        return read_salt(file)
    return read_salt(former) if former.is_file() else secrets.token_bytes(32)


def write_redaction(folder: Path, salt: bytes, names: CodeNames) -> None:
    """Keep the salt and the code names in the full edition.

    Parameters
    ----------
    folder
        Full edition being built; its ``data`` is there.
    salt, names
        Of the public edition.
    """
    content = {"salt": salt.hex(), "bidders": dict(names.bidders), "ids": dict(names.ids)}
    text = json.dumps(content, ensure_ascii=False, indent=1) + "\n"
    (folder / REDACTION).write_text(text, encoding="utf-8", newline="\n")


@contextmanager
def public_campaign(source: Path, campaign: Campaign, salt: bytes) -> Iterator[PublicCampaign]:
    """Give the campaign written again for the public, for as long as the block lasts.

    Parameters
    ----------
    source
        The campaign folder.
    campaign
        The campaign as it was read from there.
    salt
        Salt of the edition.
    """
    names = code_names(campaign, salt)
    with tempfile.TemporaryDirectory(prefix="lampassay-") as scratch:
        folder = Path(scratch) / campaign.name
        folder.mkdir()
        yield PublicCampaign(folder, redact(source, campaign, folder, salt), names)
