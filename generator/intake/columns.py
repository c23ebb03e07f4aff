"""Columns of ``lamps.csv`` and ``units.csv``, and spans in which figures can lie, as data."""

from __future__ import annotations

from collections.abc import Collection, Iterable
from dataclasses import dataclass
from decimal import Decimal
from types import MappingProxyType

from generator.intake.tables.problem_list import ProblemList, nearest
from generator.intake.tables.text_table import Heading
from generator.language import numeral, say

__all__ = [
    "DECLARED_COLUMNS",
    "LAMP_COLUMNS",
    "LAMP_TEXTS",
    "SPANS",
    "UNIT_COLUMNS",
    "UNIT_FIGURES",
    "Span",
    "check_heading",
    "check_span",
]


@dataclass(frozen=True, slots=True)
class Span:
    """Where a figure can lie at all, and where it usually lies.

    Parameters
    ----------
    lowest, highest
        Possible values, in the unit of the catalogue; ``None`` where there is no bound.
    above
        True where the lowest value itself is impossible.
    usual
        Values outside these two are doubtful, not impossible.
    """

    lowest: Decimal | None
    highest: Decimal | None
    above: bool = False
    usual: tuple[Decimal, Decimal] | None = None

    def __str__(self) -> str:
        parts = []
        if self.lowest is not None:
            parts.append(f"above {self.lowest}" if self.above else f"{self.lowest} or more")
        if self.highest is not None:
            parts.append(f"{self.highest} or less")
        return ", ".join(parts)

    def holds(self, number: Decimal) -> bool:
        """Whether the number is possible."""
        if self.lowest is not None and (
            number < self.lowest or (self.above and number == self.lowest)
        ):
            return False
        return self.highest is None or number <= self.highest


def _spans() -> dict[str, Span]:
    # Bounds follow from the definitions (a factor is at most one, a power is not negative).
    # Usual values are common practice for lamps, no source.
    rows: list[tuple[str, str, str, bool, str, str]] = [
        ("luminous_flux_lm", "0", "", True, "1", "200000"),
        ("useful_luminous_flux_lm", "0", "", True, "1", "200000"),
        ("power_w", "0", "", True, "0.1", "2000"),
        ("standby_power_w", "0", "", False, "0", "5"),
        ("networked_standby_power_w", "0", "", False, "0", "5"),
        ("equivalent_power_w", "0", "", True, "1", "2000"),
        ("voltage_v", "0", "", True, "1", "1000"),
        ("current_a", "0", "", True, "0.001", "20"),
        ("frequency_hz", "0", "", False, "0", "1000"),
        ("power_factor", "0", "1", False, "0.1", "1"),
        ("displacement_factor", "0", "1", False, "0.1", "1"),
        ("thd_current_percent", "0", "", False, "0", "400"),
        ("beam_angle_deg", "0", "360", True, "2", "350"),
        ("peak_intensity_cd", "0", "", True, "1", "1000000"),
        ("ambient_temperature_c", "-90", "200", False, "10", "60"),
        ("luminance_cd_per_mm2", "0", "", True, "0.001", "1000"),
        ("light_emitting_area_mm2", "0", "", True, "0.1", "1000000"),
        ("length_mm", "0", "", True, "5", "3000"),
        ("cct_k", "0", "", True, "1000", "25000"),
        ("duv", "-0.5", "0.5", False, "-0.05", "0.05"),
        ("x", "0", "1", True, "0.1", "0.75"),
        ("y", "0", "1", True, "0.01", "0.85"),
        ("excitation_purity", "0", "1", False, "0", "1"),
        ("ra", "", "100", False, "0", "100"),
        ("r9", "", "100", False, "-250", "100"),
        ("sdcm", "0", "", False, "0", "20"),
        ("percent_flicker", "0", "200", False, "0", "100"),
        ("flicker_index", "0", "1", False, "0", "1"),
        ("svm", "0", "", False, "0", "10"),
        ("pst_lm", "0", "", False, "0", "50"),
        ("l70b50_h", "0", "", True, "1000", "200000"),
        ("survival_factor", "0", "1", False, "0.5", "1"),
        ("lumen_maintenance_factor", "0", "2", True, "0.5", "1.1"),
        ("hours_h", "0", "", False, "0", "200000"),
        ("unit_price", "0", "", False, "0.01", "100000"),
        ("expanded_uncertainty", "0", "", False, "", ""),
    ]
    return {
        name: Span(
            Decimal(low) if low else None,
            Decimal(high) if high else None,
            above,
            (Decimal(usual_low), Decimal(usual_high)) if usual_low else None,
        )
        for name, low, high, above, usual_low, usual_high in rows
    }


SPANS = MappingProxyType(_spans())
"""Possible and usual values by catalogue quantity; hours, price and uncertainty beside them."""

DECLARED_COLUMNS = MappingProxyType(
    {
        "declared_luminous_flux_lm": "luminous_flux_lm",
        "declared_power_w": "power_w",
        "declared_standby_power_w": "standby_power_w",
        "declared_networked_standby_power_w": "networked_standby_power_w",
        "declared_cct_k": "cct_k",
        "declared_x": "x",
        "declared_y": "y",
        "declared_ra": "ra",
        "declared_r9": "r9",
        "declared_displacement_factor": "displacement_factor",
        "declared_pst_lm": "pst_lm",
        "declared_svm": "svm",
        "declared_l70b50_h": "l70b50_h",
        "declared_beam_angle_deg": "beam_angle_deg",
        "declared_peak_intensity_cd": "peak_intensity_cd",
        "declared_survival_factor": "survival_factor",
        "declared_lumen_maintenance_factor": "lumen_maintenance_factor",
        "declared_colour_consistency_sdcm": "sdcm",
        "declared_equivalent_power_w": "equivalent_power_w",
        "declared_luminance_cd_per_mm2": "luminance_cd_per_mm2",
        "declared_excitation_purity": "excitation_purity",
        "light_emitting_area_mm2": "light_emitting_area_mm2",
        "length_mm": "length_mm",
    }
)
"""Column of ``lamps.csv`` -> catalogue quantity of the declared number."""

LAMP_COLUMNS = (
    "lamp_id",
    "bidder",
    "model",
    "cap",
    "technology",
    "directional",
    "mains",
    "connected",
    "colour_tuneable",
    "high_luminance",
    "anti_glare_shield",
    "dimmable",
    "reflector",
    "claimed_exemptions",
    "lot",
    "placed_on_market",
    *DECLARED_COLUMNS,
    "declared_energy_class",
    "unit_price",
    "currency",
    "quantity",
    "report_no",
    "report_date",
    "report_model",
    "report_laboratory",
    "report_accreditation",
)

LAMP_TEXTS = (
    "bidder",
    "model",
    "cap",
    "technology",
    "lot",
    "report_no",
    "report_model",
    "report_laboratory",
    "report_accreditation",
)
"""Columns of ``lamps.csv`` whose text the sheets print as it stands."""

UNIT_FIGURES = (
    "luminous_flux_lm",
    "power_w",
    "voltage_v",
    "current_a",
    "frequency_hz",
    "power_factor",
    "displacement_factor",
    "thd_current_percent",
    "standby_power_w",
    "networked_standby_power_w",
    "useful_luminous_flux_lm",
    "beam_angle_deg",
    "peak_intensity_cd",
    "ambient_temperature_c",
    "cct_k",
    "duv",
    "x",
    "y",
    "ra",
    "r9",
    "percent_flicker",
    "flicker_index",
    "svm",
    "pst_lm",
)
"""Figures that ``units.csv`` can report ready-made; each column bears its catalogue name."""

UNIT_COLUMNS = ("unit_id", "lamp_id", *UNIT_FIGURES, *(f"u_{name}" for name in UNIT_FIGURES))


def check_heading(
    heading: Heading, known: Collection[str], required: Iterable[str], problems: ProblemList
) -> bool:
    """Note columns that are missing and columns that nobody reads.

    Parameters
    ----------
    heading
        Heading of the table.
    known
        Every column the table can have.
    required
        Columns it must have.
    problems
        Where to note them.

    Returns
    -------
    bool
        False where a required column is missing.
    """
    missing = [name for name in required if name not in heading.names]
    strangers = [name for name in heading.names if name not in known]
    for name in missing:
        problems.error(
            f"The column {name} is missing.",
            row=heading.row,
            column=name,
            found=nearest(name, strangers) or "no such column",
            expected=name,
        )
    for name in strangers:
        near = nearest(name, known, cutoff=0.75)
        problems.warning(
            say("No column is called {name}; it is not read.", name=name),
            row=heading.row,
            column=name,
            found=name,
            expected=near or "a column of the campaign format",
        )
    return not missing


def check_span(
    number: Decimal,
    span: Span,
    row: int,
    column: str,
    problems: ProblemList,
) -> bool:
    """Note a number that is impossible (error) or unusual (warning).

    Parameters
    ----------
    number
        The number as written.
    span
        Where it can lie.
    row, column
        Where it stands.
    problems
        Where to note it.

    Returns
    -------
    bool
        False where the number is impossible.
    """
    if not span.holds(number):
        problems.error(
            f"{column} cannot be {number}.",
            row=row,
            column=column,
            found=str(number),
            expected=str(span),
        )
        return False
    if span.usual is not None and not span.usual[0] <= number <= span.usual[1]:
        problems.warning(
            say(
                "{column} is rarely {number}; is the unit right?",
                column=column,
                number=numeral(f"{number}"),
            ),
            row=row,
            column=column,
            found=str(number),
            expected=f"usually {span.usual[0]} to {span.usual[1]}",
        )
    return True
