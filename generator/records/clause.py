"""Clauses of the law book and of buyers: dated limits, tolerances, constants, exemptions."""

from __future__ import annotations

import difflib
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field, replace
from datetime import date
from decimal import Decimal
from types import MappingProxyType
from typing import Any

from generator.errors import LawBookError
from generator.language import joined, say
from generator.quantities import QUANTITIES
from generator.records.clause_words import (
    FORMULAS,
    bounds_text,
    choice_text,
    compared_text,
    number_of,
    sloped_text,
    tolerance_text,
    with_unit,
)

__all__ = [
    "BUYER",
    "DEFAULT_REGIMES",
    "Clause",
    "Condition",
    "Constant",
    "DatedValue",
    "Entry",
    "Exemption",
    "LawBook",
    "Rounding",
    "Slope",
    "Source",
    "Tolerance",
]

DEFAULT_REGIMES = ("EU 2019/2015", "EU 2019/2020")
"""Regimes judged where a campaign names none."""

BUYER = "buyer"
"""Status of a clause that a buyer wrote: it binds as written."""

Entry = Decimal | tuple[tuple[Decimal, ...], ...]
"""One constant of a leaf: a number, or rows of numbers."""


@dataclass(frozen=True, slots=True)
class Source:
    """Where a value stands.

    Parameters
    ----------
    act
        Act, standard or call.
    annex, point
        Annex and point, without what amended them.
    edition
        What tells editions or parts of the act apart, for instance ``edition 5``.
    amendment
        The amending act in words, for instance ``as amended by Regulation (EU) 2021/341``.
    amending_act
        The number of the amending act alone.
    """

    act: str
    annex: str = ""
    point: str = ""
    edition: str = ""
    amendment: str = ""
    amending_act: str = ""

    @property
    def place(self) -> str:
        """Where it stands inside the act."""
        return _listed(self.edition, self.annex, self.point)

    @property
    def text(self) -> str:
        """Act, place and amendment in one phrase."""
        return _listed(self.act, self.edition, self.annex, self.point, self.amendment)


def _listed(*parts: str) -> str:
    return joined(", ", (part for part in parts if part))


@dataclass(frozen=True, slots=True)
class Condition:
    """One condition on a lamp; all bounds given must hold.

    Parameters
    ----------
    subject
        Property of the lamp (``mains``), catalogue quantity (``power_w``; the declared value
        before the measured one), or ``declared_`` and a catalogue quantity.
    equals
        Value the property must have.
    one_of
        Values the property may have.
    at_least, above, at_most, below
        Bounds on a number.
    """

    subject: str
    equals: bool | str | None = None
    one_of: tuple[str, ...] = ()
    at_least: Decimal | None = None
    above: Decimal | None = None
    at_most: Decimal | None = None
    below: Decimal | None = None

    @property
    def text(self) -> str:
        """The condition in words."""
        if self.equals is not None:
            return choice_text(self.subject, (self.equals,))
        if self.one_of:
            return choice_text(self.subject, self.one_of)
        names = ("at_least", "above", "at_most", "below")
        return bounds_text(self.subject, {name: getattr(self, name) for name in names})


@dataclass(frozen=True, slots=True)
class Slope:
    """A part of a limit that grows with another quantity: ``times`` units per unit of it."""

    quantity: str
    times: Decimal


@dataclass(frozen=True, slots=True)
class Tolerance:
    """How far a determined value may lie from the declared one, absolute or in percent."""

    plus: Decimal | None = None
    minus: Decimal | None = None
    plus_percent: Decimal | None = None
    minus_percent: Decimal | None = None

    @property
    def is_zero(self) -> bool:
        """Whether there is no tolerance at all."""
        return not any((self.plus, self.minus, self.plus_percent, self.minus_percent))

    def text(self, unit: str) -> str:
        """The tolerance in words, for a unit."""
        return tolerance_text(self.plus, self.minus, self.plus_percent, self.minus_percent, unit)


def _tolerated_text(tolerance: Tolerance, unit: str) -> str:
    if tolerance.is_zero:
        return say("the declared value")
    return say("the declared value {tolerance}", tolerance=tolerance.text(unit))


@dataclass(frozen=True, slots=True)
class Rounding:
    """Rounding of a value before it is compared: step and mode (``half up``, ``up``)."""

    step: Decimal
    mode: str = "half up"


@dataclass(frozen=True, slots=True)
class DatedValue:
    """What a leaf says from one day to another, under conditions of its own.

    Parameters
    ----------
    start, end
        First and last day of validity; ``None`` where open.
    value
        The limit: a number, or a class letter.
    lower, upper
        Both limits, for the comparison ``within``.
    no_limit
        True where the act says that there is none.
    slopes
        Parts of the limit that grow with other quantities; added to ``value``.
    tolerance
        Verification tolerance.
    entries
        Constants of a formula by name.
    when
        Conditions under which this value is the one that counts.
    may_be_lowered_to
        The limit that corrections not known here may bring it down to.
    status, source, note
        As on the clause; ``None`` or empty text where the clause speaks for the value.
    """

    start: date | None = None
    end: date | None = None
    value: Decimal | str | None = None
    lower: Decimal | None = None
    upper: Decimal | None = None
    no_limit: bool = False
    slopes: tuple[Slope, ...] = ()
    tolerance: Tolerance | None = None
    entries: Mapping[str, Entry] = field(default_factory=dict)
    when: tuple[Condition, ...] = ()
    may_be_lowered_to: Decimal | None = None
    status: str | None = None
    source: Source | None = None
    note: str = ""

    def text(self, unit: str) -> str:
        """What the value says, in words: a number, a span, a tolerance, no limit, a formula."""
        if self.no_limit:
            return say("no limit")
        if self.tolerance is not None:
            return _tolerated_text(self.tolerance, unit)
        if self.lower is not None and self.upper is not None:
            ends = say("{low} to {high}", low=number_of(self.lower), high=number_of(self.upper))
            return with_unit(ends, unit)
        if self.value is None:
            return say("by formula")
        if self.slopes and isinstance(self.value, Decimal):
            slopes = [(item.quantity, item.times) for item in self.slopes]
            return sloped_text(self.value, slopes, unit)
        return with_unit(number_of(self.value), unit)

    @property
    def plain_limit(self) -> float | str | None:
        """The limit as plain data: a number, a class, a span in words, or ``None``."""
        if self.lower is not None and self.upper is not None:
            return f"{self.lower} to {self.upper}"
        if self.slopes or self.value is None:
            return None
        return self.value if isinstance(self.value, str) else float(self.value)

    def summary(self, unit: str) -> dict[str, Any]:
        """The value in words, with its dates and conditions, fit for JSON."""
        return {
            "from": self.start.isoformat() if self.start else None,
            "until": self.end.isoformat() if self.end else None,
            "text": self.text(unit),
            "when": [item.text for item in self.when],
        }

    def in_force(self, day: date) -> bool:
        """Whether the value holds on a day."""
        begun = self.start is None or self.start <= day
        return begun and (self.end is None or day <= self.end)

    def number(self, name: str) -> Decimal:
        """One constant that is a number; ``LawBookError`` where there is none of that name."""
        entry = self.entries.get(name)
        if not isinstance(entry, Decimal):
            raise LawBookError(f"a formula asks for the constant {name!r}; the leaf has none")
        return entry

    def rows(self, name: str) -> tuple[tuple[Decimal, ...], ...]:
        """One constant that is a table; ``LawBookError`` where there is none of that name."""
        entry = self.entries.get(name)
        if not isinstance(entry, tuple):
            raise LawBookError(f"a formula asks for the table {name!r}; the leaf has none")
        return entry


@dataclass(frozen=True, slots=True)
class Clause:
    """One clause: a quantity, a comparison, and the values it is compared with, by date.

    Parameters
    ----------
    id, title, regime
        Identity; ``regime`` is the act, standard or buyer that asks.
    kind
        ``clause``: a limit; ``verification``: determined value against the declared one.
    quantities
        Catalogue names; of several the worst decides.
    unit
        Unit of the limit.
    comparison
        ``at least``, ``at most``, ``below``, ``above`` or ``within``.
    values
        The limits, by date and condition.
    applies
        Conditions under which the clause applies to a lamp.
    bases
        Which of ``declared`` and ``determined`` are judged.
    formula
        Name of the function that gives the limit, or empty.
    constants
        Role in the formula -> id of the leaf that holds the constants.
    claim
        Quantity whose declaration is the claim that the clause judges, or empty: where it is not
        declared, the clause does not apply.
    scope
        Id of the clause that says whether the act covers the lamp at all, or empty.
    rounding
        Rounding that the act prescribes before the comparison.
    statistic
        ``mean``, ``lowest unit`` or ``highest unit``: what stands for the lamp.
    sample_units
        Units that the act wants measured; ``None`` where it does not say.
    fixed_rule
        True where the act itself is the decision rule, so that no other may be chosen.
    source, status, checked_on, note
        Where it stands, how it is known, when it was last looked up, what to know with it.
    file
        The leaf, relative to the law book; for people.
    """

    id: str
    title: str
    regime: str
    kind: str
    quantities: tuple[str, ...]
    unit: str
    comparison: str
    values: tuple[DatedValue, ...]
    source: Source
    status: str
    checked_on: date | None = None
    applies: tuple[Condition, ...] = ()
    bases: tuple[str, ...] = ("declared", "determined")
    formula: str = ""
    constants: Mapping[str, str] = field(default_factory=dict)
    claim: str = ""
    scope: str = ""
    rounding: Rounding | None = None
    statistic: str = "mean"
    sample_units: int | None = None
    fixed_rule: bool = False
    note: str = ""
    file: str = ""

    @property
    def quantity(self) -> str:
        """The quantity, or the first of several."""
        return self.quantities[0]

    @property
    def inputs(self) -> tuple[str, ...]:
        """Quantities that the verdict rests on: those judged, and those its limit comes from."""
        names = list(self.quantities)
        if self.formula in FORMULAS:
            names += FORMULAS[self.formula].inputs
        for value in self.values:
            names += [slope.quantity for slope in value.slopes]
            names += [item.subject.removeprefix("declared_") for item in value.when]
        return tuple(name for name in dict.fromkeys(names) if name in QUANTITIES)

    def says(self, value: DatedValue) -> str:
        """What one of its values asks, in words, without its conditions."""
        if value.no_limit:
            return value.text(self.unit)
        if self.formula:
            known = FORMULAS.get(self.formula)
            return say("by formula: {formula}", formula=known.text) if known else ""
        return compared_text(self.comparison, value.text(self.unit))

    def on(self, day: date) -> tuple[DatedValue, ...]:
        """The values in force on a day; several where conditions tell them apart."""
        return tuple(item for item in self.values if item.in_force(day))

    def summary(
        self, day: date, constants: Mapping[str, Constant] = MappingProxyType({})
    ) -> dict[str, Any]:
        """Give the clause as plain data, with its values on a day.

        Parameters
        ----------
        day
            Day of law.
        constants
            Leaf id -> constants of formulas; those that the clause names are given with it.

        Returns
        -------
        dict
            Fit for JSON. ``limit`` is the number, class or span where one value says all, else
            ``None``; ``values`` has every value in words, with dates and conditions.
        """
        standing = self.on(day)
        alone = standing[0] if len(standing) == 1 and not self.formula else None
        return {
            "id": self.id,
            "title": self.title,
            "regime": self.regime,
            "kind": self.kind,
            "quantity": self.quantity,
            "quantities": list(self.quantities),
            "unit": self.unit,
            "comparison": self.comparison,
            "limit": None if alone is None else alone.plain_limit,
            "values": [{**item.summary(self.unit), "says": self.says(item)} for item in standing],
            "constants": [
                constants[name].summary(day)
                for name in self.constants.values()
                if name in constants
            ],
            "applies": [item.text for item in self.applies],
            "source": ((alone.source if alone else None) or self.source).text,
            "status": (alone.status if alone else None) or self.status,
            "checked_on": self.checked_on.isoformat() if self.checked_on else None,
            "note": self.note,
        }


@dataclass(frozen=True, slots=True)
class Constant:
    """Constants of a formula of the law, by date."""

    id: str
    title: str
    regime: str
    values: tuple[DatedValue, ...]
    source: Source
    status: str
    checked_on: date | None = None
    note: str = ""
    file: str = ""

    def summary(self, day: date) -> dict[str, Any]:
        """The constants as plain data, as they stand on a day, fit for JSON."""
        standing = next((item for item in self.values if item.in_force(day)), None)
        entries = {} if standing is None else standing.entries
        return {
            "id": self.id,
            "title": self.title,
            "status": self.status,
            "source": self.source.text,
            "entries": {
                name: float(entry)
                if isinstance(entry, Decimal)
                else [[float(number) for number in row] for row in entry]
                for name, entry in entries.items()
            },
        }


@dataclass(frozen=True, slots=True)
class Exemption:
    """A reason for which an act lifts clauses from a lamp.

    Parameters
    ----------
    id, title, regime
        Identity; the id is what a supplier writes to claim it.
    lifts
        Ids of the clauses it lifts; empty: every clause of the regime.
    when
        What must hold of the lamp for the claim to be possible.
    start, end
        First and last day of validity.
    source, status, checked_on, note
        As on a clause.
    """

    id: str
    title: str
    regime: str
    source: Source
    status: str
    lifts: tuple[str, ...] = ()
    when: tuple[Condition, ...] = ()
    start: date | None = None
    end: date | None = None
    checked_on: date | None = None
    note: str = ""
    file: str = ""

    def covers(self, clause: Clause, day: date) -> bool:
        """Whether it can lift a clause on a day."""
        begun = self.start is None or self.start <= day
        open_still = self.end is None or day <= self.end
        named = clause.id in self.lifts if self.lifts else clause.regime == self.regime
        return begun and open_still and named


@dataclass(frozen=True, slots=True, eq=False)
class LawBook:
    """All leaves of the law book.

    Parameters
    ----------
    version
        Digest over the leaves: two books that differ in a comma differ here.
    leaves
        Every clause, in reading order.
    constants
        Leaf id -> constants of formulas.
    exemptions
        Every exemption, in reading order.
    """

    version: str
    leaves: tuple[Clause, ...]
    constants: Mapping[str, Constant] = field(default_factory=lambda: MappingProxyType({}))
    exemptions: tuple[Exemption, ...] = ()

    def __iter__(self) -> Iterator[Clause]:
        return iter(self.leaves)

    def __len__(self) -> int:
        return len(self.leaves)

    @property
    def regimes(self) -> tuple[str, ...]:
        """Names of the regimes, in reading order."""
        return tuple(dict.fromkeys(clause.regime for clause in self.leaves))

    def clauses(self, regimes: Sequence[str] | None = None) -> tuple[Clause, ...]:
        """Give the clauses of some regimes.

        Parameters
        ----------
        regimes
            Names of regimes, letter case ignored; ``None`` for :data:`DEFAULT_REGIMES`.

        Returns
        -------
        tuple of Clause
            In reading order.

        Raises
        ------
        LawBookError
            If a name is not a regime; the text carries the nearest one.
        """
        known = {name.casefold(): name for name in self.regimes}
        wanted = []
        for name in DEFAULT_REGIMES if regimes is None else regimes:
            if name.strip().casefold() not in known:
                near = difflib.get_close_matches(name.casefold(), known, n=1, cutoff=0.4)
                hint = f"; did you mean {known[near[0]]!r}?" if near else ""
                raise LawBookError(
                    f"the law book has no regime {name!r}{hint} It has: {', '.join(self.regimes)}."
                )
            wanted.append(known[name.strip().casefold()])
        return tuple(clause for clause in self.leaves if clause.regime in wanted)

    def clause(self, clause_id: str) -> Clause:
        """The clause of that id; ``KeyError`` where there is none."""
        for clause in self.leaves:
            if clause.id == clause_id:
                return clause
        raise KeyError(clause_id)

    def constant(self, constant_id: str, day: date) -> DatedValue:
        """Give the constants of one leaf as they stood on a day.

        Parameters
        ----------
        constant_id
            Id of the leaf.
        day
            Day of law.

        Returns
        -------
        DatedValue
            Its ``entries`` hold the numbers.

        Raises
        ------
        LawBookError
            If there is no such leaf, or it has no value on that day.
        """
        leaf = self.constants.get(constant_id)
        if leaf is None:
            raise LawBookError(f"the law book has no constants {constant_id!r}")
        for value in leaf.values:
            if value.in_force(day):
                return value
        raise LawBookError(f"{leaf.file}: no value of {constant_id!r} is in force on {day}")

    def on(self, day: date) -> LawBook:
        """Give the law book as it stood on a day.

        Parameters
        ----------
        day
            Day of law.

        Returns
        -------
        LawBook
            Clauses in force with only the values in force; same version.
        """
        standing = (replace(clause, values=clause.on(day)) for clause in self.leaves)
        return replace(self, leaves=tuple(clause for clause in standing if clause.values))
