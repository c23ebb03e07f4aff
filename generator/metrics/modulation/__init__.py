"""Temporal light modulation: flicker, stroboscopic visibility, short-term flicker of light."""

from generator.metrics.modulation.amplitude_modulation import percent_amplitude_modulation
from generator.metrics.modulation.figures import light_figures
from generator.metrics.modulation.flicker import flicker_index, percent_flicker
from generator.metrics.modulation.light_lines import LightLines, light_lines
from generator.metrics.modulation.low_risk import LOW_RISK_LINE, LowRiskSection, low_risk_modulation
from generator.metrics.modulation.period import fundamental_period, two_periods
from generator.metrics.modulation.record_remarks import (
    DARK_FLICKER,
    NOISE_IN_FLICKER,
    NOISE_IN_PST_LM,
    NOISE_IN_SVM,
    SHORT_FOR_PST_LM,
    SHORT_RECORD,
    SPARSE_RECORD,
)
from generator.metrics.modulation.short_term_flicker import pst_lm
from generator.metrics.modulation.stroboscopic import svm, visibility_threshold

__all__ = [
    "DARK_FLICKER",
    "LOW_RISK_LINE",
    "NOISE_IN_FLICKER",
    "NOISE_IN_PST_LM",
    "NOISE_IN_SVM",
    "SHORT_FOR_PST_LM",
    "SHORT_RECORD",
    "SPARSE_RECORD",
    "LightLines",
    "LowRiskSection",
    "flicker_index",
    "fundamental_period",
    "light_figures",
    "light_lines",
    "low_risk_modulation",
    "percent_amplitude_modulation",
    "percent_flicker",
    "pst_lm",
    "svm",
    "two_periods",
    "visibility_threshold",
]
