"""Characters that the typeface of the sheets lacks, named where they stand in the campaign."""

from __future__ import annotations

import html
import unicodedata
from collections.abc import Callable, Iterator, Sequence

from generator.intake.tables.problem_list import ProblemList
from generator.language import say, say_counted

__all__ = ["UncoveredCharacters", "note_remarks", "note_uncovered", "texts_in"]

UncoveredCharacters = Callable[[str], Sequence[str]]
"""Gives the characters of a text that the sheets cannot print, each once, in order."""

_Path = tuple[str | int, ...]

_MOST_NAMED = 20
_MOST_LINES = 5  # the warnings of a note stand on its sheet, which has little room
_COVERED = "characters of the bundled typeface, which has Latin, Greek and Cyrillic letters"


def note_uncovered(
    text: str,
    uncovered: UncoveredCharacters,
    problems: ProblemList,
    *,
    row: int | None,
    column: str | None = None,
    further: int = 0,
) -> None:
    """Warn of the characters of one text that paper shows by their codes.

    Parameters
    ----------
    text
        A cell, a setting, or a line of a note.
    uncovered
        Gives the characters that the sheets cannot print.
    problems
        Where to note them, all in one warning.
    row, column
        Where the text stands.
    further
        How many lines the text goes on beyond its row.
    """
    missing = uncovered(text)
    if not missing:
        return
    named = [_named(char) for char in missing[:_MOST_NAMED]]
    if len(missing) > _MOST_NAMED:
        named.append(f"and {len(missing) - _MOST_NAMED} more")
    message = say("The typeface lacks characters of this text; paper shows their codes instead.")
    if further:
        message = say_counted(
            "The typeface lacks characters of this and {count} further line; paper shows their "
            "codes instead.",
            "The typeface lacks characters of this and {count} further lines; paper shows their "
            "codes instead.",
            further,
        )
    found = ", ".join(named)
    problems.warning(message, row=row, column=column, found=found, expected=_COVERED, whole=True)


def note_remarks(text: str, uncovered: UncoveredCharacters, problems: ProblemList) -> None:
    """Warn of the lines of a note that have characters which paper shows by their codes.

    Parameters
    ----------
    text
        Markdown.
    uncovered
        Gives the characters that the sheets cannot print.
    problems
        Where to note them: line by line, from the fifth on in one warning.
    """
    lines = [
        (row, said)
        for row, line in enumerate(text.split("\n"), start=1)
        if uncovered(said := html.unescape(line))
    ]
    alone = _MOST_LINES if len(lines) <= _MOST_LINES else _MOST_LINES - 1
    for row, said in lines[:alone]:
        note_uncovered(said, uncovered, problems, row=row)
    rest = lines[alone:]
    if rest:
        together = "".join(said for _, said in rest)
        note_uncovered(together, uncovered, problems, row=rest[0][0], further=len(rest) - 1)


def texts_in(value: object, path: _Path = ()) -> Iterator[tuple[_Path, str]]:
    """Give every text of parsed tables with its path of keys and positions.

    Parameters
    ----------
    value
        What a TOML file was parsed to, or a part of it.
    path
        Where that part stands.

    Yields
    ------
    tuple
        Path and text, in the order of the file.
    """
    if isinstance(value, str):
        yield path, value
    elif isinstance(value, dict):
        for key, part in value.items():
            yield from texts_in(part, (*path, key))
    elif isinstance(value, list):
        for place, part in enumerate(value):
            yield from texts_in(part, (*path, place))


def _named(char: str) -> str:
    """A character and its code; the code alone of what cannot stand by itself."""
    code = f"U+{ord(char):04X}"
    alone = char.isprintable() and not unicodedata.category(char).startswith(("M", "Z"))
    return f"{char} ({code})" if alone else code
