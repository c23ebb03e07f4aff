"""lampassay: comparative spec sheets with verdicts from measured LED lamp data.

``issue`` writes the sheets of a campaign folder, ``check`` lists its problems, ``measure`` gives
the figures of single files. The command ``lampassay`` does the same from a terminal.
"""

from generator.errors import DataProblems
from generator.pipeline import Issued, check, issue, measure

__all__ = ["DataProblems", "Issued", "check", "issue", "measure"]
