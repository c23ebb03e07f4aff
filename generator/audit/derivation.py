"""Derivation: do figures and verdicts follow from the inputs, and what would differ today."""

from __future__ import annotations

import csv
import io
import json
import re
from collections.abc import Iterator, Mapping
from datetime import date
from decimal import Decimal
from pathlib import Path
from typing import Any

from generator.audit.report import AuditFinding, Level
from generator.publish.evidence import figures_csv, results_json, verdicts_csv
from generator.records.assessment import Assessment

__all__ = ["TABLES", "agree", "derivation", "differences", "under_the_law_of"]

TABLES = {
    "data/figures.csv": ("lamp_id", "unit_id", "quantity", "grade"),
    "data/verdicts.csv": ("lamp_id", "clause", "quantity", "basis"),
}
"""Result table -> columns that name a row."""

_RESULTS = "data/results.json"
_DECISIVE = ("lampassay", "program sources", "law book")
_NUMBER = re.compile(r"-?[0-9]+(?:\.[0-9]+)?(?:[eE][+-]?[0-9]+)?")
_AGREEMENT = Decimal("1e-8")
"""Relative difference up to which two computed numbers are one: the last bits of a sum differ
between processors, and with the number of lamps computed at once."""

_Rows = dict[tuple[str, ...], Mapping[str, str]]


def derivation(
    folder: Path, facts: Mapping[str, Any], assessment: Assessment, versions: Mapping[str, str]
) -> tuple[AuditFinding, ...]:
    """Compare the results of an issue with those computed anew from its inputs.

    Parameters
    ----------
    folder
        The issued folder.
    facts
        Its manifest, or the list inside a document.
    assessment
        Computed anew from the inputs, on the recorded date.
    versions
        Of this program, its law book and its libraries.

    Returns
    -------
    tuple of AuditFinding
        Failures where the same program and law give something else; notes where another
        version or law book may be the reason.
    """
    other = [
        f"{name} {now}, issued with {facts['versions'].get(name, 'none')}"
        for name, now in versions.items()
        if facts["versions"].get(name) != now
    ]
    same = all(facts["versions"].get(name) == versions[name] for name in _DECISIVE)
    level: Level = "failure" if same else "note"
    anew = {
        "data/figures.csv": figures_csv(assessment),
        "data/verdicts.csv": verdicts_csv(assessment),
    }
    found = [
        AuditFinding("derivation", level, subject, message)
        for name, content in anew.items()
        for subject, message in _compared(folder / name, name, content)
    ]
    found += [
        AuditFinding("derivation", level, subject, message)
        for subject, message in _results(folder / _RESULTS, assessment)
    ]
    notes = [AuditFinding("derivation", "note", "versions", f"this is {text}") for text in other]
    return (*found, *notes)


def _compared(path: Path, name: str, anew: bytes) -> Iterator[tuple[str, str]]:
    try:
        content = path.read_bytes()
        yield from differences(name, content, anew)
    except (OSError, ValueError, KeyError, csv.Error):
        yield name, "cannot be read, so it cannot be compared"


def differences(name: str, issued: bytes, anew: bytes) -> Iterator[tuple[str, str]]:
    """Compare two tables of results value by value.

    Parameters
    ----------
    name
        Which table, one of :data:`TABLES`.
    issued, anew
        Both as CSV.

    Yields
    ------
    tuple of str
        Row, and what differs.
    """
    before, after = _rows(name, issued), _rows(name, anew)
    for key in dict.fromkeys([*before, *after]):
        subject = f"{name}: {' '.join(filter(None, key))}"
        if key not in after:
            yield subject, "issued, but does not follow from the inputs"
        elif key not in before:
            yield subject, "follows from the inputs, but was not issued"
        else:
            yield from _cells(subject, before[key], after[key])


def _cells(
    subject: str, issued: Mapping[str, str], anew: Mapping[str, str]
) -> Iterator[tuple[str, str]]:
    for column in dict.fromkeys([*issued, *anew]):
        if not agree(issued.get(column) or "", anew.get(column) or ""):
            shown = issued.get(column) or "nothing"
            yield subject, f"{column} is {shown}, computed anew {anew.get(column) or 'nothing'}"


def agree(first: str, second: str) -> bool:
    """Whether two cells or texts say the same, the last bits of their numbers aside.

    Parameters
    ----------
    first, second
        Cells, or running text with numbers in it.
    """
    if first == second:
        return True
    if _NUMBER.split(first) != _NUMBER.split(second):
        return False
    pairs = zip(_NUMBER.findall(first), _NUMBER.findall(second), strict=True)
    return all(_close(Decimal(one), Decimal(other)) for one, other in pairs)


def _close(one: Decimal, other: Decimal) -> bool:
    return abs(one - other) <= _AGREEMENT * max(abs(one), abs(other))


def _rows(name: str, content: bytes) -> _Rows:
    rows: _Rows = {}
    for row in csv.DictReader(io.StringIO(content.decode(), newline="")):
        key = tuple(row[column] for column in TABLES[name])
        count = 1
        while key in rows:
            count += 1
            key = (*key[: len(TABLES[name])], f"({count})")
        rows[key] = row
    return rows


def _results(path: Path, assessment: Assessment) -> Iterator[tuple[str, str]]:
    """Figures and verdicts of the JSON, compared with those computed anew."""
    lamps = [lamp.lamp_id for lamp in assessment.campaign.lamps]
    anew = json.loads(results_json(assessment, lamps))
    try:
        issued = json.loads(path.read_bytes())
        for group in ("figures", "verdicts"):
            if not agree(_bare(issued[group]), _bare(anew[group])):
                yield f"{_RESULTS}: {group}", "not what follows from the inputs"
    except (OSError, ValueError, KeyError, TypeError, AttributeError):
        yield _RESULTS, "cannot be read, so it cannot be compared"


def _bare(rows: Any) -> str:
    """Rows without their origin, which names lines of the whole campaign's tables."""
    plain = [{key: item for key, item in row.items() if key != "origin"} for row in rows]
    return json.dumps(plain, ensure_ascii=False, sort_keys=True)


def under_the_law_of(
    day: date, recorded: Assessment, current: Assessment
) -> tuple[AuditFinding, ...]:
    """What the verdicts would be under the law of another day.

    Parameters
    ----------
    day
        The day.
    recorded, current
        The same inputs judged on the recorded day and on this one.

    Returns
    -------
    tuple of AuditFinding
        A note for every verdict that would be another.
    """
    before = {(item.lamp_id, item.clause, item.basis): item for item in recorded.verdicts}
    after = {(item.lamp_id, item.clause, item.basis): item for item in current.verdicts}
    found = []
    for key in dict.fromkeys([*before, *after]):
        was = before[key].verdict if key in before else "no verdict"
        now = after[key].verdict if key in after else "no verdict"
        if was != now:
            message = f"{was} as recorded, {now} under the law of {day.isoformat()}"
            found.append(AuditFinding("derivation", "note", " ".join(key), message))
    return tuple(found)
