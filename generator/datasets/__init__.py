"""Shipped reference tables and the list of sources, loaded once; nothing else reads files here."""

from generator.datasets.centres import CIRCLE_STEP, Centre, CentreSystem, centres
from generator.datasets.methods import Method, method, methods
from generator.datasets.sources import Source, sources
from generator.datasets.tables import ReferenceTable, reference_table, table_names

__all__ = [
    "CIRCLE_STEP",
    "Centre",
    "CentreSystem",
    "Method",
    "ReferenceTable",
    "Source",
    "centres",
    "method",
    "methods",
    "reference_table",
    "sources",
    "table_names",
]
