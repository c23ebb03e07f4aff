"""What a setting should have been is said in the program's words, whatever is wrong with it."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Iterator
from decimal import Decimal
from pathlib import Path
from typing import Any, get_args, get_origin

import pytest
from pydantic import BaseModel, ValidationError

from generator import pipeline
from generator.errors import Problem
from generator.intake.campaign_toml import read_settings
from generator.intake.tables.problem_list import ProblemList
from generator.lawbook import asked_problems, read_law_book
from generator.lawbook.leaf import BuyerLeaf
from generator.records.setting_words import FORM_WORDS, alternatives, expected_words
from generator.records.settings import Settings

LIBRARY = re.compile(
    r"[Ii]nput should|\w should (have|match)|valid (tuple|list|dict|string|integer|boolean|date)"
    r"|[Ff]ield required|[Ee]xtra inputs|[Vv]alue error|Decimal|instance|[Dd]atetime"
    r"|[Uu]nable to|items? after|\^|function-|_type|Table\b|pydantic"
)
"""What the library that checks the settings says, and the code it says it with."""

TITLE = '[campaign]\ntitle = "T"\n'
CLAUSE = '[[clause]]\nquantity = "ra"\ncomparison = "at least"\nvalue = 80\n'
LOT = '[[lot]]\nid = "A"\n'
EMISSIONS = '[use.location_based]\ng_per_kwh = 200\nsource = "S"\nregion = "R"\nyear = '
DAY = "a date such as 2025-03-31"
LIST = "a list in square brackets"
TEXT = "text in quotation marks"

CASES = [
    ("missing", "[campaign]\n", "campaign.title", "campaign.title = …"),
    (
        "missing",
        '[[clause]]\nquantity = "ra"\nvalue = 8\n',
        "clause.1.comparison",
        "comparison = …",
    ),
    ("extra_forbidden", "[supply]\nfrequency = 50\n", "supply.frequency", "frequency_hz"),
    ("extra_forbidden", CLAUSE + 'titel = "x"\n', "clause.1.titel", "title"),
    ("model_type", "use = 5\n", "use", "a table"),
    ("model_type", "[[use]]\nyears = 5\n", "use", "one table, headed [use]"),
    ("model_type", CLAUSE + "rounding = 1\n", "clause.1.rounding", "a table"),
    ("dict_type", "uncertainty = 5\n", "uncertainty", "a table"),
    ("dict_type", "clause = [5]\n", "clause.1", "a table"),
    ("tuple_type", "lot = 5\n", "lot", LIST),
    ("tuple_type", '[lot]\nid = "A"\n', "lot", f"{LIST}; tables of a list are headed [[lot]]"),
    ("tuple_type", '[sheet]\nlanguages = "de"\n', "sheet.languages", LIST),
    ("tuple_type", "[laboratory]\nmethods = 5\n", "laboratory.methods", f"{LIST}, or {TEXT}"),
    ("list_type", CLAUSE + "applies = 5\n", "clause.1.applies", LIST),
    (
        "list_type",
        CLAUSE + '[clause.applies]\nproperty = "mains"\n',
        "clause.1.applies",
        f"{LIST}; tables of a list are headed [[clause.applies]]",
    ),
    ("too_short", CLAUSE + "bases = []\n", "clause.1.bases", "a list with one entry or more"),
    ("string_type", "[campaign]\ntitle = 5\n", "campaign.title", TEXT),
    ("string_type", CLAUSE + "source = 5\n", "clause.1.source", f"a table, or {TEXT}"),
    ("string_too_short", '[campaign]\ntitle = ""\n', "campaign.title", "text that is not empty"),
    (
        "string_pattern_mismatch",
        '[use]\ncurrency = "euro"\n',
        "use.currency",
        "a code such as EUR (ISO 4217)",
    ),
    (
        "string_pattern_mismatch",
        '[[lot]]\nid = "lot A"\n',
        "lot.1.id",
        "a letter or digit, then up to 63 letters, digits, _ or -",
    ),
    ("int_type", "[award]\ndecimals = 2025-01-01\n", "award.decimals", "a whole number"),
    ("int_parsing", '[award]\ndecimals = "two"\n', "award.decimals", "a whole number"),
    ("int_from_float", "[use]\nyears = 1.5\n", "use.years", "a whole number"),
    (
        "int_parsing_size",
        "[sheet]\nlamp_pages = 99999999999999999999\n",
        "sheet.lamp_pages",
        "a whole number",
    ),
    ("decimal_type", "[supply]\nvoltage_v = 2025-01-01\n", "supply.voltage_v", "a number"),
    ("decimal_type", "[supply]\nvoltage_v = [230]\n", "supply.voltage_v", "a number"),
    ("is_instance_of", CLAUSE + "lower = 2025-01-01\n", "clause.1.lower", "a number"),
    ("finite_number", "[supply]\nvoltage_v = inf\n", "supply.voltage_v", "a finite number"),
    ("greater_than", "[supply]\nvoltage_v = 0\n", "supply.voltage_v", "a number above 0"),
    ("greater_than_equal", "[use]\nyears = 0\n", "use.years", "a number of 1 or more"),
    (
        "greater_than_equal",
        EMISSIONS + "3\n",
        "use.location_based.year",
        "a number of 1990 or more",
    ),
    ("less_than", "[decision]\nprobability = 1\n", "decision.probability", "a number below 1"),
    (
        "less_than_equal",
        "[supply]\nvoltage_v = 1e13\n",
        "supply.voltage_v",
        "a number of 1000000000000 or less",
    ),
    ("less_than_equal", "[use]\nyears = 101\n", "use.years", "a number of 100 or less"),
    ("bool_type", "[tender]\ncode_names = 1.5\n", "tender.code_names", "true or false"),
    ("bool_parsing", '[tender]\ncode_names = "perhaps"\n', "tender.code_names", "true or false"),
    ("date_type", "[tender]\nreports_to = true\n", "tender.reports_to", DAY),
    ("date_from_datetime_inexact", "[tender]\nreports_to = 5\n", "tender.reports_to", DAY),
    (
        "date_from_datetime_inexact",
        "[tender]\nreports_to = 2025-01-01T10:00:00\n",
        "tender.reports_to",
        f"{DAY}, without a time of day",
    ),
    ("date_from_datetime_parsing", '[tender]\nreports_to = "May"\n', "tender.reports_to", DAY),
    (
        "date_from_datetime_parsing",
        '[tender]\nreports_to = "2025-02-30"\n',
        "tender.reports_to",
        "a day of the calendar, such as 2025-03-31",
    ),
    ("literal_error", '[use]\nprices = "gross"\n', "use.prices", "'real' or 'nominal'"),
    ("literal_error", "[sheet]\nlamp_pages = 3\n", "sheet.lamp_pages", "2 or 4"),
    (
        "literal_error",
        '[[clause]]\nquantity = "ra"\ncomparison = "over"\nvalue = 8\n',
        "clause.1.comparison",
        "'at least', 'at most', 'below', 'above' or 'within'",
    ),
    ("value_error", '[supply]\nvoltage_v = "230 V"\n', "supply.voltage_v", "a number"),
    ("value_error", CLAUSE + 'from = "May"\n', "clause.1.from", None),
    (
        "value_error",
        "[sheet]\nlanguages = []\n",
        "sheet.languages",
        "one or more of en, de, fr, es, it, pl; or no such key",
    ),
    ("wrong_key", LOT + 'compare_at = "equal light"\n', "lot.1.quantity", None),
]
"""Kind of fault, ``campaign.toml``, the key at fault, what was expected (``None``: some words)."""


def _whole(text: str) -> str:
    """A file with a title, where the case is not about that."""
    return text if "[campaign]" in text else _before_tables(text)


def _before_tables(text: str) -> str:
    return text + TITLE if not text.startswith("[") else TITLE + text


def _said(problems: tuple[Problem, ...]) -> str:
    return "\n".join(map(str, problems))


def _kinds(text: str) -> set[str]:
    tables = tomllib.loads(text, parse_float=Decimal)
    found: set[str] = set()
    clauses = tables.get("clause")
    models: list[tuple[type[BaseModel], Any]] = [(Settings, tables)]
    models += [(BuyerLeaf, clause) for clause in clauses] if isinstance(clauses, list) else []
    for model, value in models:
        try:
            model.model_validate(value)
        except ValidationError as failure:
            found |= {fault["type"] for fault in failure.errors()}
    return found


@pytest.mark.parametrize(
    ("kind", "text", "column", "expected"), CASES, ids=[f"{k}-{c}" for k, _, c, _ in CASES]
)
def test_what_was_expected_is_said_in_plain_words(
    small_campaign: Path, kind: str, text: str, column: str, expected: str | None
) -> None:
    whole = _whole(text)
    assert kind in _kinds(whole)
    (small_campaign / "campaign.toml").write_text(whole, encoding="utf-8")
    problems = pipeline.check(small_campaign)
    named = [item for item in problems if item.column == column and item.level == "error"]
    assert len(named) == 1
    assert named[0].expected if expected is None else named[0].expected == expected
    assert named[0].row is not None
    assert LIBRARY.findall(_said(problems)) == []


WRONG = (
    '5', '"x"', '""', 'true', '1.5', 'inf', '-5', '99999999999999999999', '1e40', '2025-01-01',
    '2025-01-01T10:00:00', '10:00:00', '"2025-02-30"', '[]', '[1]', '["x"]', '{}', '{a = 1}',
    '[{a = 1}]',
)  # fmt: skip


def _model_in(annotation: Any) -> tuple[type[BaseModel] | None, bool]:
    """The model of a field, and whether there are several of it."""
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return annotation, False
    for inner in get_args(annotation):
        model, several = _model_in(inner)
        if model is not None:
            return model, several or get_origin(annotation) in {tuple, list}
    return None, False


def _keys(model: type[BaseModel], headings: str, name: str) -> Iterator[str]:
    """Every key of the tables below a model, each as the lines that lead to it."""
    for own, field in model.model_fields.items():
        key = field.alias or own
        yield f"{headings}{key} = "
        inner, several = _model_in(field.annotation)
        if inner is not None:
            path = f"{name}.{key}" if name else key
            heading = f"[[{path}]]" if several else f"[{path}]"
            yield from _keys(inner, f"{headings}{heading}\n", path)


def _every_key() -> list[str]:
    clause = list(_keys(BuyerLeaf, "[[clause]]\n", "clause"))
    return [*_keys(Settings, "", ""), *clause]


def test_no_word_of_the_library_remains_wherever_it_stands() -> None:
    law = read_law_book()
    kinds: set[str] = set()
    for lines in _every_key():
        for value in WRONG:
            text = f"{lines}{value}\n"
            kinds |= _kinds(text)
            problems = ProblemList("campaign.toml")
            read_settings(text, problems, lambda tables: asked_problems(tables, law))
            assert LIBRARY.findall(_said(problems.problems)) == [], text
    assert kinds == {kind for kind, *_ in CASES}


def test_a_fault_that_nobody_foresaw_has_plain_words_too() -> None:
    fault = {"type": "frozen_set_type", "loc": (), "msg": "Input should be a valid frozenset"}
    assert expected_words({**fault, "input": 5}) == "a value that this key can have"  # type: ignore[typeddict-item]
    pattern = {**fault, "type": "string_pattern_mismatch", "input": "", "ctx": {"pattern": "^x$"}}
    assert expected_words(pattern) == "a value that this key can have"  # type: ignore[arg-type]


def _patterns(schema: object) -> Iterator[str]:
    if isinstance(schema, dict):
        if isinstance(schema.get("pattern"), str):
            yield schema["pattern"]
        for part in schema.values():
            yield from _patterns(part)
    elif isinstance(schema, list | tuple):
        for part in schema:
            yield from _patterns(part)


@pytest.mark.parametrize("model", [Settings, BuyerLeaf])
def test_every_form_of_text_is_put_into_words(model: type[BaseModel]) -> None:
    assert set(_patterns(model.__pydantic_core_schema__)) <= set(FORM_WORDS)


def test_alternatives_stand_once_each() -> None:
    assert alternatives(["a table", "a list", "a table"]) == "a table, or a list"
