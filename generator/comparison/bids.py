"""Bids as the campaign states them: the lot of a lamp, and what its report says of itself."""

from __future__ import annotations

from collections.abc import Collection, Sequence

from generator.records.lamp import Lamp
from generator.records.settings import Laboratory
from generator.records.tender import Bid

__all__ = ["bids_of"]


def bids_of(
    lamps: Sequence[Lamp], measured: Collection[str], laboratory: Laboratory
) -> tuple[Bid, ...]:
    """Gather the bids.

    Parameters
    ----------
    lamps
        The lamps of the campaign.
    measured
        Ids of the lamps of which the campaign has units.
    laboratory
        Who measured the campaign. Where a lamp was measured and its bid names no other
        laboratory, the report is taken to be that of the campaign.

    Returns
    -------
    tuple of Bid
        One per lamp, in the order of the lamps.
    """
    return tuple(_bid(lamp, laboratory, own=lamp.lamp_id in measured) for lamp in lamps)


def _bid(lamp: Lamp, laboratory: Laboratory, *, own: bool) -> Bid:
    offer = lamp.offer
    named, accreditation = offer.report_laboratory, offer.report_accreditation
    if own and named in ("", laboratory.name):
        named = laboratory.name
        accreditation = accreditation or laboratory.accreditation
    return Bid(lamp.lamp_id, lamp.lot, offer.report_model, named, accreditation)
