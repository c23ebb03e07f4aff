"""What the sheet of one lamp says, as finished text and drawings."""

from __future__ import annotations

from dataclasses import dataclass

from generator.sheets.description import (
    FigureText,
    Note,
    Pair,
    RiskStatement,
    SheetFrame,
    VerdictCount,
    VerdictText,
)
from generator.sheets.drawings.drawing import Drawing

__all__ = [
    "ClauseText",
    "DeclaredText",
    "EnergyClass",
    "FigureGroup",
    "FindingText",
    "Headline",
    "LampSheet",
    "MethodText",
    "ProductTable",
    "ProductText",
    "ReportText",
    "Shortfall",
    "Statements",
    "UnitsTable",
    "UseText",
    "VerdictGroup",
]


@dataclass(frozen=True, slots=True)
class Headline:
    """One of the figures at the head of a sheet, with a margin ruler where a clause limits it."""

    label: str
    figure: FigureText
    ruler: str = ""
    against: str = ""


@dataclass(frozen=True, slots=True)
class ClauseText:
    """One clause with its verdicts on both bases.

    Parameters
    ----------
    clause, title
        Id and short name.
    place
        Where it stands inside the act that heads its group.
    limit
        The limit, with its comparison; empty where none applies.
    declared_limit
        The limit of the declared value where it is another one; else empty.
    declared, determined
        The verdicts; ``None`` where a basis is not judged.
    ruler
        Margin ruler with both values, as SVG; empty where there is no margin.
    mark
        Class of the severest mark.
    notes
        What must be known with the verdicts, each sentence once.
    """

    clause: str
    title: str
    place: str
    limit: str
    declared_limit: str
    declared: VerdictText | None
    determined: VerdictText | None
    ruler: str
    mark: str
    notes: tuple[str, ...] = ()

    @property
    def verdicts(self) -> tuple[VerdictText, ...]:
        """The verdicts there are, the declared one first."""
        return tuple(item for item in (self.declared, self.determined) if item is not None)


@dataclass(frozen=True, slots=True)
class VerdictGroup:
    """The verdicts under one act, standard or buyer; those that do not apply stand apart.

    ``heading`` names the act once for all rows; ``not_applicable`` gives each reason with the
    clauses it keeps out; ``folded`` says what was left out for want of room on paper.
    """

    heading: str
    clauses: tuple[ClauseText, ...]
    not_applicable: tuple[Pair, ...] = ()
    folded: str = ""


@dataclass(frozen=True, slots=True)
class FigureGroup:
    """Figures of one group of the catalogue."""

    heading: str
    figures: tuple[FigureText, ...]


@dataclass(frozen=True, slots=True)
class DeclaredText:
    """One declared value beside what the units were found to be.

    Parameters
    ----------
    label, unit
        From the catalogue.
    declared, determined, uncertainty
        Both values, and the expanded uncertainty of the second.
    difference
        Determined less declared in percent of the declared value; empty where that has no
        meaning.
    allowed
        What the verification tolerance allows; empty where no tolerance is set.
    word, mark
        Verdict on the tolerance; empty where there is none.
    """

    label: str
    unit: str
    declared: str
    determined: str
    uncertainty: str
    difference: str
    allowed: str
    word: str
    mark: str


@dataclass(frozen=True, slots=True)
class UnitsTable:
    """The units one by one.

    Parameters
    ----------
    headings
        Symbol and unit of each column.
    rows
        Name of the unit and its figures.
    summary
        The same for the mean, the standard deviation, and the expanded uncertainty of the mean.
    note
        What the dashes and letters in it mean.
    """

    headings: tuple[Pair, ...]
    rows: tuple[tuple[str, ...], ...]
    summary: tuple[tuple[str, ...], ...]
    note: str


@dataclass(frozen=True, slots=True)
class FindingText:
    """One finding: how much it weighs, what was compared, what would explain it."""

    severity: str
    title: str
    compared: str
    explanation: str
    source: str


@dataclass(frozen=True, slots=True)
class MethodText:
    """One method: what it gives, the formula in words, the source, and for which figures."""

    title: str
    formula: str
    source: str
    quantities: str


@dataclass(frozen=True, slots=True)
class UseText:
    """One answer on energy, cost or carbon: what, number, unit, and on what it rests."""

    label: str
    number: str
    unit: str
    basis: str


@dataclass(frozen=True, slots=True)
class Shortfall:
    """One clause that is failed or left open, in plain words."""

    word: str
    mark: str
    title: str
    sentence: str
    source: str


@dataclass(frozen=True, slots=True)
class EnergyClass:
    """The energy efficiency class in words, and its arrow; empty where it may not be shown."""

    words: str
    arrow: str = ""


@dataclass(frozen=True, slots=True)
class Statements:
    """What is said of the way the figures were found and judged.

    Parameters
    ----------
    laboratory, conditions
        Who measured, and with what; on what supply, how warm, for what purpose.
    uncertainties
        Expanded uncertainties that the laboratory states, by quantity.
    uncertainty, decision
        The statements on uncertainty and on the decision rule.
    law
        Date and edition of the law that was read.
    risks
        Global risks of the clauses that this lamp was judged by; ``None`` where there are none.
    """

    laboratory: tuple[Pair, ...]
    conditions: tuple[Pair, ...]
    uncertainties: tuple[Pair, ...]
    uncertainty: str
    decision: str
    law: str
    risks: RiskStatement | None = None


@dataclass(frozen=True, slots=True)
class ReportText:
    """The items of the test report.

    Parameters
    ----------
    opening, closing
        What stands at the head of a report, and what stands at its end.
    signatory
        Who authorises it; empty where nobody is named.
    missing
        Labels of the items that nobody stated.
    """

    opening: tuple[Pair, ...] = ()
    closing: tuple[Pair, ...] = ()
    signatory: str = ""
    missing: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class ProductText:
    """One field of the product information.

    Parameters
    ----------
    name, text, unit
        The field, and what is to be published; empty where there is nothing.
    declared
        The declared value before rounding; empty where there is none.
    rounding
        The rounding in words.
    reason
        Why there is nothing to publish.
    warning
        What is wrong with publishing it.
    """

    name: str
    text: str
    unit: str
    declared: str
    rounding: str
    reason: str
    warning: str


@dataclass(frozen=True, slots=True)
class ProductTable:
    """The product information: every field, and the reasons with the fields left empty."""

    rows: tuple[ProductText, ...]
    missing: tuple[Pair, ...]


@dataclass(frozen=True, slots=True)
class LampSheet:
    """The spec sheet of one lamp.

    Parameters
    ----------
    frame
        What every sheet carries.
    lamp_id
        Names the files of the lamp.
    model, bidder
        As they are shown.
    tag
        The id as it is shown; empty under a code name.
    silhouette
        Outline of its shape, as SVG.
    identity
        What it is, in pairs.
    verdict_sentence, closest
        How it stands, and where it stands closest.
    counts
        Verdicts by word.
    headlines
        The five figures at the head.
    energy_class
        Energy efficiency class.
    use
        Energy, cost and carbon of a year.
    verdicts
        By act.
    shortfalls
        Clauses failed or left open, in plain words, the failed ones first.
    verdict_notes
        What must be known with the verdicts: each sentence with the clauses it belongs to.
    drawings
        In reading order; those with nothing to draw say why.
    declared
        Declared against determined.
    product
        Product information; ``None`` where no act asks for it, or where there is no room.
    report
        Items of the test report.
    units
        The units one by one; ``None`` where none was measured.
    findings
        What does not fit together, the heaviest first.
    figures
        All figures, by group.
    grades
        Which figures rest on which evidence.
    methods
        How the figures were found.
    statements
        Conditions, uncertainty, decision rule.
    notes
        Remarks on the lamp, block by block.
    evidence
        On what the figures rest, in a sentence.
    folded
        What was left out for want of room on paper, one sentence each.
    """

    frame: SheetFrame
    lamp_id: str
    model: str
    bidder: str
    tag: str
    silhouette: str
    identity: tuple[Pair, ...]
    verdict_sentence: str
    closest: str
    counts: tuple[VerdictCount, ...]
    headlines: tuple[Headline, ...]
    energy_class: EnergyClass
    use: tuple[UseText, ...]
    verdicts: tuple[VerdictGroup, ...]
    shortfalls: tuple[Shortfall, ...]
    verdict_notes: tuple[Pair, ...]
    drawings: tuple[Drawing, ...]
    declared: tuple[DeclaredText, ...]
    product: ProductTable | None
    report: ReportText
    units: UnitsTable | None
    findings: tuple[FindingText, ...]
    figures: tuple[FigureGroup, ...]
    grades: tuple[Pair, ...]
    methods: tuple[MethodText, ...]
    statements: Statements
    notes: tuple[Note, ...]
    evidence: str
    folded: tuple[str, ...] = ()
