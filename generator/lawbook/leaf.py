"""The shape of a leaf: strict models that refuse what they do not know, and name the key."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType
from typing import TYPE_CHECKING, Annotated, Any, Literal, Self

from pydantic import BeforeValidator, Field, ValidationError, model_validator

from generator.language import capital, say
from generator.lawbook.leaf_parts import (
    Basis,
    Comparison,
    ConditionTable,
    Day,
    LimitValue,
    Note,
    Number,
    QuantityName,
    RoundingTable,
    SourceTable,
    Status,
    Strict,
    Text,
    ValueTable,
    Words,
    limit_given,
    no_overlap,
    quantity_names,
)
from generator.lawbook.leaf_text import source_of
from generator.quantities import QUANTITIES
from generator.records.clause import BUYER, Clause, Condition, Constant, Exemption, Source
from generator.records.setting_words import alternatives, as_written, expected_words

if TYPE_CHECKING:
    from pydantic_core import ErrorDetails

__all__ = [
    "BuyerLeaf",
    "ClauseLeaf",
    "ConstantLeaf",
    "ExemptionLeaf",
    "VerificationLeaf",
    "first_problems",
    "leaf_of",
]


class _LawLeaf(Strict):
    id: Annotated[str, Field(pattern=r"^[a-z0-9][a-z0-9.-]*$")]
    title: Words
    regime: Words
    status: Status
    checked_on: Day
    source: SourceTable
    note: Note = ""


class _DatedLeaf(_LawLeaf):
    values: Annotated[list[ValueTable], Field(min_length=1)]

    @model_validator(mode="after")
    def _dates(self) -> Self:
        for number, value in enumerate(self.values, start=1):
            if value.start is None:
                raise ValueError(f"values.{number} has no from; expected a date")
        no_overlap(self.values)
        return self


class _Judged(Strict):
    quantities: Annotated[list[str], BeforeValidator(quantity_names)] = Field(alias="quantity")
    unit: str
    applies: list[ConditionTable] = Field(default_factory=list)
    rounding: RoundingTable | None = None
    statistic: Literal["mean", "lowest unit", "highest unit"] = "mean"
    sample_units: int | None = None
    claim: QuantityName | None = None

    @model_validator(mode="after")
    def _unit_of_catalogue(self) -> Self:
        for name in self.quantities:
            if QUANTITIES[name].unit != self.unit:
                raise ValueError(
                    f"unit {self.unit!r} is not that of {name}; expected {QUANTITIES[name].unit!r}"
                )
        return self

    @property
    def conditions(self) -> tuple[Condition, ...]:
        """Conditions of applicability."""
        return tuple(item.record() for item in self.applies)


class ClauseLeaf(_DatedLeaf, _Judged):
    """A limit."""

    kind: Literal["clause"]
    comparison: Comparison
    bases: Annotated[list[Basis], Field(min_length=1)] | None = None
    formula: str = ""
    constants: dict[str, str] = Field(default_factory=dict)
    scope: str = ""

    @model_validator(mode="after")
    def _has_limits(self) -> Self:
        for number, value in enumerate(self.values, start=1):
            limit_given(value, self.comparison, bool(self.formula), f"values.{number}")
        return self

    def record(self, file: str) -> Clause:
        """The frozen record."""
        return Clause(
            id=self.id,
            title=self.title,
            regime=self.regime,
            kind=self.kind,
            quantities=tuple(self.quantities),
            unit=QUANTITIES[self.quantities[0]].unit,
            comparison=self.comparison,
            values=tuple(item.record() for item in self.values),
            source=self.source.record(),
            status=self.status,
            checked_on=self.checked_on,
            applies=self.conditions,
            bases=tuple(self.bases) if self.bases else ("declared", "determined"),
            formula=self.formula,
            constants=MappingProxyType(dict(self.constants)),
            claim=self.claim or "",
            scope=self.scope,
            rounding=self.rounding.record() if self.rounding else None,
            statistic=self.statistic,
            sample_units=self.sample_units,
            note=self.note,
            file=file,
        )


class VerificationLeaf(_DatedLeaf, _Judged):
    """How far the mean of the units may lie from the declaration."""

    kind: Literal["verification"]
    scope: str = ""

    @model_validator(mode="after")
    def _has_tolerances(self) -> Self:
        for number, value in enumerate(self.values, start=1):
            if value.tolerance is None:
                raise ValueError(f"values.{number} has no tolerance")
        return self

    @property
    def comparison(self) -> str:
        """The comparison that follows from the directions of the tolerance."""
        given = {name[:1] for item in self.values for name in item.tolerance.model_fields_set}  # type: ignore[union-attr]  # checked above
        return {"p": "at most", "m": "at least"}.get("".join(sorted(given)), "within")

    def record(self, file: str) -> Clause:
        """The frozen record."""
        return Clause(
            id=self.id,
            title=self.title,
            regime=self.regime,
            kind=self.kind,
            quantities=tuple(self.quantities),
            unit=QUANTITIES[self.quantities[0]].unit,
            comparison=self.comparison,
            values=tuple(item.record() for item in self.values),
            source=self.source.record(),
            status=self.status,
            checked_on=self.checked_on,
            applies=self.conditions,
            bases=("determined",),
            claim=self.claim or "",
            scope=self.scope,
            statistic=self.statistic,
            sample_units=self.sample_units,
            fixed_rule=True,
            note=self.note,
            file=file,
        )


class ConstantLeaf(_DatedLeaf):
    """Constants of a formula."""

    kind: Literal["constant"]

    @model_validator(mode="after")
    def _has_entries(self) -> Self:
        for number, value in enumerate(self.values, start=1):
            if not value.entries:
                raise ValueError(f"values.{number} has no entries")
        return self

    def record(self, file: str) -> Constant:
        """The frozen record."""
        return Constant(
            id=self.id,
            title=self.title,
            regime=self.regime,
            values=tuple(item.record() for item in self.values),
            source=self.source.record(),
            status=self.status,
            checked_on=self.checked_on,
            note=self.note,
            file=file,
        )


class ExemptionLeaf(_LawLeaf):
    """A reason for which clauses are lifted."""

    kind: Literal["exemption"]
    lifts: list[str] = Field(default_factory=list)
    when: list[ConditionTable] = Field(default_factory=list)
    start: Day = Field(alias="from")
    end: Day | None = Field(default=None, alias="until")

    def record(self, file: str) -> Exemption:
        """The frozen record."""
        return Exemption(
            id=self.id,
            title=self.title,
            regime=self.regime,
            source=self.source.record(),
            status=self.status,
            lifts=tuple(self.lifts),
            when=tuple(item.record() for item in self.when),
            start=self.start,
            end=self.end,
            checked_on=self.checked_on,
            note=self.note,
            file=file,
        )


class BuyerLeaf(_Judged):
    """``[[clause]]`` of ``campaign.toml``: a leaf, with the short forms a buyer may use."""

    kind: Literal["clause"] = "clause"
    id: Annotated[str, Field(pattern=r"^[A-Za-z0-9][A-Za-z0-9_.-]*$")] | None = None
    title: Text | None = None
    regime: Text = say("Buyer")
    unit: str = ""
    comparison: Comparison
    value: LimitValue | None = None
    lower: Number | None = None
    upper: Number | None = None
    start: Day | None = Field(default=None, alias="from")
    end: Day | None = Field(default=None, alias="until")
    values: list[ValueTable] = Field(default_factory=list)
    bases: Annotated[list[Basis], Field(min_length=1)] | None = None
    status: Status | Literal["buyer"] = "buyer"
    checked_on: Day | None = None
    source: SourceTable | str = ""
    note: Note = ""

    @model_validator(mode="before")
    @classmethod
    def _unit_if_left_out(cls, raw: Any) -> Any:
        if isinstance(raw, Mapping) and "unit" not in raw:
            name = raw.get("quantity")
            name = name[0] if isinstance(name, list) and name else name
            if isinstance(name, str) and name in QUANTITIES:
                return {**raw, "unit": QUANTITIES[name].unit}
        return raw

    @model_validator(mode="after")
    def _has_limits(self) -> Self:
        if self.values and self.model_fields_set & {"value", "lower", "upper", "start", "end"}:
            raise ValueError("expected either values or one value, not both")
        for number, item in enumerate(self.dated, start=1):
            place = f"values.{number}" if self.values else "the clause"
            limit_given(item, self.comparison, False, place)
        no_overlap(self.dated)
        return self

    @property
    def dated(self) -> list[ValueTable]:
        """The values, also where the short form was used."""
        short = {"value": self.value, "lower": self.lower, "upper": self.upper}
        dates = {"from": self.start, "until": self.end}
        return self.values or [ValueTable.model_validate({**short, **dates})]

    def record(self, clause_id: str, file: str) -> Clause:
        """The frozen record."""
        if isinstance(self.source, SourceTable):
            source = self.source.record()
        elif self.source:
            source = source_of(self.source)
        else:
            source = Source(say("Requirement of the buyer"))
        return Clause(
            id=clause_id,
            title=self.title or capital(QUANTITIES[self.quantities[0]].label),
            regime=self.regime,
            kind="clause",
            quantities=tuple(self.quantities),
            unit=QUANTITIES[self.quantities[0]].unit,
            comparison=self.comparison,
            values=tuple(item.record() for item in self.dated),
            source=source,
            status=BUYER,
            checked_on=self.checked_on,
            applies=self.conditions,
            bases=tuple(self.bases) if self.bases else ("declared", "determined"),
            rounding=self.rounding.record() if self.rounding else None,
            statistic=self.statistic,
            sample_units=self.sample_units,
            note=self.note,
            file=file,
        )


_EXPECTED = "expected "
_BRANCHES = frozenset({"bool", "decimal", "str", "SourceTable"})

_KINDS: dict[str, type[ClauseLeaf | VerificationLeaf | ConstantLeaf | ExemptionLeaf]] = {
    "clause": ClauseLeaf,
    "verification": VerificationLeaf,
    "constant": ConstantLeaf,
    "exemption": ExemptionLeaf,
}


def leaf_of(
    raw: Mapping[str, Any],
) -> ClauseLeaf | VerificationLeaf | ConstantLeaf | ExemptionLeaf:
    """Check one leaf as it was read from TOML.

    Parameters
    ----------
    raw
        The table.

    Returns
    -------
    ClauseLeaf, VerificationLeaf, ConstantLeaf or ExemptionLeaf
        By ``kind``.

    Raises
    ------
    ValueError
        If ``kind`` is missing or unknown.
    pydantic.ValidationError
        If a key is unknown, missing, or of the wrong type.
    """
    kind = raw.get("kind")
    if not isinstance(kind, str) or kind not in _KINDS:
        raise ValueError(f"kind is {kind!r}; expected one of {', '.join(_KINDS)}")
    return _KINDS[kind].model_validate(raw)


def first_problems(error: ValidationError, table: str = "") -> list[tuple[str, str, str]]:
    """Give key, message and what was found for every fault of a leaf.

    Parameters
    ----------
    error
        What the model raised.
    table
        Heading of the table that the leaf is; empty where it is a file of its own.

    Returns
    -------
    list of tuple
        Dotted key, positions counted from 1 (empty where the leaf as a whole is meant),
        message, what was found.
    """
    faults: dict[tuple[str, str], list[str]] = {}
    for item in error.errors(include_url=False):
        parts = [part for part in item["loc"] if not _is_branch(part) or len(item["loc"]) == 1]
        key = ".".join(str(part + 1 if isinstance(part, int) else part) for part in parts)
        found = "" if item["type"] == "missing" or not key else as_written(item["input"])
        names = [part for part in parts if isinstance(part, str)]
        heading = ".".join([table, *names] if table else names)
        faults.setdefault((key, found), []).append(_message(item, heading))
    return [
        (key, alternatives(words).replace(f", or {_EXPECTED}", ", or "), found)
        for (key, found), words in faults.items()
    ]


def _message(fault: ErrorDetails, heading: str) -> str:
    """One fault in the words of this program; what the models say themselves stays whole."""
    if fault["type"] == "missing":
        return "missing key"
    if fault["type"] == "extra_forbidden":
        return "unknown key"
    words = expected_words(fault, heading)
    return words if fault["type"] == "value_error" else f"{_EXPECTED}{words}"


def _is_branch(part: int | str) -> bool:
    """Whether a part of a place is the name of a type, put there by a union, and not a key."""
    return isinstance(part, str) and ("[" in part or part in _BRANCHES)
