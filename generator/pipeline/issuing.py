"""From an assessment to an issued folder: comparison, sheets, publish."""

from __future__ import annotations

import logging
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date
from importlib.metadata import version
from pathlib import Path
from typing import TYPE_CHECKING

from generator.pipeline.assessing import assess

if TYPE_CHECKING:
    import pandas

    from generator.publish import FolderExchange, PublicCampaign
    from generator.publish.signing import Signer
    from generator.publish.site import SheetTree, Site
    from generator.records.assessment import Assessment
    from generator.records.comparison import SheetContext
    from generator.records.harmonic_table import HarmonicTable
    from generator.records.product_field import ProductField

__all__ = ["Issued", "issue", "versions_of"]

_log = logging.getLogger("lampassay")

_LIBRARIES = (
    "babel",
    "jinja2",
    "markdown",
    "nh3",
    "numpy",
    "openpyxl",
    "pandas",
    "pydantic",
    "scipy",
    "weasyprint",
)


@dataclass(frozen=True, slots=True)
class Issued:
    """What was issued, and where.

    Parameters
    ----------
    folder
        The output folder.
    index
        The page to open first.
    lamps
        Number of lamps.
    gaps
        What could not be issued, one sentence each; empty when all is there.
    """

    folder: Path
    index: Path
    lamps: int
    gaps: tuple[str, ...]

    def figures(self) -> pandas.DataFrame:
        """The figures as a table of text, one row per figure; columns as in ``figures.csv``."""
        return _table(self.folder / "data" / "figures.csv")

    def verdicts(self) -> pandas.DataFrame:
        """The verdicts as a table of text, one row each; columns as in ``verdicts.csv``."""
        return _table(self.folder / "data" / "verdicts.csv")


def _table(path: Path) -> pandas.DataFrame:
    """A data file as text throughout, so that every decimal stays as it was written."""
    import pandas

    return pandas.read_csv(path, dtype=str)


def issue(
    campaign: str | Path,
    *,
    target: str | Path | None = None,
    on: date | None = None,
    jobs: int | None = None,
    pdf: bool = True,
    archive: str | Path | None = None,
    public: bool = False,
    salt: str | Path | None = None,
    signer: Signer | None = None,
) -> Issued:
    """Check, compute, judge, and write the sheets of a campaign.

    Parameters
    ----------
    campaign
        The campaign folder.
    target
        Folder to write; ``output/<campaign>`` under the current folder by default. It is
        replaced whole, and only when the new one is complete.
    on
        Date on which the law is read; the campaign's own by default, else today.
    jobs
        PDF documents rendered at once; the number of processors by default.
    pdf
        Whether to render PDF documents.
    archive
        File to write the issue to as one archive, beside the folder.
    public
        Whether to write a public edition too, beside the target: without prices, client and
        bidder names.
    salt
        ``data/redaction.json`` of a full edition, for the same code names and digests again.
    signer
        Who signs documents and manifest; nobody by default.

    Returns
    -------
    Issued
        What was issued, and where.

    Raises
    ------
    DataProblems
        If the data have errors; carries all of them.
    PublishError
        If the target may not be replaced, or a name would stay in the public edition.
    SheetError
        If a document cannot be rendered.
    """
    from generator.publish import FolderExchange, edition_salt, public_place, write_archive
    from generator.publish.site import missing_engine

    source = Path(campaign)
    place = Path(target) if target else Path("output") / source.resolve().name
    exchange = FolderExchange(place, source)
    beside = FolderExchange(public_place(place), source) if public else None
    secret = edition_salt(place, Path(salt) if salt else None) if public else None
    assessment = assess(source, on)
    no_engine = missing_engine() if pdf else None
    making = _Making(jobs, pdf and no_engine is None, signer)
    _write_edition(source, assessment, exchange, making, secret)
    if beside is not None and secret is not None:
        _write_public(source, assessment, beside, making, secret)
    if archive is not None:
        write_archive(place, Path(archive), assessment.campaign.name)
    gaps = (f"No PDF sheets were issued: {no_engine}",) if no_engine else ()
    for gap in gaps:
        _log.warning("%s", gap)
    return Issued(place, place / "index.html", len(assessment.campaign.lamps), gaps)


@dataclass(frozen=True, slots=True)
class _Making:
    """How an edition is made: processes, whether with PDF documents, and who signs."""

    jobs: int | None
    pdf: bool
    signer: Signer | None


def _write_public(
    source: Path, full: Assessment, exchange: FolderExchange, making: _Making, salt: bytes
) -> None:
    from generator.publish import PublishError, public_campaign

    with public_campaign(source, full.campaign, salt) as public:
        assessment = assess(public.folder, full.assessed_on)
        if [item.verdict for item in assessment.verdicts] != [
            item.verdict for item in full.verdicts
        ]:
            raise PublishError("the public edition would give other verdicts than the full one")
        _write_edition(public.folder, assessment, exchange, making, public=public)


def _write_edition(
    source: Path,
    assessment: Assessment,
    exchange: FolderExchange,
    making: _Making,
    salt: bytes | None = None,
    public: PublicCampaign | None = None,
) -> None:
    from generator.metrics.uncertainty.monte_carlo import SEED
    from generator.publish import EditionWriter

    products = _products(assessment)
    site = _sheets(source, assessment, products, with_pdf=making.pdf)
    _log.info("publish: %s", exchange.target)
    writer = EditionWriter(source, assessment, versions_of(assessment), SEED, public)
    with exchange.building() as folder:
        writer.write_data(folder, [field for lamp in products.values() for field in lamp], salt)
        writer.write_sheets(folder, site, pdf=making.pdf, jobs=making.jobs)
        writer.close(folder, making.signer)


def _products(assessment: Assessment) -> dict[str, tuple[ProductField, ...]]:
    """The product information of every lamp."""
    from generator.conformity.product_information import product_information
    from generator.lawbook import read_law_book

    law, day = read_law_book(), assessment.assessed_on
    return {
        lamp.lamp_id: product_information(lamp, assessment.figures, law, day)
        for lamp in assessment.campaign.lamps
    }


def _harmonic_tables(assessment: Assessment) -> dict[str, HarmonicTable]:
    """The limits of the harmonics of every lamp."""
    from generator.conformity.harmonic_table import harmonic_table
    from generator.lawbook import read_law_book

    law, day = read_law_book(), assessment.assessed_on
    return {
        lamp.lamp_id: harmonic_table(lamp, assessment.figures, law, assessment.clauses, day)
        for lamp in assessment.campaign.lamps
    }


def _sheets(
    source: Path,
    assessment: Assessment,
    products: Mapping[str, tuple[ProductField, ...]],
    *,
    with_pdf: bool,
) -> Site:
    from generator.comparison import compare
    from generator.datasets import method, sources
    from generator.language.speaking import quoting, speaking
    from generator.metrics import curves_of
    from generator.publish.site import Site
    from generator.records.comparison import SheetContext
    from generator.sheets import own_words, theme_overrides

    _log.info("comparison")
    campaign = assessment.campaign
    matrix = compare(campaign.lamps, assessment.figures, assessment.verdicts, assessment.findings)
    theme = campaign.settings.sheet.theme
    used = dict.fromkeys(figure.method or figure.grade.value for figure in assessment.figures)
    context = SheetContext(
        sources=sources(),
        curves=curves_of(campaign, assessment.figures),
        matrix=matrix,
        with_pdf=with_pdf,
        methods={key: known for key in used if (known := method(key)) is not None},
        overrides=theme_overrides(source, theme),
        products=products,
        harmonic_tables=_harmonic_tables(assessment),
    )
    words, own = own_words(campaign.settings), campaign.settings.campaign.language
    trees = {}
    for language in campaign.settings.languages:
        _log.info("sheets: %s", language)
        with speaking(language), quoting(words, own):
            trees[language] = _tree(assessment, context)
    return Site(trees, theme, context.overrides)


def _tree(assessment: Assessment, context: SheetContext) -> SheetTree:
    """Every sheet in the language that is being spoken."""
    from generator.publish.site import SheetTree
    from generator.sheets import (
        TenderSheets,
        describe_comparison,
        describe_lamp,
        describe_letters,
        describe_tender_report,
    )

    lamps = {
        lamp.lamp_id: describe_lamp(assessment, lamp.lamp_id, context)
        for lamp in assessment.campaign.lamps
    }
    tender = None
    if assessment.tender is not None:
        tender = TenderSheets(
            describe_tender_report(assessment, context), describe_letters(assessment, context)
        )
    return SheetTree(describe_comparison(assessment, context), lamps, tender)


def versions_of(assessment: Assessment) -> Mapping[str, str]:
    """Versions of the program, the law book behind an assessment, and the libraries."""
    from generator.publish.program_digest import program_digest

    found = {name: version(name) for name in _LIBRARIES}
    return {
        "lampassay": assessment.version,
        "program sources": program_digest(),
        "law book": assessment.law_book,
        **found,
    }
