"""From a campaign to all its figures, in the order in which they are written."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import replace

from generator.language import numeral, say
from generator.metrics.assembly.derived import derived_figures
from generator.metrics.assembly.headline import NOT_MEASURED, headline_of
from generator.metrics.assembly.means import mean_figures
from generator.metrics.assembly.raw_figures import computed_figures, grouped
from generator.metrics.assembly.ready_made import declared_figures, reported_figures
from generator.metrics.assembly.stated_uncertainty import Stated, propagated
from generator.quantities import QUANTITIES
from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, Grade
from generator.records.lamp import Lamp, Unit

__all__ = ["figures_of"]

_PLACE = {name: index for index, name in enumerate(QUANTITIES)}
_GRADES = {grade: index for index, grade in enumerate(Grade)}


def figures_of(campaign: Campaign) -> tuple[Figure, ...]:
    """All figures of a campaign.

    Parameters
    ----------
    campaign
        The campaign, read and checked.

    Returns
    -------
    tuple of Figure
        Lamp by lamp in campaign order, by quantity in the order of the catalogue: means
        first, then units in file order; computed, reported, declared. Every lamp has a mean
        figure for every headline quantity, with a value or with the reason why there is none.
    """
    stated = Stated(campaign)
    measured = [*computed_figures(campaign, stated), *reported_figures(campaign)]
    settled = list(propagated([stated.applied(figure) for figure in _settled(measured)]))
    by_lamp = grouped(settled, lambda figure: figure.lamp_id)
    units = grouped(campaign.units, lambda unit: unit.lamp_id)
    ordered: list[Figure] = []
    for lamp in campaign.lamps:
        own = by_lamp.get(lamp.lamp_id, [])
        ordered += _of_lamp(campaign, lamp, units.get(lamp.lamp_id, []), own, stated)
    return tuple(ordered)


def _of_lamp(
    campaign: Campaign,
    lamp: Lamp,
    units: Sequence[Unit],
    measured: list[Figure],
    stated: Stated,
) -> list[Figure]:
    place = {MEAN: -1} | {unit.unit_id: index for index, unit in enumerate(units)}
    own: dict[str, dict[tuple[str, Grade], Figure]] = {unit.unit_id: {} for unit in units}
    for figure in measured:
        if figure.unit_id != MEAN:
            own[figure.unit_id][figure.quantity, figure.grade] = figure
    derived = list(derived_figures(lamp, units, own, stated))
    of_units = list(_settled(figure for figure in [*measured, *derived] if figure.unit_id != MEAN))
    of_units.sort(key=lambda figure: place[figure.unit_id])
    means = [*mean_figures(of_units), *(item for item in measured if item.unit_id == MEAN)]
    absent = _absent(lamp, means)
    figures = [*means, *absent, *declared_figures(campaign, lamp), *of_units]
    figures.sort(key=lambda item: (_PLACE[item.quantity], place[item.unit_id], _GRADES[item.grade]))
    return figures


def _settled(figures: Iterable[Figure]) -> Iterator[Figure]:
    """One figure per unit, quantity and grade; none withheld where another grade has a value."""
    groups = grouped(figures, lambda figure: (figure.lamp_id, figure.unit_id, figure.quantity))
    for group in groups.values():
        given = [figure for figure in group if figure.value is not None]
        if not given:
            yield group[0]
            continue
        if len(given) == 1:
            yield given[0]
            continue
        for alike in grouped(given, lambda figure: figure.grade).values():
            rivals = tuple(
                say(
                    "{value} {unit} from {place}",
                    value=numeral(f"{rival.number:.5g}"),
                    unit=QUANTITIES[rival.quantity].unit,
                    place=rival.origin[0],
                )
                for rival in alike[1:]
            )
            yield replace(alike[0], remarks=alike[0].remarks + rivals)


def _absent(lamp: Lamp, means: Iterable[Figure]) -> Iterator[Figure]:
    """Headline figures nothing was measured for."""
    known = {figure.quantity for figure in means}
    for quantity in headline_of(lamp.directional):
        if quantity not in known:
            yield Figure(
                lamp.lamp_id,
                MEAN,
                quantity,
                None,
                Grade.REPORTED,
                "",
                units_count=0,
                reason=NOT_MEASURED,
            )
