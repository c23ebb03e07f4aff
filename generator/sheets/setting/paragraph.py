"""Text set in lines for paper: each word is measured once, each line shaped once.

The engine builds a box for every stretch of text and lays it out again for every width it tries.
Here a paragraph is a row of runs in one style each; it is broken where Unicode allows a break
(UAX 14, as Pango tells) and fills its lines one by one. What a run looks like is kept as the
operators that write it.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass, field, replace
from functools import lru_cache
from typing import Any, NamedTuple

from pydyf import String
from weasyprint.text import line_break
from weasyprint.text.ffi import ffi

from generator.sheets.setting.grounds import bare_box, paint_ground
from generator.sheets.setting.shapes import Shape, broken, shaped, strut, write_shape

__all__ = ["Line", "Paragraph", "Run"]

_SPACES = re.compile(r"[ \t\r\n]+")
_MEASURING = 1 + 1e-9
"""Sums of widths may miss the room by a rounding error."""

_SHORT = 60
"""Letters of a text that is likely to stand on one line."""


@lru_cache(maxsize=8192)
def _breaks(text: str, language: str | None) -> tuple[int, ...]:
    """Places inside a text where a line may end."""
    marks = line_break.get_log_attrs(text, language)
    bits = memoryview(ffi.buffer(marks)).cast("I")
    return tuple(at for at in range(1, len(text)) if bits[at] & 1)


@dataclass(frozen=True, slots=True)
class Run:
    """A stretch of text in one style.

    Parameters
    ----------
    text
        The words; white space is not collapsed yet.
    style
        Style of the innermost element around it.
    around
        Styles of the inline elements around it, for the height of the line.
    lead, trail
        Room before and after it: margins and paddings of the elements that begin or end [px].
    pad
        How much of ``lead`` and ``trail`` belongs to the element with a background [px].
    ground
        Style of the element whose background lies behind it.
    bound
        Which element forbids breaks inside; 0 where none does.
    part
        Which part of the paragraph it belongs to.
    """

    text: str
    style: Any
    around: tuple[Any, ...] = ()
    lead: float = 0
    trail: float = 0
    pad: tuple[float, float] = (0, 0)
    ground: Any = None
    bound: int = 0
    part: int = 0


class _Stretch(NamedTuple):
    """The piece of a run on a line."""

    run: Run
    shape: Shape
    x: float
    begins: bool
    ends: bool


@dataclass(frozen=True, slots=True)
class Line:
    """A line of a paragraph.

    Parameters
    ----------
    stretches
        Its pieces, from left to right.
    width
        Its length [px].
    height
        [px]
    baseline
        From the top of the line [px].
    """

    stretches: tuple[_Stretch, ...]
    width: float
    height: float
    baseline: float


@dataclass(slots=True)
class Paragraph:
    """Text to be set in lines.

    Parameters
    ----------
    style
        Style of the block.
    runs
        Its text, white space collapsed.
    parts
        Elements of its parts, where it has several.
    """

    style: Any
    runs: list[Run]
    parts: tuple[Any, ...] = ()
    _set: dict[float, list[Line]] = field(default_factory=dict)
    _text: str = ""
    _starts: list[int] = field(default_factory=list)

    @classmethod
    def of(cls, style: Any, runs: list[Run], parts: tuple[Any, ...] = ()) -> Paragraph:
        """Collapse the white space of runs.

        Parameters
        ----------
        style
            Style of the block.
        runs
            Its text as it stands in the page.
        parts
            Elements of its parts, where it has several.
        """
        kept: list[Run] = []
        open_end = True
        for run in runs:
            if run.text == "\n" and run.bound < 0:
                kept.append(run)
                open_end = True
                continue
            text = _SPACES.sub(" ", run.text)
            if open_end:
                text = text.removeprefix(" ")
            if text:
                open_end = text.endswith(" ")
            if text or run.lead or run.trail:
                kept.append(run if text == run.text else replace(run, text=text))
        while kept and kept[-1].text.endswith(" "):
            text = kept[-1].text.removesuffix(" ")
            kept[-1] = replace(kept[-1], text=text)
            if text or kept[-1].lead or kept[-1].trail:
                break
            kept.pop()
        starts, at = [], 0
        for run in kept:
            starts.append(at)
            at += len(run.text)
        return cls(style, kept, parts, {}, "".join(run.text for run in kept), starts)

    @property
    def longest(self) -> float:
        """Length of the text on one line [px]."""
        return max((line.width for line in self.lines(float("inf"))), default=0.0)

    def lines(self, width: float) -> list[Line]:
        """Break the text.

        Parameters
        ----------
        width
            Room [px].
        """
        if width not in self._set:
            self._set[width] = self._broken(width)
        return self._set[width]

    def _broken(self, width: float) -> list[Line]:
        runs = self.runs
        if not runs:
            return []
        if self._is_simple() and (simple := self._simple(width)) is not None:
            return simple
        forced = [at for at, run in enumerate(runs) if run.text == "\n"]
        if not forced:
            line = self._line(0, len(self._text))
            if line.width <= width * _MEASURING:
                return [line]
        lines: list[Line] = []
        start = 0
        for at in forced:
            end = self._starts[at]
            lines += self._filled(start, end, width) or [self._line(start, end)]
            start = end + 1
        return lines + self._filled(start, len(self._text), width)

    def _is_simple(self) -> bool:
        """Whether the text is one run that may be broken."""
        (run, *others) = self.runs
        return not (others or run.bound or run.lead or run.trail or run.ground or run.around)

    def _simple(self, width: float) -> list[Line] | None:
        """The lines of a text of one run."""
        (run,) = self.runs
        height, base = strut(run.style)
        if width == float("inf") or len(run.text) <= _SHORT:
            shape = shaped(run.text, run.style)
            if shape.width <= width * _MEASURING:
                return [Line((_Stretch(run, shape, 0, True, True),), shape.width, height, base)]
        shapes = broken(run.text, run.style, width)
        if shapes is None:
            return None
        return [
            Line((_Stretch(run, shape, 0, True, True),), shape.width, height, base)
            for shape in shapes
        ]

    def _filled(self, start: int, end: int, width: float) -> list[Line]:
        """The lines of the text between two forced breaks."""
        text = self._text
        if start == end:
            return []
        room = width * _MEASURING
        lines: list[Line] = []
        first, last, used = start, start, 0.0
        for place in [*(at for at in self._allowed() if start < at < end), end]:
            word = text[last:place]
            bare = last + len(word.rstrip(" "))
            length = self._length(last, bare)
            if used + length > room and last > first:
                lines.append(self._line(first, last))
                first, used = last, 0.0
            used += length + (self._length(bare, place) if bare < place else 0)
            last = place
        lines.append(self._line(first, last))
        return lines

    def _allowed(self) -> list[int]:
        """Where a line may end."""
        found = _breaks(self._text, self.style["lang"])
        if not any(run.bound for run in self.runs):
            return list(found)
        bounds: list[int] = []
        for run in self.runs:
            bounds += [run.bound] * len(run.text)
        return [at for at in found if not bounds[at] or bounds[at] != bounds[at - 1]]

    def _length(self, start: int, end: int) -> float:
        """Length of a piece of the text [px]."""
        if len(self.runs) == 1 and not (self.runs[0].lead or self.runs[0].trail):
            return shaped(self._text[start:end], self.runs[0].style).width
        length = 0.0
        for at, run in self._between(start, end):
            begin = max(start - at, 0)
            stop = min(end - at, len(run.text))
            if begin < stop:
                length += shaped(run.text[begin:stop], run.style).width
            if begin == 0:
                length += run.lead
            if stop == len(run.text):
                length += run.trail
        return length

    def _between(self, start: int, end: int) -> list[tuple[int, Run]]:
        if len(self.runs) == 1:
            return [(0, self.runs[0])]
        return [
            (at, run)
            for at, run in zip(self._starts, self.runs, strict=True)
            if at < end and (at + len(run.text) > start or (not run.text and at >= start))
        ]

    def _line(self, start: int, end: int) -> Line:
        """Set a piece of the text as a line."""
        text = self._text[start:end]
        end -= len(text) - len(text.rstrip(" "))
        height, base = strut(self.style)
        above, below = base, height - base
        x = 0.0
        stretches: list[_Stretch] = []
        for at, run in self._between(start, end):
            begin, stop = max(start - at, 0), min(end - at, len(run.text))
            for style in run.around:
                height, base = strut(style)
                above, below = max(above, base), max(below, height - base)
            begins, ends = begin == 0, stop == len(run.text)
            x += run.lead if begins else 0
            if begin < stop:
                shape = shaped(run.text[begin:stop], run.style)
                stretches.append(_Stretch(run, shape, x, begins, ends))
                x += shape.width
            x += run.trail if ends else 0
        return Line(tuple(stretches), x, above + below, above)

    def offset(self, line: Line, width: float) -> float:
        """How far a line stands from the left edge [px].

        Parameters
        ----------
        line
            A line of this paragraph.
        width
            Room [px].
        """
        align = self.style["text_align_all"]
        room = max(width - line.width, 0.0)
        return {"right": room, "end": room, "center": room / 2}.get(align, 0.0)

    def grounds(self, page: Any, lines: list[Line], place: tuple[float, float, float]) -> None:
        """Paint the backgrounds behind words.

        Parameters
        ----------
        page
            The page of the engine.
        lines
            Some lines of this paragraph.
        place
            Left edge, top and room [px].
        """
        if not any(run.ground is not None for run in self.runs):
            return
        for stretch, x, y in self._placed(lines, place):
            if stretch.run.ground is not None:
                _paint_ground(page, stretch, x, y)

    def _placed(
        self, lines: list[Line], place: tuple[float, float, float]
    ) -> Iterator[tuple[_Stretch, float, float]]:
        """The pieces of lines, each with the point where its baseline begins [px]."""
        left, top, width = place
        for line in lines:
            x, y = left + self.offset(line, width), top + line.baseline
            for stretch in line.stretches:
                yield stretch, x + stretch.x, y
            top += line.height

    def write(
        self,
        page: Any,
        lines: list[Line],
        place: tuple[float, float, float],
        part: int | None = None,
    ) -> None:
        """Write lines on a page.

        Parameters
        ----------
        page
            The page of the engine.
        lines
            Some lines of this paragraph.
        place
            Left edge, top and room [px].
        part
            The part to be written; ``None`` for all.
        """
        page.begin_text()
        colour = None
        for stretch, x, y in self._placed(lines, place):
            run = stretch.run
            if part is not None and run.part != part:
                continue
            if run.style["color"] is not colour:
                colour = run.style["color"]
                page.set_color(colour)
            language = run.style["lang"]
            foreign = language != self.style["lang"]
            if foreign:
                page.stream.append(b"/Span <</Lang %b>> BDC" % String(language).data)
            write_shape(page, stretch.shape, run.style, x, y)
            if foreign:
                page.stream.append(b"EMC")
        page.end_text()


def _paint_ground(page: Any, stretch: _Stretch, x: float, baseline: float) -> None:
    """Paint the background of the inline element around a stretch."""
    style = stretch.run.ground
    before = stretch.run.pad[0] if stretch.begins else 0
    after = stretch.run.pad[1] if stretch.ends else 0
    height, base = strut(style)
    box = bare_box(style)
    box.width, box.height = before + stretch.shape.width + after, style["font_size"]
    paint_ground(page, box, x - before, baseline - base + (height - style["font_size"]) / 2)
