"""A document alone: every attachment is compared with the list inside."""

from __future__ import annotations

import shutil
from datetime import date
from pathlib import Path

import pikepdf
import pytest

from generator.audit import audit
from generator.audit.documents import attached_files

TODAY = date(2026, 3, 2)


@pytest.fixture
def sheet(pristine: Path, tmp_path: Path) -> Path:
    return Path(shutil.copy(pristine / "lamps" / "veldrune-a60.pdf", tmp_path / "sheet.pdf"))


def failed(file: Path) -> set[tuple[str, str]]:
    return {(item.subject, item.message) for item in audit(file, today=TODAY).failures}


def rewrite(file: Path, name: str, content: bytes | None) -> None:
    """Put another file in place of an attachment, or take it away."""
    with pikepdf.open(file, allow_overwriting_input=True) as document:
        if name in document.attachments:
            del document.attachments[name]
        if content is not None:
            document.attachments[name] = content
        document.save(file)


def test_the_raw_files_are_inside_byte_by_byte(sheet: Path, campaign_folder: Path) -> None:
    files = attached_files(sheet)
    for path in ("spectra/veldrune-a60.csv", "light/veldrune-a60.csv.gz"):
        assert files[path.replace("/", "-")] == (campaign_folder / path).read_bytes()
    assert not any(b"4.37" in content for content in files.values())


def test_a_changed_attachment_is_named(sheet: Path) -> None:
    content = attached_files(sheet)["units.csv"]
    rewrite(sheet, "units.csv", content.replace(b"812.0", b"912.0"))
    assert ("units.csv", "changed attachment") in failed(sheet)


def test_a_missing_attachment_is_named(sheet: Path) -> None:
    rewrite(sheet, "data-figures.csv", None)
    assert ("data-figures.csv", "missing attachment") in failed(sheet)


def test_an_extra_attachment_is_named(sheet: Path) -> None:
    rewrite(sheet, "opinion.txt", b"It is a good lamp.")
    assert failed(sheet) == {("opinion.txt", "extra attachment")}


def test_a_changed_list_is_named(sheet: Path) -> None:
    content = attached_files(sheet)["evidence.json"]
    rewrite(sheet, "evidence.json", content.replace(b'"MG-1"', b'"MG-2"'))
    assert any("own digest" in message for _, message in failed(sheet))


def test_what_is_no_sheet_is_told(tmp_path: Path) -> None:
    broken = tmp_path / "broken.pdf"
    broken.write_bytes(b"%PDF-1.7\nnothing")
    assert any("cannot be read as PDF" in message for _, message in failed(broken))
    bare = tmp_path / "bare.pdf"
    with pikepdf.new() as document:
        document.add_blank_page()
        document.save(bare)
    assert any("carries no evidence.json" in message for _, message in failed(bare))


def test_a_sheet_of_another_issue_is_found_in_a_folder(issued: Path) -> None:
    from generator.audit.documents import attachments_agree
    from generator.audit.integrity import read_manifest

    manifest, _ = read_manifest((issued / "manifest.json").read_bytes())
    assert manifest is not None
    name = "lamps/veldrune-a60.pdf"
    assert attachments_agree(issued, name, manifest) == ()
    for entry in manifest["inputs"]:
        if entry["path"] == "spectra/veldrune-a60.csv":
            entry["sha256"] = "0" * 64
    (found,) = attachments_agree(issued, name, manifest)
    assert "spectra/veldrune-a60.csv inside is not the issue's" in found.message
