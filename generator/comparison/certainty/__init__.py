"""How sure a ranking is: draws, ranks and outcomes, swaps, drivers."""

from generator.comparison.certainty.ranks import Gated, certainty
from generator.comparison.certainty.swaps import swap_changes

__all__ = ["Gated", "certainty", "swap_changes"]
