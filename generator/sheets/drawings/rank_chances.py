"""Chances of ranks: one row per bid, one bar of parts, the parts being the ranks."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from generator.language import say, say_as, told
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["RankChances", "draw_rank_chances"]

_WIDTH, _ROW, _TOP, _BOTTOM, _LEFT, _RIGHT = 520.0, 24.0, 8.0, 40.0, 236.0, 12.0
_LONGEST_NAME = 44
_NAMED_FROM = 0.06


@dataclass(frozen=True, slots=True)
class RankChances:
    """One bid: name, probability of each rank, and of having none."""

    name: str
    ranks: tuple[float, ...]
    none: float


def draw_rank_chances(bids: Sequence[RankChances], title: str, palette: Palette) -> str:
    """Draw the chances of ranks.

    Parameters
    ----------
    bids
        By rank.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    height = _TOP + _ROW * len(bids) + _BOTTOM
    canvas = Canvas(_WIDTH, height, palette)
    span = _WIDTH - _LEFT - _RIGHT
    for row, bid in enumerate(bids):
        top = _TOP + row * _ROW
        name = told(bid.name)
        if len(name) > _LONGEST_NAME:
            name = f"{name[: _LONGEST_NAME - 1]}…"
        canvas.text((_LEFT - 8, top + 14), name, "ink", anchor="end")
        at = _LEFT
        parts = [(rank, str(rank), share) for rank, share in enumerate(bid.ranks, start=1)]
        for rank, word, share in (*parts, (0, say_as("rank", "none"), bid.none)):
            width = share * span
            role, ink = _roles(rank)
            canvas.rectangle((at, top + 3), (max(width - 0.8, 0), _ROW - 8), role)
            if share >= _NAMED_FROM:
                canvas.text((at + width / 2, top + 14.5), word, ink, anchor="middle", bold=True)
            at += width
    base = _TOP + _ROW * len(bids) + 4
    canvas.line((_LEFT, base), (_LEFT + span, base), "quiet")
    for percent in (0, 25, 50, 75, 100):
        place = _LEFT + span * percent / 100
        canvas.line((place, base), (place, base + 4), "quiet")
        canvas.text((place, base + 15), f"{percent}", anchor="middle")
    words = say("probability of each rank, percent; none: not ranked")
    canvas.text((_LEFT + span / 2, base + 29), words, anchor="middle")
    return canvas.finish(title)


def _roles(rank: int) -> tuple[str, str]:
    """Fill and ink of a part: the first rank dark, the second lighter, later ones pale."""
    fills = {1: ("accent", "paper"), 2: ("accent-soft", "ink"), 0: ("hair", "ink")}
    return fills.get(rank, ("tooth-soft", "ink"))
