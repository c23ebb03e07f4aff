"""The watch on a campaign folder: what counts as a change, when, and what comes of it.

No outside source: the rules are the command's own. Time is a list of things that happen.
"""

from __future__ import annotations

import logging
import os
from collections.abc import Callable, Iterator
from contextlib import suppress
from itertools import islice
from pathlib import Path

import pytest

from generator.errors import DataProblems, Problem, SheetError, UseError
from generator.pipeline.issuing import Issued
from generator.pipeline.watching import (
    BETWEEN_LOOKS_S,
    QUIET_S,
    FolderState,
    FolderWatch,
    campaign_watch,
    differences,
    folder_state,
    issue_on_change,
)

PROBLEMS = DataProblems(
    [
        Problem("error", "units.csv", 2, "power_w", "x", "a number", "Not a number."),
        Problem("warning", "notes/x.md", None, None, "", "", "Not read."),
    ]
)


def issued(number: int) -> Issued:
    return Issued(Path("out"), Path("out") / f"index-{number}.html", 1, ())


class Looks:
    """A folder whose state goes one step on with every sleep; then Ctrl-C is pressed."""

    def __init__(self, *states: FolderState) -> None:
        self.states = list(states)
        self.slept: list[float] = []

    def look(self) -> FolderState:
        return self.states[0]

    def sleep(self, seconds: float) -> None:
        self.slept.append(seconds)
        del self.states[0]
        if not self.states:
            raise KeyboardInterrupt


def changes_of(looks: Looks) -> Iterator[tuple[str, ...]]:
    try:
        yield from FolderWatch(looks.look, looks.sleep).changes()
    except KeyboardInterrupt:
        return


A, B, C = {"a.csv": (1, 1)}, {"a.csv": (2, 1)}, {"a.csv": (3, 9)}


def test_the_beginning_waits_for_nothing() -> None:
    looks = Looks(A)
    assert list(islice(changes_of(looks), 1)) == [()]
    assert looks.slept == []


def test_a_quiet_folder_gives_no_change() -> None:
    assert list(changes_of(Looks(A, A, A, A))) == [()]


def test_a_change_is_given_once_and_only_when_all_is_quiet() -> None:
    looks = Looks(A, A, B, C, C, C)
    assert list(changes_of(looks)) == [(), ("changed: a.csv",)]
    assert looks.slept == [
        BETWEEN_LOOKS_S,
        BETWEEN_LOOKS_S,
        QUIET_S,
        QUIET_S,
        BETWEEN_LOOKS_S,
        BETWEEN_LOOKS_S,
    ]


def test_a_change_that_is_taken_back_is_none() -> None:
    assert list(changes_of(Looks(A, {}, A, A, A))) == [()]


def test_what_changes_while_the_campaign_is_issued_is_seen_afterwards() -> None:
    looks = Looks(A, B, B, B)
    changes = FolderWatch(looks.look, looks.sleep).changes()
    assert next(changes) == ()
    looks.states[:] = [B, B, B]  # while the caller issues
    assert next(changes) == ("changed: a.csv",)


@pytest.mark.parametrize(
    ("before", "after", "lines"),
    [
        (A, A, ()),
        (A, B, ("changed: a.csv",)),
        ({"a.csv": (1, 1)}, {"a.csv": (1, 2)}, ("changed: a.csv",)),
        ({}, A, ("new: a.csv",)),
        (A, {}, ("gone: a.csv",)),
        (
            {"b": (1, 1), "x/c": (1, 1), "d": (1, 1)},
            {"x/c": (1, 2), "a": (1, 1), "d": (1, 1)},
            ("new: a", "gone: b", "changed: x/c"),
        ),
    ],
)
def test_differences_name_every_file(
    before: FolderState, after: FolderState, lines: tuple[str, ...]
) -> None:
    assert differences(before, after) == lines


@pytest.mark.parametrize(
    "name",
    [
        ".units.csv.swp",
        ".~lock.units.csv#",
        ".#units.csv",
        "#units.csv#",
        "units.csv~",
        "~$units.xlsx",
        "units.csv.tmp",
        "units.csv.swp",
        "units.csv.part",
        "units.csv___jb_tmp___",
        "4913",
        ".git/index",
        "spectra/.one.csv.swp",
        "out/index.html",
        "out/lamps/one.html",
        "filed.zip",
    ],
)
def test_what_nobody_saved_into_the_campaign_does_not_count(tmp_path: Path, name: str) -> None:
    path = tmp_path / name
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_text("x", encoding="utf-8")
    assert folder_state(tmp_path, [tmp_path / "out", tmp_path / "FILED.zip"]) == {}


@pytest.mark.parametrize(
    "name", ["units.csv", "units.csv.gz", "templates/base/lamp.html.j2", "outer/x", "notes/out"]
)
def test_every_other_file_counts(tmp_path: Path, name: str) -> None:
    path = tmp_path / name
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_text("four", encoding="utf-8")
    os.utime(path, ns=(5, 7_000_000_000))
    assert folder_state(tmp_path, [tmp_path / "out"]) == {name: (7_000_000_000, 4)}


def test_a_folder_that_is_gone_has_no_files(tmp_path: Path) -> None:
    assert folder_state(tmp_path / "gone") == {}


def test_links_are_seen_but_not_followed(tmp_path: Path) -> None:
    inside = tmp_path / "campaign"
    inside.mkdir()
    (tmp_path / "elsewhere").mkdir()
    (tmp_path / "elsewhere" / "x.csv").write_text("x", encoding="utf-8")
    (inside / "circle").symlink_to(inside)
    (inside / "nowhere.csv").symlink_to(inside / "nothing")
    (inside / "spectra").symlink_to(tmp_path / "elsewhere")
    assert sorted(folder_state(inside)) == ["circle", "nowhere.csv", "spectra"]


@pytest.mark.parametrize("through_link", [False, True])
def test_what_is_written_into_the_campaign_folder_is_left_out(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, through_link: bool
) -> None:
    folder = tmp_path / "reading-room"
    folder.mkdir()
    (folder / "lamps.csv").write_text("x", encoding="utf-8")
    campaign = Path()
    if through_link:
        campaign = tmp_path / "link"
        campaign.symlink_to(folder)
    monkeypatch.chdir(folder)
    watch = campaign_watch(campaign, None, Path("filed/all.zip"), public=True)
    for name in (
        "output/reading-room/index.html",
        "output/reading-room-public/index.html",
        "output/.reading-room.abc/new/index.html",
        "filed/all.zip",
        "filed/.all.zip.new",
    ):
        path = folder / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text("x", encoding="utf-8")
        assert not watch.has_changed(), name
    (folder / "output" / "other").write_text("x", encoding="utf-8")
    assert watch.has_changed()


def told(
    looks: Looks, outcomes: list[Callable[[], Issued]], caplog: pytest.LogCaptureFixture
) -> tuple[list[str], list[str]]:
    """Indexes issued, and what was said, until Ctrl-C."""
    rounds = list(outcomes)
    given: list[str] = []

    def once() -> Issued:
        return rounds.pop(0)()

    watch = FolderWatch(looks.look, looks.sleep)
    with caplog.at_level(logging.INFO, "lampassay"), suppress(KeyboardInterrupt):
        for item in issue_on_change(watch, once):
            given.append(item.index.name)  # noqa: PERF401 - what was given before Ctrl-C counts
    assert looks.states == []
    assert rounds == []
    return given, [record.getMessage() for record in caplog.records]


def fails(error: Exception) -> Callable[[], Issued]:
    def raising() -> Issued:
        raise error

    return raising


@pytest.mark.parametrize(
    "error",
    [PROBLEMS, SheetError("lamp.html: no such field"), UseError("a name stays"), OSError("full")],
)
def test_a_failure_after_a_change_is_told_whole_and_watching_goes_on(
    error: Exception, caplog: pytest.LogCaptureFixture
) -> None:
    looks = Looks(A, B, B, C, C, C)
    outcomes = [lambda: issued(1), fails(error), lambda: issued(3)]
    given, said = told(looks, outcomes, caplog)
    assert given == ["index-1.html", "index-3.html"]
    waiting = "watching for changes; Ctrl-C ends it"
    assert said == [
        waiting,
        "changed: a.csv",
        str(error),
        "nothing was issued; watching goes on, Ctrl-C ends it",
        "changed: a.csv",
        waiting,
    ]


def test_data_may_be_wrong_from_the_beginning(caplog: pytest.LogCaptureFixture) -> None:
    given, said = told(Looks(A, B, B, B), [fails(PROBLEMS), lambda: issued(2)], caplog)
    assert given == ["index-2.html"]
    assert said[0] == str(PROBLEMS)
    assert "units.csv, row 2" in said[0]
    assert "notes/x.md" in said[0]


@pytest.mark.parametrize("error", [UseError("not issued by lampassay"), OSError("read-only")])
def test_what_no_change_of_the_data_can_cure_ends_the_first_round(error: Exception) -> None:
    looks = Looks(A)
    with pytest.raises(type(error), match=str(error)):
        next(issue_on_change(FolderWatch(looks.look, looks.sleep), fails(error)))


@pytest.mark.parametrize("error", [UseError("a.csv changed"), FileNotFoundError("a.csv")])
def test_a_file_changed_under_the_first_issue_leads_to_another(
    error: Exception, caplog: pytest.LogCaptureFixture
) -> None:
    looks = Looks(A, B, B, B)

    def disturbed() -> Issued:
        looks.states[:] = [B, B, B, B]
        raise error

    given, said = told(looks, [disturbed, lambda: issued(2)], caplog)
    assert given == ["index-2.html"]
    assert str(error) in said


def test_many_changes_are_told_shortly(caplog: pytest.LogCaptureFixture) -> None:
    many = {f"spectra/{number:03}.csv": (1, 1) for number in range(160)}
    looks = Looks({}, many, many, many)
    _, said = told(looks, [lambda: issued(1), lambda: issued(2)], caplog)
    assert said[1] == "new: spectra/000.csv"
    assert said[-2] == "and 140 more files"
    assert len(said) == 1 + 20 + 2


def test_a_file_name_cannot_write_on_the_terminal(caplog: pytest.LogCaptureFixture) -> None:
    looks = Looks({}, {"\x1b[2J.csv": (1, 1)}, {"\x1b[2J.csv": (1, 1)}, {})
    _, said = told(looks, [lambda: issued(1), lambda: issued(2)], caplog)
    assert said[1] == r"'new: \x1b[2J.csv'"
