"""Characters that the typeface lacks: each place is one warning, with the codes paper shows."""

from __future__ import annotations

import logging
from pathlib import Path

import pytest

from generator import pipeline
from generator.errors import Problem
from generator.intake.columns import LAMP_COLUMNS, LAMP_TEXTS
from generator.intake.lettering import note_remarks, note_uncovered, texts_in
from generator.intake.tables.problem_list import ProblemList
from generator.sheets import uncovered_characters


def _change(path: Path, old: str, new: str) -> None:
    text = path.read_text(encoding="utf-8")
    assert old in text
    path.write_text(text.replace(old, new, 1), encoding="utf-8")


def _told(problems: tuple[Problem, ...]) -> list[tuple[str, int | None, str | None, str]]:
    assert all(item.level == "warning" for item in problems)
    assert all("bundled typeface" in item.expected for item in problems)
    assert all("paper shows their codes" in item.message for item in problems)
    return [(item.file, item.row, item.column, item.found) for item in problems]


def _remarks(text: str) -> list[tuple[int | None, str, str]]:
    problems = ProblemList("notes/one.md")
    note_remarks(text, uncovered_characters, problems)
    return [(item.row, item.found, item.message) for item in problems.problems]


def test_every_place_is_named_with_its_characters_and_codes(small_campaign: Path) -> None:
    assert pipeline.check(small_campaign) == ()
    table = small_campaign / "campaign.toml"
    _change(table, "(invented)", "\u5b9e\u9a8c\u5ba4")
    _change(table, "RR-1", "RR-\u0661")
    table.write_text(
        table.read_text(encoding="utf-8")
        + '[report]\nconditions = """\nwarm\n\u706b"""\n'
        + '[[clause]]\nquantity = "ra"\ncomparison = "at least"\nvalue = 80\n'
        + 'title = "Ra \U0001f600"\n',
        encoding="utf-8",
    )
    _change(small_campaign / "lamps.csv", "Second bidder,Two", "Second bidder,\u4e2d\u6587\u4e2d")
    note = small_campaign / "notes" / "one.md"
    note.write_text("Seen *burning*.\n\n# \u706f here\n", encoding="utf-8")
    assert _told(pipeline.check(small_campaign)) == [
        ("campaign.toml", 3, "campaign.reference", "\u0661 (U+0661)"),
        (
            "campaign.toml",
            8,
            "laboratory.name",
            "\u5b9e (U+5B9E), \u9a8c (U+9A8C), \u5ba4 (U+5BA4)",
        ),
        ("campaign.toml", 20, "report.conditions", "\u706b (U+706B)"),
        ("campaign.toml", 27, "clause.1.title", "\U0001f600 (U+1F600)"),
        ("lamps.csv", 3, "model", "\u4e2d (U+4E2D), \u6587 (U+6587)"),
        ("notes/one.md", 3, None, "\u706f (U+706F)"),
    ]


def test_who_issues_is_warned_too_and_the_sheets_name_it(
    small_campaign: Path, caplog: pytest.LogCaptureFixture
) -> None:
    _change(small_campaign / "lamps.csv", ",Two,", ",Two \u4e2d,")
    with caplog.at_level(logging.WARNING, logger="lampassay"):
        folder = pipeline.issue(small_campaign, target=small_campaign / "out", pdf=False).folder
    (line,) = [record.message for record in caplog.records]
    assert line.startswith("warning: lamps.csv, row 3, column model:")
    assert "U+4E2D" in line
    for page in ("index.html", "lamps/two.html"):
        assert "lamps.csv, row 3, column model" in (folder / page).read_text(encoding="utf-8")
    assert "column model" not in (folder / "lamps" / "one.html").read_text(encoding="utf-8")


def test_warnings_stand_beside_errors(small_campaign: Path) -> None:
    _change(small_campaign / "lamps.csv", ",Two,E27,LED,no", ",\u4e2d,E27,LED,maybe")
    assert [(item.level, item.column) for item in pipeline.check(small_campaign)] == [
        ("error", "directional"),
        ("warning", "model"),
    ]


def test_what_is_refused_is_not_said_to_be_printed(small_campaign: Path) -> None:
    _change(small_campaign / "campaign.toml", '"W/nm"', '"\u4e2d"')
    (problem,) = pipeline.check(small_campaign)
    assert (problem.level, problem.column) == ("error", "campaign.spectra_unit")


def test_a_note_that_stands_nowhere_is_not_said_to_be_printed(small_campaign: Path) -> None:
    (small_campaign / "notes" / "nine.md").write_text("\u4e2d", encoding="utf-8")
    (problem,) = pipeline.check(small_campaign)
    assert "stand nowhere" in problem.message


def test_letters_of_the_faces_are_no_problem(small_campaign: Path) -> None:
    _change(
        small_campaign / "lamps.csv", ",Two,", ",\u0141\u00f3d\u017a \u0391\u03b8 \u0416\u0443,"
    )
    assert pipeline.check(small_campaign) == ()


def test_a_list_of_characters_is_not_cut_but_ends() -> None:
    problems = ProblemList("lamps.csv")
    text = "".join(map(chr, range(0x4E00, 0x4E19)))
    note_uncovered(text, uncovered_characters, problems, row=2, column="model")
    (problem,) = problems.problems
    assert problem.found.count("U+") == 20
    assert problem.found.endswith("\u4e13 (U+4E13), and 5 more")


@pytest.mark.parametrize(
    ("char", "shown"),
    [
        ("\u202f", "U+202F"),
        ("\u0f71", "U+0F71"),
        ("\u2028", "U+2028"),
        ("\u9f98", "\u9f98 (U+9F98)"),
    ],
)
def test_what_cannot_stand_by_itself_is_named_by_its_code(char: str, shown: str) -> None:
    problems = ProblemList("lamps.csv")
    note_uncovered(f"a{char}b", uncovered_characters, problems, row=2)
    assert [item.found for item in problems.problems] == [shown]


def test_a_long_foreign_note_gives_few_warnings_that_hold_all_of_it() -> None:
    five = "\n".join("\u4e00\u4e8c\u4e09\u56db\u4e94")
    assert [row for row, _, _ in _remarks(five)] == [1, 2, 3, 4, 5]
    found = _remarks(f"{five}\nplain\n\u516d\n\u516d\u4e03\n")
    assert [row for row, _, _ in found] == [1, 2, 3, 4, 5]
    assert found[-1][1] == "\u4e94 (U+4E94), \u516d (U+516D), \u4e03 (U+4E03)"
    assert "2 further lines" in found[-1][2]


def test_a_character_written_as_markup_is_found() -> None:
    assert [(row, found) for row, found, _ in _remarks("a\n&#20013; &amp;\n")] == [
        (2, "\u4e2d (U+4E2D)")
    ]


def test_texts_stand_in_tables_lists_and_blocks() -> None:
    tables = {"a": "x", "b": {"c": ["y", 5, {"d": "z"}]}, "e": True}
    assert list(texts_in(tables)) == [
        (("a",), "x"),
        (("b", "c", 0), "y"),
        (("b", "c", 2, "d"), "z"),
    ]


def test_columns_of_text_are_columns_of_lamps() -> None:
    assert set(LAMP_TEXTS) < set(LAMP_COLUMNS)
