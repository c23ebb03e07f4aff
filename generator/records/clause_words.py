"""Clauses in words: conditions, limits that grow, tolerances, and the formulas that are law."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from decimal import Decimal
from types import MappingProxyType

from generator.quantities import QUANTITIES

__all__ = [
    "FORMULAS",
    "Formula",
    "bounds_text",
    "choice_text",
    "sloped_text",
    "subject_text",
    "tolerance_text",
]

_STATED: Mapping[str, tuple[str, str]] = MappingProxyType(
    {
        "directional": ("the lamp is directional", "the lamp is not directional"),
        "mains": ("the lamp runs on the mains", "the lamp does not run on the mains"),
        "connected": ("the lamp is connected", "the lamp is not connected"),
        "colour_tuneable": ("the lamp is colour-tuneable", "the lamp is not colour-tuneable"),
        "high_luminance": ("the lamp is of high luminance", "the lamp is not of high luminance"),
        "anti_glare_shield": (
            "the lamp has an anti-glare shield",
            "the lamp has no anti-glare shield",
        ),
        "dimmable": ("the lamp is dimmable", "the lamp is not dimmable"),
    }
)
"""Property that is yes or no -> what is said of the lamp."""


@dataclass(frozen=True, slots=True)
class Formula:
    """A formula that is law.

    Parameters
    ----------
    text
        The formula in words.
    inputs
        Catalogue quantities it starts from, besides the quantity that is judged.
    """

    text: str
    inputs: tuple[str, ...] = ()


FORMULAS: Mapping[str, Formula] = MappingProxyType(
    {
        "maximum_power": Formula(
            "C × (L + useful luminous flux / (F × η)) × R, with R rounded to two decimals",
            ("useful_luminous_flux_lm", "ra"),
        ),
        "lumen_maintenance_minimum": Formula(
            "the flux fraction to the power of test hours over declared lifetime, not above the "
            "cap",
            ("l70b50_h",),
        ),
        "efficacy_curve": Formula(
            "a / (b + exp(−c × (luminous flux + d))) + e",
            ("useful_luminous_flux_lm", "length_mm"),
        ),
        "equivalent_power": Formula(
            "the power that the luminous flux stands for, linear between the rows of the table, "
            "rounded to an integer",
            ("useful_luminous_flux_lm",),
        ),
        "reflector_flux": Formula(
            "reference flux of the reflector lamp × factor for lumen maintenance × factor for beam "
            "angle",
            ("equivalent_power_w", "lumen_maintenance_factor", "beam_angle_deg"),
        ),
        "declared_class": Formula(
            "the lower end of the declared class; the value is useful luminous flux / power × "
            "factor of the total mains efficacy",
            ("useful_luminous_flux_lm", "power_w"),
        ),
        "light_source_scope": Formula(
            "chromaticity, luminous flux, flux density and CRI within the window of the act, unit "
            "by unit",
            ("x", "y", "ra", "light_emitting_area_mm2"),
        ),
        "harmonic_currents": Formula(
            "every harmonic current within its table or, where there are options, within one of "
            "them"
        ),
    }
)
"""Formula named in a leaf -> what it says."""

_BOUNDS = (
    ("at_least", "at least"),
    ("above", "above"),
    ("at_most", "at most"),
    ("below", "below"),
)


def subject_text(subject: str) -> str:
    """Name what a condition asks of a lamp.

    Parameters
    ----------
    subject
        Property of the lamp, catalogue quantity, or ``declared_`` and a catalogue quantity.

    Returns
    -------
    str
        With its article; a property that is yes or no begins with ``whether``.
    """
    if subject in _STATED:
        return f"whether {_STATED[subject][0]}"
    if subject in QUANTITIES:
        return f"the {QUANTITIES[subject].label}"
    stem = subject.removeprefix("declared_")
    if stem in QUANTITIES:
        return f"the declared {QUANTITIES[stem].label}"
    return f"the {subject.replace('_', ' ')}"


def choice_text(subject: str, choices: Sequence[bool | str]) -> str:
    """Say which value a property must have, out of one or several."""
    if subject in _STATED and len(choices) == 1:
        return _STATED[subject][0 if choices[0] is True else 1]
    words = [str(item) for item in choices]
    listed = " or ".join([", ".join(words[:-1]), words[-1]] if len(words) > 1 else words)
    return f"{subject_text(subject)} is {listed}"


def bounds_text(subject: str, bounds: Mapping[str, Decimal | None]) -> str:
    """Say between which numbers a quantity must lie."""
    unit = QUANTITIES[subject.removeprefix("declared_")].unit
    name = subject_text(subject)
    least, most = bounds.get("at_least"), bounds.get("at_most")
    if least is not None and least == most:
        return f"{name} is {least} {unit}".rstrip()
    parts = [
        f"{word} {bounds[key]} {unit}".rstrip().replace("-", "−")
        for key, word in _BOUNDS
        if bounds[key] is not None
    ]
    return f"{name} is {' and '.join(parts)}"


def sloped_text(value: Decimal, slopes: Sequence[tuple[str, Decimal]], unit: str) -> str:
    """Write a limit that grows with other quantities."""
    text = f"{value}" if value else ""
    for name, times in slopes:
        sign = "−" if times < 0 else "+"
        part = f"{abs(times)} × {QUANTITIES[name].label}"
        text = f"{text} {sign} {part}" if text else f"{'− ' if times < 0 else ''}{part}"
    return f"{text}, in {unit}" if unit else text


def tolerance_text(
    plus: Decimal | None,
    minus: Decimal | None,
    plus_percent: Decimal | None,
    minus_percent: Decimal | None,
    unit: str,
) -> str:
    """Write a tolerance: ``+ 5 %``, ``− 0.1``, ``± 25 %``; ``none`` where it is zero."""
    sides = {
        "+": _side(plus, plus_percent, unit),
        "−": _side(minus, minus_percent, unit),
    }
    given = {sign: text for sign, text in sides.items() if text}
    if not any((plus, minus, plus_percent, minus_percent)):
        return "none"
    if len(given) > 1 and len(set(given.values())) == 1:
        return f"± {given['+']}"
    return ", ".join(f"{sign} {text}" for sign, text in given.items())


def _side(absolute: Decimal | None, percent: Decimal | None, unit: str) -> str:
    if absolute is not None:
        return f"{absolute} {unit}".rstrip()
    return "" if percent is None else f"{percent} %"
