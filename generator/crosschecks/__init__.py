"""Cross-checks: whether the numbers of a campaign belong together.

The room holds what was read and computed against itself, and words what does not fit as
findings: what was compared, by how much it is off, what would explain it. It judges nothing; a
finding is a question to the laboratory or the bidder, never an accusation.

With both expanded uncertainties known, two values contradict one another beyond E_n = 1. At
k = 2 and for independent measurements that happens by chance about once in twenty comparisons,
so that a lone small E_n above 1 weighs little and a number of them much. Where an uncertainty is
unknown, a default tolerance stands in, and the finding says which and why.

Checks of one lamp speak once per lamp and check: with the numbers of the worst unit, and the
names of the others.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import replace
from decimal import Decimal

from generator.crosschecks.colour import (
    cct_against_chromaticity,
    colour_against_report,
    declared_cct_against_measured,
)
from generator.crosschecks.conditions import (
    ambient_outside_tolerance,
    light_not_stable,
    supply_outside_tolerance,
    uncertainty_of_zero,
)
from generator.crosschecks.copied_data import no_spread_between_units, units_identical
from generator.crosschecks.dates import (
    report_after_assessment,
    report_older_than_model,
    reports_shared,
)
from generator.crosschecks.declarations import (
    class_against_determined,
    declared_better_than_every_unit,
)
from generator.crosschecks.definitions import above_definition
from generator.crosschecks.electrical import (
    mains_against_report,
    power_factor_above_displacement,
    power_factor_against_displacement_and_distortion,
    power_factor_against_ratio,
    standby_above_on_power,
)
from generator.crosschecks.evidence import LampEvidence, gathered
from generator.crosschecks.modulation import (
    flicker_frequency_against_mains,
    flicker_index_above_bound,
    modulation_against_report,
)
from generator.crosschecks.photometric import (
    declared_efficacy_above_ler,
    distribution_against_report,
    efficacy_above_ler,
    efficacy_above_maximum,
    efficacy_against_ratio,
    endurance_start_against_report,
    flux_distribution_against_report,
    flux_spectrum_against_report,
    peak_intensity_below_average,
    radiant_efficiency_above_one,
    useful_flux_above_flux,
)
from generator.crosschecks.same_curves import same_light, same_mains, same_spectra
from generator.crosschecks.wording import listed
from generator.language import joined, say
from generator.records.campaign import Campaign
from generator.records.figure import FigureSet
from generator.records.finding import Finding

__all__ = ["findings_of"]

_LAMP_CHECKS: tuple[Callable[[LampEvidence], Iterator[Finding]], ...] = (
    flux_spectrum_against_report,
    flux_distribution_against_report,
    distribution_against_report,
    efficacy_against_ratio,
    efficacy_above_ler,
    declared_efficacy_above_ler,
    efficacy_above_maximum,
    radiant_efficiency_above_one,
    useful_flux_above_flux,
    peak_intensity_below_average,
    endurance_start_against_report,
    power_factor_against_ratio,
    power_factor_against_displacement_and_distortion,
    power_factor_above_displacement,
    mains_against_report,
    standby_above_on_power,
    modulation_against_report,
    flicker_frequency_against_mains,
    flicker_index_above_bound,
    colour_against_report,
    cct_against_chromaticity,
    declared_cct_against_measured,
    above_definition,
    declared_better_than_every_unit,
    class_against_determined,
    no_spread_between_units,
    report_older_than_model,
    report_after_assessment,
    ambient_outside_tolerance,
    supply_outside_tolerance,
    light_not_stable,
    uncertainty_of_zero,
)
_CAMPAIGN_CHECKS: tuple[Callable[[Campaign], Iterator[Finding]], ...] = (
    units_identical,
    same_spectra,
    same_light,
    same_mains,
    reports_shared,
)


def _one_per_check(findings: Iterable[Finding]) -> Iterator[Finding]:
    """The worst finding of each check of a lamp, with the other units concerned by name."""
    groups: dict[str, list[Finding]] = {}
    for item in findings:
        groups.setdefault(item.check, []).append(item)
    for items in groups.values():
        worst = min(
            items, key=lambda item: (item.severity.rank, -abs(item.deviation or Decimal(0)))
        )
        others = [item.unit_id for item in items if item.unit_id not in ("", worst.unit_id)]
        if others:
            names = listed(list(dict.fromkeys(others)))
            also = say("Found also for {names}.", names=names)
            worst = replace(worst, compared=joined(" ", (worst.compared, also)))
        yield worst


def findings_of(campaign: Campaign, figures: FigureSet) -> tuple[Finding, ...]:
    """Everything in a campaign that does not fit.

    Parameters
    ----------
    campaign
        The campaign.
    figures
        Its figures in all grades; with those that the law defines, the declared energy class is
        checked too.

    Returns
    -------
    tuple of Finding
        In the order of the lamps; within a lamp the heaviest first, then in the order of the
        checks. Empty where everything fits.
    """
    by_lamp: dict[str, list[Finding]] = {lamp.lamp_id: [] for lamp in campaign.lamps}
    for evidence in gathered(campaign, figures):
        found = (item for check in _LAMP_CHECKS for item in check(evidence))
        by_lamp[evidence.lamp.lamp_id] += _one_per_check(found)
    for check in _CAMPAIGN_CHECKS:
        for item in check(campaign):
            by_lamp[item.lamp_id].append(item)
    return tuple(
        item
        for items in by_lamp.values()
        for item in sorted(items, key=lambda item: item.severity.rank)
    )
