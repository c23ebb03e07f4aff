"""``campaign.toml``: the settings of a campaign, every mistake named by its key and line."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Callable, Iterable, Iterator, Mapping
from decimal import Decimal
from typing import TYPE_CHECKING, Any, get_args

from generator.errors import Problem
from generator.intake.lettering import UncoveredCharacters, note_uncovered, texts_in
from generator.intake.tables.problem_list import ProblemList, nearest
from generator.language import say
from generator.language.speaking import LANGUAGES
from generator.quantities import QUANTITIES
from generator.records.setting_words import alternatives, as_written, expected_words

if TYPE_CHECKING:
    from pydantic import BaseModel, ValidationError
    from pydantic_core import ErrorDetails

    from generator.records.settings import Settings

__all__ = [
    "INPUT_UNCERTAINTIES",
    "TablesCheck",
    "key_lines",
    "line_of",
    "note_further",
    "read_settings",
]

INPUT_UNCERTAINTIES = (
    "wavelength_scale_nm",
    "spectral_noise_percent",
    "spectral_calibration_percent",
    "light_noise_percent",
    "light_offset_percent",
    "time_base_percent",
    "voltage_current_skew_us",
    "angle_deg",
    "flux_repeatability_percent",
    "chromaticity_repeatability",
)
"""Keys of ``[uncertainty]`` about the raw data, beside those named after quantities.

All are expanded uncertainties (k = 2):

``wavelength_scale_nm``
    Shift of the whole wavelength scale [nm].
``spectral_noise_percent``
    Independent error of every sample of a spectrum [percent of its peak].
``spectral_calibration_percent``
    Smooth error of the spectral responsivity [percent].
``light_noise_percent``
    Independent error of every sample of a light record [percent of its mean].
``light_offset_percent``
    Dark signal and stray light left in a light record [percent of its mean].
``time_base_percent``
    Error of the sampling rate; bears on frequencies [percent].
``voltage_current_skew_us``
    Delay of the current channel against the voltage channel [µs].
``angle_deg``
    Error of the angle from the optical axis, common to a distribution [degrees].
``flux_repeatability_percent``
    What two readings of the same flux by the same instrument, an ageing test apart, may each be
    off; the calibration, common to both, is not in it [percent].
``chromaticity_repeatability``
    The same for u′ and v′, each.
"""

_AT_LINE = re.compile(r"\s*\(at line ([0-9]+), column ([0-9]+)\)|\s*\(at end of document\)")
_TABLE = re.compile(r"\s*(\[\[?)\s*([^\[\]]+?)\s*\]\]?\s*(?:#.*)?$")
_KEY = re.compile(r"""\s*((?:[A-Za-z0-9_-]+|"[^"]*"|'[^']*')(?:\s*\.\s*[A-Za-z0-9_"'-]+)*)\s*=""")
_MULTI_LINE = re.compile(r'"""|\'\'\'')
_WHOLE = 100

_Path = tuple[str | int, ...]


TablesCheck = Callable[[Mapping[str, Any]], Iterable[Problem]]
"""Further checks on the tables of ``campaign.toml``: parsed tables in, problems out."""


def read_settings(
    text: str,
    problems: ProblemList,
    check_tables: TablesCheck | None = None,
    uncovered: UncoveredCharacters | None = None,
) -> Settings | None:
    """Read the settings.

    Parameters
    ----------
    text
        Content of ``campaign.toml``.
    problems
        Where to note what is wrong.
    check_tables
        Further checks on the parsed tables, run whether or not these are otherwise right.
    uncovered
        Gives the characters of a text that the sheets cannot print.

    Returns
    -------
    Settings or None
        The settings, or ``None`` after an error was noted.
    """
    from pydantic import ValidationError

    from generator.records.settings import Settings

    raw = _parsed(text, problems)
    if raw is None:
        return None
    lines = key_lines(text)
    before = problems.errors
    moved = _move_spectra_unit(raw, lines, problems)
    _check_uncertainty_keys(raw.get("uncertainty"), lines, problems)
    settings = None
    try:
        settings = Settings.model_validate(raw)
    except ValidationError as failure:
        _note_all(failure, raw, lines, problems, moved=moved)
    if settings is not None:
        _check_weights(settings, lines, problems)
        _check_language(settings, lines, problems)
    for problem in check_tables(raw) if check_tables else ():
        note_further(problem, lines, problems)
    if uncovered is not None:
        _check_lettering(raw, uncovered, lines, problems)
    return settings if problems.errors == before else None


def note_further(problem: Problem, lines: Mapping[_Path, int], problems: ProblemList) -> None:
    """Note a problem of another room, with the line its dotted key stands on.

    Parameters
    ----------
    problem
        The problem; its column is the dotted key.
    lines
        Lines of the keys, as :func:`key_lines` gives them.
    problems
        Where to note it.
    """
    path = tuple(
        int(part) - 1 if part.isdecimal() else part for part in (problem.column or "").split(".")
    )
    note = problems.error if problem.level == "error" else problems.warning
    note(
        problem.message,
        row=line_of(path, lines),
        column=problem.column,
        found=problem.found,
        expected=problem.expected,
    )


def key_lines(text: str) -> dict[_Path, int]:
    """Find the line on which each table and key of a TOML file begins.

    Parameters
    ----------
    text
        A valid TOML file.

    Returns
    -------
    dict
        Path of keys and positions -> line counted from 1. Keys inside inline tables are left
        out; the key that holds the inline table stands for them.
    """
    lines: dict[_Path, int] = {}
    counts: dict[_Path, int] = {}
    table: _Path = ()
    for row, line in _outside_text_blocks(text):
        heading = _TABLE.match(line)
        if heading is not None:
            table = _placed(_split(heading[2]), counts, repeated=heading[1] == "[[")
            lines.setdefault(table, row)
            continue
        key = _KEY.match(line)
        if key is not None:
            path = (*table, *_split(key[1]))
            for end in range(len(table) + 1, len(path) + 1):
                lines.setdefault(path[:end], row)
    return lines


def line_of(path: tuple[str | int, ...], lines: Mapping[_Path, int]) -> int | None:
    """The line of a key (of a list, where it begins), or of the nearest table that holds it."""
    for end in range(len(path), 0, -1):
        for known in (path[:end], (*path[:end], 0)):
            if known in lines:
                return lines[known]
    return None


def _outside_text_blocks(text: str) -> Iterator[tuple[int, str]]:
    mark = ""
    for row, line in enumerate(text.split("\n"), start=1):
        inside = bool(mark)
        for quotes in _MULTI_LINE.findall(line):
            if not mark:
                mark = quotes
            elif mark == quotes:
                mark = ""
        if not inside:
            yield row, line


def _split(dotted: str) -> tuple[str, ...]:
    parts = re.findall(r"""[A-Za-z0-9_-]+|"[^"]*"|'[^']*'""", dotted)
    return tuple(part.strip("\"'") for part in parts)


def _placed(names: tuple[str, ...], counts: dict[_Path, int], *, repeated: bool) -> _Path:
    path: _Path = ()
    for depth, name in enumerate(names, start=1):
        path = (*path, name)
        if repeated and depth == len(names):
            counts[path] = counts.get(path, -1) + 1
        if path in counts:
            path = (*path, counts[path])
    return path


def _parsed(text: str, problems: ProblemList) -> dict[str, Any] | None:
    try:
        return tomllib.loads(text, parse_float=Decimal)
    except (ValueError, RecursionError) as failure:
        message = _mistake(failure)
        place = _AT_LINE.search(message)
        last = text.rstrip("\n").count("\n") + 1
        problems.error(
            "The file is not valid TOML.",
            row=int(place[1]) if place and place[1] else last,
            found=_AT_LINE.sub("", message),
            expected="TOML 1.0",
        )
        return None


def _mistake(failure: ValueError | RecursionError) -> str:
    """What the parser says of the file; not what it says of itself."""
    if isinstance(failure, tomllib.TOMLDecodeError):
        return str(failure)
    if isinstance(failure, RecursionError):
        return "lists or tables too deep inside one another"
    return "a number of too many digits"


def _move_spectra_unit(raw: dict[str, Any], lines: dict[_Path, int], problems: ProblemList) -> bool:
    if "spectra_unit" not in raw or not isinstance(raw.get("campaign"), dict):
        return False
    unit = raw.pop("spectra_unit")
    if "spectra_unit" in raw["campaign"]:
        problems.error(
            "spectra_unit stands twice.",
            row=lines.get(("campaign", "spectra_unit")),
            column="campaign.spectra_unit",
            found="at the top of the file and in [campaign]",
            expected="spectra_unit once",
        )
        return False
    raw["campaign"]["spectra_unit"] = unit
    return True


def _check_uncertainty_keys(table: object, lines: dict[_Path, int], problems: ProblemList) -> None:
    if not isinstance(table, dict):
        return
    known = (*QUANTITIES, *INPUT_UNCERTAINTIES)
    for name in table:
        if name not in known:
            problems.error(
                f"No quantity is called {name}.",
                row=line_of(("uncertainty", name), lines),
                column=f"uncertainty.{name}",
                found=name,
                expected=nearest(name, known) or "a quantity of the catalogue",
            )


def _note_all(
    failure: ValidationError,
    raw: dict[str, Any],
    lines: dict[_Path, int],
    problems: ProblemList,
    *,
    moved: bool,
) -> None:
    from generator.records.setting_values import WRONG_KEY

    found: dict[_Path, list[ErrorDetails]] = {}
    for error in failure.errors(include_url=False):
        blamed = _real_path(error["loc"], raw)
        if error["type"] == WRONG_KEY:
            blamed = (*blamed, str(error["ctx"]["key"]))
        found.setdefault(blamed, []).append(error)
    unit = ("campaign", "spectra_unit")
    for path, details in sorted(found.items(), key=lambda item: line_of(item[0], lines) or 0):
        _note(details, path[1:] if moved and path == unit else path, lines, problems)


def _note(
    details: list[ErrorDetails], path: _Path, lines: dict[_Path, int], problems: ProblemList
) -> None:
    """Note what is wrong with one key; several details are what it could have been instead."""
    key = _dotted(path)
    row = line_of(path, lines)
    detail = details[0]
    if detail["type"] == "missing":
        problems.error(
            f"{key} is missing.", row=row, column=key, found="no such key", expected=f"{key} = …"
        )
    elif detail["type"] == "extra_forbidden":
        keys = _keys_of(path[:-1])
        near = nearest(str(path[-1]), keys)
        problems.error(
            f"No setting is called {key}.",
            row=row,
            column=key,
            found=str(path[-1]),
            expected=near or "one of " + ", ".join(keys),
        )
    else:
        heading = ".".join(part for part in path if isinstance(part, str))
        problems.error(
            f"{key} is not as it must be.",
            row=row,
            column=key,
            found=_found(detail, path),
            expected=alternatives(expected_words(item, heading) for item in details),
        )


def _dotted(path: _Path) -> str:
    return ".".join(str(part + 1) if isinstance(part, int) else part for part in path)


def _found(detail: ErrorDetails, path: _Path) -> str:
    """What stands there; of a table whose keys do not go together, under the key to blame."""
    found = detail["input"]
    if "key" in detail.get("ctx", {}) and isinstance(found, dict):
        return as_written(found[path[-1]]) if path[-1] in found else "no such key"
    return as_written(found)


def _real_path(loc: tuple[str | int, ...], raw: object) -> _Path:
    path: _Path = ()
    here = raw
    for part in loc:
        if isinstance(here, dict):
            if part not in here:
                return (*path, part)
            here = here[part]
        elif isinstance(here, list) and isinstance(part, int) and part < len(here):
            here = here[part]
        else:
            return path
        path = (*path, part)
    return path


def _keys_of(path: _Path) -> tuple[str, ...]:
    from generator.records.settings import Settings

    model: type[BaseModel] = Settings
    for name in path:
        if isinstance(name, int):
            continue
        field = model.model_fields.get(name)
        model = (None if field is None else _model_in(field.annotation)) or model
    return tuple(model.model_fields)


def _model_in(annotation: Any) -> type[BaseModel] | None:
    from pydantic import BaseModel

    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return annotation
    found = (_model_in(inner) for inner in get_args(annotation))
    return next((model for model in found if model is not None), None)


def _check_weights(settings: Settings, lines: Mapping[_Path, int], problems: ProblemList) -> None:
    criteria = settings.award.criteria
    total = sum(criterion.weight_percent for criterion in criteria)
    if criteria and total != _WHOLE:
        problems.error(
            "The weights of the award criteria do not add up to 100 %.",
            row=line_of(("award", "criteria"), lines),
            column="award.criteria",
            found=f"{total} %",
            expected="100 %",
        )


def _check_language(settings: Settings, lines: Mapping[_Path, int], problems: ProblemList) -> None:
    """Say so where the sheets do not speak the language that the campaign names."""
    if settings.sheet.languages or settings.campaign.catalogue:
        return
    problems.warning(
        say("There is no catalogue for the language of the campaign; its sheets are in English."),
        row=line_of(("campaign", "language"), lines),
        column="campaign.language",
        found=as_written(settings.campaign.language),
        expected=f"one of {', '.join(LANGUAGES)}, or languages of the sheets under [sheet]",
    )


def _check_lettering(
    raw: Mapping[str, Any],
    uncovered: UncoveredCharacters,
    lines: Mapping[_Path, int],
    problems: ProblemList,
) -> None:
    """Name the texts that paper cannot show; what is refused anyway is not printed."""
    named = {problem.column or "" for problem in problems.problems}
    for path, text in texts_in(raw):
        key = _dotted(path)
        if not any(f"{key}.".startswith(f"{column}.") for column in named):
            note_uncovered(text, uncovered, problems, row=line_of(path, lines), column=key)
