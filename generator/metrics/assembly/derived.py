"""Figures of units that follow from other figures: efficacies, useful flux, colour steps."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from generator.datasets.centres import Centre, CentreSystem
from generator.language import say
from generator.metrics.assembly.exact_numbers import exact_quotient
from generator.metrics.assembly.stated_uncertainty import Stated, relative_expanded
from generator.metrics.colour import nominal_centre, sdcm
from generator.metrics.distribution import WIDE_BEAM_FROM_DEG
from generator.metrics.uncertainty import combine
from generator.quantities import quantity as catalogue_entry
from generator.records.figure import Figure, Grade, exact
from generator.records.lamp import Lamp, Unit

__all__ = ["UnitFigures", "derived_figures"]

Array = NDArray[np.float64]
UnitFigures = Mapping[tuple[str, Grade], Figure]
"""Figures of one unit by quantity and grade."""

_QUOTIENTS = {
    "efficacy_lm_per_w": ("luminous_flux_lm", "power_w"),
    "radiant_efficiency": ("radiant_flux_w", "power_w"),
}
_REPORTED_QUOTIENT = say("quotient of reported figures")
_TOTAL = "useful_flux_non_directional_eu_2019_2015"
_CONE = "useful_flux_directional_eu_2019_2015"
_DIRECTION_UNKNOWN = say("whether the lamp is directional is not stated")
_NO_CENTRE = say("no colour temperature is declared from which to count steps")
_FAR_CENTRE = say("no nominal centre lies within 100 K of the declared colour temperature")
_DIFFERENCE = 1e-6
_CENTRE_SYSTEMS: tuple[CentreSystem, ...] = ("iec_60081", "ansi_c78_377_2017")


def derived_figures(
    lamp: Lamp, units: Sequence[Unit], figures: Mapping[str, UnitFigures], stated: Stated
) -> Iterator[Figure]:
    """Figures of one lamp's units that follow from other figures of the same unit.

    Parameters
    ----------
    lamp
        The lamp.
    units
        Its units.
    figures
        ``unit_id`` -> figures computed and reported, with their uncertainty.
    stated
        Stated uncertainties; they come before propagated ones.

    Yields
    ------
    Figure
        Efficacy and radiant efficiency (quotient per unit), useful luminous flux, and steps
        from the nominal centre nearest to the declared colour temperature. A figure is computed
        when one of its inputs is. Where an input is withheld, so is the figure, with its reason.
    """
    for unit in units:
        own = figures.get(unit.unit_id, {})
        for name, (dividend, divisor) in _QUOTIENTS.items():
            found = _quotient(name, own, dividend, divisor)
            if found is not None and not _already(own, found):
                yield stated.applied(found)
        useful = _useful_flux(lamp, own)
        if useful is not None and not _already(own, useful):
            known = useful.expanded_uncertainty is not None
            yield useful if known and not lamp.directional else stated.applied(useful)
    for steps in _steps(lamp, units, figures):
        if not _already(figures[steps.unit_id], steps):
            yield stated.applied(steps)


def _chosen(own: UnitFigures, quantity: str) -> Figure | None:
    """Computed before reported, one with a value before one without."""
    found = [own[quantity, grade] for grade in Grade if (quantity, grade) in own]
    return min(found, key=lambda figure: figure.value is None, default=None)


def _already(own: UnitFigures, derived: Figure) -> bool:
    """Whether the unit has a value at least as good as the derived one."""
    rival = _chosen(own, derived.quantity)
    if rival is None or rival.value is None:
        return False
    return derived.value is None or rival.grade in (Grade.COMPUTED, derived.grade)


def _withheld(quantity: str, cause: Figure, reason: str = "") -> Figure:
    """No value, because the input that is the cause has none, or for the reason given."""
    name = catalogue_entry(cause.quantity).label
    return replace(
        cause,
        quantity=quantity,
        value=None,
        expanded_uncertainty=None,
        reason=reason or say("{quantity}: {reason}", quantity=name, reason=cause.reason),
        remarks=(),
    )


def _quotient(quantity: str, own: UnitFigures, dividend: str, divisor: str) -> Figure | None:
    above, below = _chosen(own, dividend), _chosen(own, divisor)
    if above is None or below is None:
        return None
    for part in (above, below):
        if part.number is None:
            return _withheld(quantity, part)
    if above.number is None or not below.number:
        return _withheld(
            quantity, below, say("{quantity} is zero", quantity=catalogue_entry(divisor).label)
        )
    value = exact_quotient(above.number, below.number)
    computed = Grade.COMPUTED in (above.grade, below.grade)
    share = relative_expanded([(above, 1), (below, -1)])
    return Figure(
        above.lamp_id,
        above.unit_id,
        quantity,
        value,
        Grade.COMPUTED if computed else Grade.REPORTED,
        f"{dividend}_over_{divisor}" if computed else _REPORTED_QUOTIENT,
        expanded_uncertainty=None if share is None else exact(share * abs(float(value))),
        origin=above.origin + below.origin,
    )


def _useful_flux(lamp: Lamp, own: UnitFigures) -> Figure | None:
    if lamp.directional:
        return _cone_flux(own)
    total = _chosen(own, "luminous_flux_lm")
    if total is None:
        return None
    if lamp.directional is None:
        return _withheld("useful_luminous_flux_lm", total, _DIRECTION_UNKNOWN)
    if total.value is None:
        return _withheld("useful_luminous_flux_lm", total)
    return replace(total, quantity="useful_luminous_flux_lm", method=_TOTAL)


def _cone_flux(own: UnitFigures) -> Figure | None:
    """Flux in the cone that the beam angle of a directional lamp points to."""
    beam = own.get(("beam_angle_deg", Grade.COMPUTED))
    if beam is None:
        return None
    if beam.number is None:
        return _withheld("useful_luminous_flux_lm", beam)
    wide = float(beam.number) >= WIDE_BEAM_FROM_DEG
    cone = own.get(("flux_120deg_lm" if wide else "flux_90deg_lm", Grade.COMPUTED))
    if cone is None or cone.value is None:
        return None if cone is None else _withheld("useful_luminous_flux_lm", cone)
    return replace(cone, quantity="useful_luminous_flux_lm", method=_CONE)


def _steps(
    lamp: Lamp, units: Sequence[Unit], figures: Mapping[str, UnitFigures]
) -> Iterator[Figure]:
    """Steps of every unit from the nominal centre nearest to the declared temperature."""
    measured: list[tuple[Figure, Figure]] = []
    for unit in units:
        own = figures.get(unit.unit_id, {})
        x, y = _chosen(own, "x"), _chosen(own, "y")
        if x is None or y is None:
            continue
        if x.number is None or y.number is None:
            yield _withheld("sdcm", x if x.number is None else y)
        else:
            measured.append((x, y))
    centre = nearest_centre(lamp)
    if isinstance(centre, str):
        for x, _ in measured:
            yield _withheld("sdcm", x, centre)
    elif measured:
        yield from _steps_from(centre, measured)


def nearest_centre(lamp: Lamp) -> Centre | str:
    """Nominal centre nearest to a lamp's declared colour temperature, or why there is none.

    Parameters
    ----------
    lamp
        The lamp; its declared colour temperature is used.

    Returns
    -------
    Centre or str
        The centre, IEC 60081 before ANSI C78.377-2017 where both are as near; else the reason.
    """
    declared = lamp.declared.get("cct_k")
    if declared is None:
        return _NO_CENTRE
    cct_k = float(declared)
    near = [nominal_centre(cct_k, system) for system in _CENTRE_SYSTEMS]
    found = [centre for centre in near if centre is not None]
    return min(found, key=lambda one: abs(one.nominal_cct_k - cct_k), default=_FAR_CENTRE)


def _steps_from(centre: Centre, measured: Sequence[tuple[Figure, Figure]]) -> Iterator[Figure]:
    place = np.array([[float(part.number or 0) for part in pair] for pair in measured]).T
    numbers = sdcm(place[0], place[1], centre)
    expanded = _steps_uncertainty(centre, place, measured)
    for index, (x, y) in enumerate(measured):
        yield Figure(
            x.lamp_id,
            x.unit_id,
            "sdcm",
            exact(float(numbers[index])),
            x.grade if x.grade is y.grade else Grade.COMPUTED,
            centre.method,
            expanded_uncertainty=exact(expanded[index]) if np.isfinite(expanded[index]) else None,
            origin=tuple(dict.fromkeys(x.origin + y.origin)),
            remarks=(say("from {centre}", centre=centre.label),),
        )


def _steps_uncertainty(
    centre: Centre, place: Array, measured: Sequence[tuple[Figure, Figure]]
) -> list[float]:
    """Expanded uncertainty of steps from that of x and y, taken as independent (units,)."""
    known = [[part.expanded_uncertainty for part in pair] for pair in measured]
    expanded = np.array([[np.nan if u is None else float(u) for u in pair] for pair in known]).T
    step = _DIFFERENCE
    along_x = sdcm(place[0] + step, place[1], centre) - sdcm(place[0] - step, place[1], centre)
    along_y = sdcm(place[0], place[1] + step, centre) - sdcm(place[0], place[1] - step, centre)
    sensitivity = np.stack([along_x, along_y]) / (2 * step)
    return [float(number) for number in combine(sensitivity, expanded)]
