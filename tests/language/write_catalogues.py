"""Gathers every message of the program, and brings the catalogues in line with them.

    python -m tests.language.write_catalogues

Messages stand in the code and the templates (``say``, ``say_as``, ``say_counted``) and in the
TOML leaves. New ones are added to each catalogue without a translation, which the tests refuse
until somebody gives one; messages that nothing says any more are dropped.
"""

from __future__ import annotations

import ast
import io
import tomllib
from collections.abc import Iterator
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from babel.messages import Catalog
from babel.messages.extract import extract_from_dir
from babel.messages.pofile import read_po, write_po

from generator.datasets.methods import TRANSLATED_KEYS as METHOD_KEYS
from generator.language.speaking import LANGUAGES
from generator.lawbook.leaf_text import TRANSLATED_KEYS as LEAF_KEYS
from generator.lawbook.leaf_text import pieces

ROOT = Path(__file__).resolve().parents[2]
CATALOGUES = ROOT / "generator" / "language" / "catalogues"
TRANSLATED = tuple(tag for tag in LANGUAGES if tag != "en")
KEYWORDS = {"say": None, "say_as": ((1, "c"), 2), "say_counted": (1, 2)}
PLACES = {"say": (0,), "say_as": (0, 1), "say_counted": (0, 1)}
"""Function -> places of its literals."""
_MADE = datetime(2026, 1, 1, tzinfo=UTC)


def messages() -> Catalog:
    """Every message of the program, with the files that say it."""
    catalogue = Catalog(project="lampassay", version="", creation_date=_MADE)
    for path in sorted((ROOT / "generator").rglob("*.py")):
        for function, texts in _said_in(path):
            _add(catalogue, path.relative_to(ROOT).as_posix(), function, texts)
    templates = extract_from_dir(
        ROOT / "templates",
        [("**.j2", "jinja2.ext:babel_extract")],
        {"**.j2": {}},
        keywords=KEYWORDS,
    )
    for name, _, message, _, context in templates:
        catalogue.add(message, context=context, locations=[(f"templates/{name}", 0)])
    for place, text in _leaf_texts():
        catalogue.add(text, locations=[(place, 0)])
    return catalogue


def _said_in(path: Path) -> Iterator[tuple[str, tuple[str, ...]]]:
    """Each call that says something, however deep it stands, with its literals.

    Raises
    ------
    ValueError
        Where a pattern is no literal: no catalogue could hold it.
    """
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if not (isinstance(node, ast.Call) and isinstance(node.func, ast.Name)):
            continue
        places = PLACES.get(node.func.id)
        if places is None:
            continue
        found = [node.args[place] if place < len(node.args) else None for place in places]
        literals = [part.value for part in found if isinstance(part, ast.Constant)]
        if len(literals) < len(places):
            raise ValueError(f"{path}:{node.lineno}: {node.func.id} needs literals")
        yield node.func.id, tuple(str(text) for text in literals)


def _add(catalogue: Catalog, place: str, function: str, texts: tuple[str, ...]) -> None:
    context = texts[0] if function == "say_as" else None
    message = texts if function == "say_counted" else texts[-1]
    catalogue.add(message, context=context, locations=[(place, 0)])


def _leaf_texts() -> Iterator[tuple[str, str]]:
    """Texts of the law leaves, in the pieces they are said in, and of the methods."""
    for path in sorted((ROOT / "generator" / "lawbook").rglob("*.toml")):
        for place, key, text in _texts(path, LEAF_KEYS):
            yield from ((place, piece) for piece in pieces(key, text))
    for place, _, text in _texts(ROOT / "generator" / "datasets" / "methods.toml", METHOD_KEYS):
        yield place, text


def _texts(path: Path, keys: frozenset[str]) -> Iterator[tuple[str, str, str]]:
    """File, key and text of every entry of some keys."""

    def walked(value: Any, key: str) -> Iterator[tuple[str, str]]:
        if isinstance(value, dict):
            for name, part in value.items():
                yield from walked(part, name)
        elif isinstance(value, list):
            for part in value:
                yield from walked(part, key)
        elif isinstance(value, str) and value and key in keys:
            yield key, value

    place = path.relative_to(ROOT).as_posix()
    content = tomllib.loads(path.read_text(encoding="utf-8"))
    return ((place, key, text) for key, text in walked(content, ""))


def catalogue_path(tag: str) -> Path:
    """The catalogue of a language."""
    return CATALOGUES / f"{tag}.po"


def read_catalogue(tag: str) -> Catalog:
    """The catalogue of a language as it stands; an empty one where there is none."""
    path = catalogue_path(tag)
    text = path.read_bytes() if path.is_file() else b""
    return read_po(io.BytesIO(text), locale=tag, abort_invalid=True)


def renewed(tag: str) -> bytes:
    """The catalogue of a language, in line with the messages of the program."""
    known = read_catalogue(tag)
    wanted = Catalog(
        locale=tag, project="lampassay", version="", creation_date=_MADE, revision_date=_MADE
    )
    for message in messages():
        if message.id:
            old = known.get(message.id, context=message.context)
            wanted.add(
                message.id,
                old.string if old is not None else None,
                context=message.context,
                locations=message.locations,
            )
    written = io.BytesIO()
    write_po(written, wanted, width=100, include_lineno=False, sort_output=True, omit_header=False)
    return written.getvalue()


if __name__ == "__main__":
    CATALOGUES.mkdir(exist_ok=True)
    for language in TRANSLATED:
        catalogue_path(language).write_bytes(renewed(language))
