"""What the sheets say, before they are rendered."""

from dataclasses import replace
from decimal import Decimal

import pytest

from generator.errors import SheetError
from generator.language.speaking import speaking
from generator.records.comparison import SheetContext
from generator.records.figure import Figure, Grade
from generator.records.risk import CampaignRisk
from generator.records.verdict import Basis, Verdict, VerdictWord
from generator.sheets.comparison_sheet import describe_comparison
from generator.sheets.figure_text import figure_text, severest, verdict_text
from generator.sheets.html_sheet import render_html
from generator.sheets.lamp_sheet import describe_lamp
from generator.sheets.themes import palette


def _figure(**changes):
    fields = {"lamp_id": "L", "unit_id": "", "quantity": "ra", "value": Decimal("82.4149")}
    return Figure(**fields | {"grade": Grade.COMPUTED, "method": "m"} | changes)


def _verdict(**changes):
    fields = {
        "lamp_id": "L",
        "clause": "c",
        "title": "Colour rendering",
        "regime": "R",
        "quantity": "ra",
        "unit": "",
        "basis": Basis.DETERMINED,
        "value": Decimal("79.97"),
        "expanded_uncertainty": Decimal("1.5"),
        "limit": Decimal(80),
        "comparison": "at least",
        "margin": Decimal("-0.03"),
        "verdict": VerdictWord.FAIL,
        "source": "s",
        "status": "read",
    }
    return Verdict(**fields | changes)


def test_figure_with_uncertainty():
    text = figure_text(_figure(expanded_uncertainty=Decimal("1.5")), "ra")
    assert (text.number, text.uncertainty, text.grade) == ("82.4", "±\u00a01.5", "computed")


def test_declared_figure_is_shown_as_written():
    text = figure_text(_figure(value=Decimal("80.00"), grade=Grade.DECLARED), "ra")
    assert text.number == "80.00"


def test_a_class_is_declared_in_its_own_gender():
    """Una clase declarada, but un valor declarado: from memory."""
    declared = {"quantity": "energy_efficiency_class", "value": "F", "grade": Grade.DECLARED}
    with speaking("es"):
        text = figure_text(_figure(**declared), "energy_efficiency_class")
        value = figure_text(_figure(grade=Grade.DECLARED), "ra")
        assert (f"{text.grade}", f"{value.grade}") == ("declarada", "declarado")


def test_missing_figure_says_so_with_its_reason():
    text = figure_text(_figure(value=None, reason="clipped"), "ra")
    assert (text.number, text.reason, text.grade) == ("not measured", "clipped", "")
    assert figure_text(None, "ra").number == "not measured"


def test_verdict_shows_on_which_side_the_value_stands():
    text = verdict_text(_verdict(), palette("tender"))
    assert (text.value, text.limit, text.margin) == ("79.97", "≥\u00a080", "\u22120.03")
    assert "Colour rendering: 79.97 against ≥\u00a080, margin \u22120.03, fail" in text.ruler


def test_verdict_without_limit_has_no_ruler():
    text = verdict_text(
        _verdict(value=None, limit=None, margin=None, verdict=VerdictWord.NOT_APPLICABLE),
        palette("tender"),
    )
    assert (text.value, text.limit, text.margin, text.ruler) == ("", "", "", "")


def test_what_was_not_measured_shows_no_value():
    text = verdict_text(
        _verdict(limit=None, margin=None, unit="W", verdict=VerdictWord.NOT_MEASURED),
        palette("tender"),
    )
    assert (text.word, text.value, text.uncertainty, text.unit) == ("not measured", "", "", "")


def test_severest_of_equals_is_the_closest():
    near, far = _verdict(margin=Decimal(-8)), _verdict(margin=Decimal(-1))
    passed = _verdict(verdict=VerdictWord.PASS, margin=Decimal(1))
    assert severest([passed, far, near]) is near
    assert severest([]) is None


def test_class_is_shown_without_uncertainty_or_unit():
    text = verdict_text(_verdict(value="F", limit="F", margin=Decimal("8.6")), palette("tender"))
    assert (text.value, text.uncertainty, text.margin, text.limit) == ("F", "", "", "≥\u00a0F")


def test_value_in_a_range_is_told_from_both_ends():
    text = verdict_text(
        _verdict(
            value=Decimal("2430.4"),
            limit="2430 to 82000",
            comparison="within",
            quantity="cct_k",
            expanded_uncertainty=Decimal(40),
        ),
        palette("tender"),
    )
    assert (text.value, text.limit) == ("2430.4", "2430 to 82\u00a0000")


def test_rendering_indices_are_whole_numbers_and_r9_has_one_decimal_at_most():
    small = Decimal("0.004")
    first = figure_text(
        _figure(quantity="r1", value=Decimal("90.8312"), expanded_uncertainty=small), "r1"
    )
    ninth = figure_text(
        _figure(quantity="r9", value=Decimal("4.5097"), expanded_uncertainty=small), "r9"
    )
    assert (first.number, first.uncertainty) == ("91", "±\u00a01")
    assert (ninth.number, ninth.uncertainty) == ("4.5", "±\u00a00.1")


def test_photon_energy_has_three_decimals():
    text = figure_text(
        _figure(
            quantity="emitter_photon_energy_ev",
            value=Decimal("2.739712"),
            expanded_uncertainty=Decimal("0.0006"),
        ),
        "emitter_photon_energy_ev",
    )
    assert text.number == "2.740"


def test_lamp_sheet_answers_in_order(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    assert sheet.verdict_sentence == (
        "Fails 1 of 11 judgements. 1 cannot be told within the uncertainty. 2 not measured."
    )
    assert [item.figure.number for item in sheet.headlines] == [
        "98.4",
        "2718",
        "82.4",
        "42.1",
        "0.532",
    ]
    assert sheet.energy_class.words == "F declared"
    assert "<title>Energy efficiency class F on a scale" in sheet.energy_class.arrow
    assert sheet.silhouette.count("<title>Outline of a bulb, cap E27</title>") == 1
    assert sheet.verdicts[0].not_applicable[0].text == "the lamp is not connected"
    assert all(drawing.svg and drawing.table for drawing in sheet.drawings)
    assert "leads by 28°" in next(d.caption for d in sheet.drawings if d.key == "mains")
    assert sheet.frame.gaps == ("The light record is short. (light/L-01.csv)",)


def test_both_bases_of_a_clause_stand_in_one_row(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    act, buyer = sheet.verdicts
    assert act.heading == "Regulation (EU) 2019/2020, as amended by 2021/341"
    assert buyer.heading == "call for bids, asked by the buyer"
    rendering = next(item for item in act.clauses if item.clause == "eu-ra")
    assert rendering.place == "Annex II, point 2, Table 4"
    assert (rendering.declared.value, rendering.determined.value) == ("80", "82.4")
    assert "declared 80 against ≥\u00a080, margin 0.0, pass; determined 82.4" in rendering.ruler
    verified = next(item for item in act.clauses if item.clause == "eu-verification-ra")
    assert verified.place == "Annex IV, Table 6"
    assert verified.declared is None
    assert verified.determined.steps == (
        "Declared 80 with tolerance \u2212 2.0: at least 78.",
        "Determined value 82.41 (computed, mean of 3 units, U = 1.5).",
        "luminous flux = 802.0, x = 0.4636.",
    )
    limits = next(item for item in act.clauses if item.clause == "eu-svm")
    assert limits.notes == ("limit of 1 September 2024",)
    assert [item.title for item in sheet.shortfalls] == ["Stroboscopic effect, SVM", "Efficacy"]


def test_declared_stands_beside_determined(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    rows = {row.label: row for row in sheet.declared}
    cct = rows["correlated colour temperature"]
    assert (cct.declared, cct.determined, cct.difference) == ("2700", "2718", "+0.7\u00a0%")
    ra = rows["general colour rendering index"]
    assert (ra.allowed, ra.word) == ("≥\u00a078", "pass")
    assert rows["declared lifetime"].determined == "not measured"


def test_units_stand_one_by_one_with_mean_and_spread(invented_assessment, invented_context):
    units = describe_lamp(invented_assessment, "L-01", invented_context).units
    assert [head.label for head in units.headings] == ["Ra"]
    assert units.rows == (("1", "82.9"), ("2", "81.7"), ("3", "–"))
    assert units.summary == (("mean", "82.4"), ("s", "–"), ("U", "1.5"))
    assert describe_lamp(invented_assessment, "L-03", invented_context).units is None


def test_findings_methods_and_use_are_told(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    finding = sheet.findings[0]
    assert finding.severity == "contradiction"
    assert finding.compared == (
        "SVM declared as 0.4, best of 3 units 1.601; difference \u22121.20."
    )
    assert finding.source == "CIE 13.3, colour rendering, clause 5"
    assert sheet.methods[0].quantities == "CCT"
    assert "CIE 13.3" in sheet.methods[0].source
    # 8.2 W for 2000 h are 16.4 kWh; at 0.30 a kilowatt-hour 4.92.
    assert [(item.number, item.unit) for item in sheet.use] == [("16.4", "kWh"), ("4.92", "EUR")]
    assert "law book 0123456789ab)" in sheet.statements.law
    assert sheet.statements.decision.startswith("Simple acceptance")


def test_ageing_is_drawn_against_the_limit_of_the_verdict(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    ageing = next(item for item in sheet.drawings if item.key == "ageing")
    assert ">limit</text>" in ageing.svg


def test_lamp_without_data_says_what_is_missing(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-03", invented_context)
    assert sheet.verdict_sentence == "No clause could be judged."
    assert all(not drawing.svg for drawing in sheet.drawings)
    mains = next(d for d in sheet.drawings if d.key == "mains")
    assert mains.caption == "Not drawn: the capture was clipped."


def test_all_five_verdict_words_stand_in_the_fixture(invented_assessment):
    assert {item.verdict for item in invented_assessment.verdicts} == set(VerdictWord)


def test_comparison_counts_failing_lamps(invented_assessment, invented_context):
    sheet = describe_comparison(invented_assessment, invented_context)
    assert sheet.sentence == "3 lamps compared; 1 fails at least one clause."
    assert [row.lamp_id for row in sheet.rows] == ["L-01", "L-02", "L-03"]
    assert [
        column.key
        for column, cell in zip(sheet.columns, sheet.rows[0].cells, strict=True)
        if cell.best
    ] == ["ra"]


def test_comparison_needs_its_matrix(invented_assessment):
    with pytest.raises(SheetError, match="matrix"):
        describe_comparison(invented_assessment, SheetContext())


def test_unknown_theme_is_refused():
    with pytest.raises(SheetError, match="tender"):
        palette("no-such-theme")


def test_spread_has_two_decimals_more_than_the_value_at_most():
    text = figure_text(_figure(spread=Decimal("0.0000042")), "ra")
    assert text.detail == "standard deviation < 0.001; m"
    assert "standard deviation 0.6" in figure_text(_figure(spread=Decimal("0.574")), "ra").detail


def test_remarks_of_a_figure_are_fit_for_readers():
    text = figure_text(_figure(remarks=("R = 1.05 for a CRI of 87.77788.",)), "ra")
    assert text.detail == "m; R = 1.05 for a CRI of 87.78"


def test_risks_are_those_of_the_clauses_the_lamp_was_judged_by(
    invented_assessment, invented_context
):
    risks = tuple(
        CampaignRisk(
            clause, clause, "R", "", 3, None, None, None, "r", Decimal("0.01"), Decimal("0.02")
        )
        for clause in ("eu-ra", "eu-pnet", "no-such-clause")
    )
    sheet = describe_lamp(replace(invented_assessment, risks=risks), "L-01", invented_context)
    assert [row.title for row in sheet.statements.risks.largest] == ["eu-ra"]
    page = render_html(replace(sheet, frame=replace(sheet.frame, theme="laboratory")))
    assert "eu-ra (R, 3 lamps) 1.0\u00a0% and 2.0\u00a0%." in page
