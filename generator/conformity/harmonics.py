"""Harmonic current limits of lighting equipment, class C.

Source: iec_61000_3_2, class C. Tables come from the law book, by edition and power.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from fractions import Fraction

from generator.conformity.evidence import Evidence
from generator.conformity.exact_number import decimal_of
from generator.conformity.limits import Question, quantity_text
from generator.conformity.ruling import Ruling, not_measured
from generator.language import joined, say
from generator.quantities import QUANTITIES
from generator.records.clause import DatedValue
from generator.records.clause_words import compared_text
from generator.records.verdict import VerdictWord

__all__ = [
    "TableResult",
    "deciding_role",
    "harmonic_currents",
    "judged_table",
    "lower_limits",
    "option_letter",
    "share_of_limit",
    "table_limits",
]

NEEDS_WAVEFORM = "option_b"
"""The option whose angles of the current cannot be told from harmonics alone."""

_MOST_NAMED = 3
_FOUND = {
    True: say("every limit met"),
    False: say("not met"),
    None: say("figures missing"),
}

_PER_ORDER = "odd_ma_per_w_times_order"
_AT_LEAST = "_at_least"


@dataclass(frozen=True, slots=True)
class TableResult:
    """One table of limits against the harmonics of a lamp.

    Parameters
    ----------
    met
        Whether every limit is met; ``None`` where a figure is missing and none fails.
    quantity
        The figure that decides: the one nearest to its limit, in proportion.
    value, limit
        Its value and its limit.
    comparison
        ``at most``, or ``at least``.
    absent
        Figures that are missing.
    """

    met: bool | None
    quantity: str = ""
    value: Fraction | None = None
    limit: Fraction | None = None
    comparison: str = "at most"
    absent: tuple[str, ...] = ()

    @property
    def share(self) -> Fraction:
        """How much of the limit is used up; above one where it is not kept."""
        if self.value is None or not self.limit:
            return Fraction(0)
        return share_of_limit(self.value, self.limit, self.comparison)

    @property
    def margin(self) -> Fraction | None:
        """Distance to the limit, negative where it is not kept."""
        if self.value is None or self.limit is None:
            return None
        away = self.limit - self.value
        return away if self.comparison == "at most" else -away


def share_of_limit(value: Fraction, limit: Fraction, comparison: str) -> Fraction:
    """How much of a limit, not nought, a value uses up; above one where it is not kept."""
    # As a difference, for a lower limit may be met by a value of any size.
    away = value - limit if comparison == "at most" else limit - value
    return 1 + away / limit


def table_limits(table: DatedValue) -> dict[str, Fraction]:
    """Catalogue quantity -> upper limit, with the orders that a rule gives written out.

    Parameters
    ----------
    table
        Limits by catalogue name; a limit per order as a number to be divided by the order.

    Returns
    -------
    dict
        Every upper limit of the table.

    Notes
    -----
    Source: iec_61000_3_2, Table 3: from one order on, a constant over the order.
    """
    limits = {name: Fraction(table.number(name)) for name in table.entries if name in QUANTITIES}
    if _PER_ORDER in table.entries:
        product = Fraction(table.number(_PER_ORDER))
        first, last = int(table.number("odd_from_order")), int(table.number("odd_to_order"))
        limits |= {f"h{order}_ma_per_w": product / order for order in range(first, last + 1, 2)}
    return limits


def lower_limits(table: DatedValue) -> dict[str, Fraction]:
    """Catalogue quantity -> lower limit of a table."""
    return {
        name.removesuffix(_AT_LEAST): Fraction(table.number(name))
        for name in table.entries
        if name.endswith(_AT_LEAST)
    }


def judged_table(evidence: Evidence, table: DatedValue) -> TableResult:
    """Compare the harmonics of a lamp with one table.

    Parameters
    ----------
    evidence
        Determined figures.
    table
        The limits, upper ones by catalogue name, lower ones with ``_at_least`` behind it; a
        value on its limit meets it.

    Returns
    -------
    TableResult
        With the figure that decides.
    """
    limits = [(name, limit, "at most") for name, limit in table_limits(table).items()]
    limits += [(name, limit, "at least") for name, limit in lower_limits(table).items()]
    readings = {name: evidence.reading(name).value for name, _, _ in limits}
    absent = tuple(name for name, value in readings.items() if value is None)
    known = [
        TableResult(None, name, value, limit, comparison, absent)
        for name, limit, comparison in limits
        if (value := readings[name]) is not None
    ]
    if not known:
        return TableResult(None, absent=absent)
    worst = max(known, key=lambda item: item.share)
    if worst.share > 1:
        return replace(worst, met=False)
    return replace(worst, met=None if absent else True)


def harmonic_currents(question: Question) -> Ruling:
    """Rule on the harmonic currents: one table, or one of several options.

    Parameters
    ----------
    question
        Clause and lamp; the roles of the constants are the options.

    Returns
    -------
    Ruling
        Pass where one option holds; inconclusive where the only one left needs the waveform,
        and that was not captured.

    Notes
    -----
    Source: iec_61000_3_2, class C, Tables 2 and 3 and the options of clause 7.4.3.
    """
    results = {
        role: judged_table(question.evidence, question.constants(role))
        for role in question.clause.constants
    }
    steps = tuple(_table_step(role, result) for role, result in results.items())
    role = deciding_role(results)
    if role is None:
        whole = (item for role, item in results.items() if role != NEEDS_WAVEFORM)
        absent = sorted({name for item in whole for name in item.absent})
        return not_measured(_absent_text(absent)).with_steps_before(steps)
    if results[role].met:
        return _ruled(VerdictWord.PASS, results[role], _met_note(role, len(results)), steps)
    if _waveform_is_missing(results):
        note = joined(
            " ",
            (
                say("Options A and C do not hold."),
                say("Option B is not decidable without the waveform of the current."),
            ),
        )
        return _ruled(VerdictWord.INCONCLUSIVE, results[role], note, steps)
    return _ruled(VerdictWord.FAIL, results[role], "", steps)


def deciding_role(results: Mapping[str, TableResult]) -> str | None:
    """Say which of several tables decides.

    Parameters
    ----------
    results
        Role of a table -> its result.

    Returns
    -------
    str or None
        The first that is met, else the one nearest to being met, leaving out the one that needs
        the waveform where that was not captured; ``None`` where figures are missing.
    """
    met = next((role for role, item in results.items() if item.met), None)
    if met is not None:
        return met
    whole = {role: item for role, item in results.items() if role != NEEDS_WAVEFORM}
    if any(item.met is None for item in whole.values()):
        return None
    left = whole if _waveform_is_missing(results) else results
    return min(left, key=lambda role: left[role].share)


def _waveform_is_missing(results: Mapping[str, TableResult]) -> bool:
    left = results.get(NEEDS_WAVEFORM)
    return left is not None and left.met is None


def _met_note(role: str, count: int) -> str:
    return say("Met by option {letter}.", letter=option_letter(role)) if count > 1 else ""


def option_letter(role: str) -> str:
    """Letter of an option; empty for the role of a table that stands alone."""
    stem, _, letter = role.rpartition("_")
    return letter.upper() if stem else ""


def _absent_text(names: Sequence[str]) -> str:
    listed = ", ".join(names[:_MOST_NAMED])
    if len(names) > _MOST_NAMED:
        return say("not measured: {quantities} and others", quantities=listed)
    return say("not measured: {quantities}", quantities=listed)


def _ruled(word: VerdictWord, result: TableResult, note: str, steps: tuple[str, ...]) -> Ruling:
    value, limit, margin = result.value, result.limit, result.margin
    return Ruling(
        word,
        value=None if value is None else decimal_of(value),
        limit=None if limit is None else decimal_of(limit),
        margin=None if margin is None else decimal_of(margin),
        quantity=result.quantity,
        comparison=result.comparison,
        unit=QUANTITIES[result.quantity].unit if result.quantity else None,
        notes=(note,) if note else (),
        steps=steps,
    )


def _table_step(role: str, result: TableResult) -> str:
    letter = option_letter(role)
    name = say("Option {letter}", letter=letter) if letter else say("Table")
    if result.value is None or result.limit is None:
        return say("{table}: not measured.", table=name)
    figure = QUANTITIES[result.quantity]
    limit = compared_text(result.comparison, quantity_text(result.limit, figure.unit))
    return say(
        "{table}: nearest to its limit is the {quantity} with {value} against {limit}: {found}.",
        table=name,
        quantity=figure.label,
        value=quantity_text(result.value, figure.unit),
        limit=limit,
        found=_FOUND[result.met],
    )
