"""The files of a tender: workbook against report by an engine of its own, letters, tables."""

from __future__ import annotations

import csv
import io
import re
import shutil
import subprocess
import warnings
import zipfile
from collections.abc import Iterator
from dataclasses import replace
from decimal import Decimal
from pathlib import Path
from typing import Any

import pytest

from generator import pipeline
from generator.datasets import sources
from generator.publish.tender_details import gate_rows, plain_text
from generator.publish.tender_files import tender_files
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.tender import Eligibility, Outcome, Question
from generator.sheets import (
    TenderDocument,
    describe_letters,
    describe_tender_report,
    page_place,
    render_html,
    render_pdf,
)

SETTINGS = """
[campaign]
title = "=1+1 a tender"
reference = "T-1"
assessment_date = 2026-03-02
spectra_unit = "relative"

[laboratory]
name = "Invented Laboratory"
accreditation = "invented"

[use]
hours_per_year = 2600
tariff_per_kwh = 0.31
currency = "EUR"
price_rise_percent = 1.5
discount_rate_percent = 3.5
years = 9
installation_cost_per_lamp = 1.25
replacement_labour_per_lamp = 3.10
maintenance_cost_per_lamp_year = 0.07
end_of_life_cost_per_lamp = 0.13
survival_stated_at_h = 3000
carbon_price_per_t = 80
baseline_lamp = "old"
tariff_uncertainty_percent = 10

[use.location_based]
g_per_kwh = 210
source = "invented"
year = 2025
region = "nowhere"

[award]
tie_rule = "lower price"
abnormally_low_percent = 40

[[award.criteria]]
quantity = "life_cycle_cost"
weight_percent = 55
better = "lower"

[[award.criteria]]
quantity = "ra"
weight_percent = 25
better = "higher"
method = "linear"
zero_score_at = 70
full_score_at = 100

[[award.criteria]]
quantity = "svm"
weight_percent = 20
better = "lower"
method = "steps"
steps = [{{ at = 0.2, score = 100 }}, {{ at = 0.4, score = 33.3 }}]

[tender]
accreditation_required = true
mandatory_clauses = ["own-ra"]
code_names = {code_names}
technical_part_closed = {closed}
trials = 400

[[clause]]
id = "own-ra"
title = "Colour rendering"
quantity = "ra"
comparison = "at least"
value = 80
source = {{ act = "T-1", annex = "A", point = "1" }}

[[lot]]
id = "one"
title = "-2+3 rooms"
quantity = 137
flux_per_point_lm = 700

[[lot]]
id = "two"
quantity = 50
flux_per_point_lm = 640
compare_at = "equal light"

[[existing_lamp]]
id = "old"
title = "Old lamp"
power_w = 45
life_h = 2000
luminous_flux_lm = 600
unit_price = 0.9

[[room]]
id = "r1"
title = "@room"
lot = "one"
points = 100
hours_per_year = 2000
existing_lamp = "old"
"""

LAMPS = [
    # lamp, bidder, model, lot, price, life, survival, report model
    ("a", '=HYPERLINK("http://x.invalid")', "+Model A", "one", "5.35", "9000", "0.91", "+Model A"),
    ("b", "@Brightside", "-Model B", "one", "3.95", "25000", "0.95", "-Model B"),
    ("c", "@Brightside", "=Model C", "two", "6.15", "7800", "1.00", ""),
    ("d", "Plain Lamps", "Model D", "two", "4.45", "30000", "0.90", "Model D"),
    ("e", "Plain Lamps", "Model E", "one", "9.99", "30000", "0.97", "Model E"),
]
UNITS = {
    # lamp: flux, power, Ra, SVM
    "a": (812, 7.31, 84.0, 0.31),
    "b": (774, 8.02, 91.0, 0.12),
    "c": (905, 8.87, 88.0, 0.39),
    "d": (698, 6.43, 82.0, 0.44),
    "e": (800, 7.00, 74.0, 0.10),
}
HEADING = (
    "lamp_id,bidder,model,lot,unit_price,currency,quantity,declared_l70b50_h,"
    "declared_survival_factor,report_no,report_date,report_model,mains,directional,connected"
)


def write_campaign(folder: Path, *, code_names: bool = False, closed: bool = False) -> Path:
    def word(value: bool) -> str:
        return str(value).lower()

    folder.mkdir()
    text = SETTINGS.format(code_names=word(code_names), closed=word(closed))
    (folder / "campaign.toml").write_text(text, encoding="utf-8")
    lamps = [HEADING]
    for name, bidder, model, lot, price, life, survival, report in LAMPS:
        quoted = '"' + bidder.replace('"', '""') + '"'
        lamps.append(
            f"{name},{quoted},{model},{lot},{price},EUR,137,{life},{survival},"
            f"R-{name},2026-01-10,{report},yes,no,no"
        )
    (folder / "lamps.csv").write_text("\n".join(lamps) + "\n", encoding="utf-8")
    units = ["unit_id,lamp_id,luminous_flux_lm,power_w,ra,svm,standby_power_w"]
    for name, (flux, power, ra, svm) in UNITS.items():
        for number in range(1, 4):
            shift = 1 + 0.004 * (number - 2)
            units.append(
                f"{name}-{number},{name},{flux * shift:.2f},{power * shift:.3f},{ra},{svm},0.21"
            )
    (folder / "units.csv").write_text("\n".join(units) + "\n", encoding="utf-8")
    return folder


def files_of(assessment: Assessment) -> dict[str, bytes]:
    """Data files and pages of a tender, by path inside the issue."""
    sheets = sheets_of(assessment)
    pages = {f"tender/{name}.html": document for name, document in sheets.items()}
    written = {
        name: render_html(page, page_place(name, "en", ("en",))).encode()
        for name, page in pages.items()
    }
    return written | dict(tender_files(assessment))


def sheets_of(assessment: Assessment, *, pdf: bool = False) -> dict[str, TenderDocument]:
    context = SheetContext(sources(), with_pdf=pdf)
    letters = describe_letters(assessment, context)
    return {
        "report": describe_tender_report(assessment, context),
        **{f"letters/{name}": letter for name, letter in letters.items()},
    }


@pytest.fixture(scope="module")
def tender_assessment(tmp_path_factory: pytest.TempPathFactory) -> Assessment:
    return pipeline.assess(write_campaign(tmp_path_factory.mktemp("tender") / "campaign"))


@pytest.fixture(scope="module")
def tender_output(tender_assessment: Assessment) -> dict[str, bytes]:
    return files_of(tender_assessment)


def recalculated(content: bytes, folder: Path) -> dict[str, dict[str, Any]]:
    """Values of every cell by sheet, from an engine that is none of ours."""
    import openpyxl

    path = folder / "workbook.xlsx"
    path.write_bytes(content)
    office = shutil.which("soffice") or shutil.which("libreoffice")
    if office:
        command = [office, "--headless", "--convert-to", "xlsx:Calc MS Excel 2007 XML"]
        made = folder / "made"
        subprocess.run(
            [*command, "--outdir", str(made), str(path)], check=True, capture_output=True
        )
        book = openpyxl.load_workbook(made / path.name, data_only=True)
        return {
            sheet.title: {cell.coordinate: cell.value for row in sheet.iter_rows() for cell in row}
            for sheet in book
        }
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # the library and what it imports warn of themselves
        import formulas

        solution = formulas.ExcelModel().loads(str(path)).finish().calculate()
    found: dict[str, dict[str, Any]] = {}
    for key, value in solution.items():
        match = re.fullmatch(r"'\[workbook\.xlsx\](.+)'!([A-Z]+[0-9]+)", str(key))
        if match:
            number = value.value[0, 0]
            found.setdefault(match[1].capitalize(), {})[match[2]] = number
    return found


def labelled(content: bytes, title: str) -> Iterator[tuple[str, list[str]]]:
    """Label of every row of a sheet, and the places of its other cells."""
    import openpyxl

    sheet = openpyxl.load_workbook(io.BytesIO(content))[title]
    for row in sheet.iter_rows():
        cells = [cell.coordinate for cell in row[1:] if cell.value is not None]
        yield str(row[0].value or ""), cells


@pytest.mark.slow
def test_workbook_totals_equal_report_totals_to_the_cent(
    tender_assessment: Assessment, tender_output: dict[str, bytes], tmp_path: Path
) -> None:
    """Recalculated by an independent engine; survival, carbon, renewals, equal light all move."""
    content = tender_output["tender/workbook.xlsx"]
    values = recalculated(content, tmp_path)
    assert tender_assessment.tender is not None
    report = tender_output["tender/report.html"].decode()
    for place, lot in enumerate(tender_assessment.tender.lots, start=1):
        title = f"Lot {place}"
        rows = dict(labelled(content, title))
        costs = [item.cost for item in lot.bids]
        assert None not in costs
        for cell, cost in zip(rows["Life-cycle cost"], costs, strict=True):
            total = Decimal(str(float(values[title][cell]))).quantize(Decimal("0.01"))
            assert cost is not None
            assert total == cost.total.quantize(Decimal("0.01"))
            assert f"{total:,}".replace(",", " ") in report.replace("\u00a0", " ") or (
                total < 10_000 and str(total) in report
            )
        for cell in rows["Difference"]:
            assert float(values[title][cell]) == pytest.approx(0, abs=1e-9)
        assert lot.award is not None
        scores = {item.lamp_id: item for item in lot.award.scores if item.rank is not None}
        ranked = [scores[i.bid.lamp_id] for i in lot.bids if i.bid.lamp_id in scores]
        assert ranked
        for cell, score in zip(rows["Total points"], ranked, strict=True):
            assert score.total is not None
            assert float(values[title][cell]) == pytest.approx(float(score.total), abs=1e-9)
        for cell, score in zip(rows["Rank"], ranked, strict=True):
            assert int(values[title][cell]) == score.rank
    lamps = dict(labelled(content, "Lot 2"))["Lamps, for equal light"]
    counted = [int(values["Lot 2"][cell]) for cell in lamps]
    expected = [i.cost.lamps for i in tender_assessment.tender.lots[1].bids if i.cost is not None]
    assert counted == expected
    assert len(set(counted)) > 1


def test_no_text_of_a_user_is_a_formula(tender_output: dict[str, bytes]) -> None:
    """Every formula cell begins as the program writes them, and none holds a word of a user."""
    import openpyxl

    book = openpyxl.load_workbook(io.BytesIO(tender_output["tender/workbook.xlsx"]))
    texts, formulas_found = [], []
    for sheet in book:
        for row in sheet.iter_rows():
            for cell in row:
                if cell.data_type == "f":
                    formulas_found.append(str(cell.value))
                elif isinstance(cell.value, str):
                    texts.append(cell)
    assert len(formulas_found) > 50
    allowed = r"=[A-Z0-9$!:+\-*/^(),.<>= ]*(Assumptions[A-Z0-9$!:+\-*/^(),.<>= ]*)*"
    assert [text for text in formulas_found if not re.fullmatch(allowed, text)] == []
    assert not any("HYPERLINK" in text or "HTTP" in text for text in formulas_found)
    hostile = [cell for cell in texts if cell.value.startswith(("=", "+", "-", "@"))]
    assert {cell.value.split(",")[0] for cell in hostile} == {
        '=HYPERLINK("http://x.invalid")',
        "@Brightside",
    }
    assert all(cell.data_type == "s" and cell.quotePrefix for cell in hostile)


TABLES = (
    *("bids", "cash_flows", "scores", "ranks", "plan"),
    *("gate", "assumptions", "emissions", "sensitivity", "lead"),
)


def table_of(output: dict[str, bytes], name: str) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(output[f"tender/{name}.csv"].decode())))


def test_detailed_tables_hold_what_the_tender_holds(
    tender_assessment: Assessment, tender_output: dict[str, bytes]
) -> None:
    """Everything that the report prints of a bid can be read from a table, unrounded."""
    tender = tender_assessment.tender
    assert tender is not None
    bids = [(lot, item) for lot in tender.lots for item in lot.bids]
    gates = [item.eligibility for _, item in bids]
    low = sum(len(lot.award.low_offers) for lot in tender.lots if lot.award)
    expected = sum(len(g.reasons) + len(g.questions) + len(g.passed) for g in gates) + low
    assert len(table_of(tender_output, "gate")) == expected > 0
    bars = table_of(tender_output, "sensitivity")
    assert [Decimal(row["high_cost"]) for row in bars] == [
        bar.high_cost for _, item in bids for bar in item.sensitivity
    ]
    emissions = table_of(tender_output, "emissions")
    assert {row["basis"] for row in emissions} >= {"location-based"}
    for row in emissions:
        energy = next(i.energy for _, i in bids if i.bid.lamp_id == row["lamp_id"])
        assert energy is not None
        tonnes = energy.total_kwh * Decimal(row["factor_g_per_kwh"]) / 10**6
        assert Decimal(row["tonnes_per_year"]) == tonnes
        assert row["factor_source"]
        assert row["factor_region"]
    lead = table_of(tender_output, "lead")
    assert sum(float(row["share"]) for row in lead if row["kind"] == "driver") > 0
    inputs = table_of(tender_output, "assumptions")
    assert {row["lamp_id"] for row in inputs} == set("abcde")
    flows = table_of(tender_output, "cash_flows")
    for lot in tender.lots:
        if lot.baseline is not None:
            names = (lot.lot, lot.baseline_lamp)
            own = [row for row in flows if (row["lot"], row["lamp_id"]) == names]
            assert sum(Decimal(row["present_value"]) for row in own) == lot.baseline.total


@pytest.mark.parametrize("hidden", [True, False])
def test_particulars_of_a_question_are_left_out_under_code_names(
    tender_assessment: Assessment, hidden: bool
) -> None:
    tender = tender_assessment.tender
    assert tender is not None
    asked = Question("evidence-model", "Model", "Which model is it?", "report: Model X")
    gate = Eligibility(Outcome.TO_CLARIFY, questions=(asked,))
    lot = tender.lots[0]
    lot = replace(lot, bids=(replace(lot.bids[0], eligibility=gate),), award=None)
    (row,) = gate_rows(replace(tender, lots=(lot,), under_codes=hidden), str)
    assert row["text"] == "Which model is it?" + ("" if hidden else " report: Model X")


def test_tables_hold_no_formula_and_every_bid(
    tender_assessment: Assessment, tender_output: dict[str, bytes]
) -> None:
    for name in TABLES:
        text = tender_output[f"tender/{name}.csv"].decode()
        rows = list(csv.DictReader(io.StringIO(text)))
        assert rows
        for row in rows:
            for value in row.values():
                assert not value.startswith(("=", "+", "@"))
                assert not value.startswith("-") or Decimal(value) < 0
    bids = list(csv.DictReader(io.StringIO(tender_output["tender/bids.csv"].decode())))
    assert {row["lamp_id"] for row in bids} == set("abcde")
    flows = list(csv.DictReader(io.StringIO(tender_output["tender/cash_flows.csv"].decode())))
    for row in bids:
        own = [
            Decimal(flow["present_value"]) for flow in flows if flow["lamp_id"] == row["lamp_id"]
        ]
        assert abs(sum(own) - Decimal(row["life_cycle_cost"])) <= Decimal("0.005")
    assert plain_text("-1 lamp") == "'-1 lamp"
    assert plain_text("lamp -1") == "lamp -1"


def test_the_same_tender_gives_the_same_bytes(
    tender_assessment: Assessment, tender_output: dict[str, bytes]
) -> None:
    again = files_of(tender_assessment)
    assert again == tender_output
    with zipfile.ZipFile(io.BytesIO(tender_output["tender/workbook.xlsx"])) as book:
        assert {entry.date_time for entry in book.infolist()} == {(1980, 1, 1, 0, 0, 0)}
        core = book.read("docProps/core.xml").decode()
        assert set(re.findall(r"\d{4}-\d\d-\d\dT[\d:]+Z", core)) == {"2026-03-02T00:00:00Z"}


def test_a_letter_shows_nothing_of_other_bids_but_rank_and_points(
    tender_assessment: Assessment, tender_output: dict[str, bytes]
) -> None:
    tender = tender_assessment.tender
    assert tender is not None
    letters = {name: text for name, text in tender_output.items() if "/letters/" in name}
    assert len(letters) == 3
    for lamp_id, _, model, lot, *_ in LAMPS:
        cost = next(
            item.cost for part in tender.lots for item in part.bids if item.bid.lamp_id == lamp_id
        )
        assert cost is not None
        own_name = f"tender/letters/bidder-{tender.codes[lamp_id].lower()}.html"
        total = f"{cost.total:.2f}"
        for name, content in letters.items():
            text = content.decode().replace("\u00a0", "")
            known = model.lstrip("+-=") in text
            assert known == (name == own_name), (lamp_id, name)
            if name != own_name:
                assert total not in text
                assert f"{cost.total:.4f}" not in text
        assert lot in letters[own_name].decode()
    plain = next(name for name in letters if "To Plain Lamps" in letters[name].decode())
    refused = letters[plain].decode()
    assert "This bid is not admissible" in refused
    assert "T-1" in refused


@pytest.mark.parametrize(("closed", "hidden"), [(False, True), (True, False)])
def test_code_names_until_the_technical_part_is_closed(
    tmp_path: Path, closed: bool, hidden: bool
) -> None:
    folder = write_campaign(tmp_path / "coded", code_names=True, closed=closed)
    assessment = pipeline.assess(folder)
    assert bool(assessment.shown_bidders) is hidden
    for name, content in files_of(assessment).items():
        if name.endswith(".xlsx"):
            with zipfile.ZipFile(io.BytesIO(content)) as book:
                content = b"".join(book.read(part) for part in book.namelist())  # noqa: PLW2901 - unpacked
        text = content.decode()
        words = ("Brightside", "Plain Lamps", "HYPERLINK", "Model A", "Model D")
        found = [word for word in words if word in text]
        if hidden:
            assert found == [], name
        elif name.endswith("report.html"):
            assert set(found) == set(words)


@pytest.mark.slow
def test_report_and_letters_on_paper(tender_assessment: Assessment) -> None:
    sheets = sheets_of(tender_assessment, pdf=True)
    assert set(sheets) == {"report", *(f"letters/bidder-{code}" for code in "abc")}
    assert all(render_pdf(sheet).startswith(b"%PDF-") for sheet in sheets.values())
    page = render_html(sheets["report"], page_place("tender/report.html", "en", ("en",)))
    assert 'href="report.pdf"' in page
    assert 'href="../tender/workbook.xlsx"' in page
    assert 'href="../assets/sheet.css"' in page
    files = files_of(tender_assessment)
    assert 'href="../../assets/sheet.css"' in files["tender/letters/bidder-a.html"].decode()


def test_a_campaign_without_tender_tables_prints_nothing_of_it(tmp_path: Path) -> None:
    folder = write_campaign(tmp_path / "plain")
    text = (folder / "campaign.toml").read_text(encoding="utf-8")
    (folder / "campaign.toml").write_text(text[: text.index("[use]")], encoding="utf-8")
    issued = pipeline.issue(folder, target=tmp_path / "out", pdf=False)
    assert not (issued.folder / "tender").exists()


@pytest.mark.parametrize(
    ("file", "old", "new", "column"),
    [
        ("campaign.toml", "weight_percent = 20", "weight_percent = 25", "award.criteria"),
        ("campaign.toml", "= 3.5\n", "= 350\n", "use.discount_rate_percent"),
        ("campaign.toml", 'id = "two"', 'id = "three"', None),
        ("campaign.toml", 'lot = "one"', 'lot = "moon"', "room.1.lot"),
        ("campaign.toml", '["own-ra"]', '["own-rb"]', "tender.mandatory_clauses"),
        ("lamps.csv", ",one,3.95,", ",moon,3.95,", "lot"),
        ("lamps.csv", ",one,3.95,", ",one,-3.95,", "unit_price"),
        ("lamps.csv", ",3.95,EUR,", ",3.95,SEK,", "currency"),
    ],
)
def test_check_refuses_with_file_key_and_line(
    tmp_path: Path, file: str, old: str, new: str, column: str | None
) -> None:
    folder = write_campaign(tmp_path / "broken")
    text = (folder / file).read_text(encoding="utf-8")
    assert old in text
    (folder / file).write_text(text.replace(old, new, 1), encoding="utf-8")
    errors = [item for item in pipeline.check(folder) if item.level == "error"]
    if column is None:  # lamps that are offered for the lot that is gone
        places = {(item.file, item.row, item.column) for item in errors}
        assert places == {("lamps.csv", 4, "lot"), ("lamps.csv", 5, "lot")}
        return
    assert [(item.file, item.column) for item in errors] == [(file, column)]
    lines = (folder / file).read_text(encoding="utf-8").splitlines()
    assert errors[0].row is not None
    wanted = column.rpartition(".")[2] if file == "campaign.toml" else new.strip(",")
    assert wanted in lines[errors[0].row - 1]
