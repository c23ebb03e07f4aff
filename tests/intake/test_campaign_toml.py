from __future__ import annotations

from decimal import Decimal

import pytest

from generator.intake.campaign_toml import INPUT_UNCERTAINTIES, key_lines, read_settings
from generator.intake.tables.problem_list import ProblemList


def _read(text: str) -> tuple[object, list[tuple[int | None, str | None, str]]]:
    problems = ProblemList("campaign.toml")
    settings = read_settings(text, problems)
    return settings, [(p.row, p.column, p.expected) for p in problems.problems]


TITLE = '[campaign]\ntitle = "T"\n'


def test_numbers_are_exact() -> None:
    problems = ProblemList("campaign.toml")
    settings = read_settings(
        TITLE + "[use]\ntariff_per_kwh = 0.10\n[uncertainty]\nra = 0.3\n", problems
    )
    assert settings is not None
    assert str(settings.use.tariff_per_kwh) == "0.10"
    assert settings.uncertainty["ra"].absolute == Decimal("0.3")
    assert problems.problems == ()


def test_uncertainty_in_its_four_ways() -> None:
    problems = ProblemList("campaign.toml")
    settings = read_settings(
        TITLE
        + '[uncertainty]\nra = 1\nrf = "2.5%"\nsvm = {percent = 4.0}\nx = {absolute = 0.001}\n',
        problems,
    )
    assert settings is not None
    ten = Decimal(10)
    assert {name: rule.of(ten) for name, rule in settings.uncertainty.items()} == {
        "ra": Decimal(1),
        "rf": Decimal("0.25"),
        "svm": Decimal("0.4"),
        "x": Decimal("0.001"),
    }


def test_uncertainties_of_raw_data_are_known() -> None:
    lines = "".join(f"{name} = 0.2\n" for name in INPUT_UNCERTAINTIES)
    settings, problems = _read(TITLE + "[uncertainty]\n" + lines)
    assert settings is not None
    assert problems == []


@pytest.mark.parametrize(
    "text", ['spectra_unit = "W/nm"\n' + TITLE, TITLE + 'spectra_unit = "W/nm"\n']
)
def test_the_spectra_unit_stands_at_the_top_or_in_the_campaign(text: str) -> None:
    problems = ProblemList("campaign.toml")
    settings = read_settings(text, problems)
    assert settings is not None
    assert settings.campaign.spectra_unit == "W/nm"


def test_a_wrong_unit_at_the_top_is_named_at_the_top() -> None:
    _, problems = _read('spectra_unit = "W"\n' + TITLE)
    assert problems == [(1, "spectra_unit", "'W/nm' or 'relative'")]


def test_all_mistakes_at_once() -> None:
    _, problems = _read(
        "[campaign]\n"
        "titel = 'T'\n"
        "[uncertainty]\n"
        "luminous_flux = 3\n"
        "ra = true\n"
        "[laboratory]\n"
        "methods = [1, 'sphere']\n"
        "[use]\n"
        "years = 0\n"
        "tariff_per_kwh = inf\n"
        "currency = 'euro'\n"
        "[award]\n"
        "criteria = [\n"
        "  {quantity = 'ra', weight_percent = 100, better = 'more'},\n"
        "]\n"
    )
    assert {(row, column) for row, column, _ in problems} == {
        (1, "campaign.title"),
        (2, "campaign.titel"),
        (4, "uncertainty.luminous_flux"),
        (5, "uncertainty.ra"),
        (7, "laboratory.methods"),
        (9, "use.years"),
        (10, "use.tariff_per_kwh"),
        (11, "use.currency"),
        (13, "award.criteria.1.better"),
    }
    assert (2, "campaign.titel", "title") in problems
    assert (4, "uncertainty.luminous_flux", "luminous_flux_lm") in problems


@pytest.mark.parametrize(
    ("text", "row"),
    [
        ("a = \n", 1),
        (TITLE + "title = 'again'\n", 3),
        (TITLE + "x = 'open\n", 3),
        ("a = " + "[" * 5000, 1),
        ("a = " + "9" * 5000, 1),
    ],
)
def test_what_is_not_toml_is_named_by_its_line(text: str, row: int) -> None:
    settings, problems = _read(text)
    assert settings is None
    assert problems == [(row, None, "TOML 1.0")]


@pytest.mark.parametrize(
    ("value", "found"),
    [("[" * 5000, "lists or tables too deep"), ("9" * 5000, "a number of too many digits")],
)
def test_what_no_parser_takes_is_said_in_plain_words(value: str, found: str) -> None:
    problems = ProblemList("campaign.toml")
    assert read_settings(f"a = {value}", problems) is None
    assert problems.problems[0].found.startswith(found)


@pytest.mark.parametrize("text", ["", "campaign = 5\n", "[[campaign]]\n", "campaign = []\n"])
def test_a_file_without_campaign_table(text: str) -> None:
    settings, problems = _read(text)
    assert settings is None
    assert [column for _, column, _ in problems] == ["campaign"]


def test_lines_of_keys() -> None:
    text = (
        'top = 1\n[a]\nb = """\nc = 1\n[x]\n"""\nd.e = 2\n'
        '[[f]]\ng = 1\n[[f]]\n"h" = 1 # [z]\n[f.i]\nj = 1\n'
    )
    lines = key_lines(text)
    assert lines["top",] == 1
    assert lines["a",] == 2
    assert lines["a", "b"] == 3
    assert ("a", "c") not in lines
    assert ("x",) not in lines
    assert lines["a", "d", "e"] == 7
    assert lines["f", 0, "g"] == 9
    assert lines["f", 1, "h"] == 11
    assert lines["f", 1, "i", "j"] == 13


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("[uncertainty]\nra = {absolut = 1}\n", "absolute"),
        ("[[award.criteria]]\nquantity = 'ra'\nweigth_percent = 100\n", "weight_percent"),
        ("[supply]\nfrequency = 50\n", "frequency_hz"),
        ("[labratory]\n", "laboratory"),
    ],
)
def test_a_mistyped_key_is_answered_with_the_key_meant(text: str, expected: str) -> None:
    assert expected in [cure for _, _, cure in _read(TITLE + text)[1]]
