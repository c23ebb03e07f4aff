"""The table of harmonic current limits that counts for one lamp, beside its figures."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal

__all__ = ["HarmonicLimit", "HarmonicTable"]


@dataclass(frozen=True, slots=True)
class HarmonicLimit:
    """One limit of the table.

    Parameters
    ----------
    quantity, unit
        Catalogue name and unit of what is limited.
    comparison
        ``at most`` or ``at least``; ``below`` or ``above`` where a buyer asks so.
    limit
        The limit as it is stated.
    status
        How the limit is known, as on a clause.
    order
        Order of the harmonic; ``None`` for a distortion or an angle.
    percent
        The limit of an order in percent of the fundamental [percent]; ``None`` where it cannot
        be told.
    value
        The determined value of the lamp; ``None`` where there is none.
    share
        How much of the limit is used up, above one where it is not kept; ``None`` without a
        value. Of a lower limit: two less the value over the limit.
    kept
        Whether the value keeps the limit; ``None`` without a value.
    """

    quantity: str
    unit: str
    comparison: str
    limit: Decimal
    status: str
    order: int | None = None
    percent: float | None = None
    value: Decimal | None = None
    share: Decimal | None = None
    kept: bool | None = None

    @property
    def lower(self) -> bool:
        """Whether the value must not be less."""
        return self.comparison in {"at least", "above"}


@dataclass(frozen=True, slots=True)
class HarmonicTable:
    """The limits that the verdict on the harmonics of one lamp rests on.

    Parameters
    ----------
    source, place, status
        Where the table stands, the place alone without the act, and how its numbers are known;
        empty where no table counts.
    option
        Letter of the option; empty where the clause has one table alone.
    decided
        Whether the verdict on the table can be told; false where figures are missing for it.
    judged
        Whether the campaign is judged by the clause.
    met
        Whether the option or table itself is met, whatever a buyer asks beside it; ``None`` where
        figures are missing for it.
    limits
        Every limit of the table, those of orders by order, and those of a buyer.
    percent_per_ma_per_w
        One milliampere per watt in percent of the fundamental of this lamp [percent]; ``None``
        where it cannot be told, or where no limit is stated per watt.
    reason
        Why no table counts; empty where one does.
    notes
        Limits that could not be formed, and why.
    """

    source: str = ""
    place: str = ""
    status: str = ""
    option: str = ""
    decided: bool = True
    judged: bool = True
    met: bool | None = None
    limits: tuple[HarmonicLimit, ...] = ()
    percent_per_ma_per_w: float | None = None
    reason: str = ""
    notes: tuple[str, ...] = ()

    @property
    def worst(self) -> HarmonicLimit | None:
        """The limit of which the lamp uses up the largest share; ``None`` without a value."""
        known = [item for item in self.limits if item.share is not None]
        return max(known, key=lambda item: item.share or Decimal(0), default=None)
