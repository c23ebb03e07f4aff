"""What sheets are made of, as finished text; HTML and PDF are both made from it.

Nothing here is a number any more: whoever renders a sheet cannot calculate, so the page and the
paper say the same. Here stands what the sheet of a lamp, the comparison and the documents of a
tender have in common.
"""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

__all__ = [
    "Caution",
    "FigureText",
    "Note",
    "Pair",
    "RiskStatement",
    "RiskText",
    "SheetFrame",
    "SourceText",
    "VerdictCount",
    "VerdictText",
]


@dataclass(frozen=True, slots=True)
class Pair:
    """A name and what stands under it."""

    label: str
    text: str


@dataclass(frozen=True, slots=True)
class FigureText:
    """One figure ready to be printed.

    Parameters
    ----------
    quantity, label, symbol, unit
        From the catalogue.
    number
        The number, or ``not measured``.
    uncertainty
        ``± 1.9``, or empty.
    grade
        ``computed``, ``reported`` or ``declared``; empty where there is no number.
    reason
        Why there is no number; empty otherwise.
    detail
        Units behind it, spread, method, remarks.
    """

    quantity: str
    label: str
    symbol: str
    unit: str
    number: str
    uncertainty: str
    grade: str
    reason: str = ""
    detail: str = ""

    @property
    def missing(self) -> bool:
        """Whether there is no number."""
        return not self.grade


@dataclass(frozen=True, slots=True)
class VerdictText:
    """One verdict ready to be printed.

    Parameters
    ----------
    clause, title, source
        Id, short name, and where the clause stands.
    basis
        ``declared`` or ``determined``.
    word
        One of the five words.
    mark
        Class of the mark: ``pass``, ``fail``, ``inconclusive``, ``not-measured``,
        ``not-applicable``.
    value, uncertainty, unit
        What was judged; empty where there is nothing.
    limit
        With its comparison, for instance ``≥ 80``; empty where none applies.
    margin
        With its sign; empty where there is none.
    ruler
        Margin ruler as SVG; empty where there is no margin.
    note
        What must be known with it.
    steps
        The way from the inputs to the verdict, one sentence a step.
    """

    clause: str
    title: str
    source: str
    basis: str
    word: str
    mark: str
    value: str
    uncertainty: str
    unit: str
    limit: str
    margin: str
    ruler: str
    note: str
    steps: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class VerdictCount:
    """How many verdicts of one word: count and word as they are read, and the count alone."""

    words: str
    mark: str
    count: str


@dataclass(frozen=True, slots=True)
class Note:
    """One block of remarks, as HTML that was made clean, and its length as text.

    ``language`` is the tag of its language where that may be another than that of the sheet.
    """

    html: str
    length: int
    language: str = ""


@dataclass(frozen=True, slots=True)
class Caution:
    """A caution, set in the size of the text."""

    heading: str
    text: str


@dataclass(frozen=True, slots=True)
class SourceText:
    """One source with its key; principal where it stands behind page one."""

    key: str
    text: str
    principal: bool = False


@dataclass(frozen=True, slots=True)
class RiskText:
    """Global risks of one clause: title, regime, lamps behind it, both risks in percent."""

    title: str
    regime: str
    lamps: str
    consumers: str
    producers: str


@dataclass(frozen=True, slots=True)
class RiskStatement:
    """Global consumer's and producer's risk, clause by clause.

    Parameters
    ----------
    sentence
        What the two risks are.
    largest
        The clauses with the largest risks, the largest first.
    further
        The other clauses for which risks can be given.
    rest
        How small the risks of those are; empty where there are none.
    unknown
        Each reason why no risk can be given, with the clauses it holds for.
    """

    sentence: str
    largest: tuple[RiskText, ...]
    further: tuple[RiskText, ...]
    rest: str
    unknown: tuple[Pair, ...]


@dataclass(frozen=True, slots=True)
class SheetFrame:
    """What every sheet carries.

    Parameters
    ----------
    title, summary
        Title of the document, and one sentence on it.
    language
        Tag of the language the sheet is written in.
    theme
        Folder of the theme.
    campaign, reference, client, laboratory
        Who, for whom, under which number.
    assessed_on, assessed_words
        Date of assessment, ISO 8601 and in words.
    version
        Program and version.
    ruler_scale
        The scale that heads a column of rulers, as SVG.
    cautions, sources, gaps
        Cautions; sources used; what is missing or was warned of.
    with_pdf
        Whether to link to PDF sheets.
    overrides
        Folder of the campaign's own templates and tokens; ``None`` where it has none.
    short
        Whether a lamp's PDF is the short form of two pages.
    """

    title: str
    summary: str
    language: str
    theme: str
    campaign: str
    reference: str
    client: str
    laboratory: str
    assessed_on: str
    assessed_words: str
    version: str
    ruler_scale: str
    cautions: tuple[Caution, ...]
    sources: tuple[SourceText, ...]
    gaps: tuple[str, ...]
    with_pdf: bool
    overrides: Path | None = None
    short: bool = False
