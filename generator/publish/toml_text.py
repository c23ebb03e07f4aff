"""Writing the tables of a ``campaign.toml``: what is left of it in an edition, as TOML 1.0."""

from __future__ import annotations

import json
import re
from collections.abc import Iterator, Mapping
from datetime import date
from decimal import Decimal
from typing import Any

__all__ = ["toml_text"]

_BARE = re.compile(r"[A-Za-z0-9_-]+")


def toml_text(tables: Mapping[str, Any]) -> str:
    """Write tables as TOML.

    Parameters
    ----------
    tables
        As ``tomllib`` gives them, numbers with a point as :class:`~decimal.Decimal`.

    Returns
    -------
    str
        TOML that reads back to the same tables: plain keys first, then a section per table.
    """
    lines = [f"{_key(name)} = {_value(item)}" for name, item in tables.items() if _plain(item)]
    for name, item in tables.items():
        if not _plain(item):
            lines += _sections(name, item)
    return "\n".join(lines).lstrip("\n") + "\n"


def _plain(item: Any) -> bool:
    if isinstance(item, list):
        return not item or not all(isinstance(entry, Mapping) for entry in item)
    return not isinstance(item, Mapping)


def _sections(name: str, item: Any) -> Iterator[str]:
    heading = f"[{_key(name)}]" if isinstance(item, Mapping) else f"[[{_key(name)}]]"
    for table in [item] if isinstance(item, Mapping) else item:
        yield ""
        yield heading
        yield from (f"{_key(key)} = {_value(entry)}" for key, entry in table.items())


def _key(name: str) -> str:
    return name if _BARE.fullmatch(name) else _quoted(name)


def _quoted(text: str) -> str:
    """A basic string; JSON's escapes are all TOML's, but for the delete character."""
    return json.dumps(text, ensure_ascii=False).replace("\x7f", "\\u007F")


def _value(item: Any) -> str:
    if isinstance(item, bool):
        return "true" if item else "false"
    if isinstance(item, str):
        return _quoted(item)
    if isinstance(item, Decimal):
        text = str(item)
        return text if re.search(r"[.eE]", text) else f"{text}.0"
    if isinstance(item, Mapping):
        inner = ", ".join(f"{_key(key)} = {_value(entry)}" for key, entry in item.items())
        return f"{{ {inner} }}" if inner else "{}"
    if isinstance(item, list):
        return "[" + ", ".join(_value(entry) for entry in item) + "]"
    return item.isoformat() if isinstance(item, date) else str(item)
