"""What a setting should have been, in plain words, for every way in which a model refuses one."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from datetime import datetime
from types import MappingProxyType
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from pydantic_core import ErrorDetails

__all__ = ["FORM_WORDS", "alternatives", "as_written", "expected_words"]

FORM_WORDS = MappingProxyType(
    {
        "^[A-Z]{3}$": "a code such as EUR (ISO 4217)",
        "^[A-Za-z0-9][A-Za-z0-9_-]{0,63}$": "a letter or digit, then up to 63 letters, digits, "
        "_ or -",
        "^[A-Za-z0-9][A-Za-z0-9_.-]*$": "a letter or digit, then letters, digits, _, . or -",
        "^[a-z0-9][a-z0-9.-]*$": "a small letter or digit, then small letters, digits, . or -",
    }
)
"""Pattern of a text -> the same in words."""

_DAY = "a date such as 2025-03-31"
_TABLES = frozenset({"model_type", "dict_type"})
_LISTS = frozenset({"tuple_type", "list_type"})
_PLAIN = {
    "missing": "this key",
    "extra_forbidden": "no such key",
    "string_type": "text in quotation marks",
    "int_type": "a whole number",
    "int_parsing": "a whole number",
    "int_parsing_size": "a whole number",
    "int_from_float": "a whole number",
    "decimal_type": "a number",
    "decimal_parsing": "a number",
    "is_instance_of": "a number",
    "finite_number": "a finite number",
    "bool_type": "true or false",
    "bool_parsing": "true or false",
    "date_type": _DAY,
}
_BOUNDS = {
    "greater_than": ("gt", "a number above {}"),
    "greater_than_equal": ("ge", "a number of {} or more"),
    "less_than": ("lt", "a number below {}"),
    "less_than_equal": ("le", "a number of {} or less"),
}
_SIZES = {
    "string_too_short": ("min_length", "text that is not empty", "text of {} characters or more"),
    "string_too_long": ("max_length", "one character", "text of {} characters or less"),
    "too_short": ("min_length", "a list with one entry or more", "a list of {} entries or more"),
    "too_long": ("max_length", "a list of one entry", "a list of {} entries or less"),
}
_UNFORESEEN = "a value that this key can have"

_NUMBER = re.compile(r"[-+0-9.E]+")
_ISO_DAY = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}")


def expected_words(fault: ErrorDetails, key: str = "") -> str:
    """Say what would have been right in the place of a setting that a model refuses.

    Parameters
    ----------
    fault
        One entry of ``ValidationError.errors()``.
    key
        Dotted key of the setting, without positions; names the heading of a table.

    Returns
    -------
    str
        Words of this program, never those of the library that checks.
    """
    kind, found = fault["type"], fault.get("input")
    context: Mapping[str, Any] = fault.get("ctx", {})
    return (
        _PLAIN.get(kind)
        or _bounded(kind, context)
        or _by_the_model(kind, context)
        or _by_what_stands(kind, found, key)
        or _UNFORESEEN
    )


def alternatives(words: Iterable[str]) -> str:
    """Join what would each have been right, every one once.

    Parameters
    ----------
    words
        Expectations of one setting.
    """
    return ", or ".join(dict.fromkeys(words))


def as_written(value: object) -> str:
    """Write a value of a TOML file much as it stands there.

    Parameters
    ----------
    value
        What the file was parsed to; of a table only the keys are named.
    """
    if isinstance(value, bool):
        return str(value).lower()
    if isinstance(value, str):
        return f'"{value}"'
    if isinstance(value, Mapping):
        return "a table with " + (", ".join(map(str, value)) or "no keys")
    if isinstance(value, list | tuple):
        return "[" + ", ".join(as_written(item) for item in value) + "]"
    return str(value)


def _bounded(kind: str, context: Mapping[str, Any]) -> str:
    """Words for a number or a length beyond its bound; empty for any other fault."""
    if kind in _SIZES:
        name, one, many = _SIZES[kind]
        return one if context[name] == 1 else many.format(context[name])
    if kind not in _BOUNDS:
        return ""
    name, words = _BOUNDS[kind]
    limit = str(context[name]).removeprefix("Decimal")  # the library may give it as code
    number = _NUMBER.search(limit)
    return words.format(number[0] if number else limit)


def _by_the_model(kind: str, context: Mapping[str, Any]) -> str:
    """Words that stand in the model itself; empty for any other fault."""
    if kind == "literal_error" or "key" in context:
        return str(context["expected"])
    if kind == "value_error":
        return str(context["error"])
    return FORM_WORDS.get(context["pattern"], "") if kind == "string_pattern_mismatch" else ""


def _by_what_stands(kind: str, found: object, key: str) -> str:
    """Words that answer what was written instead; empty for any other fault."""
    if kind in _TABLES:
        several = isinstance(found, list | tuple) and key
        return f"one table, headed [{key}]" if several else "a table"
    if kind in _LISTS:
        words = "a list in square brackets"
        table = isinstance(found, Mapping) and key
        return f"{words}; tables of a list are headed [[{key}]]" if table else words
    return _day_words(found) if kind.startswith(("date_", "datetime_")) else ""


def _day_words(found: object) -> str:
    if isinstance(found, datetime):
        return f"{_DAY}, without a time of day"
    if isinstance(found, str) and _ISO_DAY.fullmatch(found):
        return "a day of the calendar, such as 2025-03-31"
    return _DAY
