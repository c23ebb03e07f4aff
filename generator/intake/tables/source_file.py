"""Files as they lie on disk: bounded reading, gzip, checksums, and the step from bytes to text."""

from __future__ import annotations

import gzip
import hashlib
import io
import re
import zlib
from dataclasses import dataclass
from pathlib import Path

from generator.intake.tables.problem_list import ProblemList
from generator.records.campaign import InputFile

__all__ = ["LARGEST_BYTES", "SourceFile", "decoded_text", "read_source"]

LARGEST_BYTES = 512 * 1024 * 1024
"""Largest file read, after unpacking [bytes]; an hour of light at 2 kHz takes a tenth of it."""

_CONTROL = re.compile("[\x00-\x08\x0b\x0c\x0e-\x1f\x7f]")
_LONE_RETURN = re.compile(r"\r(?!\n)")
_FOREIGN = (
    (b"\x1f\x8b", "gzip data; give the file the ending .csv.gz"),
    (b"PK\x03\x04", "a spreadsheet workbook or archive; save the table as CSV (UTF-8)"),
    (b"\xff\xfe", "UTF-16 text; save it as UTF-8"),
    (b"\xfe\xff", "UTF-16 text; save it as UTF-8"),
)


@dataclass(frozen=True, slots=True)
class SourceFile:
    """One file that was read: its content after unpacking, and its entry in the evidence."""

    data: bytes
    entry: InputFile


def read_source(
    path: Path, problems: ProblemList, largest: int = LARGEST_BYTES
) -> SourceFile | None:
    """Read one file, unpacking it where its name ends in ``.gz``.

    Parameters
    ----------
    path
        The file.
    problems
        Where to note what is wrong; names the file as the campaign knows it.
    largest
        Most bytes accepted, packed or unpacked [bytes].

    Returns
    -------
    SourceFile or None
        The content, or ``None`` after an error was noted.
    """
    try:
        with path.open("rb") as stream:
            packed = stream.read(largest + 1)
    except OSError as failure:
        problems.error("The file cannot be read.", found=failure.strerror or str(failure))
        return None
    entry = InputFile(problems.file, len(packed), hashlib.sha256(packed).hexdigest())
    data = packed
    if path.name.endswith(".gz") and len(packed) <= largest:
        try:
            data = _unpacked(packed, largest)
        except (OSError, EOFError, zlib.error) as failure:
            problems.error(
                "The file is not whole gzip data.", found=str(failure), expected="gzip data"
            )
            return None
    if len(data) > largest:
        problems.error(
            "The file is too large to be a measurement of a lamp.",
            found=f"more than {largest} bytes",
            expected=f"at most {largest} bytes, unpacked",
        )
        return None
    return SourceFile(data, entry)


def _unpacked(packed: bytes, largest: int) -> bytes:
    with gzip.GzipFile(fileobj=io.BytesIO(packed)) as stream:
        return stream.read(largest + 1)


def decoded_text(data: bytes, problems: ProblemList) -> str | None:
    """Decode UTF-8, with or without a byte order mark, and refuse what is not text.

    Parameters
    ----------
    data
        Content of the file.
    problems
        Where to note what is wrong.

    Returns
    -------
    str or None
        The text without byte order mark, line ends as LF or CRLF; ``None`` after an error.
    """
    for mark, meaning in _FOREIGN:
        if data.startswith(mark):
            problems.error(f"The file is {meaning}.", found="byte 1 onwards", expected="UTF-8 text")
            return None
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError as failure:
        position = failure.start + (3 if data.startswith(b"\xef\xbb\xbf") else 0)
        problems.error(
            f"Byte {position + 1} of the file is not UTF-8 text.",
            row=data.count(b"\n", 0, position) + 1,
            found=f"byte 0x{data[position]:02X}",
            expected="UTF-8 text",
        )
        return None
    return text if _is_plain(text, problems) else None


def _is_plain(text: str, problems: ProblemList) -> bool:
    for pattern, message in (
        (_CONTROL, "The text holds a control character."),
        (_LONE_RETURN, "The lines end in a carriage return alone."),
    ):
        match = pattern.search(text)
        if match is not None:
            problems.error(
                message,
                row=text.count("\n", 0, match.start()) + 1,
                found=f"character U+{ord(match[0]):04X}",
                expected="plain text with lines ending in LF or CRLF",
            )
            return False
    return True
