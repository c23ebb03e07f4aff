"""What a page of a lamp's PDF costs, beside blank one-page documents, timed in the same run.

Run from the root of the checkout, on one core::

    python tests/benchmarks/bench_pdf.py CAMPAIGN_FOLDER

For every theme the first lamps of the campaign warm the engine up; each of the others is made
once, the whole way from the description to the bytes, as in a batch. Between them blank documents
are made, and the median of each kind is the baseline:

- ``as it comes``: by the engine without anything of ours, its faces loaded once; the bar is ten
  of these a page;
- ``our own way``: by our engine with its style sheets and shortcuts, as PDF/A-3a.
"""

from __future__ import annotations

import dataclasses
import io
import statistics
import subprocess
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

AS_IT_COMES = """
import sys, time
from weasyprint import HTML
from weasyprint.text.fonts import FontConfiguration
faces = FontConfiguration()
for _ in sys.stdin:
    start = time.process_time()
    HTML(string=sys.argv[1]).write_pdf(font_config=faces)
    print(time.process_time() - start, flush=True)
"""
WARMING = 3
BLANK = (
    '<!DOCTYPE html><html lang="en"><head><title>blank</title></head><body><p>.</p></body></html>'
)


def seconds(work):
    """Result of one call, and its time in the processor [s]."""
    start = time.process_time()
    result = work()
    return result, time.process_time() - start


def in_theme(assessment, theme):
    """The same assessment, to be issued in another theme."""
    dressed = assessment.campaign.settings.model_copy(update={"sheet": SheetTable(theme=theme)})
    campaign = dataclasses.replace(assessment.campaign, settings=dressed)
    return dataclasses.replace(assessment, campaign=campaign)


def pages_of(data):
    """Number of pages of a file."""
    with pikepdf.open(io.BytesIO(data)) as pdf:
        return len(pdf.pages)


class AsItComes:
    """The engine without anything of ours, in a process of its own."""

    def __init__(self):
        self._process = subprocess.Popen(
            [sys.executable, "-c", AS_IT_COMES, BLANK],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            text=True,
        )

    def blank(self):
        """Time of a blank document [s]."""
        self._process.stdin.write("\n")
        self._process.stdin.flush()
        return float(self._process.stdout.readline())


def main():
    """Measure the lamps of a campaign in every theme."""
    plain_engine = AsItComes()
    assessment = assess(sys.argv[1])
    known = {item.method: found for item in assessment.figures if (found := method(item.method))}
    context = SheetContext(
        sources(), curves_of(assessment.campaign, assessment.figures), methods=known
    )
    lamps = [lamp.lamp_id for lamp in assessment.campaign.lamps]
    for theme in themes():
        dressed = in_theme(assessment, theme)
        sheets = [describe_lamp(dressed, lamp, context) for lamp in lamps]
        engine = pdf_engine(theme)
        blank = lambda engine=engine: written_pdf(engine.lay_out(BLANK))  # noqa: E731 - short
        for sheet in sheets[:WARMING]:
            render_pdf(sheet)
            blank()
            plain_engine.blank()
        costs, floors, plains = [], [], []
        for sheet in sheets[WARMING:]:
            data, spent = seconds(lambda sheet=sheet: render_pdf(sheet))
            costs.append(spent / pages_of(data))
            floors.append(seconds(blank)[1])
            plains.append(plain_engine.blank())
        page, own, plain = map(statistics.median, (costs, floors, plains))
        print(
            f"{theme:12} {1000 * page:5.0f} ms a page (largest {1000 * max(costs):4.0f})  "
            f"as it comes: {page / plain:4.1f} of {1000 * plain:4.1f} ms, "
            f"largest {max(costs) / plain:4.1f}  "
            f"our own way: {page / own:4.1f} of {1000 * own:4.1f} ms"
        )


if __name__ == "__main__":
    main()
