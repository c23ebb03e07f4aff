"""The pages and documents of an issue, written into a folder that is still being built."""

from __future__ import annotations

import logging
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

from generator.publish.documents import in_processes
from generator.sheets import (
    ComparisonSheet,
    LampSheet,
    SheetAttachment,
    pdf_engine_missing,
    render_html,
    render_pdf,
    site_assets,
)

__all__ = ["Site", "write_documents", "write_pages"]

_log = logging.getLogger("lampassay")


@dataclass(frozen=True, slots=True)
class Site:
    """The sheets of one issue.

    Parameters
    ----------
    comparison
        The comparison of all lamps.
    lamps
        ``lamp_id`` -> spec sheet.
    theme
        Theme whose assets the pages need.
    overrides
        Folder of the campaign with templates of its own for the theme; ``None`` without one.
    """

    comparison: ComparisonSheet
    lamps: Mapping[str, LampSheet]
    theme: str
    overrides: Path | None = None


def write_pages(folder: Path, site: Site) -> None:
    """Write the HTML pages and the assets they need.

    Parameters
    ----------
    folder
        Folder being built.
    site
        The sheets.
    """
    (folder / "lamps").mkdir()
    for name, content in site_assets(site.theme, site.overrides).items():
        path = folder / "assets" / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_bytes(content)
    page = render_html(site.comparison, asset_prefix="assets/")
    (folder / "index.html").write_text(page, encoding="utf-8", newline="\n")
    for lamp_id, sheet in site.lamps.items():
        page = render_html(sheet, asset_prefix="../assets/")
        (folder / "lamps" / f"{lamp_id}.html").write_text(page, encoding="utf-8", newline="\n")


@dataclass(frozen=True, slots=True)
class _Document:
    """One PDF to be made: the sheet, and the files it carries."""

    sheet: ComparisonSheet | LampSheet
    attachments: Sequence[SheetAttachment]


def _rendered(document: _Document) -> bytes:
    return render_pdf(document.sheet, attachments=document.attachments)


def write_documents(
    folder: Path,
    site: Site,
    jobs: int,
    attachments: Mapping[str, Sequence[SheetAttachment]] | None = None,
) -> None:
    """Write the PDF documents, several at once in processes of their own.

    Parameters
    ----------
    folder
        Folder being built; the pages are there already.
    site
        The sheets.
    jobs
        Number of processes.
    attachments
        Path of a document -> files to put inside it.

    Raises
    ------
    SheetError
        If a document cannot be rendered; names every one that cannot.
    """
    inside = attachments or {}
    sheets: dict[str, ComparisonSheet | LampSheet] = {"comparison.pdf": site.comparison}
    sheets |= {f"lamps/{lamp_id}.pdf": sheet for lamp_id, sheet in site.lamps.items()}
    tasks = [(name, _Document(sheet, inside.get(name, ()))) for name, sheet in sheets.items()]
    for count, (name, content) in enumerate(in_processes(_rendered, tasks, jobs), start=1):
        (folder / name).write_bytes(content)
        _log.info("  %d of %d: %s", count, len(tasks), name)


def missing_engine() -> str | None:
    """Why no PDF can be rendered on this machine, in one line; ``None`` where it can."""
    return pdf_engine_missing()
