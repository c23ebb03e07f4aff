"""The award: scoring functions, totals and ranks, offers to be explained."""

from generator.comparison.award.abnormally_low import low_offers
from generator.comparison.award.ranking import Candidate, award
from generator.comparison.award.scoring import function_text, score

__all__ = ["Candidate", "award", "function_text", "low_offers", "score"]
