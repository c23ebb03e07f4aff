"""An independent validator reads the documents: PDF/A-3a and PDF/UA-1."""

from __future__ import annotations

import io

import pikepdf
import pytest

PROFILES = ("3a", "ua1")
LAMPS = ("quillmoor-gu10-827", "pemmerick-a67-ultra", "sundrel-a70-stock")

pytestmark = pytest.mark.needs("pdf", "page")


def failures(data, profile):
    import page

    report = page.validate_pdf_bytes(data, profile=profile)
    assert report.is_compliant == (not report.failures)
    return [f"{item.rule_id}: {item.message}" for item in report.failures]


@pytest.fixture(scope="module")
def documents(tmp_path_factory, part_of_the_demo):
    from generator.pipeline import issue

    folder = tmp_path_factory.mktemp("documents")
    campaign = part_of_the_demo(folder / "campaign", LAMPS)
    out = issue(campaign, target=folder / "out").folder
    found = {path.name: path.read_bytes() for path in sorted(out.rglob("*.pdf"))}
    assert {"comparison.pdf", *(f"{lamp}.pdf" for lamp in LAMPS)} <= set(found)
    return found


@pytest.mark.parametrize("profile", PROFILES)
def test_every_document_conforms(documents, profile):
    found = {name: failures(data, profile) for name, data in documents.items()}
    assert {name: broken for name, broken in found.items() if broken} == {}


def _changed(data, change):
    with pikepdf.open(io.BytesIO(data)) as pdf:
        change(pdf)
        stream = io.BytesIO()
        pdf.save(stream)
    return stream.getvalue()


def _without_tags(pdf):
    del pdf.Root.StructTreeRoot


def _without_colour_profile(pdf):
    del pdf.Root.OutputIntents


@pytest.mark.parametrize(
    ("change", "profile"),
    [(_without_tags, "3a"), (_without_colour_profile, "3a"), (_without_tags, "ua1")],
)
def test_a_broken_document_does_not(documents, change, profile):
    assert failures(_changed(documents["comparison.pdf"], change), profile)
