"""From a campaign folder to an assessment: intake, metrics, conformity, crosschecks, comparison."""

from __future__ import annotations

import logging
from collections.abc import Iterable, Mapping, Sequence
from datetime import date
from importlib.metadata import version
from pathlib import Path
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from generator.errors import Problem
    from generator.records.assessment import Assessment
    from generator.records.campaign import Campaign
    from generator.records.clause import Clause, LawBook
    from generator.records.figure import FigureSet
    from generator.records.finding import Finding
    from generator.records.lamp import Lamp
    from generator.records.settings import Settings
    from generator.records.tender import Tender
    from generator.records.verdict import Verdict

__all__ = ["assess", "check"]

_log = logging.getLogger("lampassay")


def check(campaign: str | Path) -> tuple[Problem, ...]:
    """Read a campaign folder and give every problem; write nothing.

    Parameters
    ----------
    campaign
        The campaign folder.

    Returns
    -------
    tuple of Problem
        Errors and warnings in the order of the files; empty where all is well.
    """
    from generator.errors import DataProblems

    try:
        read, _, _ = _intake(Path(campaign))
    except DataProblems as error:
        return error.problems
    return read.warnings


def assess(campaign: str | Path, on: date | None = None) -> Assessment:
    """Read, compute and judge a campaign; write nothing.

    Parameters
    ----------
    campaign
        The campaign folder.
    on
        Date on which the law is read; the campaign's own by default, else today.

    Returns
    -------
    Assessment
        Figures, verdicts and findings.

    Raises
    ------
    DataProblems
        If the data have errors; carries all of them.
    """
    read, law, asked = _intake(Path(campaign))
    for problem in read.warnings:
        _log.warning("%s", problem)
    day = on or read.settings.campaign.assessment_date or date.today()  # noqa: DTZ011 - local day
    return _judged(read, law, asked, day)


def _intake(folder: Path) -> tuple[Campaign, LawBook, tuple[Clause, ...]]:
    from generator.errors import DataProblems
    from generator.intake import read_campaign
    from generator.lawbook import buyer_clauses, claim_problems, read_law_book
    from generator.sheets import uncovered_characters

    _log.info("intake: %s", folder)
    campaign = read_campaign(folder, _check_tables, _check_tender, uncovered_characters)
    law = read_law_book()
    claims = tuple(claim_problems(campaign.lamps, law))
    if claims:
        raise DataProblems([*campaign.warnings, *claims])
    asked = law.clauses(campaign.settings.campaign.regimes)
    own = buyer_clauses(campaign.settings.clause, "campaign.toml")
    _log.info("  %d lamps, %d units", len(campaign.lamps), len(campaign.units))
    return campaign, law, (*asked, *own)


def _check_tables(tables: Mapping[str, Any]) -> Iterable[Problem]:
    """What the law book and the templates have to say on ``campaign.toml``."""
    from generator.lawbook import asked_problems, read_law_book
    from generator.sheets import theme_problems

    yield from asked_problems(tables, read_law_book())
    sheet = tables.get("sheet")
    yield from theme_problems(sheet.get("theme") if isinstance(sheet, Mapping) else None)


def _check_tender(settings: Settings, lamps: Sequence[Lamp]) -> Iterable[Problem]:
    """What the comparison has to say on settings and lamps together."""
    from generator.comparison import bids_of, tender_problems
    from generator.lawbook import read_law_book

    if not settings.has_tender:
        return ()
    clauses = {str(own.get("id")): "buyer" for own in settings.clause}
    for clause in read_law_book().clauses(settings.campaign.regimes):
        clauses[clause.id] = clause.regime
    bids = bids_of(lamps, (), settings.laboratory)
    return tender_problems(lamps, bids, settings, clauses)


def _judged(campaign: Campaign, law: LawBook, asked: Sequence[Clause], on: date) -> Assessment:
    from generator.conformity import campaign_risks, judge
    from generator.crosschecks import findings_of
    from generator.metrics import figures_of
    from generator.records.assessment import Assessment
    from generator.records.figure import FigureSet

    _log.info("metrics")
    measured = FigureSet(figures_of(campaign))
    _log.info("conformity: law as it stood on %s", on.isoformat())
    judgement = judge(campaign, measured, law, asked, on)
    figures = FigureSet([*measured, *judgement.figures])
    _log.info("crosschecks")
    findings = findings_of(campaign, figures)
    risks = campaign_risks(judgement.verdicts, campaign.settings.decision)
    tender = _tender(campaign, figures, judgement.verdicts, findings, on)
    return Assessment(
        campaign=campaign,
        assessed_on=on,
        figures=figures,
        verdicts=judgement.verdicts,
        version=version("lampassay"),
        law_book=law.version,
        findings=findings,
        clauses=tuple(asked),
        risks=risks,
        tender=tender,
    )


def _tender(
    campaign: Campaign,
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    findings: Sequence[Finding],
    on: date,
) -> Tender | None:
    from generator.comparison import bids_of, compare_tender

    settings, lamps = campaign.settings, campaign.lamps
    if not settings.has_tender:
        return None
    _log.info("comparison: bids")
    bids = bids_of(lamps, {unit.lamp_id for unit in campaign.units}, settings.laboratory)
    return compare_tender(lamps, bids, campaign.units, figures, verdicts, findings, settings, on)
