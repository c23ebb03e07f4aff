"""Product information is rounded as the act asks, and says where that would flatter."""

from __future__ import annotations

from datetime import date
from decimal import Decimal

import pytest

from generator.conformity.product_information import product_information
from generator.lawbook import read_law_book
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.lamp import Lamp
from generator.records.product_field import ProductField

DAY = date(2026, 3, 2)


def fields(
    figures: tuple[Figure, ...] = (), day: date = DAY, **changed: object
) -> dict[str, ProductField]:
    values: dict[str, object] = {
        "lamp_id": "a",
        "bidder": "Bidder",
        "model": "Model",
        "technology": "LED",
        "directional": False,
        "mains": True,
        "connected": False,
    }
    declared = changed.pop("declared", {})
    numbers = {name: Decimal(text) for name, text in declared.items()}  # type: ignore[attr-defined] # a test's table
    lamp = Lamp(**{**values, **changed, "declared": numbers})  # type: ignore[arg-type] # a test's table
    made = product_information(lamp, FigureSet(figures), read_law_book(), day)
    return {item.name: item for item in made}


@pytest.mark.parametrize(
    ("quantity", "declared", "name", "text", "flattered"),
    [
        # formats of Regulation (EU) 2019/2015 Annex V Table 3, as replaced by (EU) 2021/340;
        # 0.44 shown as 0.4 is the trap of Annex IX point 2(b)
        ("svm", "0.44", "stroboscopic effect metric (SVM)", "0.4", True),
        ("svm", "0.45", "stroboscopic effect metric (SVM)", "0.5", False),
        ("svm", "0.4", "stroboscopic effect metric (SVM)", "0.4", False),
        ("pst_lm", "1.04", "flicker metric (Pst LM)", "1.0", True),
        ("cct_k", "2749", "correlated colour temperature", "2700", False),
        ("cct_k", "2750", "correlated colour temperature", "2800", False),
        ("power_w", "8.04", "on-mode power", "8.0", True),
        ("power_w", "8.05", "on-mode power", "8.1", False),
        ("standby_power_w", "0.304", "standby power", "0.30", True),
        ("ra", "79.5", "colour rendering index", "80", True),
        ("ra", "80.4", "colour rendering index", "80", False),
        ("luminous_flux_lm", "805.5", "useful luminous flux", "806", True),
        ("displacement_factor", "0.896", "displacement factor", "0.90", True),
        ("lumen_maintenance_factor", "0.964", "lumen maintenance factor", "0.96", False),
        ("r9", "-3.5", "R9 colour rendering index", "-3", True),
        ("sdcm", "5.4", "colour consistency in MacAdam ellipses", "5", True),
        ("x", "0.43855", "chromaticity coordinate x", "0.439", False),
    ],
)
def test_rounding_and_its_warning(
    quantity: str,
    declared: str,
    name: str,
    text: str,
    flattered: bool,
) -> None:
    found = fields(declared={quantity: declared})[name]
    assert found.text == text
    assert found.declared == Decimal(declared)
    assert bool(found.warning) == flattered
    if flattered:
        assert declared in found.warning
        assert text in found.warning


def test_energy_is_the_figure_of_the_act() -> None:
    figure = Figure("a", "", "energy_kwh_per_1000h", Decimal(9), Grade.DECLARED, "EU 2019/2015")
    found = fields((figure,), declared={"power_w": "8.04"})["energy consumption in on-mode"]
    assert (found.text, found.unit, found.warning) == ("9", "kWh/1000 h", "")
    assert fields()["energy consumption in on-mode"].reason == "no power is declared"


def test_a_class_better_than_the_figures_is_warned_of() -> None:
    figure = Figure("a", "", "energy_efficiency_class", "E", Grade.DECLARED, "EU 2019/2015")
    better = fields((figure,), declared_energy_class="D")["energy efficiency class"]
    assert (better.text, better.warning) == ("D", "the declared flux and power give class E")
    assert not fields((figure,), declared_energy_class="F")["energy efficiency class"].warning
    assert fields()["energy efficiency class"].reason == "no class is declared"


def test_fields_of_other_kinds_of_lamp_are_not_asked() -> None:
    found = fields(declared={"svm": "0.3", "beam_angle_deg": "36"}, mains=False)
    assert found["stroboscopic effect metric (SVM)"].text == ""
    assert "mains light sources" in found["stroboscopic effect metric (SVM)"].reason
    assert "directional" in found["beam angle"].reason
    assert "connected" in found["networked standby power"].reason
    assert found["equivalent power"].reason == "no equivalence is claimed"


def test_a_directional_lamp_shows_its_useful_flux_and_beam() -> None:
    declared = {"useful_luminous_flux_lm": "345.2", "beam_angle_deg": "36.4"}
    found = fields(directional=True, declared=declared)
    assert (found["directional"].text, found["useful luminous flux"].text) == ("DLS", "345")
    assert (found["beam angle"].text, found["beam angle"].unit) == ("36", "°")


def test_what_is_not_declared_says_so() -> None:
    found = fields()
    assert found["colour rendering index"].reason == "not declared"
    assert found["envelope"].reason == "not stated in the campaign"
    assert all(bool(item.text) != bool(item.reason) for item in found.values())


def test_chromaticity_is_taken_from_the_measurement_where_none_is_declared() -> None:
    figure = Figure("a", "", "x", Decimal("0.43855"), Grade.COMPUTED, "xy")
    found = fields((figure,))["chromaticity coordinate x"]
    assert found.text == "0.439"
    assert found.rounding.endswith("measured, for none is declared")


def test_before_the_act_there_is_no_product_information() -> None:
    # Regulation (EU) 2019/2015 applies from 1 September 2021
    assert fields(day=date(2021, 8, 31)) == {}
    assert fields(day=date(2021, 9, 1))
