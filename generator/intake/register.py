"""The register of lamps and units: who is who, so that every reference in a campaign is checked."""

from __future__ import annotations

from dataclasses import dataclass

from generator.intake.tables.cells import IDENTIFIER, is_identifier
from generator.intake.tables.problem_list import ProblemList, nearest

__all__ = ["Register", "check_identifier"]

_RESERVED = "campaign"  # notes/campaign.md holds the remarks on the whole


@dataclass(frozen=True, slots=True)
class _Entry:
    identifier: str
    lamp_id: str
    place: str


def check_identifier(
    identifier: str, problems: ProblemList, row: int | None, column: str | None
) -> bool:
    """Note a name that is not fit to be an identifier.

    Parameters
    ----------
    identifier
        What names a lamp or unit.
    problems
        Where to note it.
    row, column
        Where it stands; ``None`` for a file name.

    Returns
    -------
    bool
        True where it is fit.
    """
    if is_identifier(identifier):
        return True
    problems.error(
        "The identifier is empty." if not identifier else "That is no identifier.",
        row=row,
        column=column,
        found=identifier or "an empty cell",
        expected=IDENTIFIER,
    )
    return False


class Register:
    """Lamps and units of a campaign by identifier, letter case making no difference."""

    def __init__(self) -> None:
        self._lamps: dict[str, _Entry] = {}
        self._units: dict[str, _Entry] = {}
        self._added: list[_Entry] = []
        self.lamps_whole = True
        self.units_whole = True

    @property
    def added_units(self) -> tuple[tuple[str, str], ...]:
        """Units that only raw files name, as ``(unit_id, lamp_id)``, in the order met."""
        return tuple((entry.identifier, entry.lamp_id) for entry in self._added)

    def enter_lamp(self, lamp_id: str, row: int, problems: ProblemList) -> bool:
        """Enter a lamp of ``lamps.csv``; false after an error was noted."""
        if not check_identifier(lamp_id, problems, row, "lamp_id"):
            return False
        if lamp_id.casefold() == _RESERVED:
            problems.error(
                "A lamp cannot be called campaign: notes/campaign.md is about the whole campaign.",
                row=row,
                column="lamp_id",
                found=lamp_id,
                expected="another identifier",
            )
            return False
        entry = _Entry(lamp_id, lamp_id, f"row {row}")
        return _enter(self._lamps, entry, row, "lamp_id", problems)

    def enter_unit(self, unit_id: str, lamp_id: str, row: int, problems: ProblemList) -> bool:
        """Enter a unit of ``units.csv``; false after an error was noted."""
        lamp_known = self.knows_lamp(lamp_id, problems, row, "lamp_id")
        if not check_identifier(unit_id, problems, row, "unit_id"):
            return False
        entry = _Entry(unit_id, lamp_id if lamp_known else "", f"row {row} of units.csv")
        return _enter(self._units, entry, row, "unit_id", problems) and lamp_known

    def knows_lamp(
        self, lamp_id: str, problems: ProblemList, row: int | None, column: str | None
    ) -> bool:
        """Whether a lamp of that identifier stands in ``lamps.csv``; notes an error if not."""
        entry = self._lamps.get(lamp_id.casefold())
        if entry is not None and entry.identifier == lamp_id:
            return True
        if entry is not None:
            _same_but_for_case(entry, lamp_id, f"{entry.place} of lamps.csv", problems, row, column)
        elif not check_identifier(lamp_id, problems, row, column):
            return False
        elif self.lamps_whole:
            near = nearest(lamp_id, self.lamp_ids)
            problems.error(
                f"lamps.csv has no lamp {lamp_id}.",
                row=row,
                column=column,
                found=lamp_id,
                expected=near or "a lamp_id of lamps.csv",
            )
        return False

    def claim_unit(
        self,
        unit_id: str,
        lamp_id: str,
        problems: ProblemList,
        row: int | None,
        column: str | None,
    ) -> bool:
        """Whether a raw file may speak of that unit of that lamp; enters a unit not yet known."""
        if not check_identifier(unit_id, problems, row, column):
            return False
        entry = self._units.get(unit_id.casefold())
        if entry is None:
            entry = _Entry(unit_id, lamp_id, problems.file)
            self._units[unit_id.casefold()] = entry
            self._added.append(entry)
            return True
        if entry.identifier != unit_id:
            _same_but_for_case(entry, unit_id, entry.place, problems, row, column)
            return False
        if entry.lamp_id not in {lamp_id, ""}:
            problems.error(
                f"The unit {unit_id} is one of lamp {entry.lamp_id} according to {entry.place}.",
                row=row,
                column=column,
                found=f"{unit_id} under lamp {lamp_id}",
                expected=f"a unit of lamp {lamp_id}",
            )
            return False
        return True

    def knows_unit(self, unit_id: str, problems: ProblemList) -> bool:
        """Whether the unit that a file name means is known; notes an error if not."""
        if not check_identifier(unit_id, problems, None, None):
            return False
        entry = self._units.get(unit_id.casefold())
        if entry is None:
            if self.units_whole:
                known = [item.identifier for item in self._units.values()]
                problems.error(
                    f"No other file names a unit {unit_id}, so its lamp is not known.",
                    found=unit_id,
                    expected=nearest(unit_id, known) or "a unit_id of units.csv",
                )
            return False
        if entry.identifier != unit_id:
            _same_but_for_case(entry, unit_id, entry.place, problems, None, None)
            return False
        return True

    @property
    def lamp_ids(self) -> tuple[str, ...]:
        """Identifiers of all lamps, in the order of ``lamps.csv``."""
        return tuple(entry.identifier for entry in self._lamps.values())


def _enter(
    entries: dict[str, _Entry], entry: _Entry, row: int, column: str, problems: ProblemList
) -> bool:
    earlier = entries.setdefault(entry.identifier.casefold(), entry)
    if earlier is entry:
        return True
    if earlier.identifier != entry.identifier:
        _same_but_for_case(earlier, entry.identifier, earlier.place, problems, row, column)
        return False
    problems.error(
        f"{entry.identifier} stands in {earlier.place} already.",
        row=row,
        column=column,
        found=entry.identifier,
        expected="each identifier once",
    )
    return False


def _same_but_for_case(
    entry: _Entry,
    written: str,
    place: str,
    problems: ProblemList,
    row: int | None,
    column: str | None,
) -> None:
    problems.error(
        f"{written} here and {entry.identifier} in {place} differ only in letter case, "
        "which makes no difference between identifiers.",
        row=row,
        column=column,
        found=written,
        expected=entry.identifier,
    )
