"""The harmonics of a lamp on its sheet: what the comb shows, and the table behind it."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from decimal import Decimal

from generator.language import SEMICOLON, joined, say, say_as, sentence
from generator.quantities import QUANTITIES
from generator.records.clause_words import compared_text, with_unit
from generator.records.curves import HarmonicComb
from generator.records.harmonic_table import HarmonicLimit, HarmonicTable
from generator.sheets.drawings.axes import fixed
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
from generator.sheets.drawings.harmonics_comb import draw_harmonics_comb
from generator.sheets.lamp_words import HARMONICS_WITHIN
from generator.sheets.number_format import declared_text, shown, telling_decimals
from generator.sheets.words import DRAWING_HEADINGS

__all__ = ["harmonics_drawing", "harmonics_table"]

_STATUS = {
    "read": say("read in the act"),
    "quoted": say("quoted from another publication"),
    "computed": say("computed, not read in the act"),
    "cross-checked": say("cross-checked, not read in the act"),
    "unconfirmed": say("not confirmed in any source"),
    "buyer": say("asked by the buyer"),
}
"""Status of a limit -> how the limit is known."""

_ABOVE = say("above the limit: order {orders}")
_ABOVE_UNCONFIRMED = say("above a limit that is not confirmed: order {orders}")
_BELOW = say("below the lower limit: order {orders}")
_NOT_KEPT = say("not kept: {quantity} {value}, limit {limit}")
_FURTHEST = say("{what} reaches {share} % of its limit")
_NEAREST = say("{what} is nearest to its limit, at {share} % of it")
_ORDER = say("order {order}")
_NO_LIMIT = say_as("limit of a harmonic", "none")
_KEPT = {True: say_as("lower limit", "kept"), False: say_as("lower limit", "not kept")}

_TABLE = say("limits: {source}, {status}")
_OPTION = say("limits: option {letter}, {source}, {status}")
_UNDECIDED = say("not decided, for figures are missing")
_NO_OPTION = say("no option holds, this one is the nearest")
_NOT_JUDGED = say("not judged in this campaign")
_CONVERTED = say(
    "mA/W drawn as limit × power / fundamental current, 1 mA/W being {percent:.1f} % here"
)
_OTHER_STATUS = say("limit of order {orders} {status}")
_NONE_DRAWN = say("no limits drawn: {source}, {status}")
_STATUS_WORDS = {
    "read": say_as("status of a limit", "read"),
    "quoted": say_as("status of a limit", "quoted"),
    "computed": say_as("status of a limit", "computed"),
    "cross-checked": say_as("status of a limit", "cross-checked"),
    "unconfirmed": say_as("status of a limit", "unconfirmed"),
    "buyer": say_as("status of a limit", "buyer's"),
}
_ORDER_HEADING = say_as("harmonic", "order")
_CURRENT_HEADING = say("current, % of the fundamental")
_LIMIT_HEADING = say("limit, %")
_LIMIT_OF_TABLE = say("limit, % ({place})")
_LIMIT_OF_OPTION = say("limit, % (option {letter}, {place})")
_UNCONFIRMED = "unconfirmed"
_WHOLE = Decimal(100)
_LARGE = Decimal(10)


def harmonics_drawing(
    comb: HarmonicComb, table: HarmonicTable, distortion: str, palette: Palette
) -> Drawing:
    """Make the drawing.

    Parameters
    ----------
    comb
        Harmonics of the current.
    table
        The limits that count for the lamp.
    distortion
        The total distortion in words; empty where it has no number.
    palette
        Colours of the theme.
    """
    finding = _listed([distortion, *_finding(table.limits)])
    told = [finding, _listed(_reference(table)), table.reason, *table.notes]
    caption: str = joined(" ", [sentence(text) for text in told if text])
    if not caption:
        caption = say("Harmonics of the current of one unit.")
    svg = draw_harmonics_comb(comb, table.limits, caption, palette)
    heading = DRAWING_HEADINGS["harmonics"]
    return Drawing("harmonics", heading, caption, svg, harmonics_table(comb, table))


def _listed(parts: Iterable[str]) -> str:
    return joined(SEMICOLON, [part for part in parts if part])


def _finding(limits: Sequence[HarmonicLimit]) -> Iterable[str]:
    """What the drawing shows: limits not kept, and the share of the one that is used up most."""
    missed = [item for item in limits if item.kept is False]
    upper = [item for item in missed if not item.lower]
    yield _orders_text(_ABOVE, (item for item in upper if item.status != _UNCONFIRMED))
    yield _orders_text(_ABOVE_UNCONFIRMED, (item for item in upper if item.status == _UNCONFIRMED))
    yield _orders_text(_BELOW, (item for item in missed if item.lower))
    for item in missed:
        if item.order is None:
            value = _exact(item.value, item.unit)
            yield _NOT_KEPT.format(quantity=_what(item), value=value, limit=_limit_text(item))
    if limits and all(item.kept for item in limits):
        yield HARMONICS_WITHIN
    shared = [item for item in limits if item.share is not None and not item.lower]
    worst = max(shared, key=lambda item: item.share or 0, default=None)
    if worst is not None:
        pattern = _FURTHEST if missed else _NEAREST
        yield pattern.format(what=_what(worst), share=_share_text(worst))


def _orders_text(pattern: str, limits: Iterable[HarmonicLimit]) -> str:
    orders = ", ".join(dict.fromkeys(str(item.order) for item in limits if item.order))
    return pattern.format(orders=orders) if orders else ""


def _what(item: HarmonicLimit) -> str:
    if item.order is not None:
        return _ORDER.format(order=item.order)
    return QUANTITIES[item.quantity].label


def _share_text(item: HarmonicLimit) -> str:
    """Share of an upper limit in percent; it never reads as 100 where it is not."""
    share = _WHOLE * (item.share or Decimal(0))
    decimals = telling_decimals(share, (_WHOLE,), 0 if share >= _LARGE else 1)
    return shown(share, decimals)


def _reference(table: HarmonicTable) -> Iterable[str]:
    """Which limits they are, from which clause, how they are known, and how they are drawn."""
    if table.source:
        pattern = _OPTION if table.option else _TABLE
        said = {"letter": table.option} if table.option else {}
        if table.reason and not table.limits:
            pattern, said = _NONE_DRAWN, {}
        if not table.reason or not table.limits:
            yield pattern.format(source=table.source, status=_STATUS[table.status], **said)
        yield "" if table.decided else _UNDECIDED
        yield _NO_OPTION if table.option and table.decided and table.met is False else ""
        yield "" if table.judged else _NOT_JUDGED
    for status in dict.fromkeys(item.status for item in table.limits):
        if status != table.status:
            other = (str(item.order) for item in table.limits if item.status == status)
            orders = ", ".join(dict.fromkeys(other))
            yield _OTHER_STATUS.format(orders=orders, status=_STATUS[status])
    if table.percent_per_ma_per_w is not None:
        yield _CONVERTED.format(percent=table.percent_per_ma_per_w)


def harmonics_table(comb: HarmonicComb, table: HarmonicTable) -> DataTable:
    """Give the harmonics and their limits, then the limits on other quantities.

    Parameters
    ----------
    comb
        Harmonics of the current.
    table
        The limits.
    """
    limits = table.limits
    percent = dict(zip(comb.order.astype(int).tolist(), comb.percent.tolist(), strict=True))
    if not limits:
        bare = tuple((str(order), _percent_text(share)) for order, share in percent.items())
        return DataTable((_ORDER_HEADING, _CURRENT_HEADING), bare)
    orders = {*percent, *(item.order for item in limits if item.order)}
    rows = [
        (str(order), _percent_text(percent.get(order)), *_cells(item))
        for order in sorted(orders)
        for item in _of_order(limits, order)
    ]
    rows += [
        (_what(item), _exact(item.value, item.unit), *_cells(item))
        for item in limits
        if item.order is None
    ]
    headings = (
        *(_ORDER_HEADING, _CURRENT_HEADING, _limit_heading(table)),
        *(say("limit as stated"), say("share of the limit, %"), say("status of the limit")),
    )
    return DataTable(headings, tuple(rows))


def _limit_heading(table: HarmonicTable) -> str:
    if not table.place:
        return _LIMIT_HEADING
    if not table.option:
        return _LIMIT_OF_TABLE.format(place=table.place)
    return _LIMIT_OF_OPTION.format(letter=table.option, place=table.place)


def _of_order(limits: Iterable[HarmonicLimit], order: int) -> Sequence[HarmonicLimit] | tuple[None]:
    return [item for item in limits if item.order == order] or (None,)


def _cells(item: HarmonicLimit | None) -> tuple[str, str, str, str]:
    if item is None:
        return (_NO_LIMIT, "", "", "")
    share = _share_text(item) if item.share is not None else ""
    if item.lower and item.kept is not None:
        share = _KEPT[item.kept]
    return (_percent_text(item.percent), _limit_text(item), share, _STATUS_WORDS[item.status])


def _percent_text(percent: float | None) -> str:
    return "" if percent is None else fixed(percent, 1)


def _limit_text(item: HarmonicLimit) -> str:
    return compared_text(item.comparison, _exact(item.limit, item.unit))


def _exact(value: Decimal | None, unit: str) -> str:
    return "" if value is None else with_unit(declared_text(value), unit)
