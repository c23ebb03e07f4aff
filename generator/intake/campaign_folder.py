"""The campaign folder as a whole: which files it holds, and all of them read into one campaign."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass, field
from pathlib import Path
from typing import TYPE_CHECKING, TypeVar

from generator.errors import DataProblems, Problem
from generator.intake.campaign_toml import (
    TablesCheck,
    key_lines,
    line_of,
    note_further,
    read_settings,
)
from generator.intake.endurance_csv import read_endurance
from generator.intake.folder_listing import CampaignFile, list_campaign
from generator.intake.intensity_csv import read_intensity
from generator.intake.lamps_csv import read_lamps
from generator.intake.lettering import UncoveredCharacters, note_remarks
from generator.intake.register import Register
from generator.intake.spectra_csv import read_spectra
from generator.intake.tables.problem_list import ProblemList, nearest
from generator.intake.tables.source_file import decoded_text, read_source
from generator.intake.tables.text_table import read_heading
from generator.intake.units_csv import read_units
from generator.intake.waveforms_csv import read_light, read_mains
from generator.language import say
from generator.records.campaign import Campaign, InputFile
from generator.records.lamp import Lamp, Unit
from generator.records.raw import (
    EnduranceReading,
    IntensityTable,
    LightRecord,
    MainsCapture,
    SpectrumSet,
    SpectrumUnit,
)

if TYPE_CHECKING:
    from generator.records.settings import Settings

__all__ = ["TablesCheck", "WholeCheck", "check_campaign", "read_campaign"]

_RAW = frozenset({"spectra", "light", "long light", "mains", "intensity"})

WholeCheck = Callable[["Settings", tuple[Lamp, ...]], Iterable[Problem]]
"""Further checks on settings and lamps together: both in, problems out."""

Read = TypeVar("Read")
Record = TypeVar("Record", MainsCapture, IntensityTable)


def read_campaign(
    folder: Path,
    check_tables: TablesCheck | None = None,
    check_whole: WholeCheck | None = None,
    uncovered: UncoveredCharacters | None = None,
) -> Campaign:
    """Read a campaign folder.

    Parameters
    ----------
    folder
        The folder that holds ``campaign.toml``.
    check_tables
        What other rooms have to say on the tables of ``campaign.toml``, as they were parsed
        and whether or not they are otherwise right; its problems join the others.
    check_whole
        What other rooms have to say on settings and lamps together, where both could be read;
        its problems join the others.
    uncovered
        Gives the characters of a text that the sheets cannot print; where they stand is a
        warning.

    Returns
    -------
    Campaign
        Everything read and checked; what does not stop the issue stands in its warnings.

    Raises
    ------
    DataProblems
        If anything does stop it; carries every problem of every file.
    """
    reading = _Reading(folder, check_tables, check_whole, uncovered)
    campaign = reading.campaign()
    if campaign is None:
        raise DataProblems(reading.problems)
    return campaign


def check_campaign(folder: Path, check_tables: TablesCheck | None = None) -> tuple[Problem, ...]:
    """Read a campaign folder for its problems alone.

    Parameters
    ----------
    folder
        The folder that holds ``campaign.toml``.
    check_tables
        As for :func:`read_campaign`.

    Returns
    -------
    tuple of Problem
        Every problem of every file, in the order the files are read; empty where all is well.
    """
    reading = _Reading(folder, check_tables)
    reading.campaign()
    return tuple(reading.problems)


@dataclass(slots=True)
class _Reading:
    """One pass over a campaign folder: settings, lamps, units, then what was measured."""

    folder: Path
    check_tables: TablesCheck | None = None
    check_whole: WholeCheck | None = None
    uncovered: UncoveredCharacters | None = None
    problems: list[Problem] = field(default_factory=list)
    files: list[InputFile] = field(default_factory=list)
    register: Register = field(default_factory=Register)
    listed: tuple[CampaignFile, ...] = ()
    setting_lines: dict[tuple[str | int, ...], int] = field(default_factory=dict)

    def campaign(self) -> Campaign | None:
        """The campaign, or ``None`` after an error was noted."""
        self.listed, of_folder = list_campaign(self.folder)
        self.problems.extend(of_folder)
        if not self.listed:
            return None
        settings = self._settings()
        lamps = self._lamps()
        units = self._units()
        unit = settings.campaign.spectra_unit if settings is not None else None
        spectra = self._spectra(unit or "relative")
        light = self._light()
        endurance = self._endurance()
        mains = self._of_units("mains", read_mains)
        intensity = self._of_units("intensity", read_intensity)
        notes = self._notes()
        self._each(("template",), lambda *_: None)
        units += tuple(Unit(*added) for added in self.register.added_units)
        self._check_sources(units, endurance)
        self._check_whole(settings, lamps, units)
        if settings is None or any(problem.level == "error" for problem in self.problems):
            return None
        return Campaign(
            name=self.folder.resolve().name,
            settings=settings,
            lamps=lamps,
            units=units,
            spectra=spectra,
            light=light,
            mains=mains,
            intensity=intensity,
            endurance=endurance,
            notes=notes,
            warnings=tuple(self.problems),
            files=tuple(sorted(self.files, key=lambda entry: entry.path)),
        )

    def _each(
        self, kinds: tuple[str, ...], reader: Callable[[str, CampaignFile, ProblemList], Read]
    ) -> list[Read]:
        """Give every file of some kinds to a reader, and keep what it read and noted."""
        results = []
        for file in self.listed:
            if file.kind not in kinds:
                continue
            problems = ProblemList(file.name)
            source = read_source(file.path, problems)
            text = None
            if source is not None:
                self.files.append(source.entry)
                text = decoded_text(source.data, problems)
            if text is not None:
                results.append(reader(text, file, problems))
            self.problems.extend(problems.problems)
        return results

    def _settings(self) -> Settings | None:
        def read(text: str, _: CampaignFile, problems: ProblemList) -> Settings | None:
            self.setting_lines = key_lines(text)
            return read_settings(text, problems, self.check_tables, self.uncovered)

        settings = self._each(("campaign",), read)
        return settings[0] if settings else None

    def _lamps(self) -> tuple[Lamp, ...]:
        self.register.lamps_whole = False
        read = self._each(
            ("lamps",),
            lambda text, _, problems: read_lamps(text, self.register, problems, self.uncovered),
        )
        return read[0] if read else ()

    def _units(self) -> tuple[Unit, ...]:
        self.register.units_whole = all(file.kind != "units" for file in self.listed)
        read = self._each(
            ("units",), lambda text, _, problems: read_units(text, self.register, problems)
        )
        return read[0] if read else ()

    def _endurance(self) -> tuple[EnduranceReading, ...]:
        read = self._each(
            ("endurance",), lambda text, _, problems: read_endurance(text, self.register, problems)
        )
        return read[0] if read else ()

    def _spectra(self, unit: SpectrumUnit) -> tuple[SpectrumSet, ...]:
        def read(text: str, file: CampaignFile, problems: ProblemList) -> SpectrumSet | None:
            self._claim_columns(text, file.owner, problems)
            return read_spectra(text, file.owner, unit, problems)

        return tuple(item for item in self._each(("spectra",), read) if item is not None)

    def _light(self) -> tuple[LightRecord, ...]:
        def read(text: str, file: CampaignFile, problems: ProblemList) -> LightRecord | None:
            self._claim_columns(text, file.owner, problems)
            long = file.kind == "long light"
            return read_light(text, file.owner, problems, long=long)

        return tuple(item for item in self._each(("light", "long light"), read) if item is not None)

    def _claim_columns(self, text: str, lamp_id: str, problems: ProblemList) -> None:
        heading = read_heading(text, ProblemList(problems.file))
        if heading is None or not self.register.knows_lamp(lamp_id, problems, None, None):
            self.register.units_whole = False
            return
        for name in heading.names[1:]:
            self.register.claim_unit(name, lamp_id, problems, heading.row, name)

    def _of_units(
        self, kind: str, reader: Callable[[str, str, ProblemList], Record | None]
    ) -> tuple[Record, ...]:
        def read(text: str, file: CampaignFile, problems: ProblemList) -> Record | None:
            self.register.knows_unit(file.owner, problems)
            return reader(text, file.owner, problems)

        return tuple(item for item in self._each((kind,), read) if item is not None)

    def _notes(self) -> dict[str, str]:
        known = (*self.register.lamp_ids, "campaign")

        def read(text: str, file: CampaignFile, problems: ProblemList) -> tuple[str, str]:
            if file.owner not in known and self.register.lamps_whole:
                problems.warning(
                    say(
                        "lamps.csv has no lamp {lamp}; the remarks stand nowhere.", lamp=file.owner
                    ),
                    found=file.owner,
                    expected=nearest(file.owner, known) or "a lamp_id of lamps.csv, or campaign",
                )
            elif self.uncovered is not None:
                note_remarks(text, self.uncovered, problems)
            return file.owner, text

        return {owner: text for owner, text in self._each(("notes",), read) if owner in known}

    def _check_sources(
        self, units: tuple[Unit, ...], endurance: tuple[EnduranceReading, ...]
    ) -> None:
        raw = any(file.kind in _RAW for file in self.listed)
        reported = any(unit.reported for unit in units)
        if raw or reported or endurance or not self.register.units_whole:
            return
        problems = ProblemList("units.csv")
        problems.error(
            "The campaign has no measurements.",
            found="no figure in units.csv, no raw file",
            expected="figures in units.csv, or files in spectra, light, mains or intensity, "
            "or endurance.csv",
        )
        self.problems.extend(problems.problems)

    def _check_whole(
        self, settings: Settings | None, lamps: tuple[Lamp, ...], units: tuple[Unit, ...]
    ) -> None:
        problems = ProblemList("lamps.csv")
        if self.register.lamps_whole and self.register.units_whole:
            measured = {unit.lamp_id for unit in units}
            for lamp in lamps:
                if lamp.lamp_id not in measured:
                    problems.warning(
                        say("No unit of lamp {lamp} was measured.", lamp=lamp.lamp_id),
                        row=lamp.row,
                        column="lamp_id",
                        found=lamp.lamp_id,
                        expected="at least one unit",
                    )
        self.problems.extend(problems.problems)
        if settings is not None and self.register.lamps_whole:
            self.problems.extend(_against_settings(settings, lamps, self.setting_lines))
            self._check_further(settings, lamps)

    def _check_further(self, settings: Settings, lamps: tuple[Lamp, ...]) -> None:
        problems = ProblemList("campaign.toml")
        for problem in self.check_whole(settings, lamps) if self.check_whole else ():
            if problem.file == problems.file:
                note_further(problem, self.setting_lines, problems)
            else:
                self.problems.append(problem)
        self.problems.extend(problems.problems)


def _against_settings(
    settings: Settings, lamps: tuple[Lamp, ...], lines: dict[tuple[str | int, ...], int]
) -> tuple[Problem, ...]:
    problems = ProblemList("campaign.toml")
    baseline = settings.use.baseline_lamp
    existing = [item.id for item in settings.existing_lamp]
    known = [*existing, *(lamp.lamp_id for lamp in lamps)]
    if baseline is not None and baseline not in known:
        problems.error(
            f"lamps.csv has no lamp {baseline}.",
            row=line_of(("use", "baseline_lamp"), lines),
            column="use.baseline_lamp",
            found=baseline,
            expected=nearest(baseline, known)
            or "a lamp_id of lamps.csv or the id of an existing_lamp",
        )
    currency = settings.use.currency
    priced = {lamp.offer.currency: lamp.row for lamp in reversed(lamps) if lamp.offer.currency}
    if currency is not None and len(priced) == 1 and currency not in priced:
        (offered, row) = priced.popitem()
        problems.error(
            f"Energy in {currency} and lamps in {offered} cannot be added up.",
            row=line_of(("use", "currency"), lines),
            column="use.currency",
            found=currency,
            expected=f"{offered}, as in row {row} of lamps.csv",
        )
    return problems.problems
