"""The drawings of one lamp: what each shows, the finding it states, and the table behind it."""

from __future__ import annotations

import dataclasses
import re
from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal

import numpy as np

from generator.records.assessment import Assessment
from generator.records.curves import HarmonicComb, LampCurves, SpectrumCurve
from generator.records.figure import Figure, FigureSet
from generator.records.verdict import Verdict
from generator.sheets.drawings.ageing_chart import ageing_table, draw_ageing_chart
from generator.sheets.drawings.colour_strip import draw_colour_strip
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
from generator.sheets.drawings.harmonics_comb import draw_harmonics_comb, harmonics_table
from generator.sheets.drawings.mains_cycle import draw_mains_cycle, mains_table
from generator.sheets.drawings.modulation_plane import draw_modulation_plane
from generator.sheets.drawings.modulation_trace import draw_modulation_trace, modulation_table
from generator.sheets.drawings.polar_intensity import draw_polar_intensity, intensity_table
from generator.sheets.drawings.rendering_comb import draw_rendering_comb
from generator.sheets.drawings.spectral_colour import spectrum_colour
from generator.sheets.drawings.spectrum_plate import draw_spectrum_plate, spectrum_table
from generator.sheets.drawings.watt_strip import WattShares, draw_watt_strip
from generator.sheets.drawings.white_plane import draw_white_plane, white_table
from generator.sheets.figure_text import figure_text, phrase
from generator.sheets.lamp_words import HARMONICS_WITHIN, NOT_PROJECTED
from generator.sheets.words import DRAWING_HEADINGS

__all__ = ["lamp_drawings"]

_PLAIN_EMITTER, _PLAIN_PHOSPHOR = "#7a93d6", "#e8d48a"
_MAINTENANCE = "eu-2019-2020-lumen-maintenance"
_ENDURANCE_H = 3000.0  # length of the endurance test; eu_2019_2020, Annex V
_HARMONIC = re.compile(r"h(?P<order>\d+)_(?P<unit>percent|ma_per_w)")
_LUMENS_PER_WATT = 683.0  # luminous efficacy at 540 THz, by definition of the lumen


@dataclass(frozen=True, slots=True)
class _Lamp:
    """The figures of one lamp, by name."""

    figures: FigureSet
    verdicts: tuple[Verdict, ...]
    lamp_id: str
    curves: LampCurves
    palette: Palette

    def figure(self, name: str) -> Figure | None:
        return self.figures.best(self.lamp_id, name)

    def number(self, name: str) -> float | None:
        figure = self.figure(name)
        value = figure.number if figure else None
        return None if value is None else float(value)

    def text(self, name: str) -> str:
        """Number and unit, or empty where there is no number."""
        text = figure_text(self.figure(name), name)
        return "" if text.missing else phrase(text)

    def clause(self, before: str, name: str, after: str = "") -> str:
        """A piece of a sentence around a figure, or empty where there is no number."""
        text = self.text(name)
        return f"{before}{text}{after}" if text else ""

    def missing(self, key: str, otherwise: str) -> Drawing:
        """Say why there is nothing to draw."""
        reason = self.curves.missing.get(key, otherwise)
        return Drawing(key, DRAWING_HEADINGS[key], f"Not drawn: {reason}.")


def _sentence(parts: Iterable[str], otherwise: str) -> str:
    text = "; ".join(part for part in parts if part)
    return f"{text[0].upper()}{text[1:]}." if text else otherwise


def lamp_drawings(
    assessment: Assessment, lamp_id: str, curves: LampCurves, palette: Palette
) -> tuple[Drawing, ...]:
    """Make the drawings of a lamp, in reading order.

    Parameters
    ----------
    assessment
        All figures and verdicts of the campaign.
    lamp_id
        The lamp.
    curves
        Its curves.
    palette
        Colours of the theme.

    Returns
    -------
    tuple of Drawing
        One per kind; where there is nothing to draw, the drawing says why.
    """
    verdicts = assessment.verdicts_of(lamp_id)
    lamp = _Lamp(assessment.figures, verdicts, lamp_id, curves, palette)
    makers = (
        *(_spectrum, _white, _rendering, _hues, _light, _plane),
        *(_mains, _harmonics, _watts, _ageing, _intensity),
    )
    return tuple(maker(lamp) for maker in makers)


def _spectrum(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.spectrum
    if curve is None:
        return lamp.missing("spectrum", "the campaign holds no spectrum of this lamp")
    emitter = lamp.text("emitter_peak_nm")
    energy = lamp.clause(" (", "emitter_photon_energy_ev", ")")
    caption = _sentence(
        (
            lamp.clause("blue emitter at ", "emitter_peak_nm", energy)
            or lamp.clause("peak at ", "peak_wavelength_nm"),
            lamp.clause("", "cct_k", lamp.clause(", Duv ", "duv")),
            lamp.clause(
                "efficacy can never pass ",
                "ler_lm_per_w",
                ", the luminous efficacy of this radiation",
            ),
        ),
        "Mean spectrum of the units.",
    )
    label = f"{emitter}{energy}" if emitter else lamp.text("peak_wavelength_nm")
    white = tuple(
        text for text in (lamp.clause("CCT ", "cct_k"), lamp.clause("Duv ", "duv")) if text
    )
    svg = draw_spectrum_plate(curve, label, white, caption, lamp.palette, key=lamp.lamp_id)
    return Drawing("spectrum", DRAWING_HEADINGS["spectrum"], caption, svg, spectrum_table(curve))


def _part_colours(curve: SpectrumCurve | None) -> tuple[str, str]:
    """Colours of emitter and phosphor; of the whole light where it is not cut."""
    if curve is None:
        return _PLAIN_EMITTER, _PLAIN_PHOSPHOR
    if curve.emitter is None or curve.phosphor is None:
        whole = spectrum_colour(curve.wavelength_nm, curve.total)
        return whole, whole
    return (
        spectrum_colour(curve.wavelength_nm, curve.emitter),
        spectrum_colour(curve.wavelength_nm, curve.phosphor),
    )


def _watts(lamp: _Lamp) -> Drawing:
    power, radiant = lamp.number("power_w"), lamp.number("radiant_flux_w")
    if not power or radiant is None:
        return lamp.missing("watts", "it takes the power and an absolute spectrum")
    lumens = lamp.number("luminous_flux_lm")
    blue, yellow = _part_colours(lamp.curves.spectrum)
    shares = WattShares(
        light=radiant / power,
        emitter=lamp.number("emitter_fraction"),
        useful=None if lumens is None else lumens / _LUMENS_PER_WATT / power,
        emitter_colour=blue,
        phosphor_colour=yellow,
    )
    caption = _sentence(
        (
            lamp.clause("of ", "power_w", lamp.clause(", ", "radiant_flux_w", " leave as light")),
            lamp.clause("the eye counts ", "luminous_flux_lm"),
        ),
        "",
    )
    words = (
        lamp.clause("", "power_w", " from the mains"),
        lamp.clause("", "radiant_flux_w", " of light"),
        lamp.clause("", "luminous_flux_lm", ": what the eye can use"),
        "heat and other losses",
    )
    svg = draw_watt_strip(shares, words, caption, lamp.palette)
    names = ("power_w", "radiant_flux_w", "radiant_efficiency", "emitter_fraction")
    table = _figure_table(lamp, (*names, "luminous_flux_lm"))
    return Drawing("watts", DRAWING_HEADINGS["watts"], caption, svg, table)


def _figure_table(lamp: _Lamp, names: Iterable[str]) -> DataTable:
    texts = [figure_text(lamp.figure(name), name) for name in names]
    rows = tuple((text.label, phrase(text), text.uncertainty, text.grade) for text in texts)
    return DataTable(("quantity", "value", "uncertainty (k = 2)", "grade"), rows)


def _light(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.light
    if curve is None:
        return lamp.missing("light", "the campaign holds no light record of this lamp")
    caption = _sentence(
        (
            lamp.clause("percent flicker ", "percent_flicker")
            + lamp.clause(" at ", "flicker_frequency_hz"),
            lamp.clause("flicker index ", "flicker_index", ", the shaded share of the area"),
        ),
        "Light of one unit.",
    )
    index = lamp.clause("shaded area over whole area = flicker index ", "flicker_index")
    svg = draw_modulation_trace(curve, index, caption, lamp.palette)
    return Drawing("light", DRAWING_HEADINGS["light"], caption, svg, modulation_table(curve))


def _plane(lamp: _Lamp) -> Drawing:
    line = lamp.curves.low_risk
    frequency, depth = lamp.number("flicker_frequency_hz"), lamp.number("percent_flicker")
    if line is None or frequency is None or depth is None:
        return lamp.missing("plane", "it takes the frequency and the depth of the modulation")
    limit = lamp.number("low_risk_modulation_percent")
    side = ""
    if limit is not None:
        side = " above the low-risk line" if depth > limit else " on the low-risk side of the line"
    caption = _sentence(
        (
            lamp.clause("", "percent_flicker", lamp.clause(" at ", "flicker_frequency_hz", side)),
            lamp.clause("low risk ends at ", "low_risk_modulation_percent", " there"),
        ),
        "",
    )
    svg = draw_modulation_plane(
        line, (frequency, depth), lamp.text("percent_flicker"), caption, lamp.palette
    )
    names = ("flicker_frequency_hz", "percent_flicker", "low_risk_modulation_percent")
    return Drawing("plane", DRAWING_HEADINGS["plane"], caption, svg, _figure_table(lamp, names))


def _mains(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.mains
    if curve is None:
        return lamp.missing("mains", "the campaign holds no mains capture of this lamp")
    shift, shift_label, order = curve.current_phase_deg, "", ""
    if shift is not None and abs(round(shift)) >= 1:
        order = "leads" if shift < 0 else "lags"
        shift_label = f"{abs(round(shift))}°"
    caption = _sentence(
        (
            lamp.clause("power factor ", "power_factor"),
            lamp.clause("displacement factor ", "displacement_factor")
            + (f", the current {order} by {shift_label}" if order else ""),
            lamp.clause("current THD ", "thd_current_percent"),
        ),
        "Voltage and current of one unit.",
    )
    svg = draw_mains_cycle(curve, shift_label, caption, lamp.palette)
    return Drawing("mains", DRAWING_HEADINGS["mains"], caption, svg, mains_table(curve))


def _floats(lamp: _Lamp, names: Iterable[str]) -> list[float | None]:
    return [lamp.number(name) for name in names]


def _rendering(lamp: _Lamp) -> Drawing:
    names = [f"r{order}" for order in range(1, 16)]
    indices = _floats(lamp, names)
    if all(value is None for value in indices[:8]):
        return lamp.missing("rendering", "the campaign holds no spectrum of this lamp")
    labels = [lamp.text(name) for name in names]
    known = [(value, place) for place, value in enumerate(indices, 1) if value is not None]
    weakest = min(known)[1]
    caption = _sentence(
        (
            lamp.clause("Ra ", "ra", ", the mean of R1 to R8"),
            lamp.clause("R9, saturated red, ", "r9"),
            "" if weakest == 9 else f"weakest R{weakest} at {labels[weakest - 1]}",
        ),
        "",
    )
    svg = draw_rendering_comb(indices, labels, lamp.number("ra"), caption, lamp.palette)
    table = _figure_table(lamp, ("ra", *names))
    return Drawing("rendering", DRAWING_HEADINGS["rendering"], caption, svg, table)


def _hues(lamp: _Lamp) -> Drawing:
    bins = range(1, 17)
    shifts = _floats(lamp, [f"rcs_h{order}" for order in bins])
    fidelity = _floats(lamp, [f"rf_h{order}" for order in bins])
    if all(value is None for value in shifts):
        return lamp.missing("hues", "the campaign holds no spectrum of this lamp")
    reds = lamp.clause("reds (bin 1) shift in chroma by ", "rcs_h1")
    caption = _sentence(
        (lamp.clause("fidelity Rf ", "rf") + lamp.clause(", gamut Rg ", "rg"), reds), ""
    )
    svg = draw_colour_strip(shifts, fidelity, caption, lamp.palette)
    rows = tuple(
        (str(order), lamp.text(f"rcs_h{order}"), lamp.text(f"rf_h{order}")) for order in bins
    )
    table = DataTable(("hue bin", "chroma shift", "fidelity"), rows)
    return Drawing("hues", DRAWING_HEADINGS["hues"], caption, svg, table)


def _white(lamp: _Lamp) -> Drawing:
    plane = lamp.curves.white
    if plane is None or len(plane.units) == 0:
        return lamp.missing("white", "the campaign holds no chromaticity of this lamp")
    steps = plane.tolerance_steps
    caption = _sentence(
        (
            lamp.clause("", "cct_k") + lamp.clause(", Duv ", "duv"),
            lamp.clause("colour consistency ", "sdcm")
            + (f"; the outline is drawn at {steps:g} steps" if steps else ""),
        ),
        "Chromaticity of the units.",
    )
    svg = draw_white_plane(plane, caption, lamp.palette)
    return Drawing("white", DRAWING_HEADINGS["white"], caption, svg, white_table(plane))


def _harmonics(lamp: _Lamp) -> Drawing:
    comb = lamp.curves.harmonics
    if comb is None:
        return lamp.missing("harmonics", "the campaign holds no mains capture of this lamp")
    comb = _limited(comb, lamp.verdicts)
    over = [
        f"{order:.0f}"
        for order, value, limit in zip(comb.order, comb.percent, comb.limit_percent, strict=True)
        if value > limit  # a limit that is not a number is never passed
    ]
    limited = any(limit == limit for limit in comb.limit_percent)  # noqa: PLR0124 - not-a-number
    caption = _sentence(
        (
            lamp.clause("current THD ", "thd_current_percent"),
            f"above the limit: order {', '.join(over)}" if over else "",
            HARMONICS_WITHIN if limited and not over else "",
        ),
        "Harmonics of the current of one unit.",
    )
    svg = draw_harmonics_comb(comb, caption, lamp.palette)
    return Drawing("harmonics", DRAWING_HEADINGS["harmonics"], caption, svg, harmonics_table(comb))


def _limited(comb: HarmonicComb, verdicts: Iterable[Verdict]) -> HarmonicComb:
    """Add the limits that verdicts on the current give: each clause that of its nearest order.

    A limit in another unit than percent of the fundamental is as far from its value there.
    """
    limits = np.array(comb.limit_percent)
    for item in verdicts:
        found = _HARMONIC.fullmatch(item.quantity)
        if found is None or not isinstance(item.limit, Decimal):
            continue
        at = comb.order == float(found["order"])
        if found["unit"] == "percent":
            limits[at] = np.fmin(limits[at], float(item.limit))
        elif isinstance(item.value, Decimal) and item.value:
            limits[at] = np.fmin(limits[at], comb.percent[at] * float(item.limit / item.value))
    return dataclasses.replace(comb, limit_percent=limits)


def _ageing(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.ageing
    if curve is None or len(curve.hours_h) == 0:
        return lamp.missing("ageing", "the campaign holds no endurance test of this lamp")
    asked = next((item for item in lamp.verdicts if item.clause == _MAINTENANCE), None)
    if asked is not None and isinstance(asked.limit, Decimal):
        curve = dataclasses.replace(curve, limit_hours_h=_ENDURANCE_H, limit=float(asked.limit))
    caption = _sentence(
        (
            lamp.clause("lumen maintenance factor ", "lumen_maintenance_factor"),
            lamp.clause("70 % of the initial flux after ", "l70_projected_h", ", projected"),
            _unprojected(lamp),
        ),
        "Luminous flux of the units in the endurance test.",
    )
    svg = draw_ageing_chart(curve, caption, lamp.palette)
    return Drawing("ageing", DRAWING_HEADINGS["ageing"], caption, svg, ageing_table(curve))


def _unprojected(lamp: _Lamp) -> str:
    """Say why nothing is projected; empty where something is."""
    figure = lamp.figure("l70_projected_h")
    if figure is None or figure.value is not None or not figure.reason:
        return ""
    return NOT_PROJECTED.format(reason=figure.reason)


def _intensity(lamp: _Lamp) -> Drawing:
    planes = lamp.curves.intensity
    if not planes:
        return lamp.missing("intensity", "the campaign holds no intensity distribution")
    caption = _sentence(
        (lamp.clause("peak ", "peak_intensity_cd"), lamp.clause("beam angle ", "beam_angle_deg")),
        "Luminous intensity of one unit.",
    )
    svg = draw_polar_intensity(planes, caption, lamp.palette)
    return Drawing(
        "intensity", DRAWING_HEADINGS["intensity"], caption, svg, intensity_table(planes)
    )
