from __future__ import annotations

import gzip
from pathlib import Path

import pytest

from generator.intake.tables.problem_list import ProblemList, nearest, shown
from generator.intake.tables.source_file import decoded_text, read_source


def test_a_gzip_bomb_is_not_unpacked(tmp_path: Path) -> None:
    path = tmp_path / "L1.csv.gz"
    path.write_bytes(gzip.compress(b"0" * 5_000_000))
    assert path.stat().st_size < 10_000
    problems = ProblemList(path.name)
    assert read_source(path, problems, largest=100_000) is None
    assert problems.problems[0].found == "more than 100000 bytes"


def test_a_file_of_the_largest_size_is_read(tmp_path: Path) -> None:
    path = tmp_path / "L1.csv"
    path.write_bytes(b"0" * 100)
    assert read_source(path, ProblemList(path.name), largest=100) is not None
    assert read_source(path, ProblemList(path.name), largest=99) is None


@pytest.mark.parametrize("cut", [5, -1, -9])
def test_a_cut_off_gzip_file_is_refused(tmp_path: Path, cut: int) -> None:
    path = tmp_path / "L1.csv.gz"
    path.write_bytes(gzip.compress(b"time_s,a\n" * 50)[:cut])
    problems = ProblemList(path.name)
    assert read_source(path, problems) is None
    assert problems.problems[0].message == "The file is not whole gzip data."


def test_plain_text_named_gz_is_refused(tmp_path: Path) -> None:
    path = tmp_path / "L1.csv.gz"
    path.write_bytes(b"time_s,a\n")
    assert read_source(path, ProblemList(path.name)) is None


def test_a_file_that_is_not_there(tmp_path: Path) -> None:
    problems = ProblemList("L1.csv")
    assert read_source(tmp_path / "L1.csv", problems) is None
    assert problems.errors == 1


def test_the_byte_order_mark_is_dropped_and_counted() -> None:
    problems = ProblemList("L1.csv")
    assert decoded_text(b"\xef\xbb\xbfa\n", problems) == "a\n"
    assert decoded_text(b"\xef\xbb\xbfab\nc\xff", problems) is None
    (problem,) = problems.problems
    assert "Byte 8 " in problem.message
    assert (problem.row, problem.found) == (2, "byte 0xFF")


@pytest.mark.parametrize(
    ("data", "words"),
    [
        (gzip.compress(b"a", mtime=0), "gzip data"),
        (b"PK\x03\x04rest", "spreadsheet"),
        ("a".encode("utf-16"), "UTF-16"),
    ],
)
def test_what_is_no_text_is_called_by_its_name(data: bytes, words: str) -> None:
    problems = ProblemList("L1.csv")
    assert decoded_text(data, problems) is None
    assert words in problems.problems[0].message


def test_line_ends_may_be_lf_or_crlf() -> None:
    problems = ProblemList("L1.csv")
    assert decoded_text(b"a\r\nb\n", problems) == "a\r\nb\n"
    assert decoded_text(b"a\rb\n", problems) is None


def test_text_from_files_is_made_printable() -> None:
    assert shown("a\x1b[31m\nb") == r"a\x1b[31m\nb"
    assert len(shown("a" * 500)) == 80


def test_nearest_name() -> None:
    assert nearest("Luminous_flux", ["power_w", "luminous_flux_lm"]) == "luminous_flux_lm"
    assert nearest("zzz", ["power_w"]) is None
