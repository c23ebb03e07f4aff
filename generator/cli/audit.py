"""``lampassay audit``: is an issue intact, and does it follow from its data."""

from __future__ import annotations

import json
from datetime import UTC, datetime
from pathlib import Path
from typing import TYPE_CHECKING

import click

if TYPE_CHECKING:
    from generator.audit import AuditReport

__all__ = ["command"]

_MOST_NOTES = 20


@click.command("audit")
@click.argument("subject", type=click.Path(exists=True, path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print everything found as JSON.")
@click.option(
    "--trust",
    multiple=True,
    type=click.Path(exists=True, dir_okay=False, path_type=Path),
    help="Certificate (PEM or DER) that a signature must lead to; may be given more than once.",
)
@click.option(
    "--full",
    type=click.Path(exists=True, file_okay=False, path_type=Path),
    help="Folder of the full edition, to prove a public one against.",
)
def command(subject: Path, trust: tuple[Path, ...], full: Path | None, *, as_json: bool) -> None:
    """Audit an issued folder, an archive of one, or one PDF sheet; change nothing.

    Exit status 1 when anything fails; notes alone leave it 0.
    """
    from generator.audit import audit

    report = audit(subject, today=datetime.now(UTC).date(), trust=trust, full=full)
    if as_json:
        click.echo(json.dumps(report.as_json(), ensure_ascii=False, indent=2))
    else:
        _tell(report)
    if not report.passed:
        raise SystemExit(1)


def _tell(report: AuditReport) -> None:
    for name in ("campaign", "lamp_id", "edition", "assessed_on", "digest"):
        if report.facts.get(name):
            click.echo(f"{name.replace('_', ' ')}: {report.facts[name]}")
    for text, files in _signatures(report).items():
        shown = files[0] if len(files) == 1 else f"{files[0]} and {len(files) - 1} more files"
        click.echo(f"signature: {shown}: {text}")
    for item in report.failures:
        click.echo(str(item))
    notes = [item for item in report.findings if item.level == "note"]
    for item in notes[:_MOST_NOTES]:
        click.echo(str(item))
    if len(notes) > _MOST_NOTES:
        click.echo(f"and {len(notes) - _MOST_NOTES} more notes; --json gives all")
    counts = ", ".join(f"{count} {what}" for what, count in report.checked.items())
    word = "passed" if report.passed else f"FAILED, {len(report.failures)} failure(s)"
    click.echo(f"audit {word}; checked {counts or 'nothing'}")


def _signatures(report: AuditReport) -> dict[str, list[str]]:
    """What is to be said of signatures -> the files of which it is to be said."""
    said: dict[str, list[str]] = {}
    for signature in report.signatures:
        said.setdefault(signature.text, []).append(signature.file)
    return said
