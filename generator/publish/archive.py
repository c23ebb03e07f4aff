"""One file for filing: an issued folder as a ZIP archive that is the same for the same folder."""

from __future__ import annotations

import io
import stat
import zipfile
from pathlib import Path

from generator.publish.folders import PublishError
from generator.publish.manifest import MANIFEST

__all__ = ["archive_bytes", "write_archive"]

_EARLIEST = (1980, 1, 1, 0, 0, 0)
_UNIX = 3
_MODE = (stat.S_IFREG | 0o644) << 16


def archive_bytes(folder: Path, top: str) -> bytes:
    """Pack a folder.

    Names are sorted, times and permissions fixed, and contents stored as they are, so that no
    clock and no version of a compressor is in the bytes.

    Parameters
    ----------
    folder
        An issued folder.
    top
        Name of the folder inside the archive.

    Returns
    -------
    bytes
        The archive.
    """
    stream = io.BytesIO()
    names = sorted(
        path.relative_to(folder).as_posix() for path in folder.rglob("*") if path.is_file()
    )
    with zipfile.ZipFile(stream, "w", zipfile.ZIP_STORED) as archive:
        for name in names:
            entry = zipfile.ZipInfo(f"{top}/{name}", _EARLIEST)
            entry.create_system = _UNIX
            entry.external_attr = _MODE
            archive.writestr(entry, (folder / name).read_bytes())
    return stream.getvalue()


def write_archive(folder: Path, file: Path, top: str) -> None:
    """Write an issued folder as one archive, in one step.

    Parameters
    ----------
    folder
        The issued folder.
    file
        The archive; a former one is replaced.
    top
        Name of the folder inside the archive.

    Raises
    ------
    PublishError
        If the file would lie inside the folder, is a folder, or is something else than an
        archive.
    """
    place = file.resolve()
    if place.is_relative_to(folder.resolve()):
        raise PublishError(f"{file} lies inside {folder}; name a file outside with --archive")
    if place.is_dir():
        raise PublishError(f"{file} is a folder; name a file with --archive")
    if place.exists() and not zipfile.is_zipfile(place):
        raise PublishError(f"{file} is there and is no archive; name another file with --archive")
    if not (folder / MANIFEST).is_file():
        raise PublishError(f"{folder} is not an issued folder: it has no {MANIFEST}")
    place.parent.mkdir(parents=True, exist_ok=True)
    scratch = place.with_name(f".{place.name}.new")
    try:
        scratch.write_bytes(archive_bytes(folder, top))
        scratch.replace(place)
    finally:
        scratch.unlink(missing_ok=True)
