"""The figures every sheet shows, measured or not."""

from __future__ import annotations

from generator.language import say

__all__ = ["DIRECTIONAL_HEADLINE", "HEADLINE", "NOT_MEASURED", "headline_of"]

HEADLINE = (
    "luminous_flux_lm",
    "useful_luminous_flux_lm",
    "power_w",
    "efficacy_lm_per_w",
    "cct_k",
    "duv",
    "sdcm",
    "ra",
    "r9",
    "percent_flicker",
    "svm",
    "pst_lm",
    "power_factor",
    "displacement_factor",
    "standby_power_w",
    "networked_standby_power_w",
    "lumen_maintenance_factor",
    "survival_factor",
)
"""Quantities for which every lamp has a mean figure, with a value or with a reason."""

DIRECTIONAL_HEADLINE = ("beam_angle_deg", "peak_intensity_cd")
"""The same, for directional lamps."""

NOT_MEASURED = say("not measured")
"""The reason of a figure nothing was measured for."""


def headline_of(directional: bool | None) -> tuple[str, ...]:
    """Headline quantities of a lamp, by whether it is directional.

    Parameters
    ----------
    directional
        Whether the lamp is declared as directional; ``None`` where not stated.

    Returns
    -------
    tuple of str
        Quantity names.
    """
    return HEADLINE + DIRECTIONAL_HEADLINE if directional else HEADLINE
