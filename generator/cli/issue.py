"""``lampassay issue``: check, compute, judge, write the sheets."""

from __future__ import annotations

import os
from contextlib import suppress
from datetime import datetime
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

import click

from generator.cli.progress import log_to_stderr

if TYPE_CHECKING:
    from generator.publish.signing import Signer

__all__ = ["command"]

PASSPHRASE = "LAMPASSAY_PASSPHRASE"  # noqa: S105 - the name of a variable, not a secret


@click.command("issue")
@click.argument("campaign", type=click.Path(exists=True, file_okay=False, path_type=Path))
@click.option(
    "--to",
    "target",
    type=click.Path(path_type=Path),
    help="Folder to write; output/CAMPAIGN under the current folder by default.",
)
@click.option(
    "--on",
    "on",
    type=click.DateTime(["%Y-%m-%d"]),
    help="Date on which the law is read; the campaign's assessment date by default, else today.",
)
@click.option(
    "--jobs",
    type=click.IntRange(min=1),
    help="Documents rendered at once; the number of processors by default.",
)
@click.option("--no-pdf", "no_pdf", is_flag=True, help="Write the HTML sheets and data alone.")
@click.option(
    "--archive",
    type=click.Path(dir_okay=False, path_type=Path),
    help="Also write the issue to one ZIP file, the same for the same inputs.",
)
@click.option(
    "--public",
    is_flag=True,
    help="Also write a public edition beside the target: no prices, client or bidder names.",
)
@click.option(
    "--salt",
    type=click.Path(dir_okay=False, exists=True, path_type=Path),
    help="data/redaction.json of a full edition, for the same code names again.",
)
@click.option(
    "--sign",
    type=click.Path(dir_okay=False, exists=True, path_type=Path),
    help=f"PKCS#12 file to sign with; its passphrase is asked for, or taken from {PASSPHRASE}.",
)
@click.option(
    "--watch",
    is_flag=True,
    help="Issue again whenever a file of the campaign changes, until Ctrl-C.",
)
def command(
    campaign: Path,
    target: Path | None,
    on: datetime | None,
    jobs: int | None,
    archive: Path | None,
    salt: Path | None,
    sign: Path | None,
    *,
    no_pdf: bool,
    public: bool,
    watch: bool,
) -> None:
    """Check a campaign folder, compute its figures, judge them, and write the sheets.

    Nothing is written, and a former output is left as it was, when the data have errors.
    """
    log_to_stderr()
    if salt and not public:
        raise click.UsageError("--salt belongs to --public")
    if sign and watch:
        raise click.UsageError(
            "--sign does not go with --watch: nobody has seen what would be signed; "
            "sign with a last `issue` when the data are settled"
        )
    from generator import pipeline

    once = partial(
        pipeline.issue,
        campaign,
        target=target,
        on=on.date() if on else None,
        jobs=jobs,
        pdf=not no_pdf,
        archive=archive,
        public=public,
        salt=salt,
        signer=_signer(sign) if sign else None,
    )
    if not watch:
        click.echo(str(once().index))
        return
    from generator.pipeline.watching import campaign_watch, issue_on_change

    folder = campaign_watch(campaign, target, archive, public=public)
    with suppress(KeyboardInterrupt):
        for issued in issue_on_change(folder, once):
            click.echo(str(issued.index))


def _signer(file: Path) -> Signer:
    """Open the key; the passphrase never stands on the command line."""
    from generator.publish.signing import open_signer

    passphrase = os.environ.get(PASSPHRASE)
    if passphrase is None:
        passphrase = click.prompt(
            f"Passphrase of {file.name}", default="", hide_input=True, show_default=False, err=True
        )
    return open_signer(file, passphrase)
