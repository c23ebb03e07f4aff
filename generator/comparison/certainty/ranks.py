"""How sure a ranking is: probability of each rank and outcome, and what drives the lead."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.comparison.certainty.draws import conforming, drawn_inputs
from generator.comparison.certainty.scene import Moved, Scene, SceneResult, evaluated
from generator.comparison.certainty.swaps import FURTHEST_PERCENT, swap_changes
from generator.language import numeral, say
from generator.records.tender import (
    BidCertainty,
    Certainty,
    Driver,
    Eligibility,
    Outcome,
    SwapChange,
)
from generator.records.tender_settings import TenderTable, TenderUse
from generator.records.verdict import Basis, Verdict, VerdictWord

__all__ = ["Gated", "certainty"]

Array = NDArray[np.float64]
_SMALLEST_SHARE = 0.005
_NOTES = (
    say("Measured figures vary by their uncertainty, which holds the spread of the units."),
    say(
        "Where no uncertainty is known, they vary by the spread over the root of the number of "
        "units."
    ),
    say("Life, tariff and price rise vary as [use] states."),
    say(
        "Not varied: declared values, prices offered, weights. Bids vary independently of each "
        "other."
    ),
    say(
        "Conformity is that of the true value: it meets a limit or does not, and never stays open."
    ),
    say(
        "What the shares of the inputs leave of the whole comes from steps and from inputs "
        "together."
    ),
    say(
        "Swaps are sought from {lowest} % to {highest} % of each input.",
        lowest=numeral(f"{FURTHEST_PERCENT[0]:+d}".replace("-", "\u2212")),
        highest=numeral(f"{FURTHEST_PERCENT[1]:+d}".replace("-", "\u2212")),
    ),
)


@dataclass(frozen=True, slots=True)
class Gated:
    """One bid with its outcome at the gate and its mandatory verdicts, by clause."""

    lamp_id: str
    eligibility: Eligibility
    clauses: Mapping[str, Sequence[Verdict]]

    @property
    def uncertain(self) -> dict[str, Verdict]:
        """Clause -> determined verdict that a probability of conformity goes with."""
        words = (VerdictWord.PASS, VerdictWord.FAIL, VerdictWord.INCONCLUSIVE)
        found = {}
        for clause, verdicts in self.clauses.items():
            others = [item for item in verdicts if item.basis is not Basis.DETERMINED]
            if any(item.verdict is VerdictWord.FAIL for item in others):
                continue
            for item in verdicts:
                known = item.basis is Basis.DETERMINED and item.probability is not None
                if known and item.verdict in words:
                    found[clause] = item
        return found


def certainty(
    scene: Scene,
    ranking: Sequence[str],
    gated: Sequence[Gated],
    use: TenderUse,
    tender: TenderTable,
) -> Certainty:
    """How sure the ranking of one lot is.

    Parameters
    ----------
    scene
        The lot with its ranked bids.
    ranking
        Their ids, best first.
    gated
        All bids of the lot, ranked or not.
    use, tender
        ``[use]`` (uncertainties) and ``[tender]`` (seed, trials).

    Returns
    -------
    Certainty
        The same for the same seed, whatever the order of the bids.
        Source: jcgm_101, clause 7; jcgm_106, clause 7.
    """
    seed, trials = tender.seed, tender.trials
    met = {item.lamp_id: conforming(tuple(item.uncertain.values()), seed, trials) for item in gated}
    admitted = np.array([met[entry.lamp_id] for entry in scene.entries]).reshape(-1, trials)
    drawn = drawn_inputs(scene, use, seed, trials)
    result = evaluated(scene, drawn, trials, admitted)
    places = _places(result, admitted, scene.award.decimals)
    rows = {entry.lamp_id: row for row, entry in enumerate(scene.entries)}
    order = [*ranking, *sorted(item.lamp_id for item in gated if item.lamp_id not in rows)]
    outcomes = {item.lamp_id: _outcomes(item, met[item.lamp_id]) for item in gated}
    bids = tuple(
        _bid(lamp_id, rows.get(lamp_id), places, result, outcomes[lamp_id]) for lamp_id in order
    )
    swaps: tuple[SwapChange, ...] = ()
    drivers: tuple[Driver, ...] = ()
    if len(ranking) > 1:
        swaps = swap_changes(scene, ranking[0], ranking[1])
        lead = result.totals[rows[ranking[0]]] - result.totals[rows[ranking[1]]]
        drivers = _drivers(drawn, lead)
    return Certainty(seed, trials, bids, swaps, drivers, _NOTES)


def _places(result: SceneResult, admitted: NDArray[np.bool_], decimals: int) -> NDArray[np.int64]:
    """Rank of each bid in each trial, shared where equal; 0 where not admitted (bids, trials).

    Totals are rounded before they are compared, as in the award.
    """
    totals = np.round(result.totals, decimals)
    places = np.zeros(totals.shape, dtype=np.int64)
    for row in range(len(places)):
        own, tie = totals[row], result.tie_values[row]
        ahead = (totals > own) | ((totals == own) & (result.tie_values < tie))
        places[row] = np.where(admitted[row], 1 + np.sum(ahead & admitted, axis=0), 0)
    return places


def _outcomes(item: Gated, met: NDArray[np.bool_]) -> dict[Outcome, float]:
    """Probability of each outcome: what is certain at the gate, and what the draws say."""
    open_clauses = set(item.uncertain)
    fixed = {reason.clause for reason in item.eligibility.reasons} - open_clauses
    asked = {question.clause for question in item.eligibility.questions} - open_clauses
    share = 0.0 if fixed else float(np.mean(met))
    return {
        Outcome.ADMISSIBLE: 0.0 if asked else share,
        Outcome.TO_CLARIFY: share if asked else 0.0,
        Outcome.NOT_ADMISSIBLE: 1.0 - share,
    }


def _bid(
    lamp_id: str,
    row: int | None,
    places: NDArray[np.int64],
    result: SceneResult,
    outcomes: dict[Outcome, float],
) -> BidCertainty:
    count = len(places)
    if row is None:
        return BidCertainty(lamp_id, (0.0,) * count, 1.0, outcomes, None, None)
    own = places[row]
    ranks = tuple(float(np.mean(own == place)) for place in range(1, count + 1))
    low, high = np.quantile(result.totals[row], [0.025, 0.975])
    return BidCertainty(lamp_id, ranks, float(np.mean(own == 0)), outcomes, float(low), float(high))


def _drivers(drawn: Moved, lead: Array) -> tuple[Driver, ...]:
    """Squared correlation of each input with the lead, scaled to one where it exceeds that."""
    deviation = lead - np.mean(lead)
    whole = float(deviation @ deviation)
    if whole == 0:
        return ()
    shares = {}
    for key, values in drawn.items():
        moved = values - np.mean(values)
        own = float(moved @ moved)
        shares[key] = float(moved @ deviation) ** 2 / (own * whole) if own else 0.0
    scale = max(1.0, sum(shares[key] for key in sorted(shares)))
    found = [
        Driver(name, lamp_id, share / scale)
        for (name, lamp_id), share in shares.items()
        if share >= _SMALLEST_SHARE
    ]
    return tuple(sorted(found, key=lambda item: (-item.share, item.input, item.lamp_id)))
