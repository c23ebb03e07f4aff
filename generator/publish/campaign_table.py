"""Tables of a campaign as text cells, to be written again with some cells changed."""

from __future__ import annotations

import csv
import gzip
import io
from dataclasses import dataclass, replace
from pathlib import Path

from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import read_heading, read_text_table
from generator.publish.folders import PublishError

__all__ = ["CampaignTable", "packed_like", "read_campaign_table", "unpacked", "with_heading"]


@dataclass(frozen=True, slots=True)
class CampaignTable:
    """A table: what separates its cells, its column names, and its rows with their lines."""

    separator: str
    names: tuple[str, ...]
    rows: tuple[tuple[int, dict[str, str]], ...]

    def content(self) -> bytes:
        """The table as CSV (RFC 4180 but for line ends, which are LF), without comments."""
        stream = io.StringIO()
        writer = csv.writer(stream, delimiter=self.separator, lineterminator="\n")
        writer.writerow(self.names)
        writer.writerows([[row[name] for name in self.names] for _, row in self.rows])
        return stream.getvalue().encode()

    def only(self, column: str, value: str) -> CampaignTable:
        """The rows that have a value in a column."""
        return replace(self, rows=tuple(row for row in self.rows if row[1].get(column) == value))

    def without(self, *columns: str) -> CampaignTable:
        """The same rows with the cells of some columns empty."""
        emptied = {name: "" for name in columns if name in self.names}
        return replace(self, rows=tuple((line, {**row, **emptied}) for line, row in self.rows))


def unpacked(path: Path) -> bytes:
    """Content of a file, unpacked where its name ends in ``.gz``."""
    content = path.read_bytes()
    return gzip.decompress(content) if path.name.endswith(".gz") else content


def packed_like(path: str, content: bytes) -> bytes:
    """Content as it lies in a file of that name: packed, without a time, where it ends in .gz."""
    return gzip.compress(content, mtime=0) if path.endswith(".gz") else content


def read_campaign_table(path: Path) -> CampaignTable:
    """Read a table that the campaign was read from before.

    Parameters
    ----------
    path
        The CSV file.

    Returns
    -------
    CampaignTable
        Its cells, stripped.

    Raises
    ------
    PublishError
        If it is no table any more.
    """
    table = read_text_table(unpacked(path).decode("utf-8-sig"), ProblemList(path.name))
    if table is None:
        raise PublishError(f"{path} changed while the campaign was being issued")
    return CampaignTable(table.heading.separator, table.heading.names, table.rows)


def with_heading(content: bytes, names: dict[str, str]) -> bytes:
    """Write other names into the heading of a table of numbers; the rows stay as they are.

    Parameters
    ----------
    content
        The CSV file, unpacked.
    names
        Old name -> new name; what is not there stays.

    Returns
    -------
    bytes
        The same table; comments above the heading are left out.
    """
    text = content.decode("utf-8-sig")
    heading = read_heading(text, ProblemList("table"))
    if heading is None:
        raise PublishError("a table of the campaign changed while it was being issued")
    stream = io.StringIO()
    writer = csv.writer(stream, delimiter=heading.separator, lineterminator="\n")
    writer.writerow([names.get(name, name) for name in heading.names])
    rows = text.split("\n", heading.row)[heading.row :]
    return (stream.getvalue() + "".join(rows)).encode()
