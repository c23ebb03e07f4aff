from __future__ import annotations

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from generator.intake.tables.cells import CellReader
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.source_file import decoded_text
from generator.intake.tables.text_table import read_heading, read_text_table

NUMBERS = st.decimals(
    min_value=-(10**9), max_value=10**9, allow_nan=False, allow_infinity=False, places=None
).filter(lambda number: len(f"{number:f}") < 40)
FORMS = [(",", "."), (";", ","), (";", "."), (",", '"')]


def _written(number: Decimal, separator: str, mark: str) -> str:
    text = f"{number:f}"
    if mark == '"':
        return f'"{text}"'
    return text.replace(".", mark) if separator == ";" else text


@given(
    rows=st.lists(st.tuples(NUMBERS, st.none() | NUMBERS), min_size=1, max_size=6),
    form=st.sampled_from(FORMS),
    line_end=st.sampled_from(["\n", "\r\n"]),
    mark=st.booleans(),
    last=st.booleans(),
)
def test_numbers_read_back_exactly_in_every_accepted_form(
    rows: list[tuple[Decimal, Decimal | None]],
    form: tuple[str, str],
    line_end: str,
    mark: bool,
    last: bool,
) -> None:
    separator, decimal_mark = form
    lines = [separator.join(["name", "a", "b"])]
    for row in rows:
        cells = ["" if n is None else _written(n, separator, decimal_mark) for n in row]
        lines.append(separator.join(["lamp", *cells]))
    data = (line_end.join(lines) + (line_end if last else "")).encode(
        "utf-8-sig" if mark else "utf-8"
    )
    problems = ProblemList("table.csv")
    text = decoded_text(data, problems)
    assert text is not None
    table = read_text_table(text, problems)
    assert table is not None
    cells_of = CellReader(table.heading.separator, problems)
    read = [
        (cells_of.number(record["a"], row, "a"), cells_of.number(record["b"], row, "b"))
        for row, record in table.rows
    ]
    assert problems.problems == ()
    assert [[str(n) for n in row] for row in read] == [
        ["None" if n is None else str(Decimal(f"{n:f}")) for n in row] for row in rows
    ]


def test_a_semicolon_file_reads_a_comma_as_the_decimal_mark() -> None:
    problems = ProblemList("table.csv")
    assert CellReader(";", problems).number("1,234", 2, "a") == Decimal("1.234")
    assert problems.problems == ()


def test_quoted_cells_hold_separators_quotes_and_line_ends() -> None:
    problems = ProblemList("table.csv")
    table = read_text_table('a,b\n"x, ""y""\nz",1\n\nw,2\n', problems)
    assert table is not None
    assert table.rows == ((2, {"a": 'x, "y"\nz', "b": "1"}), (5, {"a": "w", "b": "2"}))
    assert problems.problems == ()


def test_blank_and_comment_lines_do_not_shift_rows() -> None:
    problems = ProblemList("table.csv")
    table = read_text_table("# made by hand; 2025, May\n\na;b\n;\n# more\n1;2\n", problems)
    assert table is not None
    assert table.heading.row == 3
    assert table.rows == ((6, {"a": "1", "b": "2"}),)


def test_a_number_sign_inside_a_quoted_cell_is_no_comment() -> None:
    table = read_text_table('a,b\n"x\n# y",1\n', ProblemList("table.csv"))
    assert table is not None
    assert table.rows[0][1]["a"] == "x\n# y"


def test_every_ragged_row_is_named_and_the_rest_read() -> None:
    problems = ProblemList("table.csv")
    table = read_text_table("a,b\n1\n1,2\n1,2,3\n", problems)
    assert table is not None
    assert not table.whole
    assert [row for row, _ in table.rows] == [3]
    assert [(p.row, p.found, p.expected) for p in problems.problems] == [
        (2, "1 cells", "2 cells"),
        (4, "3 cells", "2 cells"),
    ]


def test_reading_goes_on_after_a_row_with_stray_quotes() -> None:
    problems = ProblemList("table.csv")
    table = read_text_table('a,b\n"x"y,1\nz,2,3\n', problems)
    assert table is not None
    assert [p.row for p in problems.problems] == [2, 3]


@pytest.mark.parametrize(
    ("heading", "separator"), [("a,b", ","), ("a;b", ";"), ("a", ","), ('"a;b",c', ",")]
)
def test_the_heading_settles_the_separator(heading: str, separator: str) -> None:
    found = read_heading(heading + "\n", ProblemList("table.csv"))
    assert found is not None
    assert found.separator == separator


@pytest.mark.parametrize("heading", ["a\tb", "a;b,c", "a,a", "a,,b", "", "\n \n"])
def test_headings_that_are_refused(heading: str) -> None:
    problems = ProblemList("table.csv")
    assert read_heading(heading, problems) is None
    assert problems.errors == 1
