"""Clauses in words: conditions, limits that grow, tolerances, and the formulas that are law."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from decimal import Decimal
from functools import reduce
from types import MappingProxyType

from generator.language import joined, numeral, say, say_as
from generator.quantities import QUANTITIES

__all__ = [
    "FORMULAS",
    "Formula",
    "all_of",
    "bounds_text",
    "choice_text",
    "compared_text",
    "number_of",
    "sloped_text",
    "subject_text",
    "tolerance_text",
    "with_unit",
]

_STATED: Mapping[str, tuple[str, str, str]] = MappingProxyType(
    {
        "directional": (
            say("the lamp is directional"),
            say("the lamp is not directional"),
            say("whether the lamp is directional"),
        ),
        "mains": (
            say("the lamp runs on the mains"),
            say("the lamp does not run on the mains"),
            say("whether the lamp runs on the mains"),
        ),
        "connected": (
            say("the lamp is connected"),
            say("the lamp is not connected"),
            say("whether the lamp is connected"),
        ),
        "colour_tuneable": (
            say("the lamp is colour-tuneable"),
            say("the lamp is not colour-tuneable"),
            say("whether the lamp is colour-tuneable"),
        ),
        "high_luminance": (
            say("the lamp is of high luminance"),
            say("the lamp is not of high luminance"),
            say("whether the lamp is of high luminance"),
        ),
        "anti_glare_shield": (
            say("the lamp has an anti-glare shield"),
            say("the lamp has no anti-glare shield"),
            say("whether the lamp has an anti-glare shield"),
        ),
        "dimmable": (
            say("the lamp is dimmable"),
            say("the lamp is not dimmable"),
            say("whether the lamp is dimmable"),
        ),
    }
)
"""Property that is yes or no -> what is said of the lamp where it holds, where not, and where it
is asked for."""

_NAMED: Mapping[str, str] = MappingProxyType(
    {
        "technology": say("the technology"),
        "cap": say("the cap"),
        "reflector": say("the reflector"),
    }
)
"""Property that has a name of its own -> what it is called."""


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
            say("C × (L + useful luminous flux / (F × η)) × R, with R rounded to two decimals"),
            ("useful_luminous_flux_lm", "ra"),
        ),
        "lumen_maintenance_minimum": Formula(
            say(
                "the flux fraction to the power of test hours over declared lifetime, not above "
                "the cap"
            ),
            ("l70b50_h",),
        ),
        "efficacy_curve": Formula(
            say("a / (b + exp(−c × (luminous flux + d))) + e"),
            ("useful_luminous_flux_lm", "length_mm"),
        ),
        "equivalent_power": Formula(
            say(
                "the power that the luminous flux stands for, linear between the rows of the "
                "table, rounded to an integer"
            ),
            ("useful_luminous_flux_lm",),
        ),
        "reflector_flux": Formula(
            say(
                "reference flux of the reflector lamp × factor for lumen maintenance × factor for "
                "beam angle"
            ),
            ("equivalent_power_w", "lumen_maintenance_factor", "beam_angle_deg"),
        ),
        "declared_class": Formula(
            say(
                "the lower end of the declared class; the value is useful luminous flux / power × "
                "factor of the total mains efficacy"
            ),
            ("useful_luminous_flux_lm", "power_w"),
        ),
        "light_source_scope": Formula(
            say(
                "chromaticity, luminous flux, flux density and CRI within the window of the act, "
                "unit by unit"
            ),
            ("x", "y", "ra", "light_emitting_area_mm2"),
        ),
        "harmonic_currents": Formula(
            say(
                "every harmonic current within its table or, where there are options, within one "
                "of them"
            )
        ),
    }
)
"""Formula named in a leaf -> what it says."""

_BOUNDS = ("at_least", "above", "at_most", "below")

_COMPARED = MappingProxyType(
    {
        "at least": say("at least {limit}"),
        "at most": say("at most {limit}"),
        "above": say("above {limit}"),
        "below": say("below {limit}"),
        "within": say("within {limit}"),
    }
)
"""Comparison -> what is asked of a value."""


def number_of(value: Decimal | str) -> str:
    """Write a number as it stands in a leaf, without an exponent; the letter of a class stays."""
    return value if isinstance(value, str) else numeral(f"{value:f}".replace("-", "\u2212"))


def with_unit(number: str, unit: str) -> str:
    """Put the unit behind a number, where there is one."""
    return joined(" ", (number, unit)) if unit else number


def compared_text(comparison: str, limit: str) -> str:
    """Say how a value must lie to a limit.

    Parameters
    ----------
    comparison
        ``at least``, ``at most``, ``below``, ``above`` or ``within``.
    limit
        The limit in words.
    """
    return _COMPARED[comparison].format(limit=limit)


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
        return _STATED[subject][2]
    if subject in _NAMED:
        return _NAMED[subject]
    if subject in QUANTITIES:
        return say("the {quantity}", quantity=QUANTITIES[subject].label)
    label = QUANTITIES[subject.removeprefix("declared_")].label
    return say("the declared {quantity}", quantity=label)


def choice_text(subject: str, choices: Sequence[bool | str]) -> str:
    """Say which value a property must have, out of one or several."""
    if subject in _STATED and len(choices) == 1:
        return _STATED[subject][0 if choices[0] is True else 1]
    words = [str(item) for item in choices]
    listed = words[-1]
    if len(words) > 1:
        listed = say("{listed} or {last}", listed=", ".join(words[:-1]), last=words[-1])
    return say("{subject} is {value}", subject=subject_text(subject), value=listed)


def bounds_text(subject: str, bounds: Mapping[str, Decimal | None]) -> str:
    """Say between which numbers a quantity must lie."""
    unit = QUANTITIES[subject.removeprefix("declared_")].unit
    given = {key: bound for key in _BOUNDS if (bound := bounds.get(key)) is not None}
    least, most = given.get("at_least"), given.get("at_most")
    if least is not None and least == most:
        value = with_unit(number_of(least), unit)
    else:
        value = all_of(
            compared_text(key.replace("_", " "), with_unit(number_of(bound), unit))
            for key, bound in given.items()
        )
    return say("{subject} is {value}", subject=subject_text(subject), value=value)


def all_of(parts: Iterable[str]) -> str:
    """Put texts together that hold at once; empty where there is none."""
    both = say("{first} and {second}")
    texts = tuple(parts)
    return reduce(lambda first, second: both.format(first=first, second=second), texts or ("",))


def sloped_text(value: Decimal, slopes: Sequence[tuple[str, Decimal]], unit: str) -> str:
    """Write a limit that grows with other quantities."""
    parts: list[str] = [number_of(value)] if value else []
    for name, times in slopes:
        if parts or times < 0:
            parts.append("\u2212" if times < 0 else "+")
        label = QUANTITIES[name].label
        parts.append(say("{factor} × {quantity}", factor=number_of(abs(times)), quantity=label))
    text = joined(" ", parts)
    return say("{formula}, in {unit}", formula=text, unit=unit) if unit else text


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
        "\u2212": _side(minus, minus_percent, unit),
    }
    given = {sign: text for sign, text in sides.items() if text}
    if not any((plus, minus, plus_percent, minus_percent)):
        return say_as("tolerance", "none")
    if len(given) > 1 and len(set(given.values())) == 1:
        return joined(" ", ("±", given["+"]))
    return joined(", ", (joined(" ", pair) for pair in given.items()))


def _side(absolute: Decimal | None, percent: Decimal | None, unit: str) -> str:
    if absolute is not None:
        return with_unit(number_of(absolute), unit)
    return "" if percent is None else with_unit(number_of(percent), "%")
