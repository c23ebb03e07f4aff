"""Many lamps side by side: which figures, which verdicts, which lamp is best, which bid wins."""

from generator.comparison.bids import bids_of
from generator.comparison.matrix import COLUMNS, compare
from generator.comparison.tender import compare_tender
from generator.comparison.tender_checks import tender_problems

__all__ = ["COLUMNS", "bids_of", "compare", "compare_tender", "tender_problems"]
