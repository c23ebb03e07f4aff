"""The verdicts of one lamp as a sheet shows them: by act, both bases of a clause in one row."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from generator.language import SEMICOLON, Passage, joined, told
from generator.records.clause import BUYER
from generator.records.verdict import Basis, Verdict, VerdictWord
from generator.sheets.description import Pair, VerdictText
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.margin_ruler import draw_margin_ruler
from generator.sheets.figure_text import distance_of, in_words, severest, verdict_text
from generator.sheets.lamp_description import ClauseText, Shortfall, VerdictGroup
from generator.sheets.lamp_words import (
    AMENDED,
    AND_MORE,
    ASKED_BY_THE_BUYER,
    JUDGED_RULER,
    JUDGED_VALUE,
    SHORTFALL_SENTENCE,
    SHORTFALL_VALUE,
    SHORTFALL_WORDS,
)
from generator.sheets.words import MARKS, VERDICT_ROLES

__all__ = ["clause_text", "shortfalls", "verdict_groups", "verdict_notes"]

_NOTE_DIGITS = 2
_MOST_TITLES = 3


def verdict_groups(verdicts: Sequence[Verdict], colours: Palette) -> tuple[VerdictGroup, ...]:
    """Group verdicts by the act that asks, named once in the heading.

    Parameters
    ----------
    verdicts
        Verdicts of one lamp.
    colours
        Colours of the theme, for the rulers.
    """
    acts = dict.fromkeys(_act(item) for item in verdicts)
    return tuple(
        _group(act, [item for item in verdicts if _act(item) == act], colours) for act in acts
    )


def _act(verdict: Verdict) -> tuple[str, str]:
    """Regime and the act that heads its group."""
    return verdict.regime, verdict.act or verdict.regime


def _heading(name: str, verdicts: list[Verdict]) -> str:
    amending = {item.amending_act for item in verdicts if item.amending_act}
    if amending:
        return AMENDED.format(act=name, amending=", ".join(sorted(amending)))
    asked = any(item.status == BUYER for item in verdicts)
    return ASKED_BY_THE_BUYER.format(act=name) if asked else name


def _group(act: tuple[str, str], verdicts: list[Verdict], colours: Palette) -> VerdictGroup:
    outside = [item for item in verdicts if item.verdict is VerdictWord.NOT_APPLICABLE]
    judged: dict[str, list[Verdict]] = {}
    for item in verdicts:
        if item.verdict is not VerdictWord.NOT_APPLICABLE:
            judged.setdefault(item.clause, []).append(item)
    return VerdictGroup(
        _heading(act[1], verdicts),
        tuple(clause_text(items, colours) for items in judged.values()),
        _left_out(outside),
    )


def _left_out(verdicts: Iterable[Verdict]) -> tuple[Pair, ...]:
    """Each reason why clauses do not apply, with the clauses it keeps out."""
    reasons: dict[str, dict[str, None]] = {}
    for item in verdicts:
        reasons.setdefault(told(item.reason).rstrip("."), {})[item.title] = None
    return tuple(Pair(joined(SEMICOLON, titles), reason) for reason, titles in reasons.items())


def clause_text(verdicts: Sequence[Verdict], colours: Palette) -> ClauseText:
    """Write one clause with its verdicts on both bases.

    Parameters
    ----------
    verdicts
        The verdicts of one clause; of several on one basis the severest is shown.
    colours
        Colours of the theme.
    """
    chosen = {basis: severest(item for item in verdicts if item.basis is basis) for basis in Basis}
    shown = {basis: verdict_text(item, colours) for basis, item in chosen.items() if item}
    declared, determined = shown.get(Basis.DECLARED), shown.get(Basis.DETERMINED)
    first = verdicts[0]
    worst = severest(verdicts) or first
    limit = (determined and determined.limit) or (declared and declared.limit) or ""
    other = declared.limit if declared and declared.limit != limit else ""
    return ClauseText(
        clause=first.clause,
        title=first.title,
        place=first.place,
        limit=limit,
        declared_limit=other,
        declared=declared,
        determined=determined,
        ruler=_ruler(chosen, shown, colours),
        mark=MARKS[worst.verdict],
        notes=_sentences(verdicts),
    )


def _ruler(
    chosen: dict[Basis, Verdict | None], shown: dict[Basis, VerdictText], colours: Palette
) -> str:
    places = {basis: distance_of(item) if item else None for basis, item in chosen.items()}
    if not any(places.values()):
        return ""
    said = joined(SEMICOLON, (_judged(text) for basis, text in shown.items() if places[basis]))
    found = chosen[Basis.DETERMINED]
    return draw_margin_ruler(
        places[Basis.DETERMINED],
        VERDICT_ROLES[found.verdict] if found else "open",
        told(JUDGED_RULER.format(title=next(iter(shown.values())).title, judged=said)),
        colours,
        declared=places[Basis.DECLARED],
    )


def _judged(text: VerdictText) -> str:
    """What a ruler shows, in words."""
    return JUDGED_VALUE.format(
        basis=text.basis,
        value=text.value,
        limit=f"{text.limit} {text.unit}".rstrip(),
        margin=text.margin,
        word=text.word,
    )


def _sentences(verdicts: Iterable[Verdict]) -> tuple[str, ...]:
    """What must be known with some verdicts, each sentence once."""
    found = (
        in_words(sentence, _NOTE_DIGITS)
        for item in verdicts
        for sentence in (item.note.parts if isinstance(item.note, Passage) else (item.note,))
        if sentence
    )
    return tuple(dict.fromkeys(found))


def verdict_notes(groups: Iterable[VerdictGroup]) -> tuple[Pair, ...]:
    """Gather the notes of all clauses: each sentence with the clauses it belongs to.

    Parameters
    ----------
    groups
        The groups of a sheet.
    """
    found: dict[str, dict[str, None]] = {}
    for group in groups:
        for clause in group.clauses:
            for note in clause.notes:
                found.setdefault(note, {})[clause.title] = None
    return tuple(Pair(_first_titles(list(titles)), note) for note, titles in found.items())


def _first_titles(titles: list[str]) -> str:
    named = joined(SEMICOLON, titles[:_MOST_TITLES])
    left = len(titles) - _MOST_TITLES
    return AND_MORE.format(titles=named, count=left) if left > 0 else named


def shortfalls(groups: Iterable[VerdictGroup]) -> tuple[Shortfall, ...]:
    """Say in plain words where a lamp falls short, the failed clauses first.

    Parameters
    ----------
    groups
        The groups of a sheet.
    """
    found = [
        _shortfall(group, clause)
        for group in groups
        for clause in group.clauses
        if clause.mark in SHORTFALL_WORDS
    ]
    return tuple(sorted(found, key=lambda item: list(SHORTFALL_WORDS).index(item.mark)))


def _shortfall(group: VerdictGroup, clause: ClauseText) -> Shortfall:
    values = joined(
        ", ",
        (
            SHORTFALL_VALUE.format(
                basis=text.basis, value=f"{text.value}\u00a0{text.unit}".rstrip("\u00a0")
            )
            for text in clause.verdicts
            if text.mark == clause.mark
        ),
    )
    return Shortfall(
        SHORTFALL_WORDS[clause.mark],
        clause.mark,
        clause.title,
        SHORTFALL_SENTENCE.format(values=values, limit=clause.limit or clause.declared_limit),
        joined(", ", (part for part in (group.heading, clause.place) if part)),
    )
