"""``lampassay issue --watch`` as it is typed: issued, changed, broken, mended, ended."""

from __future__ import annotations

import queue
import signal
import subprocess
import sys
import threading
import zipfile
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import IO

import pytest

PATIENCE_S = 120.0
"""Far more than a slow machine needs; nothing here waits for it when all is well."""
WAITING = "watching for changes; Ctrl-C ends it"
STOPPED = "nothing was issued; watching goes on, Ctrl-C ends it"


def run(*words: str | Path) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "generator", *map(str, words)],
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
    )


class Watching:
    """The command as a child process, and what it says, line by line from both streams."""

    def __init__(self, process: subprocess.Popen[str]) -> None:
        self.process = process
        self.results: queue.Queue[str | None] = queue.Queue()
        self.messages: queue.Queue[str | None] = queue.Queue()
        self._readers = [
            self._reader(process.stdout, self.results),
            self._reader(process.stderr, self.messages),
        ]

    @staticmethod
    def _reader(source: IO[str] | None, lines: queue.Queue[str | None]) -> threading.Thread:
        assert source is not None

        def read() -> None:
            for line in source:
                lines.put(line.rstrip("\n"))
            lines.put(None)

        thread = threading.Thread(target=read, daemon=True)
        thread.start()
        return thread

    def until(self, wanted: str) -> list[str]:
        """What is said on standard error up to and with a line."""
        said: list[str] = []
        while wanted not in said:
            line = self.messages.get(timeout=PATIENCE_S)
            assert line is not None, f"ended before {wanted!r}: {said}"
            said.append(line)
        return said

    def result(self) -> str | None:
        """The next line of standard output."""
        return self.results.get(timeout=PATIENCE_S)

    def end(self) -> tuple[int, list[str]]:
        """Press Ctrl-C: exit status, and every line not read yet."""
        self.process.send_signal(signal.SIGINT)
        status = self.process.wait(timeout=PATIENCE_S)
        for reader in self._readers:
            reader.join(timeout=PATIENCE_S)
        rest = [*self.results.queue, *self.messages.queue]
        return status, [line for line in rest if line is not None]


@contextmanager
def watching(*words: str | Path, cwd: Path) -> Iterator[Watching]:
    # Tests that run in the background may ignore Ctrl-C, and a child would inherit that.
    before = signal.signal(signal.SIGINT, signal.default_int_handler)
    try:
        process = subprocess.Popen(
            [sys.executable, "-m", "generator", "issue", "--watch", "--no-pdf", *map(str, words)],
            stdout=subprocess.PIPE,
            stderr=subprocess.PIPE,
            text=True,
            encoding="utf-8",
            cwd=cwd,
        )
    finally:
        signal.signal(signal.SIGINT, before)
    with process:
        try:
            yield Watching(process)
        finally:
            process.kill()


def replace(path: Path, old: str, new: str) -> None:
    text = path.read_text(encoding="utf-8")
    assert old in text
    path.write_text(text.replace(old, new), encoding="utf-8")


def test_issued_changed_broken_mended_and_ended(small_campaign: Path, tmp_path: Path) -> None:
    out = tmp_path / "out"
    index = str(out / "index.html")
    note = small_campaign / "notes" / "one.md"
    with watching(small_campaign, "--to", out, cwd=tmp_path) as watch:
        said = watch.until(WAITING)
        assert watch.result() == index
        assert [line for line in said if line.startswith(("new", "changed", "gone"))] == []

        note.write_text("Seen *hanging upside down*.\n", encoding="utf-8")
        said = watch.until(WAITING)
        assert said[0] == "changed: notes/one.md"
        assert watch.result() == index
        page = (out / "lamps" / "one.html").read_text(encoding="utf-8")
        assert "hanging upside down" in page

        replace(small_campaign / "lamps.csv", ",8.8,", ",8.8 W,")
        replace(small_campaign / "units.csv", "one-2,one,802", "one-2,one,many")
        said = watch.until(STOPPED)
        problems = run("check", small_campaign).stdout.splitlines()
        assert len(problems) >= 2
        assert [line for line in said if line in problems] == problems
        assert (out / "lamps" / "one.html").read_text(encoding="utf-8") == page

        replace(small_campaign / "lamps.csv", ",8.8 W,", ",8.7,")
        replace(small_campaign / "units.csv", "one-2,one,many", "one-2,one,802")
        said = watch.until(WAITING)
        assert {"changed: lamps.csv", "changed: units.csv"} & set(said)
        assert watch.result() == index
        assert "8.7" in (out / "data" / "figures.csv").read_text(encoding="utf-8")

        assert watch.end() == (0, [])


def test_what_it_writes_into_the_campaign_does_not_start_it_again(small_campaign: Path) -> None:
    words = (".", "--public", "--archive", "filed.zip")
    with watching(*words, cwd=small_campaign) as watch:
        watch.until(WAITING)
        assert watch.result() == str(Path("output") / "reading-room" / "index.html")
        names = small_campaign / "output" / "reading-room" / "data" / "redaction.json"
        code_names = names.read_bytes()

        (small_campaign / "notes" / "two.md").write_text("Seen *dark*.\n", encoding="utf-8")
        said = watch.until(WAITING)
        # The first thing said is the change made here: the issue before it went unnoticed.
        assert said[0] == "new: notes/two.md"
        assert [line for line in said if line.startswith(("new:", "changed:", "gone:"))] == said[:1]
        assert names.read_bytes() == code_names
        public = small_campaign / "output" / "reading-room-public" / "index.html"
        assert public.is_file()
        with zipfile.ZipFile(small_campaign / "filed.zip") as archive:
            assert "reading-room/inputs/notes/two.md" in archive.namelist()
        assert watch.result() is not None
        assert watch.end() == (0, [])


def test_broken_data_are_waited_for_from_the_beginning(
    small_campaign: Path, tmp_path: Path
) -> None:
    aside = tmp_path / "lamps.csv"
    (small_campaign / "lamps.csv").replace(aside)
    with watching(small_campaign, cwd=tmp_path) as watch:
        said = watch.until(STOPPED)
        assert any("lamps.csv is missing" in line for line in said)
        aside.replace(small_campaign / "lamps.csv")
        assert watch.until(WAITING)[0] == "new: lamps.csv"
        assert watch.end()[0] == 0


def test_wrong_use_ends_at_once_as_without_it(small_campaign: Path, tmp_path: Path) -> None:
    (tmp_path / "mine").mkdir()
    (tmp_path / "mine" / "thesis.txt").write_text("x", encoding="utf-8")
    with watching(small_campaign, "--to", tmp_path / "mine", cwd=tmp_path) as watch:
        assert watch.process.wait(timeout=PATIENCE_S) == 2
        line = watch.messages.get(timeout=PATIENCE_S)
        assert line is not None
        assert "not issued by lampassay" in line


@pytest.mark.parametrize(
    ("option", "reason"),
    [
        ("--sign", "--sign does not go with --watch"),
        ("--salt", "--salt belongs to --public"),
    ],
)
def test_what_makes_no_sense_with_it_is_refused(
    small_campaign: Path, tmp_path: Path, option: str, reason: str
) -> None:
    file = tmp_path / "file"
    file.write_bytes(b"")
    result = run("issue", small_campaign, "--watch", option, file, "--to", tmp_path / "out")
    assert result.returncode == 2
    assert reason in result.stderr
    assert not (tmp_path / "out").exists()
