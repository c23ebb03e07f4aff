"""Hostile archives are refused before anything of them is written."""

from __future__ import annotations

import io
import stat
import struct
import warnings
import zipfile
from pathlib import Path

import pytest

from generator.audit import archive as reading
from generator.audit.archive import ArchiveError, unpack_archive


def packed(file: Path, *entries: tuple[str | zipfile.ZipInfo, bytes]) -> Path:
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", UserWarning)  # two entries of one name are meant
        with zipfile.ZipFile(file, "w", zipfile.ZIP_DEFLATED) as archive:
            for name, content in entries:
                archive.writestr(name, content)
    return file


def refused(file: Path, why: str) -> None:
    target = file.parent / "target"
    target.mkdir()
    with pytest.raises(ArchiveError, match=why):
        unpack_archive(file, target)
    assert list(target.rglob("*")) == []
    assert sorted(path.name for path in file.parent.iterdir()) == sorted([file.name, "target"])


def test_a_good_archive_is_unpacked(tmp_path: Path) -> None:
    file = packed(tmp_path / "good.zip", ("top/", b""), ("top/a.txt", b"a"), ("top/b/c.txt", b"c"))
    target = tmp_path / "target"
    target.mkdir()
    folder = unpack_archive(file, target)
    assert folder == target / "top"
    assert (folder / "b" / "c.txt").read_bytes() == b"c"


@pytest.mark.parametrize(
    "name",
    [
        "../x",
        "top/../../x",
        "/etc/x",
        "//x",
        "C:/x",
        "c:x",
        "top\\..\\x",
        "top//x",
        "./x",
        "top/./x",
        "top/x ",
        "top/x\x1f",
        "top/x\x00.txt",
        "top/aux:stream",
    ],
)
def test_names_that_lead_elsewhere_are_refused(tmp_path: Path, name: str) -> None:
    entry = zipfile.ZipInfo("placeholder")
    entry.filename = name
    refused(packed(tmp_path / "bad.zip", (entry, b"x")), "leads out|sign that no file")


@pytest.mark.parametrize(
    ("first", "second"),
    [
        ("top/a.txt", "top/a.txt"),
        ("top/a.txt", "TOP/A.TXT"),
        ("top/é.txt", "top/e\u0301.txt"),
        ("top/ß.txt", "top/ss.txt"),
        ("top/a", "top/a/b.txt"),
        ("top/a/b.txt", "top/a"),
    ],
)
def test_names_that_stand_twice_are_refused(tmp_path: Path, first: str, second: str) -> None:
    refused(packed(tmp_path / "twice.zip", (first, b"1"), (second, b"2")), "stands twice")


@pytest.mark.parametrize("kind", [stat.S_IFLNK, stat.S_IFCHR, stat.S_IFIFO, stat.S_IFSOCK])
def test_links_and_devices_are_refused(tmp_path: Path, kind: int) -> None:
    entry = zipfile.ZipInfo("top/link")
    entry.create_system = 3
    entry.external_attr = (kind | 0o777) << 16
    refused(packed(tmp_path / "link.zip", (entry, b"/etc/passwd")), "link or a device")


def test_a_bomb_is_refused_by_its_growth(tmp_path: Path) -> None:
    file = packed(tmp_path / "bomb.zip", ("top/zeros", bytes(64 * 1024 * 1024)))
    refused(file, "grows more than 200 fold")


def test_a_bomb_is_refused_by_its_size(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(reading, "MOST_BYTES", 100)
    file = packed(tmp_path / "large.zip", ("a", b"x" * 60), ("b", b"y" * 60))
    refused(file, "more than 100 bytes")


def test_too_many_entries_are_refused(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(reading, "MOST_ENTRIES", 3)
    file = packed(tmp_path / "many.zip", *((f"{n}", b"") for n in range(4)))
    refused(file, "more than 3 entries")


def test_overlapping_entries_are_refused(tmp_path: Path) -> None:
    # every entry of the directory points to the one body, as in a quoted-overlap bomb
    stream = io.BytesIO()
    body = bytes(range(256)) * 64
    with zipfile.ZipFile(stream, "w", zipfile.ZIP_STORED) as archive:
        archive.writestr("a", body)
    whole = stream.getvalue()
    begin = whole.index(b"PK\x01\x02")
    record = whole[begin : whole.index(b"PK\x05\x06")]
    count = 5
    directory = b"".join(record[:46] + bytes([ord("a") + n]) + record[47:] for n in range(count))
    end = struct.pack("<4s4H2LH", b"PK\x05\x06", 0, 0, count, count, len(directory), begin, 0)
    file = tmp_path / "overlap.zip"
    file.write_bytes(whole[:begin] + directory + end)
    refused(file, "overlap")


def test_an_encrypted_entry_is_refused(tmp_path: Path) -> None:
    file = packed(tmp_path / "locked.zip", ("top/a", b"secret"))
    content = bytearray(file.read_bytes())
    content[content.index(b"PK\x01\x02") + 8] |= 1
    file.write_bytes(bytes(content))
    refused(file, "encrypted")


def test_a_size_that_lies_is_refused(tmp_path: Path) -> None:
    file = packed(tmp_path / "lies.zip", ("top", b"x" * 1000))
    content = bytearray(file.read_bytes())
    place = content.index(b"PK\x01\x02") + 24
    content[place : place + 4] = struct.pack("<L", 10)
    file.write_bytes(bytes(content))
    target = tmp_path / "target"
    target.mkdir()
    with pytest.raises(ArchiveError):
        unpack_archive(file, target)


@pytest.mark.parametrize("content", [b"", b"PK", b"PK\x05\x06" + bytes(18), b"no archive at all"])
def test_what_is_no_archive_is_refused(tmp_path: Path, content: bytes) -> None:
    file = tmp_path / "none.zip"
    file.write_bytes(content)
    target = tmp_path / "target"
    target.mkdir()
    if content.startswith(b"PK\x05\x06"):
        assert unpack_archive(file, target) == target  # an archive of nothing holds no issue
    else:
        with pytest.raises(ArchiveError, match="damaged"):
            unpack_archive(file, target)
