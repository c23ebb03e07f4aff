"""An issue passes its audit; every damage to it is found and named."""

from __future__ import annotations

import json
import random
import shutil
from datetime import date
from pathlib import Path

import jsonschema
import pytest

from generator.audit import AuditReport, audit
from generator.audit.integrity import integrity, listed_files, read_manifest
from generator.errors import LampassayError
from generator.publish.manifest import manifest_bytes, manifest_digest

TODAY = date(2026, 3, 2)


def failures(report: AuditReport) -> list[tuple[str, str, str]]:
    return [(item.part, item.subject, item.message) for item in report.failures]


def test_an_issue_passes(pristine: Path) -> None:
    report = audit(pristine, today=TODAY)
    assert failures(report) == []
    assert report.checked["documents"] == len(list(pristine.rglob("*.pdf"))) == 3
    assert report.checked["figures"] > 100
    assert report.facts["edition"] == "full"


def test_an_issue_passes_wherever_it_lies(issued: Path) -> None:
    assert audit(issued, today=TODAY).passed


def test_manifest_and_results_keep_to_the_schemas_that_come_with_them(pristine: Path) -> None:
    for name, schema in (
        ("manifest.json", "data/manifest.schema.json"),
        ("data/results.json", "data/results.schema.json"),
    ):
        rules = json.loads((pristine / schema).read_bytes())
        jsonschema.Draft202012Validator.check_schema(rules)
        jsonschema.validate(json.loads((pristine / name).read_bytes()), rules)


def test_every_file_betrays_one_flipped_bit(issued: Path) -> None:
    manifest = read_manifest((issued / "manifest.json").read_bytes())[0]
    assert manifest is not None
    listed = listed_files(manifest)
    dice = random.Random(7)  # noqa: S311 - which bit is flipped is no secret
    files = [path for path in sorted(issued.rglob("*")) if path.name != "manifest.json"]
    files = [path for path in files if path.is_file()]
    assert len(files) == len(listed) > 20
    for path in files:
        content = path.read_bytes()
        for place in {0, dice.randrange(len(content)), len(content) - 1}:
            path.write_bytes(flipped(content, place, dice.randrange(8)))
            (found,) = integrity(issued, listed)
            assert found.subject == path.relative_to(issued).as_posix()
            assert found.message == "changed: same size, other content"
        path.write_bytes(content)
    assert integrity(issued, listed) == ()


def flipped(content: bytes, place: int, bit: int) -> bytes:
    changed = bytearray(content)
    changed[place] ^= 1 << bit
    return bytes(changed)


def test_every_byte_of_the_manifest_counts(pristine: Path) -> None:
    content = (pristine / "manifest.json").read_bytes()
    assert read_manifest(content)[1] == ()
    for place in range(len(content)):
        _, found = read_manifest(flipped(content, place, place % 8))
        assert found, place
        assert found[0].subject == "manifest.json"


@pytest.mark.parametrize("name", ["lamps/plain-t8.pdf", "manifest.json", "inputs/lamps.csv"])
def test_the_audit_names_a_flipped_bit(issued: Path, name: str) -> None:
    content = (issued / name).read_bytes()
    (issued / name).write_bytes(flipped(content, len(content) // 2, 0))
    assert name in {subject for _, subject, _ in failures(audit(issued, today=TODAY))}


def test_missing_extra_and_renamed_files_are_named(issued: Path) -> None:
    (issued / "index.html").unlink()
    (issued / "data" / "extra.csv").write_text("a\n1\n")
    (issued / "lamps" / "plain-t8.html").rename(issued / "lamps" / "other.html")
    found = failures(audit(issued, today=TODAY))
    assert ("integrity", "index.html", "missing") in found
    assert ("integrity", "data/extra.csv", "extra: the manifest does not list it") in found
    assert ("integrity", "lamps/plain-t8.html", "renamed to lamps/other.html") in found
    assert len(found) == 3


def test_a_link_in_place_of_a_file_is_named(issued: Path, tmp_path: Path) -> None:
    copy = tmp_path / "elsewhere.html"
    shutil.move(issued / "index.html", copy)
    (issued / "index.html").symlink_to(copy)
    assert ("integrity", "index.html", "a link; an issued folder has none") in failures(
        audit(issued, today=TODAY)
    )


def reseal(folder: Path, *names: str) -> None:
    """Make the manifest agree with files that were changed, as a forger would."""
    import hashlib

    manifest = json.loads((folder / "manifest.json").read_bytes())
    for entry in [*manifest["outputs"], *manifest["inputs"]]:
        for name in names:
            if name in (entry["path"], f"inputs/{entry['path']}"):
                content = (folder / name).read_bytes()
                entry["size"] = len(content)
                entry["sha256"] = hashlib.sha256(content).hexdigest()
    manifest["digest"] = manifest_digest(manifest)
    (folder / "manifest.json").write_bytes(manifest_bytes(manifest))


def test_a_forged_figure_does_not_follow_from_the_inputs(issued: Path) -> None:
    figures = issued / "data" / "figures.csv"
    text = figures.read_text()
    row = next(line for line in text.splitlines() if ",luminous_flux_lm,812," in line)
    figures.write_bytes(text.replace(row, row.replace(",812,", ",912,")).encode())
    reseal(issued, "data/figures.csv")
    (found,) = failures(audit(issued, today=TODAY))
    assert found[0] == "derivation"
    assert "veldrune-a60-1 luminous_flux_lm reported" in found[1]
    assert found[2] == "value is 912, computed anew 812"


def test_a_forged_verdict_does_not_follow_from_the_inputs(issued: Path) -> None:
    verdicts = issued / "data" / "verdicts.csv"
    text = verdicts.read_text()
    row = next(line for line in text.splitlines() if ",fail," in line)
    verdicts.write_bytes(text.replace(row, row.replace(",fail,", ",pass,")).encode())
    reseal(issued, "data/verdicts.csv")
    (found,) = failures(audit(issued, today=TODAY))
    assert found[2] == "verdict is pass, computed anew fail"


def test_a_forged_input_gives_other_figures(issued: Path) -> None:
    units = issued / "inputs" / "units.csv"
    units.write_text(units.read_text().replace("812.0", "912.0"))
    reseal(issued, "inputs/units.csv")
    found = failures(audit(issued, today=TODAY))
    assert found
    assert {part for part, _, _ in found} == {"derivation"}


def test_inputs_that_cannot_be_read_fail_the_audit(issued: Path) -> None:
    (issued / "inputs" / "units.csv").write_text("unit_id,lamp_id\nx,nobody\n")
    reseal(issued, "inputs/units.csv")
    assert any(
        "cannot be assessed" in message for _, _, message in failures(audit(issued, today=TODAY))
    )


def test_another_version_makes_differences_notes(issued: Path) -> None:
    figures = issued / "data" / "figures.csv"
    figures.write_bytes(figures.read_bytes().replace(b",812,", b",912,", 1))
    path = issued / "manifest.json"
    manifest = json.loads(path.read_bytes())
    manifest["versions"]["law book"] = "0" * 64
    path.write_bytes(manifest_bytes(manifest))
    reseal(issued, "data/figures.csv")
    report = audit(issued, today=TODAY)
    assert report.passed
    notes = [str(item) for item in report.findings if item.part == "derivation"]
    assert any("computed anew 812" in text for text in notes)
    assert any("law book" in text and "issued with 000" in text for text in notes)


def test_the_law_of_another_day_is_told_apart(issued: Path) -> None:
    # SVM at most 0.9 until 31 August 2024, 0.4 from then on: Regulation (EU) 2021/341, Annex IV;
    # the lamp declares 0.44, so the verdict turns between the two days
    path = issued / "manifest.json"
    report = audit(issued, today=date(2024, 8, 31))
    notes = [str(item) for item in report.findings if "under the law of 2024-08-31" in item.message]
    assert any(
        "eu-2019-2020-svm" in text and "fail as recorded, pass under" in text for text in notes
    )
    assert path.is_file()
    assert report.passed


def test_gaps_of_a_test_report_are_notes(pristine: Path) -> None:
    report = audit(pristine, today=TODAY)
    gaps = {item.subject for item in report.findings if item.part == "completeness"}
    assert {"Number of the report", "Date of receipt", "Person who authorises the report"} <= gaps
    assert "Laboratory, name and address" not in gaps


def test_an_archive_is_audited_directly(pristine: Path) -> None:
    report = audit(pristine.with_suffix(".zip"), today=TODAY)
    assert failures(report) == []
    assert report.kind == "archive"


def test_an_archive_betrays_a_flipped_bit(pristine: Path, tmp_path: Path) -> None:
    content = bytearray(pristine.with_suffix(".zip").read_bytes())
    content[len(content) // 2] ^= 1
    damaged = tmp_path / "damaged.zip"
    damaged.write_bytes(bytes(content))
    assert not audit(damaged, today=TODAY).passed


def test_one_document_is_audited_alone(pristine: Path, tmp_path: Path) -> None:
    alone = tmp_path / "sheet.pdf"
    shutil.copy(pristine / "lamps" / "veldrune-a60.pdf", alone)
    report = audit(alone, today=TODAY)
    assert failures(report) == []
    assert report.facts["lamp_id"] == "veldrune-a60"
    assert report.checked["figures"] > 50
    assert any("its pages are not" in item.message for item in report.findings)


def test_the_comparison_alone_says_what_it_lacks(pristine: Path) -> None:
    report = audit(pristine / "comparison.pdf", today=TODAY)
    assert report.passed
    assert any("not all inputs are attached" in item.message for item in report.findings)


def test_a_public_edition_is_proved_by_the_full_one(pristine: Path) -> None:
    report = audit(Path(f"{pristine}-public"), today=TODAY, full=pristine)
    assert failures(report) == []
    assert report.facts["edition"] == "public"
    assert report.checked["withheld"] > 5


def test_a_public_edition_of_other_data_is_not_proved(issued_public: Path, issued: Path) -> None:
    lamps = issued / "inputs" / "lamps.csv"
    lamps.write_text(lamps.read_text().replace("4.37", "4.38"))
    reseal(issued, "inputs/lamps.csv")
    found = failures(audit(issued_public, today=TODAY, full=issued))
    assert found[0][:2] == ("redaction", "lamps.csv: row 2, unit_price")
    assert {subject for _, subject, _ in found} == {
        "lamps.csv: row 2, unit_price",
        "lamps.csv: whole file",
    }


def test_a_full_edition_is_no_public_one(pristine: Path) -> None:
    assert ("redaction", "manifest.json", "not a public edition") in failures(
        audit(pristine, today=TODAY, full=pristine)
    )


def test_what_is_not_there_is_an_error(tmp_path: Path) -> None:
    with pytest.raises(LampassayError, match="no such folder or file"):
        audit(tmp_path / "nothing", today=TODAY)


def test_a_folder_without_manifest_fails(tmp_path: Path) -> None:
    assert failures(audit(tmp_path, today=TODAY))[0][1] == "manifest.json"


@pytest.mark.parametrize(
    "content",
    [
        b"",
        b"[]",
        b"{}",
        b'{"inputs": [], "outputs": [], "versions": {}, "assessed_on": "soon"}',
        b'{"inputs": [{"path": "../x", "size": 1, "sha256": "' + b"0" * 64 + b'"}], "outputs": [],'
        b' "versions": {}, "assessed_on": "2026-03-02"}',
        b"[" * 100_000,
    ],
)
def test_a_manifest_that_is_none_fails(tmp_path: Path, content: bytes) -> None:
    (tmp_path / "manifest.json").write_bytes(content)
    assert [subject for _, subject, _ in failures(audit(tmp_path, today=TODAY))] == [
        "manifest.json"
    ]
