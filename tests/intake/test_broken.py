"""Every file of ``broken`` has one mistake; exactly that one is named, with place and cure."""

from __future__ import annotations

import shutil
import tomllib
from pathlib import Path
from typing import Any

import pytest

from generator.errors import DataProblems
from generator.intake import check_campaign, read_campaign

BROKEN = Path(__file__).parent / "broken"
CASES: list[dict[str, Any]] = tomllib.loads((BROKEN / "cases.toml").read_text("utf-8"))["case"]


@pytest.mark.parametrize("case", CASES, ids=lambda case: str(case["broken"]))
def test_the_mistake_is_named(case: dict[str, Any], intake_campaign: Path) -> None:
    shutil.copy(BROKEN / case["broken"], intake_campaign / case["stands_for"])
    errors = [item for item in check_campaign(intake_campaign) if item.level == "error"]
    assert [(e.file, e.row, e.column, e.found, e.expected) for e in errors] == [
        (
            case.get("file", case["stands_for"]),
            case.get("row"),
            case.get("column"),
            case["found"],
            case["expected"],
        )
    ]
    assert errors[0].message.endswith(".")
    with pytest.raises(DataProblems) as caught:
        read_campaign(intake_campaign)
    assert errors[0] in caught.value.problems


def test_every_broken_file_has_a_case() -> None:
    files = {path.name for path in BROKEN.iterdir()} - {"cases.toml"}
    assert files == {case["broken"] for case in CASES}
