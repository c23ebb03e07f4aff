"""Dates and report numbers: whether a report can be about the lamp it stands under."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.tolerances import NO_SOURCE, tolerance
from generator.crosschecks.wording import CheckText, listed
from generator.language import say, say_counted
from generator.records.campaign import Campaign
from generator.records.figure import MEAN
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp

__all__ = ["report_after_assessment", "report_older_than_model", "reports_shared"]

_OLDER = CheckText(
    "report-older-than-model",
    say("Report older than the model"),
    say(
        "A test of samples before the start of sale, which is usual within a year; a test of an "
        "earlier model that this one is said to be equivalent to; or a slip in one of the dates."
    ),
    (),
    NO_SOURCE,
)
_AFTER = CheckText(
    "report-after-assessment",
    say("Report dated after the assessment"),
    say(
        "A slip in one of the dates, a day and month exchanged, or an assessment date left from an "
        "earlier issue would explain it."
    ),
    (),
    NO_SOURCE,
)
_SHARED = CheckText(
    "report-number-between-bidders",
    say("One report number under two bidders"),
    say(
        "Two bidders offering lamps of one maker, two laboratories that number alike, or a report "
        "attached to the wrong bid would explain it."
    ),
    (),
    NO_SOURCE,
)


def report_older_than_model(evidence: LampEvidence) -> Iterator[Finding]:
    """Date of the report against the date of placing on the market."""
    lamp = evidence.lamp
    report, market = lamp.offer.report_date, lamp.placed_on_market
    if report is None or market is None or report >= market:
        return
    days = (market - report).days
    usual = tolerance("report_before_market_d")
    yield _OLDER.finding(
        lamp.lamp_id,
        MEAN,
        Severity.REMARK if days <= usual.value else Severity.DOUBT,
        say_counted(
            "report of {report}, placed on the market on {market}: the report is {count} day "
            "older, up to {usual} are usual ({reason})",
            "report of {report}, placed on the market on {market}: the report is {count} days "
            "older, up to {usual} are usual ({reason})",
            days,
            report=report,
            market=market,
            usual=say_counted("{count} day", "{count} days", int(usual.value)),
            reason=usual.reason,
        ),
        Decimal(-days),
        "d",
    )


def report_after_assessment(evidence: LampEvidence) -> Iterator[Finding]:
    """Date of the report against the date of the assessment that the campaign gives."""
    report, assessed = evidence.lamp.offer.report_date, evidence.assessment_date
    if report is None or assessed is None or report <= assessed:
        return
    days = (report - assessed).days
    yield _AFTER.finding(
        evidence.lamp.lamp_id,
        MEAN,
        Severity.CONTRADICTION,
        say_counted(
            "report of {report}, assessment of {assessed}: the report is {count} day younger",
            "report of {report}, assessment of {assessed}: the report is {count} days younger",
            days,
            report=report,
            assessed=assessed,
        ),
        Decimal(days),
        "d",
    )


def reports_shared(campaign: Campaign) -> Iterator[Finding]:
    """Report numbers that lamps of more than one bidder rest on.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    Finding
        One per lamp concerned.
    """
    groups: dict[str, list[Lamp]] = {}
    for lamp in campaign.lamps:
        if lamp.offer.report_no:
            groups.setdefault(lamp.offer.report_no.casefold(), []).append(lamp)
    for lamps in groups.values():
        for lamp in lamps:
            others = [other for other in lamps if other.bidder != lamp.bidder]
            if others:
                names = [
                    say("{lamp} of {bidder}", lamp=other.lamp_id, bidder=other.bidder)
                    for other in others
                ]
                yield _SHARED.finding(
                    lamp.lamp_id,
                    MEAN,
                    Severity.DOUBT,
                    say(
                        "report {report} of {bidder} also stands under {lamps}",
                        report=lamp.offer.report_no,
                        bidder=lamp.bidder,
                        lamps=listed(names),
                    ),
                )
