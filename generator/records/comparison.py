"""Many lamps side by side, and what the sheets need beside an assessment."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Protocol

from generator.records.curves import LampCurves
from generator.records.figure import Figure
from generator.records.harmonic_table import HarmonicTable
from generator.records.product_field import ProductField
from generator.records.verdict import Verdict, VerdictWord

__all__ = [
    "ComparisonCell",
    "ComparisonMatrix",
    "ComparisonRow",
    "MethodLike",
    "SheetContext",
    "SourceLike",
]


@dataclass(frozen=True, slots=True)
class ComparisonCell:
    """One quantity of one lamp.

    Parameters
    ----------
    figure
        The figure to show (computed before reported before declared); ``None`` where the
        campaign has none at all.
    verdict
        The determined verdict that limits this quantity, the severest where several do;
        ``None`` where no clause limits it.
    best
        Whether no other lamp has a better figure; false where better and worse have no meaning.
    """

    figure: Figure | None
    verdict: Verdict | None = None
    best: bool = False


@dataclass(frozen=True, slots=True)
class ComparisonRow:
    """One lamp.

    Parameters
    ----------
    lamp_id
        The lamp.
    cells
        One cell per quantity of the matrix.
    counts
        How many verdicts of each word the lamp has; words without a verdict may be left out.
    questions
        How many findings on the lamp ask for an answer: all but remarks.
    """

    lamp_id: str
    cells: tuple[ComparisonCell, ...]
    counts: Mapping[VerdictWord, int] = field(default_factory=dict)
    questions: int = 0


@dataclass(frozen=True, slots=True)
class ComparisonMatrix:
    """Lamps by quantities.

    Parameters
    ----------
    quantities
        Catalogue names, in the order of the columns.
    rows
        One row per lamp, in the order of the campaign.
    better
        Catalogue name -> 1 where higher is better, -1 where lower is; a quantity that is not
        here has no better.
    """

    quantities: tuple[str, ...]
    rows: tuple[ComparisonRow, ...]
    better: Mapping[str, int] = field(default_factory=dict)


class MethodLike(Protocol):
    """What is printed of a method: title, formula in words, source key, clause, inputs."""

    @property
    def title(self) -> str:
        """What it gives, and by which edition."""

    @property
    def formula(self) -> str:
        """The formula in words."""

    @property
    def source(self) -> str:
        """Key of the document."""

    @property
    def clause(self) -> str:
        """Clause, equation or table; may be empty."""

    @property
    def inputs(self) -> tuple[str, ...]:
        """Catalogue quantities the method starts from; empty where it starts from raw data."""


class SourceLike(Protocol):
    """What the sheets print of a source: title, edition, publisher, date of publication."""

    @property
    def title(self) -> str:
        """Title, without edition."""

    @property
    def edition(self) -> str:
        """Edition or number; may be empty."""

    @property
    def publisher(self) -> str:
        """Publisher; may be empty."""

    @property
    def date(self) -> str:
        """Date of publication, as much of it as is known; may be empty."""


@dataclass(frozen=True, slots=True, eq=False)
class SheetContext:
    """What the sheets need beside the assessment.

    Parameters
    ----------
    sources
        Source key -> source, for the list of sources.
    curves
        ``lamp_id`` -> curves to draw.
    matrix
        The comparison; needed by the comparison sheet alone.
    with_pdf
        Whether PDF sheets are issued too, so that pages may link to them.
    methods
        Method id, as a figure carries it -> method, for the list of methods.
    overrides
        Folder of the campaign with templates of its own for the theme; ``None`` without one.
    products
        ``lamp_id`` -> product information, in the order of the act.
    harmonic_tables
        ``lamp_id`` -> limits of the harmonics of its current.
    """

    sources: Mapping[str, SourceLike] = field(default_factory=dict)
    curves: Mapping[str, LampCurves] = field(default_factory=dict)
    matrix: ComparisonMatrix | None = None
    with_pdf: bool = True
    methods: Mapping[str, MethodLike] = field(default_factory=dict)
    overrides: Path | None = None
    products: Mapping[str, tuple[ProductField, ...]] = field(default_factory=dict)
    harmonic_tables: Mapping[str, HarmonicTable] = field(default_factory=dict)
