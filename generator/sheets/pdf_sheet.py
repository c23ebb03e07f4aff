"""From a description to a PDF: one warm engine per process and theme, closed to the outside."""

from __future__ import annotations

import atexit
import contextlib
import gc
import io
import logging
import warnings
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from datetime import UTC, date, datetime
from functools import cache
from pathlib import Path
from types import SimpleNamespace
from typing import Any
from xml.etree.ElementTree import Element

from generator.errors import SheetError
from generator.sheets.engine_shortcuts import (
    TooFullError,
    lean_defaults,
    put_aside_drawings,
    take_shortcuts,
)
from generator.sheets.engine_styles import remember_styles
from generator.sheets.engine_text import forget_lines
from generator.sheets.html_sheet import Sheet, render_paper
from generator.sheets.lamp_description import LampSheet
from generator.sheets.paper_fit import Trials, fitted
from generator.sheets.paper_tree import page_tree
from generator.sheets.pdf_archive import ACCESSIBILITY_CLAIM, finish_archive
from generator.sheets.themes import FACES, font_bytes, paper_style

__all__ = [
    "MOST_LAMP_PAGES",
    "MOST_SHORT_PAGES",
    "PdfEngine",
    "SheetAttachment",
    "pdf_engine",
    "pdf_engine_missing",
    "render_pdf",
    "written_pdf",
]

MOST_LAMP_PAGES = 4
MOST_SHORT_PAGES = 2
_SHORT_FORM_ENDS = "behind"
_VARIANT = "pdf/a-3a"
_CURE = (
    "the PDF engine lacks its system libraries: install Pango "
    "(Debian: apt install libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0; "
    "macOS: brew install pango)"
)


@dataclass(frozen=True, slots=True)
class SheetAttachment:
    """A file to put inside the PDF.

    Parameters
    ----------
    name
        File name; its ending tells the kind.
    data
        Content.
    description
        What it is, in words.
    relationship
        ``Data``, ``Source``, ``Supplement`` or ``Alternative``.
    """

    name: str
    data: bytes
    description: str
    relationship: str = "Data"


@cache
def pdf_engine_missing() -> str | None:
    """Say in one line why no PDF can be made; ``None`` where it can."""
    try:
        with contextlib.redirect_stdout(io.StringIO()):
            import weasyprint
    except OSError:
        return _CURE
    del weasyprint
    return None


def _asset_fetcher() -> Any:
    """A fetcher that knows the bundled faces and refuses everything else."""
    from weasyprint.urls import FatalURLFetchingError, URLFetcher, URLFetcherResponse

    assets = {f"asset:/fonts/{face}": font_bytes(face) for face in FACES}

    class AssetFetcher(URLFetcher):  # type: ignore[misc] # the library has no types
        """Serves the bundled faces alone."""

        def fetch(self, url: str, headers: Any = None) -> Any:
            del headers
            if url not in assets:
                raise FatalURLFetchingError(f"not an asset of the sheets: {url}")
            return URLFetcherResponse(url, assets[url], {"Content-Type": "font/ttf"})

    return AssetFetcher(allowed_protocols=(), allow_redirects=False, fail_on_errors=True)


class _WrappedWhenAsked:
    """The root of a page, for the selectors of the engine; most pages need none of them.

    Parameters
    ----------
    root
        The tree of the page.
    """

    def __init__(self, root: Element) -> None:
        self.etree_element = root

    def query_all(self, *tags: str) -> Iterator[Any]:
        """Find the elements of some tags, in the order of the page."""
        return (
            SimpleNamespace(etree_element=item)
            for item in self.etree_element.iter()
            if item.tag in tags
        )

    def iter_subtree(self) -> Any:
        """Wrap every element of the page."""
        from cssselect2 import ElementWrapper

        return ElementWrapper.from_html_root(
            self.etree_element, content_language=None
        ).iter_subtree()


def _read(page: str, fetcher: Any) -> Any:
    """Give the page to the engine as a tree; as text where it is not well formed."""
    from weasyprint import HTML

    root = page_tree(page)
    if root is None:
        return HTML(string=page, url_fetcher=fetcher)
    put_aside_drawings(root)
    document = HTML.__new__(HTML)
    document.base_url, document.url_fetcher, document.media_type = None, fetcher, "print"
    document.wrapper_element, document.etree_element = _WrappedWhenAsked(root), root
    return document


@contextlib.contextmanager
def _collected_afterwards() -> Iterator[None]:
    """Keep the collector from running amid a document; collect after it.

    What is alive then stays for all documents and need not be looked at after each.
    """
    was_on = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if was_on:
            gc.enable()
        gc.collect()
        gc.freeze()


class PdfEngine:
    """The engine, warm: one font configuration and one style sheet for every document.

    Parameters
    ----------
    theme
        Folder of the theme.
    overrides
        Folder of the campaign with tokens and rules of its own; ``None`` where it has none.

    Raises
    ------
    SheetError
        If the system libraries are absent.
    """

    def __init__(self, theme: str, overrides: Path | None = None) -> None:
        missing = pdf_engine_missing()
        if missing:
            raise SheetError(missing)
        from weasyprint import CSS
        from weasyprint.text.fonts import FontConfiguration

        logging.getLogger("weasyprint").setLevel(logging.ERROR)
        take_shortcuts()
        self._fetcher = _asset_fetcher()
        self._fonts = FontConfiguration()
        written = {
            of_lamp: paper_style(theme, overrides, of_lamp=of_lamp) for of_lamp in (True, False)
        }
        self._styles = {
            of_lamp: CSS(string=style, url_fetcher=self._fetcher, font_config=self._fonts)
            for of_lamp, style in written.items()
        }
        for of_lamp, style in written.items():
            remember_styles(self._styles[of_lamp], style)
        self._defaults = lean_defaults(written[False])
        gc.freeze()

    def lay_out(self, page: str, *, of_lamp: bool = True, most_pages: int | None = None) -> Any:
        """Lay out a page of HTML; give the document of the engine.

        Parameters
        ----------
        page
            A whole page.
        of_lamp
            Whether it is a page of one lamp; pages of many have rules of their own.
        most_pages
            How many pages it may have, page one alone up to the break of the style sheet.

        Raises
        ------
        TooFullError
            Where it does not keep to them, if the engine can tell early.
        """
        document = _read(page, self._fetcher)
        document.most_pages = most_pages
        if self._defaults is not None:
            document._ua_stylesheets = lambda _forms: [self._defaults]
        return document.render(
            font_config=self._fonts, stylesheets=[self._styles[of_lamp]], pdf_variant=_VARIANT
        )

    def render(self, sheet: Sheet, attachments: Iterable[SheetAttachment] = ()) -> bytes:
        """Render the PDF of a sheet.

        Parameters
        ----------
        sheet
            The description.
        attachments
            Files to put inside.

        Returns
        -------
        bytes
            PDF/A-3a with a PDF/UA-1 claim; the same bytes for the same sheet, always.

        Raises
        ------
        SheetError
            If a lamp does not fit on its pages.
        """
        with _collected_afterwards():
            _forget_past_texts()
            document = self._fitting(sheet)
            document.metadata.attachments = _attached(attachments, sheet.frame.assessed_on)
            _claim_accessibility(document)
            return written_pdf(document)

    def _fitting(self, sheet: Sheet) -> Any:
        if not isinstance(sheet, LampSheet):
            return self.lay_out(render_paper(sheet), of_lamp=False)
        most = MOST_SHORT_PAGES if sheet.frame.short else MOST_LAMP_PAGES
        trials, tried, alone = Trials(sheet), "", False
        while (budget := trials.budget) is not None:
            page = render_paper(fitted(sheet, budget), dense=budget.dense)
            if page != tried:
                tried = page
                try:
                    document = self.lay_out(page, most_pages=most)
                except TooFullError as full:
                    alone = not full.page_one
                else:
                    alone = _short_form_fits(document)
                    if alone and len(document.pages) <= most:
                        return document
            trials.tighten(page_one=not alone)
        raise SheetError(f"the sheet of {sheet.lamp_id} does not fit on {most} pages")


def _short_form_fits(document: Any) -> bool:
    """Whether page one stands alone: what lies behind it begins on page two."""
    return any(_SHORT_FORM_ENDS in page.anchors for page in document.pages[1:2])


def written_pdf(document: Any) -> bytes:
    """Write a laid-out document."""
    with warnings.catch_warnings():
        # The engine leaves the file of its colour profile to be closed by the interpreter.
        warnings.simplefilter("ignore", ResourceWarning)
        return bytes(document.write_pdf(pdf_variant=_VARIANT, finisher=finish_archive))


def _forget_past_texts() -> None:
    """Let go of what was kept of the texts of past documents where it has become much."""
    if take_shortcuts():
        from generator.sheets.setting.shapes import forget_shapes

        forget_lines()
        forget_shapes()


def _claim_accessibility(document: Any) -> None:
    plain = document.metadata.generate_rdf_metadata

    def claimed(*arguments: Any, **named: Any) -> bytes:
        written: bytes = plain(*arguments, **named)
        return written.replace(b"</rdf:RDF>", ACCESSIBILITY_CLAIM + b"</rdf:RDF>")

    document.metadata.generate_rdf_metadata = claimed


def _attached(attachments: Iterable[SheetAttachment], assessed_on: str) -> list[Any]:
    from weasyprint import Attachment

    day = date.fromisoformat(assessed_on)
    moment = datetime(day.year, day.month, day.day, tzinfo=UTC)
    return [
        Attachment(
            string=item.data,
            name=item.name,
            description=item.description,
            created=moment,
            modified=moment,
            relationship=item.relationship,
        )
        for item in sorted(attachments, key=lambda item: item.name)
    ]


@cache
def pdf_engine(theme: str, overrides: Path | None = None) -> PdfEngine:
    """Give the engine of this process for a theme, warm from the second call on."""
    atexit.register(_let_go)
    return PdfEngine(theme, overrides)


def _let_go() -> None:
    """Let the engines go while the interpreter is whole; later they would complain."""
    pdf_engine.cache_clear()
    gc.unfreeze()
    gc.collect()


def render_pdf(sheet: Sheet, *, attachments: Iterable[SheetAttachment] = ()) -> bytes:
    """Render the PDF of a sheet with the engine of this process.

    Parameters
    ----------
    sheet
        The description.
    attachments
        Files to put inside.

    Raises
    ------
    SheetError
        If the system libraries are absent, or a lamp does not fit on its pages.
    """
    return pdf_engine(sheet.frame.theme, sheet.frame.overrides).render(sheet, attachments)
