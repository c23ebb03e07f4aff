from __future__ import annotations

from datetime import date
from decimal import Decimal
from fractions import Fraction

import pytest

from generator.conformity.evidence import LampRecord
from generator.conformity.scope import _figure_text, in_scope, unit_in_scope, window_bounds
from generator.records.clause import DatedValue, LawBook
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.lamp import Lamp

F = Fraction


@pytest.fixture
def window(law: LawBook) -> DatedValue:
    return law.constant("eu-2019-2020-scope-window", date(2025, 1, 1))


@pytest.mark.parametrize(
    ("x", "lower", "upper"),
    # -2.3172 x^2 + 2.3653 x - 0.2199 and - 0.1595, worked apart to five decimals.
    [
        ("0.4578", 0.37729, 0.43769),
        ("0.3818", 0.34539, 0.40579),
        ("0.3127", 0.29315, 0.35355),
        ("0.5300", 0.38281, 0.44321),
    ],
)
def test_bounds(window: DatedValue, x: str, lower: float, upper: float) -> None:
    found = window_bounds(F(x), window)
    assert float(found[0]) == pytest.approx(lower, abs=5e-6)
    assert float(found[1]) == pytest.approx(upper, abs=5e-6)
    assert found[1] - found[0] == F("0.0604")


def test_figures_and_window_are_written_with_like_decimals(window: DatedValue) -> None:
    # The window at x = 0.44, worked apart: y from 0.372222 to 0.432622.
    figures = {"x": F("0.44"), "y": F("0.403512"), "luminous_flux_lm": F("668"), "ra": F("84.753")}
    written = {name: str(_figure_text(name, figures, window)) for name in figures}
    assert written == {
        "x": "chromaticity x 0.44000",
        "y": "chromaticity y 0.40351 (window 0.37222 to 0.43262)",
        "luminous_flux_lm": "luminous flux 668.00 lm",
        "ra": "general colour rendering index 84.75",
    }


def test_one_figure_outside_settles_it(window: DatedValue) -> None:
    assert unit_in_scope({"luminous_flux_lm": F(59)}, window) is False
    assert unit_in_scope({"luminous_flux_lm": F(600)}, window) is None
    assert unit_in_scope({}, window) is None


def test_the_curve_itself_is_outside(window: DatedValue) -> None:
    lower, upper = window_bounds(F("0.4"), window)
    rest = {"x": F("0.4"), "luminous_flux_lm": F(800), "ra": F(80)}
    assert unit_in_scope({**rest, "y": lower}, window) is False
    assert unit_in_scope({**rest, "y": upper}, window) is False
    assert unit_in_scope({**rest, "y": lower + F(1, 10**9)}, window) is True


@pytest.mark.parametrize(
    ("fluxes", "found"),
    # Annex IV: one unit in scope makes the model a light source, wherever it stands in the sample.
    [((59, 60, 59), True), ((60, 59), True), ((59, 59), False)],
)
def test_one_unit_in_scope_is_enough(
    window: DatedValue, fluxes: tuple[int, ...], found: bool
) -> None:
    figures = [
        Figure("L1", f"u{number}", name, Decimal(value), Grade.REPORTED, "units.csv")
        for number, flux in enumerate(fluxes)
        for name, value in (("x", "0.38"), ("y", "0.38"), ("luminous_flux_lm", flux), ("ra", 80))
    ]
    units = tuple(f"u{number}" for number in range(len(fluxes)))
    record = LampRecord(Lamp("L1", "Bidder", "Model"), units, FigureSet(figures))
    assert in_scope(record, window) is found
