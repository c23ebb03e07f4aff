"""From the campaign folder to records: CSV, TOML and Markdown read, every mistake named."""

from generator.intake.campaign_folder import check_campaign, read_campaign
from generator.intake.new_folder import new_campaign_files
from generator.intake.series_file import SeriesFile, read_series

__all__ = ["SeriesFile", "check_campaign", "new_campaign_files", "read_campaign", "read_series"]
