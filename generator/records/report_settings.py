"""The table ``[report]`` of ``campaign.toml``: what a laboratory says about its test report."""

from __future__ import annotations

from datetime import date
from itertools import pairwise
from typing import Self

from pydantic import BaseModel, ConfigDict, Field, model_validator

from generator.language import joined, say

__all__ = ["Amendment", "Equipment", "ReportMethod", "ReportTable"]


class _Table(BaseModel):
    model_config = ConfigDict(extra="forbid", frozen=True, strict=False)


class ReportMethod(_Table):
    """One test method with its deviations; ``deviations`` empty means that none is stated."""

    name: str = Field(min_length=1)
    deviations: str = ""


class Equipment(_Table):
    """One instrument: identity, when and by whom it was calibrated, and to what it is traced."""

    name: str = Field(min_length=1)
    serial: str = ""
    calibrated_on: date | None = None
    calibration_certificate: str = ""
    traceable_to: str = ""

    @property
    def text(self) -> str:
        """The instrument in one phrase, with what is missing named."""
        parts: list[str] = [self.name]
        if self.serial:
            parts.append(say("serial {number}", number=self.serial))
        day = self.calibrated_on
        parts.append(
            say("calibrated on {day}", day=day) if day else say("calibration date missing")
        )
        if self.calibration_certificate:
            parts.append(say("certificate {number}", number=self.calibration_certificate))
        traced = self.traceable_to
        parts.append(
            say("traceable to {reference}", reference=traced)
            if traced
            else say("traceability missing")
        )
        return joined(", ", parts)


class Amendment(_Table):
    """One earlier issue of the report that this one replaces, and why."""

    replaces: str = Field(min_length=1)
    issued_on: date | None = None
    reason: str = Field(min_length=1)


class ReportTable(_Table):
    """``[report]``: the items of a test report that no measurement can tell."""

    number: str = ""
    title: str = ""
    customer: str = ""
    customer_contact: str = ""
    place_of_work: str = ""
    accreditation_scope: str = ""
    received_on: date | None = None
    tested_from: date | None = None
    tested_to: date | None = None
    issued_on: date | None = None
    item_description: str = ""
    item_condition: str = ""
    sampling: str = ""
    conditions: str = ""
    methods: tuple[ReportMethod, ...] = ()
    equipment: tuple[Equipment, ...] = ()
    external_results: str = ""
    signatory: str = ""
    signatory_function: str = ""
    reproduction_note: str = ""
    opinions: str = ""
    amendments: tuple[Amendment, ...] = ()

    @model_validator(mode="after")
    def _days_in_order(self) -> Self:
        """Receipt, test and issue follow one another."""
        named = (
            ("received_on", self.received_on),
            ("tested_from", self.tested_from),
            ("tested_to", self.tested_to),
            ("issued_on", self.issued_on),
        )
        given = [(name, day) for name, day in named if day is not None]
        for (before, first), (after, second) in pairwise(given):
            if second < first:
                raise ValueError(f"{after} on or after {before}")
        return self
