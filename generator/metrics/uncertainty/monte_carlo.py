"""Propagation of distributions by a seeded Monte Carlo method."""

from __future__ import annotations

import hashlib
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "SEED",
    "MonteCarloResult",
    "coverage_interval",
    "monte_carlo",
    "stable_generator",
]

Array = NDArray[np.float64]

SEED = 20200103
"""Fixed seed of every Monte Carlo of a campaign, so that the same data give the same figures."""


@dataclass(frozen=True, slots=True, eq=False)
class MonteCarloResult:
    """What a Monte Carlo gives for each output.

    Parameters
    ----------
    estimate
        Mean of the trials (...,).
    standard_uncertainty
        Standard deviation of the trials (...,).
    low, high
        Ends of the coverage interval (...,).
    trials
        Number of trials.
    """

    estimate: Array
    standard_uncertainty: Array
    low: Array
    high: Array
    trials: int


def stable_generator(*words: str) -> np.random.Generator:
    """Random generator that depends on words alone, never on the order of the lamps.

    Parameters
    ----------
    words
        What the draws are for, for instance a lamp and the kind of error.

    Returns
    -------
    numpy.random.Generator
        Generator seeded with :data:`SEED` and the SHA-256 of the words.
    """
    digest = hashlib.sha256("\x1f".join(words).encode()).digest()
    entropy = np.frombuffer(digest, dtype="<u4").tolist()
    return np.random.Generator(np.random.PCG64(np.random.SeedSequence([SEED, *entropy])))


def coverage_interval(
    trials: Array, probability: float = 0.95, *, shortest: bool = False
) -> tuple[Array, Array]:
    """Coverage interval of a sample of the output.

    Parameters
    ----------
    trials
        Values of the output (trials, ...).
    probability
        Coverage probability.
    shortest
        Whether to give the shortest interval instead of the probabilistically symmetric one.

    Returns
    -------
    tuple
        Lower and upper end (...,). Source: jcgm_101, 7.7.2 (symmetric) and 5.3.4 (shortest).
    """
    ordered = np.sort(trials, axis=0)
    count = ordered.shape[0]
    inside = min(round(probability * count), count - 1)
    if not shortest:
        first = (count - inside) // 2
        return ordered[first], ordered[first + inside]
    widths = ordered[inside:] - ordered[: count - inside]
    start = np.argmin(widths, axis=0)[np.newaxis]
    low = np.take_along_axis(ordered, start, axis=0)[0]
    high = np.take_along_axis(ordered, start + inside, axis=0)[0]
    return low, high


def monte_carlo(
    model: Callable[..., Array],
    draw: Callable[[np.random.Generator, int], tuple[Array, ...]],
    generator: np.random.Generator,
    trials: int,
    *,
    probability: float = 0.95,
    shortest: bool = False,
) -> MonteCarloResult:
    """Propagate the distributions of the inputs through a model.

    Parameters
    ----------
    model
        Model taking one array (trials, ...) per input and giving the output (trials, ...).
    draw
        Draws a number of trials of all inputs.
    generator
        Seeded source of randomness.
    trials
        Number of trials.
    probability, shortest
        As for :func:`coverage_interval`.

    Returns
    -------
    MonteCarloResult
        Estimate, standard uncertainty, coverage interval. Source: jcgm_101, clause 7.
    """
    output = np.asarray(model(*draw(generator, trials)), dtype=np.float64)
    low, high = coverage_interval(output, probability, shortest=shortest)
    return MonteCarloResult(
        np.asarray(np.mean(output, axis=0)),
        np.asarray(np.std(output, axis=0, ddof=1)),
        low,
        high,
        trials,
    )
