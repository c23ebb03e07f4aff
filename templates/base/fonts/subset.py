"""Make the bundled faces from the upstream ones: ``python subset.py UPSTREAM_FOLDER``."""

from __future__ import annotations

import sys
from pathlib import Path

from fontTools import subset
from fontTools.ttLib import TTFont

FACES = {
    "FiraSans_400Regular.ttf": "sheet-regular.ttf",
    "FiraSans_600SemiBold.ttf": "sheet-semibold.ttf",
    "FiraSansCondensed_400Regular.ttf": "sheet-condensed.ttf",
}
RANGES = (
    (0x20, 0x7E),  # Basic Latin
    (0xA0, 0x17F),  # Latin-1, Latin Extended-A
    (0x192, 0x192),
    (0x1C4, 0x1E7),  # Croatian digraphs, carons
    (0x218, 0x21B),  # Romanian
    (0x2C6, 0x2DD),  # spacing accents
    (0x300, 0x30C),  # combining accents
    (0x370, 0x3FF),  # Greek
    (0x400, 0x45F),  # Cyrillic of the Union's languages and neighbours
    (0x490, 0x491),
    (0x1E80, 0x1E9E),
    (0x2000, 0x206F),  # punctuation
    (0x2070, 0x209F),  # superiors, inferiors
    (0x20A0, 0x20BF),  # currencies
    (0x2100, 0x214F),  # letterlike
    (0x2150, 0x215F),  # fractions
    (0x2190, 0x2199),  # arrows
    (0x2200, 0x22FF),  # mathematics
    (0x25CA, 0x25CA),
)
# Characters that upstream lacks, drawn with a glyph that looks the same in this typeface.
SAME_GLYPH = {0x2032: 0x27, 0x2033: 0x22, 0x2010: 0x2D, 0x2011: 0x2D}
FEATURES = ["kern", "tnum", "lnum", "ccmp", "locl", "mark", "mkmk"]


def main(upstream: Path) -> None:
    """Write the bundled faces beside this file."""
    wanted = {point for first, last in RANGES for point in range(first, last + 1)}
    for origin, name in FACES.items():
        options = subset.Options(
            layout_features=FEATURES,
            hinting=False,
            name_IDs=["*"],
            name_languages=["*"],
            notdef_outline=True,
            recalc_timestamp=False,
        )
        font = TTFont(next(upstream.rglob(origin)), recalcTimestamp=False)
        subsetter = subset.Subsetter(options)
        subsetter.populate(unicodes=wanted)
        subsetter.subset(font)
        for table in font["cmap"].tables:
            if table.isUnicode():
                for point, like in SAME_GLYPH.items():
                    table.cmap.setdefault(point, table.cmap[like])
        font.save(Path(__file__).with_name(name))


if __name__ == "__main__":
    main(Path(sys.argv[1]))
