"""The table of harmonic current limits that a lamp's verdict rests on, limit by limit.

Source: iec_61000_3_2, class C. The tables, and which of them counts when, stand in the law book.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date
from fractions import Fraction

from generator.conformity.applicability import applicability
from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.exact_number import decimal_of
from generator.conformity.exemptions import claimed_exemption
from generator.conformity.harmonics import (
    TableResult,
    deciding_role,
    judged_table,
    lower_limits,
    option_letter,
    share_of_limit,
    table_limits,
)
from generator.conformity.limits import Question, chosen_value, one_sided, plain_limit
from generator.language import joined, say
from generator.quantities import QUANTITIES
from generator.records.clause import BUYER, Clause, DatedValue, LawBook
from generator.records.figure import FigureSet
from generator.records.harmonic_table import HarmonicLimit, HarmonicTable
from generator.records.lamp import Lamp
from generator.records.verdict import Basis

__all__ = ["harmonic_table"]

_FORMULA = "harmonic_currents"
_HARMONIC = re.compile(r"h(?P<order>\d+)_(?P<unit>percent|ma_per_w)")
_ORDERS = range(2, 41)
_NO_TABLE = say("no table of harmonic limits is in force for such a lamp")
_APPLIES_WHERE = say("the clause applies where {condition}")
_UNKNOWN = say("it is not known which limits apply: {properties}")
_ORDER_WITHOUT_LIMIT = say("order {order} has no limit here: {reason}")


@dataclass(frozen=True, slots=True, eq=False)
class _Lamp:
    """One lamp before the law of one day."""

    evidence: Evidence
    law: LawBook
    day: date

    @property
    def record(self) -> LampRecord:
        return self.evidence.record

    def question(self, clause: Clause) -> Question | str:
        """The clause put to the lamp, or why it asks nothing of it."""
        lifted, _ = claimed_exemption(self.law, clause, self.record, self.day)
        fit = applicability(clause.applies, self.record)
        chosen = chosen_value(clause, self.record, self.day)
        if lifted:
            return lifted
        if fit.holds is False:
            return _APPLIES_WHERE.format(condition=fit.why)
        unknown = joined(", ", (text for text in (fit.why, chosen.unknown) if text))
        if unknown:
            return _UNKNOWN.format(properties=unknown)
        if chosen.value is None:
            return _NO_TABLE
        return Question(clause, chosen.value, self.evidence, self.law, self.day)

    def limit(self, quantity: str, comparison: str, limit: Fraction, status: str) -> HarmonicLimit:
        """One limit beside the figure of the lamp."""
        found = _HARMONIC.fullmatch(quantity)
        value = self.evidence.reading(quantity).value
        share = kept = None
        if value is not None:
            kept = one_sided(comparison, limit).meets(value)
            side = "at least" if comparison in {"at least", "above"} else "at most"
            share = decimal_of(share_of_limit(value, limit, side)) if limit else None
        return HarmonicLimit(
            quantity,
            QUANTITIES[quantity].unit,
            comparison,
            decimal_of(limit),
            status,
            int(found["order"]) if found else None,
            float(limit) if found and found["unit"] == "percent" else None,
            None if value is None else decimal_of(value),
            share,
            kept,
        )


def harmonic_table(
    lamp: Lamp, figures: FigureSet, law: LawBook, clauses: Sequence[Clause], on: date
) -> HarmonicTable:
    """Give the limits of the harmonic currents that count for one lamp.

    Parameters
    ----------
    lamp
        The lamp as declared.
    figures
        Figures of the campaign.
    law
        The law book.
    clauses
        The clauses that the campaign is judged by; where none of them is on harmonic currents,
        the table is that of the latest edition in force, and not judged.
    on
        Assessment date; for a lamp that states when it was placed on the market, that day counts.

    Returns
    -------
    HarmonicTable
        Of several options, the one that decides the verdict, or that is nearest to being met.

    Notes
    -----
    Source: iec_61000_3_2, class C, Tables 2 and 3 and the options of clause 7.4.3. A limit per
    watt is as many percent of the fundamental as limit times power over fundamental current.
    """
    day = lamp.placed_on_market or on
    case = _Lamp(Evidence(LampRecord(lamp, (), figures), Basis.DETERMINED), law, day)
    asked = [clause for clause in clauses if clause.formula == _FORMULA]
    offered = asked or [clause for clause in law.leaves if clause.formula == _FORMULA]
    answers = [case.question(clause) for clause in offered]
    questions = [answer for answer in answers if isinstance(answer, Question)]
    own = _plain_limits(case, (clause for clause in clauses if clause.status == BUYER))
    if not questions:
        reasons = [answer for answer in answers if isinstance(answer, str)]
        told = [reason for reason in reasons if reason != _NO_TABLE]
        table = HarmonicTable(reason=(told or reasons or [_NO_TABLE])[0], judged=bool(asked))
    else:
        latest = max(questions, key=lambda item: item.value.start or date.min)
        table = _table(case, latest, judged=bool(asked))
    return _converted(case, table, own)


def _table(case: _Lamp, question: Question, *, judged: bool) -> HarmonicTable:
    clause, value = question.clause, question.value
    if value.no_limit:
        source, status = value.source or clause.source, value.status or clause.status
        reason = value.note or say("no limit")
        return HarmonicTable(source.text, source.point, status, judged=judged, reason=reason)
    results = {
        role: judged_table(case.evidence, question.constants(role)) for role in clause.constants
    }
    deciding = deciding_role(results)
    role = deciding or min(results, key=lambda name: _nearness(results[name]))
    leaf, entries = case.law.constants[clause.constants[role]], question.constants(role)
    source, status = entries.source or leaf.source, entries.status or leaf.status
    beside = [
        item
        for item in case.law.leaves
        if item.regime == clause.regime and item.kind == "clause" and not item.formula
    ]
    notes: list[str] = []
    limits = [*_table_limits(case, entries, status), *_plain_limits(case, beside, notes)]
    return HarmonicTable(
        source=source.text,
        place=source.point,
        status=status,
        option=option_letter(role),
        decided=_decided(results),
        judged=judged,
        met=results[role].met,
        limits=tuple(limits),
        notes=tuple(notes),
    )


def _decided(results: Mapping[str, TableResult]) -> bool:
    found = [item.met for item in results.values()]
    return True in found or None not in found


def _nearness(result: TableResult) -> tuple[bool, Fraction]:
    return result.value is None, result.share


def _table_limits(case: _Lamp, entries: DatedValue, status: str) -> Iterator[HarmonicLimit]:
    for name, limit in table_limits(entries).items():
        yield case.limit(name, "at most", limit, status)
    for name, limit in lower_limits(entries).items():
        yield case.limit(name, "at least", limit, status)


def _plain_limits(
    case: _Lamp, clauses: Iterable[Clause], notes: list[str] | None = None
) -> list[HarmonicLimit]:
    """Limits on one order that are clauses of their own; why there is none goes to the notes."""
    found: list[HarmonicLimit] = []
    for clause in clauses:
        order = _HARMONIC.fullmatch(clause.quantity)
        question = case.question(clause) if order else ""
        if isinstance(question, str) or question.value.no_limit or order is None:
            continue
        limit = plain_limit(question)
        if limit.limits is None:
            if notes is not None:
                notes.append(_ORDER_WITHOUT_LIMIT.format(order=order["order"], reason=limit.reason))
            continue
        status = question.value.status or clause.status
        found += _sides(case, clause.quantity, limit.limits, status)
    return found


def _sides(case: _Lamp, quantity: str, limits: Limits, status: str) -> Iterator[HarmonicLimit]:
    if limits.upper is not None:
        word = "below" if limits.strict else "at most"
        yield case.limit(quantity, word, limits.upper, status)
    if limits.lower is not None:
        word = "above" if limits.strict else "at least"
        yield case.limit(quantity, word, limits.lower, status)


def _converted(case: _Lamp, table: HarmonicTable, own: Iterable[HarmonicLimit]) -> HarmonicTable:
    """Order the limits, and give those per watt in percent of the fundamental too."""
    limits = sorted((*table.limits, *own), key=lambda item: (item.order is None, item.order or 0))
    factor = None
    if any(item.unit == "mA/W" for item in limits):
        factor = _percent_per_ma_per_w(case.evidence)
    if factor is not None:
        limits = [
            replace(item, percent=float(item.limit) * factor) if item.unit == "mA/W" else item
            for item in limits
        ]
    return replace(table, limits=tuple(limits), percent_per_ma_per_w=factor)


def _percent_per_ma_per_w(evidence: Evidence) -> float | None:
    """Power over fundamental current, as the figures of the orders tell it both ways.

    Of one order, the current in percent of the fundamental over the current per watt is power
    over fundamental current; of the sums over all orders, so it is too, and rounded figures of
    small orders weigh little.
    """
    percent, per_watt = Fraction(0), Fraction(0)
    for order in _ORDERS:
        share = evidence.reading(f"h{order}_percent").value
        current = evidence.reading(f"h{order}_ma_per_w").value
        if share is not None and current is not None:
            percent, per_watt = percent + share, per_watt + current
    return float(percent / per_watt) if per_watt > 0 else None
