"""From an assessment to sheets: one description, rendered as a page and as a PDF.

The engine for PDF is imported when the first PDF is asked for, so that pages can be made without
its system libraries.
"""

from __future__ import annotations

from generator.sheets.comparison_description import ComparisonSheet
from generator.sheets.comparison_sheet import describe_comparison
from generator.sheets.html_sheet import render_html
from generator.sheets.lamp_description import LampSheet
from generator.sheets.lamp_sheet import describe_lamp
from generator.sheets.own_words import own_words
from generator.sheets.page_place import PagePlace, page_place, tree_of
from generator.sheets.pdf_sheet import (
    PdfEngine,
    SheetAttachment,
    pdf_engine,
    pdf_engine_missing,
    render_pdf,
)
from generator.sheets.tender_description import TenderDocument, TenderSheets
from generator.sheets.tender_letter import describe_letters
from generator.sheets.tender_report import describe_tender_report
from generator.sheets.themes import (
    palette,
    site_assets,
    templates_folder,
    theme_overrides,
    theme_problems,
    themes,
)
from generator.sheets.typeface import printable, uncovered_characters

__all__ = [
    "ComparisonSheet",
    "LampSheet",
    "PagePlace",
    "PdfEngine",
    "SheetAttachment",
    "TenderDocument",
    "TenderSheets",
    "describe_comparison",
    "describe_lamp",
    "describe_letters",
    "describe_tender_report",
    "own_words",
    "page_place",
    "palette",
    "pdf_engine",
    "pdf_engine_missing",
    "printable",
    "render_html",
    "render_pdf",
    "site_assets",
    "templates_folder",
    "theme_overrides",
    "theme_problems",
    "themes",
    "tree_of",
    "uncovered_characters",
]
