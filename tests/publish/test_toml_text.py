"""TOML that is written reads back to the same tables."""

from __future__ import annotations

import tomllib
from datetime import date
from decimal import Decimal
from typing import Any

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from generator.publish.toml_text import toml_text


def read(text: str) -> dict[str, Any]:
    return tomllib.loads(text, parse_float=Decimal)


def test_the_tables_of_a_campaign_come_back() -> None:
    tables = {
        "spectra_unit": "W/nm",
        "campaign": {"title": 'A "quoted" \\ title\n2', "assessment_date": date(2026, 3, 2)},
        "uncertainty": {"power_w": "0.4 %", "ra": Decimal("0.60"), "cct_k": {"absolute": 30}},
        "clause": [
            {"id": "a", "value": Decimal("1E+2"), "source": {"act": "A", "point": "1"}},
            {"id": "b", "applies": [{"property": "mains", "is": True}], "within": []},
        ],
        "empty": {},
    }
    assert read(toml_text(tables)) == tables


TEXT = st.text(st.characters(codec="utf-8"), max_size=8)
PLAIN = (
    st.booleans()
    | st.integers(-(10**12), 10**12)
    | st.decimals(-(10**6), 10**6, places=4)
    | st.dates()
    | TEXT
    | st.lists(TEXT, max_size=3)
    | st.dictionaries(TEXT, TEXT, max_size=2)
)
TABLES = st.dictionaries(TEXT, st.dictionaries(TEXT, PLAIN, max_size=3), max_size=3)


@settings(max_examples=50, deadline=None, suppress_health_check=[HealthCheck.too_slow])
@given(TABLES)
def test_any_tables_come_back(tables: dict[str, Any]) -> None:
    assert read(toml_text(tables)) == tables
