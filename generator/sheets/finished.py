"""The last step of a description: every message said in the language of the sheet."""

from __future__ import annotations

import dataclasses
import re
from typing import Any, TypeVar

from generator.language import told
from generator.sheets.number_format import grouped

__all__ = ["finished"]

Described = TypeVar("Described")

_NO_BREAK_SPACE = "\u00a0"
_BEFORE_UNIT = re.compile(r"(?<=\d) (?=(?:%|(?:k?Wh?|lm|lx|cd|nm|mA|Hz|kHz|mm|K|V|A|h|s)\b))")
"""The space between a number and its unit, where no line may end."""

_BEFORE_DEGREE = re.compile(r"(?<=\d)[ \u00a0](?=°(?!C))")
"""No space stands before the sign of the degree of angle. Source: the SI brochure, 5.4.3."""

_AS_THEY_ARE = frozenset({"bidders"})
"""Fields that the scripts compare with their data, letter by letter."""


def finished(described: Described) -> Described:
    """Say every message of a description, so that plain text is left.

    Parameters
    ----------
    described
        A description: dataclasses, tuples and text.

    Returns
    -------
    Described
        The same, in the language that is being spoken.
    """
    result: Described = _finished(described)
    return result


def _finished(value: Any) -> Any:
    if isinstance(value, str):
        said = told(value, grouped)
        # Drawings and data for the scripts are no running text: a space there may be syntax.
        if said[:1] in ("<", "{"):
            return said
        return _BEFORE_DEGREE.sub("", _BEFORE_UNIT.sub(_NO_BREAK_SPACE, said))
    if isinstance(value, tuple):
        return tuple(_finished(item) for item in value)
    if dataclasses.is_dataclass(value) and not isinstance(value, type):
        fields = {
            item.name: getattr(value, item.name)
            for item in dataclasses.fields(value)
            if item.name not in _AS_THEY_ARE
        }
        return dataclasses.replace(
            value, **{name: _finished(kept) for name, kept in fields.items()}
        )
    return value
