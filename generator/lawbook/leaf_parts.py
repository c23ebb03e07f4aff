"""Parts of a leaf: conditions, values, tolerances, sources; strict, and naming the key."""

from __future__ import annotations

from datetime import date, datetime
from decimal import Decimal
from types import MappingProxyType
from typing import Annotated, Any, Literal, Self

from pydantic import AfterValidator, BaseModel, BeforeValidator, ConfigDict, Field, model_validator

from generator.lawbook.leaf_text import TRANSLATED_KEYS, message_of, note_of, source_of
from generator.quantities import QUANTITIES, suggestion
from generator.records.clause import (
    Condition,
    DatedValue,
    Entry,
    Rounding,
    Slope,
    Source,
    Tolerance,
)

__all__ = [
    "LAMP_PROPERTIES",
    "TRANSLATED_KEYS",
    "Basis",
    "Comparison",
    "ConditionTable",
    "Day",
    "LimitValue",
    "Note",
    "Number",
    "QuantityName",
    "RoundingTable",
    "SourceTable",
    "Status",
    "Strict",
    "Text",
    "ToleranceTable",
    "ValueTable",
    "Words",
    "limit_given",
    "no_overlap",
    "quantity_names",
]

LAMP_PROPERTIES = (
    "directional",
    "mains",
    "connected",
    "colour_tuneable",
    "high_luminance",
    "anti_glare_shield",
    "dimmable",
    "technology",
    "cap",
    "reflector",
)
"""Properties of a lamp, beside the catalogue quantities, that a condition may name."""

_LETTERS = frozenset("ABCDEFG")

Comparison = Literal["at least", "at most", "below", "above", "within"]
Status = Literal["read", "quoted", "computed", "cross-checked", "unconfirmed"]
Basis = Literal["declared", "determined"]


def _exact_number(value: Any) -> Any:
    if isinstance(value, bool | str):
        raise ValueError("expected a number")  # noqa: TRY004 - pydantic turns ValueError into a problem
    number = Decimal(repr(value)) if isinstance(value, int | float) else value
    if isinstance(number, Decimal) and not number.is_finite():
        raise ValueError("expected a number")
    return number


def _quantity(name: Any) -> Any:
    if not isinstance(name, str):
        raise ValueError("expected the name of a quantity")  # noqa: TRY004 - as above
    if name not in QUANTITIES:
        near = suggestion(name)
        hint = f"; did you mean {near}?" if near else ""
        raise ValueError(f"no quantity is called {name!r}{hint}")
    return name


def quantity_names(value: Any) -> Any:
    """One name, or several; a list either way."""
    names = value if isinstance(value, list) and value else [value]
    return [_quantity(name) for name in names]


def _limit_value(value: Any) -> Any:
    if isinstance(value, str):
        if value in _LETTERS:
            return value
        raise ValueError("expected a number, or the letter of a class from A to G")
    return _exact_number(value)


def _subject(name: Any) -> Any:
    if name in LAMP_PROPERTIES:
        return name
    stem = name.removeprefix("declared_") if isinstance(name, str) else name
    if isinstance(stem, str) and stem not in QUANTITIES and not suggestion(stem):
        raise ValueError(
            f"no property is called {name!r}; expected one of {', '.join(LAMP_PROPERTIES)}, "
            "or the name of a quantity"
        )
    _quantity(stem)
    return name


def _day(value: Any) -> Any:
    if not isinstance(value, date) or isinstance(value, datetime):
        raise ValueError("expected a date such as 2021-09-01, without quotation marks")  # noqa: TRY004 - as above
    return value


Number = Annotated[Decimal, BeforeValidator(_exact_number)]
LimitValue = Annotated[Decimal | str, BeforeValidator(_limit_value)]
Day = Annotated[date, BeforeValidator(_day)]
QuantityName = Annotated[str, BeforeValidator(_quantity)]
Subject = Annotated[str, BeforeValidator(_subject)]
Text = Annotated[str, Field(min_length=1)]
Words = Annotated[str, Field(min_length=1), AfterValidator(message_of)]
Note = Annotated[str, AfterValidator(note_of)]
Row = Annotated[list[Number], Field(min_length=2)]


class Strict(BaseModel):
    """A table that refuses unknown keys and wrong types."""

    model_config = ConfigDict(extra="forbid", frozen=True, strict=True)


class SourceTable(Strict):
    """``source``: act, annex, point."""

    act: Text
    annex: str = ""
    point: str = ""

    def record(self) -> Source:
        """The frozen record."""
        return source_of(self.act, self.annex, self.point)


class ConditionTable(Strict):
    """One entry of ``applies`` or ``when``."""

    subject: Subject = Field(alias="property")
    equals: bool | str | None = Field(default=None, alias="is")
    one_of: list[str] = []
    at_least: Number | None = None
    above: Number | None = None
    at_most: Number | None = None
    below: Number | None = None

    @model_validator(mode="after")
    def _says_something(self) -> Self:
        if not self.model_fields_set - {"subject"}:
            raise ValueError("expected is, one_of, at_least, above, at_most or below")
        return self

    def record(self) -> Condition:
        """The frozen record."""
        fields = self.model_dump()
        fields["one_of"] = tuple(self.one_of)
        return Condition(**fields)


class SlopeTable(Strict):
    """One entry of ``slopes``."""

    quantity: QuantityName
    times: Number

    def record(self) -> Slope:
        """The frozen record."""
        return Slope(self.quantity, self.times)


class ToleranceTable(Strict):
    """``tolerance``: absolute or percent, upwards and downwards."""

    plus: Number | None = None
    minus: Number | None = None
    plus_percent: Number | None = None
    minus_percent: Number | None = None

    @model_validator(mode="after")
    def _one_of_each(self) -> Self:
        if not self.model_fields_set:
            raise ValueError("expected plus, minus, plus_percent or minus_percent")
        both = {"plus", "plus_percent"}, {"minus", "minus_percent"}
        if any(pair <= self.model_fields_set for pair in both):
            raise ValueError("expected a number or a percentage in one direction, not both")
        return self

    def record(self) -> Tolerance:
        """The frozen record."""
        return Tolerance(**self.model_dump())


class RoundingTable(Strict):
    """``rounding``: step and mode."""

    step: Annotated[Number, Field(gt=0)]
    mode: Literal["half up", "up"] = "half up"

    def record(self) -> Rounding:
        """The frozen record."""
        return Rounding(self.step, self.mode)


class ValueTable(Strict):
    """One entry of ``values``."""

    start: Day | None = Field(default=None, alias="from")
    end: Day | None = Field(default=None, alias="until")
    value: LimitValue | None = None
    lower: Number | None = None
    upper: Number | None = None
    no_limit: bool = False
    slopes: list[SlopeTable] = []
    tolerance: ToleranceTable | None = None
    entries: dict[str, Number | list[Row]] = {}
    when: list[ConditionTable] = []
    may_be_lowered_to: Number | None = None
    status: Status | None = None
    source: SourceTable | None = None
    note: Note = ""

    @model_validator(mode="after")
    def _in_order(self) -> Self:
        if self.start and self.end and self.end < self.start:
            raise ValueError(f"until {self.end} lies before from {self.start}")
        if self.lower is not None and self.upper is not None and self.upper < self.lower:
            raise ValueError(f"upper {self.upper} lies below lower {self.lower}")
        return self

    def record(self) -> DatedValue:
        """The frozen record."""
        entries: dict[str, Entry] = {
            name: tuple(tuple(row) for row in entry) if isinstance(entry, list) else entry
            for name, entry in self.entries.items()
        }
        return DatedValue(
            start=self.start,
            end=self.end,
            value=self.value,
            lower=self.lower,
            upper=self.upper,
            no_limit=self.no_limit,
            slopes=tuple(item.record() for item in self.slopes),
            tolerance=self.tolerance.record() if self.tolerance else None,
            entries=MappingProxyType(entries),
            when=tuple(item.record() for item in self.when),
            may_be_lowered_to=self.may_be_lowered_to,
            status=self.status,
            source=self.source.record() if self.source else None,
            note=self.note,
        )


def no_overlap(values: list[ValueTable]) -> None:
    """Refuse two values in force on one day under the same conditions."""
    for later, one in enumerate(values):
        for other in values[:later]:
            if one.when == other.when and _overlap(one, other):
                raise ValueError(
                    f"values from {other.start} and from {one.start} are in force at one time; "
                    "expected the earlier to end, with until, before the later begins"
                )


def _overlap(one: ValueTable, other: ValueTable) -> bool:
    starts = max(one.start or date.min, other.start or date.min)
    ends = min(one.end or date.max, other.end or date.max)
    return starts <= ends


def limit_given(value: ValueTable, comparison: str, formula: bool, place: str) -> None:
    """Refuse a value that gives the comparison nothing to compare with."""
    if value.no_limit or formula:
        return
    if comparison == "within":
        if value.lower is None or value.upper is None:
            raise ValueError(f"{place} has no lower and upper, which within needs")
    elif value.value is None:
        raise ValueError(f"{place} has no value")
