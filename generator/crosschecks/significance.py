"""Whether two values differ by more than their uncertainties, or else their tolerances, allow.

Where both expanded uncertainties are known, the difference is held against their root sum of
squares, as in proficiency testing: E_n = |d| / sqrt(U1² + U2²), and above 1 the two contradict one
another. Where one is unknown, or given as zero, an entry of
:mod:`generator.crosschecks.tolerances` stands in, or the known uncertainty where it is larger.
Half of the last written digit of each value is taken off the difference beforehand, so that
coarse writing is never mistaken for a contradiction.

Source: ISO 13528, E_n number (from memory, unconfirmed).
"""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal

from generator.crosschecks.tolerances import GROSS_FACTOR, UNCONFIRMED, Tolerance
from generator.crosschecks.wording import number, with_unit
from generator.language import joined, say
from generator.records.figure import Figure, Grade
from generator.records.finding import Severity

__all__ = ["Comparison", "Reading", "compared", "half_digit", "product", "quotient", "reading"]

_HALF = Decimal("0.5")


@dataclass(frozen=True, slots=True)
class Reading:
    """A value with what is known of its sharpness.

    Parameters
    ----------
    value
        The value.
    expanded
        Expanded uncertainty (k = 2) in the same unit; ``None`` where unknown.
    rounding
        Half of the last written digit, in the same unit; 0 for computed values.
    """

    value: Decimal
    expanded: Decimal | None = None
    rounding: Decimal = Decimal(0)


@dataclass(frozen=True, slots=True)
class Comparison:
    """Outcome of one comparison.

    Parameters
    ----------
    deviation
        First value less second.
    excess
        Size of the deviation beyond the rounding of both.
    allowance
        What the excess may be.
    e_n
        E_n number, ``None`` where an uncertainty is unknown.
    severity
        ``None`` where the two agree.
    basis
        What the allowance rests on, in words.
    percent
        Deviation in percent of the second value; ``None`` where that is zero.
    """

    deviation: Decimal
    excess: Decimal
    allowance: Decimal
    e_n: Decimal | None
    severity: Severity | None
    basis: str
    percent: Decimal | None

    def words(self, unit: str) -> str:
        """Difference, allowance and basis in one clause.

        Parameters
        ----------
        unit
            Unit of both values.

        Returns
        -------
        str
            Text to follow the two values.
        """
        difference = with_unit(number(self.deviation, 3, signed=True), unit)
        if self.percent is not None:
            percent = number(self.percent, 2, signed=True)
            difference = say("{difference} ({share} %)", difference=difference, share=percent)
        text = say(
            "difference {difference}, allowed {allowed} ({basis})",
            difference=difference,
            allowed=with_unit(number(self.allowance, 3), unit),
            basis=self.basis,
        )
        if self.e_n is None:
            return text
        return say("{text}, E_n = {e_n}", text=text, e_n=number(self.e_n, 2))


def half_digit(value: Decimal) -> Decimal:
    """Half of the last written digit of a value; of the units digit at the coarsest."""
    exponent = value.as_tuple().exponent
    return _HALF.scaleb(min(exponent, 0)) if isinstance(exponent, int) else Decimal(0)


def reading(figure: Figure | None) -> Reading | None:
    """The number of a figure with its uncertainty and rounding.

    Parameters
    ----------
    figure
        A figure, or ``None``.

    Returns
    -------
    Reading or None
        ``None`` where there is no number. An uncertainty of zero counts as unknown.
    """
    if figure is None or figure.number is None:
        return None
    rounding = Decimal(0) if figure.grade is Grade.COMPUTED else half_digit(figure.number)
    return Reading(figure.number, figure.expanded_uncertainty or None, rounding)


def _root_sum(*terms: Decimal) -> Decimal:
    return sum((term * term for term in terms), Decimal(0)).sqrt()


def _combined(value: Decimal, parts: tuple[Reading, ...]) -> Reading:
    relative = [
        None if part.expanded is None else part.expanded / abs(part.value) for part in parts
    ]
    known = [item for item in relative if item is not None]
    rounding = sum((part.rounding / abs(part.value) for part in parts), Decimal(0))
    return Reading(
        value,
        abs(value) * _root_sum(*known) if len(known) == len(parts) else None,
        abs(value) * rounding,
    )


def product(first: Reading, second: Reading) -> Reading:
    """Product of two readings other than zero, with uncertainty and rounding carried along."""
    return _combined(first.value * second.value, (first, second))


def quotient(first: Reading, second: Reading) -> Reading:
    """Quotient of two readings other than zero, with uncertainty and rounding carried along."""
    return _combined(first.value / second.value, (first, second))


def _basis(limit: Tolerance, *, known_larger: bool) -> str:
    if known_larger:
        return say("the one expanded uncertainty that is known, k = 2")
    unconfirmed = limit.status == UNCONFIRMED
    reason = joined(", ", (limit.reason, UNCONFIRMED)) if unconfirmed else limit.reason
    return say(
        "default tolerance of {tolerance}, an uncertainty being unknown: {reason}",
        tolerance=limit.words,
        reason=reason,
    )


def compared(first: Reading, second: Reading, limit: Tolerance) -> Comparison:
    """Hold one value against another.

    Parameters
    ----------
    first, second
        The values, in one unit; the second is the one that shares are of.
    limit
        Tolerance where an uncertainty is unknown.

    Returns
    -------
    Comparison
        With both uncertainties known, a contradiction beyond E_n = 1; else a doubt beyond the
        tolerance and a contradiction beyond :data:`GROSS_FACTOR` tolerances.
    """
    deviation = first.value - second.value
    excess = max(abs(deviation) - first.rounding - second.rounding, Decimal(0))
    percent = deviation / abs(second.value) * 100 if second.value else None
    if first.expanded is not None and second.expanded is not None:
        allowance = _root_sum(first.expanded, second.expanded)
    else:
        allowance = Decimal(0)
    if allowance:
        severity = Severity.CONTRADICTION if excess > allowance else None
        both = say("expanded uncertainties of both, k = 2")
        return Comparison(deviation, excess, allowance, excess / allowance, severity, both, percent)
    known = max(first.expanded or Decimal(0), second.expanded or Decimal(0))
    allowance = max(limit.allowance(second.value), known)
    severity = None
    if excess > allowance:
        gross = excess > GROSS_FACTOR * allowance
        severity = Severity.CONTRADICTION if gross else Severity.DOUBT
    basis = _basis(limit, known_larger=known > limit.allowance(second.value))
    return Comparison(deviation, excess, allowance, None, severity, basis, percent)
