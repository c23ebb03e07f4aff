"""The public edition: the campaign without prices, client and bidder names, bound by digests.

The campaign is written again without what is withheld, and the edition is issued from that: what
is not in its inputs cannot be on its sheets. For every part left out the manifest holds a salted
digest, so that whoever holds the full edition can prove, part by part, what stood there.
"""

from __future__ import annotations

import hashlib
import hmac
import html
import json
import re
import tomllib
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from decimal import Decimal
from pathlib import Path
from typing import Any

from generator.publish.campaign_table import (
    packed_like,
    read_campaign_table,
    unpacked,
    with_heading,
)
from generator.publish.folders import PublishError
from generator.publish.lamp_evidence import JUDGED_TABLES
from generator.publish.manifest import Withheld
from generator.publish.toml_text import toml_text
from generator.records.campaign import Campaign
from generator.records.lamp import Lamp

__all__ = ["CodeNames", "check_public", "code_names", "redact", "salted_sha256"]

_WITHHELD_COLUMNS = ("unit_price", "currency")
_WITHHELD_KEYS = {"campaign": ("client",), "report": ("customer", "customer_contact")}
_PUBLIC_TABLES = (*JUDGED_TABLES, "sheet", "spectra_unit")
_CODE_TABLES = ("decision", "sheet", "supply", "uncertainty")
_CODE_KEYS = ("comparison", "id", "language", "quantity", "regimes", "spectra_unit", "unit")
_LEAST_LETTERS = 4
_LONGEST_ID = 64
_TEXT_FILES = (".csv", ".html", ".json", ".md", ".toml")


@dataclass(frozen=True, slots=True)
class CodeNames:
    """What stands for what in a public edition.

    Parameters
    ----------
    bidders
        Bidder -> code name.
    ids
        ``lamp_id`` or ``unit_id`` that bears a bidder's word -> the id that stands for it.
    client
        Name of the client, or empty.
    words
        Word of a bidder's name -> the bidder's code name.
    """

    bidders: Mapping[str, str]
    ids: Mapping[str, str]
    client: str
    words: Mapping[str, str] = field(default_factory=dict)

    def identity(self, text: str) -> str:
        """The id that stands for an id."""
        return self.ids.get(text, text)

    def words_of(self, text: str) -> str:
        """Running text with the names of client and bidders replaced."""
        for name in sorted(_client_names(self.client), key=len, reverse=True):
            text = re.sub(re.escape(name), "client", text, flags=re.IGNORECASE)
        for name, code in self.bidders.items():
            text = re.sub(_whole(name), code, text, flags=re.IGNORECASE)
        for name, code in self.ids.items():
            text = re.sub(rf"(?<![\w-]){re.escape(name)}(?![\w-])", code, text)
        for word, code in self.words.items():
            text = re.sub(_whole(word), code, text, flags=re.IGNORECASE)
        return text


def _whole(word: str) -> str:
    return rf"(?<![^\W_]){re.escape(word)}(?![^\W_])"


def _client_names(client: str) -> set[str]:
    """The client as written, and without what stands in brackets."""
    names = {client.strip(), re.sub(r"\s*\([^)]*\)", "", client).strip()}
    return {name for name in names if len(name) >= _LEAST_LETTERS}


def code_names(campaign: Campaign, salt: bytes) -> CodeNames:
    """Choose the code names of a campaign; the same for the same salt.

    Parameters
    ----------
    campaign
        The campaign.
    salt
        Secret salt; without it the order of the codes says nothing.

    Returns
    -------
    CodeNames
        ``Bidder 1`` and so on, and ids without the bidders' words.

    Raises
    ------
    PublishError
        If two ids would become one, or an id too long.
    """
    names = sorted({lamp.bidder for lamp in campaign.lamps if lamp.bidder})
    ordered = sorted(names, key=lambda name: hmac.digest(salt, name.encode(), "sha256"))
    bidders = {name: f"Bidder {place}" for place, name in enumerate(ordered, start=1)}
    words = dict(_distinctive(campaign.lamps, bidders))
    every = [lamp.lamp_id for lamp in campaign.lamps] + [unit.unit_id for unit in campaign.units]
    ids = {name: _without_words(name, words) for name in dict.fromkeys(every)}
    if len({name.casefold() for name in ids.values()}) != len(ids):
        raise PublishError("two lamps or units would bear one name in the public edition")
    long = [name for name in ids.values() if len(name) > _LONGEST_ID]
    if long:
        raise PublishError(f"an id would be too long in the public edition: {long[0]}")
    changed = {name: new for name, new in ids.items() if name != new}
    return CodeNames(bidders, changed, campaign.settings.campaign.client, words)


def _distinctive(lamps: Sequence[Lamp], bidders: Mapping[str, str]) -> Iterator[tuple[str, str]]:
    """Words that give a bidder away: the first of the name, and those that its ids bear."""
    split = {name: re.findall(r"[^\W_]+", name) for name in bidders}
    for bidder, code in bidders.items():
        own = " ".join(lamp.lamp_id for lamp in lamps if lamp.bidder == bidder).casefold()
        others = {word.casefold() for name in bidders if name != bidder for word in split[name]}
        for place, word in enumerate(split[bidder]):
            telling = place == 0 or word.casefold() in own
            if len(word) >= _LEAST_LETTERS and word.casefold() not in others and telling:
                yield word, code


def _without_words(name: str, words: Mapping[str, str]) -> str:
    for word, code in words.items():
        slug = code.lower().replace(" ", "-")
        name = re.sub(re.escape(word), slug, name, flags=re.IGNORECASE)
    return name


def salted_sha256(salt: bytes, path: str, place: str, content: bytes) -> str:
    """Bind a part without giving it away.

    Each part has a salt of its own, drawn from the edition's salt, so that one part can be
    opened without the others.

    Parameters
    ----------
    salt
        Salt of the edition.
    path, place
        Which part.
    content
        The part.

    Returns
    -------
    str
        SHA-256 of the part's salt followed by the part.
    """
    own = hmac.digest(salt, f"{path}\0{place}".encode(), "sha256")
    return hashlib.sha256(own + content).hexdigest()


def redact(source: Path, campaign: Campaign, target: Path, salt: bytes) -> tuple[Withheld, ...]:
    """Write the campaign again without what is withheld.

    Parameters
    ----------
    source
        The campaign folder.
    campaign
        The campaign as it was read from there.
    target
        Empty folder to write.
    salt
        Salt of the edition.

    Returns
    -------
    tuple of Withheld
        Every part left out or changed, with its salted digest.
    """
    names = code_names(campaign, salt)
    withheld: list[Withheld] = []
    for file in campaign.files:
        path = _public_path(file.path, names)
        original = (source / file.path).read_bytes()
        parts = dict(_rewritten(source / file.path, file.path, names))
        content = parts.pop("")
        changed = {place: part for place, part in parts.items() if part}
        if content != original:
            changed["whole file"] = original
        withheld += [
            Withheld(path, place, salted_sha256(salt, path, place, part))
            for place, part in changed.items()
        ]
        copy = target / path
        copy.parent.mkdir(parents=True, exist_ok=True)
        copy.write_bytes(content)
    return tuple(withheld)


def _public_path(path: str, names: CodeNames) -> str:
    folder, _, name = path.rpartition("/")
    stem, dot, ending = name.partition(".")
    return f"{folder}/{names.identity(stem)}{dot}{ending}" if folder else path


def _rewritten(file: Path, path: str, names: CodeNames) -> Iterator[tuple[str, bytes]]:
    """The new content under the empty name, and each withheld part under its place."""
    if path == "campaign.toml":
        yield from _settings(file, names)
    elif path.startswith("notes/"):
        text = file.read_text(encoding="utf-8-sig")
        changed = names.words_of(text)
        yield "", changed.encode() if changed != text else file.read_bytes()
    elif "/" in path:
        yield "", _raw(file, path, names)
    else:
        yield from _table(file, path, names)


def _raw(file: Path, path: str, names: CodeNames) -> bytes:
    content = unpacked(file)
    changed = with_heading(content, dict(names.ids))
    first = content.split(b"\n", 1)[0].rstrip(b"\r")
    same = changed.split(b"\n", 1)[0] == first
    return file.read_bytes() if same else packed_like(path, changed)


def _table(file: Path, path: str, names: CodeNames) -> Iterator[tuple[str, bytes]]:
    table = read_campaign_table(file)
    for line, row in table.rows:
        for column in ("lamp_id", "unit_id"):
            if column in row:
                row[column] = names.identity(row[column])
        for column in ("model", "report_no"):
            if column in row:
                row[column] = names.words_of(row[column])
        if row.get("bidder"):
            yield f"row {line}, bidder", row["bidder"].encode()
            row["bidder"] = names.bidders[row["bidder"]]
        for column in _WITHHELD_COLUMNS:
            if row.get(column):
                yield f"row {line}, {column}", row[column].encode()
                row[column] = ""
    yield "", packed_like(path, table.content())


def _settings(file: Path, names: CodeNames) -> Iterator[tuple[str, bytes]]:
    tables = tomllib.loads(file.read_text(encoding="utf-8-sig"), parse_float=Decimal)
    kept: dict[str, Any] = {}
    for name, item in tables.items():
        if name not in _PUBLIC_TABLES:
            yield name, _canonical(item)
            continue
        kept[name] = dict(item) if isinstance(item, dict) else item
        for key in _WITHHELD_KEYS.get(name, ()):
            if key in kept[name]:
                yield f"{name}.{key}", _canonical(kept[name].pop(key))
    yield "", toml_text(_worded(kept, names)).encode()


def _canonical(item: Any) -> bytes:
    return json.dumps(item, default=str, ensure_ascii=False, sort_keys=True).encode()


def _worded(item: Any, names: CodeNames) -> Any:
    """The running text of a table with names replaced; what the program reads stays."""
    if isinstance(item, str):
        return names.words_of(item)
    if isinstance(item, dict):
        fixed = (*_CODE_TABLES, *_CODE_KEYS)
        return {
            key: entry if key in fixed else _worded(entry, names) for key, entry in item.items()
        }
    if isinstance(item, list):
        return [_worded(entry, names) for entry in item]
    return item


def check_public(folder: Path, names: CodeNames) -> None:
    """Refuse an edition in which a withheld name still stands.

    Parameters
    ----------
    folder
        The edition, complete.
    names
        What stands for what.

    Raises
    ------
    PublishError
        Naming the files and what stands there.
    """
    found = []
    for path in sorted(folder.rglob("*")):
        if path.is_file() and path.name.removesuffix(".gz").endswith(_TEXT_FILES):
            name_of = path.relative_to(folder).as_posix()
            text = f"{name_of}\n{unpacked(path).decode('utf-8')}"
            readings = (text, _as_read(text))
            still = dict.fromkeys(name for one in readings for name in _still_named(one, names))
            found += [f"{name_of}: {name}" for name in still]
    if found:
        raise PublishError("the public edition would still name:\n" + "\n".join(found))


def _as_read(text: str) -> str:
    """A text as people read it: signs written as references, spaces of any kind as one space."""
    return re.sub(r"\s+", " ", html.unescape(text.replace("\\u0026", "&")))


def _still_named(text: str, names: CodeNames) -> Iterator[str]:
    """Names of bidders, of the client, and ids with a bidder's word, that stand in a text."""
    sought = [*names.bidders, *sorted(_client_names(names.client))]
    low = text.lower()
    if any(word.lower() in low for word in names.words):
        sought += names.ids
    for name in sought:
        if name in text and re.search(_whole(name), text):
            yield name
