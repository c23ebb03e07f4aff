"""Product information: the fields of the energy label act, rounded as it asks.

Source: eu_2019_2015, Annex V Table 3. The steps are the act's own and stand in the law book. What
is published must not be better than what is declared (Annex IX point 2(b)); a field in which
rounding would make it so carries a warning.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from decimal import Decimal
from fractions import Fraction

from generator.conformity.exact_number import decimal_of, rounded
from generator.conformity.judged_value import PUBLISHED_STEPS
from generator.errors import LawBookError
from generator.language import numeral, say, say_as
from generator.quantities import quantity
from generator.records.clause import DatedValue, LawBook
from generator.records.figure import FigureSet, Grade
from generator.records.lamp import Lamp
from generator.records.product_field import ProductField

__all__ = ["product_information"]

_YES, _NO = say("yes"), say("no")
_NOT_STATED = say("not stated in the campaign")


@dataclass(frozen=True, slots=True)
class _Number:
    """A numeric field: quantity, name, which way is better, and for which lamps it is asked."""

    quantity: str
    name: str
    better: str = ""
    only: str = ""


_NUMBERS = (
    _Number("cct_k", say("correlated colour temperature")),
    _Number("power_w", say("on-mode power"), "lower"),
    _Number("standby_power_w", say("standby power"), "lower"),
    _Number("networked_standby_power_w", say("networked standby power"), "lower", "connected"),
    _Number("ra", say("colour rendering index"), "higher"),
    _Number("equivalent_power_w", say("equivalent power"), "higher", "claim"),
    _Number("x", say("chromaticity coordinate x")),
    _Number("y", say("chromaticity coordinate y")),
    _Number("peak_intensity_cd", say("peak luminous intensity"), "higher", "directional"),
    _Number("beam_angle_deg", say("beam angle"), "", "directional"),
    _Number("r9", say("R9 colour rendering index"), "higher"),
    _Number("survival_factor", say("survival factor"), "higher"),
    _Number("lumen_maintenance_factor", say("lumen maintenance factor"), "higher"),
    _Number("displacement_factor", say("displacement factor"), "higher", "mains"),
    _Number("sdcm", say("colour consistency in MacAdam ellipses"), "lower", "mains"),
    _Number("pst_lm", say("flicker metric (Pst LM)"), "lower", "mains"),
    _Number("svm", say("stroboscopic effect metric (SVM)"), "lower", "mains"),
)

_ONLY = {
    "connected": say("asked of connected light sources alone"),
    "claim": say("no equivalence is claimed"),
    "directional": say("asked of directional light sources alone"),
    "mains": say("asked of mains light sources alone"),
}


def product_information(
    lamp: Lamp, figures: FigureSet, law: LawBook, day: date
) -> tuple[ProductField, ...]:
    """The product information of one lamp.

    Parameters
    ----------
    lamp
        The lamp as declared.
    figures
        Figures of the campaign, those that the law defines among them.
    law, day
        The law book and the day.

    Returns
    -------
    tuple of ProductField
        In the order of the act; empty where the act is not in force on the day.

    Notes
    -----
    Source: eu_2019_2015, Annex V Table 3 and Annex IX point 2(b).
    """
    try:
        steps = law.constant(PUBLISHED_STEPS, day)
    except LawBookError:
        return ()
    return (
        *_identity(lamp),
        *_kind(lamp),
        _energy(lamp, figures),
        _energy_class(lamp, figures),
        _flux(lamp, steps),
        *(_number(lamp, figures, steps, item) for item in _NUMBERS),
    )


def _text(lamp: Lamp, name: str, text: str, reason: str = _NOT_STATED) -> ProductField:
    return ProductField(lamp.lamp_id, name, text, reason="" if text else reason)


def _identity(lamp: Lamp) -> Iterator[ProductField]:
    yield _text(lamp, say("supplier's name"), lamp.bidder)
    yield _text(lamp, say("model identifier"), lamp.model)


def _kind(lamp: Lamp) -> Iterator[ProductField]:
    yield _text(lamp, say("lighting technology"), lamp.technology)
    yield _text(lamp, say_as("property", "directional"), _choice(lamp.directional, "DLS", "NDLS"))
    yield _text(lamp, say("cap type"), lamp.cap)
    yield _text(lamp, say_as("property", "mains"), _choice(lamp.mains, "MLS", "NMLS"))
    yield _text(lamp, say("connected light source (CLS)"), _choice(lamp.connected))
    yield _text(lamp, say("colour-tuneable light source"), _choice(lamp.colour_tuneable))
    yield _text(lamp, say("envelope"), "")
    yield _text(lamp, say("high luminance light source"), _choice(lamp.high_luminance))
    yield _text(lamp, say("anti-glare shield"), _choice(lamp.anti_glare_shield))
    yield _text(lamp, say("dimmable"), _choice(lamp.dimmable))
    yield _text(lamp, say("height, width and depth"), "")


def _choice(answer: bool | None, yes: str = _YES, no: str = _NO) -> str:
    return "" if answer is None else (yes if answer else no)


def _energy(lamp: Lamp, figures: FigureSet) -> ProductField:
    name = say("energy consumption in on-mode")
    figure = figures.graded(lamp.lamp_id, "energy_kwh_per_1000h", Grade.DECLARED)
    if figure is None or figure.number is None:
        return _text(lamp, name, "", figure.reason if figure else say("no power is declared"))
    return ProductField(
        lamp.lamp_id,
        name,
        numeral(format(figure.number, "f")),
        quantity("energy_kwh_per_1000h").unit,
        say("rounded up to the next integer"),
        lamp.declared.get("power_w"),
    )


def _energy_class(lamp: Lamp, figures: FigureSet) -> ProductField:
    name = say("energy efficiency class")
    declared = lamp.declared_energy_class
    figure = figures.graded(lamp.lamp_id, "energy_efficiency_class", Grade.DECLARED)
    found = figure.value if figure is not None else None
    if declared is None:
        return _text(lamp, name, "", say("no class is declared"))
    better = isinstance(found, str) and declared < found
    warning = ""
    if better:
        warning = say("the declared flux and power give class {letter}", letter=found)
    return ProductField(lamp.lamp_id, name, declared, declared=declared, warning=warning)


def _flux(lamp: Lamp, steps: DatedValue) -> ProductField:
    key = "useful_luminous_flux_lm" if lamp.directional else "luminous_flux_lm"
    field = _Number(key, say("useful luminous flux"), "higher")
    return _published(lamp, lamp.declared.get(key), steps, field)


def _number(lamp: Lamp, figures: FigureSet, steps: DatedValue, field: _Number) -> ProductField:
    missing = _not_asked(lamp, field.only)
    if missing:
        return _text(lamp, field.name, "", missing)
    declared = lamp.declared.get(field.quantity)
    if declared is None and field.quantity in {"x", "y"}:
        measured = figures.measured(lamp.lamp_id, field.quantity)
        if measured is not None and measured.number is not None:
            shown = _published(lamp, measured.number, steps, field)
            return ProductField(
                shown.lamp_id,
                shown.name,
                shown.text,
                shown.unit,
                say("{rounding}; measured, for none is declared", rounding=shown.rounding),
            )
    return _published(lamp, declared, steps, field)


def _not_asked(lamp: Lamp, only: str) -> str:
    asked = {
        "": True,
        "connected": lamp.connected is not False,
        "claim": "equivalent_power_w" in lamp.declared,
        "directional": lamp.directional is not False,
        "mains": lamp.mains is not False,
    }
    return "" if asked[only] else _ONLY[only]


def _published(
    lamp: Lamp, declared: Decimal | None, steps: DatedValue, field: _Number
) -> ProductField:
    unit = quantity(field.quantity).unit
    if declared is None:
        return _text(lamp, field.name, "", say("not declared"))
    step = steps.number(field.quantity)
    value = rounded(Fraction(declared), Fraction(step))
    decimals = max(0, -int(step.normalize().as_tuple().exponent))
    text = numeral(f"{decimal_of(value):.{decimals}f}")
    return ProductField(
        lamp.lamp_id,
        field.name,
        text,
        unit,
        say("to the nearest {step:f}", step=step.normalize()),
        declared,
        warning=_flattered(value, declared, field.better, text),
    )


def _flattered(value: Fraction, declared: Decimal, better: str, text: str) -> str:
    """The warning where what is published is better than what is declared."""
    exact = Fraction(declared)
    flattering = value > exact if better == "higher" else value < exact
    if not better or not flattering:
        return ""
    return say(
        "{declared} would be shown as {shown}, which is better than declared",
        declared=numeral(format(declared.normalize(), "f")),
        shown=text,
    )
