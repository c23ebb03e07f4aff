"""Harmonic current limits of lighting equipment, class C.

Source: iec_61000_3_2, class C. Tables come from the law book, by edition and power.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from generator.conformity.evidence import Evidence
from generator.conformity.exact_number import decimal_of, number_text
from generator.conformity.limits import Question
from generator.conformity.ruling import Ruling, not_measured
from generator.quantities import QUANTITIES
from generator.records.clause import DatedValue
from generator.records.verdict import VerdictWord

__all__ = ["TableResult", "harmonic_currents", "judged_table", "table_limits"]

NEEDS_WAVEFORM = "option_b"
"""The option whose angles of the current cannot be told from harmonics alone."""

_PER_ORDER = "odd_ma_per_w_times_order"


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
    absent
        Figures that are missing.
    """

    met: bool | None
    quantity: str = ""
    value: Fraction | None = None
    limit: Fraction | None = None
    absent: tuple[str, ...] = ()


def table_limits(table: DatedValue) -> dict[str, Fraction]:
    """Catalogue quantity -> limit, with the orders that a rule gives written out.

    Parameters
    ----------
    table
        Limits by catalogue name; a limit per order as a number to be divided by the order.

    Returns
    -------
    dict
        Every limit of the table.

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


def judged_table(evidence: Evidence, table: DatedValue) -> TableResult:
    """Compare the harmonics of a lamp with one table.

    Parameters
    ----------
    evidence
        Determined figures.
    table
        The limits; a value on its limit meets it.

    Returns
    -------
    TableResult
        With the figure that decides.
    """
    limits = table_limits(table)
    readings = {name: evidence.reading(name).value for name in limits}
    known = {name: value for name, value in readings.items() if value is not None}
    absent = tuple(name for name in limits if name not in known)
    if not known:
        return TableResult(None, absent=absent)
    worst = max(known, key=lambda name: known[name] / limits[name])
    met: bool | None = known[worst] <= limits[worst]
    if met and absent:
        met = None
    return TableResult(met, worst, known[worst], limits[worst], absent)


def harmonic_currents(question: Question) -> Ruling:
    """Rule on the harmonic currents: one table, or one of several options.

    Parameters
    ----------
    question
        Clause and lamp; the roles of the constants are the options.

    Returns
    -------
    Ruling
        Pass where one option holds; inconclusive where the only one left needs the waveform.

    Notes
    -----
    Source: iec_61000_3_2, class C, Tables 2 and 3 and the options of clause 7.4.3.
    """
    results = {
        role: judged_table(question.evidence, question.constants(role))
        for role in question.clause.constants
    }
    steps = tuple(_table_step(role, result) for role, result in results.items())
    whole = {role: item for role, item in results.items() if role != NEEDS_WAVEFORM}
    met = next((role for role, item in whole.items() if item.met), None)
    if met is not None:
        return _ruled(VerdictWord.PASS, whole[met], _met_note(met, len(results)), steps)
    if any(item.met is None for item in whole.values()):
        absent = sorted({name for item in whole.values() for name in item.absent})
        shown = ", ".join(absent[:3]) + (" and others" if len(absent) > 3 else "")
        return not_measured(f"not measured: {shown}").with_steps_before(steps)
    nearest = min(whole.values(), key=_excess)
    left = results.get(NEEDS_WAVEFORM)
    if left is not None and left.met is not False:
        note = (
            "Options A and C do not hold. Option B is not decidable without the waveform of the "
            "current."
        )
        return _ruled(VerdictWord.INCONCLUSIVE, nearest, note, steps)
    return _ruled(VerdictWord.FAIL, nearest, "", steps)


def _excess(result: TableResult) -> Fraction:
    if result.value is None or not result.limit:
        return Fraction(0)
    return result.value / result.limit


def _met_note(role: str, count: int) -> str:
    return f"Met by {_words(role)}." if count > 1 else ""


def _words(role: str) -> str:
    stem, _, letter = role.rpartition("_")
    return f"{stem} {letter.upper()}" if stem else role


def _ruled(word: VerdictWord, result: TableResult, note: str, steps: tuple[str, ...]) -> Ruling:
    value, limit = result.value, result.limit
    return Ruling(
        word,
        value=None if value is None else decimal_of(value),
        limit=None if limit is None else decimal_of(limit),
        margin=None if value is None or limit is None else decimal_of(limit - value),
        quantity=result.quantity,
        unit=QUANTITIES[result.quantity].unit if result.quantity else None,
        notes=(note,) if note else (),
        steps=steps,
    )


def _table_step(role: str, result: TableResult) -> str:
    name = _words(role).capitalize() if role != "table" else "Table"
    if result.value is None or result.limit is None:
        return f"{name}: not measured."
    figure = QUANTITIES[result.quantity]
    word = {True: "every limit met", False: "not met", None: "figures missing"}[result.met]
    return (
        f"{name}: nearest to its limit is the {figure.label} with {number_text(result.value)} "
        f"{figure.unit} of {number_text(result.limit)} {figure.unit}: {word}."
    )
