"""The drawings of one lamp: what each shows, the finding it states, and the table behind it."""

from __future__ import annotations

import dataclasses
from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal

from generator.language import SEMICOLON, Message, joined, say, say_as, sentence
from generator.records.assessment import Assessment
from generator.records.curves import LampCurves, SpectrumCurve
from generator.records.figure import Figure, FigureSet
from generator.records.harmonic_table import HarmonicTable
from generator.records.verdict import Verdict
from generator.sheets.drawings.ageing_chart import ageing_table, draw_ageing_chart
from generator.sheets.drawings.colour_strip import draw_colour_strip
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
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
from generator.sheets.harmonics_drawing import harmonics_drawing
from generator.sheets.lamp_words import NOT_PROJECTED
from generator.sheets.words import DRAWING_HEADINGS

__all__ = ["lamp_drawings"]

_PLAIN_EMITTER, _PLAIN_PHOSPHOR = "#7a93d6", "#e8d48a"
_MAINTENANCE = "eu-2019-2020-lumen-maintenance"
_ENDURANCE_H = 3000.0  # length of the endurance test; eu_2019_2020, Annex V
_LUMENS_PER_WATT = 683.0  # luminous efficacy at 540 THz, by definition of the lumen
_MODULATION = {"depth": "percent_flicker", "frequency": "flicker_frequency_hz"}

_NO_SPECTRUM = say("the campaign holds no spectrum of this lamp")
_NO_CAPTURE = say("the campaign holds no mains capture of this lamp")
_LEADS = say("the current leads by {shift}")
_LAGS = say("the current lags by {shift}")
_FIGURE_HEADINGS = (
    say_as("column of figures", "quantity"),
    say_as("column of figures", "value"),
    say("uncertainty (k = 2)"),
    say_as("column of figures", "grade"),
)


@dataclass(frozen=True, slots=True)
class _Lamp:
    """The figures of one lamp, by name."""

    figures: FigureSet
    verdicts: tuple[Verdict, ...]
    lamp_id: str
    curves: LampCurves
    harmonic_table: HarmonicTable
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

    def clause(self, pattern: Message, **names: str) -> str:
        """A clause with figures in its places, or empty where one of them has no number."""
        texts = {place: self.text(name) for place, name in names.items()}
        return pattern.format(**texts) if all(texts.values()) else ""

    def missing(self, key: str, otherwise: str) -> Drawing:
        """Say why there is nothing to draw."""
        reason = self.curves.missing.get(key, otherwise)
        return Drawing(key, DRAWING_HEADINGS[key], say("Not drawn: {reason}.", reason=reason))


def _sentence(parts: Iterable[str], otherwise: str) -> str:
    found = [part for part in parts if part]
    return sentence(joined(SEMICOLON, found)) if found else otherwise


def lamp_drawings(
    assessment: Assessment,
    lamp_id: str,
    curves: LampCurves,
    harmonic_table: HarmonicTable,
    palette: Palette,
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
    harmonic_table
        The limits of its harmonics.
    palette
        Colours of the theme.

    Returns
    -------
    tuple of Drawing
        One per kind; where there is nothing to draw, the drawing says why.
    """
    verdicts = assessment.verdicts_of(lamp_id)
    lamp = _Lamp(assessment.figures, verdicts, lamp_id, curves, harmonic_table, palette)
    makers = (
        *(_spectrum, _white, _rendering, _hues, _light, _plane),
        *(_mains, _harmonics, _watts, _ageing, _intensity),
    )
    return tuple(maker(lamp) for maker in makers)


def _spectrum(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.spectrum
    if curve is None:
        return lamp.missing("spectrum", _NO_SPECTRUM)
    emitter = {"peak": "emitter_peak_nm", "energy": "emitter_photon_energy_ev"}
    caption = _sentence(
        (
            lamp.clause(say("blue emitter at {peak} ({energy})"), **emitter)
            or lamp.clause(say("blue emitter at {peak}"), peak="emitter_peak_nm")
            or lamp.clause(say("peak at {peak}"), peak="peak_wavelength_nm"),
            lamp.clause(say("{cct}, Duv {duv}"), cct="cct_k", duv="duv") or lamp.text("cct_k"),
            lamp.clause(
                say("efficacy can never pass {limit}, the luminous efficacy of this radiation"),
                limit="ler_lm_per_w",
            ),
        ),
        say("Mean spectrum of the units."),
    )
    label = (
        lamp.clause(say("{peak} ({energy})"), **emitter)
        or lamp.text("emitter_peak_nm")
        or lamp.text("peak_wavelength_nm")
    )
    whites = (lamp.clause(say("CCT {cct}"), cct="cct_k"), lamp.clause(say("Duv {duv}"), duv="duv"))
    white = tuple(text for text in whites if text)
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
        return lamp.missing("watts", say("it takes the power and an absolute spectrum"))
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
            lamp.clause(
                say("of {power}, {light} leave as light"), power="power_w", light="radiant_flux_w"
            ),
            lamp.clause(say("the eye counts {flux}"), flux="luminous_flux_lm"),
        ),
        "",
    )
    words = (
        lamp.clause(say("{power} from the mains"), power="power_w"),
        lamp.clause(say("{light} of light"), light="radiant_flux_w"),
        lamp.clause(say("{flux}: what the eye can use"), flux="luminous_flux_lm"),
        say("heat and other losses"),
    )
    svg = draw_watt_strip(shares, words, caption, lamp.palette)
    names = ("power_w", "radiant_flux_w", "radiant_efficiency", "emitter_fraction")
    table = _figure_table(lamp, (*names, "luminous_flux_lm"))
    return Drawing("watts", DRAWING_HEADINGS["watts"], caption, svg, table)


def _figure_table(lamp: _Lamp, names: Iterable[str]) -> DataTable:
    texts = [figure_text(lamp.figure(name), name) for name in names]
    rows = tuple((text.label, phrase(text), text.uncertainty, text.grade) for text in texts)
    return DataTable(_FIGURE_HEADINGS, rows)


def _light(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.light
    if curve is None:
        return lamp.missing("light", say("the campaign holds no light record of this lamp"))
    caption = _sentence(
        (
            lamp.clause(say("percent flicker {depth} at {frequency}"), **_MODULATION)
            or lamp.clause(say("percent flicker {depth}"), depth="percent_flicker"),
            lamp.clause(
                say("flicker index {index}, the shaded share of the area"), index="flicker_index"
            ),
        ),
        say("Light of one unit."),
    )
    index = lamp.clause(
        say("shaded area over whole area = flicker index {index}"), index="flicker_index"
    )
    svg = draw_modulation_trace(curve, index, caption, lamp.palette)
    return Drawing("light", DRAWING_HEADINGS["light"], caption, svg, modulation_table(curve))


def _plane(lamp: _Lamp) -> Drawing:
    line = lamp.curves.low_risk
    frequency, depth = lamp.number("flicker_frequency_hz"), lamp.number("percent_flicker")
    if line is None or frequency is None or depth is None:
        return lamp.missing("plane", say("it takes the frequency and the depth of the modulation"))
    limit = lamp.number("low_risk_modulation_percent")
    where = say("{depth} at {frequency}")
    if limit is not None and depth > limit:
        where = say("{depth} at {frequency} above the low-risk line")
    elif limit is not None:
        where = say("{depth} at {frequency} on the low-risk side of the line")
    caption = _sentence(
        (
            lamp.clause(where, **_MODULATION),
            lamp.clause(say("low risk ends at {limit} there"), limit="low_risk_modulation_percent"),
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
        return lamp.missing("mains", _NO_CAPTURE)
    shift, shift_label = curve.current_phase_deg, ""
    factor: str = lamp.clause(say("displacement factor {factor}"), factor="displacement_factor")
    if shift is not None and abs(round(shift)) >= 1:
        shift_label = f"{abs(round(shift))}°"
        order = _LEADS if shift < 0 else _LAGS
        factor = joined(", ", [part for part in (factor, order.format(shift=shift_label)) if part])
    caption = _sentence(
        (
            lamp.clause(say("power factor {factor}"), factor="power_factor"),
            factor,
            lamp.clause(say("current THD {thd}"), thd="thd_current_percent"),
        ),
        say("Voltage and current of one unit."),
    )
    svg = draw_mains_cycle(curve, shift_label, caption, lamp.palette)
    return Drawing("mains", DRAWING_HEADINGS["mains"], caption, svg, mains_table(curve))


def _floats(lamp: _Lamp, names: Iterable[str]) -> list[float | None]:
    return [lamp.number(name) for name in names]


def _rendering(lamp: _Lamp) -> Drawing:
    names = [f"r{order}" for order in range(1, 16)]
    indices = _floats(lamp, names)
    if all(value is None for value in indices[:8]):
        return lamp.missing("rendering", _NO_SPECTRUM)
    labels = [lamp.text(name) for name in names]
    known = [(value, place) for place, value in enumerate(indices, 1) if value is not None]
    weakest = min(known)[1]
    caption = _sentence(
        (
            lamp.clause(say("Ra {ra}, the mean of R1 to R8"), ra="ra"),
            lamp.clause(say("R9, saturated red, {index}"), index="r9"),
            ""
            if weakest == 9
            else say("weakest R{order} at {index}", order=weakest, index=labels[weakest - 1]),
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
        return lamp.missing("hues", _NO_SPECTRUM)
    reds = lamp.clause(say("reds (bin 1) shift in chroma by {shift}"), shift="rcs_h1")
    indices = lamp.clause(say("fidelity Rf {rf}, gamut Rg {rg}"), rf="rf", rg="rg")
    caption = _sentence((indices or lamp.clause(say("fidelity Rf {rf}"), rf="rf"), reds), "")
    svg = draw_colour_strip(shifts, fidelity, caption, lamp.palette)
    rows = tuple(
        (str(order), lamp.text(f"rcs_h{order}"), lamp.text(f"rf_h{order}")) for order in bins
    )
    table = DataTable(
        (say("hue bin"), say("chroma shift"), say_as("colour rendering", "fidelity")), rows
    )
    return Drawing("hues", DRAWING_HEADINGS["hues"], caption, svg, table)


def _white(lamp: _Lamp) -> Drawing:
    plane = lamp.curves.white
    if plane is None or len(plane.units) == 0:
        return lamp.missing("white", say("the campaign holds no chromaticity of this lamp"))
    steps = plane.tolerance_steps
    caption = _sentence(
        (
            lamp.clause(say("{cct}, Duv {duv}"), cct="cct_k", duv="duv") or lamp.text("cct_k"),
            lamp.clause(say("colour consistency {steps}"), steps="sdcm"),
            say("the outline is drawn at {steps:g} steps", steps=steps) if steps else "",
        ),
        say("Chromaticity of the units."),
    )
    svg = draw_white_plane(plane, caption, lamp.palette)
    return Drawing("white", DRAWING_HEADINGS["white"], caption, svg, white_table(plane))


def _harmonics(lamp: _Lamp) -> Drawing:
    comb = lamp.curves.harmonics
    if comb is None:
        return lamp.missing("harmonics", _NO_CAPTURE)
    distortion = lamp.clause(say("current THD {thd}"), thd="thd_current_percent")
    return harmonics_drawing(comb, lamp.harmonic_table, distortion, lamp.palette)


def _ageing(lamp: _Lamp) -> Drawing:
    curve = lamp.curves.ageing
    if curve is None or len(curve.hours_h) == 0:
        return lamp.missing("ageing", say("the campaign holds no endurance test of this lamp"))
    asked = next((item for item in lamp.verdicts if item.clause == _MAINTENANCE), None)
    if asked is not None and isinstance(asked.limit, Decimal):
        curve = dataclasses.replace(curve, limit_hours_h=_ENDURANCE_H, limit=float(asked.limit))
    caption = _sentence(
        (
            lamp.clause(
                say("lumen maintenance factor {factor}"), factor="lumen_maintenance_factor"
            ),
            lamp.clause(
                say("70 % of the initial flux after {hours}, projected"), hours="l70_projected_h"
            ),
            _unprojected(lamp),
        ),
        say("Luminous flux of the units in the endurance test."),
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
        return lamp.missing("intensity", say("the campaign holds no intensity distribution"))
    caption = _sentence(
        (
            lamp.clause(say("peak {intensity}"), intensity="peak_intensity_cd"),
            lamp.clause(say("beam angle {angle}"), angle="beam_angle_deg"),
        ),
        say("Luminous intensity of one unit."),
    )
    svg = draw_polar_intensity(planes, caption, lamp.palette)
    return Drawing(
        "intensity", DRAWING_HEADINGS["intensity"], caption, svg, intensity_table(planes)
    )
