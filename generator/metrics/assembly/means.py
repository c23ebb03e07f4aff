"""Means over the units of a lamp, one per quantity and grade."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterable, Iterator, Sequence

import numpy as np

from generator.metrics.assembly.exact_numbers import exact_mean
from generator.metrics.uncertainty import mean_with_spread
from generator.records.figure import MEAN, Figure, Grade, exact

__all__ = ["mean_figures"]

_NUMBER = re.compile(r"\d+(?:\.\d+)?")


def mean_figures(figures: Iterable[Figure]) -> Iterator[Figure]:
    """Means of one lamp's figures over its units.

    Parameters
    ----------
    figures
        Figures of the units of one lamp, in the order of the units.

    Yields
    ------
    Figure
        One mean per quantity and grade, over the units that share the grade and have a value:
        exact where the values are, with sample standard deviation and with the expanded
        uncertainty of the mean where that of every unit is known. A quantity withheld for all
        units has a mean without a value, with the reason.
    """
    groups: dict[tuple[str, Grade], list[Figure]] = {}
    for figure in figures:
        groups.setdefault((figure.quantity, figure.grade), []).append(figure)
    for group in groups.values():
        yield _mean(group)


def _mean(group: Sequence[Figure]) -> Figure:
    first = group[0]
    given = [figure for figure in group if figure.number is not None]
    origin = tuple(dict.fromkeys(place for figure in group for place in figure.origin))
    if not given:
        reasons = tuple(dict.fromkeys(figure.reason for figure in group))
        return Figure(
            first.lamp_id,
            MEAN,
            first.quantity,
            None,
            first.grade,
            _methods(group),
            units_count=0,
            reason="; ".join(reasons),
            origin=origin,
            remarks=_shared_remarks(group),
        )
    numbers = [figure.number for figure in given if figure.number is not None]
    mean = exact_mean(numbers)
    away = np.array([float(number - mean) for number in numbers])
    result = mean_with_spread(away, _common(given))
    wide, spread = result.expanded_uncertainty, result.spread
    return Figure(
        first.lamp_id,
        MEAN,
        first.quantity,
        mean,
        first.grade,
        _methods(given),
        expanded_uncertainty=None if wide is None else exact(wide),
        spread=None if spread is None else exact(spread),
        units_count=len(given),
        origin=origin,
        remarks=(*_shared_remarks(given), *_extremes(given), *_gaps(group)),
    )


def _common(given: Sequence[Figure]) -> float | None:
    """Uncertainty common to all units: the mean of theirs, as for fully correlated errors."""
    known = [
        float(figure.expanded_uncertainty)
        for figure in given
        if figure.expanded_uncertainty is not None
    ]
    return float(np.mean(known)) if len(known) == len(given) else None


def _methods(group: Sequence[Figure]) -> str:
    return "; ".join(dict.fromkeys(figure.method for figure in group))


def _shared_remarks(group: Sequence[Figure]) -> tuple[str, ...]:
    """Remarks of the units, those that differ only in their numbers as one."""
    kinds: dict[str, list[str]] = {}
    for figure in group:
        for text in dict.fromkeys(figure.remarks):
            kinds.setdefault(_NUMBER.sub("#", text), []).append(text)
    total = len(group)
    return tuple(_one_remark(texts, total) for texts in kinds.values())


def _one_remark(texts: Sequence[str], total: int) -> str:
    count = "" if len(texts) == total else f" ({len(texts)} of {total} units)"
    return f"{_with_ranges(texts)}{count}"


def _with_ranges(texts: Sequence[str]) -> str:
    """Texts that differ only in their numbers as one, with ranges for what varies."""
    numbers = zip(*(_NUMBER.findall(text) for text in texts), strict=True)
    ranges = iter([_range(column) for column in numbers])
    return _NUMBER.sub(lambda _: next(ranges), texts[0])


def _range(numbers: Sequence[str]) -> str:
    least, most = min(numbers, key=float), max(numbers, key=float)
    return least if least == most else f"{least} to {most}"


def _extremes(given: Sequence[Figure]) -> tuple[str, ...]:
    """The unit farthest from the centre, which EU 2019/2020 Annex I(56) speaks of."""
    if given[0].quantity != "sdcm" or len(given) < 2:
        return ()
    farthest = max(given, key=lambda figure: figure.number or 0)
    return (f"farthest unit: {farthest.unit_id} with {farthest.number:.1f} steps",)


def _gaps(group: Sequence[Figure]) -> tuple[str, ...]:
    counts = Counter(figure.reason for figure in group if figure.number is None)
    total = len(group)
    return tuple(
        f"not given for {count} of {total} units: {reason}" for reason, count in counts.items()
    )
