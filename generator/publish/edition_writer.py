"""One edition, written in order: inputs, data, sheets, package descriptor, manifest, signature."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from generator.publish.data_package import write_data_package
from generator.publish.documents import processors
from generator.publish.editions import PublicCampaign, write_redaction
from generator.publish.evidence import write_data
from generator.publish.inputs import write_inputs
from generator.publish.lamp_evidence import document_attachments
from generator.publish.manifest import Edition, write_manifest
from generator.publish.redaction import check_public, code_names
from generator.publish.site import Site, write_documents, write_pages
from generator.publish.tender_files import tender_files
from generator.records.assessment import Assessment
from generator.records.product_field import ProductField

if TYPE_CHECKING:
    from generator.publish.signing import Signer

__all__ = ["EditionWriter"]


@dataclass(frozen=True, slots=True)
class EditionWriter:
    """Writes one edition into a folder that is being built.

    Parameters
    ----------
    source
        The campaign folder that the assessment was made from.
    assessment
        The assessment.
    versions
        Program, law book and libraries -> version.
    seed
        Seed of every random number behind a figure.
    public
        The public campaign, where the edition is the public one.
    """

    source: Path
    assessment: Assessment
    versions: Mapping[str, str]
    seed: int
    public: PublicCampaign | None = None

    def write_data(
        self, folder: Path, products: Iterable[ProductField], salt: bytes | None = None
    ) -> None:
        """Write inputs and data files.

        Parameters
        ----------
        folder
            Folder being built.
        products
            Product information, lamp by lamp.
        salt
            Salt of the public edition that goes with a full one, if there is one.
        """
        write_inputs(folder, self.source, self.assessment.campaign)
        write_data(folder, self.assessment, products)
        for name, content in tender_files(self.assessment).items():
            path = folder / name
            path.parent.mkdir(parents=True, exist_ok=True)
            path.write_bytes(content)
        if salt is not None:
            write_redaction(folder, salt, code_names(self.assessment.campaign, salt))

    def write_sheets(self, folder: Path, site: Site, *, pdf: bool, jobs: int | None) -> None:
        """Write pages and documents.

        Parameters
        ----------
        folder
            Folder being built.
        site
            The sheets.
        pdf
            Whether to render documents.
        jobs
            Documents rendered at once; the number of processors by default.
        """
        write_pages(folder, site)
        if pdf:
            inside = document_attachments(self.source, self.assessment, self.versions)
            write_documents(folder, site, jobs or processors(), inside)

    def close(self, folder: Path, signer: Signer | None = None) -> None:
        """Write descriptor and manifest, and sign where somebody signs.

        Parameters
        ----------
        folder
            Folder being built, with data and sheets.
        signer
            Who signs documents and manifest.

        Raises
        ------
        PublishError
            If a withheld name still stands in a public edition.
        """
        if self.public is not None:
            check_public(folder, self.public.names)
        unsigned = {}
        if signer is not None:
            from generator.publish.signing import sign_documents, sign_manifest

            unsigned = sign_documents(folder, signer)
        write_data_package(folder, self.assessment)
        edition = Edition(
            "full" if self.public is None else "public",
            () if self.public is None else self.public.withheld,
            unsigned,
            self.seed,
        )
        write_manifest(folder, self.assessment, self.versions, edition)
        if signer is not None:
            sign_manifest(folder, signer)
