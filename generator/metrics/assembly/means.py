"""Means over the units of a lamp, one per quantity and grade."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Callable, Hashable, Iterable, Iterator, Sequence
from itertools import chain

import numpy as np

from generator.language import SEMICOLON, Message, Numeral, joined, numeral, say
from generator.metrics.assembly.exact_numbers import exact_mean
from generator.metrics.uncertainty import mean_with_spread
from generator.records.figure import MEAN, Figure, Grade, exact

__all__ = ["mean_figures"]

Shared = dict[tuple[tuple[str, ...], ...], tuple[str, ...]]
"""Remarks of units -> remarks of their mean: most quantities of a lamp have the same."""

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
    shared: Shared = {}
    for group in groups.values():
        yield _mean(group, shared)


def _mean(group: Sequence[Figure], shared: Shared) -> Figure:
    first = group[0]
    given = [figure for figure in group if figure.number is not None]
    origin = tuple(dict.fromkeys(place for figure in group for place in figure.origin))
    if not given:
        return Figure(
            first.lamp_id,
            MEAN,
            first.quantity,
            None,
            first.grade,
            _methods(group),
            units_count=0,
            reason=_listed(figure.reason for figure in group),
            origin=origin,
            remarks=_shared_remarks(group, shared),
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
        remarks=(*_shared_remarks(given, shared), *_extremes(given), *_gaps(group)),
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
    return _listed(figure.method for figure in group)


def _listed(texts: Iterable[str]) -> str:
    """Different texts one after another; a single one as it is."""
    found = tuple(dict.fromkeys(texts))
    return found[0] if len(found) == 1 else joined(SEMICOLON, found)


def _shared_remarks(group: Sequence[Figure], shared: Shared) -> tuple[str, ...]:
    """Remarks of the units, those that differ only in their numbers as one."""
    every = tuple(figure.remarks for figure in group)
    if every not in shared:
        kinds: dict[Hashable, list[str]] = {}
        for remarks in every:
            for text in dict.fromkeys(remarks):
                kinds.setdefault(_kind(text), []).append(text)
        shared[every] = tuple(_one_remark(texts, len(every)) for texts in kinds.values())
    return shared[every]


def _one_remark(texts: Sequence[str], total: int) -> str:
    remark = _with_ranges(texts)
    if len(texts) == total:
        return remark
    return say("{remark} ({count} of {total} units)", remark=remark, count=len(texts), total=total)


def _kind(text: str) -> Hashable:
    """What texts have in common that differ in their numbers alone."""
    if not isinstance(text, Message):
        return _NUMBER.sub("#", text)
    values = text.values.items()
    return (
        (text.singular, text.context),
        tuple((key, _kind(one) if isinstance(one, str) else one) for key, one in values),
    )


def _with_ranges(texts: Sequence[str]) -> str:
    """Texts that differ only in their numbers as one, with ranges for what varies."""
    first = texts[0]
    if all(text == first for text in texts):
        return first
    if isinstance(first, Message):
        every = [text.values for text in texts if isinstance(text, Message)]
        return first.format(
            **{
                key: _with_ranges([one[key] for one in every])
                for key, value in first.values.items()
                if isinstance(value, str)
            }
        )
    written = numeral if isinstance(first, Numeral) else str
    numbers = zip(*(_NUMBER.findall(text) for text in texts), strict=True)
    ranges = [_range(column, written) for column in numbers]
    between = _NUMBER.split(first)
    parts = [between[0], *chain.from_iterable(zip(ranges, between[1:], strict=True))]
    return joined("", [part for part in parts if part])


def _range(numbers: Sequence[str], written: Callable[[str], str]) -> str:
    least, most = min(numbers, key=float), max(numbers, key=float)
    if least == most:
        return written(least)
    return say("{low} to {high}", low=written(least), high=written(most))


def _extremes(given: Sequence[Figure]) -> tuple[str, ...]:
    """The unit farthest from the centre, which EU 2019/2020 Annex I(56) speaks of."""
    if given[0].quantity != "sdcm" or len(given) < 2:
        return ()
    farthest = max(given, key=lambda figure: figure.number or 0)
    return (
        say(
            "farthest unit: {unit} with {steps:.1f} steps",
            unit=farthest.unit_id,
            steps=farthest.number,
        ),
    )


def _gaps(group: Sequence[Figure]) -> tuple[str, ...]:
    counts = Counter(figure.reason for figure in group if figure.number is None)
    total = len(group)
    return tuple(
        say(
            "not given for {count} of {total} units: {reason}",
            count=count,
            total=total,
            reason=reason,
        )
        for reason, count in counts.items()
    )
