"""The chart room: shapes against closed forms, titles, thinning, scales."""

import warnings
import xml.etree.ElementTree as ET

import numpy as np
import pytest

from generator.language import say
from generator.language.messages import spoken_by
from generator.records.curves import (
    AgeingCurve,
    IntensityCurve,
    LightCurve,
    LowRiskLine,
    MainsCurve,
    SpectrumCurve,
    WhitePlane,
)
from generator.sheets.drawings.ageing_chart import ageing_table, draw_ageing_chart
from generator.sheets.drawings.axes import Scale, label, ticks
from generator.sheets.drawings.class_arrow import CLASS_COLOURS, draw_class_arrow
from generator.sheets.drawings.colour_strip import draw_colour_strip
from generator.sheets.drawings.mains_cycle import draw_mains_cycle, mains_table
from generator.sheets.drawings.margin_ruler import Distance, draw_margin_ruler, place
from generator.sheets.drawings.modulation_plane import draw_modulation_plane
from generator.sheets.drawings.modulation_trace import above_mean, draw_modulation_trace
from generator.sheets.drawings.polar_intensity import draw_polar_intensity, intensity_table
from generator.sheets.drawings.rendering_comb import draw_rendering_comb
from generator.sheets.drawings.silhouette import draw_silhouette, lamp_shape
from generator.sheets.drawings.spectral_colour import (
    hue_colour,
    matching_functions,
    spectrum_colour,
    wavelength_colour,
)
from generator.sheets.drawings.spectrum_plate import draw_spectrum_plate, spectrum_table
from generator.sheets.drawings.svg import MOST_POINTS, Canvas, coordinate, thinned
from generator.sheets.drawings.watt_strip import WattShares, draw_watt_strip
from generator.sheets.drawings.white_plane import draw_white_plane, white_table
from generator.sheets.themes import palette

SVG = "{http://www.w3.org/2000/svg}"
TENDER = palette("tender")


def _root(svg):
    root = ET.fromstring(svg)  # noqa: S314 - our own drawing
    assert root[0].tag == f"{SVG}title"
    assert root[1].attrib["font-family"] == "Sheet Sans"
    return root


def _channels(colour):
    return [int(colour[at : at + 2], 16) for at in (1, 3, 5)]


def test_coordinates_have_one_decimal_at_the_most():
    assert [coordinate(value) for value in (1.0, -0.04, 2.25, 10.06)] == ["1", "0", "2.2", "10.1"]


def test_thinning_keeps_ends_corners_and_a_single_spike():
    x = np.linspace(0, 400, 20_001)
    y = np.sin(x)
    y[7_777] = 50.0
    kept = thinned(np.column_stack([x, y]))
    assert len(kept) <= MOST_POINTS
    assert kept[0, 0] == 0
    assert kept[-1, 0] == 400
    assert kept[:, 1].max() == 50.0


def test_a_straight_line_needs_its_ends_alone():
    x = np.linspace(0, 10, 500)
    assert len(thinned(np.column_stack([x, 3 * x]))) == 2


def test_ticks_are_round_and_inside():
    assert ticks(0, 100, 6) == (0, 20, 40, 60, 80, 100)
    assert ticks(-1.3, 1.3, 4) == (-1, 0, 1)
    assert label(-0.5) == "\u22120.5"


def test_long_ticks_have_their_thousands_apart():
    texts = [label(value) for value in (1000.0, 10000.0, -100000.0, 0.25)]
    assert texts == ["1000", "10\u00a0000", "\u2212100\u00a0000", "0.25"]


def test_logarithmic_scale_gives_equal_ratios_equal_lengths():
    scale = Scale(10, 1000, 0, 100, logarithmic=True)
    assert scale(100) == pytest.approx(50)


def test_limit_stands_still_and_passing_is_on_the_right():
    assert place(0.1) > place(0) > place(-0.1)
    # Square-root scale: a quarter of the limit lies half as far as the whole.
    assert (place(0.25) - place(0)) == pytest.approx((place(1.0) - place(0)) / 2)
    assert place(7) == place(1.0)


@pytest.mark.parametrize(("margin", "shape"), [(0.03, "rect"), (3.0, "path"), (-0.9, "path")])
def test_ruler_marks_value_or_says_that_it_lies_beyond(margin, shape):
    root = _root(draw_margin_ruler(Distance(margin, 0.01), "good", "Ra 82 & more", TENDER))
    assert root[0].text == "Ra 82 & more"
    assert root[1][-1].tag == f"{SVG}{shape}"


def test_declared_value_is_a_ring_beside_the_tick():
    both = _root(draw_margin_ruler(Distance(0.1), "good", "both", TENDER, declared=Distance(0.0)))
    ring = both.find(f".//{SVG}circle")
    assert float(ring.attrib["cx"]) == pytest.approx(place(0), abs=0.05)
    assert ring.attrib["fill"] == "none"
    alone = _root(draw_margin_ruler(None, "open", "declared", TENDER, declared=Distance(0.2)))
    assert alone.find(f".//{SVG}rect") is None


@pytest.mark.parametrize(
    ("cap", "directional", "shape"),
    [
        ("E27", False, "bulb"),
        ("B22d", None, "bulb"),
        ("E14", False, "candle"),
        ("E27", True, "flood"),
        ("GU10", True, "spot"),
        ("GU5.3", True, "spot"),
        ("G53", True, "dish"),
        ("G13", False, "tube"),
        ("G9", False, "capsule"),
        ("", None, "plain"),
    ],
)
def test_silhouette_follows_cap_and_kind(cap, directional, shape):
    assert lamp_shape(cap, directional=directional) == shape
    root = _root(draw_silhouette(cap, directional=directional, title="outline", palette=TENDER))
    assert root[0].text == "outline"
    assert len(list(root.iter())) < 20


def test_class_arrow_has_the_colours_of_the_act():
    # Regulation (EU) 2019/2015, Annex III, point 2.3(e): cyan, magenta, yellow, black in percent;
    # 255 (1 - c)(1 - k) per channel.
    inks = {"A": (100, 0, 100), "B": (70, 0, 100), "C": (30, 0, 100), "D": (0, 0, 100)}
    inks |= {"E": (0, 30, 100), "F": (0, 70, 100), "G": (0, 100, 100)}
    for letter, ink in inks.items():
        channels = [int(CLASS_COLOURS[letter][at : at + 2], 16) for at in (1, 3, 5)]
        assert channels == pytest.approx([255 * (1 - part / 100) for part in ink], abs=0.5)
        root = _root(draw_class_arrow(letter, f"class {letter}", TENDER))
        assert [text.text for text in root.iter(f"{SVG}text")] == ["A", "G", letter]
        assert all("class" not in part.attrib for part in root[1].iter())
    assert draw_class_arrow("A+", "no class", TENDER) == ""


def test_shaded_area_is_the_flicker_index():
    # Closed form: light 1 + m sin has a flicker index of m / pi.
    depth = 0.42
    t = np.linspace(0, 20, 2001)
    line = np.column_stack([t, 1 + depth * np.sin(2 * np.pi * t / 10 + 0.3)])
    area = sum(
        abs(np.sum(p[:, 0] * np.roll(p[:, 1], -1) - np.roll(p[:, 0], -1) * p[:, 1])) / 2
        for p in above_mean(line, 1.0)
    )
    assert area / 20 == pytest.approx(depth / np.pi, rel=1e-4)  # polygon of 2000 chords


def test_steady_light_has_nothing_to_shade_and_still_draws():
    t = np.linspace(0, 20, 100)
    curve = LightCurve(t, np.ones_like(t), 10.0)
    assert above_mean(np.column_stack([t, curve.light]), 1.0) == []
    _root(draw_modulation_trace(curve, "", "steady", TENDER))


def test_matching_functions_fit_the_published_tables():
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        import colour
    table = colour.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"].copy()
    table = table.align(colour.SpectralShape(400, 700, 5))
    difference = np.abs(matching_functions(table.wavelengths) - table.values).max()
    assert difference < 0.03  # the fit is for drawing; peaks are about 1.8


def test_colours_look_like_their_wavelengths():
    red, green, blue = (_channels(wavelength_colour(nm)) for nm in (630, 530, 455))
    assert np.argmax(red) == 0
    assert np.argmax(green) == 1
    assert np.argmax(blue) == 2
    assert max(_channels(wavelength_colour(770))) < max(red)
    grid = np.arange(380.0, 781.0, 5)
    white = _channels(spectrum_colour(grid, np.ones_like(grid)))
    assert min(white) > 200
    assert np.argmax(_channels(hue_colour(20))) == 0


def test_spectrum_plate_keeps_its_cut_and_its_table_adds_up():
    nm = np.arange(380.0, 781.0, 5)
    blue, yellow = np.exp(-(((nm - 450) / 12) ** 2)), np.exp(-(((nm - 590) / 70) ** 2))
    curve = SpectrumCurve(nm, blue + yellow, "relative", blue, yellow)
    root = _root(draw_spectrum_plate(curve, "450 nm", ("CCT 2700 K",), "a & b", TENDER, key="L-1"))
    assert root.find(f".//{SVG}linearGradient").attrib["id"] == "light-L-1"
    rows = [tuple(map(float, row)) for row in spectrum_table(curve).rows]
    assert all(row[1] == pytest.approx(row[2] + row[3], abs=0.011) for row in rows)


def test_relative_spectrum_with_negative_noise_is_drawn():
    nm = np.arange(380.0, 781.0, 5)
    curve = SpectrumCurve(nm, np.exp(-(((nm - 590) / 40) ** 2)) - 1e-4, "relative")
    _root(draw_spectrum_plate(curve, "", (), "peak", TENDER, key="x"))


def test_mains_table_follows_the_sine():
    phase = np.linspace(0, 360, 721)
    volts = 325 * np.sin(np.deg2rad(phase))
    curve = MainsCurve(phase, volts, volts / 1000, 0.0)
    _root(draw_mains_cycle(curve, "", "in phase", TENDER))
    by_phase = {row[0]: row for row in mains_table(curve).rows}
    assert by_phase["90"] == ("90", "325.0", "325.0")
    assert by_phase["270"] == ("270", "\u2212325.0", "\u2212325.0")


def test_comb_goes_below_nought_and_leaves_gaps():
    values = [90.0] * 8 + [-35.0, None, 70.0, 60.0, 80.0, 95.0, 75.0]
    labels = ["" if value is None else f"{value:.0f}" for value in values]
    root = _root(draw_rendering_comb(values, labels, 82.0, "R9 negative", TENDER))
    assert len(root.findall(f".//{SVG}rect")) == 14


def test_colours_are_roles_and_never_style_attributes():
    canvas = Canvas(10, 10, TENDER)
    canvas.line((0, 0), (1, 1), "good")
    canvas.text((0, 0), "<b>&")
    svg = canvas.finish("t")
    assert f'class="s-good" fill="none" stroke="{TENDER["good"]}"' in svg
    assert "&lt;b&gt;&amp;" in svg
    assert "style" not in svg


def test_dot_of_the_modulation_plane_lies_above_the_line_where_it_should():
    line = LowRiskLine(np.array([1.0, 10000.0]), np.array([0.1, 1000.0]), "x")
    heights = []
    for depth in (50.0, 1.0):
        root = _root(draw_modulation_plane(line, (100.0, depth), "", "dot", TENDER))
        heights.append(float(root.find(f".//{SVG}circle").attrib["cy"]))
    # The line passes 10 % at 100 Hz (straight on logarithmic axes), half way up three decades.
    middle = 18 + (190 - 32 - 18) / 3
    assert heights[0] < middle < heights[1]


def test_watt_strip_is_as_long_as_the_power():
    shares = WattShares(0.3, 0.2, 0.14, "#2040ff", "#ffd080")
    root = _root(draw_watt_strip(shares, ("8 W", "2.4 W", "800 lm", "rest"), "t", TENDER))
    widths = [float(part.attrib["width"]) for part in root.iter(f"{SVG}rect")]
    assert widths == pytest.approx([440 * 0.06, 440 * 0.24, 440 * 0.7], abs=0.1)


def test_ageing_without_fit_or_limit_still_draws():
    curve = AgeingCurve(np.array([0.0, 0, 1000, 1000]), np.array([1.0, 1.0, 0.98, 0.96]))
    _root(draw_ageing_chart(curve, "readings", TENDER))
    assert ageing_table(curve).rows == (("0", "1.000"), ("1000", "0.970"))


def test_polar_curve_points_down_along_the_axis():
    angle = np.linspace(-180, 180, 73)
    beam = IntensityCurve(angle, np.where(np.abs(angle) < 30, 100.0, 1.0), "C0-C180")
    _root(draw_polar_intensity((beam,), "beam", TENDER))
    rows = dict(intensity_table((beam,)).rows)
    assert rows["0"] == "100.0"
    assert rows["\u2212180"] == "1.0"


def test_white_plane_keeps_one_scale_both_ways():
    circle = np.linspace(0, 2 * np.pi, 100)
    centre = np.array([0.45, 0.41])
    outline = centre + 0.01 * np.column_stack([np.cos(circle), np.sin(circle)])
    plane = WhitePlane(
        "xy", ("u1",), centre[None, :], outline, np.linspace(2500, 3000, 100), centre, "c", outline
    )
    root = _root(draw_white_plane(plane, "one unit", TENDER))
    data = next(p.attrib["d"] for p in root.iter(f"{SVG}path") if p.attrib["d"].endswith("Z"))
    points = np.array([pair.split() for pair in data[1:-1].split("L")], float)
    wide, high = np.ptp(points, axis=0)
    assert wide == pytest.approx(high, rel=0.01)  # a circle stays a circle; pixels have one decimal
    assert white_table(plane).rows == (("u1", "0.4500", "0.4100"),)


def test_colour_strip_draws_what_is_known():
    shifts = [5.0, None] * 8
    root = _root(draw_colour_strip(shifts, [80.0] * 16, "shift", TENDER))
    assert len(root.findall(f".//{SVG}rect")) == 16 + 8 + 16


def test_numbers_hang_clear_of_the_teeth_where_words_are_large():
    """On a narrow screen words are 13 units high, digits about nine of them."""
    root = _root(draw_colour_strip([None] * 16, [40.0] * 16, "shift", TENDER))
    teeth = root.findall(f".//{SVG}rect")[-16:]
    foot = max(float(tooth.get("y")) + float(tooth.get("height")) for tooth in teeth)
    number = next(text for text in root.iter(f"{SVG}text") if text.text == "40")
    assert foot + 11 <= float(number.get("y")) <= 190


def test_words_and_numbers_of_a_drawing_are_said_in_the_language():
    class Speaker:
        def pattern(self, message):
            return "Lichtstrom & Zeit" if message.singular == "operating time, h" else "…"

        def number(self, text):
            return text.replace(".", ",")

        def day(self, day):
            return day.isoformat()

    curve = AgeingCurve(np.array([0.0, 3000.0]), np.array([1.0, 0.95]))
    with spoken_by(Speaker()):
        svg = draw_ageing_chart(curve, say("the finding"), TENDER)
        rows = ageing_table(curve).rows
    words = [element.text for element in _root(svg).iter() if element.text]
    assert "Lichtstrom & Zeit" in words
    assert "0,95" in words
    assert "the finding" not in words
    assert rows == (("0", "1,000"), ("3000", "0,950"))
