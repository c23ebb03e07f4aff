"""Centres of colour consistency: named chromaticities, each with its own kind of step."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from typing import Literal

from generator.datasets.tables import reference_table
from generator.language import say

__all__ = ["CIRCLE_STEP", "Centre", "CentreSystem", "centres"]

CentreSystem = Literal["iec_60081", "ansi_c78_377_2008", "ansi_c78_377_2017", "declared"]

CIRCLE_STEP = 0.0011
"""Radius of one step as a circle in u′, v′. Source: cie_tn_001 (value not read there)."""

_TABLES: dict[CentreSystem, str] = {
    "iec_60081": "standard_colours_iec_60081_1997",
    "ansi_c78_377_2008": "nominal_colours_ansi_c78_377_2008",
    "ansi_c78_377_2017": "nominal_colours_ansi_c78_377_2017",
}


@dataclass(frozen=True, slots=True)
class Centre:
    """A chromaticity from which steps are counted.

    Parameters
    ----------
    system
        Table the centre belongs to, or ``declared`` for the supplier's own chromaticity.
    nominal_cct_k
        Nominal correlated colour temperature [K]; 0 for a declared chromaticity.
    x, y
        Chromaticity of the centre (CIE 1931).
    ellipse
        Coefficients g11, g12, g22 of one step in x, y where the system defines ellipses;
        ``None`` where a step is a circle of radius :data:`CIRCLE_STEP` in u′, v′.
    """

    system: CentreSystem
    nominal_cct_k: float
    x: float
    y: float
    ellipse: tuple[float, float, float] | None = None

    @property
    def method(self) -> str:
        """Method id with centre and kind of step, for instance ``sdcm_ellipse_iec_60081_3000k``."""
        kind = "circle" if self.ellipse is None else "ellipse"
        place = f"{self.x:.4f}_{self.y:.4f}"
        if self.system != "declared":
            place = f"{self.nominal_cct_k:.0f}k"
        return f"sdcm_{kind}_{self.system}_{place}"

    @property
    def label(self) -> str:
        """The centre in words."""
        names = {
            "iec_60081": "IEC 60081",
            "ansi_c78_377_2008": "ANSI C78.377-2008",
            "ansi_c78_377_2017": "ANSI C78.377-2017",
        }
        centre: str = say("declared chromaticity")
        if self.system != "declared":
            centre = f"{names[self.system]} {self.nominal_cct_k:.0f} K"
        if self.ellipse is None:
            return say(
                "{centre} ({x:.4f}, {y:.4f}), u′v′ circle", centre=centre, x=self.x, y=self.y
            )
        return say("{centre} ({x:.4f}, {y:.4f}), ellipse", centre=centre, x=self.x, y=self.y)


@cache
def centres(system: CentreSystem) -> tuple[Centre, ...]:
    """All centres of one system, by rising colour temperature.

    Parameters
    ----------
    system
        ``iec_60081`` (ellipses), ``ansi_c78_377_2008`` or ``ansi_c78_377_2017`` (circles).

    Returns
    -------
    tuple of Centre
        The centres. Source: iec_60081, Annex D; ansi_c78_377, nominal CCT tables.

    Raises
    ------
    KeyError
        If the system has no table (``declared`` has none).
    """
    table = reference_table(_TABLES[system])
    rows = [dict(zip(table.columns, row, strict=True)) for row in table.values.tolist()]
    return tuple(
        Centre(
            system,
            row["nominal_cct_k"],
            row["x"],
            row["y"],
            (row["g11"], row["g12"], row["g22"]) if "g11" in row else None,
        )
        for row in rows
    )
