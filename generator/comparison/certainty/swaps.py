"""The smallest change of one input that makes the first and the second bid change places."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

from generator.comparison.certainty.scene import COMMON, LAMP_INPUTS, Scene, evaluated
from generator.comparison.cost.basis import LampNumbers
from generator.records.figure import exact
from generator.records.tender import SwapChange

__all__ = ["FURTHEST_PERCENT", "swap_changes"]

Array = NDArray[np.float64]

FURTHEST_PERCENT = (-90, 200)
"""Changes that are looked at [percent]; a change beyond is no small one."""
_GRID = 2901
_REFINED = 65
_ROUNDS = 4
_LONGEST_YEAR_H = 8784


def swap_changes(scene: Scene, first: str, second: str) -> tuple[SwapChange, ...]:
    """Look for swaps, one input at a time.

    Parameters
    ----------
    scene
        The lot.
    first, second
        Bids of first and second place.

    Returns
    -------
    tuple of SwapChange
        Smallest change first; an input that swaps nothing within :data:`FURTHEST_PERCENT` is
        left out. The change given is where the lead of the first bid is used up.
    """
    rows = {entry.lamp_id: row for row, entry in enumerate(scene.entries)}

    def lead_of(name: str, lamp_id: str, value: float) -> Callable[[Array], Array]:
        def lead(factors: Array) -> Array:
            moved = {(name, lamp_id): value * factors}
            totals = evaluated(scene, moved, factors.size).totals
            return np.asarray(totals[rows[first]] - totals[rows[second]])

        return lead

    found = []
    for name, lamp_id, value in _inputs(scene, (first, second)):
        if value == 0:
            continue
        start = 1.0 if name == "tariff" else float(value)
        furthest = _LONGEST_YEAR_H / start if name == "hours" else math.inf
        factor = _crossing(lead_of(name, lamp_id, start), furthest)
        if factor is not None:
            changed, percent = exact(float(value) * factor), exact((factor - 1) * 100)
            found.append(SwapChange(name, lamp_id, value, changed, percent))
    found.sort(key=lambda item: (abs(item.change_percent), item.input, item.lamp_id))
    return tuple(found)


def _inputs(scene: Scene, bids: tuple[str, str]) -> Iterator[tuple[str, str, Decimal]]:
    """Inputs that can be moved, with their values; the tariff with that of the first year."""
    if scene.use is not None:
        yield "tariff", COMMON, scene.use.tariffs[0]
        yield "hours", COMMON, scene.use.hours
        yield "discount rate", COMMON, scene.use.discount_rate
    for entry in scene.entries:
        if entry.lamp_id not in bids:
            continue
        names = set()
        for name in LAMP_INPUTS:
            value = _lamp_value(name, entry.basis.numbers, entry.basis.flux_lm)
            if value is not None:
                figure = entry.basis.figures.get(name)
                names.add(figure.quantity if figure else name)
                yield name, entry.lamp_id, value
        for name, value in entry.values.items():
            if name not in names | {"life_cycle_cost", "price"}:
                yield name, entry.lamp_id, value


def _lamp_value(
    name: str, numbers: LampNumbers[Decimal] | None, flux_lm: Decimal | None
) -> Decimal | None:
    if name == "flux_lm":
        return flux_lm
    value: Decimal | None = getattr(numbers, name, None)
    return value


def _crossing(lead: Callable[[Array], Array], furthest: float) -> float | None:
    """Factor nearest to one at which a lead is used up; ``None`` where it never is."""
    ends = [min(1 + percent / 100, furthest) for percent in FURTHEST_PERCENT]
    found = []
    for end in ends:
        inside, outside = 1.0, end
        for count in (_GRID, *([_REFINED] * _ROUNDS)):
            factors = np.linspace(inside, outside, count)
            lost = np.flatnonzero(lead(factors) <= 0)
            if lost.size == 0 or lost[0] == 0:
                break
            inside, outside = float(factors[lost[0] - 1]), float(factors[lost[0]])
        else:
            found.append(outside)
    return min(found, key=lambda factor: abs(factor - 1), default=None)
