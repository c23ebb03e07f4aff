"""How one figure or verdict came about, step by step, in words for a terminal or a page."""

from __future__ import annotations

import difflib
from collections.abc import Iterator, Mapping
from dataclasses import asdict, dataclass
from decimal import Decimal, localcontext
from typing import Any, Protocol

from generator.errors import UseError
from generator.quantities import QUANTITIES, quantity
from generator.records.assessment import Assessment
from generator.records.clause import BUYER, Clause, DatedValue
from generator.records.comparison import MethodLike
from generator.records.figure import Figure, Grade
from generator.records.verdict import Verdict

__all__ = ["Explanation", "Part", "UnknownTopic", "explain", "explanation_text"]


class UnknownTopic(UseError):  # noqa: N818 - it says what was asked for, and what there is
    """There is no such lamp, quantity or clause; the text carries the nearest name."""


class MethodFinder(Protocol):
    """Gives the method of an id, or ``None``."""

    def __call__(self, method_id: str, /) -> MethodLike | None:
        """The method of an id."""


@dataclass(frozen=True, slots=True)
class Part:
    """One part of an explanation: a heading and its lines."""

    heading: str
    lines: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Explanation:
    """How a figure or verdict came about.

    Parameters
    ----------
    lamp_id
        The lamp.
    topic
        Quantity or clause that was asked for.
    title
        What is explained, in words.
    parts
        The explanation, part by part.
    """

    lamp_id: str
    topic: str
    title: str
    parts: tuple[Part, ...]

    def plain(self) -> dict[str, Any]:
        """The explanation as plain data, fit for JSON."""
        return asdict(self)


def explain(
    assessment: Assessment,
    lamp_id: str,
    topic: str,
    method: MethodFinder,
    sources: Mapping[str, str],
) -> Explanation:
    """Explain one figure or clause of one lamp.

    Parameters
    ----------
    assessment
        The assessment.
    lamp_id
        The lamp; letter case makes no difference.
    topic
        Catalogue quantity, or id of a clause.
    method
        Gives the method of a method id.
    sources
        Source key -> title of the document.

    Returns
    -------
    Explanation
        Inputs with file and row, intermediate values, formula in words, clause with source and
        date, rule, verdict.

    Raises
    ------
    UnknownTopic
        If there is no such lamp, quantity or clause.
    """
    lamp = _lamp(assessment, lamp_id)
    if topic in QUANTITIES:
        entry = quantity(topic)
        judged = [item for item in assessment.verdicts_of(lamp) if item.quantity == topic]
        parts = (
            *_figure_parts(assessment, lamp, topic, method, sources),
            *_judged_parts(assessment, judged),
        )
        return Explanation(lamp, topic, f"{entry.label} of {lamp}", parts)
    verdicts = [item for item in assessment.verdicts_of(lamp) if item.clause == topic]
    if not verdicts:
        raise UnknownTopic(_no_topic(assessment, lamp, topic))
    clause = next((item for item in assessment.clauses if item.id == topic), None)
    names = [item.quantity for item in verdicts] + list(clause.inputs if clause else ())
    parts = tuple(_judged_parts(assessment, verdicts))
    for name in _figures_of(assessment, lamp, names):
        parts += tuple(_figure_parts(assessment, lamp, name, method, sources))
    return Explanation(lamp, topic, f"{verdicts[0].title}: {lamp}", parts)


def explanation_text(explanation: Explanation) -> str:
    """Set an explanation as text for a terminal.

    Parameters
    ----------
    explanation
        The explanation.

    Returns
    -------
    str
        Headings with their lines indented below them.
    """
    blocks = [
        "\n".join([part.heading, *(f"  {line}" for line in part.lines)])
        for part in explanation.parts
    ]
    return "\n\n".join([explanation.title, *blocks])


def _lamp(assessment: Assessment, lamp_id: str) -> str:
    known = {lamp.lamp_id.casefold(): lamp.lamp_id for lamp in assessment.campaign.lamps}
    if lamp_id.casefold() in known:
        return known[lamp_id.casefold()]
    near = difflib.get_close_matches(lamp_id.casefold(), known, n=1)
    hint = (
        f" Did you mean {known[near[0]]}?" if near else f" There are: {', '.join(known.values())}."
    )
    raise UnknownTopic(f"The campaign has no lamp {lamp_id!r}.{hint}")


def _no_topic(assessment: Assessment, lamp_id: str, topic: str) -> str:
    clauses = list(dict.fromkeys(item.clause for item in assessment.verdicts_of(lamp_id)))
    near = difflib.get_close_matches(topic.casefold(), [*QUANTITIES, *clauses], n=3, cutoff=0.5)
    hint = f" Did you mean {' or '.join(near)}?" if near else ""
    return f"There is no quantity and no clause {topic!r}.{hint}"


def _figures_of(assessment: Assessment, lamp_id: str, names: list[str]) -> Iterator[str]:
    """The quantities to show: the useful flux of a lamp that is not directional is its flux."""
    lamp = next(item for item in assessment.campaign.lamps if item.lamp_id == lamp_id)
    plain = {} if lamp.directional else {"useful_luminous_flux_lm": "luminous_flux_lm"}
    yield from dict.fromkeys(plain.get(name, name) for name in names)


def _judged_parts(assessment: Assessment, verdicts: list[Verdict]) -> Iterator[Part]:
    """Every clause, followed by its verdicts."""
    known = {item.id: item for item in assessment.clauses}
    for clause_id in dict.fromkeys(item.clause for item in verdicts):
        if clause_id in known:
            yield _clause_part(known[clause_id])
        for item in verdicts:
            if item.clause == clause_id:
                yield Part(f"{item.title}, {item.basis} basis: {item.verdict}", item.steps)


def _value(figure: Figure) -> str:
    if figure.value is None:
        return figure.reason or "not measured"
    unit = quantity(figure.quantity).unit
    uncertainty = figure.expanded_uncertainty
    text = f"{_short(figure.value)} {unit}".rstrip()
    if isinstance(figure.value, str) or figure.grade is Grade.DECLARED:
        return text
    if uncertainty is None:
        return f"{text} (uncertainty not known)"
    text = f"{_as_sure(figure.value, uncertainty)} {unit}".rstrip()
    return f"{text} ± {_short(uncertainty, 2)} (k = 2)"


def _as_sure(value: Decimal, uncertainty: Decimal) -> str:
    """A value to one digit more than its uncertainty is given."""
    last = uncertainty.adjusted() - 2
    if not uncertainty or value.as_tuple().exponent >= last:  # type: ignore[operator]  # finite
        return _short(value)
    return format(value.quantize(Decimal(1).scaleb(min(0, last))), "f")


def _short(value: Decimal | str, digits: int = 7) -> str:
    """A value as it is written, or to so many digits where it has more."""
    if isinstance(value, str) or len(value.as_tuple().digits) <= digits:
        return str(value)
    with localcontext() as context:
        context.prec = digits
        return format((+value).normalize(), "f")


def _figure_parts(
    assessment: Assessment,
    lamp_id: str,
    name: str,
    method: MethodFinder,
    sources: Mapping[str, str],
) -> Iterator[Part]:
    found = assessment.figures.every(lamp_id, name)
    if not found:
        yield Part(f"{quantity(name).label}", ("The campaign holds no figure of it.",))
    for figure in found:
        yield Part(
            f"{quantity(name).label}, {figure.grade}",
            tuple(_figure_lines(assessment, figure, method, sources)),
        )


def _figure_lines(
    assessment: Assessment, figure: Figure, method: MethodFinder, sources: Mapping[str, str]
) -> Iterator[str]:
    yield f"Value: {_value(figure)}"
    if figure.value is None and figure.grade is Grade.REPORTED:
        return
    known = method(figure.method or figure.grade.value) or method(figure.grade.value)
    if known is not None:
        yield f"Method: {known.title} ({figure.method or figure.grade})."
        yield f"Formula: {known.formula}"
        yield f"Source: {sources.get(known.source, known.source)}, {known.clause}."
    if figure.units_count > 1:
        spread = "" if figure.spread is None else f"; standard deviation {_short(figure.spread, 3)}"
        yield f"Mean of {figure.units_count} units{spread}."
    units = [
        item
        for unit in assessment.campaign.units_of(figure.lamp_id)
        for item in assessment.figures.every(figure.lamp_id, figure.quantity, unit.unit_id)
        if item.grade is figure.grade
    ]
    if not units:
        yield from (f"Read from: {place}" for place in figure.origin)
    for item in units:
        yield f"{item.unit_id}: {_value(item)}; from {'; '.join(item.origin) or 'no file'}"
        yield from _input_lines(assessment, item, known.inputs if known else ())
    yield from (f"Note: {remark}" for remark in figure.remarks)


def _input_lines(assessment: Assessment, figure: Figure, inputs: tuple[str, ...]) -> Iterator[str]:
    for name in inputs:
        used = assessment.figures.measured(figure.lamp_id, name, figure.unit_id)
        if used is not None:
            yield f"    {quantity(name).label}: {_value(used)}, {used.grade}"


def _clause_part(clause: Clause) -> Part:
    lines = [
        f"Id: {clause.id}, of {clause.regime}",
        f"Source: {clause.source.text}",
        f"Status: {clause.status}"
        + (f", last looked up on {clause.checked_on.isoformat()}" if clause.checked_on else ""),
        f"Written in: {'campaign.toml' if clause.status == BUYER else f'lawbook/{clause.file}'}",
    ]
    lines += [f"{_when(value)}: {clause.says(value)}{_own(value)}" for value in clause.values]
    lines += [f"Constants: {constant}" for constant in clause.constants.values()]
    return Part(f"The clause: {clause.title}", tuple(lines))


def _own(value: DatedValue) -> str:
    """Source and status of a value, where they are not those of the clause."""
    parts = [value.source.text if value.source else "", value.status or ""]
    own = "; ".join(part for part in parts if part)
    return f" ({own})" if own else ""


def _when(value: DatedValue) -> str:
    """From when to when a value holds, and for which lamps."""
    start = f"From {value.start.isoformat()}" if value.start else "At all times"
    until = f" to {value.end.isoformat()}" if value.end else ""
    where = " and ".join(item.text for item in value.when)
    return f"{start}{until}{f', where {where}' if where else ''}"
