"""Chromaticity, colour temperature, colour rendering against one another and the spectrum."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence, computed_against_reported
from generator.crosschecks.significance import Reading, compared, half_digit
from generator.crosschecks.tolerances import tolerance
from generator.crosschecks.wording import CheckText, number, sourced, worded
from generator.language import say
from generator.quantities import quantity
from generator.records.figure import MEAN
from generator.records.finding import Finding

__all__ = [
    "cct_against_chromaticity",
    "cct_mccamy_1992",
    "colour_against_report",
    "declared_cct_against_measured",
]

_CCT = "cct_k"
_VALID_K = (Decimal(2500), Decimal(7000))
_MCCAMY_SPREAD_K = Decimal(25)

_REPORT_TEXTS = {
    name: CheckText(
        f"{word}-spectrum-against-report",
        title,
        say(
            "A spectrum of another unit or operating point, another observer or edition of the "
            "method, or a spectrum of coarse step or short range would explain it."
        ),
        (name,),
        sourced(quantity(name).source, say("definition")),
    )
    for name, word, title in (
        ("x", "x", say("Chromaticity x from the spectrum and as reported differ")),
        ("y", "y", say("Chromaticity y from the spectrum and as reported differ")),
        (_CCT, "cct", say("Colour temperature from the spectrum and as reported differ")),
        (
            "duv",
            "duv",
            say("Distance from the Planckian locus from the spectrum and as reported differ"),
        ),
        ("ra", "ra", say("Colour rendering index Ra from the spectrum and as reported differ")),
        ("r9", "r9", say("Colour rendering index R9 from the spectrum and as reported differ")),
    )
}
_CHROMATICITY = CheckText(
    "cct-against-chromaticity",
    say("Reported colour temperature and chromaticity do not fit"),
    say(
        "A nominal colour temperature written in place of the measured one, or values taken from "
        "two units or two instruments, would explain it."
    ),
    (_CCT, "x", "y"),
    sourced("mccamy_1992", say("approximation of the colour temperature from x and y")),
)
_DECLARED = CheckText(
    "cct-declared-against-measured",
    say("Declared and measured colour temperature differ"),
    say(
        "Units of another colour variant of the model, a lamp left at another colour setting, or a "
        "slip in the declared value would explain it."
    ),
    (_CCT,),
    sourced("ansi_c78_377", say("nominal CCT and tolerance")),
)


_FROM_SPECTRUM = say("computed from the spectrum as {computed}")


def colour_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Colour values computed from the spectrum against the reported ones."""
    for name, text in _REPORT_TEXTS.items():
        yield from computed_against_reported(evidence, text, name, _FROM_SPECTRUM)


def cct_mccamy_1992(x: Decimal, y: Decimal) -> Decimal | None:
    """Correlated colour temperature from x and y by a cubic; for plausibility only.

    Near the Planckian locus, from 2500 K to 7000 K, the cubic is within 25 K of the definition
    for |Duv| up to 0.01.

    Parameters
    ----------
    x, y
        Chromaticity (CIE 1931).

    Returns
    -------
    Decimal or None
        Temperature [K]; ``None`` outside 2500 K to 7000 K. Source: mccamy_1992.
    """
    height = y - Decimal("0.1858")
    if height <= 0:
        return None
    n = (x - Decimal("0.3320")) / height
    cct = ((-449 * n + 3525) * n - Decimal("6823.3")) * n + Decimal("5520.33")
    return cct if _VALID_K[0] <= cct <= _VALID_K[1] else None


def _writing_spread_k(x: Reading, y: Reading, cct_k: Decimal) -> Decimal:
    """How far the last written digits of x and y move the temperature [K]."""
    moved = (
        cct_mccamy_1992(x.value + x.rounding, y.value),
        cct_mccamy_1992(x.value, y.value + y.rounding),
    )
    return sum((abs(item - cct_k) for item in moved if item is not None), Decimal(0))


def cct_against_chromaticity(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported colour temperature against that of the reported chromaticity."""
    for unit in evidence.units:
        cct = evidence.reported(unit, _CCT)
        x, y = evidence.reported(unit, "x"), evidence.reported(unit, "y")
        if cct is None or x is None or y is None:
            continue
        expected = cct_mccamy_1992(x.value, y.value)
        if expected is None:
            continue
        spread = _MCCAMY_SPREAD_K + _writing_spread_k(x, y, expected)
        outcome = compared(cct, Reading(expected, rounding=spread), tolerance(_CCT))
        if outcome.severity is not None:
            yield _CHROMATICITY.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "colour temperature reported as {reported}, reported chromaticity x {x}, "
                    "y {y} is that of about {expected}; {outcome}",
                    reported=worded(_CCT, cct.value),
                    x=number(x.value),
                    y=number(y.value),
                    expected=worded(_CCT, expected),
                    outcome=outcome.words("K"),
                ),
                outcome.deviation,
                "K",
            )


def declared_cct_against_measured(evidence: LampEvidence) -> Iterator[Finding]:
    """Declared colour temperature against the mean over the units."""
    declared, mean = evidence.lamp.declared.get(_CCT), evidence.measured_mean(_CCT)
    if declared is None or mean is None or not declared:
        return
    nominal = Reading(declared, rounding=half_digit(declared))
    outcome = compared(mean, nominal, tolerance("declared_cct_k"))
    if outcome.severity is not None:
        yield _DECLARED.finding(
            evidence.lamp.lamp_id,
            MEAN,
            outcome.severity,
            say(
                "colour temperature declared as {declared}, measured as {measured}; {outcome}",
                declared=worded(_CCT, declared),
                measured=worded(_CCT, mean.value),
                outcome=outcome.words("K"),
            ),
            outcome.deviation,
            "K",
        )
