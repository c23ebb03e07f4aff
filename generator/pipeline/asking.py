"""Single questions: figures of one file, one trace, the law on a day, a new campaign folder."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING, Any

from generator.pipeline.assessing import assess

if TYPE_CHECKING:
    from generator.errors import Problem
    from generator.sheets.explanation import Explanation

__all__ = ["clauses", "explain", "measure", "start"]


def measure(files: Sequence[str | Path], *, absolute: bool = False) -> list[dict[str, Any]]:
    """Figures of single spectrum, light or mains files.

    Parameters
    ----------
    files
        CSV files; the heading tells which kind each is.
    absolute
        Whether spectra are spectral radiant flux in W/nm, so that fluxes can be given.

    Returns
    -------
    list of dict
        One per file: ``file``, ``kind`` and ``series``, each series with ``name``,
        ``figures``, ``reasons`` (why a figure is ``None``) and ``remarks``.

    Raises
    ------
    DataProblems
        If a file has errors; carries all of them, of all files.
    """
    from generator.errors import DataProblems
    from generator.intake import read_series
    from generator.metrics.single import named_figures, record_figures

    read = []
    problems: list[Problem] = []
    for file in files:
        try:
            read.append(read_series(Path(file), "W/nm" if absolute else "relative"))
        except DataProblems as error:
            problems += error.problems
    if problems:
        raise DataProblems(problems)
    return [
        {
            "file": str(file),
            "kind": item.kind,
            "series": named_figures(item.names, record_figures(item.record)),
        }
        for file, item in zip(files, read, strict=True)
    ]


def explain(campaign: str | Path, lamp_id: str, topic: str, on: date | None = None) -> Explanation:
    """How one figure or verdict came about.

    Parameters
    ----------
    campaign
        The campaign folder.
    lamp_id
        The lamp.
    topic
        Catalogue quantity, or id of a clause.
    on
        Date on which the law is read; the campaign's own by default, else today.

    Returns
    -------
    Explanation
        The way from the files to the figure or verdict.

    Raises
    ------
    DataProblems
        If the data have errors; carries all of them.
    UnknownTopic
        If there is no such lamp, quantity or clause.
    """
    from generator.datasets import method, sources
    from generator.sheets.explanation import explain as explained

    titles = {key: source.title for key, source in sources().items()}
    return explained(assess(campaign, on), lamp_id, topic, method, titles)


def clauses(on: date) -> list[dict[str, Any]]:
    """The law book as it stood on a date.

    Parameters
    ----------
    on
        The date.

    Returns
    -------
    list of dict
        One per clause in force, with its limit.

    Raises
    ------
    LawBookError
        If a leaf is not as it must be.
    """
    from generator.lawbook import read_law_book

    law = read_law_book()
    return [clause.summary(on, law.constants) for clause in law.on(on)]


def start(folder: str | Path) -> tuple[str, ...]:
    """Make a new campaign folder to fill in.

    Parameters
    ----------
    folder
        The folder; it must be absent or empty.

    Returns
    -------
    tuple of str
        Paths of the files made, inside the folder.

    Raises
    ------
    UseError
        If the folder holds anything already.
    """
    from generator.errors import UseError
    from generator.intake import new_campaign_files

    place = Path(folder)
    if place.exists() and (not place.is_dir() or any(place.iterdir())):
        raise UseError(f"{place} is not empty; name a folder that is not there yet")
    made = []
    for name, content in new_campaign_files().items():
        path = place / name
        (path if name.endswith("/") else path.parent).mkdir(parents=True, exist_ok=True)
        if not name.endswith("/"):
            path.write_bytes(content)
            made.append(name)
    return tuple(made)
