"""A folder is exchanged whole or not at all."""

from __future__ import annotations

from pathlib import Path

import pytest

from generator.publish import FolderExchange, PublishError


@pytest.fixture
def source(tmp_path: Path) -> Path:
    folder = tmp_path / "campaign"
    folder.mkdir()
    return folder


def issued(folder: Path, text: str) -> None:
    folder.mkdir(parents=True)
    (folder / "manifest.json").write_text("{}")
    (folder / "index.html").write_text(text)


def test_a_new_folder_appears_when_complete(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "output" / "demo"
    with FolderExchange(target, source).building() as folder:
        (folder / "index.html").write_text("new")
        assert not target.exists()
    assert (target / "index.html").read_text() == "new"
    assert [path.name for path in target.parent.iterdir()] == ["demo"]


def test_a_former_issue_is_replaced_whole(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "demo"
    issued(target, "old")
    (target / "stale.html").write_text("old")
    with FolderExchange(target, source).building() as folder:
        (folder / "index.html").write_text("new")
    assert [path.name for path in target.iterdir()] == ["index.html"]


def test_a_failure_leaves_the_former_issue_as_it_was(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "demo"
    issued(target, "old")

    def fail_half_way() -> None:
        with FolderExchange(target, source).building() as folder:
            (folder / "index.html").write_text("new")
            raise RuntimeError("half way")

    with pytest.raises(RuntimeError, match="half way"):
        fail_half_way()
    assert (target / "index.html").read_text() == "old"
    assert sorted(path.name for path in tmp_path.iterdir()) == ["campaign", "demo"]


def test_a_folder_of_something_else_is_refused(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "thesis"
    target.mkdir()
    (target / "chapter.txt").write_text("mine")
    with pytest.raises(PublishError, match="not issued by lampassay"):
        FolderExchange(target, source)


def test_an_empty_folder_is_taken(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "empty"
    target.mkdir()
    with FolderExchange(target, source).building() as folder:
        (folder / "index.html").write_text("new")
    assert (target / "index.html").is_file()


@pytest.mark.parametrize("inside", ["campaign", "."])
def test_the_campaign_itself_is_never_replaced(tmp_path: Path, source: Path, inside: str) -> None:
    with pytest.raises(PublishError, match="campaign itself"):
        FolderExchange(tmp_path / inside, source)


def test_a_file_in_the_way_is_refused(tmp_path: Path, source: Path) -> None:
    target = tmp_path / "file"
    target.write_text("mine")
    with pytest.raises(PublishError, match="is a file"):
        FolderExchange(target, source)
