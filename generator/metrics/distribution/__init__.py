"""Figures of a luminous intensity distribution: flux, cones, beam angle, peak intensity."""

from generator.metrics.distribution.angles import (
    BEAM_ANGLE_METHOD,
    beam_angle_deg,
    peak_intensity_cd,
)
from generator.metrics.distribution.intensity import (
    NARROW_CONE_DEG,
    WIDE_BEAM_FROM_DEG,
    WIDE_CONE_DEG,
    intensity_figures,
    useful_luminous_flux_lm,
)
from generator.metrics.distribution.zonal_flux import (
    ZONAL_METHOD,
    cone_flux_lm,
    cumulated_flux_lm,
    full_circle,
    on_fine_angles,
    plane_mean,
)

__all__ = [
    "BEAM_ANGLE_METHOD",
    "NARROW_CONE_DEG",
    "WIDE_BEAM_FROM_DEG",
    "WIDE_CONE_DEG",
    "ZONAL_METHOD",
    "beam_angle_deg",
    "cone_flux_lm",
    "cumulated_flux_lm",
    "full_circle",
    "intensity_figures",
    "on_fine_angles",
    "peak_intensity_cd",
    "plane_mean",
    "useful_luminous_flux_lm",
]
