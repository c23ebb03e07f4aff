"""The pages and documents of an issue, written into a folder that is still being built."""

from __future__ import annotations

import logging
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

from generator.publish.documents import in_processes
from generator.sheets import (
    ComparisonSheet,
    LampSheet,
    SheetAttachment,
    TenderDocument,
    TenderSheets,
    page_place,
    pdf_engine_missing,
    render_html,
    render_pdf,
    site_assets,
    tree_of,
)

__all__ = ["SheetTree", "Site", "write_documents", "write_pages"]

_log = logging.getLogger("lampassay")

Document = ComparisonSheet | LampSheet | TenderDocument


@dataclass(frozen=True, slots=True)
class SheetTree:
    """The sheets of one issue in one language.

    Parameters
    ----------
    comparison
        The comparison of all lamps.
    lamps
        ``lamp_id`` -> spec sheet.
    tender
        Report and letters; ``None`` where the campaign is no tender.
    """

    comparison: ComparisonSheet
    lamps: Mapping[str, LampSheet]
    tender: TenderSheets | None = None

    def pages(self) -> Iterator[tuple[str, Document]]:
        """Give every sheet with its path inside the tree, ending in ``.html``."""
        yield "index.html", self.comparison
        for lamp_id, sheet in self.lamps.items():
            yield f"lamps/{lamp_id}.html", sheet
        for name, document in self._of_tender():
            yield f"{name}.html", document

    def documents(self) -> Iterator[tuple[str, Document]]:
        """Give every sheet with its path inside the tree, ending in ``.pdf``."""
        yield "comparison.pdf", self.comparison
        for lamp_id, sheet in self.lamps.items():
            yield f"lamps/{lamp_id}.pdf", sheet
        for name, document in self._of_tender():
            yield f"{name}.pdf", document

    def _of_tender(self) -> Iterator[tuple[str, TenderDocument]]:
        if self.tender is not None:
            yield "tender/report", self.tender.report
            for name, letter in self.tender.letters.items():
                yield f"tender/letters/{name}", letter


@dataclass(frozen=True, slots=True)
class Site:
    """The sheets of one issue.

    Parameters
    ----------
    trees
        Language -> its sheets; the tree of the first is the root of the issue.
    theme
        Theme whose assets the pages need.
    overrides
        Folder of the campaign with templates of its own for the theme; ``None`` without one.
    """

    trees: Mapping[str, SheetTree]
    theme: str
    overrides: Path | None = None

    @property
    def languages(self) -> tuple[str, ...]:
        """Languages of the issue."""
        return tuple(self.trees)


def write_pages(folder: Path, site: Site) -> None:
    """Write the HTML pages of every language and the assets they need.

    Parameters
    ----------
    folder
        Folder being built.
    site
        The sheets.
    """
    for name, content in site_assets(site.theme, site.overrides).items():
        _write(folder / "assets" / name, content)
    for language, tree in site.trees.items():
        for name, sheet in tree.pages():
            page = render_html(sheet, page_place(name, language, site.languages))
            _write(folder / tree_of(language, site.languages) / name, page.encode())


def _write(path: Path, content: bytes) -> None:
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_bytes(content)


@dataclass(frozen=True, slots=True)
class _Task:
    """One PDF to be made: the sheet, and the files it carries."""

    sheet: Document
    attachments: Sequence[SheetAttachment]


def _rendered(task: _Task) -> bytes:
    return render_pdf(task.sheet, attachments=task.attachments)


def write_documents(
    folder: Path,
    site: Site,
    jobs: int,
    attachments: Mapping[str, Sequence[SheetAttachment]] | None = None,
) -> None:
    """Write the PDF documents of every language, several at once in processes of their own.

    Parameters
    ----------
    folder
        Folder being built; the pages are there already.
    site
        The sheets.
    jobs
        Number of processes.
    attachments
        Path of a document inside the tree of a language -> files to put inside it.

    Raises
    ------
    SheetError
        If a document cannot be rendered; names every one that cannot.
    """
    inside = attachments or {}
    tasks = [
        (f"{tree_of(language, site.languages)}{name}", _Task(sheet, inside.get(name, ())))
        for language, tree in site.trees.items()
        for name, sheet in tree.documents()
    ]
    for count, (name, content) in enumerate(in_processes(_rendered, tasks, jobs), start=1):
        _write(folder / name, content)
        _log.info("  %d of %d: %s", count, len(tasks), name)


def missing_engine() -> str | None:
    """Why no PDF can be rendered on this machine, in one line; ``None`` where it can."""
    return pdf_engine_missing()
