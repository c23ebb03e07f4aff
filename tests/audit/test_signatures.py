"""Signed issues: who signed is told, what changed afterwards is found, keys leave no trace."""

from __future__ import annotations

import importlib.util
import io
import shutil
from datetime import date
from pathlib import Path
from types import ModuleType

import click.testing
import pikepdf
import pytest
from pyhanko.pdf_utils.incremental_writer import IncrementalPdfFileWriter
from pyhanko.pdf_utils.reader import PdfFileReader

from generator import pipeline
from generator.audit import AuditReport, audit
from generator.cli import command
from generator.publish import PublishError
from generator.publish.signing import open_signer

TODAY = date(2026, 3, 2)


def material() -> ModuleType:
    place = Path(__file__).with_name("signing_material.py")
    spec = importlib.util.spec_from_file_location("signing_material", place)
    assert spec is not None
    assert spec.loader is not None
    module = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(module)
    return module


MATERIAL = material()
PASSPHRASE: str = MATERIAL.PASSPHRASE


@pytest.fixture(scope="module")
def key(tmp_path_factory: pytest.TempPathFactory) -> tuple[Path, Path]:
    pair: tuple[Path, Path] = MATERIAL.write_key(tmp_path_factory.mktemp("keys"), "Ada Tester", 471)
    return pair


@pytest.fixture(scope="module")
def signed_once(
    campaign_folder: Path, key: tuple[Path, Path], tmp_path_factory: pytest.TempPathFactory
) -> Path:
    place = tmp_path_factory.mktemp("signed") / "moorgarth"
    pipeline.issue(campaign_folder, target=place, jobs=2, signer=open_signer(key[0], PASSPHRASE))
    return place


@pytest.fixture
def signed(signed_once: Path, tmp_path: Path) -> Path:
    return Path(shutil.copytree(signed_once, tmp_path / "moorgarth"))


def failed(report: AuditReport) -> set[tuple[str, str]]:
    return {(item.part, item.subject) for item in report.failures}


def test_the_audit_says_who_signed(signed_once: Path, key: tuple[Path, Path]) -> None:
    report = audit(signed_once, today=TODAY, trust=[key[1]])
    assert report.failures == ()
    assert sorted(item.file for item in report.signatures) == [
        "comparison.pdf",
        "lamps/plain-t8.pdf",
        "lamps/veldrune-a60.pdf",
        "manifest.json",
    ]
    for item in report.signatures:
        assert item.signer == item.issuer == "Common Name: Ada Tester"
        assert item.serial == "471"
        assert (item.intact, item.changed_afterwards, item.trusted) == (True, False, True)
        assert item.valid_from < item.valid_to


def test_without_a_trusted_certificate_no_signer_is_called_trusted(signed_once: Path) -> None:
    report = audit(signed_once, today=TODAY)
    assert report.passed
    assert {item.trusted for item in report.signatures} == {None}


def test_a_stranger_is_not_trusted(signed_once: Path, tmp_path: Path) -> None:
    _, other = MATERIAL.write_key(tmp_path, "Eve Other", 666)
    report = audit(signed_once, today=TODAY, trust=[other])
    assert ("signature", "manifest.json") in failed(report)
    assert {item.trusted for item in report.signatures} == {False}


def test_a_changed_manifest_breaks_its_signature(signed: Path) -> None:
    manifest = signed / "manifest.json"
    manifest.write_bytes(manifest.read_bytes().replace(b'"MG-1"', b'"MG-2"'))
    assert ("signature", "manifest.json") in failed(audit(signed, today=TODAY))


def test_a_signature_that_was_taken_away_is_missed(signed: Path) -> None:
    (signed / "manifest.json.p7s").unlink()
    assert ("signature", "manifest.json.p7s") in failed(audit(signed, today=TODAY))


def test_every_byte_of_the_detached_signature_counts(signed: Path) -> None:
    from generator.audit.signatures import manifest_signature, signature_failures

    file = signed / "manifest.json.p7s"
    content = file.read_bytes()
    unseen = []
    for place in range(0, len(content), 7):
        changed = bytearray(content)
        changed[place] ^= 32  # turns a letter into its other case
        file.write_bytes(bytes(changed))
        signatures, broken = manifest_signature(signed)
        told = [(item.signer, item.serial) for item in signatures]
        same = told == [("Common Name: Ada Tester", "471")]
        if same and not broken and not list(signature_failures(signatures)):
            unseen.append(place)
    assert unseen == []


def test_a_document_changed_within_is_found_alone(signed: Path) -> None:
    sheet = signed / "lamps" / "plain-t8.pdf"
    content = bytearray(sheet.read_bytes())
    content[2000] ^= 1
    sheet.write_bytes(bytes(content))
    assert ("signature", "plain-t8.pdf") in failed(audit(sheet, today=TODAY))


def test_something_added_afterwards_is_found_alone(signed: Path) -> None:
    sheet = signed / "lamps" / "plain-t8.pdf"
    writer = IncrementalPdfFileWriter(io.BytesIO(sheet.read_bytes()))
    writer.root["/Added"] = writer.root["/Type"]
    writer.update_root()
    stream = io.BytesIO()
    writer.write(stream)
    sheet.write_bytes(stream.getvalue())
    report = audit(sheet, today=TODAY)
    assert ("signature", "plain-t8.pdf") in failed(report)
    assert [item.changed_afterwards for item in report.signatures] == [True]


def test_a_signed_document_alone_is_more_than_its_attachments(signed_once: Path) -> None:
    report = audit(signed_once / "lamps" / "veldrune-a60.pdf", today=TODAY)
    assert report.passed
    assert not any("not signed" in item.message for item in report.findings)


def test_other_readers_see_pades_on_an_archive_file(signed_once: Path) -> None:
    # ETSI EN 319 142-1: subfilter of PAdES signatures; ISO 19005-3: part and level in the metadata
    content = (signed_once / "lamps" / "veldrune-a60.pdf").read_bytes()
    (signature,) = PdfFileReader(io.BytesIO(content)).embedded_signatures
    assert signature.sig_object["/SubFilter"] == "/ETSI.CAdES.detached"
    with pikepdf.open(io.BytesIO(content)) as document:
        metadata = document.open_metadata()
        assert (metadata.pdfa_status, len(document.attachments)) == ("3A", 9)
        assert document.Root.AcroForm.SigFlags == 3


def test_the_signed_document_begins_with_the_unsigned_one(
    signed_once: Path, pristine: Path
) -> None:
    for name in ("lamps/plain-t8.pdf", "comparison.pdf"):
        assert (signed_once / name).read_bytes().startswith((pristine / name).read_bytes())


@pytest.mark.parametrize("passphrase", ["wrong", ""])
def test_a_wrong_passphrase_is_told_without_it(
    key: tuple[Path, Path], passphrase: str, caplog: pytest.LogCaptureFixture
) -> None:
    with pytest.raises(PublishError, match="not its passphrase") as error:
        open_signer(key[0], passphrase)
    assert PASSPHRASE not in str(error.value) + caplog.text
    assert caplog.text == ""


def test_what_is_no_key_file_is_told(tmp_path: Path) -> None:
    (tmp_path / "x.p12").write_text("no key")
    for name in ("x.p12", "absent.p12"):
        with pytest.raises(PublishError, match=r"key file|PKCS#12"):
            open_signer(tmp_path / name, "")


def test_the_key_leaves_no_trace(key: tuple[Path, Path], signed_once: Path) -> None:
    signer = open_signer(key[0], PASSPHRASE)
    assert "key" not in repr(signer)
    packed = key[0].read_bytes()
    for path in signed_once.rglob("*"):
        if path.is_file():
            content = path.read_bytes()
            assert packed not in content
            assert PASSPHRASE.encode() not in content
            assert b"PRIVATE KEY" not in content


def test_the_command_takes_the_passphrase_from_the_environment(
    campaign_folder: Path, key: tuple[Path, Path], tmp_path: Path
) -> None:
    runner = click.testing.CliRunner()
    words = ["issue", str(campaign_folder), "--to", str(tmp_path / "out"), "--no-pdf"]
    words += ["--sign", str(key[0])]
    done = runner.invoke(command, words, env={"LAMPASSAY_PASSPHRASE": PASSPHRASE})
    assert done.exit_code == 0, done.output
    assert PASSPHRASE not in done.output
    assert (tmp_path / "out" / "manifest.json.p7s").is_file()
    asked = runner.invoke(
        command, words, input=f"{PASSPHRASE}\n", env={"LAMPASSAY_PASSPHRASE": None}
    )
    assert asked.exit_code == 0, asked.output
    assert PASSPHRASE not in asked.output
