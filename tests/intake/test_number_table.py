from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from generator.intake.tables import number_table
from generator.intake.tables.number_table import read_number_table
from generator.intake.tables.problem_list import MOST_PROBLEMS, ProblemList

FLOATS = st.floats(allow_nan=False, allow_infinity=False)


@given(
    rows=st.lists(st.tuples(FLOATS, FLOATS), min_size=1, max_size=5),
    form=st.sampled_from([(",", "."), (";", ","), (";", ".")]),
    quoted=st.booleans(),
)
def test_both_ways_in_give_the_double_that_is_written(
    rows: list[tuple[float, float]], form: tuple[str, str], quoted: bool
) -> None:
    separator, mark = form
    quote = '"' if quoted else ""  # quoted numbers go the slow way
    body = [
        separator.join(f"{quote}{number!r}{quote}".replace(".", mark) for number in row)
        for row in rows
    ]
    problems = ProblemList("numbers.csv")
    table = read_number_table("\n".join([f"a{separator}b", *body]), problems)
    assert problems.problems == ()
    assert table is not None
    np.testing.assert_array_equal(table.values.T, rows)


def test_a_faultless_table_goes_the_fast_way(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(number_table, "_cell_by_cell", None)
    table = read_number_table("# head\na;b\n1,5;2\n\n3;4\n", ProblemList("numbers.csv"))
    assert table is not None
    np.testing.assert_array_equal(table.values, [[1.5, 3], [2, 4]])
    assert table.lines([1, 0]) == [5, 3]
    np.testing.assert_array_equal(table.column("b"), [2, 4])


def test_comments_and_blank_records_do_not_shift_lines() -> None:
    table = read_number_table("a,b\n1,2\n# pause\n,\n3,4\n", ProblemList("numbers.csv"))
    assert table is not None
    assert table.lines([0, 1]) == [2, 5]


@pytest.mark.parametrize("cell", ["nan", "inf", "", "1e999", "1_0", "x", "1 V", "0x1", "1;2"])
def test_cells_that_are_refused(cell: str) -> None:
    problems = ProblemList("numbers.csv")
    table = read_number_table(f"a,b\n1,2\n3,{cell}\n", problems)
    assert table is not None
    assert not table.whole
    np.testing.assert_array_equal(table.values, [[1, 3], [2, np.nan]])
    assert [(p.row, p.column) for p in problems.problems] == [(3, "b")]


def test_every_bad_cell_is_named() -> None:
    problems = ProblemList("numbers.csv")
    read_number_table("a,b\nx,2\n3\n4,\n", problems)
    assert [(p.row, p.column) for p in problems.problems] == [(2, "a"), (3, None), (4, "b")]


def test_both_decimal_marks_are_refused() -> None:
    problems = ProblemList("numbers.csv")
    read_number_table("a;b\n1,5;2\n3;4.5\n", problems)
    assert [(p.row, p.column) for p in problems.problems] == [(3, "b")]


def test_a_table_without_rows() -> None:
    problems = ProblemList("numbers.csv")
    table = read_number_table("a,b\n", problems)
    assert table is not None
    assert table.values.shape == (2, 0)
    assert table.whole
    assert problems.problems == ()


def test_a_file_wrong_throughout_is_not_named_cell_by_cell() -> None:
    problems = ProblemList("numbers.csv")
    read_number_table("a\n" + "x\n" * (MOST_PROBLEMS + 5), problems)
    assert len(problems.problems) == MOST_PROBLEMS + 1
    assert problems.problems[-1].message == "5 more problems in this file."
    assert problems.problems[-1].level == "error"
