"""Measurement uncertainty: propagation, coverage, means over units, Monte Carlo.

Modules that draw on the figures of another room (``light``, ``angles``) are imported by name, so
that those rooms can use this one.
"""

from generator.metrics.uncertainty.coverage import (
    COVERAGE_PROBABILITY,
    MeanOverUnits,
    coverage_factor,
    expanded_with_lift,
    mean_with_spread,
    welch_satterthwaite,
)
from generator.metrics.uncertainty.extremes import noise_of_highest, noise_of_swing_percent
from generator.metrics.uncertainty.mains import MainsInputs, mains_uncertainty
from generator.metrics.uncertainty.monte_carlo import (
    SEED,
    MonteCarloResult,
    coverage_interval,
    monte_carlo,
    stable_generator,
)
from generator.metrics.uncertainty.propagation import combine, combine_powers
from generator.metrics.uncertainty.repeated_readings import (
    distance_uncertainty,
    quotient_uncertainty,
)
from generator.metrics.uncertainty.spectral import (
    SCALE_QUANTITIES,
    SPECTRAL_TRIALS,
    SpectralInputs,
    spectral_draws,
    spectral_uncertainty,
)

__all__ = [
    "COVERAGE_PROBABILITY",
    "SCALE_QUANTITIES",
    "SEED",
    "SPECTRAL_TRIALS",
    "MainsInputs",
    "MeanOverUnits",
    "MonteCarloResult",
    "SpectralInputs",
    "combine",
    "combine_powers",
    "coverage_factor",
    "coverage_interval",
    "distance_uncertainty",
    "expanded_with_lift",
    "mains_uncertainty",
    "mean_with_spread",
    "monte_carlo",
    "noise_of_highest",
    "noise_of_swing_percent",
    "quotient_uncertainty",
    "spectral_draws",
    "spectral_uncertainty",
    "stable_generator",
    "welch_satterthwaite",
]
