"""``lampassay explain``: how one figure or verdict came about, step by step."""

from __future__ import annotations

import json
from datetime import datetime
from pathlib import Path

import click

__all__ = ["command"]


@click.command("explain")
@click.argument("campaign", type=click.Path(exists=True, file_okay=False, path_type=Path))
@click.argument("lamp")
@click.argument("topic", metavar="QUANTITY-OR-CLAUSE")
@click.option(
    "--on",
    "on",
    type=click.DateTime(["%Y-%m-%d"]),
    help="Date on which the law is read; the campaign's assessment date by default, else today.",
)
@click.option("--json", "as_json", is_flag=True, help="Print the explanation as JSON.")
def command(campaign: Path, lamp: str, topic: str, on: datetime | None, as_json: bool) -> None:
    """Trace one figure or verdict of one lamp back to file and row, clause and rule."""
    from generator import pipeline
    from generator.sheets.explanation import explanation_text

    found = pipeline.explain(campaign, lamp, topic, on.date() if on else None)
    if as_json:
        click.echo(json.dumps(found.plain(), ensure_ascii=False, indent=2))
    else:
        click.echo(explanation_text(found))
