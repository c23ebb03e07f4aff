"""``lampassay measure``: figures of single spectrum, light-waveform or mains-waveform files."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import click

__all__ = ["command"]


@click.command("measure")
@click.argument(
    "files",
    nargs=-1,
    required=True,
    type=click.Path(exists=True, dir_okay=False, path_type=Path),
)
@click.option("--json", "as_json", is_flag=True, help="Print the figures as JSON.")
@click.option(
    "--absolute",
    is_flag=True,
    help="Take spectra as spectral radiant flux in W/nm, so that fluxes can be given too.",
)
def command(files: tuple[Path, ...], as_json: bool, absolute: bool) -> None:
    """Give every figure of spectrum, light or mains CSV files; the heading tells which it is."""
    from generator import pipeline

    measured = pipeline.measure(files, absolute=absolute)
    if as_json:
        click.echo(json.dumps({"files": measured}, ensure_ascii=False, indent=2))
        return
    for file in measured:
        for series in file["series"]:
            click.echo(f"{file['file']}  {file['kind']}  {series['name']}")
            for line in _lines(series):
                click.echo(f"  {line}")


def _lines(series: dict[str, Any]) -> list[str]:
    from generator.quantities import quantity

    lines = []
    for name, value in series["figures"].items():
        entry = quantity(name)
        if value is None:
            text = f"not given: {series['reasons'].get(name, '')}"
        else:
            text = f"{value:.{entry.decimals}f} {entry.unit}".rstrip()
        lines.append(f"{name:<32} {text}")
    lines += [f"note: {remark}" for remark in series["remarks"]]
    return lines
