"""The tables of a tender as they are read: every mistake with file, key and line."""

from __future__ import annotations

import pytest

from generator.intake.campaign_toml import read_settings
from generator.intake.tables.problem_list import ProblemList

TITLE = '[campaign]\ntitle = "T"\n'


def problems_of(text: str) -> list[tuple[int | None, str | None, str | None]]:
    problems = ProblemList("campaign.toml")
    read_settings(TITLE + text, problems)
    return [(item.row, item.column, item.found) for item in problems.problems]


@pytest.mark.parametrize(
    ("text", "row", "key", "found"),
    [
        ("[use]\ndiscount_rate_percent = 350\n", 4, "use.discount_rate_percent", "350"),
        ("[use]\ntariff_per_kwh = -0.1\n", 4, "use.tariff_per_kwh", "-0.1"),
        (
            "[use]\nyears = 2\ntariff_path_per_kwh = [0.2]\n",
            5,
            "use.tariff_path_per_kwh",
            "[0.2]",
        ),
        (
            "[tender]\nreports_from = 2026-02-01\nreports_to = 2026-01-01\n",
            5,
            "tender.reports_to",
            "2026-01-01",
        ),
        (
            '[[lot]]\nid = "a"\n[[lot]]\nid = "b"\ncompare_at = "equal light"\nquantity = 5\n',
            5,
            "lot.2.flux_per_point_lm",
            "no such key",
        ),
        ('[[lot]]\nid = "a"\nbeam_from_deg = 9\nbeam_to_deg = 8\n', 6, "lot.1.beam_to_deg", "8"),
        (
            (
                '[[award.criteria]]\nquantity = "ra"\nweight_percent = 100\nbetter = "higher"\n'
                'method = "linear"\nfull_score_at = 90\n'
            ),
            3,
            "award.criteria.1.zero_score_at",
            "no such key",
        ),
        (
            '[[award.criteria]]\nquantity = "ra"\nweight_percent = 60\nbetter = "higher"\n',
            3,
            "award.criteria",
            "60 %",
        ),
        ('[[room]]\nid = "r"\npoints = 0\n', 5, "room.1.points", "0"),
        ('[[lot]]\nid = "a"\nquantitiy = 5\n', 5, "lot.1.quantitiy", "quantitiy"),
        ("[tendre]\n", 3, "tendre", "tendre"),
    ],
)
def test_the_key_is_named(text: str, row: int, key: str, found: str) -> None:
    assert (row, key, found) in problems_of(text)


def test_a_mistyped_key_of_a_lot_is_answered_with_the_keys_of_a_lot() -> None:
    problems = ProblemList("campaign.toml")
    read_settings(TITLE + '[[lot]]\nid = "a"\nquantitiy = 5\n', problems)
    assert [item.expected for item in problems.problems] == ["quantity"]


def test_tables_of_a_tender_are_told_from_others() -> None:
    problems = ProblemList("campaign.toml")
    plain = read_settings(TITLE + "[sheet]\n", problems)
    tender = read_settings(TITLE + '[[lot]]\nid = "a"\n', problems)
    assert plain is not None
    assert tender is not None
    assert (plain.has_tender, tender.has_tender) == (False, True)
