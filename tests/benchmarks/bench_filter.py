"""A filter step on the comparison of 1 000 lamps, in a real browser.

Run: python tests/benchmarks/bench_filter.py, from the top folder. Each step is timed from the
event to the next frame after layout, with the columns shown at first and with all columns; once
step upon step, and once with a pause in which the rows and drawings that follow come to rest.
"""

from __future__ import annotations

import shutil
import tempfile
from dataclasses import replace
from decimal import Decimal
from pathlib import Path
from statistics import median

from playwright.sync_api import Page, sync_playwright

from generator.comparison import compare
from generator.datasets import sources
from generator.metrics import curves_of
from generator.pipeline import assess
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.figure import FigureSet
from generator.sheets import describe_comparison, render_html, site_assets

DEMO = Path(__file__).resolve().parents[2] / "content" / "harbour-school-relamping"
LAMPS = 1000
PAUSES_MS = (0, 400)
STEPS = ("v", "ve", "vel", "velx", "vel", "", "12", "1", "", "tube", "")
FILTERS = (("#verdict", "fail"), ("#verdict", ""), ("#bidder", "Sundrel"), ("#bidder", ""))

_TIMED = """
([selector, value]) => new Promise(done => {
  const field = document.querySelector(selector);
  const start = performance.now();
  field.value = value;
  field.dispatchEvent(new Event(field.tagName === "SELECT" ? "change" : "input", {bubbles: true}));
  document.body.offsetHeight;
  const laidOut = performance.now();
  requestAnimationFrame(() => setTimeout(() => done([laidOut - start, performance.now() - start])));
})
"""


def many_lamps(count: int) -> tuple[Assessment, SheetContext]:
    """The lamps of the demo again and again, each copy a little different."""
    demo = assess(DEMO)
    curves = curves_of(demo.campaign, demo.figures)
    means = [item for item in demo.figures if not item.unit_id]
    lamps, figures, verdicts, drawn = [], [], [], {}
    for number in range(count):
        source = demo.campaign.lamps[number % len(demo.campaign.lamps)]
        name = f"{source.lamp_id}-{number}"
        lamps.append(replace(source, lamp_id=name, model=f"{source.model} {number}"))
        drawn[name] = curves[source.lamp_id]
        factor = Decimal(1) + Decimal(number % 97) / 1000
        for item in means:
            if item.lamp_id == source.lamp_id:
                value = item.value * factor if isinstance(item.value, Decimal) else item.value
                figures.append(replace(item, lamp_id=name, value=value))
        verdicts += [replace(item, lamp_id=name) for item in demo.verdicts_of(source.lamp_id)]
    campaign = replace(demo.campaign, lamps=tuple(lamps))
    assessment = replace(
        demo, campaign=campaign, figures=FigureSet(figures), verdicts=tuple(verdicts), findings=()
    )
    matrix = compare(assessment.campaign.lamps, assessment.figures, assessment.verdicts)
    return assessment, SheetContext(sources(), drawn, matrix, with_pdf=False)


def write_page(folder: Path, count: int) -> Path:
    """Write the page and its assets."""
    assessment, context = many_lamps(count)
    sheet = describe_comparison(assessment, context)
    for name, content in site_assets(sheet.frame.theme).items():
        path = folder / "assets" / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_bytes(content)
    page = folder / "index.html"
    page.write_text(render_html(sheet), encoding="utf-8")
    return page


def report(page: Page, what: str, pause_ms: int) -> None:
    """Time every step and print the slowest."""
    times = []
    for step in [*(("#find", text) for text in STEPS), *FILTERS]:
        times.append(page.evaluate(_TIMED, step))
        page.wait_for_timeout(pause_ms)
    laid_out, framed = [time[0] for time in times], [time[1] for time in times]
    print(
        f"{what}, pause of {pause_ms} ms: script and layout, median {median(laid_out):.0f} ms, "
        f"slowest {max(laid_out):.0f} ms; to the next frame, median {median(framed):.0f} ms, "
        f"slowest {max(framed):.0f} ms (at most 100 asked)"
    )


def main() -> None:
    """Print how long a filter step takes."""
    with tempfile.TemporaryDirectory() as folder, sync_playwright() as playwright:
        path = write_page(Path(folder), LAMPS)
        print(f"{LAMPS} lamps, page of {path.stat().st_size / 1e6:.1f} MB")
        browser = playwright.chromium.launch(
            executable_path=shutil.which("chromium"), args=["--no-sandbox", "--disable-gpu"]
        )
        page = browser.new_page(viewport={"width": 1440, "height": 900})
        page.goto(path.as_uri())
        page.wait_for_timeout(1000)
        for pause_ms in PAUSES_MS:
            report(page, "columns shown at first", pause_ms)
        page.evaluate("document.querySelector('#columns-all').click()")
        page.wait_for_timeout(1000)
        for pause_ms in PAUSES_MS:
            report(page, "all columns", pause_ms)
        browser.close()


if __name__ == "__main__":
    main()
