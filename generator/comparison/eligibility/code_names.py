"""Code names for bids, so that the technical part can be read without knowing the bidder."""

from __future__ import annotations

import hashlib
from collections.abc import Mapping, Sequence
from types import MappingProxyType

from generator.language import say
from generator.records.lamp import Lamp
from generator.records.tender_settings import TenderTable

__all__ = ["bidder_codes", "coded_names", "shown_names", "under_codes"]


def shown_names(lamps: Sequence[Lamp], tender: TenderTable) -> Mapping[str, str]:
    """How each bid is shown.

    Parameters
    ----------
    lamps
        The lamps that are bids, in any order.
    tender
        ``[tender]``: whether code names are used, whether the technical part is closed, the
        seed.

    Returns
    -------
    mapping
        lamp_id -> ``bidder, model``; or, under code names, one code per bidder and a number per
        lamp (``Bidder B, lamp 2``). The codes follow a digest of seed and name, so they say
        nothing of file order or alphabet. Lamps without a bidder have a code each.
    """
    if not under_codes(tender):
        names = {lamp.lamp_id: ", ".join(filter(None, (lamp.bidder, lamp.model))) for lamp in lamps}
        return MappingProxyType({lamp_id: name or lamp_id for lamp_id, name in names.items()})
    return coded_names(lamps, tender)


def coded_names(lamps: Sequence[Lamp], tender: TenderTable) -> Mapping[str, str]:
    """The code name of each bid, whether or not code names are in force.

    Parameters
    ----------
    lamps
        The lamps that are bids, in any order.
    tender
        ``[tender]``; its seed mixes the order.

    Returns
    -------
    mapping
        lamp_id -> for instance ``Bidder B, lamp 2``.
    """
    codes = bidder_codes(lamps, tender)
    shown: dict[str, str] = {}
    counted = dict.fromkeys(codes.values(), 0)
    for lamp_id in sorted(codes, key=lambda lamp_id: _digest(lamp_id, tender.seed)):
        code = codes[lamp_id]
        counted[code] += 1
        shown[lamp_id] = say("Bidder {code}, lamp {number}", code=code, number=counted[code])
    return MappingProxyType(shown)


def under_codes(tender: TenderTable) -> bool:
    """Whether bids are shown under code names now."""
    return tender.code_names and not tender.technical_part_closed


def bidder_codes(lamps: Sequence[Lamp], tender: TenderTable) -> Mapping[str, str]:
    """The code of each bidder, whether or not code names are in force.

    Parameters
    ----------
    lamps
        The lamps that are bids, in any order.
    tender
        ``[tender]``; its seed mixes the order.

    Returns
    -------
    mapping
        lamp_id -> ``A``, ``B`` and so on, one code per bidder.
    """
    groups: dict[str, list[str]] = {}
    for lamp in lamps:
        groups.setdefault(lamp.bidder or f"\x00{lamp.lamp_id}", []).append(lamp.lamp_id)
    order = sorted(groups, key=lambda name: _digest(name, tender.seed))
    codes = {
        lamp_id: _letters(place) for place, name in enumerate(order) for lamp_id in groups[name]
    }
    return MappingProxyType(codes)


def _digest(name: str, seed: int) -> str:
    return hashlib.sha256(f"{seed}\x1f{name}".encode()).hexdigest()


def _letters(place: int) -> str:
    """A, B, ... Z, AA, AB and so on."""
    text = ""
    place += 1
    while place:
        place, rest = divmod(place - 1, 26)
        text = chr(ord("A") + rest) + text
    return text
