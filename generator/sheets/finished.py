"""The last step of a description: every message said in the language of the sheet."""

from __future__ import annotations

import dataclasses
from typing import Any, TypeVar

from generator.language import told

__all__ = ["finished"]

Described = TypeVar("Described")


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
        return told(value)
    if isinstance(value, tuple):
        return tuple(_finished(item) for item in value)
    if dataclasses.is_dataclass(value) and not isinstance(value, type):
        fields = {item.name: getattr(value, item.name) for item in dataclasses.fields(value)}
        return dataclasses.replace(
            value, **{name: _finished(kept) for name, kept in fields.items()}
        )
    return value
