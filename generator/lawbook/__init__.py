"""The law book: dated clauses as TOML leaves, one file per clause, and the loader.

Folders follow the regimes: ``<area>/<act>/<name>.toml``. A leaf is one of four kinds: a clause
(a limit), a verification (determined value against the declaration), a constant (numbers of
a formula that is law), or an exemption. The end of a value's validity is written with
``until``; nothing is deleted.
"""

from __future__ import annotations

import hashlib
import tomllib
from collections.abc import Iterable, Mapping
from decimal import Decimal
from functools import cache
from importlib.resources import files
from importlib.resources.abc import Traversable
from types import MappingProxyType
from typing import Any

from generator.errors import LawBookError
from generator.lawbook.asked import asked_problems, claim_problems
from generator.lawbook.buyer import buyer_clauses
from generator.records.clause import Clause, Constant, Exemption, LawBook

__all__ = ["asked_problems", "buyer_clauses", "claim_problems", "law_book_of", "read_law_book"]


@cache
def read_law_book() -> LawBook:
    """Read the law book that is shipped with the program; read once.

    Returns
    -------
    LawBook
        Every leaf, checked.

    Raises
    ------
    LawBookError
        If a leaf is not as it must be; names file and key.
    """
    return law_book_of(_leaf_texts(files(__name__), ""))


def law_book_of(texts: Iterable[tuple[str, str]]) -> LawBook:
    """Make a law book of the texts of its leaves.

    Parameters
    ----------
    texts
        Path inside the law book and TOML text, in any order.

    Returns
    -------
    LawBook
        Every leaf, checked, in the order of the paths.

    Raises
    ------
    LawBookError
        If a leaf is not as it must be; names file and key.
    """
    ordered = sorted(texts)
    records = [_record(path, text) for path, text in ordered]
    book = LawBook(
        version=_digest(ordered),
        leaves=tuple(item for item in records if isinstance(item, Clause)),
        constants=MappingProxyType(
            {item.id: item for item in records if isinstance(item, Constant)}
        ),
        exemptions=tuple(item for item in records if isinstance(item, Exemption)),
    )
    _check_ids(records)
    _check_references(book)
    return book


def _leaf_texts(folder: Traversable, above: str) -> Iterable[tuple[str, str]]:
    for entry in folder.iterdir():
        path = f"{above}{entry.name}"
        if entry.is_dir():
            yield from _leaf_texts(entry, f"{path}/")
        elif entry.name.endswith(".toml"):
            yield path, entry.read_text(encoding="utf-8")


def _digest(texts: Iterable[tuple[str, str]]) -> str:
    digest = hashlib.sha256()
    for path, text in texts:
        unix = text.replace("\r\n", "\n")
        digest.update(f"{path}\0{unix}\0".encode())
    return digest.hexdigest()


def _parsed(path: str, text: str) -> Mapping[str, Any]:
    try:
        return tomllib.loads(text, parse_float=Decimal)
    except tomllib.TOMLDecodeError as error:
        raise LawBookError(f"lawbook/{path}: not TOML: {error}") from None


def _record(path: str, text: str) -> Clause | Constant | Exemption:
    from pydantic import ValidationError

    from generator.lawbook.leaf import first_problems, leaf_of

    try:
        return leaf_of(_parsed(path, text)).record(path)
    except ValidationError as error:
        lines = []
        for key, message, found in first_problems(error):
            shown = f" (found {found})" if found else ""
            lines.append(f"lawbook/{path}: {key or 'the leaf'}: {message}{shown}")
        raise LawBookError("\n".join(lines)) from None
    except ValueError as error:
        raise LawBookError(f"lawbook/{path}: {error}") from None


def _check_ids(records: Iterable[Clause | Constant | Exemption]) -> None:
    seen: dict[str, str] = {}
    for item in records:
        if item.id in seen:
            raise LawBookError(f"lawbook/{item.file}: id: {item.id!r} also in {seen[item.id]}")
        seen[item.id] = item.file


def _check_references(book: LawBook) -> None:
    ids = {clause.id for clause in book}
    for clause in book:
        for role, constant in clause.constants.items():
            if constant not in book.constants:
                raise LawBookError(
                    f"lawbook/{clause.file}: constants.{role}: no leaf has the id {constant!r}"
                )
        if clause.scope and clause.scope not in ids:
            raise LawBookError(
                f"lawbook/{clause.file}: scope: no clause has the id {clause.scope!r}"
            )
    for exemption in book.exemptions:
        for lifted in exemption.lifts:
            if lifted not in ids:
                raise LawBookError(
                    f"lawbook/{exemption.file}: lifts: no clause has the id {lifted!r}"
                )
