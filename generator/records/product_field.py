"""Product information as the energy label act asks for it: one field, one text, one warning."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal

__all__ = ["ProductField"]


@dataclass(frozen=True, slots=True)
class ProductField:
    """One field of the product information of one lamp.

    Parameters
    ----------
    lamp_id
        The lamp.
    name
        Name of the field in words, for instance ``colour rendering index``.
    text
        The value as it is to be published, rounded as the act asks; empty where there is none.
    unit
        Unit as printed; empty for text and dimensionless values.
    rounding
        The rounding in words, or empty.
    declared
        The declared value before rounding, or ``None``.
    reason
        Why there is no text; empty otherwise.
    warning
        What is wrong with publishing the text, for instance that rounding makes the value
        better than the declared one; empty otherwise.
    """

    lamp_id: str
    name: str
    text: str
    unit: str = ""
    rounding: str = ""
    declared: Decimal | str | None = None
    reason: str = ""
    warning: str = ""
