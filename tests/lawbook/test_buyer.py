"""The buyer's own clauses: what is taken, and what is refused with file, key and suggestion."""

from __future__ import annotations

from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.errors import DataProblems
from generator.lawbook import buyer_clauses
from generator.records.clause import BUYER

GOOD: dict[str, Any] = {"quantity": "ra", "comparison": "at least", "value": 90}


def problems(*tables: dict[str, Any]) -> list[tuple[str, str, str, str]]:
    with pytest.raises(DataProblems) as caught:
        buyer_clauses(tables, "campaign.toml")
    assert all(item.file == "campaign.toml" for item in caught.value.problems)
    assert all(item.level == "error" for item in caught.value.problems)
    return [
        (item.column or "", item.found, item.expected, item.message)
        for item in caught.value.problems
    ]


def test_the_short_form() -> None:
    (clause,) = buyer_clauses([GOOD], "campaign.toml")
    assert clause.id == "buyer-1-ra"
    assert clause.status == BUYER
    assert clause.title == "General colour rendering index"
    assert clause.values[0].value == 90
    assert clause.source.text == "Requirement of the buyer"


def test_the_shape_of_a_leaf() -> None:
    table = {
        "id": "svm-2026",
        "kind": "clause",
        "title": "Little stroboscopic effect",
        "regime": "Town of Aldersund",
        "quantity": "svm",
        "unit": "",
        "comparison": "at most",
        "checked_on": date(2026, 1, 1),
        "source": {"act": "Tender 12", "annex": "Annex B", "point": "3.1"},
        "applies": [{"property": "mains", "is": True}],
        "values": [
            {"from": date(2025, 1, 1), "until": date(2025, 12, 31), "value": 0.4},
            {"from": date(2026, 1, 1), "value": 0.3},
        ],
    }
    (clause,) = buyer_clauses([table], "campaign.toml")
    assert clause.source.text == "Tender 12, Annex B, 3.1"
    assert [item.value for item in clause.on(date(2026, 1, 1))] == [Decimal("0.3")]
    assert clause.applies[0].text == "the lamp runs on the mains"


def test_a_float_is_taken_by_its_text() -> None:
    (clause,) = buyer_clauses([{**GOOD, "value": 0.1}], "campaign.toml")
    assert clause.values[0].value == Decimal("0.1")


def test_a_misspelt_quantity_gets_a_suggestion() -> None:
    ((key, found, expected, message),) = problems({**GOOD, "quantity": "luminous_flux"})
    assert key == "clause.1.quantity"
    assert found == '"luminous_flux"'
    assert expected == "luminous_flux_lm"
    assert "did you mean luminous_flux_lm" in message


def test_a_misspelt_key_gets_a_suggestion() -> None:
    ((key, _, expected, message),) = problems({**GOOD, "titel": "x"})
    assert (key, expected) == ("clause.1.titel", "title")
    assert message == "Unknown key."


@pytest.mark.parametrize(
    ("changed", "key"),
    [
        ({"comparison": "more than"}, "clause.1.comparison"),
        ({"value": True}, "clause.1.value"),
        ({"unit": "lm"}, "clause.1"),
        ({"value": None}, "clause.1"),
        ({"comparison": "within"}, "clause.1"),
        ({"from": "2026-01-01"}, "clause.1.from"),
        ({"applies": [{"property": "voltage", "is": True}]}, "clause.1.applies.1.property"),
        ({"values": [{"value": 80}]}, "clause.1"),
    ],
)
def test_refused(changed: dict[str, Any], key: str) -> None:
    assert key in {place for place, *_ in problems({**GOOD, **changed})}


def test_overlapping_dates_are_refused() -> None:
    table = {key: item for key, item in GOOD.items() if key != "value"}
    values = [{"from": date(2025, 1, 1), "value": 80}, {"from": date(2026, 1, 1), "value": 90}]
    ((_, _, _, message),) = problems({**table, "values": values})
    assert "in force at one time" in message


def test_all_problems_are_listed() -> None:
    found = problems({**GOOD, "quantity": "raa"}, {**GOOD, "x": 1}, GOOD)
    assert [key.split(".")[1] for key, *_ in found] == ["1", "2"]


def test_one_id_twice() -> None:
    ((key, found, _, _),) = problems({**GOOD, "id": "a"}, {**GOOD, "id": "A"})
    assert (key, found) == ("clause.2.id", "A")


def test_none_is_none() -> None:
    assert buyer_clauses((), "campaign.toml") == ()
