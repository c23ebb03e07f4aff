"""``lampassay check``: read everything, list every problem, write nothing."""

from __future__ import annotations

import dataclasses
import json
from pathlib import Path

import click

__all__ = ["command"]


@click.command("check")
@click.argument("campaign", type=click.Path(exists=True, file_okay=False, path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print the problems as JSON.")
def command(campaign: Path, as_json: bool) -> None:
    """Read a campaign folder and list every problem with file, row and column.

    Exit status 1 when there is an error; warnings alone leave it 0.
    """
    from generator import pipeline

    problems = pipeline.check(campaign)
    errors = sum(problem.level == "error" for problem in problems)
    if as_json:
        found = [dataclasses.asdict(problem) for problem in problems]
        click.echo(
            json.dumps({"campaign": str(campaign), "problems": found}, ensure_ascii=False, indent=2)
        )
    else:
        for problem in problems:
            click.echo(str(problem))
        click.echo(f"{campaign}: {errors} error(s), {len(problems) - errors} warning(s)", err=True)
    if errors:
        raise SystemExit(1)
