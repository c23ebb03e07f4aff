"""Collecting everything that is wrong with a file, instead of stopping at the first mistake."""

from __future__ import annotations

import difflib
from collections.abc import Iterable

from generator.errors import Level, Problem
from generator.language import say_counted

__all__ = ["MOST_PROBLEMS", "ProblemList", "nearest", "shown"]

MOST_PROBLEMS = 1000
"""Problems named one by one in a file; a file with more is wrong throughout."""

_LONGEST = 80


def shown(text: str) -> str:
    """Make text from a file fit for a one-line message: control characters escaped, long cut.

    Parameters
    ----------
    text
        What stood in the file.

    Returns
    -------
    str
        One printable line of limited length.
    """
    line = _printable(text)
    return line if len(line) <= _LONGEST else line[: _LONGEST - 1] + "…"


def _printable(text: str) -> str:
    if text.isprintable():
        return text
    return "".join(c if c.isprintable() else ascii(c)[1:-1] for c in text)


def nearest(name: str, options: Iterable[str], cutoff: float = 0.6) -> str | None:
    """Give the option that a mistyped name was most likely meant to be.

    Parameters
    ----------
    name
        What was written.
    options
        What could have been meant.
    cutoff
        Likeness below which nothing is suggested, 0 to 1.

    Returns
    -------
    str or None
        The nearest option, or ``None`` where none is near enough.
    """
    lowered = {option.casefold(): option for option in options}
    near = difflib.get_close_matches(name.casefold(), lowered, n=1, cutoff=cutoff)
    return lowered[near[0]] if near else None


class ProblemList:
    """The problems of one file, in the order they are met.

    Parameters
    ----------
    file
        Path of the file inside the campaign folder.
    """

    def __init__(self, file: str) -> None:
        self.file = file
        self._problems: list[Problem] = []
        self._left_out: list[Level] = []
        self._errors = 0

    def error(
        self,
        message: str,
        *,
        row: int | None = None,
        column: str | None = None,
        found: str = "",
        expected: str = "",
    ) -> None:
        """Note something that stops the issue."""
        self._errors += 1
        self._note("error", message, row, column, shown(found), expected)

    def warning(
        self,
        message: str,
        *,
        row: int | None = None,
        column: str | None = None,
        found: str = "",
        expected: str = "",
        whole: bool = False,
    ) -> None:
        """Note something that is named on the sheet but does not stop the issue.

        Parameters
        ----------
        message, row, column, found, expected
            As :class:`generator.errors.Problem` has them.
        whole
            Whether what was found is a list made by the program, which is not cut.
        """
        self._note("warning", message, row, column, found if whole else shown(found), expected)

    def _note(
        self,
        level: Level,
        message: str,
        row: int | None,
        column: str | None,
        found: str,
        expected: str,
    ) -> None:
        if len(self._problems) >= MOST_PROBLEMS:
            self._left_out.append(level)
            return
        place = None if column is None else shown(column)
        text = _printable(message)
        self._problems.append(
            Problem(level, self.file, row, place, _printable(found), _printable(expected), text)
        )

    @property
    def errors(self) -> int:
        """How many errors were noted so far."""
        return self._errors

    @property
    def problems(self) -> tuple[Problem, ...]:
        """All problems; where there were too many to name, a last one says how many more."""
        if not self._left_out:
            return tuple(self._problems)
        level: Level = "error" if "error" in self._left_out else "warning"
        count = len(self._left_out)
        text = say_counted(
            "{count} more problem in this file.", "{count} more problems in this file.", count
        )
        rest = Problem(level, self.file, None, None, "", "", text)
        return (*self._problems, rest)
