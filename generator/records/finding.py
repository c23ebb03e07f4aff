"""Findings: numbers of a campaign that do not belong together, and what would explain it."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from enum import StrEnum

__all__ = ["Finding", "Severity"]


class Severity(StrEnum):
    """How much a finding weighs; the members stand from the heaviest to the lightest.

    ``impossible``
        A law of physics or a definition forbids the number; no measurement can give it.
    ``contradiction``
        Two statements cannot both hold: they differ by more than their uncertainties, or by far
        more than the tolerance taken in their place.
    ``doubt``
        Unusual enough to be asked about before the numbers are relied on.
    ``remark``
        Good to know; most often there is an ordinary reason.
    """

    IMPOSSIBLE = "impossible"
    CONTRADICTION = "contradiction"
    DOUBT = "doubt"
    REMARK = "remark"

    @property
    def rank(self) -> int:
        """Place from the heaviest (0) to the lightest."""
        return list(Severity).index(self)


@dataclass(frozen=True, slots=True)
class Finding:
    """One thing that does not fit, said calmly: what, by how much, and what would explain it.

    Parameters
    ----------
    lamp_id
        The lamp on whose sheet it is shown.
    unit_id
        The unit concerned, the worst one where there are several; empty for the lamp as a whole.
    check
        Stable id of the check, for instance ``flux-spectrum-against-report``.
    severity
        How much it weighs.
    title
        The finding in a few words.
    compared
        What was compared with what, with numbers and units, and the difference that was allowed.
    deviation
        By how much it is off, signed: the first value less the second; ``None`` where no number
        says it.
    deviation_unit
        Unit of the deviation; empty for a dimensionless one.
    explanation
        What would explain it.
    quantities
        Catalogue names concerned.
    source
        Source key and clause, with the status where the document was not read; or
        ``common practice, no source``.
    """

    lamp_id: str
    unit_id: str
    check: str
    severity: Severity
    title: str
    compared: str
    deviation: Decimal | None
    deviation_unit: str
    explanation: str
    quantities: tuple[str, ...]
    source: str
