"""House errors: what can go wrong, in words that name the place and the cure."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import ClassVar, Literal

from generator.language import joined, say

__all__ = ["DataProblems", "LampassayError", "LawBookError", "Problem", "SheetError", "UseError"]

Level = Literal["error", "warning"]


@dataclass(frozen=True, slots=True)
class Problem:
    """One thing wrong with the data, with the place where it stands.

    Parameters
    ----------
    level
        ``error``: nothing can be issued; ``warning``: issued with a gap that is named.
    file
        Path relative to the campaign folder.
    row
        Line of the file, the heading being row 1; ``None`` where no row applies.
    column
        Column heading, or dotted key of a TOML file; ``None`` where none applies.
    found, expected
        What stood there, and what would have been right.
    message
        One sentence for people.
    """

    level: Level
    file: str
    row: int | None
    column: str | None
    found: str
    expected: str
    message: str

    @property
    def place(self) -> str:
        """File, row and column in one phrase."""
        parts = [self.file]
        if self.row is not None:
            parts.append(say("row {row}", row=self.row))
        if self.column is not None:
            named = self.column
            if self.row is not None:
                named = say("column {column}", column=self.column)
            parts.append(named)
        return joined(", ", parts)

    def __str__(self) -> str:
        text = f"{self.level}: {self.place}: {self.message}"
        if self.found:
            text += f" Found: {self.found}."
        if self.expected:
            text += f" Expected: {self.expected}."
        return text


class LampassayError(Exception):
    """Anything the program refuses to do; its text is fit to be shown."""

    exit_status: ClassVar[int] = 1
    """What the command exits with: 1 where the data are at fault, 2 where its use is."""


class UseError(LampassayError):
    """The program was asked for something that it cannot mean; says what there is."""

    exit_status = 2


class DataProblems(LampassayError):  # noqa: N818 - it carries problems, and says so
    """The data cannot be used; carries every problem found, not just the first.

    Parameters
    ----------
    problems
        All problems, errors and warnings, in the order of the files.
    """

    def __init__(self, problems: Iterable[Problem]) -> None:
        self.problems = tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))


class LawBookError(LampassayError):
    """A leaf of the law book is not as it must be; names file and key."""


class SheetError(LampassayError):
    """A sheet could not be rendered; names the sheet and the reason."""
