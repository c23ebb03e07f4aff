"""A lot as arrays: totals of its ranked bids for many values of any input at once."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

from generator.comparison.award.scoring import FULL_SCORE, array_function, score
from generator.comparison.cost.basis import (
    LampBasis,
    UseNumbers,
    cost_inputs,
    lamp_arrays,
    lamps_for_light,
    use_arrays,
)
from generator.comparison.cost.formula import life_cycle_cost, maintained_share
from generator.records.figure import Figure
from generator.records.tender_settings import TenderAward

__all__ = ["COMMON", "LAMP_INPUTS", "Entry", "Moved", "Scene", "SceneResult", "evaluated"]

Array = NDArray[np.float64]

COMMON = ""
"""In place of a lamp: an input that all bids share."""
LAMP_INPUTS = ("price", "power_w", "standby_power_w", "life_h", "flux_lm")

Moved = Mapping[tuple[str, str], Array]
"""(input, lamp) -> values (trials,); what is not in it keeps its value. Inputs shared by all are
``tariff`` and ``price rise`` (both as factors on the price), ``hours`` and ``discount rate``."""


@dataclass(frozen=True, slots=True)
class Entry:
    """One ranked bid: its cost basis, its criterion values, and the figures behind those."""

    lamp_id: str
    basis: LampBasis
    values: Mapping[str, Decimal]
    figures: Mapping[str, Figure]


@dataclass(frozen=True, slots=True)
class Scene:
    """A lot ready for arrays.

    Parameters
    ----------
    entries
        Ranked bids, in the order of their ids.
    award
        Criteria and tie rule.
    use, years
        Numbers of ``[use]`` and length of the study; ``None`` and 0 where costs are not given.
    quantity
        Number of light points.
    light_lm
        Light asked for, where the lot compares at equal light; else ``None``.
    """

    entries: tuple[Entry, ...]
    award: TenderAward
    use: UseNumbers[Decimal] | None
    years: int
    quantity: int
    light_lm: Decimal | None


@dataclass(frozen=True, slots=True, eq=False)
class SceneResult:
    """Totals and what settles ties (lower is better), unrounded (bids, trials)."""

    totals: Array
    tie_values: Array


def evaluated(
    scene: Scene, moved: Moved, trials: int, admitted: NDArray[np.bool_] | None = None
) -> SceneResult:
    """Totals of all bids for every trial, by the formulas of the exact path.

    Parameters
    ----------
    scene
        The lot.
    moved
        Inputs that vary.
    trials
        Number of trials.
    admitted
        Whether a bid takes part (bids, trials); a bid that does not sets no best value.

    Returns
    -------
    SceneResult
        Totals and tie values.
    """
    amounts = [_amounts(scene, entry, moved) for entry in scene.entries]
    shape = (len(scene.entries), trials)
    inside = np.ones(shape, dtype=bool) if admitted is None else admitted
    totals = np.zeros(shape)
    for criterion in scene.award.criteria:
        values = np.empty(shape)
        for row, entry in enumerate(scene.entries):
            values[row] = _value(criterion.quantity, entry, amounts[row], moved)
        sign = 1.0 if criterion.better == "higher" else -1.0
        best = sign * np.max(np.where(inside, sign * values, -np.inf), axis=0)
        best = np.where(np.isfinite(best), best, 1.0)
        reached = score(array_function(criterion), values, np.broadcast_to(best, shape))
        totals += reached * float(criterion.weight_percent) / FULL_SCORE
    ties = np.zeros(shape)
    if scene.award.tie_rule != "shared rank":
        name = "price" if scene.award.tie_rule == "lower price" else "life_cycle_cost"
        for row, found in enumerate(amounts):
            ties[row] = found.get(name, np.inf)
    return SceneResult(totals, ties)


def _amounts(scene: Scene, entry: Entry, moved: Moved) -> dict[str, Array]:
    """Price and life-cycle cost of one bid, where they can be given."""
    numbers = entry.basis.numbers
    if numbers is None:
        price = entry.values.get("price")
        return {} if price is None else {"price": np.asarray(float(price))}
    own = {
        name: moved[name, entry.lamp_id]
        for name in LAMP_INPUTS
        if (name, entry.lamp_id) in moved and name != "flux_lm"
    }
    lamp = lamp_arrays(numbers, **own)
    lamps = np.asarray(float(scene.quantity))
    if scene.use is None:
        return {"price": lamps * lamp.price}
    use = _use(scene.use, moved)
    if scene.light_lm is not None and entry.basis.flux_lm is not None:
        flux = moved.get(("flux_lm", entry.lamp_id), np.asarray(float(entry.basis.flux_lm)))
        mean = flux * maintained_share(lamp.life_h, use.hours, scene.years)
        lamps = lamps_for_light(np.asarray(float(scene.light_lm)), mean)
    cost = life_cycle_cost(cost_inputs(lamp, use, lamps), scene.years)
    return {"price": lamps * lamp.price, "life_cycle_cost": cost}


def _use(use: UseNumbers[Decimal], moved: Moved) -> UseNumbers[Array]:
    names = {
        "tariff": "tariff_scale",
        "price rise": "tariff_drift",
        "hours": "hours",
        "discount rate": "discount_rate",
    }
    shared = {names[name]: values for (name, lamp_id), values in moved.items() if lamp_id == COMMON}
    return use_arrays(use, **shared)


def _value(name: str, entry: Entry, amounts: Mapping[str, Array], moved: Moved) -> Array:
    """Values of a criterion (trials,); efficacy follows flux and power where those move."""
    if name in amounts:
        return amounts[name]
    if (name, entry.lamp_id) in moved:
        return moved[name, entry.lamp_id]
    for source, figure in entry.basis.figures.items():
        if figure.quantity == name and (source, entry.lamp_id) in moved:
            return moved[source, entry.lamp_id]
    value = np.asarray(float(entry.values[name]))
    if name != "efficacy_lm_per_w":
        return value
    return value * _relative("flux_lm", entry, moved) / _relative("power_w", entry, moved)


def _relative(name: str, entry: Entry, moved: Moved) -> Array:
    figure, values = entry.basis.figures.get(name), moved.get((name, entry.lamp_id))
    if values is None or figure is None or figure.number is None:
        return np.asarray(1.0)
    return values / float(figure.number)
