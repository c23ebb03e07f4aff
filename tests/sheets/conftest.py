"""An invented assessment of three lamps, with every verdict word, grade and gap in it."""

from __future__ import annotations

import dataclasses
import json
import subprocess
import sys
from dataclasses import dataclass
from datetime import date
from decimal import Decimal
from functools import cache

import numpy as np
import pytest

from generator.errors import Problem
from generator.records.assessment import Assessment
from generator.records.campaign import Campaign
from generator.records.comparison import (
    ComparisonCell,
    ComparisonMatrix,
    ComparisonRow,
    SheetContext,
)
from generator.records.curves import (
    AgeingCurve,
    HarmonicComb,
    IntensityCurve,
    LampCurves,
    LightCurve,
    LowRiskLine,
    MainsCurve,
    SpectrumCurve,
    WhitePlane,
)
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp, Offer, Unit
from generator.records.settings import CampaignTable, Laboratory, Settings, SheetTable
from generator.records.tender_settings import TenderUse
from generator.records.verdict import Basis, Verdict, VerdictWord

NOTES = """# Remarks

The lamp hummed *faintly* in a quiet room. See the [report](https://example.org/report).

<script>alert("no")</script>

- first unit had a loose cap
- <img src=x onerror=alert(1)> nothing else

[bad](javascript:alert(1))
"""

EU = "EU 2019/2020"


@dataclass(frozen=True)
class InventedSource:
    title: str
    edition: str = ""
    publisher: str = ""
    date: str = ""


@dataclass(frozen=True)
class InventedMethod:
    title: str = "CCT and Duv"
    formula: str = "The nearest point of the locus."
    source: str = "cie_13_3"
    clause: str = "clause 5"
    inputs: tuple[str, ...] = ()


def _figure(lamp_id, quantity, value, uncertainty=None, grade=Grade.COMPUTED, **more):
    return Figure(
        lamp_id=lamp_id,
        unit_id="",
        quantity=quantity,
        value=Decimal(value) if value is not None else None,
        grade=grade,
        method=more.pop("method", "mean_of_units"),
        expanded_uncertainty=None if uncertainty is None else Decimal(uncertainty),
        units_count=3,
        **more,
    )


def _verdict(
    lamp_id, clause, title, quantity, unit, value, limit, comparison, margin, word, **more
):
    decimal = lambda text: None if text is None else Decimal(text)  # noqa: E731 - short and local
    regime = more.pop("regime", EU)
    source = more.pop("source", "Regulation (EU) 2019/2020, Annex II, point 2, Table 4")
    act, _, rest = source.partition(", ")
    place, _, amending = rest.partition(", as amended by Regulation (EU) ")
    return Verdict(
        lamp_id=lamp_id,
        clause=clause,
        title=title,
        regime=regime,
        quantity=quantity,
        unit=unit,
        basis=more.pop("basis", Basis.DETERMINED),
        value=decimal(value),
        expanded_uncertainty=decimal(more.pop("uncertainty", None)),
        limit=decimal(limit),
        comparison=comparison,
        margin=decimal(margin),
        verdict=VerdictWord(word),
        source=source,
        status="buyer" if regime == "Buyer" else "read",
        act=act,
        place=place,
        amending_act=amending,
        **more,
    )


def _verdicts(lamp_id, ra, flicker_word):
    margin = str(Decimal(ra) - 80)
    word = (
        "pass" if Decimal(ra) > Decimal("81.5") else "inconclusive" if Decimal(ra) > 80 else "fail"
    )
    return [
        _verdict(
            lamp_id,
            "eu-ra",
            "Colour rendering",
            "ra",
            "",
            ra,
            "80",
            "at least",
            margin,
            word,
            uncertainty="1.5",
        ),
        _verdict(
            lamp_id,
            "eu-ra",
            "Colour rendering",
            "ra",
            "",
            "80",
            "80",
            "at least",
            "0",
            "pass",
            basis=Basis.DECLARED,
        ),
        _verdict(
            lamp_id,
            "eu-pon",
            "Maximum power",
            "power_w",
            "W",
            "8.2",
            "9.35",
            "at most",
            "1.15",
            "pass",
            uncertainty="0.08",
            source="Regulation (EU) 2019/2020, Annex II, point 1(a)",
        ),
        _verdict(
            lamp_id,
            "eu-psb",
            "Standby power",
            "standby_power_w",
            "W",
            "0.31",
            "0.5",
            "at most",
            "0.19",
            "pass",
            uncertainty="0.02",
            source="Regulation (EU) 2019/2020, Annex II, point 1(a)",
        ),
        _verdict(
            lamp_id,
            "eu-pnet",
            "Networked standby power",
            "networked_standby_power_w",
            "W",
            None,
            None,
            "at most",
            None,
            "not applicable",
            note="Not applicable: the lamp is not connected.",
            reason="the lamp is not connected",
        ),
        _verdict(
            lamp_id,
            "eu-cos",
            "Displacement factor",
            "displacement_factor",
            "",
            "0.55",
            "0.5",
            "at least",
            "0.05",
            "pass",
            uncertainty="0.01",
        ),
        _verdict(
            lamp_id,
            "eu-pst",
            "Flicker, PstLM",
            "pst_lm",
            "",
            "0.12",
            "1.0",
            "at most",
            "0.88",
            "pass",
            uncertainty="0.05",
        ),
        _verdict(
            lamp_id,
            "eu-svm",
            "Stroboscopic effect, SVM",
            "svm",
            "",
            {"pass": "0.05", "fail": "1.62"}[flicker_word],
            "0.4",
            "at most",
            {"pass": "0.35", "fail": "-1.22"}[flicker_word],
            flicker_word,
            uncertainty="0.04",
            note="limit of 1 September 2024",
        ),
        _verdict(
            lamp_id,
            "eu-verification-ra",
            "Colour rendering against the declaration",
            "ra",
            "",
            ra,
            "78",
            "at least",
            str(Decimal(ra) - 78),
            "pass",
            uncertainty="1.5",
            source="Regulation (EU) 2019/2020, Annex IV, Table 6, as amended by "
            "Regulation (EU) 2021/341",
            steps=(
                "Declared 80 with tolerance \u2212 2.0: at least 78.",
                f"Determined value {ra} (computed, mean of 3 units, U = 1.5).",
                "luminous_flux_lm = 802.0209485, x = 0.4635689028.",
            ),
        ),
        _verdict(
            lamp_id,
            "eu-sdcm",
            "Colour consistency",
            "sdcm",
            "steps",
            "3.4",
            "6",
            "at most",
            "2.6",
            "pass",
            uncertainty="0.9",
        ),
        _verdict(
            lamp_id,
            "eu-lmf",
            "Lumen maintenance",
            "lumen_maintenance_factor",
            "",
            None,
            "0.960",
            "at least",
            None,
            "not measured",
            note="no endurance test in the campaign",
        ),
        _verdict(
            lamp_id,
            "eu-sf",
            "Survival",
            "survival_factor",
            "",
            None,
            "0.9",
            "at least",
            None,
            "not measured",
            note="no endurance test in the campaign",
        ),
        _verdict(
            lamp_id,
            "buyer-r9",
            "R9 for the reading rooms",
            "r9",
            "",
            "12",
            "10",
            "at least",
            "2",
            "pass",
            regime="Buyer",
            uncertainty="4",
            source="call for bids, 4.2",
        ),
        _verdict(
            lamp_id,
            "buyer-efficacy",
            "Efficacy",
            "efficacy_lm_per_w",
            "lm/W",
            "98.4",
            "100",
            "at least",
            "-1.6",
            "inconclusive",
            regime="Buyer",
            uncertainty="1.9",
            source="call for bids, 4.3",
        ),
    ]


def _figures(lamp_id, ra, cct, flicker, svm):
    rows = [
        _figure(lamp_id, "luminous_flux_lm", "806.4", "12"),
        _figure(lamp_id, "power_w", "8.2", "0.08"),
        _figure(lamp_id, "efficacy_lm_per_w", "98.41463415", "1.9", spread=Decimal("0.8")),
        _figure(lamp_id, "cct_k", cct, "31", method="cct_ohno_2013"),
        _figure(lamp_id, "cct_k", "2700", grade=Grade.DECLARED, method="declared_cct_k"),
        _figure(lamp_id, "duv", "-0.00123", "0.0009"),
        _figure(lamp_id, "ra", ra, "1.5"),
        _figure(lamp_id, "radiant_flux_w", "2.43", "0.05"),
        _figure(lamp_id, "radiant_efficiency", "0.296", "0.007"),
        _figure(lamp_id, "emitter_fraction", "0.18", "0.01"),
        _figure(lamp_id, "ler_lm_per_w", "331.8", "2.1"),
        _figure(lamp_id, "peak_wavelength_nm", "598"),
        _figure(lamp_id, "emitter_peak_nm", "452.3", "0.5"),
        _figure(lamp_id, "emitter_photon_energy_ev", "2.741", "0.003"),
        _figure(lamp_id, "percent_flicker", flicker, "0.6"),
        _figure(lamp_id, "flicker_index", "0.118", "0.004"),
        _figure(lamp_id, "flicker_frequency_hz", "100", "0.1"),
        _figure(lamp_id, "low_risk_modulation_percent", "8"),
        _figure(lamp_id, "sdcm", "3.4", "0.9"),
        _figure(lamp_id, "svm", svm, "0.04"),
        _figure(
            lamp_id, "power_factor", "0.532", "0.005", grade=Grade.REPORTED, method="power_factor"
        ),
        _figure(lamp_id, "displacement_factor", "0.55", "0.01"),
        _figure(lamp_id, "thd_current_percent", "38.4", "0.5"),
        _figure(lamp_id, "rf", "83.1"),
        _figure(lamp_id, "rg", "96.4"),
    ]
    special = (81, 90, 95, 80, 80, 86, 84, 60, 12, 76, 78, 62, 83, 97, 74)
    rows += [_figure(lamp_id, f"r{place}", str(value)) for place, value in enumerate(special, 1)]
    for place in range(1, 17):
        shift = f"{-9 * np.cos(2 * np.pi * (place - 0.5) / 16):.1f}"
        rows.append(_figure(lamp_id, f"rcs_h{place}", shift))
        rows.append(_figure(lamp_id, f"rf_h{place}", str(75 + 3 * (place % 6))))
    return rows


def _curves(depth):
    nm = np.arange(380.0, 781.0, 1.0)
    emitter = 0.9 * np.exp(-0.5 * ((nm - 452) / 9) ** 2)
    phosphor = np.exp(-0.5 * ((nm - 598) / 55) ** 2) / (1 + np.exp(-(nm - 490) / 12))
    t = np.linspace(0, 20, 801)
    light = 1 + depth * np.sin(2 * np.pi * t / 10) + 0.2 * depth * np.sin(6 * np.pi * t / 10)
    phase = np.linspace(0, 360, 721)
    volts = 325 * np.sin(np.deg2rad(phase))
    pulse = np.exp(-0.5 * (((phase % 180) - 62) / 14) ** 2) * np.where(phase < 180, 1, -1)
    temperatures = np.linspace(2400, 3100, 71)
    x = 0.4578 - (temperatures - 2700) * 5.4e-5
    y = 0.4101 - (temperatures - 2700) * 0.9e-5 - ((temperatures - 2700) * 8e-6) ** 2
    angle = np.linspace(0, 2 * np.pi, 73)
    tilt = np.deg2rad(55)
    a, b = 0.0162 * np.cos(angle), 0.0084 * np.sin(angle)
    ellipse = np.column_stack(
        [a * np.cos(tilt) - b * np.sin(tilt), a * np.sin(tilt) + b * np.cos(tilt)]
    )
    target = np.array([0.4578, 0.4101])
    return LampCurves(
        spectrum=SpectrumCurve(
            nm, 0.008 * (emitter + phosphor), "W/nm", 0.008 * emitter, 0.008 * phosphor, 3
        ),
        light=LightCurve(t, light, 10.0, "u1"),
        low_risk=LowRiskLine(
            np.array([1.0, 90.0, 1250.0, 3000.0, 1e5]),
            np.array([0.025, 7.2, 100.0, 100.0, 100.0]),
            "ieee_1789",
        ),
        mains=MainsCurve(phase, volts, 0.18 * pulse, -28.0, "u1"),
        harmonics=HarmonicComb(
            np.array([3.0, 5, 7, 9, 11, 13, 15]),
            np.array([32.0, 11, 8, 6, 4, 2, 1]),
        ),
        ageing=AgeingCurve(
            np.repeat([0.0, 1000, 2000, 3000], 5),
            np.concatenate([1 - n * 0.006 + np.linspace(-0.004, 0.004, 5) for n in range(4)]),
            np.linspace(0, 20000, 60),
            np.exp(-6e-6 * np.linspace(0, 20000, 60)),
            np.exp(-8e-6 * np.linspace(0, 20000, 60)),
            np.exp(-4e-6 * np.linspace(0, 20000, 60)),
            3000.0,
            0.96,
            18000.0,
        ),
        intensity=tuple(
            IntensityCurve(
                np.linspace(-180, 180, 73),
                100 * (1 + np.cos(np.deg2rad(np.linspace(-180, 180, 73)))) ** power,
                name,
            )
            for power, name in ((1.0, "C0-C180"), (1.3, "C90-C270"))
        ),
        white=WhitePlane(
            "xy",
            ("u1", "u2", "u3"),
            target + np.array([[0.002, 0.001], [-0.003, 0.002], [0.006, 0.004]]),
            np.column_stack([x, y]),
            temperatures,
            target,
            "2700 K",
            target + ellipse,
            6.0,
        ),
    )


@pytest.fixture(scope="session")
def invented_assessment() -> Assessment:
    lamps = (
        Lamp(
            "L-01",
            "Bidder A",
            "Harbour 806",
            "E27",
            "LED",
            directional=False,
            mains=True,
            connected=False,
            placed_on_market=date(2023, 4, 1),
            declared={"ra": Decimal(80), "cct_k": Decimal(2700), "l70b50_h": Decimal(15000)},
            declared_energy_class="F",
            offer=Offer(Decimal("3.90"), "EUR", 400, "TR-117", date(2026, 3, 2)),
            row=2,
        ),
        Lamp(
            "L-02",
            "Bidder B",
            "Łódź globe ß′",
            "E27",
            "LED",
            directional=False,
            mains=True,
            connected=False,
            row=3,
        ),
        Lamp("L-03", "Bidder C", "Plain 中 lamp <b>&", row=4),
    )
    units = tuple(Unit(f"{lamp}-{n}", lamp) for lamp in ("L-01", "L-02") for n in (1, 2, 3))
    figures = [
        *_figures("L-01", "82.41", "2718", "42.06", "1.62"),
        *_figures("L-02", "80.62", "2744", "1.2", "0.05"),
        *(
            dataclasses.replace(_figure("L-01", "ra", value), unit_id=f"L-01-{unit}")
            for unit, value in ((1, "82.9"), (2, "81.7"))
        ),
        _figure("L-03", "cct_k", "4000", grade=Grade.DECLARED, method="declared_cct_k"),
        _figure(
            "L-03", "ra", None, grade=Grade.DECLARED, reason="the declared value could not be read"
        ),
    ]
    verdicts = (
        *_verdicts("L-01", "82.41", "fail"),
        *_verdicts("L-02", "80.62", "pass"),
        _verdict(
            "L-03",
            "eu-ra",
            "Colour rendering",
            "ra",
            "",
            None,
            "80",
            "at least",
            None,
            "not measured",
        ),
    )
    settings = Settings(
        campaign=CampaignTable(
            title="Reading-room lamps", reference="RR-2026-04", client="Town of Fernwick"
        ),
        laboratory=Laboratory(name="Light bench of Fernwick", accreditation="none"),
        use=TenderUse(hours_per_year=Decimal(2000), tariff_per_kwh=Decimal("0.30"), currency="EUR"),
        sheet=SheetTable(theme="tender", lamp_pages=4),
    )
    warnings = (
        Problem("warning", "units.csv", 3, "r9", "", "a number", "R9 is missing for one unit."),
        Problem(
            "warning", "light/L-01.csv", None, None, "0.4 s", "1 s", "The light record is short."
        ),
    )
    campaign = Campaign(
        "fernwick",
        settings,
        lamps,
        units,
        notes={"L-01": NOTES, "campaign": "All *three* lamps."},
        warnings=warnings,
    )
    findings = (
        Finding(
            "L-01",
            "",
            "svm-declared-better",
            Severity.CONTRADICTION,
            "Declared SVM better than that of every unit",
            "lamp L-01: SVM declared as 0.4, best of 3 units 1.6012345678; difference -1.20.",
            Decimal("-1.2"),
            "",
            "Other samples.",
            ("svm",),
            "cie_13_3, clause 5",
        ),
    )
    return Assessment(
        campaign,
        date(2026, 11, 30),
        FigureSet(figures),
        verdicts,
        "0.1.0",
        "0123456789abcdef",
        findings,
    )


MATRIX = (
    "luminous_flux_lm",
    "power_w",
    "efficacy_lm_per_w",
    "cct_k",
    "ra",
    "r9",
    "percent_flicker",
    "svm",
    "power_factor",
)


@pytest.fixture(scope="session")
def invented_context(invented_assessment) -> SheetContext:
    rows = []
    for lamp in invented_assessment.campaign.lamps:
        verdicts = invented_assessment.verdicts_of(lamp.lamp_id)
        cells = []
        for name in MATRIX:
            limiting = [v for v in verdicts if v.quantity == name and v.basis is Basis.DETERMINED]
            figure = invented_assessment.figures.best(lamp.lamp_id, name)
            cells.append(
                ComparisonCell(
                    figure,
                    limiting[0] if limiting else None,
                    name == "ra" and lamp.lamp_id == "L-01",
                )
            )
        counts = {word: sum(v.verdict is word for v in verdicts) for word in VerdictWord}
        rows.append(ComparisonRow(lamp.lamp_id, tuple(cells), counts))
    sources = {"cie_13_3": InventedSource("CIE 13.3, colour rendering", "1995", "CIE", "1995")}
    return SheetContext(
        sources=sources,
        curves={
            "L-01": _curves(0.42),
            "L-02": _curves(0.012),
            "L-03": LampCurves(missing={"mains": "the capture was clipped"}),
        },
        matrix=ComparisonMatrix(MATRIX, tuple(rows)),
        methods={"cct_ohno_2013": InventedMethod()},
    )


LONG_WAY = """
import json, sys
import generator.sheets.engine_shortcuts as shortcuts
import generator.sheets.pdf_sheet as pdf_sheet
shortcuts.take_shortcuts = pdf_sheet.take_shortcuts = lambda: False
for line in sys.stdin:
    theme, page, of_lamp = json.loads(line)
    document = pdf_sheet.pdf_engine(theme).lay_out(page, of_lamp=of_lamp)
    print(pdf_sheet.written_pdf(document).hex(), flush=True)
"""


@pytest.fixture(scope="session")
def long_way():
    """Gives a function that renders a page without the shortcuts, in a process of its own."""
    with subprocess.Popen(
        [sys.executable, "-c", LONG_WAY], stdin=subprocess.PIPE, stdout=subprocess.PIPE, text=True
    ) as process:

        @cache
        def render(page, theme="tender", *, of_lamp=True):
            process.stdin.write(json.dumps([theme, page, of_lamp]) + "\n")
            process.stdin.flush()
            return bytes.fromhex(process.stdout.readline())

        yield render
        process.stdin.close()
