"""The eligibility gate: mandatory clauses, evidence, lot limits, findings, code names."""

from generator.comparison.eligibility.code_names import shown_names
from generator.comparison.eligibility.gate import eligibility

__all__ = ["eligibility", "shown_names"]
