"""The settings of ``campaign.toml``, one frozen model per table; unknown keys are refused."""

from __future__ import annotations

import re
from datetime import date
from decimal import Decimal
from typing import Annotated, Any, Literal

from pydantic import BeforeValidator, Field, field_validator

from generator.language.speaking import LANGUAGES
from generator.records.report_settings import ReportTable
from generator.records.setting_values import NonNegative, Number, Positive, Table
from generator.records.tender_settings import TenderSettings

__all__ = [
    "CampaignTable",
    "Decision",
    "Laboratory",
    "Language",
    "Settings",
    "SheetTable",
    "Supply",
    "UncertaintyRule",
]


class CampaignTable(Table):
    """``[campaign]``: what this is, for whom, and the date on which the law is read."""

    title: str = Field(min_length=1)
    reference: str = ""
    client: str = ""
    purpose: str = ""
    language: str = "en"
    assessment_date: date | None = None
    spectra_unit: Literal["W/nm", "relative"] | None = None
    regimes: tuple[str, ...] | None = None

    @property
    def catalogue(self) -> str:
        """Tag of the catalogue for the language; empty where there is none."""
        own = self.language.partition("-")[0].lower()
        return own if own in LANGUAGES else ""


class Laboratory(Table):
    """``[laboratory]``: who measured, and how."""

    name: str = ""
    address: str = ""
    accreditation: str = ""
    methods: tuple[str, ...] | str = ()


class Supply(Table):
    """``[supply]``: nominal mains voltage [V] and frequency [Hz]."""

    voltage_v: Positive | None = None
    frequency_hz: Positive | None = None


_PERCENT = re.compile(r"\s*([0-9]+(?:\.[0-9]+)?)\s*%\s*")


class UncertaintyRule(Table):
    """Expanded uncertainty (k = 2) of a quantity: absolute, or percent of the value.

    Written in ``[uncertainty]`` as a number (absolute), as text ending in ``%``, or as a table
    ``{ absolute = 30 }`` or ``{ percent = 2.0 }``.
    """

    absolute: NonNegative | None = None
    percent: NonNegative | None = None

    def of(self, value: Decimal) -> Decimal:
        """Expanded uncertainty of a value, in the unit of the value."""
        if self.percent is not None:
            return abs(value) * self.percent / 100
        return self.absolute if self.absolute is not None else Decimal(0)


def _uncertainty_rule(value: Any) -> Any:
    if isinstance(value, str):
        match = _PERCENT.fullmatch(value)
        if match is None:
            raise ValueError('a number, or text such as "2 %"')
        return {"percent": Decimal(match[1])}
    if isinstance(value, int | float | Decimal) and not isinstance(value, bool):
        return {"absolute": value}
    if isinstance(value, dict) and len(value) == 1:
        return value
    if isinstance(value, UncertaintyRule):
        return value
    raise ValueError('a number, text such as "2 %", or a table with absolute or percent')


class Decision(Table):
    """``[decision]``: the rule by which a value and its uncertainty become a verdict."""

    rule: Literal["simple acceptance", "guarded acceptance", "conformance probability"] = (
        "simple acceptance"
    )
    guard_band_factor: NonNegative = Decimal(1)
    probability: Annotated[Number, Field(gt=0, lt=1)] = Decimal("0.95")


Language = Literal["en", "de", "fr", "es", "it", "pl"]
"""A language that sheets can be in."""


class SheetTable(Table):
    """``[sheet]``: theme and languages of what is issued, and the pages of a lamp on paper.

    Each language has a tree of pages of its own, the first one at the root of the issue. Without
    languages the sheets speak that of the campaign where there is a catalogue for it, else English.

    With two pages a lamp's PDF is the short form; with four it holds the tables too. By default
    the tender theme has two, the others four.
    """

    theme: str = "tender"
    lamp_pages: Literal[2, 4] | None = None
    languages: tuple[Language, ...] = ()

    @field_validator("languages")
    @classmethod
    def _each_once(cls, languages: tuple[str, ...]) -> tuple[str, ...]:
        if not languages:
            raise ValueError(f"one or more of {', '.join(LANGUAGES)}; or no such key")
        if len(set(languages)) < len(languages):
            raise ValueError("each language once")
        return languages


class Settings(TenderSettings):
    """The whole of ``campaign.toml``; the tables of a tender are inherited."""

    campaign: CampaignTable
    laboratory: Laboratory = Laboratory()
    supply: Supply = Supply()
    uncertainty: dict[str, Annotated[UncertaintyRule, BeforeValidator(_uncertainty_rule)]] = Field(
        default_factory=dict
    )
    decision: Decision = Decision()
    clause: tuple[dict[str, Any], ...] = ()
    sheet: SheetTable = SheetTable()
    report: ReportTable = ReportTable()

    @property
    def languages(self) -> tuple[str, ...]:
        """Languages of the sheets, by tag; at least one."""
        return self.sheet.languages or (self.campaign.catalogue or "en",)
