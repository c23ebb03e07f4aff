"""Every clause put to every lamp: figures and clauses in, verdicts out."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field, replace
from datetime import date

from generator.conformity.applicability import applicability
from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.exemptions import claimable_note, claimed_exemption
from generator.conformity.judged_value import reading_for, ruling_on, shown
from generator.conformity.law_figures import law_figures
from generator.conformity.limits import Chosen, Question, chosen_value
from generator.conformity.ruling import (
    Ruling,
    not_applicable,
    not_measured,
    unsettled,
    weighed,
)
from generator.conformity.scope import in_scope
from generator.language import Passage, joined, say, sentence
from generator.quantities import QUANTITIES
from generator.records.campaign import Campaign
from generator.records.clause import BUYER, Clause, DatedValue, LawBook
from generator.records.clause_words import all_of
from generator.records.figure import Figure, FigureSet
from generator.records.settings import Decision
from generator.records.verdict import (
    VERDICT_WORDS,
    Basis,
    Judgement,
    Verdict,
    VerdictWord,
)

__all__ = ["DECLARABLE", "judge"]

DECLARABLE = frozenset(
    {
        "luminous_flux_lm",
        "useful_luminous_flux_lm",
        "power_w",
        "standby_power_w",
        "networked_standby_power_w",
        "cct_k",
        "ra",
        "r9",
        "displacement_factor",
        "pst_lm",
        "svm",
        "l70b50_h",
        "beam_angle_deg",
        "peak_intensity_cd",
        "survival_factor",
        "lumen_maintenance_factor",
        "sdcm",
        "equivalent_power_w",
        "efficacy_lm_per_w",
        "total_mains_efficacy_lm_per_w",
        "energy_efficiency_class",
        "max_power_w",
        "energy_kwh_per_1000h",
    }
)
"""Quantities that a supplier declares, or that follow from what he declares."""

_LAW_OF_PLACING = say("Law of {day}, the date of placing on the market")
_LAW_OF_ASSESSMENT = say("Law of {day}, the date of the assessment")
_UNDATED = say("No date of placing on the market; law of {day}.")


@dataclass(frozen=True, slots=True, eq=False)
class _Case:
    """One lamp before the law of one day; scopes already looked at are kept."""

    law: LawBook
    decision: Decision
    record: LampRecord
    day: date
    outside: dict[str, str] = field(default_factory=dict)

    def outside_scope(self, clause: Clause) -> str:
        """Why the act does not cover the lamp; empty where it does, or may."""
        if clause.scope not in self.outside:
            self.outside[clause.scope] = _outside_scope(self, clause.scope)
        return self.outside[clause.scope]


def judge(
    campaign: Campaign,
    figures: FigureSet,
    law: LawBook,
    clauses: Sequence[Clause],
    on: date,
) -> Judgement:
    """Put every clause to every lamp.

    Parameters
    ----------
    campaign
        Lamps, units and the decision rule.
    figures
        All figures: declared, of each unit, means over the units.
    law
        The whole law book, for constants, scope and exemptions.
    clauses
        The clauses to judge: those of the chosen regimes, and the buyer's own.
    on
        Assessment date; the law of this day counts for a lamp that states no date of placing
        on the market.

    Returns
    -------
    Judgement
        Verdicts, lamp by lamp in clause order, and the figures that the law defines.
    """
    verdicts: list[Verdict] = []
    defined: list[Figure] = []
    for lamp in campaign.lamps:
        unit_ids = tuple(unit.unit_id for unit in campaign.units_of(lamp.lamp_id))
        record = LampRecord(lamp, unit_ids, figures)
        case = _Case(law, campaign.settings.decision, record, lamp.placed_on_market or on)
        buyers_case = replace(case, day=on, outside={})
        defined.extend(law_figures(record, law, case.day))
        for clause in clauses:
            verdicts.extend(_verdicts(buyers_case if clause.status == BUYER else case, clause))
    return Judgement(tuple(verdicts), tuple(defined))


def _verdicts(case: _Case, clause: Clause) -> Iterator[Verdict]:
    chosen = chosen_value(clause, case.record, case.day)
    for basis in Basis:
        if basis in clause.bases and _worth_judging(clause, basis):
            evidence = Evidence(case.record, basis)
            ruling = _ruling(case, clause, chosen, evidence)
            yield _verdict(case, clause, chosen.value, basis, ruling)


def _worth_judging(clause: Clause, basis: Basis) -> bool:
    only_declared = clause.quantity in {"l70b50_h", "equivalent_power_w"}
    if basis is Basis.DETERMINED:
        return not only_declared
    return clause.quantity in DECLARABLE


def _excluded(case: _Case, clause: Clause) -> str:
    """Why the clause does not ask anything of the lamp; empty where it does."""
    outside = case.outside_scope(clause)
    if outside:
        return outside
    if clause.claim and Evidence(case.record, Basis.DECLARED).reading(clause.claim).value is None:
        return say("the supplier makes no such claim")
    return claimed_exemption(case.law, clause, case.record, case.day)[0]


def _ruling(case: _Case, clause: Clause, chosen: Chosen, evidence: Evidence) -> Ruling:
    record, law, day = case.record, case.law, case.day
    fit = applicability(clause.applies, record)
    elsewhere = ""
    if fit.holds is False:
        elsewhere = say("the clause applies where {condition}", condition=fit.why)
    reason = _excluded(case, clause) or elsewhere or chosen.why
    if reason:
        return not_applicable(reason)
    unknown = joined(", ", (text for text in (fit.why, chosen.unknown) if text))
    if unknown or chosen.value is None:
        return _without_property(case, clause, evidence, unknown)
    question = Question(clause, chosen.value, evidence, law, day)
    _, refused = claimed_exemption(law, clause, record, day)
    ruling = ruling_on(question, case.decision).with_notes([refused, chosen.value.note])
    if ruling.word is VerdictWord.FAIL:
        ruling = ruling.with_notes([claimable_note(law, clause, record, day)])
    return weighed(ruling, chosen.value.status or clause.status)


def _outside_scope(case: _Case, scope_id: str) -> str:
    if not scope_id:
        return ""
    scope = case.law.clause(scope_id)
    if not scope.on(case.day):
        return ""
    window = case.law.constant(scope.constants["window"], case.day)
    if in_scope(case.record, window) is False:
        return say("every unit is outside the scope of {source}", source=scope.source.text)
    return ""


def _without_property(case: _Case, clause: Clause, evidence: Evidence, unknown: str) -> Ruling:
    reading = reading_for(clause, clause.quantity, evidence, case.law, case.day)
    reason = say(
        "whether or how the clause applies is open, for it is not known: {properties}",
        properties=unknown,
    )
    if clause.kind == "verification":
        nothing = not_measured(say("not declared, so there is nothing to verify"))
        return replace(nothing, value=shown(reading))
    if reading.value is None:
        both = joined(" ", (sentence(reading.reason), sentence(reason)))
        return replace(not_measured(reason), notes=(both,))
    return replace(unsettled(reason), value=shown(reading), steps=reading.steps)


def _in_force(value: DatedValue | None) -> str:
    """Which value of the clause counts, and since when."""
    if value is None or value.start is None:
        return ""
    where = all_of(item.text for item in value.when)
    if where:
        return say(
            "value in force from {day}, where {conditions}", day=value.start, conditions=where
        )
    return say("value in force from {day}", day=value.start)


def _law_of(case: _Case, value: DatedValue | None) -> str:
    """The day whose law counts and why, and the value of the clause that counts."""
    placed = case.record.lamp.placed_on_market == case.day
    law = (_LAW_OF_PLACING if placed else _LAW_OF_ASSESSMENT).format(day=case.day)
    since = _in_force(value)
    return sentence(say("{law}; {value}", law=law, value=since) if since else law)


def _sentences(notes: Iterable[str]) -> Iterator[str]:
    """Every sentence of some notes."""
    for note in notes:
        parts = note.parts if isinstance(note, Passage) and note.separator == " " else (note,)
        yield from (sentence(part) for part in parts)


def _why_not(ruling: Ruling) -> str:
    """Why a clause does not apply, with what else is to be known of that."""
    if not ruling.reason or len(ruling.notes) < 2:
        return ruling.reason
    return joined(". ", (ruling.reason, joined(" ", _sentences(ruling.notes[1:]))))


def _verdict(
    case: _Case, clause: Clause, value: DatedValue | None, basis: Basis, ruling: Ruling
) -> Verdict:
    dated = case.record.lamp.placed_on_market is not None or clause.status == BUYER
    source = (value.source if value is not None else None) or clause.source
    status = (value.status if value is not None else None) or clause.status
    if ruling.word is not VerdictWord.NOT_APPLICABLE:
        undated = "" if dated else _UNDATED.format(day=case.day)
        ruling = ruling.with_notes([clause.note, undated])
    return Verdict(
        lamp_id=case.record.lamp.lamp_id,
        clause=clause.id,
        title=clause.title,
        regime=clause.regime,
        quantity=ruling.quantity or clause.quantity,
        unit=QUANTITIES[clause.quantity].unit if ruling.unit is None else ruling.unit,
        basis=basis,
        value=ruling.value,
        expanded_uncertainty=ruling.expanded_uncertainty,
        limit=ruling.limit,
        comparison=ruling.comparison or clause.comparison,
        margin=ruling.margin,
        verdict=ruling.word,
        source=source.text,
        status=status,
        probability=ruling.probability,
        rule=ruling.rule,
        note=joined(" ", _sentences(ruling.notes)),
        steps=(
            _law_of(case, value),
            *ruling.steps,
            *(sentence(item) for item in ruling.notes),
            say("Verdict: {verdict}.", verdict=VERDICT_WORDS[ruling.word]),
        ),
        act=source.act,
        place=source.place,
        amending_act=source.amending_act,
        reason=_why_not(ruling),
    )
