"""Issuing again whenever a file of the campaign changes, until somebody ends it.

The folder is looked at, time and size of every file, rather than notices asked of the operating
system: one look at 160 files takes under a millisecond, works the same on every system and on
network drives, and misses nothing that is changed while the sheets are being written.
"""

from __future__ import annotations

import logging
import stat
import time
from collections.abc import Callable, Iterable, Iterator, Mapping
from fnmatch import fnmatchcase
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from generator.errors import LampassayError

if TYPE_CHECKING:
    from generator.pipeline.issuing import Issued

__all__ = [
    "BETWEEN_LOOKS_S",
    "QUIET_S",
    "FolderState",
    "FolderWatch",
    "campaign_watch",
    "differences",
    "folder_state",
    "issue_on_change",
]

_log = logging.getLogger("lampassay")

BETWEEN_LOOKS_S = 0.5
"""Time between two looks at a folder in which nothing happens."""

QUIET_S = 0.3
"""How long nothing may change before a change counts as complete."""

_MOST_LINES = 20
_TEMPORARY = ("*~", "~$*", "#*#", "*.tmp", "*.swp", "*.swx", "*.part", "*___jb_*___", "4913")
"""Names under which editors and spreadsheets keep what is not saved yet; many more are hidden."""

FolderState = Mapping[str, tuple[int, int]]
"""Path inside the folder, with ``/`` -> time of the last change [ns] and size [byte]."""


def folder_state(folder: Path, leave_out: Iterable[Path] = ()) -> FolderState:
    """Look at every file of a folder, hidden ones and editors' temporary files left out.

    Parameters
    ----------
    folder
        The folder. Where it is gone, it has no files. Links are not followed, so that nothing
        outside counts and no circle arises.
    leave_out
        Files and folders inside it that do not count, in whatever case they are written.
    """
    root = folder.resolve()
    unwanted = {str(path.resolve()).casefold() for path in leave_out}
    return dict(_looked_at(root, "", unwanted))


def _looked_at(
    folder: Path, inside: str, unwanted: set[str]
) -> Iterator[tuple[str, tuple[int, int]]]:
    try:
        entries = list(folder.iterdir())
    except OSError:  # gone since it was listed, or closed to us: intake will say so
        return
    for path in entries:
        name = path.name
        if _passing(name) or str(path).casefold() in unwanted:
            continue
        try:
            found = path.lstat()
        except OSError:  # gone since it was listed
            continue
        if stat.S_ISDIR(found.st_mode):
            yield from _looked_at(path, f"{inside}{name}/", unwanted)
        else:
            yield f"{inside}{name}", (found.st_mtime_ns, found.st_size)


def _passing(name: str) -> bool:
    return name.startswith(".") or any(fnmatchcase(name, pattern) for pattern in _TEMPORARY)


def differences(before: FolderState, after: FolderState) -> tuple[str, ...]:
    """Name what differs between two looks, one line a file: new, changed or gone."""
    words = {
        name: "gone" if name not in after else "changed" if name in before else "new"
        for name in sorted({*before, *after})
        if before.get(name) != after.get(name)
    }
    return tuple(f"{word}: {name}" for name, word in words.items())


class FolderWatch:
    """A folder as it was when it was last found complete, and what became of it since.

    Parameters
    ----------
    look
        Gives the state of the folder; looked at once to begin with.
    sleep
        Waits a number of seconds.
    """

    def __init__(
        self, look: Callable[[], FolderState], sleep: Callable[[float], None] = time.sleep
    ) -> None:
        self._look = look
        self._sleep = sleep
        self._known = look()

    def has_changed(self) -> bool:
        """Whether the folder differs from what was last given out."""
        return self._look() != self._known

    def changes(self) -> Iterator[tuple[str, ...]]:
        """Give nothing at once, for the beginning; then what changed, each time all is quiet."""
        yield ()
        while True:
            self._sleep(BETWEEN_LOOKS_S)
            if not self.has_changed():
                continue
            settled = self._settled()
            lines = differences(self._known, settled)
            self._known = settled
            if lines:
                yield lines

    def _settled(self) -> FolderState:
        before = self._look()
        while True:
            self._sleep(QUIET_S)
            after = self._look()
            if after == before:
                return after
            before = after


def issue_on_change(watch: FolderWatch, once: Callable[[], Issued]) -> Iterator[Issued]:
    """Issue once, and again after every change; say what changed and what is wrong.

    Parameters
    ----------
    watch
        The campaign folder.
    once
        Issues the campaign.

    Yields
    ------
    Issued
        Every issue that was written. A campaign with problems gives none: they are logged as
        they stand, the former issue stays, and the next change is waited for.

    Raises
    ------
    LampassayError, OSError
        If the first issue fails for another reason than the data, and not because a file
        changed meanwhile: waiting for the campaign to change would not cure that.
    """
    for number, lines in enumerate(watch.changes()):
        _say(lines)
        try:
            issued = once()
        except (LampassayError, OSError) as failure:
            if number == 0 and not _of_data(failure) and not watch.has_changed():
                raise
            _log.error("%s", failure)
            _log.info("nothing was issued; watching goes on, Ctrl-C ends it")
        else:
            yield issued
            _log.info("watching for changes; Ctrl-C ends it")


def _say(lines: tuple[str, ...]) -> None:
    for line in lines[:_MOST_LINES]:
        _log.info("%s", line if line.isprintable() else ascii(line))
    if len(lines) > _MOST_LINES:
        _log.info("and %d more files", len(lines) - _MOST_LINES)


def _of_data(failure: Exception) -> bool:
    return isinstance(failure, LampassayError) and failure.exit_status == 1


def campaign_watch(
    campaign: Path, target: Path | None, archive: Path | None, *, public: bool
) -> FolderWatch:
    """Watch a campaign folder, leaving out what an issue of it writes, wherever that lies.

    Parameters
    ----------
    campaign, target, archive, public
        As for :func:`generator.pipeline.issue`.
    """
    from generator.publish import public_place

    place = target or Path("output") / campaign.resolve().name
    written = [place]
    if public:
        written.append(public_place(place))
    if archive is not None:
        written.append(archive)
    return FolderWatch(partial(folder_state, campaign, written))
