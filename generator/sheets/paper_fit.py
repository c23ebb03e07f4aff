"""Fitting a lamp's sheet onto its pages: what is folded away first, and how that is said.

Nothing disappears silently: what is folded is counted in the words of the sheet, and the page on
screen and the data files hold it all. A failed clause is folded last.
"""

from __future__ import annotations

import dataclasses
from collections import Counter

from generator.language import told
from generator.language.speaking import speaking
from generator.sheets.description import Note
from generator.sheets.drawings.drawing import Drawing
from generator.sheets.figure_text import verdict_count
from generator.sheets.lamp_description import LampSheet, VerdictGroup
from generator.sheets.lamp_words import FOLDED
from generator.sheets.words import MARKS

__all__ = ["REST", "ROOMY", "ROWS", "SHORT_REST", "SHORT_ROWS", "Budget", "Trials", "fitted"]

_WORDS = {mark: word for word, mark in MARKS.items()}
_ORDER = ("fail", "inconclusive", "not-measured", "pass", "not-applicable")
_FIRST_DRAWINGS = ("spectrum", "light", "mains", "rendering", "intensity", "white", "watts")
_THEN_DRAWINGS = ("harmonics", "ageing", "plane", "hues")


@dataclasses.dataclass(frozen=True, slots=True)
class Budget:
    """What a sheet may hold on paper.

    Parameters
    ----------
    rows
        Clauses shown on page one.
    note_length
        Characters of remarks.
    drawings
        How many drawings, in the order of their weight.
    entries
        How many methods, and how many notes on the verdicts.
    dense
        Whether the text is set closer.
    products
        Whether the product information is printed.
    """

    rows: int
    note_length: int
    drawings: int
    entries: int
    dense: bool
    products: bool = False


ROOMY = Budget(rows=24, note_length=1600, drawings=11, entries=60, dense=False, products=True)
"""For a sheet that folds no clause in it."""

ROWS = (38, 32, 24, 16, 8)
"""Clauses on page one, tried in turn until it stands alone."""

REST = (
    Budget(rows=38, note_length=900, drawings=11, entries=60, dense=True, products=True),
    Budget(rows=38, note_length=900, drawings=11, entries=60, dense=True),
    Budget(rows=38, note_length=900, drawings=11, entries=40, dense=True),
    Budget(rows=38, note_length=700, drawings=10, entries=20, dense=True),
    Budget(rows=38, note_length=500, drawings=6, entries=6, dense=True),
    Budget(rows=38, note_length=0, drawings=4, entries=0, dense=True),
)
"""What stands behind page one, tried in turn until the pages suffice."""

SHORT_ROWS = (38, 30, 22, 12, 8)
SHORT_REST = (
    Budget(rows=38, note_length=900, drawings=6, entries=0, dense=True),
    Budget(rows=38, note_length=700, drawings=4, entries=0, dense=True),
    Budget(rows=38, note_length=0, drawings=4, entries=0, dense=True),
    Budget(rows=38, note_length=0, drawings=2, entries=0, dense=True),
)
"""The same for the short form, which has no tables behind page one."""


class Trials:
    """The budgets to try for a sheet: each follows from what the one before was too much for.

    Parameters
    ----------
    sheet
        The whole description.
    """

    def __init__(self, sheet: LampSheet) -> None:
        self._rows: tuple[int, ...] = SHORT_ROWS if sheet.frame.short else ROWS
        self._rest: tuple[Budget, ...] = SHORT_REST if sheet.frame.short else REST
        clauses = sum(len(group.clauses) for group in sheet.verdicts)
        self._roomy = not sheet.frame.short and clauses <= ROOMY.rows
        self._row = self._at = 0

    @property
    def budget(self) -> Budget | None:
        """The budget to try; ``None`` where there is none left."""
        if self._roomy:
            return ROOMY
        if self._row >= len(self._rows) or self._at >= len(self._rest):
            return None
        return dataclasses.replace(self._rest[self._at], rows=self._rows[self._row])

    def tighten(self, *, page_one: bool) -> None:
        """Take less.

        Parameters
        ----------
        page_one
            Whether it was page one that did not suffice; else the pages behind it.
        """
        if self._roomy:
            self._roomy = False
        elif page_one:
            self._row += 1
        else:
            self._at += 1


def fitted(sheet: LampSheet, budget: Budget) -> LampSheet:
    """Fold a sheet to a budget.

    Parameters
    ----------
    sheet
        The whole description.
    budget
        What it may hold.
    """
    with speaking(sheet.frame.language):
        return _fitted(sheet, budget)


def _fitted(sheet: LampSheet, budget: Budget) -> LampSheet:
    drawings = _chosen(sheet.drawings, budget.drawings)
    methods, notes = sheet.methods[: budget.entries], sheet.verdict_notes[: budget.entries]
    left = {
        "drawings": sum(1 for item in sheet.drawings if item.svg)
        - sum(1 for item in drawings if item.svg),
        "methods": len(sheet.methods) - len(methods),
        "notes": len(sheet.verdict_notes) - len(notes),
        "products": 0 if budget.products or sheet.frame.short else _product_fields(sheet),
    }
    return dataclasses.replace(
        sheet,
        verdicts=_folded(sheet.verdicts, budget.rows),
        verdict_notes=notes,
        notes=_shortened(sheet.notes, budget.note_length),
        drawings=drawings,
        methods=methods,
        product=sheet.product if budget.products else None,
        folded=_left_words(sheet, left),
    )


def _product_fields(sheet: LampSheet) -> int:
    return len(sheet.product.rows) if sheet.product else 0


def _left_words(sheet: LampSheet, left: dict[str, int]) -> tuple[str, ...]:
    """What is said of the parts that are left to the page on screen."""
    tables = (told(FOLDED["tables"]),) if sheet.frame.short else ()
    counted = (told(FOLDED[key].format(count=count)) for key, count in left.items() if count)
    return (*tables, *counted)


def _chosen(drawings: tuple[Drawing, ...], most: int) -> tuple[Drawing, ...]:
    """Keep the weightiest drawings in reading order; those with nothing to draw stay as words."""
    weight = (*_FIRST_DRAWINGS, *_THEN_DRAWINGS)
    drawn = sorted((item for item in drawings if item.svg), key=lambda item: weight.index(item.key))
    kept = {item.key for item in drawn[:most]}
    return tuple(item for item in drawings if item.key in kept or not item.svg)


def _folded(groups: tuple[VerdictGroup, ...], rows: int) -> tuple[VerdictGroup, ...]:
    every = [clause for group in groups for clause in group.clauses]
    ranked = sorted(range(len(every)), key=lambda at: (_ORDER.index(every[at].mark), at))
    kept = {id(every[at]) for at in ranked[:rows]}
    return tuple(_fold(group, kept) for group in groups)


def _fold(group: VerdictGroup, kept: set[int]) -> VerdictGroup:
    left = [clause for clause in group.clauses if id(clause) not in kept]
    if not left:
        return group
    shown = tuple(clause for clause in group.clauses if id(clause) in kept)
    marks = Counter(text.mark for clause in left for text in clause.verdicts)
    counted = ", ".join(told(verdict_count(_WORDS[mark], count)) for mark, count in marks.items())
    return dataclasses.replace(
        group, clauses=shown, folded=told(FOLDED["verdicts"].format(counted=counted))
    )


def _shortened(notes: tuple[Note, ...], length: int) -> tuple[Note, ...]:
    used = 0
    for place, note in enumerate(notes):
        used += note.length
        if used > length:
            said = told(FOLDED["remarks"])
            return (*notes[:place], Note(f"<p>{said}</p>", len(said)))
    return notes
