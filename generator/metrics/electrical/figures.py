"""All mains figures of a batch of captures."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say
from generator.metrics.electrical.current_conduction import (
    CurrentConduction,
    current_conduction,
)
from generator.metrics.electrical.mains_frequency import mains_frequency
from generator.metrics.electrical.mains_quantities import (
    HIGHEST_ORDER,
    MainsQuantities,
    mains_quantities,
)
from generator.metrics.withheld import withheld
from generator.records.figure import SeriesFigures

__all__ = ["LEAST_CURRENT_A", "METHODS", "mains_figures"]

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Given = dict[str, tuple[Array, tuple[str, ...]]]

LEAST_CURRENT_A = 1e-3
"""Current fundamental below which ratios of the current are noise and are withheld [A]."""

_ORDERS = range(2, HIGHEST_ORDER + 1)
_DIRECT_PERCENT = 1.0  # of the fundamental, from which the remark is made
_EVEN_PERCENT = 1.0
_REVERSED_SHARE = -0.05  # power factor above which a negative power is no sign of a reversal
_LARGEST = 1e100  # beyond, products of voltage and current do not fit a number

METHODS = {
    "frequency_hz": "mains_voltage_fundamental",
    **dict.fromkeys(
        (
            "voltage_v",
            "current_a",
            "power_w",
            "apparent_power_va",
            "power_factor",
            "displacement_factor",
            "crest_factor",
            "dc_current_percent",
        ),
        "mains_whole_cycles",
    ),
    **dict.fromkeys(
        ("current_start_deg", "current_last_peak_deg", "current_end_deg"),
        "current_conduction_iec_61000_3_2",
    ),
    "thd_current_percent": "thd_orders_2_to_40_whole_cycles",
    "thd_current_all_percent": "thd_all_orders_whole_cycles",
    **{f"h{order}_percent": "harmonics_whole_cycles" for order in _ORDERS},
    **{f"h{order}_ma_per_w": "harmonics_whole_cycles" for order in _ORDERS},
}
"""Quantity name -> method id."""

_NO_MAINS = say("no mains voltage of two whole cycles between 40 Hz and 70 Hz was found")
_GAPS = say("the mains capture has gaps, or values too large for a number")
_SLOW = say("sampled too slowly: the order lies above half the sampling rate")
_REVERSED = say("the current clamp appears reversed: the active power is negative")
_NEAR_REACTIVE = say(
    "the active power is negative, yet too small to tell from purely reactive power"
)
_AGAINST = say("the current does not flow with the voltage")
_NO_CURRENT = say(
    "the current fundamental is below {least} mA", least=numeral(f"{1000 * LEAST_CURRENT_A:g}")
)
_DIRECT = say("direct current: {share} % of the fundamental")
_EVEN = say("even harmonics: order {order} reaches {share} % of the fundamental")


def mains_figures(voltage_v: Array, current_a: Array, sampling_rate_hz: float) -> SeriesFigures:
    """All mains figures of a batch of captures, over whole cycles.

    Direct component and harmonics are percentages of the current fundamental.

    Parameters
    ----------
    voltage_v, current_a
        Voltage [V] and current [A], sampled together and evenly (series, samples).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    SeriesFigures
        The measured mains figures of the groups ``electrical`` and ``harmonics`` of the
        catalogue, with reasons, methods and remarks.

    Raises
    ------
    ValueError
        If voltage and current are no tables of the same shape or the sampling rate is not
        above zero.
    """
    if voltage_v.ndim != 2 or voltage_v.shape != current_a.shape or not sampling_rate_hz > 0:
        raise ValueError(
            "expected voltage and current as (series, samples) and a sampling rate above zero, "
            f"got shapes {voltage_v.shape} and {current_a.shape} at {sampling_rate_hz} Hz"
        )
    gaps: Flags = ~np.all((np.abs(voltage_v) < _LARGEST) & (np.abs(current_a) < _LARGEST), axis=1)
    voltage = np.where(gaps[:, None], 0.0, voltage_v)
    current = np.where(gaps[:, None], 0.0, current_a)
    frequency = mains_frequency(voltage, sampling_rate_hz)
    lost = np.isnan(frequency)
    stand_in = np.where(lost, sampling_rate_hz / 10, frequency)
    quantities = mains_quantities(voltage, current, sampling_rate_hz, stand_in)
    conduction = current_conduction(voltage, current, sampling_rate_hz, stand_in)
    given = _figures(quantities, conduction, np.where(gaps | lost, np.nan, frequency), gaps)
    return SeriesFigures(
        values={name: given[name][0] for name in METHODS},
        reasons={name: given[name][1] for name in METHODS},
        methods=METHODS,
        remarks=_remarks(quantities, ~(gaps | lost)),
    )


def _figures(
    found: MainsQuantities, conduction: CurrentConduction, frequency: Array, gaps: Flags
) -> Given:
    absent = ((gaps, _GAPS), (np.isnan(frequency), _NO_MAINS))
    idle = (found.harmonic_current_a[:, 0] < LEAST_CURRENT_A, _NO_CURRENT)
    backwards = (
        (idle[0] & (found.power_w < 0), _NO_CURRENT),
        (_reversed(found), _REVERSED),
        (found.power_w < 0, _NEAR_REACTIVE),
    )
    slow = (np.isnan(found.harmonic_current_a[:, -1]), _SLOW)
    one, power, apparent, effective = (
        np.where(values > 0, values, np.nan)
        for values in (
            found.harmonic_current_a[:, 0],
            found.power_w,
            found.apparent_power_va,
            found.current_a,
        )
    )
    figures = {
        "frequency_hz": withheld(frequency, *absent),
        "voltage_v": withheld(found.voltage_v, *absent),
        "current_a": withheld(found.current_a, *absent),
        "apparent_power_va": withheld(found.apparent_power_va, *absent),
        "power_w": withheld(found.power_w, *absent, *backwards),
        "power_factor": withheld(found.power_w / apparent, *absent, idle, *backwards),
        "displacement_factor": withheld(np.cos(found.phase_angle_rad), *absent, idle, *backwards),
        "thd_current_percent": withheld(100 * found.thd_current, *absent, idle, slow),
        "thd_current_all_percent": withheld(100 * found.thd_current_all, *absent, idle, slow),
        "crest_factor": withheld(found.peak_current_a / effective, *absent, idle),
        "dc_current_percent": withheld(100 * np.abs(found.direct_current_a) / one, *absent, idle),
    }
    against = (np.isnan(conduction.start_deg), _AGAINST)
    for name, angle in (
        ("current_start_deg", conduction.start_deg),
        ("current_last_peak_deg", conduction.last_peak_deg),
        ("current_end_deg", conduction.end_deg),
    ):
        figures[name] = withheld(angle, *absent, idle, *backwards, slow, against)
    for order in _ORDERS:
        harmonic = found.harmonic_current_a[:, order - 1]
        rules = (*absent, idle, (np.isnan(harmonic), _SLOW))
        figures[f"h{order}_percent"] = withheld(100 * harmonic / one, *rules)
        figures[f"h{order}_ma_per_w"] = withheld(1000 * harmonic / power, *rules, *backwards)
    return figures


def _reversed(found: MainsQuantities) -> Flags:
    """Whether so much power flows back that the clamp must be the wrong way round (series,)."""
    return np.asarray(found.power_w < _REVERSED_SHARE * found.apparent_power_va, dtype=np.bool_)


def _remarks(found: MainsQuantities, usable: Flags) -> tuple[tuple[str, ...], ...]:
    fundamental = found.harmonic_current_a[:, 0]
    busy = usable & (fundamental >= LEAST_CURRENT_A)
    share = 100 / np.where(busy, fundamental, np.nan)
    direct = np.abs(found.direct_current_a) * share
    even = np.nan_to_num(found.harmonic_current_a[:, 1::2])
    largest = np.argmax(even, axis=1)
    even_share = even.max(axis=1) * share
    backwards = _reversed(found)
    remarks = []
    for series in range(usable.size):
        texts: list[str] = []
        if busy[series] and found.power_w[series] < 0:
            texts.append(_REVERSED if backwards[series] else _NEAR_REACTIVE)
        if direct[series] >= _DIRECT_PERCENT:
            texts.append(_DIRECT.format(share=numeral(f"{direct[series]:.1f}")))
        if even_share[series] >= _EVEN_PERCENT:
            texts.append(
                _EVEN.format(
                    order=numeral(f"{2 * largest[series] + 2}"),
                    share=numeral(f"{even_share[series]:.1f}"),
                )
            )
        if usable[series] and not busy[series]:
            texts.append(_NO_CURRENT)
        remarks.append(tuple(texts))
    return tuple(remarks)
