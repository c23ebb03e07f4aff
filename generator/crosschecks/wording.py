"""How findings are worded: numbers with units, lamps and units by name, one text per check."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Decimal

from generator.language import Message, Numeral, joined, numeral, say
from generator.quantities import quantity
from generator.records.figure import MEAN, exact
from generator.records.finding import Finding, Severity

__all__ = ["CheckText", "listed", "named", "number", "sourced", "with_unit", "worded"]

_MOST_DIGITS = 6
_MOST_NAMES = 6


def number(value: Decimal, digits: int = 5, *, signed: bool = False) -> Numeral:
    """A number as printed: as written where it is short, else to some significant digits.

    Parameters
    ----------
    value
        The number.
    digits
        Significant digits kept of a number longer than six digits, or longer than this.
    signed
        Whether a positive number gets its sign.

    Returns
    -------
    Numeral
        Text without exponent.
    """
    if len(value.as_tuple().digits) > min(digits, _MOST_DIGITS) and value:
        for _ in range(2):  # rounding up may carry into one digit more, as 99.99 to 100.0
            step = Decimal(1).scaleb(min(value.adjusted() - digits + 1, 0))
            value = value.quantize(step, rounding=ROUND_HALF_EVEN)
    if not value and digits < _MOST_DIGITS:
        value = Decimal(0)
    text = f"{value:+f}" if signed else f"{value:f}"
    return numeral(text.replace("-", "\u2212"))


def with_unit(text: str, unit: str) -> str:
    """A printed number with its unit; bare where the unit is empty."""
    return joined(" ", (text, unit)) if unit else text


def worded(name: str, value: Decimal) -> str:
    """The value of a quantity as printed, with the unit of the catalogue."""
    short = len(value.as_tuple().digits) <= _MOST_DIGITS
    return with_unit(number(value, _MOST_DIGITS if short else 5), quantity(name).unit)


def named(lamp_id: str, unit_id: str = MEAN) -> str:
    """Lamp, and unit where there is one, by name."""
    if unit_id == MEAN:
        return say("lamp {lamp}", lamp=lamp_id)
    return say("lamp {lamp}, unit {unit}", lamp=lamp_id, unit=unit_id)


def _headed(lamp_id: str, unit_id: str) -> Message:
    """Lamp, and unit where there is one, in front of what was found there."""
    if unit_id == MEAN:
        return say("lamp {lamp}: ", lamp=lamp_id)
    return say("lamp {lamp}, unit {unit}: ", lamp=lamp_id, unit=unit_id)


def sourced(key: str, clause: str) -> str:
    """A source: its key, and where in it."""
    return joined(", ", (key, clause))


def listed(names: Sequence[str]) -> str:
    """Names in one phrase, the first few where there are many."""
    shown = joined(", ", names[:_MOST_NAMES])
    more = len(names) - _MOST_NAMES
    return say("{names} and {more} more", names=shown, more=more) if more > 0 else shown


@dataclass(frozen=True, slots=True)
class CheckText:
    """What one check always says.

    Parameters
    ----------
    check
        Stable id.
    title
        The finding in a few words.
    explanation
        What would explain it.
    quantities
        Catalogue names concerned.
    source
        Source key and clause, or ``common practice, no source``.
    """

    check: str
    title: str
    explanation: str
    quantities: tuple[str, ...]
    source: str

    def finding(
        self,
        lamp_id: str,
        unit_id: str,
        severity: Severity,
        compared: str,
        deviation: Decimal | None = None,
        deviation_unit: str = "",
    ) -> Finding:
        """A finding of this check.

        Parameters
        ----------
        lamp_id, unit_id
            Where it was found; they are put in front of the text.
        severity
            How much it weighs.
        compared
            What was compared with what.
        deviation, deviation_unit
            By how much it is off, and the unit of that.

        Returns
        -------
        Finding
            The finding.
        """
        return Finding(
            lamp_id=lamp_id,
            unit_id=unit_id,
            check=self.check,
            severity=severity,
            title=self.title,
            compared=joined("", (_headed(lamp_id, unit_id), compared, ".")),
            deviation=None if deviation is None else exact(float(deviation)),
            deviation_unit=deviation_unit,
            explanation=self.explanation,
            quantities=self.quantities,
            source=self.source,
        )
