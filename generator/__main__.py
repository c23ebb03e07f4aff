"""Runs the command: ``python -m generator`` is ``lampassay``."""

from generator.cli import main

main()
