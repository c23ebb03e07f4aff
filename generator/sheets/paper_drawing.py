"""A drawing put on paper without the engine's own SVG painter: the same marks, far fewer steps.

The engine keeps a state, a group and a style for each element and lays out every letter of a
label by itself. The drawings of the sheets need none of that: they are lines, outlines,
rectangles, dots and short labels. They are read once into the operators of a page and written as
they are. A drawing that holds anything else is left to the engine.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from itertools import pairwise
from typing import Any
from xml.etree.ElementTree import Element

__all__ = ["PaperDrawing", "paper_drawing"]

_SVG = "{http://www.w3.org/2000/svg}"
_COMMANDS = re.compile(r"([A-Za-z])([^A-Za-z]*)")
_NUMBER = re.compile(r"-?(?:\d+\.?\d*|\.\d+)")
_COLOUR = re.compile(r"#[0-9a-f]{6}")
_REFERENCE = re.compile(r"url\(#([^)]+)\)")
_ARC = 0.5523
"""Handle of the curve that stands for a quarter of a circle, in radii."""

_PAINT = {"class", "fill", "stroke", "stroke-width", "stroke-dasharray", "stroke-linejoin"}
_KNOWN = {
    "line": _PAINT | {"x1", "y1", "x2", "y2"},
    "path": _PAINT | {"d", "fill-opacity"},
    "rect": _PAINT | {"x", "y", "width", "height"},
    "circle": _PAINT | {"cx", "cy", "r"},
    "text": {"class", "fill", "x", "y", "text-anchor", "font-weight", "font-size"}
    | {"stroke", "stroke-width"},
    "g": {"font-family", "font-size"},
    "linearGradient": {"id", "gradientUnits", "x1", "y1", "x2", "y2"},
}
_JOINS = {"miter": 0, "round": 1, "bevel": 2}


class _UnknownMarkError(Exception):
    """The drawing holds what only the engine can paint."""


@dataclass(frozen=True, slots=True)
class _Label:
    """A short text at a point."""

    at: tuple[float, float]
    words: str
    anchor: str
    family: str
    size: float
    weight: int
    bordered: bool


@dataclass(frozen=True, slots=True)
class _Veil:
    """An outline filled so that what lies below shines through."""

    operators: bytes
    opacity: float


@dataclass(frozen=True, slots=True)
class _Blend:
    """An outline filled with colours that run from point to point."""

    outline: bytes
    axis: tuple[float, float, float, float]
    stops: tuple[tuple[float, str], ...]


_Mark = bytes | _Label | _Veil | _Blend


def _written(value: float) -> str:
    return f"{value:.2f}".rstrip("0").rstrip(".")


def _points(*values: float) -> str:
    return " ".join(map(_written, values))


def _colour(text: str) -> str:
    """Parts of a colour, as a page writes them."""
    if not _COLOUR.fullmatch(text):
        raise _UnknownMarkError
    return " ".join(f"{int(text[at : at + 2], 16) / 255:.4g}" for at in (1, 3, 5))


def _outline(data: str) -> str:
    """The operators of a path."""
    written: list[str] = []
    x = y = 0.0
    start = (x, y)
    for command, numbers in _COMMANDS.findall(data):
        values = [float(number) for number in _NUMBER.findall(numbers)]
        base_x, base_y = (x, y) if command.islower() else (0.0, 0.0)
        match command.upper():
            case "M" | "L" if len(values) == 2:
                x, y = base_x + values[0], base_y + values[1]
            case "H" if len(values) == 1:
                x = base_x + values[0]
            case "V" if len(values) == 1:
                y = base_y + values[0]
            case "Z" if not values:
                x, y = start
                written.append("h")
                continue
            case _:
                raise _UnknownMarkError
        if command in "Mm":
            start = (x, y)
        written.append(f"{_points(x, y)} {'m' if command in 'Mm' else 'l'}")
    return "\n".join(written)


def _line(attributes: Mapping[str, str]) -> str:
    x1, y1, x2, y2 = (float(attributes[name]) for name in ("x1", "y1", "x2", "y2"))
    return f"{_points(x1, y1)} m\n{_points(x2, y2)} l"


def _rectangle(attributes: Mapping[str, str]) -> str:
    edges = (float(attributes.get(name, "0")) for name in ("x", "y", "width", "height"))
    return f"{_points(*edges)} re"


def _circle(attributes: Mapping[str, str]) -> str:
    x, y, r = (float(attributes[name]) for name in ("cx", "cy", "r"))
    k = r * _ARC
    return "\n".join(
        (
            f"{_points(x + r, y)} m",
            f"{_points(x + r, y + k, x + k, y + r, x, y + r)} c",
            f"{_points(x - k, y + r, x - r, y + k, x - r, y)} c",
            f"{_points(x - r, y - k, x - k, y - r, x, y - r)} c",
            f"{_points(x + k, y - r, x + r, y - k, x + r, y)} c",
            "h",
        )
    )


_OUTLINES = {
    "line": _line,
    "path": lambda attributes: _outline(attributes["d"]),
    "rect": _rectangle,
    "circle": _circle,
}


class _Reader:
    """Reads the elements of a drawing in turn; what follows in the same paint is one stroke."""

    def __init__(self) -> None:
        self.marks: list[_Mark] = []
        self._blends: dict[str, Element] = {}
        self._open: list[str] = []
        self._ends = ""
        self._set: dict[str, str] = {}

    def read(self, element: Element, family: str, size: float) -> None:
        """Take in an element and what lies in it."""
        name, attributes = element.tag.removeprefix(_SVG), element.attrib
        if name == "title":
            return
        if name not in _KNOWN or not attributes.keys() <= _KNOWN[name]:
            raise _UnknownMarkError
        if name == "g":
            family = attributes.get("font-family", family)
            size = float(attributes.get("font-size", size))
            for child in element:
                self.read(child, family, size)
        elif name == "linearGradient":
            self._blends[attributes["id"]] = element
        elif name == "text":
            self._label(element, family, float(attributes.get("font-size", size)))
        else:
            self._shape(_OUTLINES[name](attributes), attributes)

    def close(self) -> list[_Mark]:
        """End the last stroke; give the marks."""
        if self._open:
            self.marks.append("\n".join((*self._open, self._ends)).encode())
            self._open = []
        return self.marks

    def _state(self, **wanted: str) -> None:
        """Set what is not set yet; a stroke begun in another paint ends."""
        changed = {name: text for name, text in wanted.items() if self._set.get(name) != text}
        if changed:
            self.close()
            self._set |= changed
            self.marks.append("\n".join(changed.values()).encode())

    def _shape(self, outline: str, attributes: Mapping[str, str]) -> None:
        fill, stroke = attributes.get("fill", "#000000"), attributes.get("stroke", "none")
        if fill == "none" and stroke == "none":
            return
        if found := _REFERENCE.fullmatch(fill):
            self.close()
            self.marks.append(self._blend(outline, self._blends[found[1]]))
            return
        if fill != "none":
            self._state(fill=f"{_colour(fill)} rg")
        if stroke != "none":
            dash = " ".join(attributes.get("stroke-dasharray", "").replace(",", " ").split())
            self._state(
                stroke=f"{_colour(stroke)} RG",
                width=f"{float(attributes.get('stroke-width', '1')):g} w",
                dash=f"[{dash}] 0 d",
                join=f"{_JOINS[attributes.get('stroke-linejoin', 'miter')]} j",
            )
        ends = "S" if fill == "none" else "f" if stroke == "none" else "B"
        if "fill-opacity" in attributes:
            self.close()
            operators = f"{outline}\n{ends}".encode()
            self.marks.append(_Veil(operators, float(attributes["fill-opacity"])))
            return
        if ends != self._ends or ends == "B":
            self.close()
        self._ends = ends
        self._open.append(outline)

    def _label(self, element: Element, family: str, size: float) -> None:
        attributes = element.attrib
        if len(element):
            raise _UnknownMarkError
        if not element.text:
            return
        self._state(fill=f"{_colour(attributes.get('fill', '#000000'))} rg")
        if "stroke" in attributes:
            self._state(
                stroke=f"{_colour(attributes['stroke'])} RG",
                width=f"{float(attributes['stroke-width']):g} w",
                dash="[] 0 d",
            )
        self.close()
        self.marks.append(
            _Label(
                (float(attributes["x"]), float(attributes["y"])),
                element.text,
                attributes.get("text-anchor", "start"),
                family,
                size,
                int(attributes.get("font-weight", "400")),
                "stroke" in attributes,
            )
        )

    @staticmethod
    def _blend(outline: str, element: Element) -> _Blend:
        attributes = element.attrib
        if attributes.get("gradientUnits") != "userSpaceOnUse":
            raise _UnknownMarkError
        x1, y1, x2, y2 = (float(attributes[name]) for name in ("x1", "y1", "x2", "y2"))
        stops = tuple(
            (float(stop.attrib["offset"]), _colour(stop.attrib["stop-color"])) for stop in element
        )
        if len(stops) < 2:
            raise _UnknownMarkError
        return _Blend(outline.encode(), (x1, y1, x2, y2), stops)


def _between(stops: tuple[tuple[float, str], ...]) -> Iterator[tuple[float, float, str, str]]:
    """The pieces of a blend that have a length, over the whole of it."""
    padded = ((0.0, stops[0][1]), *stops, (1.0, stops[-1][1]))
    for (start, first), (end, last) in pairwise(padded):
        if end > start:
            yield start, end, first, last


class PaperDrawing:
    """A drawing ready for the page; stands where the engine puts an image.

    Parameters
    ----------
    width, height
        Size that the drawing asks for [px].
    view
        Width and height of its own coordinates.
    marks
        What is painted, in order.
    context
        Layout context of the engine; holds the faces.
    """

    def __init__(
        self,
        width: float,
        height: float,
        view: tuple[float, float],
        marks: list[_Mark],
        context: Any,
    ) -> None:
        self.width = width
        self.height = height
        self._view = view
        self._marks = marks
        self._faces = context.font_config if context else None

    def get_intrinsic_size(
        self, image_resolution: float, font_size: float
    ) -> tuple[float, float, float]:
        """Width, height and their ratio, as the engine asks an image for them."""
        del image_resolution, font_size
        return self.width, self.height, self.width / self.height

    def draw(self, stream: Any, width: float, height: float, style: Any) -> None:
        """Paint the drawing on a page of the engine, in the middle of the room given to it."""
        del style
        across, down = self._view
        scale = min(width / across, height / down)
        with stream.stacked():
            stream.transform(
                a=scale, d=scale, e=(width - across * scale) / 2, f=(height - down * scale) / 2
            )
            stream.stream.append(b"4 M")
            for mark in self._marks:
                if isinstance(mark, bytes):
                    stream.stream.append(mark)
                elif isinstance(mark, _Label):
                    self._write(stream, mark)
                elif isinstance(mark, _Veil):
                    with stream.stacked():
                        stream.set_alpha(mark.opacity)
                        stream.stream.append(mark.operators)
                else:
                    _paint_blend(stream, mark)

    def _write(self, stream: Any, label: _Label) -> None:
        from generator.sheets.setting.shapes import shaped, write_shape

        style = _label_style(self._faces, label)
        shape = shaped(label.words, style)
        share = {"start": 0.0, "middle": 0.5, "end": 1.0}[label.anchor]
        x, y = label.at
        stream.begin_text()
        if label.bordered:
            stream.stream.append(b"2 Tr")
        write_shape(stream, shape, style, x - share * shape.width, y)
        if label.bordered:
            stream.stream.append(b"0 Tr")
        stream.end_text()


def _label_style(font_config: Any, label: _Label) -> Any:
    """The style of a label, one for each face and size."""
    from weasyprint.css.properties import INITIAL_VALUES
    from weasyprint.svg.text import Style

    kept = font_config.__dict__.setdefault("label_styles", {})
    key = (label.family, label.size, label.weight)
    if key not in kept:
        style = kept[key] = Style(INITIAL_VALUES)
        style.font_config = font_config
        style |= {
            "font_family": [label.family],
            "font_size": label.size,
            "font_weight": label.weight,
        }
    return kept[key]


def _paint_blend(stream: Any, blend: _Blend) -> None:
    pieces = list(_between(blend.stops))
    functions = " ".join(
        f"<</FunctionType 2/Domain [0 1]/C0 [{first}]/C1 [{last}]/N 1>>"
        for _, _, first, last in pieces
    )
    bounds = " ".join(f"{end:.4g}" for _, end, _, _ in pieces[:-1])
    joined = (
        f"<</FunctionType 3/Domain [0 1]/Encode [{' '.join(['0 1'] * len(pieces))}]"
        f"/Bounds [{bounds}]/Functions [{functions}]>>"
    )
    with stream.stacked():
        stream.stream.append(blend.outline)
        stream.clip()
        stream.end()
        shading = stream.add_shading(2, (0, 1), blend.axis, True, joined.encode())
        stream.paint_shading(shading.id)


def paper_drawing(root: Element, context: Any) -> PaperDrawing | None:
    """Read a drawing; ``None`` where the engine has to paint it.

    Parameters
    ----------
    root
        The ``svg`` element.
    context
        Layout context of the engine.
    """
    attributes, reader = root.attrib, _Reader()
    try:
        left, top, across, down = (float(edge) for edge in attributes["viewBox"].split())
        width, height = float(attributes["width"]), float(attributes["height"])
        if (left, top) != (0, 0) or min(across, down, width, height) <= 0:
            return None
        for element in root:
            reader.read(element, "sans-serif", 16)
    except (_UnknownMarkError, KeyError, ValueError):
        return None
    return PaperDrawing(width, height, (across, down), reader.close(), context)
