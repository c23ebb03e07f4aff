"""Lamps stand side by side with the verdict that weighs most and the best of each column."""

from __future__ import annotations

from decimal import Decimal

from generator.comparison import compare
from generator.comparison.matrix import BETTER, COLUMNS
from generator.quantities import QUANTITIES
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp
from generator.records.verdict import Basis, Verdict, VerdictWord


def figure(lamp: str, name: str, value: str | None, grade: Grade = Grade.COMPUTED) -> Figure:
    number = Decimal(value) if value is not None else None
    return Figure(lamp, "", name, number, grade, "m", reason="" if number else "not measured")


def verdict(
    lamp: str, word: VerdictWord, margin: str | None = None, basis: Basis = Basis.DETERMINED
) -> Verdict:
    return Verdict(
        lamp,
        f"c-{word}-{basis}",
        "t",
        "r",
        "ra",
        "",
        basis,
        Decimal(80),
        None,
        Decimal(80),
        "at least",
        Decimal(margin) if margin else None,
        word,
        "s",
        "read",
    )


LAMPS = (Lamp("A", "one", "a"), Lamp("B", "two", "b"), Lamp("C", "three", "c"))


def test_columns_and_directions_are_catalogue_names() -> None:
    assert set(COLUMNS) <= set(QUANTITIES)
    assert set(BETTER) <= set(QUANTITIES)


def test_a_column_that_no_lamp_has_is_left_out() -> None:
    matrix = compare(LAMPS, FigureSet([figure("A", "ra", "80")]), [])
    assert matrix.quantities == ("ra",)
    assert matrix.rows[1].cells[0].figure is None


def test_best_is_highest_or_lowest_as_the_quantity_asks() -> None:
    figures = FigureSet(
        [
            figure("A", "ra", "80"),
            figure("B", "ra", "92"),
            figure("C", "ra", None),
            figure("A", "percent_flicker", "4"),
            figure("B", "percent_flicker", "40"),
            figure("A", "cct_k", "3000"),
        ]
    )
    matrix = compare(LAMPS, figures, [])
    best = {
        name: [row.cells[i].best for row in matrix.rows] for i, name in enumerate(matrix.quantities)
    }
    assert best == {
        "ra": [False, True, False],
        "percent_flicker": [True, False, False],
        "cct_k": [False, False, False],
    }


def test_a_declared_value_is_shown_but_never_best() -> None:
    figures = FigureSet([figure("A", "ra", "80"), figure("B", "ra", "95", Grade.DECLARED)])
    rows = compare(LAMPS, figures, []).rows
    assert rows[1].cells[0].figure is not None
    assert [row.cells[0].best for row in rows] == [True, False, False]


def test_the_verdict_that_weighs_most_is_shown_with_the_cell() -> None:
    verdicts = [
        verdict("A", VerdictWord.PASS, "1"),
        verdict("A", VerdictWord.FAIL, "-2"),
        verdict("A", VerdictWord.NOT_APPLICABLE),
        verdict("B", VerdictWord.FAIL, "-1", Basis.DECLARED),
        verdict("B", VerdictWord.PASS, "3"),
        verdict("B", VerdictWord.PASS, "1"),
    ]
    figures = FigureSet([figure(name, "ra", "80") for name in "ABC"])
    rows = compare(LAMPS, figures, verdicts).rows
    shown = [row.cells[0].verdict for row in rows]
    assert shown[0] is not None
    assert shown[0].verdict is VerdictWord.FAIL
    assert shown[1] is not None
    assert shown[1].margin == 1
    assert shown[2] is None
    assert rows[0].counts == {
        VerdictWord.PASS: 1,
        VerdictWord.FAIL: 1,
        VerdictWord.NOT_APPLICABLE: 1,
    }


def test_open_questions_are_the_findings_but_remarks() -> None:
    def finding(lamp: str, severity: Severity) -> Finding:
        return Finding(lamp, "", "c", severity, "t", "a with b", None, "", "e", ("ra",), "s")

    found = [
        finding("A", Severity.DOUBT),
        finding("A", Severity.REMARK),
        finding("B", Severity.IMPOSSIBLE),
        finding("B", Severity.CONTRADICTION),
    ]
    rows = compare(LAMPS, FigureSet([figure("A", "ra", "80")]), [], found).rows
    assert [row.questions for row in rows] == [1, 2, 0]


def test_the_matrix_knows_which_way_is_better() -> None:
    figures = FigureSet(
        [figure("A", "ra", "80"), figure("A", "cct_k", "3000"), figure("A", "svm", "1")]
    )
    assert compare(LAMPS, figures, []).better == {"ra": 1, "svm": -1}
