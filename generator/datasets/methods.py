"""How each method gets its figures, in words, by the method id printed beside a figure."""

from __future__ import annotations

import tomllib
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType
from typing import TYPE_CHECKING, Any

from generator.datasets.tables import FOLDER
from generator.language import Message

if TYPE_CHECKING:
    from collections.abc import Mapping

__all__ = ["TRANSLATED_KEYS", "Method", "method", "methods"]

TRANSLATED_KEYS = frozenset({"title", "formula", "clause"})
"""Keys of ``methods.toml`` whose texts are printed; they are messages."""


@dataclass(frozen=True, slots=True)
class Method:
    """One method.

    Parameters
    ----------
    title
        What it gives, and by which edition.
    formula
        The formula in words.
    source
        Key of the document.
    clause
        Clause, equation or table.
    inputs
        Catalogue quantities the method starts from; empty where it starts from raw data.
    """

    title: str
    formula: str
    source: str
    clause: str
    inputs: tuple[str, ...] = ()


@cache
def methods() -> Mapping[str, Method]:
    """All methods by id, in the order of ``methods.toml``; a key may end in ``*``.

    Returns
    -------
    Mapping
        Method id, or its beginning and ``*`` -> method.

    Raises
    ------
    TypeError
        If an entry of the file has a key that :class:`Method` does not know.
    """
    entries = tomllib.loads((FOLDER / "methods.toml").read_text(encoding="utf-8"))
    return MappingProxyType({key: _method(entry) for key, entry in entries.items()})


def _method(entry: Mapping[str, Any]) -> Method:
    texts = {key: Message(entry[key]) for key in TRANSLATED_KEYS & entry.keys()}
    return Method(**{**entry, **texts, "inputs": tuple(entry.get("inputs", ()))})


def method(method_id: str) -> Method | None:
    """The method of an id: the entry of that name, else the longest beginning that fits.

    Parameters
    ----------
    method_id
        Id as a figure carries it.

    Returns
    -------
    Method or None
        The method; ``None`` where none is described.
    """
    known = methods()
    if method_id in known:
        return known[method_id]
    fitting = [key for key in known if key.endswith("*") and method_id.startswith(key[:-1])]
    return known[max(fitting, key=len)] if fitting else None
