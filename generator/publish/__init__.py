"""The output folder: inputs, data, sheets, manifest, built aside and swapped in whole."""

from generator.publish.archive import write_archive
from generator.publish.documents import processors
from generator.publish.edition_writer import EditionWriter
from generator.publish.editions import (
    PublicCampaign,
    edition_salt,
    public_campaign,
    public_place,
)
from generator.publish.folders import FolderExchange, PublishError

__all__ = [
    "EditionWriter",
    "FolderExchange",
    "PublicCampaign",
    "PublishError",
    "edition_salt",
    "processors",
    "public_campaign",
    "public_place",
    "write_archive",
]
