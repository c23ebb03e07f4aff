"""What the command says while it works: stage names and warnings, on standard error."""

from __future__ import annotations

import logging
import sys

__all__ = ["log_to_stderr"]


def log_to_stderr() -> None:
    """Send the program's own log to standard error, one plain line a message.

    Levels mean: error, the sheets cannot be issued; warning, issued with a gap that is named on
    the sheet; info, the stage at work.
    """
    handler = logging.StreamHandler(sys.stderr)
    handler.setFormatter(logging.Formatter("%(message)s"))
    logger = logging.getLogger("lampassay")
    logger.handlers[:] = [handler]
    logger.setLevel(logging.INFO)
    logger.propagate = False
