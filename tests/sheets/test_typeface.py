"""Coverage of the bundled typeface."""

from fontTools.ttLib import TTFont

from generator.quantities import QUANTITIES
from generator.sheets.themes import FACES, templates_folder
from generator.sheets.typeface import _covered, printable, uncovered_characters


def test_character_map_agrees_with_a_font_library():
    maps = [
        set(TTFont(templates_folder() / "base" / "fonts" / face).getBestCmap()) for face in FACES
    ]
    assert _covered() == set.intersection(*maps)


def test_all_words_of_the_catalogue_are_covered():
    text = "".join(f"{q.label}{q.symbol}{q.unit}" for q in QUANTITIES.values())
    assert uncovered_characters(text) == ()


def test_the_unions_languages_and_the_signs_of_the_sheets_are_covered():
    # Letters beyond ASCII of the official languages of the Union; from memory.
    letters = "ąćęłńóśźżáčďéěíňřšťúůýžäöüßåæøàâçèêëîïôùûÿœőűșțăģķļņšūžėįųõħġċ" + "ΑΩάώЖщъю"
    assert uncovered_characters(letters + letters.upper().replace("SS", "ß")) == ()
    assert uncovered_characters("≥≤±−–·×°µΩ²³⁻¹₁₂→′″\u00a0\u2011") == ()


def test_faces_are_static_truetype_with_their_licence():
    folder = templates_folder() / "base" / "fonts"
    for face in FACES:
        font = TTFont(folder / face)
        assert "glyf" in font
        assert "fvar" not in font
        assert font["OS/2"].fsType == 0
    licence = (folder / "OFL.txt").read_text(encoding="utf-8")
    assert "SIL OPEN FONT LICENSE Version 1.1" in licence
    assert "with Reserved Font Name" not in licence


def test_what_is_not_covered_is_plain_to_see():
    assert uncovered_characters("a中b中文") == ("中", "文")
    assert printable("a中<b>") == "a[U+4E2D]<b>"
    assert printable("plain\n") == "plain\n"
