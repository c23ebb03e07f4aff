"""The comb of harmonics: teeth, limits, caption and table."""

import re
from dataclasses import replace
from decimal import Decimal
from xml.etree import ElementTree as ET

import numpy as np
import pytest

from generator.records.curves import HarmonicComb
from generator.records.harmonic_table import HarmonicLimit, HarmonicTable
from generator.sheets import describe_lamp
from generator.sheets.harmonics_drawing import harmonics_drawing
from generator.sheets.themes import palette

SVG = "{http://www.w3.org/2000/svg}"
TENDER = palette("tender")
COMB = HarmonicComb(np.array([3.0, 5, 7]), np.array([20.0, 12, 5]))


def _limit(order, value, limit, status="quoted", comparison="at most"):
    share = Decimal(value) / Decimal(limit)
    return HarmonicLimit(
        f"h{order}_percent",
        "%",
        comparison,
        Decimal(limit),
        status,
        order,
        float(limit),
        Decimal(value),
        share if comparison == "at most" else 2 - share,
        share <= 1 if comparison == "at most" else share >= 1,
    )


def _table(*limits, **changed):
    table = HarmonicTable("Norm, Class C, Table 2", "Table 2", "quoted", limits=limits)
    return replace(table, **changed)


def _drawn(table):
    drawing = harmonics_drawing(COMB, table, "", TENDER)
    return drawing, ET.fromstring(drawing.svg)  # noqa: S314 - our own drawing


def test_a_harmonic_over_its_limit_stands_out():
    drawing, root = _drawn(_table(_limit(3, "20", "27"), _limit(5, "12", "10")))
    roles = [tooth.attrib["class"] for tooth in root.iter(f"{SVG}rect")]
    assert roles == ["f-accent", "f-bad", "f-accent"]
    assert drawing.table.rows[1] == ("5", "12.0", "10.0", "at most 10 %", "120", "quoted")
    assert drawing.table.rows[2] == ("7", "5.0", "none", "", "", "")
    assert drawing.table.headings[2] == "limit, % (Table 2)"


def test_the_text_read_aloud_carries_the_finding_and_the_table():
    drawing, root = _drawn(_table(_limit(3, "20", "27"), _limit(5, "12", "10")))
    assert root[0].text == drawing.caption
    assert drawing.caption.startswith(
        "Above the limit: order 5; order 5 reaches 120 % of its limit. "
        "Limits: Norm, Class C, Table 2, quoted from another publication"
    )
    kept, _ = _drawn(_table(_limit(3, "20", "27")))
    # 20 of 27 is 74.07 %.
    assert "order 3 is nearest to its limit, at 74 % of it" in kept.caption


def test_a_share_just_beyond_never_reads_as_a_hundred():
    drawing, _ = _drawn(_table(_limit(5, "10.01", "10")))
    assert "order 5 reaches 100.1 % of its limit" in drawing.caption


def test_all_limits_are_one_path():
    limits = [_limit(order, "1", "3") for order in range(11, 40, 2)]
    _, root = _drawn(_table(*limits))
    (steps,) = root.iter(f"{SVG}path")
    assert len(re.findall("M", steps.attrib["d"])) == len(limits)


def test_a_limit_that_is_not_confirmed_is_dashed_and_said():
    drawing, root = _drawn(_table(_limit(3, "20", "18", "unconfirmed"), _limit(5, "8", "10")))
    dashes = [step.attrib.get("stroke-dasharray") for step in root.iter(f"{SVG}path")]
    assert [dash is not None for dash in dashes] == [False, True]
    roles = [tooth.attrib["class"] for tooth in root.iter(f"{SVG}rect")]
    assert roles == ["f-open", "f-accent", "f-accent"]
    assert "Above a limit that is not confirmed: order 3" in drawing.caption
    assert "limit of order 3 not confirmed in any source" in drawing.caption
    assert [row[5] for row in drawing.table.rows] == ["unconfirmed", "quoted", ""]


def test_a_lower_limit_is_drawn_with_its_ends_up():
    drawing, root = _drawn(_table(_limit(3, "20", "25", comparison="at least")))
    (step,) = root.iter(f"{SVG}path")
    heights = [float(pair.split()[1]) for pair in re.split("[ML]", step.attrib["d"]) if pair]
    assert heights[0] == heights[3] < heights[1] == heights[2]
    assert "Below the lower limit: order 3" in drawing.caption
    assert drawing.table.rows[0][3:5] == ("at least 25 %", "not kept")


def test_limits_per_watt_say_how_they_are_drawn():
    # Made up: 1 mA/W is 22.8 % of the fundamental, so 3.4 mA/W is 77.5 %.
    item = HarmonicLimit(
        *("h3_ma_per_w", "mA/W", "at most", Decimal("3.4"), "quoted", 3, 77.52),
        *(Decimal("1.7"), Decimal("0.5"), True),
    )
    drawing, _ = _drawn(_table(item, option="A", percent_per_ma_per_w=22.8))
    assert "Limits: option A, Norm" in drawing.caption
    assert "limit × power / fundamental current, 1 mA/W being 22.8 % here" in drawing.caption
    assert drawing.table.rows[0][1:5] == ("20.0", "77.5", "at most 3.4 mA/W", "50")
    assert drawing.table.headings[2] == "limit, % (option A, Table 2)"


def test_an_angle_stands_below_the_orders():
    angle = HarmonicLimit(
        *("current_last_peak_deg", "°", "at most", Decimal(65), "quoted", None, None),
        *(Decimal(78), Decimal("1.2"), False),
    )
    drawing, _ = _drawn(_table(_limit(3, "20", "86"), angle, option="B", met=False))
    label, value, *limit = drawing.table.rows[-1]
    assert "last peak" in label
    assert (value, limit[0], limit[1]) == ("78 °", "", "at most 65 °")
    assert "no option holds, this one is the nearest" in drawing.caption


@pytest.mark.parametrize(
    ("changed", "words"),
    [
        ({"judged": False}, "not judged in this campaign"),
        ({"decided": False}, "not decided, for figures are missing"),
        ({"reason": "No limit below 5 W.", "limits": ()}, "Class C, Table 2, quoted from another"),
        ({"reason": "No limit below 5 W.", "limits": ()}, "No limit below 5 W."),
    ],
)
def test_what_else_a_reader_must_know(changed, words):
    drawing, _ = _drawn(_table(_limit(3, "20", "27"), **changed))
    assert words in drawing.caption


def test_the_sheet_draws_the_table_of_its_lamp(invented_assessment, invented_context):
    def comb(context):
        sheet = describe_lamp(invented_assessment, "L-02", context)
        return next(item for item in sheet.drawings if item.key == "harmonics")

    assert {len(row) for row in comb(invented_context).table.rows} == {2}
    # The invented lamp has 11 % in order 5.
    tables = {"L-02": _table(_limit(5, "11", "10"))}
    drawn = comb(replace(invented_context, harmonic_tables=tables))
    assert "above the limit: order 5" in drawn.caption
    assert "38.4" in drawn.caption


def test_a_limit_of_the_buyer_says_nothing_of_the_options():
    missed = _limit(3, "20", "1", status="buyer")
    twice = _limit(3, "20", "30", status="buyer", comparison="at least")
    drawing, _ = _drawn(_table(_limit(5, "12", "30"), missed, twice, option="A", met=True))
    assert "Above the limit: order 3" in drawing.caption
    assert "no option holds" not in drawing.caption
    assert "limit of order 3 asked by the buyer" in drawing.caption


def test_a_limit_without_a_value_is_not_said_to_be_kept():
    unknown = replace(_limit(5, "12", "30"), value=None, share=None, kept=None)
    drawing, _ = _drawn(_table(_limit(3, "20", "27"), unknown, decided=False))
    assert "every limit drawn is kept" not in drawing.caption


def test_limits_of_a_buyer_are_drawn_where_the_act_has_none():
    buyers = _limit(3, "20", "30", status="buyer")
    drawing, _ = _drawn(_table(buyers, reason="no limit up to 5 W", status="quoted"))
    assert "no limits drawn" not in drawing.caption.lower()
    assert "No limit up to 5 W" in drawing.caption
