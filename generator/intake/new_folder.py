"""A new campaign folder to fill in: headings, settings with examples, and what goes where."""

from __future__ import annotations

from collections.abc import Mapping
from importlib.resources import files

from generator.intake.columns import LAMP_COLUMNS, UNIT_FIGURES
from generator.intake.endurance_csv import ENDURANCE_COLUMNS

__all__ = ["new_campaign_files"]

_WITH_UNCERTAINTY = ("luminous_flux_lm", "power_w")


def new_campaign_files() -> Mapping[str, bytes]:
    """The files of a new campaign.

    Returns
    -------
    Mapping
        Path inside the folder -> content; a path that ends in ``/`` is an empty folder.
    """
    shipped = files("generator.intake").joinpath("new_campaign")
    units = ["unit_id", "lamp_id"]
    for name in UNIT_FIGURES:
        units += [name, f"u_{name}"] if name in _WITH_UNCERTAINTY else [name]
    return {
        "campaign.toml": shipped.joinpath("campaign.toml").read_bytes(),
        "README.md": shipped.joinpath("README.md").read_bytes(),
        "lamps.csv": _heading(LAMP_COLUMNS),
        "units.csv": _heading(units),
        "endurance.csv": _heading(ENDURANCE_COLUMNS),
        **{f"{folder}/": b"" for folder in ("spectra", "light", "mains", "intensity", "notes")},
    }


def _heading(columns: tuple[str, ...] | list[str]) -> bytes:
    return (",".join(columns) + "\r\n").encode()
