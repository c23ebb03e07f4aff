"""Numbers as text: digits follow the uncertainty, exact values stay exact, minus is a minus.

Rounding is for the eye alone and never moves a value to the other side of its limit: where it
would, more digits are shown. The decimal sign is that of the language that is being spoken; the
space between thousands is the same in all of them.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from datetime import date
from decimal import ROUND_CEILING, ROUND_HALF_UP, Decimal

from generator.language import numeral, say, told
from generator.language.speaking import date_in_words

__all__ = [
    "date_words",
    "decimals_for",
    "decimals_of",
    "declared_text",
    "exact_text",
    "grouped",
    "limits_in",
    "range_text",
    "readable",
    "rounded_up",
    "shown",
    "shown_margin",
    "telling_decimals",
]

_MOST_DECIMALS = 10
_LONGEST_DECLARED = 6
_DERIVED_DIGITS = 4
_LONG_NUMBER = re.compile(r"(?<![\w.\-/])[\u2212-]?\d+\.\d{4,}(?![\w.]*\w)")
_LONG_WHOLE = re.compile(r"[\u2212-]?\d{5,}(?:\.\d+)?")
_RANGE = re.compile(r"(-?\d+(?:\.\d+)?) to (-?\d+(?:\.\d+)?)")
_GROUPED_FROM = 5
_ONE_DIGIT_FROM = 3
_SPACE, _MINUS = "\u00a0", "\u2212"


def decimals_for(expanded_uncertainty: Decimal | None, otherwise: int) -> int:
    """Give the decimals to show, so that the uncertainty has one or two significant digits.

    Two where the first of them is 1 or 2, else one; never less than whole units.

    Parameters
    ----------
    expanded_uncertainty
        Expanded uncertainty in the unit of the value, or ``None``.
    otherwise
        Decimals of the catalogue, where there is no uncertainty.

    Returns
    -------
    int
        Decimals.

    Notes
    -----
    Two digits at the most. Source: jcgm_100, clause 7.2.6. Dropping the second where the first
    is 3 or more is common practice in physics, no source.
    """
    if expanded_uncertainty is None or expanded_uncertainty <= 0:
        return otherwise
    last = Decimal(1).scaleb(expanded_uncertainty.adjusted() - 1)
    two_digits = expanded_uncertainty.quantize(last, ROUND_HALF_UP)
    digits = 2 if two_digits.as_tuple().digits[0] < _ONE_DIGIT_FROM else 1
    return min(max(digits - 1 - two_digits.adjusted(), 0), _MOST_DECIMALS)


def decimals_of(value: Decimal) -> int:
    """Count the decimals of an exact value, trailing zeros included."""
    exponent = value.as_tuple().exponent
    return max(-exponent, 0) if isinstance(exponent, int) else 0


def shown(value: Decimal, decimals: int) -> str:
    """Round a value to the decimals shown and write it.

    Parameters
    ----------
    value
        The value.
    decimals
        Decimals.
    """
    return _written(value.quantize(Decimal(1).scaleb(-decimals), ROUND_HALF_UP))


def exact_text(value: Decimal) -> str:
    """Write a value with exactly the decimals it was given."""
    return _written(value)


def grouped(number: str) -> str:
    """Set the thousands of a whole number apart; anything else stays.

    Parameters
    ----------
    number
        A number as text, in English notation.
    """
    if not _LONG_WHOLE.fullmatch(number):
        return number
    return _written(Decimal(number.replace(_MINUS, "-")))


def _written(value: Decimal) -> str:
    text = f"{value:f}"
    negative = text.startswith("-")
    whole, _, fraction = text.removeprefix("-").partition(".")
    if len(whole) >= _GROUPED_FROM:
        head = len(whole) % 3
        groups = [whole[:head]] if head else []
        groups += [whole[at : at + 3] for at in range(head, len(whole), 3)]
        whole = _SPACE.join(groups)
    body = f"{whole}.{fraction}" if fraction else whole
    return told(numeral(f"{_MINUS}{body}" if negative and value != 0 else body))


def declared_text(value: Decimal, limits: Iterable[Decimal] = ()) -> str:
    """Write a declared value as it was written; a quotient of declared values is rounded.

    Parameters
    ----------
    value
        The value. More than six significant digits tell that nobody declared it so.
    limits
        What it is compared with; the rounded value stays on its own side.
    """
    if len(value.normalize().as_tuple().digits) <= _LONGEST_DECLARED:
        return exact_text(value)
    return shown(value, telling_decimals(value, limits, _decimals_of_digits(value)))


def _decimals_of_digits(value: Decimal) -> int:
    """Decimals that leave four significant digits."""
    return min(max(_DERIVED_DIGITS - 1 - value.adjusted(), 0), _MOST_DECIMALS)


def rounded_up(uncertainty: Decimal, decimals: int) -> str:
    """Write an uncertainty rounded up to the last decimal shown; it never reads as nought.

    Parameters
    ----------
    uncertainty
        Expanded uncertainty.
    decimals
        Decimals of the value it stands beside.

    Notes
    -----
    Rounding an uncertainty up rather than to the nearest digit. Source: jcgm_100, clause 7.2.6.
    """
    return _written(uncertainty.quantize(Decimal(1).scaleb(-decimals), ROUND_CEILING))


def limits_in(limit: Decimal | str | None) -> tuple[Decimal, ...]:
    """Give the numbers of a limit: one, the two ends of a range, or none of a class."""
    if isinstance(limit, Decimal):
        return (limit,)
    found = _RANGE.fullmatch(limit or "")
    return tuple(Decimal(end) for end in found.groups()) if found else ()


def range_text(text: str) -> str:
    """Write a range such as ``60 to 82000`` with its thousands apart; other text stays."""
    ends = limits_in(text)
    if len(ends) < 2:
        return told(text)
    return told(say("{low} to {high}", low=exact_text(ends[0]), high=exact_text(ends[1])))


def readable(text: str, decimals: int, known: Mapping[Decimal, str] | None = None) -> str:
    """Shorten the long numbers of a sentence to what a reader can use.

    Parameters
    ----------
    text
        A sentence of the trace, with numbers to ten digits and more.
    decimals
        Least decimals kept; a small number keeps four significant digits.
    known
        Numbers that are written in a certain way, so that sentence and table agree.

    Returns
    -------
    str
        The sentence in the language that is being spoken.
    """
    said = known or {}

    def short(match: re.Match[str]) -> str:
        value = Decimal(match[0].replace(_MINUS, "-"))
        if value in said:
            return said[value]
        if len(value.normalize().as_tuple().digits) <= _LONGEST_DECLARED - 1:
            return told(numeral(match[0]))
        return shown(value, max(decimals, _decimals_of_digits(value)))

    def shortened(part: str) -> str:
        return grouped(_LONG_NUMBER.sub(short, part))

    return _LONG_NUMBER.sub(short, told(text, shortened))


def telling_decimals(value: Decimal, limits: Iterable[Decimal], decimals: int) -> int:
    """Raise the decimals until the rounded value stands on its own side of every limit.

    Parameters
    ----------
    value, limits
        What is compared.
    decimals
        Decimals wanted.
    """
    found = tuple(limits)
    sides = [_side(value, limit) for limit in found]
    for tried in range(decimals, _MOST_DECIMALS + 1):
        rounded = value.quantize(Decimal(1).scaleb(-tried), ROUND_HALF_UP)
        if [_side(rounded, limit) for limit in found] == sides:
            return tried
    return _MOST_DECIMALS


def _side(value: Decimal, limit: Decimal) -> int:
    return (value > limit) - (value < limit)


def shown_margin(margin: Decimal, decimals: int) -> str:
    """Write a margin with its sign; a margin that is not nought never reads as nought."""
    telling = telling_decimals(margin, (Decimal(0),), decimals)
    text = shown(margin, telling)
    return f"+{text}" if margin > 0 else text


def date_words(day: date) -> str:
    """Write a date in words, for instance ``1 September 2021``."""
    return date_in_words(day)
