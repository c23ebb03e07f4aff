"""Life-cycle cost: one formula, what it rests on, and the study of one bid."""

from generator.comparison.cost.formula import cash_flows, life_cycle_cost, present_value_factor
from generator.comparison.cost.study import cost_study, equal_light, tornado

__all__ = [
    "cash_flows",
    "cost_study",
    "equal_light",
    "life_cycle_cost",
    "present_value_factor",
    "tornado",
]
