"""``lampassay start``: a new campaign folder to fill in."""

from __future__ import annotations

from pathlib import Path

import click

__all__ = ["command"]


@click.command("start")
@click.argument("folder", type=click.Path(path_type=Path))
def command(folder: Path) -> None:
    """Make a campaign folder with headings, commented settings, and what goes where.

    `lampassay check FOLDER` then says what is still missing.
    """
    from generator import pipeline

    for name in pipeline.start(folder):
        click.echo(str(folder / name))
