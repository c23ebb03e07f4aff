"""All figures of a campaign: computed, reported, declared; per unit, and means over units."""

from generator.metrics.assembly.campaign_figures import figures_of
from generator.metrics.assembly.derived import nearest_centre
from generator.metrics.assembly.headline import DIRECTIONAL_HEADLINE, HEADLINE
from generator.metrics.assembly.raw_figures import ageing_of

__all__ = ["DIRECTIONAL_HEADLINE", "HEADLINE", "ageing_of", "figures_of", "nearest_centre"]
