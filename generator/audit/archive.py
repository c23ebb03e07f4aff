"""Reading an archive that may be hostile: every entry is looked at before anything is unpacked."""

from __future__ import annotations

import re
import stat
import unicodedata
import zipfile
import zlib
from collections.abc import Iterable
from pathlib import Path

from generator.errors import LampassayError

__all__ = ["LARGEST_ENTRY_RATIO", "MOST_BYTES", "MOST_ENTRIES", "ArchiveError", "unpack_archive"]

MOST_ENTRIES = 100_000
MOST_BYTES = 8 * 1024**3
"""Most bytes unpacked; larger than any campaign, smaller than a disk."""

LARGEST_ENTRY_RATIO = 200
"""Largest factor by which an entry may grow; text of measurements grows tenfold."""

_FREE_BYTES = 1024 * 1024
_CHUNK = 1024 * 1024
_ENCRYPTED = 0x1
_BAD_SIGN = re.compile(r'[\x00-\x1f\x7f\\:*?"<>|]')


class ArchiveError(LampassayError):
    """The archive is not fit to be unpacked; says why."""


def unpack_archive(file: Path, target: Path) -> Path:
    """Unpack an archive into an empty folder.

    Parameters
    ----------
    file
        The archive.
    target
        Empty folder.

    Returns
    -------
    Path
        The issued folder: ``target``, or the one folder in it.

    Raises
    ------
    ArchiveError
        If a name leads out of the folder, stands twice or is a link, if an entry is encrypted
        or grows too much, or if the archive is damaged.
    """
    try:
        with zipfile.ZipFile(file) as archive:
            entries = archive.infolist()
            _refuse_bombs(entries, file.stat().st_size)
            _refuse_names(entries)
            for entry in entries:
                if not entry.is_dir():
                    _unpack(archive, entry, target)
    except (zipfile.BadZipFile, zlib.error, EOFError, OSError, NotImplementedError) as error:
        raise ArchiveError(f"{file}: damaged: {error}") from None
    inside = list(target.iterdir())
    return inside[0] if len(inside) == 1 and inside[0].is_dir() else target


def _refuse_bombs(entries: Iterable[zipfile.ZipInfo], size: int) -> None:
    listed = list(entries)
    if len(listed) > MOST_ENTRIES:
        raise ArchiveError(f"more than {MOST_ENTRIES} entries")
    if sum(entry.file_size for entry in listed) > MOST_BYTES:
        raise ArchiveError(f"more than {MOST_BYTES} bytes unpacked")
    if sum(entry.compress_size for entry in listed) > size:
        raise ArchiveError("entries overlap: they hold more than the archive does")
    for entry in listed:
        grown = entry.file_size > LARGEST_ENTRY_RATIO * max(1, entry.compress_size)
        if grown and entry.file_size > _FREE_BYTES:
            raise ArchiveError(f"{entry.filename!r} grows more than {LARGEST_ENTRY_RATIO} fold")


def _refuse_names(entries: Iterable[zipfile.ZipInfo]) -> None:
    files: set[str] = set()
    folders: set[str] = set()
    for entry in entries:
        _refuse_kind(entry)
        parts = _parts(entry)
        folded = [unicodedata.normalize("NFC", part).casefold() for part in parts]
        name = "/".join(folded)
        above = {"/".join(folded[:end]) for end in range(1, len(folded))}
        if name in files or (not entry.is_dir() and name in folders) or above & files:
            raise ArchiveError(f"{entry.filename!r} stands twice")
        folders |= above | ({name} if entry.is_dir() else set())
        if not entry.is_dir():
            files.add(name)


def _refuse_kind(entry: zipfile.ZipInfo) -> None:
    if entry.flag_bits & _ENCRYPTED:
        raise ArchiveError(f"{entry.filename!r} is encrypted")
    mode = entry.external_attr >> 16
    kind = stat.S_IFMT(mode)
    if kind not in (0, stat.S_IFREG, stat.S_IFDIR):
        raise ArchiveError(f"{entry.filename!r} is a link or a device")


def _parts(entry: zipfile.ZipInfo) -> list[str]:
    name = entry.orig_filename
    if name != entry.filename or _BAD_SIGN.search(name):
        raise ArchiveError(f"{name!r} has a sign that no file of an issue has")
    parts = name.removesuffix("/").split("/") if entry.is_dir() else name.split("/")
    if any(part in {"", ".", ".."} or part != part.strip(" ") for part in parts):
        raise ArchiveError(f"{name!r} leads out of the folder")
    return parts


def _unpack(archive: zipfile.ZipFile, entry: zipfile.ZipInfo, target: Path) -> None:
    place = target.joinpath(*entry.filename.split("/"))
    place.parent.mkdir(parents=True, exist_ok=True)
    left = entry.file_size
    with archive.open(entry) as source, place.open("xb") as copy:
        while chunk := source.read(_CHUNK):
            left -= len(chunk)
            if left < 0:
                raise ArchiveError(f"{entry.filename!r} is larger than it says")
            copy.write(chunk)
