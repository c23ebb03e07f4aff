"""Lamps as the suppliers declare them, and the units (samples) that were measured."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import date
from decimal import Decimal

__all__ = ["Lamp", "Offer", "Unit"]


@dataclass(frozen=True, slots=True)
class Offer:
    """What the bidder asks, and the report the bid rests on; ``None`` where not given.

    ``report_model``, ``report_laboratory`` and ``report_accreditation`` are what the report says
    of itself; empty text where not given.
    """

    unit_price: Decimal | None = None
    currency: str | None = None
    quantity: int | None = None
    report_no: str | None = None
    report_date: date | None = None
    report_model: str = ""
    report_laboratory: str = ""
    report_accreditation: str = ""


@dataclass(frozen=True, slots=True)
class Lamp:
    """One lamp model: identity, kind, declared values, offer.

    Parameters
    ----------
    lamp_id, bidder, model, cap, technology
        Identity as written in ``lamps.csv``; empty text where not given.
    directional, mains, connected, colour_tuneable, high_luminance
        Kind of light source in the sense of EU 2019/2015 and 2019/2020; ``None`` where not
        stated.
    anti_glare_shield, dimmable
        Further properties that an act asks for; ``None`` where not stated.
    reflector
        Type of reflector lamp that it claims to replace, as EU 2019/2015 Annex V Table 4 names
        it, for instance ``MR16_GU5_3``; empty text where none.
    claimed_exemptions
        Ids of exemptions of the law book that the supplier claims.
    lot
        Lot of the tender; empty text where there is but one.
    placed_on_market
        Date of placing on the market, or ``None``.
    declared
        Catalogue quantity -> declared value, exact as written. The declared luminous flux of a
        directional lamp is its useful flux (EU 2019/2015 Annex I(15)) and stands under
        ``useful_luminous_flux_lm``; that of any other lamp under ``luminous_flux_lm``.
    declared_energy_class
        Declared energy efficiency class, or ``None``.
    offer
        Price and report.
    row
        Row of ``lamps.csv``.
    """

    lamp_id: str
    bidder: str
    model: str
    cap: str = ""
    technology: str = ""
    directional: bool | None = None
    mains: bool | None = None
    connected: bool | None = None
    colour_tuneable: bool | None = None
    high_luminance: bool | None = None
    anti_glare_shield: bool | None = None
    dimmable: bool | None = None
    reflector: str = ""
    claimed_exemptions: tuple[str, ...] = ()
    lot: str = ""
    placed_on_market: date | None = None
    declared: Mapping[str, Decimal] = field(default_factory=dict)
    declared_energy_class: str | None = None
    offer: Offer = field(default_factory=Offer)
    row: int = 0


@dataclass(frozen=True, slots=True)
class Unit:
    """One measured unit of a lamp, with the figures its laboratory reports ready-made.

    Parameters
    ----------
    unit_id, lamp_id
        Identity.
    reported
        Catalogue quantity -> value, exact as written in ``units.csv``.
    expanded_uncertainty
        Catalogue quantity -> expanded uncertainty (k = 2) from the ``u_`` column.
    row
        Row of ``units.csv``; 0 for a unit that only raw files name.
    """

    unit_id: str
    lamp_id: str
    reported: Mapping[str, Decimal] = field(default_factory=dict)
    expanded_uncertainty: Mapping[str, Decimal] = field(default_factory=dict)
    row: int = 0
