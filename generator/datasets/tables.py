"""Shipped reference tables: one CSV file per table and edition, parsed once."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

__all__ = ["FOLDER", "HEAD_KEYS", "ReferenceTable", "reference_table", "table_names"]

Array = NDArray[np.float64]

FOLDER = Path(__file__).resolve().parent
"""Folder of the shipped tables."""

HEAD_KEYS = ("source", "edition", "licence", "interval", "retrieved on")
"""Keys of the comment head, in order."""


@dataclass(frozen=True, slots=True, eq=False)
class ReferenceTable:
    """One shipped table.

    Parameters
    ----------
    name
        File name without its ending: table, then edition.
    head
        Comment head, one entry per key of :data:`HEAD_KEYS`.
    columns
        Column headings.
    values
        Numbers, read-only (rows, columns).
    """

    name: str
    head: dict[str, str]
    columns: tuple[str, ...]
    values: Array

    def column(self, heading: str) -> Array:
        """One column (rows,) by its heading."""
        return self.values[:, self.columns.index(heading)]


@cache
def reference_table(name: str) -> ReferenceTable:
    """Load a shipped table; the second call gives the same object.

    Parameters
    ----------
    name
        File name without its ending, for instance ``colour_matching_2_degree_1931``.

    Returns
    -------
    ReferenceTable
        The table with its comment head.

    Raises
    ------
    FileNotFoundError
        If no table has that name.
    """
    lines = (FOLDER / f"{name}.csv").read_text(encoding="utf-8").splitlines()
    size = len(HEAD_KEYS)
    head = dict(line.removeprefix("# ").split(": ", 1) for line in lines[:size])
    columns = tuple(lines[size].split(","))
    numbers = np.array(",".join(lines[size + 1 :]).split(","), dtype=np.float64)
    values = numbers.reshape(-1, len(columns))
    values.setflags(write=False)
    return ReferenceTable(name, head, columns, values)


@cache
def table_names() -> tuple[str, ...]:
    """Names of all shipped tables, sorted."""
    return tuple(sorted(path.stem for path in FOLDER.glob("*.csv")))
