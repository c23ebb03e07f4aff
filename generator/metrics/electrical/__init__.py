"""Mains quantities: voltage, current, power, power factor, harmonics, over whole cycles."""

from generator.metrics.electrical.current_conduction import (
    CurrentConduction,
    current_conduction,
)
from generator.metrics.electrical.figures import mains_figures
from generator.metrics.electrical.mains_frequency import mains_frequency
from generator.metrics.electrical.mains_quantities import MainsQuantities, mains_quantities
from generator.metrics.electrical.mains_view import MainsCycle, mains_cycle

__all__ = [
    "CurrentConduction",
    "MainsCycle",
    "MainsQuantities",
    "current_conduction",
    "mains_cycle",
    "mains_figures",
    "mains_frequency",
    "mains_quantities",
]
