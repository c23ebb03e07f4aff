"""Offers so low that they must be explained; none is excluded here."""

from __future__ import annotations

from collections.abc import Mapping
from decimal import Decimal

from generator.language import say
from generator.records.tender import LowOffer, Question

__all__ = ["FEWEST_OTHERS", "low_offers"]

FEWEST_OTHERS = 2
"""Other prices without which there is no mean to compare with; common practice, no source."""

_TEXT = say(
    "The price of your offer is well below the mean of the other offers for this lot. Please "
    "explain the price, for instance by the way the lamps are made, the conditions under which "
    "you buy them, or how they are delivered, and enclose what supports the explanation."
)


def low_offers(
    prices: Mapping[str, Decimal | None], threshold_percent: Decimal | None
) -> tuple[LowOffer, ...]:
    """Offers below the mean of the others by a threshold or more.

    Parameters
    ----------
    prices
        Bid -> price of all lamps [money]; bids without a price are left out.
    threshold_percent
        Distance below the mean of all other prices [percent]; ``None`` for no check.

    Returns
    -------
    tuple of LowOffer
        Lowest first. Source: eu_2014_24, article 69 (the bidder is asked before anything is
        decided; the act sets no figure; read in a transposition with the same wording).
    """
    known = {lamp_id: price for lamp_id, price in prices.items() if price is not None}
    if threshold_percent is None or len(known) <= FEWEST_OTHERS:
        return ()
    found = []
    for lamp_id, price in known.items():
        mean = (sum(known.values(), Decimal(0)) - price) / (len(known) - 1)
        if mean == 0:
            continue
        below = (1 - price / mean) * 100
        if below >= threshold_percent:
            question = Question(
                "abnormally-low",
                say("Price to be explained"),
                _TEXT,
                say(
                    "{price} against a mean of {mean:.2f}: {below:.1f} % below, to be explained "
                    "from {threshold} %",
                    price=price,
                    mean=mean,
                    below=below,
                    threshold=threshold_percent,
                ),
            )
            found.append(LowOffer(lamp_id, price, mean, below, question))
    return tuple(sorted(found, key=lambda item: (item.price, item.lamp_id)))
