"""The command line: arguments in, pipeline called, results out; exit status as documented.

Exit status: 0 done; 1 the data have problems (all listed, nothing written); 2 wrong use of
the command. Messages go to standard error; standard output carries results only.
"""

from __future__ import annotations

import importlib
import os
from typing import NoReturn

import click

__all__ = ["command", "main"]

_COMMANDS = {
    "start": "Make a new campaign folder to fill in.",
    "issue": "Check, compute, judge and write the sheets of a campaign.",
    "check": "Read a campaign, list every problem, write nothing.",
    "measure": "Give the figures of single spectrum, light or mains files.",
    "clauses": "Show the law book as it stood on a date.",
    "explain": "Trace one figure or verdict back to its files and clause.",
    "audit": "Say whether an issue is intact, and follows from its data.",
}


class _LazyGroup(click.Group):
    """Imports a command's module only when it is called, so that each answers fast."""

    def list_commands(self, ctx: click.Context) -> list[str]:  # noqa: ARG002 - click's signature
        return list(_COMMANDS)

    def get_command(
        self,
        ctx: click.Context,  # noqa: ARG002 - click's signature
        cmd_name: str,
    ) -> click.Command | None:
        if cmd_name not in _COMMANDS:
            return None
        module = importlib.import_module(f"generator.cli.{cmd_name}")
        loaded: click.Command = module.command
        return loaded

    def format_commands(
        self,
        ctx: click.Context,  # noqa: ARG002 - click's signature
        formatter: click.HelpFormatter,
    ) -> None:
        with formatter.section("Commands"):
            formatter.write_dl(list(_COMMANDS.items()))


@click.group(cls=_LazyGroup, context_settings={"help_option_names": ["-h", "--help"]})
@click.version_option(package_name="lampassay", message="%(package)s %(version)s")
def command() -> None:
    """Turn measured lamp data (CSV) into comparative spec sheets (HTML and PDF).

    Verdicts are indicative: the authority, local codes and licensed practice decide.
    """


def main() -> NoReturn:
    """Run the command; the entry point of ``lampassay``."""
    # Batches are small; a second thread of the linear algebra library costs more than it brings.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    from generator.errors import LampassayError

    try:
        command(prog_name="lampassay")
    except LampassayError as error:
        click.echo(str(error), err=True)
        raise SystemExit(error.exit_status) from None
    raise SystemExit(0)
