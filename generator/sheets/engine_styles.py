"""Styles of the PDF engine, worked out once for all elements of the same kind and place.

The engine tries every rule on every element of every document. The sheets of a campaign consist
of the same few hundred kinds of element; what the rules say of each follows from its tag, its
attributes, the kind of its parent and, where a rule asks for it, its place among its siblings.
Style sheets that ask for more, such as for the sibling before, are left to the engine.
"""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from typing import Any
from xml.etree.ElementTree import Element

__all__ = ["remember_styles", "share_styles"]

_COMMENT = re.compile(r"/\*.*?\*/", re.DOTALL)
_SELECTORS = re.compile(r"(?:^|[{};])([^{}@;]+)\{")
_BY_PLACE = re.compile(r":(?:first-child|last-child|nth-child\([^)]*\)|not\(:first-child\))")
_COMPOUND = re.compile(r"(\+?)\s*([^\s>+,]+)")
_BEYOND = re.compile(r"~|:(?!:|(?:before|after|root|marker)\b)")
_ATTRIBUTE = re.compile(r"\[[^]]*\]")
_NAME = re.compile(r"\.?[\w-]+")
_BY_PAGE = re.compile(r"\d(?:vw|vh|vi|vb|vmin|vmax)\b")
"""Lengths that follow the size of the page, which is not the same for all documents."""

_MOST_KINDS = 20_000


@dataclass(slots=True)
class _Kind:
    """What elements of one kind and place look like, their pseudo-elements with them."""

    styles: dict[str | None, Any]


@dataclass(slots=True)
class _Memory:
    """The kinds met so far under one pair of style sheets.

    Parameters
    ----------
    placed
        Tags and classes whose place among the siblings a rule asks for.
    """

    placed: frozenset[str]
    kinds: dict[Any, _Kind] = field(default_factory=dict)
    equals: dict[Any, dict[str | None, Any]] = field(default_factory=dict)
    held: list[Any] = field(default_factory=list)
    page_sizes: dict[str, Any] = field(default_factory=dict)

    def asks_for_place(self, element: Element) -> bool:
        """Whether a rule may ask for the place of an element among its siblings."""
        if element.tag in self.placed or "*" in self.placed:
            return True
        return any(f".{name}" in self.placed for name in element.get("class", "").split())


def _asked_by_place(style: str) -> frozenset[str] | None:
    """Tags and classes whose place a style sheet asks for; ``None`` where it asks for more."""
    if "@layer" in style or _BY_PAGE.search(style):
        return None
    placed: set[str] = set()
    for selectors in _SELECTORS.findall(_COMMENT.sub("", style)):
        marked = _BY_PLACE.sub("!", _ATTRIBUTE.sub("", selectors))
        if _BEYOND.search(marked):
            return None
        for follows, compound in _COMPOUND.findall(marked):
            if follows or "!" in compound:
                name = compound.replace("!", "")
                placed.add(name if _NAME.fullmatch(name) else "*")
    return frozenset(placed)


def remember_styles(sheet: Any, style: str) -> None:
    """Let the engine remember what it works out under a style sheet.

    Parameters
    ----------
    sheet
        The style sheet, as the engine holds it.
    style
        The same as text.
    """
    placed = _asked_by_place(style)
    sheet.remembered = None if placed is None else _Memory(placed)


def share_styles() -> None:
    """Put the way of remembering in the place of the engine's."""
    from weasyprint.css import StyleFor

    plain = StyleFor.__init__

    def start(
        self: Any, html: Any, sheets: Any, hints: bool, font_config: Any, targets: Any
    ) -> None:
        memory = getattr(sheets[-1][0], "remembered", None) if len(sheets) == 2 else None
        if memory is None or hints:
            plain(self, html, sheets, hints, font_config, targets)
            return
        self._cascaded_styles, self._computed_styles = {}, {}
        self._sheets, self.font_config = sheets, font_config
        if len(memory.kinds) > _MOST_KINDS:
            for kept in (memory.kinds, memory.equals, memory.held):
                kept.clear()
        memory.page_sizes.update(box=None, area=None)
        self.initial_page_sizes = memory.page_sizes
        _Walk(self, html, memory, targets).through()

    StyleFor.__init__ = start


class _Walk:
    """One way through a document, from the root down.

    Parameters
    ----------
    styles
        The styles of the document, to be filled.
    html
        The document of the engine.
    memory
        What is known.
    targets
        Where the engine collects the anchors of the document.
    """

    def __init__(self, styles: Any, html: Any, memory: _Memory, targets: Any) -> None:
        self._styles, self._html, self._memory, self._targets = styles, html, memory, targets
        self._wrapped: dict[Element, Any] = {}

    def through(self) -> None:
        """Give every element its styles."""
        self._visit(self._html.etree_element, None, None, 0)

    def _visit(
        self, element: Element, parent: Element | None, above: _Kind | None, index: int
    ) -> None:
        memory = self._memory
        place: Any = None
        if parent is not None and memory.asks_for_place(element):
            before = parent[index - 1] if index else None
            place = (index, len(parent), before is not None and (before.tag, before.get("class")))
        key = (id(above), element.tag, tuple(element.attrib.items()), place)
        kind = memory.kinds.get(key)
        if kind is None:
            kind = memory.kinds[key] = _Kind(self._work_out(element, parent))
        computed = self._styles._computed_styles
        for pseudo, style in kind.styles.items():
            computed[element, pseudo] = style
        if "id" in element.attrib and self._targets:
            self._targets.collect_anchor(kind.styles[None]["anchor"])
        for at, child in enumerate(element):
            self._visit(child, element, kind, at)

    def _work_out(self, element: Element, parent: Element | None) -> dict[str | None, Any]:
        """What the rules say of an element, by the engine's own means."""
        if not self._wrapped:
            self._wrapped = {
                item.etree_element: item for item in self._html.wrapper_element.iter_subtree()
            }
        own = self._own_declarations(element)
        matched = [
            (origin, fixed, *found[:3], *found[3])
            for sheet, origin, fixed in self._styles._sheets
            for found in sheet.matcher.match(self._wrapped[element])
        ]
        above = self._styles._computed_styles.get((parent, None))
        key = (
            id(above),
            tuple(sorted((name, str(value)) for name, (value, _) in own.items())),
            tuple((fixed, found[0], found[2], id(found[3])) for _, fixed, *found in matched),
        )
        memory = self._memory
        if key not in memory.equals:
            memory.equals[key] = self._computed(element, parent, own, matched)
            memory.held.append((above, matched))
        return memory.equals[key]

    def _own_declarations(self, element: Element) -> dict[str, Any]:
        """What the attributes of an element say, with its weight."""
        from math import inf

        from weasyprint.css import (
            declaration_precedence,
            find_style_attributes,
            preprocess_declarations,
        )

        own: dict[str, Any] = {}
        alone = Element(element.tag, element.attrib)
        for specificity, _, declarations, base in find_style_attributes(alone):
            for name, values, importance in preprocess_declarations(base, tuple(declarations)):
                weight = (declaration_precedence("author", importance), inf, specificity)
                if name not in own or own[name][1] <= weight:
                    own[name] = values, weight
        return own

    def _computed(
        self, element: Element, parent: Element | None, own: dict[str, Any], matched: list[Any]
    ) -> dict[str | None, Any]:
        from math import inf

        from weasyprint.css import declaration_precedence

        cascaded: dict[str | None, dict[str, Any]] = {None: dict(own)}
        for origin, fixed, specificity, _, pseudo, declarations, _ in matched:
            style = cascaded.setdefault(pseudo, {})
            for name, values, importance in declarations:
                weight = (declaration_precedence(origin, importance), inf, fixed or specificity)
                if name not in style or style[name][1] <= weight:
                    style[name] = values, weight
        styles = self._styles
        for pseudo, declared in cascaded.items():
            styles._cascaded_styles[element, pseudo] = declared
            styles.set_computed_styles(
                element,
                root=self._html.etree_element,
                parent=parent if pseudo is None else element,
                pseudo_type=pseudo,
                base_url=self._html.base_url,
                target_collector=None,
            )
        styles._cascaded_styles.clear()
        found = {pseudo: styles._computed_styles[element, pseudo] for pseudo in cascaded}
        found[None].pseudo_types = frozenset(cascaded) - {None}
        return found
