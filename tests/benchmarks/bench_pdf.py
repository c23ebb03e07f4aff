"""What a page of a lamp's PDF costs, beside a blank one-page document, timed in the same run.

Run from the root of the checkout, on one core::

    python tests/benchmarks/bench_pdf.py CAMPAIGN_FOLDER [LAMP_ID ...]

Prints, for each lamp and for every theme, the pages and the
time of a page as a multiple of the blank document. Both are made by the same warm engine, the
whole way from the description to the bytes; runs are interleaved and the median is kept. The bar
is ten blank documents a page.
"""

from __future__ import annotations

import dataclasses
import io
import statistics
import sys
import time
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

import pikepdf

from generator.datasets import sources
from generator.datasets.methods import method
from generator.metrics import curves_of
from generator.pipeline import assess
from generator.records.comparison import SheetContext
from generator.records.settings import SheetTable
from generator.sheets import describe_lamp, pdf_engine, render_pdf, themes
from generator.sheets.pdf_sheet import written_pdf

ROUNDS = 7
BLANK = (
    '<!DOCTYPE html><html lang="en"><head><title>blank</title></head><body><p>.</p></body></html>'
)


def seconds(work):
    """Time of one call in the processor [s]."""
    start = time.process_time()
    work()
    return time.process_time() - start


def in_theme(assessment, theme):
    """The same assessment, to be issued in another theme."""
    dressed = assessment.campaign.settings.model_copy(update={"sheet": SheetTable(theme=theme)})
    campaign = dataclasses.replace(assessment.campaign, settings=dressed)
    return dataclasses.replace(assessment, campaign=campaign)


def measured(sheet):
    """Pages, and the time of a page as a multiple of the blank document."""
    engine = pdf_engine(sheet.frame.theme)
    blank = lambda: written_pdf(engine.lay_out(BLANK))  # noqa: E731 - short and local
    with pikepdf.open(io.BytesIO(render_pdf(sheet))) as pdf:
        pages = len(pdf.pages)
    blank()
    times = [(seconds(lambda: render_pdf(sheet)), seconds(blank)) for _ in range(ROUNDS)]
    whole, floor = (statistics.median(column) for column in zip(*times, strict=True))
    return pages, whole, floor


def main():
    """Measure the lamps named, the first two where none is."""
    assessment = assess(sys.argv[1])
    chosen = sys.argv[2:] or [lamp.lamp_id for lamp in assessment.campaign.lamps[:2]]
    known = {item.method: found for item in assessment.figures if (found := method(item.method))}
    context = SheetContext(
        sources(), curves_of(assessment.campaign, assessment.figures), methods=known
    )
    for theme in themes():
        dressed = in_theme(assessment, theme)
        for lamp_id in chosen:
            pages, whole, floor = measured(describe_lamp(dressed, lamp_id, context))
            print(
                f"{theme:12} {lamp_id:24} {pages} pages  {1000 * whole:6.0f} ms  "
                f"blank {1000 * floor:5.1f} ms  {whole / floor / pages:5.1f} blank documents a page"
            )


if __name__ == "__main__":
    main()
