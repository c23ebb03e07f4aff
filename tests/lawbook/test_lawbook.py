"""The loader, the shipped leaves as a whole, and the law book by date."""

from __future__ import annotations

from dataclasses import fields
from datetime import date, timedelta
from decimal import Decimal
from pathlib import Path

import pytest

import generator.lawbook
from generator.errors import LawBookError
from generator.lawbook import law_book_of, read_law_book
from generator.quantities import QUANTITIES
from generator.records.clause import Clause, LawBook
from generator.records.lamp import Lamp

BROKEN = sorted((Path(__file__).parent / "broken").glob("*.toml"))
FOLDER = Path(generator.lawbook.__file__).parent
LEAVES = sorted(FOLDER.rglob("*.toml"))


@pytest.fixture(scope="module")
def book() -> LawBook:
    return read_law_book()


@pytest.mark.parametrize("path", BROKEN, ids=[path.stem for path in BROKEN])
def test_a_broken_leaf_is_refused_with_file_and_key(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    expected = text.splitlines()[0].removeprefix("# expected: ")
    with pytest.raises(LawBookError) as caught:
        law_book_of([(path.name, text)])
    assert f"lawbook/{path.name}" in str(caught.value)
    assert expected in str(caught.value)


def test_there_are_broken_leaves_at_all() -> None:
    assert len(BROKEN) > 20


def test_two_leaves_with_one_id() -> None:
    text = (FOLDER / "eu/2019-2020/constants/efficacy-factor.toml").read_text(encoding="utf-8")
    with pytest.raises(LawBookError, match=r"b\.toml: id: .* also in a\.toml"):
        law_book_of([("a.toml", text), ("b.toml", text)])


def test_every_shipped_leaf_is_read(book: LawBook) -> None:
    assert len(LEAVES) == len(book) + len(book.constants) + len(book.exemptions)
    assert {clause.file for clause in book} <= {
        path.relative_to(FOLDER).as_posix() for path in LEAVES
    }


def test_read_once(book: LawBook) -> None:
    assert read_law_book() is book


def test_version_follows_the_text_and_not_the_line_ends() -> None:
    path = "eu/2019-2020/constants/efficacy-factor.toml"
    text = (FOLDER / path).read_text(encoding="utf-8")
    one = law_book_of([(path, text)]).version
    assert law_book_of([(path, text.replace("\n", "\r\n"))]).version == one
    assert law_book_of([(path, text.replace("0.85", "0.86"))]).version != one
    assert len(one) == 64


def test_every_leaf_says_where_and_when_it_was_looked_up(book: LawBook) -> None:
    for item in (*book, *book.constants.values(), *book.exemptions):
        assert item.source.act, item.id
        assert item.checked_on is not None, item.id
        assert item.status in {"read", "quoted", "computed", "cross-checked", "unconfirmed"}
        assert "shared" not in item.note


def test_the_title_of_an_exemption_continues_a_sentence(book: LawBook) -> None:
    assert [item.id for item in book.exemptions if not item.title[0].islower()] == []


def test_every_eu_constant_was_read_but_for_the_printed_image(book: LawBook) -> None:
    not_read = {
        item.id
        for item in (*book.clauses(), *book.constants.values())
        if item.regime.startswith("EU") and item.status != "read"
    }
    assert not_read == {
        "eu-2019-2020-lumen-maintenance",
        "eu-2019-2020-lumen-maintenance-curve",
    }


def test_every_formula_is_known(book: LawBook) -> None:
    from generator.conformity.judged_value import LIMIT_FORMULAS, RULING_FORMULAS

    used = {clause.formula for clause in book} - {""}
    assert used == set(LIMIT_FORMULAS) | set(RULING_FORMULAS)


def test_conditions_name_what_a_lamp_can_say(book: LawBook) -> None:
    known = {field.name for field in fields(Lamp)} | set(QUANTITIES)
    later = {"dimmable"}
    for clause in book:
        conditions = [*clause.applies, *(item for value in clause.values for item in value.when)]
        for condition in conditions:
            assert condition.subject.removeprefix("declared_") in known | later, clause.id


def test_svm_differs_between_the_last_day_of_august_and_the_first_of_september_2024(
    book: LawBook,
) -> None:
    def limits(day: date) -> dict[str, tuple[object, ...]]:
        standing = book.on(day)
        return {clause.id: tuple(item.value for item in clause.values) for clause in standing}

    before, after = limits(date(2024, 8, 31)), limits(date(2024, 9, 1))
    changed = {name for name in after if before.get(name) != after[name]}
    assert changed == {"eu-2019-2020-svm", "gb-2021-1095-svm"}
    assert before["eu-2019-2020-svm"] == (Decimal("0.9"),)
    assert after["eu-2019-2020-svm"] == (Decimal("0.4"),)


def test_before_the_acts_there_is_nothing_of_them(book: LawBook) -> None:
    day = date(2021, 9, 1)
    assert {clause.regime for clause in book.on(day - timedelta(days=1))}.isdisjoint(
        {"EU 2019/2015", "EU 2019/2020"}
    )
    assert {"EU 2019/2015", "EU 2019/2020"} <= {clause.regime for clause in book.on(day)}


def test_default_regimes_are_the_two_eu_acts(book: LawBook) -> None:
    assert {clause.regime for clause in book.clauses()} == {"EU 2019/2015", "EU 2019/2020"}
    assert book.clauses(["eu 2019/2015 "]) == tuple(
        clause for clause in book if clause.regime == "EU 2019/2015"
    )
    assert book.clauses([]) == ()


def test_an_unknown_regime_gets_a_suggestion(book: LawBook) -> None:
    with pytest.raises(LawBookError, match=r"did you mean 'EU 2019/2020'"):
        book.clauses(["EU 2019/2002"])


def test_constants_by_day(book: LawBook) -> None:
    bounds = book.constant("eu-2019-2015-class-bounds", date(2021, 9, 1))
    # Regulation (EU) 2019/2015, Annex II Table 1.
    wanted = {"A": 210, "B": 185, "C": 160, "D": 135, "E": 110, "F": 85, "G": 0}
    assert dict(bounds.entries) == wanted
    with pytest.raises(LawBookError, match="in force on 2021-08-31"):
        book.constant("eu-2019-2015-class-bounds", date(2021, 8, 31))
    with pytest.raises(LawBookError, match="no constants 'nowhere'"):
        book.constant("nowhere", date(2021, 9, 1))
    with pytest.raises(LawBookError, match="constant 'H'"):
        bounds.number("H")
    with pytest.raises(LawBookError, match="table 'A'"):
        bounds.rows("A")


def test_look_up_of_one_clause(book: LawBook) -> None:
    assert book.clause("eu-2019-2020-cri").title == "Colour rendering index"
    with pytest.raises(KeyError):
        book.clause("nowhere")


def numbers(clause: Clause) -> list[tuple[object, ...]]:
    return [
        (item.value, item.no_limit, item.tolerance, tuple(part.text for part in item.when))
        for item in clause.values
    ]


def test_great_britain_made_the_same_numbers(book: LawBook) -> None:
    # S.I. 2021/1095 repeats limits, constants and tolerances of the EU act.
    for clause in book.clauses(["GB SI 2021/1095"]):
        twin = book.clause(clause.id.replace("gb-2021-1095", "eu-2019-2020"))
        assert numbers(clause) == numbers(twin), clause.id
    for name, constant in book.constants.items():
        if name.startswith("gb-"):
            twin_constant = book.constants[name.replace("gb-2021-1095", "eu-2019-2020")]
            assert constant.values[0].entries == twin_constant.values[0].entries


def test_source_is_printed_for_people(book: LawBook) -> None:
    assert book.clause("eu-2019-2020-cri").source.text == (
        "Regulation (EU) 2019/2020, Annex II, Table 4"
    )


def test_numbers_are_exact(book: LawBook) -> None:
    factor = book.constant("eu-2019-2015-mains-factor", date(2025, 1, 1))
    assert factor.number("non_directional_non_mains") == Decimal("0.926")
    assert str(factor.number("directional_mains")) == "1.176"


@pytest.mark.parametrize(
    ("clause", "texts"),
    [
        ("eu-2019-2020-svm", ["0.9", "0.4"]),
        ("eu-2019-2020-maximum-power", ["by formula"]),
        ("eu-2019-2020-displacement-factor", ["no limit", "0.5", "0.7", "0.9"]),
        ("eu-2019-2015-verification-beam-angle", ["the declared value ± 25 %"]),
        ("eu-2019-2020-verification-standby-power", ["the declared value + 0.10 W"]),
        ("iec-61000-3-2-edition-4-third-harmonic-above-25-w", ["30 × power factor, in %"]),
    ],
)
def test_values_in_words(book: LawBook, clause: str, texts: list[str]) -> None:
    found = book.clause(clause)
    assert [value.text(found.unit) for value in found.values] == texts
    assert book.clause("ansi-c78-377-2015-nominal-cct").values[2].text("K") == "2580 to 2870 K"


def test_summary_is_plain_data(book: LawBook) -> None:
    import json

    day = date(2024, 9, 1)
    rows = {clause.id: clause.summary(day) for clause in book.on(day)}
    assert json.loads(json.dumps(rows)) == rows
    svm = rows["eu-2019-2020-svm"]
    assert svm["limit"] == 0.4
    assert svm["source"].endswith("as amended by Regulation (EU) 2021/341")
    assert rows["eu-2019-2020-maximum-power"]["limit"] is None
    assert rows["eu-2019-2020-displacement-factor"]["values"][1] == {
        "from": "2021-09-01",
        "until": None,
        "text": "0.5",
        "when": ["the active power is above 5 W and at most 10 W"],
        "says": "at least 0.5",
    }
