"""The front of the room for tenders: bids in, lots with costs, ranks and certainty out."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from decimal import Decimal

from generator.comparison.award.ranking import Candidate, award
from generator.comparison.certainty.ranks import Gated, certainty
from generator.comparison.certainty.scene import Entry, Scene
from generator.comparison.cost.basis import (
    LampBasis,
    existing_basis,
    lamp_basis,
    use_gaps,
    use_numbers,
)
from generator.comparison.cost.study import (
    break_even,
    cost_study,
    equal_light,
    lamp_count,
    light_needed_lm,
    tornado,
)
from generator.comparison.eligibility.code_names import (
    bidder_codes,
    coded_names,
    shown_names,
    under_codes,
)
from generator.comparison.eligibility.gate import eligibility
from generator.comparison.eligibility.mandatory_clauses import mandatory
from generator.comparison.energy import energy_use
from generator.comparison.relamping import Winner, relamping_plan
from generator.comparison.tender_checks import tender_problems
from generator.errors import DataProblems
from generator.language import joined, say
from generator.quantities import QUANTITIES
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.finding import Finding
from generator.records.lamp import Lamp, Unit
from generator.records.tender import (
    AwardResult,
    Bid,
    BidResult,
    Certainty,
    LifeCycleCost,
    LotResult,
    Outcome,
    RelampingPlan,
    Tender,
)
from generator.records.tender_settings import TenderLot, TenderSettings
from generator.records.verdict import Verdict

__all__ = ["compare_tender"]

_BASELINE_NOTE = say(
    "The lamp in use today is costed like a bid, as if bought and fitted anew at the start; "
    "the saving and the break-even year hold that price too."
)


@dataclass(frozen=True, slots=True, eq=False)
class _Inputs:
    """What every lot needs: lamps by id, bids by lamp, and everything known of them."""

    lamps: Mapping[str, Lamp]
    bids: Mapping[str, Bid]
    unit_counts: Mapping[str, int]
    figures: FigureSet
    verdicts: Mapping[str, Sequence[Verdict]]
    findings: Mapping[str, Sequence[Finding]]
    settings: TenderSettings
    on: date
    shown: Mapping[str, str]
    codes: Mapping[str, str]
    coded: Mapping[str, str]
    gaps: tuple[str, ...]
    baselines: Mapping[str, LampBasis]

    def baseline_of(self, lot: TenderLot) -> LampBasis | None:
        """The lamp that the bids of a lot are compared with; ``None`` without one."""
        name = lot.baseline_lamp or self.settings.use.baseline_lamp
        return None if name is None else self.baselines[name]


def compare_tender(
    lamps: Sequence[Lamp],
    bids: Sequence[Bid],
    units: Sequence[Unit],
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    findings: Sequence[Finding],
    settings: TenderSettings,
    on: date,
) -> Tender:
    """Compare the bids of a tender, lot by lot.

    Parameters
    ----------
    lamps, units
        Lamps and measured units of the campaign; the baseline lamp is no bid.
    bids
        Lot and report of each lamp; a lamp without one is offered for the only lot.
    figures, verdicts, findings
        What the rooms before this one made of them.
    settings
        The tables of ``campaign.toml``.
    on
        Date of the assessment.

    Returns
    -------
    Tender
        The same for the same input, whatever the order of lamps and bids.

    Raises
    ------
    DataProblems
        If the inputs do not fit together; every problem names file and key.
    """
    problems = tender_problems(lamps, bids, settings)
    if problems:
        raise DataProblems(problems)
    inputs = _inputs(lamps, bids, units, figures, verdicts, findings, settings, on)
    lots = {lot.id: lot for lot in settings.lot} or {"": TenderLot(id="lot")}
    results = tuple(_lot(name, lot, inputs) for name, lot in lots.items())
    return Tender(
        lots=results,
        shown_as=inputs.shown,
        codes=inputs.codes,
        coded_names=inputs.coded,
        existing_titles=_existing_titles(inputs),
        under_codes=under_codes(settings.tender),
        plan=_plan(lots, results, inputs),
        notes=_notes(inputs),
    )


def _inputs(
    lamps: Sequence[Lamp],
    bids: Sequence[Bid],
    units: Sequence[Unit],
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    findings: Sequence[Finding],
    settings: TenderSettings,
    on: date,
) -> _Inputs:
    by_id = {lamp.lamp_id: lamp for lamp in sorted(lamps, key=lambda lamp: lamp.lamp_id)}
    given = {bid.lamp_id: bid for bid in bids}
    offered = [lamp for lamp in by_id.values() if lamp.lamp_id not in settings.baseline_lamps]
    counts: dict[str, int] = {}
    for unit in units:
        counts[unit.lamp_id] = counts.get(unit.lamp_id, 0) + 1
    judged: dict[str, list[Verdict]] = {}
    for verdict in verdicts:
        judged.setdefault(verdict.lamp_id, []).append(verdict)
    found: dict[str, list[Finding]] = {}
    for finding in findings:
        found.setdefault(finding.lamp_id, []).append(finding)
    return _Inputs(
        lamps=by_id,
        bids={lamp.lamp_id: given.get(lamp.lamp_id, Bid(lamp.lamp_id)) for lamp in offered},
        unit_counts=counts,
        figures=figures,
        verdicts=judged,
        findings=found,
        settings=settings,
        on=on,
        shown=shown_names(offered, settings.tender),
        codes=bidder_codes(offered, settings.tender),
        coded=coded_names(offered, settings.tender),
        gaps=use_gaps(settings.use),
        baselines={
            name: _known_lamp(name, by_id, figures, settings)
            for name in sorted(settings.baseline_lamps)
        },
    )


def _known_lamp(
    lamp_id: str, lamps: Mapping[str, Lamp], figures: FigureSet, settings: TenderSettings
) -> LampBasis:
    """A lamp of lamps.csv or of ``[[existing_lamp]]``."""
    for item in settings.existing_lamp:
        if item.id == lamp_id:
            return existing_basis(item)
    return lamp_basis(lamps[lamp_id], figures, settings.use)


def _lot(name: str, lot: TenderLot, inputs: _Inputs) -> LotResult:
    bids = [bid for bid in inputs.bids.values() if bid.lot == name]
    quantity, notes = _quantity(lot, bids, inputs)
    before = inputs.baseline_of(lot)
    baseline = None
    if before is not None and not inputs.gaps:
        baseline = cost_study(before, inputs.settings.use, quantity)
        if baseline is not None:
            notes = (*notes, _BASELINE_NOTE)
        else:
            missing = joined(", ", before.missing)
            without = say("No cost of the baseline lamp: {missing} not known.", missing=missing)
            notes = (*notes, without)
    bases = {
        bid.lamp_id: lamp_basis(inputs.lamps[bid.lamp_id], inputs.figures, inputs.settings.use)
        for bid in bids
    }
    results = [_bid(bid, bases[bid.lamp_id], lot, quantity, baseline, inputs) for bid in bids]
    ranking = _award(results, inputs)
    sure = _certainty(results, bases, ranking, lot, quantity, inputs)
    places = {item.lamp_id: place for place, item in enumerate(ranking.scores)} if ranking else {}
    results.sort(key=lambda item: (places.get(item.bid.lamp_id, 0), item.shown_as))
    return LotResult(
        lot=name,
        title=lot.title,
        quantity=quantity,
        bids=tuple(results),
        award=ranking,
        certainty=sure,
        baseline=baseline,
        baseline_lamp="" if before is None else before.lamp_id,
        notes=notes,
    )


def _quantity(lot: TenderLot, bids: Sequence[Bid], inputs: _Inputs) -> tuple[int, tuple[str, ...]]:
    """Light points of a lot: as the lot says, else as all bids say alike, else one."""
    if lot.quantity is not None:
        return lot.quantity, ()
    offered = {inputs.lamps[bid.lamp_id].offer.quantity for bid in bids}
    (common, *others) = offered or {None}
    if not others and common:
        return common, (
            say("The lot states no quantity; all bids offer the same one, which is taken."),
        )
    return 1, (say("The lot states no quantity; costs are for one lamp."),)


def _bid(
    bid: Bid,
    basis: LampBasis,
    lot: TenderLot,
    quantity: int,
    baseline: LifeCycleCost | None,
    inputs: _Inputs,
) -> BidResult:
    lamp, use = inputs.lamps[bid.lamp_id], inputs.settings.use
    gate = eligibility(
        lamp,
        bid,
        lot,
        quantity,
        units=inputs.unit_counts.get(bid.lamp_id, 0),
        figures=inputs.figures,
        verdicts=inputs.verdicts.get(bid.lamp_id, ()),
        findings=inputs.findings.get(bid.lamp_id, ()),
        tender=inputs.settings.tender,
        on=inputs.on,
    )
    lamps, needed = lamp_count(lot, basis, use, quantity)
    unit_price = lamp.offer.unit_price
    price = None if unit_price is None or lamps is None else unit_price * lamps
    withheld = _withheld(basis, lamps, inputs.gaps)
    if withheld or lamps is None:
        return BidResult(bid, inputs.shown[bid.lamp_id], gate, price, None, withheld=withheld)
    cost = cost_study(basis, use, lamps)
    return BidResult(
        bid,
        inputs.shown[bid.lamp_id],
        gate,
        price,
        cost,
        equal_light=None if cost is None else equal_light(cost, basis, use, needed),
        energy=energy_use(basis, use, lamps, inputs.baseline_of(lot), quantity),
        break_even=None if cost is None or baseline is None else break_even(cost, baseline),
        sensitivity=tornado(basis, use, lamps),
        withheld=() if basis.flux_lm else (say("cost per light: luminous flux is not known"),),
    )


def _withheld(basis: LampBasis, lamps: int | None, gaps: Sequence[str]) -> tuple[str, ...]:
    reasons: list[str] = [say("costs: {key} is not given", key=key) for key in gaps]
    reasons += [say("costs: {input} is not known", input=name) for name in basis.missing]
    if lamps is None and not reasons:
        reasons.append(say("costs: luminous flux is not known, the lot is compared at equal light"))
    return tuple(reasons)


def _criterion_figure(name: str, lamp_id: str, inputs: _Inputs) -> Figure | None:
    figure = inputs.figures.best(lamp_id, name) if name in QUANTITIES else None
    return figure if figure is not None and figure.number is not None else None


def _candidate(item: BidResult, inputs: _Inputs) -> Candidate:
    lamp_id, currency = item.bid.lamp_id, inputs.settings.use.currency or ""
    cost = None if item.cost is None else item.cost.total
    values: dict[str, Decimal | None] = {"life_cycle_cost": cost, "price": item.price}
    units = {"life_cycle_cost": currency, "price": currency}
    for criterion in inputs.settings.award.criteria:
        name = criterion.quantity
        if name not in units:
            figure = _criterion_figure(name, lamp_id, inputs)
            values[name] = None if figure is None else figure.number
            units[name] = QUANTITIES[name].unit
    outcome = item.eligibility.outcome
    declared = {
        name
        for name in values
        if (figure := _criterion_figure(name, lamp_id, inputs)) and figure.grade is Grade.DECLARED
    }
    return Candidate(
        lamp_id,
        values,
        units,
        item.price,
        cost,
        provisional=outcome is Outcome.TO_CLARIFY,
        barred=outcome.value if outcome is Outcome.NOT_ADMISSIBLE else "",
        declared=frozenset(declared),
    )


def _award(results: Sequence[BidResult], inputs: _Inputs) -> AwardResult | None:
    if not inputs.settings.award.criteria:
        return None
    return award([_candidate(item, inputs) for item in results], inputs.settings.award)


def _certainty(
    results: Sequence[BidResult],
    bases: Mapping[str, LampBasis],
    ranking: AwardResult | None,
    lot: TenderLot,
    quantity: int,
    inputs: _Inputs,
) -> Certainty | None:
    if ranking is None:
        return None
    ranked = [item.lamp_id for item in ranking.scores if item.rank is not None]
    if not ranked:
        return None
    settings = inputs.settings
    entries = tuple(
        _entry(item, bases[item.bid.lamp_id], inputs)
        for item in sorted(results, key=lambda item: item.bid.lamp_id)
        if item.bid.lamp_id in ranked
    )
    at_equal_light = lot.compare_at == "equal light"
    scene = Scene(
        entries,
        settings.award,
        None if inputs.gaps else use_numbers(settings.use),
        settings.use.years or 0,
        quantity,
        light_needed_lm(lot, quantity) if at_equal_light else None,
    )
    gated = [
        Gated(
            item.bid.lamp_id,
            item.eligibility,
            mandatory(inputs.verdicts.get(item.bid.lamp_id, ()), settings.tender, lot),
        )
        for item in results
    ]
    return certainty(scene, ranked, gated, settings.use, settings.tender)


def _entry(item: BidResult, basis: LampBasis, inputs: _Inputs) -> Entry:
    candidate = _candidate(item, inputs)
    figures = {}
    for criterion in inputs.settings.award.criteria:
        figure = _criterion_figure(criterion.quantity, item.bid.lamp_id, inputs)
        if figure is not None:
            figures[criterion.quantity] = figure
    values = {name: value for name, value in candidate.values.items() if value is not None}
    return Entry(item.bid.lamp_id, basis, values, figures)


def _plan(
    lots: Mapping[str, TenderLot], results: Sequence[LotResult], inputs: _Inputs
) -> RelampingPlan | None:
    settings = inputs.settings
    if not settings.room or inputs.gaps:
        return None
    winners = {item.lot: _winner(lots[item.lot], item, inputs) for item in results}
    existing = {
        room.existing_lamp: _known_lamp(room.existing_lamp, inputs.lamps, inputs.figures, settings)
        for room in settings.room
    }
    return relamping_plan(settings.room, winners, existing, settings.use)


def _winner(lot: TenderLot, result: LotResult, inputs: _Inputs) -> Winner:
    best = result.award.winners if result.award is not None else ()
    if result.award is None or len(best) != 1:
        return Winner(
            lot, None, say("no bid won the lot") if not best else say("first place is shared")
        )
    basis = lamp_basis(inputs.lamps[best[0]], inputs.figures, inputs.settings.use)
    return Winner(lot, basis, provisional=result.award.scores[0].provisional)


def _existing_titles(inputs: _Inputs) -> dict[str, str]:
    """How each lamp that burns today is called; under code names not by its bidder."""
    settings = inputs.settings
    titles = {item.id: item.title or item.id for item in settings.existing_lamp}
    hidden = under_codes(settings.tender)
    for name in (*sorted(settings.baseline_lamps), *(room.existing_lamp for room in settings.room)):
        lamp = inputs.lamps.get(name)
        if lamp is not None:
            titles[name] = say("The lamp in use today") if hidden else lamp.model or name
    return titles


def _notes(inputs: _Inputs) -> tuple[str, ...]:
    use, notes = inputs.settings.use, []
    if inputs.gaps:
        notes.append(say("No costs: {keys} not given.", keys=", ".join(inputs.gaps)))
    if use.carbon_price_per_t is None:
        notes.append(say("Emissions are not priced, since the tender does not say so."))
    if inputs.settings.room and inputs.gaps:
        notes.append(say("No relamping plan without costs."))
    return tuple(notes)
