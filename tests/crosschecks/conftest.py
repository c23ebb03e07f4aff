"""A bench on which campaigns are put together from a few words each."""

from __future__ import annotations

import re
from collections.abc import Iterable
from datetime import date
from decimal import Decimal
from string import Formatter
from typing import Any

import numpy as np
import pytest

from generator.crosschecks import findings_of
from generator.language.messages import Message, spoken_by, told
from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, FigureSet, Grade
from generator.records.finding import Finding
from generator.records.lamp import Lamp, Offer, Unit
from generator.records.raw import (
    EnduranceReading,
    LightRecord,
    MainsCapture,
    SpectrumSet,
)
from generator.records.settings import Settings


class Blanked:
    """Speaks a language in which every letter of a message is the same."""

    def pattern(self, message: Message) -> str:
        words = message.plural if message.plural and message.counted != 1 else message.singular
        blanked = ""
        for text, place, shape, _ in Formatter().parse(words):
            blanked += re.sub("[A-Za-z]", "\u0436", text)
            blanked += "" if place is None else f"{{{place}:{shape}}}"
        return blanked

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


class Bench:
    """Collects lamps, units, figures and raw data, and asks the room for its findings."""

    def __init__(self) -> None:
        self.lamps: list[Lamp] = []
        self.units: list[Unit] = []
        self.figures: list[Figure] = []
        self.spectra: list[SpectrumSet] = []
        self.light: list[LightRecord] = []
        self.mains: list[MainsCapture] = []
        self.endurance: list[EnduranceReading] = []
        self.supply: dict[str, str] = {}
        self.assessment_date: date | None = None

    def lamp(
        self,
        lamp_id: str = "L1",
        bidder: str = "North",
        declared: dict[str, str] | None = None,
        **more: Any,
    ) -> None:
        offer = Offer(
            report_no=more.pop("report_no", None), report_date=more.pop("report_date", None)
        )
        values = {name: Decimal(text) for name, text in (declared or {}).items()}
        self.lamps.append(
            Lamp(lamp_id, bidder, f"model {lamp_id}", declared=values, offer=offer, **more)
        )

    def unit(
        self,
        unit_id: str = "L1-1",
        lamp_id: str = "L1",
        uncertainty: dict[str, str] | None = None,
        **reported: str,
    ) -> None:
        values = {name: Decimal(text) for name, text in reported.items()}
        expanded = {name: Decimal(text) for name, text in (uncertainty or {}).items()}
        self.units.append(Unit(unit_id, lamp_id, values, expanded))
        for name, value in values.items():
            self.figures.append(
                Figure(lamp_id, unit_id, name, value, Grade.REPORTED, name, expanded.get(name))
            )

    def computed(
        self,
        name: str,
        value: str,
        unit_id: str = "L1-1",
        lamp_id: str = "L1",
        uncertainty: str | None = None,
        method: str = "computed_somehow",
    ) -> None:
        number: Decimal | str = value if name == "energy_efficiency_class" else Decimal(value)
        expanded = None if uncertainty is None else Decimal(uncertainty)
        self.figures.append(
            Figure(lamp_id, unit_id, name, number, Grade.COMPUTED, method, expanded)
        )

    def mean(
        self, name: str, value: str, lamp_id: str = "L1", uncertainty: str | None = None
    ) -> None:
        self.computed(name, value, MEAN, lamp_id, uncertainty)

    def spectrum(
        self, lamp_id: str, values: Iterable[Any], wavelength_nm: Any = None, unit: Any = "W/nm"
    ) -> None:
        rows = np.array(list(values), dtype=np.float64)
        scale = np.arange(380.0, 781.0) if wavelength_nm is None else np.asarray(wavelength_nm)
        ids = tuple(f"{lamp_id}-{place + 1}" for place in range(len(rows)))
        file = f"spectra/{lamp_id}.csv"
        self.spectra.append(SpectrumSet(lamp_id, ids, scale, rows, unit, file))

    def record(
        self, lamp_id: str, values: Iterable[Any], rate_hz: float = 20000.0, *, long: bool = False
    ) -> None:
        rows = np.array(list(values), dtype=np.float64)
        ids = tuple(f"{lamp_id}-{place + 1}" for place in range(len(rows)))
        self.light.append(LightRecord(lamp_id, ids, rate_hz, rows, long, f"light/{lamp_id}.csv"))

    def capture(self, unit_id: str, current_a: Any) -> None:
        current = np.asarray(current_a, dtype=np.float64)
        voltage = np.ones_like(current)
        self.mains.append(MainsCapture(unit_id, 20000.0, voltage, current, f"mains/{unit_id}.csv"))

    @property
    def campaign(self) -> Campaign:
        head: dict[str, Any] = {"title": "bench"}
        if self.assessment_date is not None:
            head["assessment_date"] = self.assessment_date
        supply = {name: Decimal(text) for name, text in self.supply.items()}
        settings = Settings.model_validate({"campaign": head, "supply": supply})
        return Campaign(
            name="bench",
            settings=settings,
            lamps=tuple(self.lamps),
            units=tuple(self.units),
            spectra=tuple(self.spectra),
            light=tuple(self.light),
            mains=tuple(self.mains),
            endurance=tuple(self.endurance),
        )

    def findings(self) -> tuple[Finding, ...]:
        found = findings_of(self.campaign, FigureSet(self.figures))
        for item in found:
            self._said_in_another_language(item)
        return found

    def _said_in_another_language(self, item: Finding) -> None:
        """Only data and symbols stay as they are: names, keys with an underscore, units."""
        data = {lamp.bidder for lamp in self.lamps} | {lamp.lamp_id for lamp in self.lamps}
        data |= {lamp.offer.report_no or "" for lamp in self.lamps}
        data |= {unit.unit_id for unit in self.units}
        texts = (item.title, item.compared, item.explanation, item.source, item.deviation_unit)
        with spoken_by(Blanked()):
            for text in texts:
                said = told(text)
                for name in sorted(data, key=len, reverse=True):
                    said = said.replace(name, "") if name else said
                assert not re.search(r"(?<![\w])[A-Za-z]{3,}(?![\w])|\d\.\d", said), said

    def checks(self) -> list[str]:
        return [item.check for item in self.findings()]

    def only(self, check: str) -> Finding:
        found = [item for item in self.findings() if item.check == check]
        assert len(found) == 1, self.checks()
        return found[0]


@pytest.fixture
def bench() -> Bench:
    return Bench()
