"""Write the demo campaign; the same bytes every time.

Usage: ``python content/make_demo.py [--to FOLDER]``
"""

from __future__ import annotations

import argparse
import shutil
from pathlib import Path

from demo_source.files import campaign_files

__all__ = ["main", "write"]

NAME = "harbour-school-relamping"


def write(folder: Path) -> int:
    """Write the campaign into a folder that is made anew; give its size in bytes."""
    if folder.exists():
        shutil.rmtree(folder)
    size = 0
    for path, content in campaign_files():
        target = folder / path
        target.parent.mkdir(parents=True, exist_ok=True)
        target.write_bytes(content)
        size += len(content)
    return size


def main() -> None:
    """Run the script."""
    parser = argparse.ArgumentParser(description="Write the demo campaign.")
    parser.add_argument(
        "--to",
        type=Path,
        default=Path(__file__).parent / NAME,
        metavar="FOLDER",
        help=f"campaign folder to write, deleted first (default: content/{NAME})",
    )
    folder = parser.parse_args().to
    if folder.exists() and not (folder / "campaign.toml").is_file():
        parser.error(f"{folder} exists and is no campaign folder; nothing was deleted")
    size = write(folder)
    print(f"{folder}: {size / 1e6:.2f} MB")


if __name__ == "__main__":
    main()
