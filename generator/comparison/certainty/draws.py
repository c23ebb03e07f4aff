"""Seeded draws of the uncertain inputs, the same whatever the order of the bids."""

from __future__ import annotations

import hashlib
import math
from collections.abc import Sequence
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

from generator.comparison.certainty.scene import COMMON, Entry, Scene
from generator.records.figure import Figure
from generator.records.tender_settings import TenderUse
from generator.records.verdict import Verdict

__all__ = ["COVERAGE_FACTOR", "conforming", "drawn_inputs", "standard_uncertainty"]

Array = NDArray[np.float64]

COVERAGE_FACTOR = 2
"""Every expanded uncertainty of a campaign is stated for this factor."""
_FLOOR = 0.01
_POSITIVE = ("power_w", "standby_power_w", "life_h", "flux_lm")


def _normal(seed: int, trials: int, *words: str) -> Array:
    """Standard normal numbers that depend on seed and words alone (trials,)."""
    digest = hashlib.sha256("\x1f".join(words).encode()).digest()
    entropy = np.frombuffer(digest, dtype="<u4").tolist()
    generator = np.random.Generator(np.random.PCG64(np.random.SeedSequence([seed, *entropy])))
    return generator.standard_normal(trials)


def standard_uncertainty(figure: Figure) -> float:
    """Standard uncertainty of a mean: half the expanded one, else the spread over root n.

    Parameters
    ----------
    figure
        The figure; its expanded uncertainty already holds the spread of its units.

    Returns
    -------
    float
        In the unit of the figure; zero where nothing is known.
        Source: jcgm_100, 4.2.3, 6.2.1.
    """
    if figure.expanded_uncertainty is not None:
        return float(figure.expanded_uncertainty) / COVERAGE_FACTOR
    if figure.spread is not None:
        return float(figure.spread) / math.sqrt(figure.units_count)
    return 0.0


def drawn_inputs(
    scene: Scene, use: TenderUse, seed: int, trials: int
) -> dict[tuple[str, str], Array]:
    """Draw every uncertain input of a lot.

    Parameters
    ----------
    scene
        The lot.
    use
        ``[use]``, whose uncertainties are expanded (k = 2) and in percent.
    seed, trials
        Seed and number of trials.

    Returns
    -------
    dict
        (input, lamp) -> values (trials,), normal; powers, life and flux are held at one
        hundredth of their value at the least. An input without uncertainty is left out.
        Source: jcgm_101, 6.4.7.
    """
    drawn: dict[tuple[str, str], Array] = {}
    for name, percent, words in (
        ("tariff", use.tariff_uncertainty_percent, "tariff"),
        ("price rise", use.price_rise_uncertainty_points, "price rise"),
    ):
        if percent:
            spread = float(percent) / 100 / COVERAGE_FACTOR
            drawn[name, COMMON] = np.maximum(1 + spread * _normal(seed, trials, words), _FLOOR)
    for entry in scene.entries:
        drawn |= _of_bid(entry, use.life_uncertainty_percent, seed, trials)
    return drawn


def _of_bid(
    entry: Entry, life_percent: Decimal, seed: int, trials: int
) -> dict[tuple[str, str], Array]:
    drawn = {}
    sources = dict(entry.basis.figures)
    known = {figure.quantity for figure in sources.values()}
    derived = {"efficacy_lm_per_w"} if _flux_or_power_known(entry) else set()
    sources |= {
        name: figure for name, figure in entry.figures.items() if name not in known | derived
    }
    for name, figure in sources.items():
        value = float(figure.number or 0)
        spread = standard_uncertainty(figure)
        if name == "life_h":
            spread = max(spread, value * float(life_percent) / 100 / COVERAGE_FACTOR)
        if spread and name != "survival_factor":
            values = value + spread * _normal(seed, trials, entry.lamp_id, figure.quantity)
            if name in _POSITIVE:
                values = np.maximum(values, _FLOOR * value)
            drawn[name, entry.lamp_id] = values
    return drawn


def _flux_or_power_known(entry: Entry) -> bool:
    return any(
        standard_uncertainty(entry.basis.figures[name]) > 0
        for name in ("flux_lm", "power_w")
        if name in entry.basis.figures
    )


def conforming(verdicts: Sequence[Verdict], seed: int, trials: int) -> NDArray[np.bool_]:
    """Whether a lamp truly meets its uncertain mandatory limits, trial by trial.

    Parameters
    ----------
    verdicts
        Verdicts of one lamp that carry a probability of conformity.
    seed, trials
        As for :func:`drawn_inputs`; a quantity has the same draw in a clause and in the award.

    Returns
    -------
    numpy.ndarray
        True where all are met (trials,). Source: jcgm_106, clause 7.
    """
    from scipy.special import ndtri

    met = np.ones(trials, dtype=bool)
    for item in verdicts:
        probability = float(item.probability or 0)
        z = _normal(seed, trials, item.lamp_id, item.quantity)
        if item.comparison in ("at least", "above"):
            met &= z >= -float(ndtri(probability))
        elif item.comparison in ("at most", "below"):
            met &= z <= float(ndtri(probability))
        else:
            met &= np.abs(z) <= float(ndtri((1 + probability) / 2))
    return met
