"""A campaign: everything read from one folder, checked, and ready for the metrics rooms."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from generator.errors import Problem
from generator.records.lamp import Lamp, Unit
from generator.records.raw import (
    EnduranceReading,
    IntensityTable,
    LightRecord,
    MainsCapture,
    SpectrumSet,
)

if TYPE_CHECKING:
    from generator.records.settings import Settings

__all__ = ["Campaign", "InputFile"]


@dataclass(frozen=True, slots=True)
class InputFile:
    """One file of the campaign as it was read: path inside the folder, size [bytes], SHA-256."""

    path: str
    size: int
    sha256: str


@dataclass(frozen=True, slots=True, eq=False)
class Campaign:
    """One campaign folder, read and checked.

    Parameters
    ----------
    name
        Name of the folder; also the name of the output folder.
    settings
        ``campaign.toml``.
    lamps, units
        In the order of ``lamps.csv`` and ``units.csv``; units that only raw files name follow.
    spectra, light, mains, intensity, endurance
        Raw measurements.
    notes
        ``lamp_id`` -> Markdown; the key ``campaign`` holds the remarks on the whole.
    warnings
        Problems that do not stop the issue but are named on the sheet.
    files
        Every file read.
    """

    name: str
    settings: Settings
    lamps: tuple[Lamp, ...]
    units: tuple[Unit, ...]
    spectra: tuple[SpectrumSet, ...] = ()
    light: tuple[LightRecord, ...] = ()
    mains: tuple[MainsCapture, ...] = ()
    intensity: tuple[IntensityTable, ...] = ()
    endurance: tuple[EnduranceReading, ...] = ()
    notes: Mapping[str, str] = field(default_factory=dict)
    warnings: tuple[Problem, ...] = ()
    files: tuple[InputFile, ...] = ()

    def units_of(self, lamp_id: str) -> tuple[Unit, ...]:
        """The units of one lamp, in file order."""
        return tuple(unit for unit in self.units if unit.lamp_id == lamp_id)

    def lamp(self, lamp_id: str) -> Lamp:
        """The lamp of that id; ``KeyError`` where there is none."""
        for lamp in self.lamps:
            if lamp.lamp_id == lamp_id:
                return lamp
        raise KeyError(lamp_id)
