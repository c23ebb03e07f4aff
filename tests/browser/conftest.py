"""Issued pages in a real browser, and the checkers that people outside the project wrote.

A test says with ``@pytest.mark.needs("chromium", "axe")`` what it cannot do without. Where that
is absent the test is deselected and named on the terminal with the reason; in CI (``CI=true``)
nothing may be left out, and the session fails instead.
"""

from __future__ import annotations

import csv
import os
import re
import shutil
import subprocess
import sys
from collections.abc import Callable, Collection, Iterator
from functools import cache
from importlib.util import find_spec
from pathlib import Path
from typing import Any

import pytest

TOP = Path(__file__).resolve().parents[2]
NODE = TOP / ".make" / "node" / "node_modules"
AXE = NODE / "axe-core" / "axe.min.js"
NU_CHECKER = NODE / "vnu-jar" / "build" / "dist" / "vnu.jar"
DEMO = TOP / "content" / "harbour-school-relamping"

LAMPS = (
    "veldrune-a60-940",
    "veldrune-gu10-930",
    "corvath-a60-827",
    "ostrelle-t8-840",
    "pemmerick-a67-ultra",
    "quillmoor-gu10-827",
    "brantivar-a60-link",
    "sundrel-a70-stock",
)
"""Lamps of the demo issued here: all kinds, complete ones and sparse ones."""

SPOKEN = '["en", "de"]'
SMALL = ("veldrune-gu10-930", "sundrel-a70-stock")
"""A full lamp, and one to which hardly a clause applies."""

FLAGS = (
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
)


@cache
def chromium() -> str | None:
    names = ("chromium", "chromium-browser", "google-chrome")
    return next(filter(None, map(shutil.which, names)), None)


@cache
def _missing(need: str) -> str:
    """What is not there; empty where it is."""
    if need == "chromium":
        if chromium() is None:
            return "no Chromium"
        return "" if find_spec("playwright") else "no playwright"
    if need == "axe":
        return "" if AXE.is_file() else "no axe-core"
    if need == "pdf":
        from generator.sheets import pdf_engine_missing

        return "no Pango" if pdf_engine_missing() else ""
    if need == "page":
        return "" if find_spec("page") else "no page-validation"
    if need == "nu":
        return _missing_nu()
    raise ValueError(f"no such need: {need!r}")


def _missing_nu() -> str:
    if not NU_CHECKER.is_file():
        return "no Nu checker"
    java = shutil.which("java")
    ran = java and subprocess.run([java, "-version"], capture_output=True, check=False)
    return "" if ran and ran.returncode == 0 else "no Java"


def pytest_configure(config: pytest.Config) -> None:
    config.addinivalue_line(
        "markers", "needs(*names): tools without which the test is left out by name"
    )


def _reason(item: pytest.Item) -> str:
    """Why a test cannot run here; empty where it can."""
    needs = [need for mark in item.iter_markers("needs") for need in mark.args]
    return ", ".join(dict.fromkeys(filter(None, map(_missing, needs))))


def pytest_collection_modifyitems(config: pytest.Config, items: list[pytest.Item]) -> None:
    left_out = {item: reason for item in items if (reason := _reason(item))}
    if not left_out or os.environ.get("CI"):
        return
    config.hook.pytest_deselected(items=list(left_out))
    items[:] = [item for item in items if item not in left_out]
    _tell(config, {item.nodeid: reason for item, reason in left_out.items()})


def pytest_runtest_setup(item: pytest.Item) -> None:
    reason = _reason(item)
    if reason:
        pytest.fail(f"{reason}, and in CI no check may be left out", pytrace=False)


def _tell(config: pytest.Config, left_out: dict[str, str]) -> None:
    """Say it past the capturing of output; of several workers the first one does."""
    if os.environ.get("PYTEST_XDIST_WORKER", "gw0") != "gw0":
        return
    capture = config.pluginmanager.getplugin("capturemanager")
    with capture.global_and_fixture_disabled():
        for name, reason in left_out.items():
            sys.stderr.write(f"\nleft out: {name} ({reason}; see .make/test-tools.sh)")
        sys.stderr.write("\n")


@pytest.fixture(scope="session")
def part_of_the_demo() -> Callable[[Path, Collection[str]], Path]:
    """Gives a function that writes the demo with some of its lamps alone into a folder."""
    return _reduced


def _speak(campaign: Path, languages: str) -> None:
    table = campaign / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    text, count = re.subn(r"(?m)^languages = .*", f"languages = {languages}", text)
    assert count == 1
    table.write_text(text, encoding="utf-8")


def _reduced(target: Path, lamps: Collection[str]) -> Path:
    shutil.copytree(DEMO, target)
    units = set()
    for name in ("lamps.csv", "units.csv", "endurance.csv"):
        path = target / name
        with path.open(encoding="utf-8", newline="") as stream:
            rows = list(csv.DictReader(stream))
        kept = [row for row in rows if row["lamp_id"] in lamps]
        units |= {row["unit_id"] for row in kept if row.get("unit_id")}
        with path.open("w", encoding="utf-8", newline="") as stream:
            writer = csv.DictWriter(stream, list(rows[0]))
            writer.writeheader()
            writer.writerows(kept)
    known = units | set(lamps) | {"campaign"}
    _speak(target, '["en"]')
    for folder in ("spectra", "light", "mains", "intensity", "notes"):
        for path in (target / folder).iterdir():
            if path.name.split(".")[0] not in known:
                path.unlink()
    return target


@pytest.fixture(scope="session")
def issued(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The folder issued from a part of the demo, without documents."""
    from generator.pipeline import issue

    folder = tmp_path_factory.mktemp("issued")
    campaign = _reduced(folder / DEMO.name, LAMPS)
    return issue(campaign, target=folder / "out", pdf=False).folder


@pytest.fixture(scope="session")
def small_issue(tmp_path_factory: pytest.TempPathFactory) -> Callable[[str], Path]:
    """Gives a function: theme -> folder issued from two lamps, a full one and a sparse one."""
    from generator.pipeline import issue

    @cache
    def issued_with(theme: str) -> Path:
        folder = tmp_path_factory.mktemp(theme)
        campaign = _reduced(folder / DEMO.name, SMALL)
        table = campaign / "campaign.toml"
        text, count = re.subn(
            r'(?m)^theme = "\w+"', f'theme = "{theme}"', table.read_text(encoding="utf-8")
        )
        assert count == 1
        table.write_text(text, encoding="utf-8")
        _speak(campaign, SPOKEN)
        return issue(campaign, target=folder / "out", pdf=False).folder

    return issued_with


@pytest.fixture(scope="session")
def pages(small_issue: Callable[[str], Path]) -> list[Path]:
    """One page of every type: comparison, report, letter, a lamp in every theme; some in German."""
    tender = small_issue("tender")
    found = [tender / "index.html", tender / "tender" / "report.html"]
    found.append(min((tender / "tender" / "letters").glob("*.html")))
    found += [tender / "lamps" / f"{name}.html" for name in SMALL]
    found += [tender / "de" / name for name in ("index.html", f"lamps/{SMALL[0]}.html")]
    return [
        *found,
        *(
            small_issue(theme) / "lamps" / f"{SMALL[0]}.html"
            for theme in ("laboratory", "stewardship")
        ),
    ]


@pytest.fixture(scope="session")
def browser() -> Iterator[Any]:
    from playwright.sync_api import sync_playwright

    with sync_playwright() as playwright:
        started = playwright.chromium.launch(executable_path=chromium(), args=list(FLAGS))
        yield started
        started.close()


@pytest.fixture
def visit(browser: Any) -> Iterator[Callable[..., Any]]:
    """Gives a function that opens a page; no page may complain or ask for anything outside."""
    contexts, complaints = [], []

    def visited(path: Path, fragment: str = "", **options: Any) -> Any:
        context = browser.new_context(**options)
        contexts.append(context)
        page = context.new_page()
        page.on("console", lambda message: complaints.append(message.text))
        page.on("pageerror", lambda error: complaints.append(str(error)))
        issues = (folder for folder in path.parents if (folder / "manifest.json").is_file())
        root = next(issues, path.parent)
        inside = (root.as_uri(), "blob:")
        page.on(
            "request", lambda asked: asked.url.startswith(inside) or complaints.append(asked.url)
        )
        page.goto(f"{path.as_uri()}{fragment and '#'}{fragment}")
        return page

    yield visited
    for context in contexts:
        context.close()
    assert complaints == []
