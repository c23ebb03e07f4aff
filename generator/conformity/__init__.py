"""Conformity: figures and clauses in, verdicts with margin, probability and the way there out.

Two questions are kept apart. Does the value meet the limit: once for what the supplier declares,
once for what was determined on the units. And does the mean of the units lie within the
verification tolerance of the declaration: clauses of their own, whose ids say ``verification``.
"""

from generator.conformity.judge import judge
from generator.conformity.risk import campaign_risks

__all__ = ["campaign_risks", "judge"]
