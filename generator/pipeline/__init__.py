"""The stages in order: intake, metrics, conformity, crosschecks, comparison, sheets, publish.

``assessing`` goes from the folder to an assessment, ``issuing`` from there to the output folder;
``asking`` answers single questions. No formulas, no formatting.
"""

from generator.pipeline.asking import clauses, explain, measure, start
from generator.pipeline.assessing import assess, check
from generator.pipeline.issuing import Issued, issue, versions_of

__all__ = [
    "Issued",
    "assess",
    "check",
    "clauses",
    "explain",
    "issue",
    "measure",
    "start",
    "versions_of",
]
