"""Writes the command reference between the markers of README.md from the help texts."""

from __future__ import annotations

from pathlib import Path

import click

from generator.cli import command

README = Path(__file__).parents[2] / "README.md"
OPEN = "<!-- commands -->"
CLOSE = "<!-- /commands -->"


def usage(name: str) -> str:
    """One line of the reference: the command as it is typed, and what it does."""
    context = click.Context(command, info_name="lampassay")
    loaded = command.get_command(context, name)
    assert loaded is not None
    inner = click.Context(loaded, info_name=name, parent=context)
    words = ["lampassay", name]
    for parameter in loaded.get_params(inner):
        if isinstance(parameter, click.Argument):
            words.append(parameter.make_metavar(inner))
        elif isinstance(parameter, click.Option) and "--help" not in parameter.opts:
            option = parameter.opts[0]
            if not parameter.is_flag:
                option += f" {VALUES.get(option, parameter.make_metavar(inner))}"
            words.append(f"[{option}]")
    return " ".join(words)


VALUES = {"--on": "DATE", "--to": "FOLDER", "--jobs": "N", "--archive": "FILE"}


def reference() -> str:
    """The whole block between the markers."""
    context = click.Context(command, info_name="lampassay")
    lines = [usage(name) for name in command.list_commands(context)]
    return "\n".join(["```", *lines, "```"])


def with_reference(text: str) -> str:
    """The README with the block replaced."""
    head, rest = text.split(OPEN)
    _, tail = rest.split(CLOSE)
    return f"{head}{OPEN}\n{reference()}\n{CLOSE}{tail}"


if __name__ == "__main__":
    README.write_text(with_reference(README.read_text(encoding="utf-8")), encoding="utf-8")
