"""The archive is the same for the same folder, and opens with any ZIP reader."""

from __future__ import annotations

import os
import zipfile
from pathlib import Path

import pytest

from generator.publish import PublishError, write_archive
from generator.publish.archive import archive_bytes


@pytest.fixture
def issue_folder(tmp_path: Path) -> Path:
    folder = tmp_path / "issue"
    (folder / "data").mkdir(parents=True)
    (folder / "manifest.json").write_text("{}")
    (folder / "data" / "b.csv").write_text("b")
    (folder / "a.html").write_text("a")
    return folder


def test_times_modes_and_order_are_not_in_the_bytes(issue_folder: Path, tmp_path: Path) -> None:
    first = archive_bytes(issue_folder, "top")
    other = tmp_path / "other"
    (other / "data").mkdir(parents=True)
    for name in ("data/b.csv", "a.html", "manifest.json"):
        (other / name).write_bytes((issue_folder / name).read_bytes())
        (other / name).chmod(0o600)
        os.utime(other / name, (1, 1))
    assert archive_bytes(other, "top") == first


def test_any_reader_finds_sorted_files(issue_folder: Path, tmp_path: Path) -> None:
    file = tmp_path / "filed" / "issue.zip"
    write_archive(issue_folder, file, "top")
    with zipfile.ZipFile(file) as archive:
        assert archive.testzip() is None
        assert archive.namelist() == ["top/a.html", "top/data/b.csv", "top/manifest.json"]
        assert {entry.date_time for entry in archive.infolist()} == {(1980, 1, 1, 0, 0, 0)}
        assert archive.read("top/data/b.csv") == b"b"
    assert [path.name for path in file.parent.iterdir()] == ["issue.zip"]


def test_a_former_archive_is_replaced_and_nothing_else(issue_folder: Path, tmp_path: Path) -> None:
    file = tmp_path / "issue.zip"
    write_archive(issue_folder, file, "top")
    write_archive(issue_folder, file, "other")
    assert zipfile.ZipFile(file).namelist()[0] == "other/a.html"
    file.write_text("my thesis")
    with pytest.raises(PublishError, match="is no archive"):
        write_archive(issue_folder, file, "top")
    assert file.read_text() == "my thesis"


def test_places_that_make_no_sense_are_refused(issue_folder: Path, tmp_path: Path) -> None:
    with pytest.raises(PublishError, match="lies inside"):
        write_archive(issue_folder, issue_folder / "x.zip", "top")
    with pytest.raises(PublishError, match="is a folder"):
        write_archive(issue_folder, tmp_path, "top")
    with pytest.raises(PublishError, match="not an issued folder"):
        write_archive(issue_folder / "data", tmp_path / "x.zip", "top")
