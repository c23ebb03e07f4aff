"""Figures of ageing tests: lumen maintenance, survival, chromaticity shift, projected life."""

from generator.metrics.ageing.endurance import (
    ENDURANCE_H,
    AgeingFigures,
    ageing_figures,
    u_v_prime_shift,
)
from generator.metrics.ageing.exponential import (
    LIFE_SHARE,
    PROJECTION_METHOD,
    ExponentialFit,
    exponential_fit,
    fit_range_h,
    projected_life_h,
    projection_limit_h,
)
from generator.metrics.ageing.projection import MaintenanceCurve, maintenance_curve

__all__ = [
    "ENDURANCE_H",
    "LIFE_SHARE",
    "PROJECTION_METHOD",
    "AgeingFigures",
    "ExponentialFit",
    "MaintenanceCurve",
    "ageing_figures",
    "exponential_fit",
    "fit_range_h",
    "maintenance_curve",
    "projected_life_h",
    "projection_limit_h",
    "u_v_prime_shift",
]
