"""Every source key used anywhere resolves, and every entry is complete."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from generator.datasets import sources
from generator.datasets.sources import STATUSES
from generator.quantities import QUANTITIES

GENERATOR = Path(__file__).parents[2] / "generator"
KEY = r"[a-z][a-z0-9]*(?:_[a-z0-9]+)*"


def keys_in_docstrings(text):
    """Keys after the word Source, the first word of every part between semicolons."""
    for statement in re.findall(r"Source:\s+((?:[^.]|\.(?=\d))*)", text):
        for part in statement.split(";"):
            words = part.split()
            key = words[0].rstrip(",") if words else ""
            if re.fullmatch(KEY, key) and re.search(r"[_\d]", key):
                yield key


def test_entries_are_complete():
    assert len(sources()) > 60
    for key, source in sources().items():
        assert re.fullmatch(KEY, key)
        assert source.key == key
        assert source.title
        assert source.publisher
        assert re.match(r"(\d{4}|published)", source.date)
        assert source.status in STATUSES


@pytest.mark.parametrize("name", sorted(QUANTITIES))
def test_every_quantity_resolves(name):
    assert QUANTITIES[name].source in sources()


def test_every_docstring_key_resolves():
    unknown = {
        f"{path.name}: {key}"
        for path in sorted(GENERATOR.rglob("*.py"))
        for key in keys_in_docstrings(path.read_text(encoding="utf-8"))
        if key not in sources()
    }
    assert unknown == set()


def test_keys_are_found_in_a_docstring():
    # The search above must not pass because it finds nothing
    text = "Source: cie_15, clause 7.1; iec_62471, Table 4.2. More: x; y."
    assert list(keys_in_docstrings(text)) == ["cie_15", "iec_62471"]
