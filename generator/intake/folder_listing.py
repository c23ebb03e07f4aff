"""What lies in a campaign folder: which file is what, and what is left aside."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

from generator.errors import Problem
from generator.intake.tables.problem_list import ProblemList, nearest, shown
from generator.language import say

__all__ = ["CampaignFile", "list_campaign"]

_SINGLE = {
    "campaign.toml": "campaign",
    "lamps.csv": "lamps",
    "units.csv": "units",
    "endurance.csv": "endurance",
}
_FOLDERS = {
    "spectra": "<lamp_id>.csv",
    "light": "<lamp_id>.csv or <lamp_id>.long.csv",
    "mains": "<unit_id>.csv",
    "intensity": "<unit_id>.csv",
    "notes": "<lamp_id>.md or campaign.md",
}
_LONG = ".long"
_NOTE = "README.md"
"""What may lie in a campaign folder beside the data, for people."""
_TEMPLATES = "templates"
"""Templates of the campaign's own; the sheets read them, and the evidence lists them."""


@dataclass(frozen=True, slots=True)
class CampaignFile:
    """One file of a campaign.

    Parameters
    ----------
    name
        Path inside the folder, with ``/``.
    path
        Where it lies.
    kind
        ``campaign``, ``lamps``, ``units``, ``endurance``, ``spectra``, ``light``,
        ``long light``, ``mains``, ``intensity``, ``notes`` or ``template``.
    owner
        The lamp or unit that the file name means; empty for the tables of the whole campaign.
    """

    name: str
    path: Path
    kind: str
    owner: str = ""


def list_campaign(folder: Path) -> tuple[tuple[CampaignFile, ...], tuple[Problem, ...]]:
    """List the files of a campaign folder, hidden ones left out.

    Parameters
    ----------
    folder
        The campaign folder.

    Returns
    -------
    tuple
        The files by name, and what is wrong with the folder: files that nobody reads, links
        that lead out of it, tables both plain and compressed, required files that are missing.
    """
    if not folder.is_dir():
        problems = ProblemList(shown(str(folder)))
        problems.error("There is no such folder.", expected="a campaign folder")
        return (), problems.problems
    found: list[Problem] = []
    files = list(_files(folder, found))
    _check_twice(files, found)
    for required in ("campaign.toml", "lamps.csv"):
        if not any(file.kind == _SINGLE[required] for file in files):
            problems = ProblemList(required)
            problems.error(f"The file {required} is missing.", expected=required)
            found.extend(problems.problems)
    return tuple(files), tuple(found)


def _files(folder: Path, found: list[Problem]) -> Iterator[CampaignFile]:
    root = folder.resolve()
    for entry in _entries(folder, "", root, found):
        if entry.name == _NOTE:
            continue
        if entry.name == _TEMPLATES and entry.is_dir():
            yield from _templates(entry, root, found)
        elif entry.is_file():
            kind = _SINGLE.get(_plain(entry.name))
            if kind is None or entry.name == "campaign.toml.gz":
                _not_read(entry.name, nearest(entry.name, _SINGLE), found)
            else:
                yield CampaignFile(entry.name, entry, kind)
        elif entry.is_dir() and entry.name in _FOLDERS:
            for inner in _entries(entry, f"{entry.name}/", root, found):
                name = f"{entry.name}/{inner.name}"
                file = _owned(entry.name, name, inner) if inner.is_file() else None
                if file is None:
                    _not_read(name, _FOLDERS[entry.name], found)
                else:
                    yield file
        else:
            near = nearest(entry.name, _FOLDERS)
            _not_read(entry.name, f"{near}/" if near else None, found)


def _templates(folder: Path, root: Path, found: list[Problem]) -> Iterator[CampaignFile]:
    for theme in _entries(folder, f"{_TEMPLATES}/", root, found):
        inside = f"{_TEMPLATES}/{theme.name}/"
        for file in _entries(theme, inside, root, found) if theme.is_dir() else ():
            if file.is_file():
                yield CampaignFile(f"{inside}{file.name}", file, "template")


def _entries(folder: Path, inside: str, root: Path, found: list[Problem]) -> Iterator[Path]:
    try:
        entries = sorted(folder.iterdir(), key=lambda entry: entry.name)
    except OSError as failure:
        problems = ProblemList(inside or shown(str(folder)))
        problems.error("The folder cannot be read.", found=failure.strerror or str(failure))
        found.extend(problems.problems)
        return
    for entry in entries:
        if entry.name.startswith("."):
            continue
        problems = ProblemList(inside + shown(entry.name))
        if not entry.name.isprintable():
            problems.warning(say("The file name has unprintable characters; it is not read."))
        elif entry.is_symlink() and not _stays(entry, root):
            problems.error(
                "The link leads out of the campaign folder, or nowhere.",
                found="a symbolic link",
                expected="a file of the campaign",
            )
        else:
            yield entry
        found.extend(problems.problems)


def _stays(entry: Path, root: Path) -> bool:
    try:
        target = entry.resolve(strict=True)
    except (OSError, RuntimeError):  # nowhere, or in a circle
        return False
    return target.is_relative_to(root)


def _plain(name: str) -> str:
    return name.removesuffix(".gz") if name.endswith(".csv.gz") else name


def _owned(folder: str, name: str, path: Path) -> CampaignFile | None:
    if folder == "notes":
        if path.suffix != ".md":
            return None
        return CampaignFile(name, path, folder, path.name.removesuffix(".md"))
    plain = _plain(path.name)
    if not plain.endswith(".csv"):
        return None
    stem = plain.removesuffix(".csv")
    if folder == "light" and stem.endswith(_LONG):
        return CampaignFile(name, path, "long light", stem.removesuffix(_LONG))
    return CampaignFile(name, path, folder, stem)


def _not_read(name: str, expected: str | None, found: list[Problem]) -> None:
    problems = ProblemList(name)
    problems.warning(
        say("Nothing of this name belongs to a campaign; it is not read."),
        expected=expected or "the files of the campaign format",
    )
    found.extend(problems.problems)


def _check_twice(files: list[CampaignFile], found: list[Problem]) -> None:
    names = {file.name for file in files}
    for file in list(files):
        if file.name.endswith(".gz") and _plain(file.name) in names:
            files.remove(file)
            problems = ProblemList(file.name)
            problems.error(
                f"The table is there twice, as {_plain(file.name)} and compressed.",
                found="two files",
                expected=f"{_plain(file.name)} or {file.name}",
            )
            found.extend(problems.problems)
