"""The lamps of the demo tender: what each bidder declares, and what is true of the lamp."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from demo_source.ageing import TO_6000_H, Ageing
from demo_source.intensity import Beam
from demo_source.light import Modulation
from demo_source.mains import Corrected, Driver, Rectifier
from demo_source.spectra import Component, Emitter, ManganeseLines, Phosphor

__all__ = ["LAMPS", "Lamp", "Records"]


@dataclass(frozen=True, slots=True)
class Records:
    """Which waveforms the laboratory took.

    Parameters
    ----------
    short_units
        Units with a short light record, counted from the first; 0 for none.
    long_s
        Length of the long record of the first unit [s]; 0 for none.
    mains
        Whether every unit has a mains capture.
    """

    short_units: int = 3
    long_s: int = 0
    mains: bool = True


@dataclass(frozen=True, slots=True)
class Lamp:
    """One lamp of the tender: a declaration, and the lamp behind it.

    Parameters
    ----------
    number
        Seed of everything that is drawn for this lamp.
    lamp_id
        Identity; also the names of its files.
    declared
        Columns of ``lamps.csv`` as the bidder filled them in; a missing one is an empty cell.
    units
        Size of the sample.
    flux_lm, power_w
        True means [lm], [W].
    colour
        True mean chromaticity x, y.
    components
        What the spectrum is made of; empty where no spectrum was measured.
    spectrum_step_nm
        Step of the spectroradiometer [nm].
    dark_noise
        Noise of the spectroradiometer relative to the peak, left as measured.
    driver
        Mains current; ``None`` for a lamp behind a separate control gear.
    modulation, records
        Light against time, and what was recorded.
    beam
        Intensity distribution of a directional lamp, where measured.
    ageing
        Endurance test, where there was one.
    standby_w, networked_standby_w
        True means [W]; ``None`` where not measured.
    reported
        Ready-made figures of the laboratory: column -> mean, spread over units, decimals.
    flux_spread
        Relative standard deviation of the flux over the units.
    """

    number: int
    lamp_id: str
    declared: Mapping[str, str]
    units: int
    flux_lm: float
    power_w: float
    colour: tuple[float, float]
    components: tuple[Component, ...]
    spectrum_step_nm: int = 5
    dark_noise: float = 0.0
    driver: Driver | None = None
    modulation: Modulation = field(default_factory=Modulation)
    records: Records = field(default_factory=Records)
    beam: Beam | None = None
    ageing: Ageing | None = None
    standby_w: float | None = None
    networked_standby_w: float | None = None
    reported: Mapping[str, tuple[float, float, int]] = field(default_factory=dict)
    flux_spread: float = 0.010


def _declared(line: str, kind: str = "", **values: str) -> dict[str, str]:
    """One row of ``lamps.csv``.

    `line` holds bidder, model, cap and date of placing on the market; `kind` the yes-columns;
    `values` the columns, those of quantities without their ``declared_``.
    """
    bidder, model, cap, placed = (part.strip() for part in line.split("|"))
    row = {
        "bidder": bidder,
        "model": model,
        "cap": cap,
        "technology": "LED",
        "placed_on_market": placed,
    }
    for column in ("directional", "mains", "connected", "colour_tuneable", "high_luminance"):
        row[column] = "yes" if column in kind.split() else "no"
    offer = ("lot", "unit_price", "currency", "quantity", "report_no", "report_date")
    for name, text in values.items():
        row[name if name in offer or name.startswith("report_") else f"declared_{name}"] = text
    return row


LAMPS: tuple[Lamp, ...] = (
    # The honest best: nothing to hide, ten units, 6000 h, a record of 180 s.
    Lamp(
        number=1,
        lamp_id="veldrune-a60-940",
        declared=_declared(
            "Veldrune Lighting | Meridian A60 940 | E27 | 2025-03-17",
            "mains",
            luminous_flux_lm="806",
            power_w="5.8",
            standby_power_w="0.00",
            cct_k="4000",
            ra="90",
            r9="60",
            displacement_factor="0.97",
            pst_lm="0.1",
            svm="0.1",
            l70b50_h="50000",
            energy_class="D",
            survival_factor="1.00",
            lumen_maintenance_factor="0.97",
            colour_consistency_sdcm="3",
            equivalent_power_w="60",
            unit_price="6.40",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-011",
            report_date="2026-02-06",
            lot="lamps",
            report_model="Meridian A60 940",
        ),
        units=10,
        flux_lm=816.0,
        power_w=5.79,
        colour=(0.3803, 0.3795),
        components=(Emitter(453.0), Phosphor(544.0, 114.0), Phosphor(631.0, 90.0)),
        spectrum_step_nm=1,
        driver=Corrected(-9.0, (9.0, 5.0, 3.5, 2.0, 1.2)),
        modulation=Modulation(ripple=(0.008, 0.002)),
        records=Records(short_units=5, long_s=180),
        ageing=Ageing(l70_h=78000.0, hours_h=TO_6000_H, rise=0.004, drift_x=1e-4, drift_y=1e-4),
        standby_w=0.0,
    ),
    Lamp(
        number=2,
        lamp_id="veldrune-gu10-930",
        declared=_declared(
            "Veldrune Lighting | Meridian Spot 930 36D | GU10 | 2025-05-05",
            "directional mains",
            luminous_flux_lm="345",
            power_w="4.2",
            cct_k="3000",
            ra="90",
            r9="50",
            displacement_factor="0.90",
            pst_lm="0.1",
            svm="0.1",
            l70b50_h="25000",
            beam_angle_deg="36",
            peak_intensity_cd="900",
            energy_class="F",
            survival_factor="1.00",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="4",
            unit_price="5.10",
            currency="EUR",
            quantity="300",
            report_no="TPL-26-012",
            report_date="2026-02-06",
            lot="spots",
            report_model="Meridian Spot 930 36D",
        ),
        units=5,
        flux_lm=385.0,
        power_w=4.18,
        colour=(0.4385, 0.4025),
        components=(Emitter(454.0), Phosphor(548.0, 116.0), Phosphor(627.0, 88.0)),
        spectrum_step_nm=1,
        driver=Corrected(16.0, (14.0, 8.0, 5.0, 3.0)),
        modulation=Modulation(ripple=(0.012, 0.003)),
        records=Records(short_units=5, long_s=60),
        beam=Beam(35.0, flatness=2.2, spill=0.012),
        ageing=Ageing(l70_h=34000.0, rise=0.002),
        standby_w=0.0,
    ),
    # The cheap one: hardly any smoothing, so the light follows the mains at 100 Hz.
    Lamp(
        number=3,
        lamp_id="corvath-a60-827",
        declared=_declared(
            "Corvath Lamps | Basic A60 827 | E27 | 2025-01-20",
            "mains",
            luminous_flux_lm="806",
            power_w="8.5",
            cct_k="2700",
            ra="80",
            displacement_factor="0.90",
            pst_lm="1.0",
            svm="0.4",
            l70b50_h="15000",
            energy_class="F",
            survival_factor="0.90",
            lumen_maintenance_factor="0.94",
            colour_consistency_sdcm="6",
            equivalent_power_w="60",
            unit_price="1.15",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-013",
            report_date="2026-01-29",
            lot="lamps",
            report_model="Basic A60 827",
        ),
        units=5,
        flux_lm=797.0,
        power_w=8.52,
        colour=(0.4625, 0.4190),
        components=(Emitter(452.0), Phosphor(545.0, 115.0), Phosphor(612.0, 82.0)),
        driver=Corrected(12.0, (31.0, 17.0, 9.0, 6.0, 4.0, 2.5)),
        modulation=Modulation(ripple=(0.37, 0.06, 0.02)),
        records=Records(short_units=5, long_s=60),
        ageing=Ageing(l70_h=17500.0, failures={7: 2500}),
        reported={"cct_k": (2730.0, 12.0, 0), "ra": (82.9, 0.3, 1), "r9": (5.0, 0.7, 0)},
    ),
    # Poor power factor: a capacitive dropper; ripple-control signals shine through as well.
    Lamp(
        number=4,
        lamp_id="corvath-a65-840",
        declared=_declared(
            "Corvath Lamps | Basic A65 840 | E27 | 2025-02-10",
            "mains",
            luminous_flux_lm="1055",
            power_w="10.5",
            cct_k="4000",
            ra="80",
            displacement_factor="0.70",
            pst_lm="1.0",
            svm="0.3",
            l70b50_h="15000",
            energy_class="F",
            survival_factor="0.90",
            lumen_maintenance_factor="0.94",
            colour_consistency_sdcm="6",
            equivalent_power_w="75",
            unit_price="1.60",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-014",
            report_date="2026-01-29",
            lot="lamps",
            report_model="Basic A65 840",
        ),
        units=5,
        flux_lm=1041.0,
        power_w=10.6,
        colour=(0.3790, 0.3805),
        components=(Emitter(451.0), Phosphor(548.0, 116.0), Phosphor(613.0, 85.0)),
        driver=Corrected(54.5, (21.0, 9.0, 5.0, 3.0)),
        modulation=Modulation(ripple=(0.055, 0.01), hunting_hz=8.6, hunting=0.0061),
        records=Records(short_units=3, long_s=180),
        ageing=Ageing(l70_h=16800.0),
    ),
    # Good Ra, negative R9: an orange instead of a red phosphor.
    Lamp(
        number=5,
        lamp_id="ostrelle-a60-840",
        declared=_declared(
            "Ostrelle Light Works | Clara A60 840 | E27 | 2025-04-02",
            "mains",
            luminous_flux_lm="806",
            power_w="6.7",
            cct_k="4000",
            ra="81",
            r9="0",
            displacement_factor="0.95",
            pst_lm="0.2",
            svm="0.2",
            l70b50_h="25000",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            equivalent_power_w="60",
            unit_price="2.95",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-015",
            report_date="2026-02-03",
            lot="lamps",
            report_model="Clara A60 840",
        ),
        units=4,
        flux_lm=811.0,
        power_w=6.72,
        colour=(0.3812, 0.3797),
        components=(Emitter(452.0), Phosphor(530.0, 105.0), Phosphor(600.5, 80.0)),
        spectrum_step_nm=1,
        driver=Corrected(14.0, (16.0, 9.0, 5.0, 3.0)),
        modulation=Modulation(ripple=(0.032, 0.006)),
        records=Records(short_units=4, long_s=60),
        ageing=Ageing(l70_h=33000.0),
    ),
    # The greenest tube is the most efficient one: white far above the Planckian locus.
    Lamp(
        number=6,
        lamp_id="ostrelle-t8-840",
        declared=_declared(
            "Ostrelle Light Works | Clara Tube 1500 840 | G13 | 2025-04-02",
            "mains",
            luminous_flux_lm="2900",
            power_w="19.8",
            cct_k="4000",
            ra="80",
            r9="0",
            displacement_factor="0.95",
            pst_lm="0.2",
            svm="0.1",
            l70b50_h="50000",
            energy_class="D",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            unit_price="7.80",
            currency="EUR",
            quantity="900",
            report_no="TPL-26-016",
            report_date="2026-02-03",
            lot="tubes",
            report_model="Clara Tube 1500 840",
        ),
        units=3,
        flux_lm=2925.0,
        power_w=19.7,
        colour=(0.3832, 0.4046),
        components=(Emitter(452.0), Phosphor(545.0, 115.0), Phosphor(614.0, 85.0)),
        driver=Corrected(10.0, (8.0, 4.0, 3.0, 1.5)),
        modulation=Modulation(ripple=(0.02, 0.004)),
        records=Records(short_units=3),
    ),
    # A wide flood exactly on a class boundary: 550 lm x 1.176 / 5.88 W = 110 lm/W. The centre of
    # its beam is far weaker than declared.
    Lamp(
        number=7,
        lamp_id="ostrelle-par30-830",
        declared=_declared(
            "Ostrelle Light Works | Clara Flood PAR30 100D | E27 | 2025-06-16",
            "directional mains",
            luminous_flux_lm="550",
            power_w="5.88",
            cct_k="3000",
            ra="82",
            r9="10",
            displacement_factor="0.90",
            pst_lm="0.2",
            svm="0.2",
            l70b50_h="25000",
            beam_angle_deg="100",
            peak_intensity_cd="420",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            unit_price="6.90",
            currency="EUR",
            quantity="120",
            report_no="TPL-26-017",
            report_date="2026-02-11",
            lot="spots",
            report_model="Clara Flood PAR30 100D",
        ),
        units=3,
        flux_lm=671.0,
        power_w=5.87,
        colour=(0.4392, 0.4038),
        components=(Emitter(454.0), Phosphor(548.0, 116.0), Phosphor(615.0, 85.0)),
        driver=Corrected(18.0, (20.0, 11.0, 6.0)),
        modulation=Modulation(ripple=(0.026, 0.005)),
        records=Records(short_units=3),
        beam=Beam(99.0, flatness=2.6, spill=0.02, c_step_deg=90.0, gamma_step_deg=5.0),
    ),
    # Overstated flux: ten units, and their mean is a fifth short of the printed figure.
    Lamp(
        number=8,
        lamp_id="pemmerick-a60-840",
        declared=_declared(
            "Pemmerick & Daughters | Longacre A60 840 | E27 | 2025-02-24",
            "mains",
            luminous_flux_lm="1055",
            power_w="9.5",
            cct_k="4000",
            ra="80",
            r9="10",
            displacement_factor="0.90",
            pst_lm="0.2",
            svm="0.3",
            l70b50_h="25000",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="6",
            equivalent_power_w="75",
            unit_price="1.95",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-018",
            report_date="2026-02-11",
            lot="lamps",
            report_model="Longacre A60 840",
        ),
        units=10,
        flux_lm=862.0,
        power_w=9.55,
        colour=(0.3808, 0.3812),
        components=(Emitter(451.0), Phosphor(548.0, 116.0), Phosphor(615.0, 85.0)),
        driver=Rectifier(64.0, 10.0),
        modulation=Modulation(ripple=(0.062, 0.012)),
        records=Records(short_units=3, long_s=60),
        ageing=Ageing(l70_h=29500.0),
        flux_spread=0.014,
    ),
    # A claim beyond physics: 1521 lm from 4.2 W is more than its own spectrum allows per watt of
    # light. The figure is the power of one of three LED strings.
    Lamp(
        number=9,
        lamp_id="pemmerick-a67-ultra",
        declared=_declared(
            "Pemmerick & Daughters | Longacre Ultra A67 | E27 | 2025-09-01",
            "mains",
            luminous_flux_lm="1521",
            power_w="4.2",
            cct_k="4000",
            ra="80",
            displacement_factor="0.90",
            pst_lm="0.1",
            svm="0.1",
            l70b50_h="50000",
            energy_class="A",
            survival_factor="1.00",
            lumen_maintenance_factor="0.97",
            colour_consistency_sdcm="5",
            equivalent_power_w="100",
            unit_price="9.90",
            currency="EUR",
            quantity="400",
            report_no="TPL-26-019",
            report_date="2026-02-11",
            lot="lamps",
            report_model="Longacre A67 840",
        ),
        units=4,
        flux_lm=1498.0,
        power_w=12.1,
        colour=(0.3795, 0.3788),
        components=(Emitter(451.0), Phosphor(548.0, 116.0), Phosphor(614.0, 85.0)),
        spectrum_step_nm=1,
        dark_noise=4e-5,
        driver=Corrected(11.0, (12.0, 7.0, 4.0, 2.0)),
        modulation=Modulation(ripple=(0.016, 0.003)),
        records=Records(short_units=4),
        reported={"cct_k": (4030.0, 15.0, 0), "ra": (82.0, 0.3, 1)},
    ),
    # Ages too fast: bright on day one, ninety percent after 3000 h, two of ten dark.
    Lamp(
        number=10,
        lamp_id="quillmoor-a60-830",
        declared=_declared(
            "Quillmoor Electric | Hearth A60 830 | E27 | 2025-03-03",
            "mains",
            luminous_flux_lm="806",
            power_w="7.3",
            cct_k="3000",
            ra="82",
            r9="10",
            displacement_factor="0.85",
            pst_lm="0.2",
            svm="0.2",
            l70b50_h="25000",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            equivalent_power_w="60",
            unit_price="2.20",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-020",
            report_date="2026-02-13",
            lot="lamps",
            report_model="Hearth A60 830",
        ),
        units=10,
        flux_lm=829.0,
        power_w=7.28,
        colour=(0.4405, 0.4045),
        components=(Emitter(454.0), Phosphor(548.0, 116.0), Phosphor(614.0, 85.0)),
        driver=Rectifier(58.0, 9.0),
        modulation=Modulation(ripple=(0.035, 0.008)),
        records=Records(short_units=3, long_s=60),
        ageing=Ageing(
            l70_h=10400.0,
            hours_h=TO_6000_H,
            drift_x=-0.0006,
            drift_y=-0.0011,
            failures={3: 2000, 8: 3000},
        ),
    ),
    # Missing measurements: flux, power and two ready-made colour figures, nothing else.
    Lamp(
        number=11,
        lamp_id="quillmoor-gu10-827",
        declared=_declared(
            "Quillmoor Electric | Hearth Spot 827 60D | GU10 | 2025-03-03",
            "directional mains",
            luminous_flux_lm="345",
            power_w="4.5",
            cct_k="2700",
            ra="80",
            l70b50_h="15000",
            beam_angle_deg="60",
            energy_class="F",
            colour_consistency_sdcm="6",
            unit_price="1.80",
            currency="EUR",
            quantity="300",
            report_no="",
            report_date="",
            lot="spots",
        ),
        units=3,
        flux_lm=402.0,
        power_w=4.55,
        colour=(0.4610, 0.4150),
        components=(),
        driver=Corrected(15.0, (20.0,)),
        records=Records(short_units=0, mains=False),
        reported={"cct_k": (2725.0, 15.0, 0), "ra": (82.0, 0.4, 1)},
    ),
    # Connected: everything in order but the power it takes while it waits for the network.
    Lamp(
        number=12,
        lamp_id="brantivar-a60-link",
        declared=_declared(
            "Brantivar | Signal A60 827 Link | E27 | 2025-07-07",
            "mains connected",
            luminous_flux_lm="806",
            power_w="7.2",
            standby_power_w="0.50",
            networked_standby_power_w="0.50",
            cct_k="2700",
            ra="85",
            r9="15",
            displacement_factor="0.85",
            pst_lm="0.2",
            svm="0.2",
            l70b50_h="25000",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            equivalent_power_w="60",
            unit_price="11.50",
            currency="EUR",
            quantity="200",
            report_no="TPL-26-021",
            report_date="2026-02-16",
            lot="lamps",
            report_model="Signal A60 827 Link",
        ),
        units=4,
        flux_lm=815.0,
        power_w=7.22,
        colour=(0.4622, 0.4182),
        components=(Emitter(452.0), Phosphor(545.0, 115.0), Phosphor(615.0, 82.0)),
        driver=Corrected(20.0, (18.0, 10.0, 6.0, 4.0)),
        modulation=Modulation(ripple=(0.022, 0.005)),
        records=Records(short_units=4, long_s=60),
        standby_w=0.42,
        networked_standby_w=0.71,
    ),
    # Pulse-width modulation above the reach of SVM: lawful, yet the light is off half the time.
    Lamp(
        number=13,
        lamp_id="brantivar-a60-dim",
        declared=_declared(
            "Brantivar | Signal A60 840 Dim | E27 | 2025-07-07",
            "mains",
            luminous_flux_lm="1055",
            power_w="9.4",
            cct_k="4000",
            ra="85",
            r9="25",
            displacement_factor="0.90",
            pst_lm="0.1",
            svm="0.1",
            l70b50_h="25000",
            energy_class="E",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            equivalent_power_w="75",
            unit_price="4.70",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-022",
            report_date="2026-02-16",
            lot="lamps",
        ),
        units=3,
        flux_lm=1063.0,
        power_w=9.38,
        colour=(0.3797, 0.3808),
        components=(Emitter(455.0), Phosphor(545.0, 115.0), Phosphor(621.0, 86.0)),
        driver=Corrected(9.0, (11.0, 6.0, 4.0, 2.0)),
        modulation=Modulation(ripple=(0.004,), pulse_hz=4000.0, duty=0.5),
        records=Records(short_units=3, long_s=60),
    ),
    # For a separate control gear, 12 V: no mains clauses, its own energy factor.
    Lamp(
        number=14,
        lamp_id="brantivar-ar111-930",
        declared=_declared(
            "Brantivar | Signal AR111 930 24D | G53 | 2025-08-18",
            "directional",
            luminous_flux_lm="800",
            power_w="10.0",
            cct_k="3000",
            ra="90",
            r9="50",
            l70b50_h="40000",
            beam_angle_deg="24",
            peak_intensity_cd="3800",
            energy_class="F",
            survival_factor="1.00",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="4",
            unit_price="14.20",
            currency="EUR",
            quantity="80",
            report_no="TPL-26-023",
            report_date="2026-02-18",
            lot="spots",
            report_model="Signal AR111 930 24D",
        ),
        units=4,
        flux_lm=872.0,
        power_w=9.92,
        colour=(0.4388, 0.4028),
        components=(Emitter(452.0), Phosphor(560.0, 122.0), ManganeseLines()),
        spectrum_step_nm=1,
        modulation=Modulation(ripple=(0.002,)),
        records=Records(short_units=2, mains=False),
        beam=Beam(24.5, flatness=2.0, spill=0.006),
        ageing=Ageing(l70_h=52000.0, units=4),
    ),
    # Exactly on the limits: whatever may be declared at the limit is declared at the limit.
    Lamp(
        number=15,
        lamp_id="sundrel-a60-limit",
        declared=_declared(
            "Sundrel | Ledger A60 840 | E27 | 2025-01-07",
            "mains",
            luminous_flux_lm="806",
            power_w="8.874",
            standby_power_w="0.50",
            cct_k="4000",
            ra="80",
            r9="5",
            displacement_factor="0.50",
            pst_lm="1.0",
            svm="0.4",
            l70b50_h="15000",
            energy_class="F",
            survival_factor="0.90",
            lumen_maintenance_factor="0.93",
            colour_consistency_sdcm="6",
            equivalent_power_w="60",
            unit_price="1.35",
            currency="EUR",
            quantity="1200",
            report_no="TPL-26-024",
            report_date="2026-02-19",
            lot="lamps",
            report_model="Ledger A60 840",
        ),
        units=10,
        flux_lm=804.0,
        power_w=8.88,
        colour=(0.3800, 0.3810),
        components=(Emitter(451.0), Phosphor(548.0, 116.0), Phosphor(610.0, 85.0)),
        driver=Corrected(59.4, (19.0, 8.0, 4.0)),
        modulation=Modulation(ripple=(0.101, 0.012)),
        records=Records(short_units=4, long_s=60),
        ageing=Ageing(l70_h=15350.0, failures={5: 1500}),
        standby_w=0.498,
    ),
    # Placed on the market while SVM 0.9 was the limit; the same light would fail today's 0.4.
    Lamp(
        number=16,
        lamp_id="sundrel-t8-840",
        declared=_declared(
            "Sundrel | Ledger Tube 1500 840 | G13 | 2023-11-20",
            "mains",
            luminous_flux_lm="2500",
            power_w="18.0",
            cct_k="4000",
            ra="83",
            r9="10",
            displacement_factor="0.92",
            pst_lm="0.3",
            svm="0.8",
            l70b50_h="30000",
            energy_class="D",
            survival_factor="0.90",
            lumen_maintenance_factor="0.96",
            colour_consistency_sdcm="5",
            unit_price="5.20",
            currency="EUR",
            quantity="900",
            report_no="TPL-26-025",
            report_date="2026-02-20",
            lot="tubes",
            report_model="Ledger Tube 1500 840",
            report_laboratory="Lowmarsh Test House (invented)",
        ),
        units=5,
        flux_lm=2512.0,
        power_w=17.95,
        colour=(0.3794, 0.3790),
        components=(Emitter(450.0), Phosphor(546.0, 116.0), Phosphor(617.0, 85.0)),
        driver=Corrected(8.0, (13.0, 7.0, 5.0, 3.0)),
        modulation=Modulation(ripple=(0.178, 0.03, 0.008)),
        records=Records(short_units=5, long_s=60),
        ageing=Ageing(l70_h=36500.0, hours_h=TO_6000_H, units=10),
        reported={"cct_k": (4035.0, 15.0, 0)},
    ),
    # Old stock, the lamp that hangs in the schools now: 1411 lm / 16.6 W is exactly 85 lm/W, and
    # it was placed on the market before the limits applied.
    Lamp(
        number=17,
        lamp_id="sundrel-a70-stock",
        declared=_declared(
            "Sundrel | Ledger A70 830 | E27 | 2021-06-14",
            "mains",
            luminous_flux_lm="1411",
            power_w="16.6",
            cct_k="3000",
            ra="80",
            l70b50_h="15000",
            energy_class="F",
            colour_consistency_sdcm="6",
            equivalent_power_w="94",
            unit_price="2.10",
            currency="EUR",
            quantity="600",
            report_no="TPL-26-026",
            report_date="2026-02-20",
        ),
        units=3,
        flux_lm=1406.0,
        power_w=16.63,
        colour=(0.4395, 0.4040),
        components=(Emitter(455.0), Phosphor(548.0, 116.0), Phosphor(611.0, 85.0)),
        driver=Rectifier(52.0, 12.0),
        modulation=Modulation(ripple=(0.05, 0.01)),
        records=Records(short_units=3),
    ),
)
