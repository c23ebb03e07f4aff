"""What the comparison of all lamps says, as finished text and drawings."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from generator.sheets.description import Note, RiskStatement, SheetFrame, VerdictCount
from generator.sheets.drawings.drawing import Drawing

__all__ = [
    "ComparisonCellText",
    "ComparisonColumn",
    "ComparisonRowText",
    "ComparisonSheet",
    "LampQuestions",
]


@dataclass(frozen=True, slots=True)
class ComparisonCellText:
    """One cell: number over a small ruler.

    Parameters
    ----------
    number
        The number, or ``not measured``.
    uncertainty
        ``± 1.9``, or empty.
    grade
        ``computed``, ``reported`` or ``declared``; empty where there is none.
    reason
        Why there is no number; empty otherwise.
    ruler
        Margin ruler as SVG; empty where no clause limits the figure.
    computed
        Whether the figure is computed, which goes without saying.
    best
        Whether no other lamp is better.
    missing
        Whether there is no number.
    """

    number: str
    uncertainty: str = ""
    grade: str = ""
    reason: str = ""
    ruler: str = ""
    computed: bool = False
    best: bool = False
    missing: bool = False


@dataclass(frozen=True, slots=True)
class ComparisonColumn:
    """Heading of a column.

    Parameters
    ----------
    key
        Catalogue name of the quantity, or ``unit_price``, ``questions``.
    label, symbol, unit
        As printed; symbol and unit may be empty.
    chosen
        Whether it is among the columns shown at first where columns can be chosen.
    """

    key: str
    label: str
    symbol: str
    unit: str
    chosen: bool = False


@dataclass(frozen=True, slots=True)
class ComparisonRowText:
    """One lamp of the comparison.

    Parameters
    ----------
    lamp_id
        Names the files of the lamp.
    model, bidder
        As they are shown.
    tag
        The id as it is shown; empty under a code name.
    cells
        One per column.
    counts
        Verdicts by word, without the words that no verdict has.
    """

    lamp_id: str
    model: str
    bidder: str
    tag: str
    cells: tuple[ComparisonCellText, ...]
    counts: tuple[VerdictCount, ...]


@dataclass(frozen=True, slots=True)
class LampQuestions:
    """What must be explained of one lamp: each finding in a few words, the heaviest first."""

    lamp_id: str
    model: str
    findings: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class ComparisonSheet:
    """The comparison of all lamps.

    Parameters
    ----------
    frame
        What every sheet carries.
    columns, rows
        The matrix.
    sentence
        How the lamps stand.
    spectra
        The spectra laid over one another, white by white; one drawing says why where none is.
    scatter
        Two figures against each other.
    bidders
        Bidders, each once, in the order of the lamps.
    words
        Fixed words of the controls.
    data
        The same matrix as numbers, as JSON that is safe inside a page; for the scripts.
    notes
        Remarks on the campaign.
    questions
        What must be explained, lamp by lamp.
    risks
        Global risks of the clauses; ``None`` where none was asked for.
    report
        Path of the tender report from the page; empty where the campaign is no tender.
    """

    frame: SheetFrame
    columns: tuple[ComparisonColumn, ...]
    rows: tuple[ComparisonRowText, ...]
    sentence: str
    spectra: tuple[Drawing, ...]
    scatter: Drawing
    bidders: tuple[str, ...]
    words: Mapping[str, str]
    data: str
    notes: tuple[Note, ...]
    questions: tuple[LampQuestions, ...]
    risks: RiskStatement | None
    report: str
