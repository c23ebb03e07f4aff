"""Figures and verdicts as text: number, unit, uncertainty, grade; value, limit, margin, ruler."""

from __future__ import annotations

import dataclasses
import re
from collections.abc import Iterable, Mapping
from decimal import Decimal

from generator.language import SEMICOLON, joined, say, say_counted, told
from generator.quantities import QUANTITIES, quantity
from generator.records.figure import Figure, Grade
from generator.records.verdict import Basis, Verdict, VerdictWord
from generator.sheets.description import FigureText, VerdictCount, VerdictText
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.margin_ruler import Distance, draw_margin_ruler
from generator.sheets.number_format import (
    decimals_for,
    decimals_of,
    declared_text,
    exact_text,
    limits_in,
    range_text,
    readable,
    rounded_up,
    shown,
    shown_margin,
    telling_decimals,
)
from generator.sheets.words import (
    BASIS_WORDS,
    CLASS_GRADES,
    COMPARISON_SIGNS,
    GRADE_NAMES,
    MARKS,
    NOT_MEASURED,
    VERDICT_ROLES,
    VERDICT_WORDS,
)

__all__ = [
    "count_texts",
    "distance_of",
    "figure_text",
    "in_words",
    "phrase",
    "severest",
    "spread_text",
    "verdict_count",
    "verdict_ruler",
    "verdict_text",
]

_SEVERITY = (
    VerdictWord.FAIL,
    VerdictWord.INCONCLUSIVE,
    VerdictWord.NOT_MEASURED,
    VerdictWord.PASS,
    VerdictWord.NOT_APPLICABLE,
)
_LONGEST_EXACT = 4
_ONE_MORE = frozenset({"r9"})
_NAME = re.compile(r"\b[a-z][a-z0-9]*(?:_[a-z0-9]+)+\b")


def figure_text(figure: Figure | None, name: str) -> FigureText:
    """Write one figure.

    Parameters
    ----------
    figure
        The figure, or ``None`` where the campaign has none.
    name
        Catalogue name of the quantity.
    """
    entry = quantity(name)
    head = (name, entry.label, entry.symbol, entry.unit)
    if figure is None:
        return FigureText(*head, NOT_MEASURED, "", "", say("not among the data"))
    if figure.value is None:
        return FigureText(*head, NOT_MEASURED, "", "", figure.reason or say("no reason given"))
    if isinstance(figure.value, str):
        grade = CLASS_GRADES[figure.grade]
        return FigureText(*head, figure.value, "", grade, "", _detail(figure, 0))
    uncertainty = figure.expanded_uncertainty
    decimals = _decimals(uncertainty, name)
    declared = figure.grade is Grade.DECLARED
    return FigureText(
        *head,
        declared_text(figure.value) if declared else shown(figure.value, decimals),
        f"±\u00a0{_uncertainty_text(uncertainty, decimals)}" if uncertainty else "",
        GRADE_NAMES[figure.grade],
        "",
        _detail(figure, decimals),
    )


def _decimals(uncertainty: Decimal | None, name: str) -> int:
    """Decimals by the uncertainty, but no more than the quantity is ever printed with."""
    most = quantity(name).decimals + (name in _ONE_MORE)
    return min(decimals_for(uncertainty, quantity(name).decimals), most)


def _uncertainty_text(uncertainty: Decimal, decimals: int) -> str:
    """The uncertainty beside its value; rounded up where the value has fewer decimals."""
    if decimals_for(uncertainty, decimals) > decimals:
        return rounded_up(uncertainty, decimals)
    return shown(uncertainty, decimals)


def _detail(figure: Figure, decimals: int) -> str:
    parts: list[str] = []
    if figure.units_count > 1:
        parts.append(
            say_counted("mean of {count} unit", "mean of {count} units", figure.units_count)
        )
    if figure.spread is not None:
        spread = spread_text(figure.spread, decimals)
        parts.append(say("standard deviation {spread}", spread=spread))
    if figure.method:
        parts.append(figure.method)
    remarks = (in_words(remark, decimals).rstrip(".") for remark in figure.remarks)
    return joined(SEMICOLON, (*parts, *remarks))


def spread_text(spread: Decimal, decimals: int) -> str:
    """Write a standard deviation with two decimals more than its value at the most."""
    digits = min(max(decimals, decimals_for(spread, decimals)), decimals + 2)
    least = Decimal(1).scaleb(-digits)
    return f"< {shown(least, digits)}" if 0 < spread < least else shown(spread, digits)


def phrase(text: FigureText) -> str:
    """Write number and unit in one phrase."""
    return f"{text.number}\u00a0{text.unit}" if text.unit and not text.missing else text.number


def distance_of(verdict: Verdict) -> Distance | None:
    """Give how far a verdict is from its limit; ``None`` where that has no meaning."""
    limit, margin = verdict.limit, verdict.margin
    if margin is None or not isinstance(limit, Decimal) or limit == 0:
        return None
    spread = verdict.expanded_uncertainty
    return Distance(
        float(margin / abs(limit)), None if spread is None else float(spread / abs(limit))
    )


def verdict_ruler(verdict: Verdict, text: VerdictText, palette: Palette) -> str:
    """Draw the ruler of a verdict; empty where there is no margin."""
    distance = distance_of(verdict)
    if distance is None:
        return ""
    limit = f"{text.limit} {text.unit}".rstrip()
    finding = say(
        "{title}: {value} against {limit}, margin {margin}, {word}",
        title=text.title,
        value=text.value,
        limit=limit,
        margin=text.margin,
        word=text.word,
    )
    return draw_margin_ruler(distance, VERDICT_ROLES[verdict.verdict], finding, palette)


def verdict_text(verdict: Verdict, palette: Palette) -> VerdictText:
    """Write one verdict.

    Parameters
    ----------
    verdict
        The verdict.
    palette
        Colours of the theme, for the ruler.
    """
    decimals = _value_decimals(verdict)
    value, spread = verdict.value, verdict.expanded_uncertainty
    if verdict.verdict is VerdictWord.NOT_MEASURED:
        value, spread = None, None  # what is known of it decides nothing
    number = isinstance(value, Decimal)
    text = VerdictText(
        clause=verdict.clause,
        title=verdict.title,
        source=verdict.source,
        basis=BASIS_WORDS[verdict.basis],
        word=VERDICT_WORDS[verdict.verdict],
        mark=MARKS[verdict.verdict],
        value=_value_text(dataclasses.replace(verdict, value=value), decimals),
        uncertainty=f"±\u00a0{_uncertainty_text(spread, decimals)}" if spread and number else "",
        unit=verdict.unit if value is not None else "",
        limit=_limit_text(verdict.limit, verdict.comparison, decimals),
        margin=shown_margin(verdict.margin, decimals)
        if verdict.margin is not None and number
        else "",
        ruler="",
        note=verdict.note,
    )
    return dataclasses.replace(
        text, ruler=verdict_ruler(verdict, text, palette), steps=_steps(verdict, text, decimals)
    )


def _value_decimals(verdict: Verdict) -> int:
    """Decimals of the value: by its uncertainty, and enough to tell it from its limits."""
    decimals = _decimals(verdict.expanded_uncertainty, verdict.quantity)
    if not isinstance(verdict.value, Decimal):
        return decimals
    return telling_decimals(verdict.value, limits_in(verdict.limit), decimals)


def _value_text(verdict: Verdict, decimals: int) -> str:
    value = verdict.value
    if value is None or isinstance(value, str):
        return value or ""
    if verdict.basis is Basis.DECLARED:
        return declared_text(value, limits_in(verdict.limit))
    return shown(value, decimals)


def _limit_text(limit: Decimal | str | None, comparison: str, decimals: int) -> str:
    if limit is None:
        return ""
    sign = COMPARISON_SIGNS.get(comparison, comparison)
    if isinstance(limit, str):
        ends = range_text(limit)
        return ends if comparison == "within" else f"{sign}\u00a0{ends}"
    return f"{sign}\u00a0{_limit_number(limit, decimals)}"


def _limit_number(limit: Decimal, decimals: int) -> str:
    short = decimals_of(limit) <= _LONGEST_EXACT
    return exact_text(limit) if short else shown(limit, max(decimals, 2))


def _steps(verdict: Verdict, text: VerdictText, decimals: int) -> tuple[str, ...]:
    """The way to the verdict, with the digits of the table and the names of the catalogue."""
    known: dict[Decimal, str] = {}
    if isinstance(verdict.limit, Decimal):
        known[verdict.limit] = _limit_number(verdict.limit, decimals)
    if verdict.margin is not None and text.margin:
        known[verdict.margin] = text.margin.removeprefix("+")
    if isinstance(verdict.value, Decimal):
        known[verdict.value] = text.value
    if verdict.expanded_uncertainty and text.uncertainty:
        known[verdict.expanded_uncertainty] = text.uncertainty.removeprefix("±\u00a0")
    return tuple(in_words(step, decimals, known) for step in verdict.steps)


def in_words(text: str, decimals: int, known: Mapping[Decimal, str] | None = None) -> str:
    """Make a sentence of the trace fit for readers: short numbers, names instead of columns.

    Parameters
    ----------
    text
        The sentence.
    decimals
        Least decimals of its numbers.
    known
        Numbers that are written in a certain way.
    """
    return _NAME.sub(
        lambda match: told(QUANTITIES[match[0]].label) if match[0] in QUANTITIES else match[0],
        readable(text, decimals, known),
    )


def severest(verdicts: Iterable[Verdict]) -> Verdict | None:
    """Give the severest of some verdicts, of equal ones the closest to its limit."""
    far = Distance(float("inf"))
    return min(
        verdicts,
        key=lambda item: (_SEVERITY.index(item.verdict), (distance_of(item) or far).margin),
        default=None,
    )


def count_texts(counts: dict[VerdictWord, int]) -> tuple[VerdictCount, ...]:
    """Write how many verdicts there are of each word, the severest first."""
    return tuple(
        VerdictCount(
            verdict_count(word, counts.get(word, 0)), MARKS[word], str(counts.get(word, 0))
        )
        for word in _SEVERITY
    )


def verdict_count(word: VerdictWord, count: int) -> str:
    """Write how many verdicts of a word; English has no plural of it, other languages have."""
    return {
        VerdictWord.PASS: say_counted("{count} pass", "{count} pass", count),
        VerdictWord.FAIL: say_counted("{count} fail", "{count} fail", count),
        VerdictWord.INCONCLUSIVE: say_counted(
            "{count} inconclusive", "{count} inconclusive", count
        ),
        VerdictWord.NOT_MEASURED: say_counted(
            "{count} not measured", "{count} not measured", count
        ),
        VerdictWord.NOT_APPLICABLE: say_counted(
            "{count} not applicable", "{count} not applicable", count
        ),
    }[word]
