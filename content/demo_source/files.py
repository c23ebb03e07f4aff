"""The files of the campaign: every one of them as path and bytes."""

from __future__ import annotations

import gzip
import io
from collections.abc import Iterator, Mapping, Sequence

import numpy as np
from numpy.typing import NDArray

from demo_source.lamps import LAMPS, Lamp
from demo_source.light import record
from demo_source.noise import normal
from demo_source.remarks import REMARKS
from demo_source.samples import Sample, samples, spectrum, unit_row
from demo_source.settings import CAMPAIGN_TOML

__all__ = ["campaign_files"]

Array = NDArray[np.float64]

LAMP_HEADING = (
    "lamp_id,bidder,model,cap,technology,directional,mains,connected,colour_tuneable,"
    "high_luminance,placed_on_market,declared_luminous_flux_lm,declared_power_w,"
    "declared_standby_power_w,declared_networked_standby_power_w,declared_cct_k,declared_ra,"
    "declared_r9,declared_displacement_factor,declared_pst_lm,declared_svm,declared_l70b50_h,"
    "declared_beam_angle_deg,declared_peak_intensity_cd,declared_energy_class,"
    "declared_survival_factor,declared_lumen_maintenance_factor,"
    "declared_colour_consistency_sdcm,declared_equivalent_power_w,"
    "lot,unit_price,currency,quantity,report_no,report_date,report_model,report_laboratory,"
    "report_accreditation"
)

UNIT_HEADING = (
    "unit_id,lamp_id,luminous_flux_lm,u_luminous_flux_lm,power_w,u_power_w,voltage_v,current_a,"
    "frequency_hz,power_factor,displacement_factor,thd_current_percent,standby_power_w,"
    "u_standby_power_w,networked_standby_power_w,useful_luminous_flux_lm,beam_angle_deg,"
    "peak_intensity_cd,ambient_temperature_c,cct_k,ra,r9,percent_flicker,flicker_index,svm"
)

ENDURANCE_HEADING = "lamp_id,unit_id,hours_h,luminous_flux_lm,operational,x,y"

SHORT_RATE_HZ, SHORT_S = 20000.0, 1
LONG_RATE_HZ = 2000.0
MAINS_RATE_HZ, MAINS_CYCLES = 10000.0, 10
DETECTOR_V = 4.2


def campaign_files() -> Iterator[tuple[str, bytes]]:
    """Give every file of the campaign.

    Returns
    -------
    Iterator of (str, bytes)
        Path inside the campaign folder, and content.
    """
    found = {lamp.lamp_id: samples(lamp) for lamp in LAMPS}
    yield "campaign.toml", CAMPAIGN_TOML.encode()
    yield "lamps.csv", _table(LAMP_HEADING, [{"lamp_id": i.lamp_id, **i.declared} for i in LAMPS])
    yield "units.csv", _table(UNIT_HEADING, [row for i in LAMPS for row in _units(i, found)])
    yield (
        "endurance.csv",
        _table(ENDURANCE_HEADING, [row for i in LAMPS for row in _endurance(i, found[i.lamp_id])]),
    )
    for name, text in REMARKS.items():
        yield f"notes/{name}.md", text.encode()
    for lamp in LAMPS:
        sample = [unit for unit in found[lamp.lamp_id] if not unit.aged_only]
        yield from _spectra(lamp, sample)
        yield from _light(lamp, sample)
        yield from _mains(lamp, sample)
        yield from _intensity(lamp, sample)


def _units(lamp: Lamp, found: Mapping[str, Sequence[Sample]]) -> Iterator[dict[str, str]]:
    for index, sample in enumerate(found[lamp.lamp_id]):
        if not sample.aged_only:
            yield unit_row(lamp, index, sample)


def _endurance(lamp: Lamp, units: Sequence[Sample]) -> Iterator[dict[str, str]]:
    ageing = lamp.ageing
    if ageing is None:
        return
    for index, unit in enumerate(units[: ageing.units]):
        noise = normal(lamp.number, 400 + index, count=1 + 3 * len(ageing.hours_h))
        reading = noise[1:].reshape(3, -1)
        left = ageing.maintenance(1.0 + 0.04 * np.clip(noise[0], -2.0, 2.0), 0.001 * reading[0])
        for step, hours_h in enumerate(ageing.hours_h):
            row = {"lamp_id": lamp.lamp_id, "unit_id": unit.unit_id, "hours_h": f"{hours_h}"}
            dark = hours_h >= ageing.failures.get(index, ageing.hours_h[-1] + 1)
            row["operational"] = "no" if dark else "yes"
            if not dark:
                x = unit.x + ageing.drift_x * hours_h / 1000.0 + 0.00005 * reading[1, step]
                y = unit.y + ageing.drift_y * hours_h / 1000.0 + 0.00005 * reading[2, step]
                row["luminous_flux_lm"] = f"{unit.measured_flux_lm * left[step]:.1f}"
                row["x"], row["y"] = f"{x:.4f}", f"{y:.4f}"
            yield row


def _spectra(lamp: Lamp, units: Sequence[Sample]) -> Iterator[tuple[str, bytes]]:
    if not lamp.components:
        return
    read = [spectrum(lamp, index, unit) for index, unit in enumerate(units)]
    lines = [",".join(["wavelength_nm", *(unit.unit_id for unit in units)])]
    values = np.stack([flux for _, flux in read], axis=1)
    for wavelength_nm, row in zip(read[0][0], values, strict=True):
        lines.append(",".join([f"{wavelength_nm:.0f}", *(f"{value:.4e}" for value in row)]))
    yield f"spectra/{lamp.lamp_id}.csv", _lines(lines)


def _light(lamp: Lamp, units: Sequence[Sample]) -> Iterator[tuple[str, bytes]]:
    path = f"light/{lamp.lamp_id}"
    short = units[: lamp.records.short_units]
    if short:
        yield f"{path}.csv.gz", _record(lamp, short, SHORT_RATE_HZ, SHORT_S, "%.5f", 500)
    if lamp.records.long_s:
        seconds = lamp.records.long_s
        yield f"{path}.long.csv.gz", _record(lamp, units[:1], LONG_RATE_HZ, seconds, "%.4f", 520)


def _record(
    lamp: Lamp, units: Sequence[Sample], rate_hz: float, seconds: int, clock: str, purpose: int
) -> bytes:
    count = round(rate_hz * seconds)
    noise = [normal(lamp.number, purpose + i, count=count) for i in range(len(units))]
    start_s = 0.01 * normal(lamp.number, purpose + 90, count=len(units))
    strength = np.array([unit.strength for unit in units])
    light = record(
        lamp.modulation, rate_hz, start_s, strength, 0.0002 * np.stack(noise, axis=1), DETECTOR_V
    )
    head = ",".join(["time_s", *(unit.unit_id for unit in units)])
    row = ",".join([clock, *["%.3f"] * len(units)])
    return _gzip(head, row, np.column_stack([np.arange(count) / rate_hz, light]))


def _mains(lamp: Lamp, units: Sequence[Sample]) -> Iterator[tuple[str, bytes]]:
    for index, unit in enumerate(units):
        if unit.mains is None or not lamp.records.mains:
            continue
        start_rad = float(normal(lamp.number, 600 + index, count=1)[0])
        time_s, voltage_v, current_a = unit.mains.samples(MAINS_RATE_HZ, MAINS_CYCLES, start_rad)
        noise = normal(lamp.number, 620 + index, count=2 * time_s.size).reshape(2, -1)
        columns = [
            time_s,
            voltage_v + 0.05 * noise[0],
            current_a + 0.002 * unit.mains.current_a * noise[1],
        ]
        data = _gzip("time_s,voltage_v,current_a", "%.4f,%.1f,%.5f", np.column_stack(columns))
        yield f"mains/{unit.unit_id}.csv.gz", data


def _intensity(lamp: Lamp, units: Sequence[Sample]) -> Iterator[tuple[str, bytes]]:
    if lamp.beam is None:
        return
    c_deg, gamma_deg = lamp.beam.grid()
    relative = lamp.beam.relative(c_deg, gamma_deg)
    for index, unit in enumerate(units):
        noise = normal(lamp.number, 700 + index, count=relative.size).reshape(relative.shape)
        centre_cd = unit.flux_lm / lamp.beam.flux_per_candela()
        intensity = centre_cd * relative * (1.0 + 0.002 * noise)
        intensity[:, 0] = intensity[0, 0]
        lines = ["c_deg,gamma_deg,intensity_cd"]
        for c, row in zip(c_deg, intensity, strict=True):
            lines += [f"{c:g},{g:g},{cd:.2f}" for g, cd in zip(gamma_deg, row, strict=True)]
        yield f"intensity/{unit.unit_id}.csv", _lines(lines)


def _table(heading: str, rows: Sequence[Mapping[str, str]]) -> bytes:
    columns = heading.split(",")
    for row in rows:
        if not row.keys() <= set(columns):
            raise KeyError(f"no such columns: {sorted(row.keys() - set(columns))}")
    body = [",".join(row.get(column, "") for column in columns) for row in rows]
    return _lines([heading, *body])


def _lines(lines: Sequence[str]) -> bytes:
    return ("\n".join(lines) + "\n").encode()


def _gzip(head: str, row: str, values: Array) -> bytes:
    """Columns of numbers as compressed CSV, without the date and name of a file."""
    text = head + "\n" + (row + "\n") * values.shape[0] % tuple(values.ravel().tolist())
    packed = io.BytesIO()
    with gzip.GzipFile(filename="", mode="wb", compresslevel=6, fileobj=packed, mtime=0) as file:
        file.write(text.encode())
    return packed.getvalue()
