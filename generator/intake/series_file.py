"""One file alone: a spectrum, light or mains CSV file outside any campaign."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path
from typing import Literal

from generator.errors import DataProblems
from generator.intake.spectra_csv import read_spectra
from generator.intake.tables.number_table import read_number_table
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.source_file import decoded_text, read_source
from generator.intake.tables.text_table import read_heading
from generator.intake.waveforms_csv import MAINS_HEADING, light_record, mains_capture
from generator.records.raw import LightRecord, MainsCapture, SpectrumSet, SpectrumUnit

__all__ = ["SeriesFile", "SeriesKind", "read_series"]

SeriesKind = Literal["spectrum", "light", "mains"]


@dataclass(frozen=True, slots=True, eq=False)
class SeriesFile:
    """A file of series that was read.

    Parameters
    ----------
    file
        The path as it was given.
    kind
        What the first columns say it is.
    names
        Column headings of the series; the name of the file for a mains capture.
    record
        The series: a :class:`SpectrumSet`, :class:`LightRecord` or :class:`MainsCapture`
        whose ``lamp_id`` or ``unit_id`` is the name of the file.
    """

    file: str
    kind: SeriesKind
    names: tuple[str, ...]
    record: SpectrumSet | LightRecord | MainsCapture


def read_series(path: Path, spectra_unit: SpectrumUnit = "relative") -> SeriesFile:
    """Read one spectrum, light or mains file; its first columns say which it is.

    Parameters
    ----------
    path
        The file, ``.csv`` or ``.csv.gz``.
    spectra_unit
        What the values of a spectrum file are in; the file cannot say it.

    Returns
    -------
    SeriesFile
        The series.

    Raises
    ------
    DataProblems
        If the file cannot be used; carries every problem found.
    """
    problems = ProblemList(str(path))
    series = _series(path, spectra_unit, problems)
    if series is None or problems.errors:
        raise DataProblems(problems.problems)
    return series


def _series(path: Path, spectra_unit: SpectrumUnit, problems: ProblemList) -> SeriesFile | None:
    source = read_source(path, problems)
    text = None if source is None else decoded_text(source.data, problems)
    if text is None:
        return None
    kind = _kind(text, problems)
    name = path.name.split(".")[0]
    record: SpectrumSet | LightRecord | MainsCapture | None = None
    if kind == "spectrum":
        record = read_spectra(text, name, spectra_unit, problems)
    elif kind is not None:
        table = read_number_table(text, problems)
        if table is not None and kind == "light":
            record = light_record(table, name, problems, long=None)
        elif table is not None:
            record = mains_capture(table, name, problems)
    if kind is None or record is None:
        return None
    names = (name,) if isinstance(record, MainsCapture) else record.unit_ids
    return SeriesFile(str(path), kind, names, record)


def _kind(text: str, problems: ProblemList) -> SeriesKind | None:
    heading = read_heading(text, problems)
    if heading is None:
        return None
    if heading.names[0] == "wavelength_nm":
        return "spectrum"
    if "time_s" in heading.names and not set(heading.names).isdisjoint(MAINS_HEADING[1:]):
        return "mains"
    if heading.names[0] == "time_s":
        return "light"
    problems.error(
        "The columns are not those of a spectrum, light or mains file.",
        row=heading.row,
        column=heading.names[0],
        found=heading.names[0],
        expected="wavelength_nm or time_s as the first column",
    )
    return None
