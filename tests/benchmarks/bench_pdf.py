"""What a page of a lamp's PDF costs, beside blank one-page documents, timed in the same run.

Run from the root of the checkout, on one core::

    python tests/benchmarks/bench_pdf.py CAMPAIGN_FOLDER [LANGUAGE]

For every theme the first lamps of the campaign warm the engine up; each of the others is made
once, the whole way from the description to the bytes, as in a batch. Between them blank documents
are made, and the median of each kind is a baseline:

- ``by default``: one call of the engine as it comes, nothing kept from the call before; the bar is
  ten of these a page;
- ``faces kept``: the same with the faces loaded once;
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
from generator.language.speaking import speaking
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
    for kept in ({}, {"font_config": faces}):
        start = time.process_time()
        HTML(string=sys.argv[1]).write_pdf(**kept)
        print(time.process_time() - start, flush=True)
"""
WARMING = 3
BASELINES = ("by default", "faces kept", "our own way")
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

    def blanks(self):
        """Times of a blank document, by default and with the faces kept [s]."""
        self._process.stdin.write("\n")
        self._process.stdin.flush()
        return [float(self._process.stdout.readline()) for _ in range(2)]


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
        with speaking(sys.argv[2] if len(sys.argv) > 2 else "en"):
            sheets = [describe_lamp(dressed, lamp, context) for lamp in lamps]
        engine = pdf_engine(theme)
        blank = lambda engine=engine: written_pdf(engine.lay_out(BLANK))  # noqa: E731 - short
        for sheet in sheets[:WARMING]:
            render_pdf(sheet)
            blank()
            plain_engine.blanks()
        costs, floors = [], []
        for sheet in sheets[WARMING:]:
            data, spent = seconds(lambda sheet=sheet: render_pdf(sheet))
            costs.append(spent / pages_of(data))
            floors.append([*plain_engine.blanks(), seconds(blank)[1]])
        page, most = statistics.median(costs), max(costs)
        print(f"{theme:12} {1000 * page:4.0f} ms a page, dearest {1000 * most:4.0f}", end="")
        for name, times in zip(BASELINES, zip(*floors, strict=True), strict=True):
            floor = statistics.median(times)
            print(f"   {name} {page / floor:4.1f}, {most / floor:4.1f}", end="")
        print()


if __name__ == "__main__":
    main()
