"""``lampassay clauses``: the law book as it stood on a date."""

from __future__ import annotations

import json
from collections.abc import Iterator
from datetime import date, datetime
from typing import Any

import click

__all__ = ["command"]


@click.command("clauses")
@click.option("--on", "on", type=click.DateTime(["%Y-%m-%d"]), help="The date; today by default.")
@click.option("--json", "as_json", is_flag=True, help="Print the clauses as JSON.")
def command(on: datetime | None, as_json: bool) -> None:
    """List every clause of the law book with the value in force on a date."""
    from generator import pipeline

    day = on.date() if on else date.today()  # noqa: DTZ011 - the law changes by local calendar day
    rows = pipeline.clauses(day)
    if as_json:
        content = {"on": day.isoformat(), "clauses": rows}
        click.echo(json.dumps(content, ensure_ascii=False, indent=2))
        return
    regime = ""
    for row in rows:
        if row["regime"] != regime:
            regime = row["regime"]
            click.echo(f"\n{regime}")
        for line in _lines(row):
            click.echo(f"  {line}")


def _lines(row: dict[str, Any]) -> Iterator[str]:
    yield f"{row['id']}: {row['title']}"
    if row["applies"]:
        yield f"    applies where {' and '.join(row['applies'])}"
    for value in row["values"]:
        when = f", where {' and '.join(value['when'])}" if value["when"] else ""
        yield f"    {value['says']}{when}"
    for constant in row["constants"]:
        entries = (_entry(name, entry) for name, entry in constant["entries"].items())
        yield f"    {constant['title']} ({constant['id']}; {constant['status']}):"
        yield f"        {', '.join(entries)}"
    yield f"    {row['source']}; {row['status']}"


def _entry(name: str, entry: float | list[list[float]]) -> str:
    """One constant with its name; the rows of a table as pairs."""
    words = name.replace("_", " ")
    if isinstance(entry, list):
        rows = ", ".join(" to ".join(f"{number:g}" for number in row) for row in entry)
        return f"{words} [{rows}]"
    return f"{words} {entry:g}"
