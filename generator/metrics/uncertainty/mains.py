"""Uncertainty of mains figures, from that of voltage and current and the delay between them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.records.figure import SeriesFigures

__all__ = ["MainsInputs", "mains_uncertainty"]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True, eq=False)
class MainsInputs:
    """Expanded uncertainties (k = 2) stated for mains captures.

    Parameters
    ----------
    voltage
        Gain of the voltage channel, relative (series,); not-a-number where not stated.
    current
        Gain of the current channel, relative (series,); not-a-number where not stated.
    current_floor_a
        Part of the uncertainty of the current that does not shrink with it [A] (series,).
    power
        Active power, relative (series,), where it is stated for itself; else not-a-number.
    skew_us
        Delay of the current channel against the voltage channel [µs]; ``None`` if not stated.
    time_base_percent
        Error of the sampling rate [percent]; ``None`` if not stated.
    """

    voltage: Array
    current: Array
    current_floor_a: Array
    power: Array
    skew_us: float | None = None
    time_base_percent: float | None = None


def mains_uncertainty(found: SeriesFigures, inputs: MainsInputs) -> Mapping[str, Array]:
    """Expanded uncertainty of the figures of mains captures.

    Parameters
    ----------
    found
        The figures of the captures.
    inputs
        What is stated.

    Returns
    -------
    Mapping
        Quantity name -> expanded uncertainty (k = 2) (series,); not-a-number where what it
        rests on is not stated. The gains cancel in power factor and displacement factor, which
        rest on the delay alone. Ratios of two currents (harmonics, distortion, crest factor)
        take the currents as independently uncertain: an upper bound, as a common gain cancels.

    Notes
    -----
    Source: jcgm_100, equations 10 and 12; jcgm_101, 9.4 (a cosine near its maximum).
    """
    values = found.values
    known = {
        "voltage_v": inputs.voltage * values["voltage_v"],
        "current_a": _of_current(values["current_a"], inputs),
    }
    relative_current = known["current_a"] / _above_zero(values["current_a"])
    known["apparent_power_va"] = values["apparent_power_va"] * np.hypot(
        inputs.voltage, relative_current
    )
    if inputs.time_base_percent is not None:
        known["frequency_hz"] = values["frequency_hz"] * inputs.time_base_percent / 100
    known |= _power(values, known, inputs)
    known |= _current_ratios(values, relative_current, known.get("power_w"), inputs)
    return {
        name: np.where(np.isfinite(values[name]), expanded, np.nan)
        for name, expanded in known.items()
    }


def _above_zero(values: Array) -> Array:
    """What may be divided by; not-a-number elsewhere."""
    return np.where(values > 0, values, np.nan)


def _of_current(current_a: Array, inputs: MainsInputs) -> Array:
    """Expanded uncertainty of a current of any order [A]."""
    return np.asarray(np.hypot(inputs.current * current_a, inputs.current_floor_a))


def _power(
    values: Mapping[str, Array], known: Mapping[str, Array], inputs: MainsInputs
) -> dict[str, Array]:
    """Power and its factors: the gains, and the delay at the fundamental."""
    if inputs.skew_us is None:
        return {"power_w": inputs.power * values["power_w"]}
    cosine, apparent = values["displacement_factor"], values["apparent_power_va"]
    turn = 2 * np.pi * values["frequency_hz"] * inputs.skew_us * 1e-6 / 2
    of_cosine = 2 * _deviation_of_cosine(cosine, turn)
    # Share of the fundamental in the current; the voltage is taken as its fundamental.
    distortion = values["thd_current_all_percent"] / 100
    direct = values["dc_current_percent"] / 100
    of_factor = of_cosine / np.sqrt(1 + distortion**2 + direct**2)
    gains = known["apparent_power_va"] * values["power_factor"]
    power = np.hypot(gains, apparent * of_factor)
    stated = inputs.power * values["power_w"]
    return {
        "displacement_factor": of_cosine,
        "power_factor": of_factor,
        "power_w": np.where(np.isfinite(stated), stated, power),
    }


def _deviation_of_cosine(cosine: Array, turn: Array) -> Array:
    """Root mean square change of a cosine whose angle is uncertain, also where it is one.

    Parameters
    ----------
    cosine
        The cosine (series,).
    turn
        Standard uncertainty of the angle, Gaussian [rad] (series,).
    """
    once, twice = np.exp(-(turn**2) / 2), np.exp(-2 * turn**2)
    square = (1 + (2 * cosine**2 - 1) * twice) / 2 - 2 * cosine**2 * once + cosine**2
    return np.asarray(np.sqrt(np.maximum(square, 0.0)))


def _current_ratios(
    values: Mapping[str, Array],
    relative_current: Array,
    power_w: Array | None,
    inputs: MainsInputs,
) -> dict[str, Array]:
    distortion = values["thd_current_all_percent"] / 100
    direct = values["dc_current_percent"] / 100
    one = _above_zero(values["current_a"]) / np.sqrt(1 + distortion**2 + direct**2)
    of_one = _of_current(one, inputs) / one
    known = {
        "crest_factor": values["crest_factor"] * np.sqrt(2) * relative_current,
        "dc_current_percent": 100
        * np.hypot(_of_current(direct * one, inputs) / one, direct * of_one),
    }
    squares = np.zeros_like(one)
    of_power = np.nan if power_w is None else power_w / _above_zero(values["power_w"])
    for order in range(2, 41):
        name = f"h{order}_percent"
        share = values[name] / 100
        current = share * one
        own = _of_current(current, inputs)
        known[name] = 100 * np.hypot(own / one, share * of_one)
        per_watt = values[f"h{order}_ma_per_w"]
        known[f"h{order}_ma_per_w"] = np.hypot(
            1000 * own / _above_zero(values["power_w"]), per_watt * of_power
        )
        squares += np.nan_to_num(share * own / one) ** 2
    for name, whole in (
        ("thd_current_percent", values["thd_current_percent"] / 100),
        ("thd_current_all_percent", distortion),
    ):
        by_orders = np.sqrt(squares) / _above_zero(whole)
        known[name] = 100 * np.hypot(by_orders, whole * of_one)
    return known
