"""The documents that tables, formulas and clauses rest on, by key."""

from __future__ import annotations

import tomllib
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType
from typing import TYPE_CHECKING

from generator.datasets.tables import FOLDER

if TYPE_CHECKING:
    from collections.abc import Mapping

__all__ = ["STATUSES", "Source", "sources"]

STATUSES = ("read", "read in part", "quoted", "not read", "own")
"""How well a document is known: its text read; some of it read; known through others that
quote it; not read; written by this project."""


@dataclass(frozen=True, slots=True)
class Source:
    """One document.

    Parameters
    ----------
    key
        Key used in docstrings, tables and clauses.
    title
        Number and title.
    edition
        Edition, amendment or consolidated version.
    publisher
        Who publishes it.
    date
        Year, month or day of publication as printed.
    status
        One of :data:`STATUSES`.
    note
        What else a reader must know; may be empty.
    """

    key: str
    title: str
    edition: str
    publisher: str
    date: str
    status: str
    note: str = ""


@cache
def sources() -> Mapping[str, Source]:
    """All documents by key, in the order of ``sources.toml``.

    Returns
    -------
    Mapping
        Key -> document.

    Raises
    ------
    TypeError
        If an entry of the file has a key that :class:`Source` does not know.
    """
    entries = tomllib.loads((FOLDER / "sources.toml").read_text(encoding="utf-8"))
    return MappingProxyType({key: Source(key=key, **entry) for key, entry in entries.items()})
