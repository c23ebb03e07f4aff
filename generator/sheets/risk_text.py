"""Global risks as text: which clauses let lamps pass wrongly, or hold them back wrongly."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal

from generator.language import SEMICOLON, joined, say, say_counted
from generator.records.risk import CampaignRisk
from generator.sheets.description import Pair, RiskStatement, RiskText
from generator.sheets.number_format import shown

__all__ = ["risk_statement"]

_MOST = 8
_LEAST = Decimal("0.001")
_SENTENCE = say(
    "Consumer\u2019s risk: a lamp passes the clause and does not conform. Producer\u2019s risk: a "
    "lamp conforms and does not pass. Both are estimated over the lamps of this campaign from "
    "their margins and uncertainties, with a normal distribution (JCGM 106, clause 9.5)."
)
_NO_REASON = say("no reason given")


def risk_statement(risks: Sequence[CampaignRisk]) -> RiskStatement | None:
    """Write the global risks of a campaign; ``None`` where there are none.

    Parameters
    ----------
    risks
        Clause by clause.

    Notes
    -----
    Source: jcgm_106, clause 9.5.
    """
    if not risks:
        return None
    given = sorted((item for item in risks if _largest(item) is not None), key=_order)
    texts = tuple(map(_text, given))
    rest = ""
    if given[_MOST:]:
        most = _largest(given[_MOST]) or Decimal(0)
        rest = say_counted(
            "Of {count} further clause both risks are {most} or less.",
            "Of {count} further clauses both risks are {most} or less.",
            len(given) - _MOST,
            most=_percent(most),
        )
    return RiskStatement(_SENTENCE, texts[:_MOST], texts[_MOST:], rest, _unknown(risks))


def _largest(risk: CampaignRisk) -> Decimal | None:
    """The larger of both risks; ``None`` where they cannot be given."""
    if risk.consumers_risk is None or risk.producers_risk is None:
        return None
    return max(risk.consumers_risk, risk.producers_risk)


def _order(risk: CampaignRisk) -> tuple[Decimal, str]:
    return -(_largest(risk) or Decimal(0)), risk.clause


def _text(risk: CampaignRisk) -> RiskText:
    consumers, producers = risk.consumers_risk, risk.producers_risk
    return RiskText(
        risk.title,
        risk.regime,
        str(risk.lamps_count),
        _percent(consumers or Decimal(0)),
        _percent(producers or Decimal(0)),
    )


def _percent(risk: Decimal) -> str:
    text = f"{shown(100 * max(risk, _LEAST), 1)}\u00a0%"
    return f"< {text}" if risk < _LEAST else text


def _unknown(risks: Sequence[CampaignRisk]) -> tuple[Pair, ...]:
    reasons: dict[str, dict[str, None]] = {}
    for item in risks:
        if _largest(item) is None:
            title = say("{title} ({regime})", title=item.title, regime=item.regime)
            reasons.setdefault(item.reason or _NO_REASON, {})[title] = None
    return tuple(Pair(joined(SEMICOLON, titles), reason) for reason, titles in reasons.items())
