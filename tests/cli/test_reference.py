"""The README's command reference is what the commands say of themselves."""

from __future__ import annotations

import runpy
from pathlib import Path

import pytest
from click.testing import CliRunner

from generator.cli import command

HERE = Path(__file__).parent
README = HERE.parents[1] / "README.md"


def test_readme_holds_the_current_reference() -> None:
    writer = runpy.run_path(str(HERE / "write_reference.py"))
    text = README.read_text(encoding="utf-8")
    assert writer["with_reference"](text) == text, "run `make reference`"


@pytest.mark.parametrize("name", command.list_commands(None))  # type: ignore[arg-type]
def test_every_command_explains_itself(name: str) -> None:
    result = CliRunner().invoke(command, [name, "--help"])
    assert result.exit_code == 0
    assert name in README.read_text(encoding="utf-8")
    assert len(result.output.splitlines()) > 5


def test_wrong_use_exits_with_2() -> None:
    assert CliRunner().invoke(command, ["issue"]).exit_code == 2
    assert CliRunner().invoke(command, ["measur"]).exit_code == 2
    assert CliRunner().invoke(command, ["issue", "x", "--on", "soon"]).exit_code == 2
