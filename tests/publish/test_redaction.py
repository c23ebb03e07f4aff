"""A public edition holds no price, no client and no bidder; digests bind what it leaves out."""

from __future__ import annotations

import gzip
import hashlib
import hmac
import tomllib
from pathlib import Path

import pytest

from generator.intake import read_campaign
from generator.publish import PublishError
from generator.publish.editions import (
    REDACTION,
    edition_salt,
    public_campaign,
    public_place,
    read_salt,
    write_redaction,
)
from generator.publish.redaction import check_public, code_names, redact, salted_sha256

SALT = bytes(range(32))
TOML = """\
[campaign]
title = "Lamps for the Moorgarth Trust"
client = "Moorgarth Trust (invented)"
assessment_date = 2026-03-02
[[clause]]
id = "own"
title = "What Power & Sons must reach"
quantity = "power_w"
unit = "W"
comparison = "at most"
value = 10.0
source = { act = "MG-1", annex = "", point = "" }
[use]
tariff_per_kwh = 0.24
"""


@pytest.fixture
def named_campaign(tmp_path: Path) -> Path:
    folder = tmp_path / "content" / "moorgarth"
    for name in ("light", "notes", "spectra"):
        (folder / name).mkdir(parents=True)
    (folder / "campaign.toml").write_text(TOML)
    (folder / "lamps.csv").write_text(
        "# offers\nlamp_id,bidder,model,mains,declared_power_w,unit_price,currency\n"
        "veldrune-a60,Veldrune Lighting,Veldrune 8,yes,8,4.37,EUR\n"
        "tube,Power & Sons,Tube 15,yes,15,9.83,EUR\n"
        "none,,Nameless,yes,5,1.00,EUR\n"
    )
    (folder / "units.csv").write_text(
        "unit_id,lamp_id,power_w\nVELDRUNE-a60-1,veldrune-a60,8.1\ntube-1,tube,15.2\nn-1,none,5.1\n"
    )
    light = "time_s,VELDRUNE-a60-1\n" + "".join(f"{n / 20000:.5f},1.{n % 7}\n" for n in range(2000))
    (folder / "light" / "veldrune-a60.csv.gz").write_bytes(gzip.compress(light.encode(), mtime=0))
    (folder / "notes" / "veldrune-a60.md").write_text("VELDRUNE sent veldrune-a60 late.\n")
    (folder / "notes" / "tube.md").write_text("Power is high.\n")
    (folder / "notes" / "none.md").write_text("Nothing to say.\n")
    return folder


@pytest.fixture
def public_folder(named_campaign: Path, tmp_path: Path) -> Path:
    target = tmp_path / "public"
    target.mkdir()
    redact(named_campaign, read_campaign(named_campaign), target, SALT)
    return target


def test_no_name_and_no_price_is_left(public_folder: Path) -> None:
    text = "\n".join(
        f"{path.relative_to(public_folder)}\n"
        + (
            gzip.decompress(path.read_bytes()) if path.suffix == ".gz" else path.read_bytes()
        ).decode()
        for path in sorted(public_folder.rglob("*"))
        if path.is_file()
    )
    for name in ("veldrune", "power & sons", "moorgarth", "4.37", "9.83", "eur", "0.24"):
        assert name not in text.lower()


def test_what_is_left_is_the_same_campaign(named_campaign: Path, public_folder: Path) -> None:
    full, public = read_campaign(named_campaign), read_campaign(public_folder)
    names = code_names(full, SALT)
    assert [lamp.declared for lamp in public.lamps] == [lamp.declared for lamp in full.lamps]
    assert [unit.reported for unit in public.units] == [unit.reported for unit in full.units]
    assert (public.light[0].values == full.light[0].values).all()
    assert [names.identity(unit.unit_id) for unit in full.units] == [
        unit.unit_id for unit in public.units
    ]
    assert sorted({lamp.bidder for lamp in public.lamps}) == ["", "Bidder 1", "Bidder 2"]
    assert public.settings.clause[0]["quantity"] == "power_w"
    assert public.settings.clause[0]["title"] in (
        "What Bidder 1 must reach",
        "What Bidder 2 must reach",
    )
    assert public.notes["none"] == "Nothing to say.\n"


def test_a_raw_file_without_names_keeps_its_bytes(named_campaign: Path, tmp_path: Path) -> None:
    spectrum = "wavelength_nm,tube-1\n" + "".join(f"{n},0.1\n" for n in range(380, 781, 5))
    (named_campaign / "spectra" / "tube.csv").write_text(spectrum)
    target = tmp_path / "again"
    target.mkdir()
    withheld = redact(named_campaign, read_campaign(named_campaign), target, SALT)
    assert (target / "spectra" / "tube.csv").read_text() == spectrum
    assert "spectra/tube.csv" not in {part.path for part in withheld}


def test_code_names_follow_the_salt_alone(named_campaign: Path) -> None:
    campaign = read_campaign(named_campaign)
    assert code_names(campaign, SALT) == code_names(campaign, SALT)
    orders = {tuple(code_names(campaign, bytes([n]) * 32).bidders) for n in range(20)}
    assert len(orders) == 2


def test_a_withheld_cell_is_opened_with_its_own_salt(named_campaign: Path, tmp_path: Path) -> None:
    target = tmp_path / "again"
    target.mkdir()
    withheld = redact(named_campaign, read_campaign(named_campaign), target, SALT)
    digests = {(part.path, part.place): part.salted_sha256 for part in withheld}
    # what an owner discloses for one cell: its salt and its content; row 3, for row 1 is a comment
    own = hmac.new(SALT, b"lamps.csv\0row 3, unit_price", hashlib.sha256).digest()
    expected = hashlib.sha256(own + b"4.37").hexdigest()
    assert digests["lamps.csv", "row 3, unit_price"] == expected
    assert salted_sha256(SALT, "lamps.csv", "row 3, unit_price", b"4.37") == expected
    assert digests["lamps.csv", "row 3, unit_price"] != digests["lamps.csv", "row 4, unit_price"]
    assert ("campaign.toml", "use") in digests
    assert ("campaign.toml", "campaign.client") in digests
    assert all("veldrune" not in path for path, _ in digests)


def test_one_more_cent_is_another_digest(named_campaign: Path, tmp_path: Path) -> None:
    def digests(name: str) -> dict[tuple[str, str], str]:
        (tmp_path / name).mkdir()
        made = redact(named_campaign, read_campaign(named_campaign), tmp_path / name, SALT)
        return {(part.path, part.place): part.salted_sha256 for part in made}

    before = digests("before")
    lamps = named_campaign / "lamps.csv"
    lamps.write_text(lamps.read_text().replace("4.37", "4.38"))
    after = digests("after")
    assert {key for key in before if before[key] != after[key]} == {
        ("lamps.csv", "row 3, unit_price"),
        ("lamps.csv", "whole file"),
    }


def test_the_rest_of_the_settings_is_what_was_judged_by(public_folder: Path) -> None:
    tables = tomllib.loads((public_folder / "campaign.toml").read_text())
    assert sorted(tables) == ["campaign", "clause"]
    assert "client" not in tables["campaign"]


def test_two_ids_that_would_become_one_are_refused(named_campaign: Path) -> None:
    lamps = named_campaign / "lamps.csv"
    campaign = read_campaign(named_campaign)
    codes = code_names(campaign, SALT)
    twin = codes.identity("veldrune-a60")
    lamps.write_text(lamps.read_text().replace("\ntube,", f"\n{twin},"))
    units = named_campaign / "units.csv"
    units.write_text(units.read_text().replace(",tube,", f",{twin},"))
    (named_campaign / "notes" / "tube.md").unlink()
    with pytest.raises(PublishError, match="one name"):
        code_names(read_campaign(named_campaign), SALT)


@pytest.mark.parametrize(
    "text",
    [
        *("Power & Sons", "Power &amp; Sons", "Power \\u0026 Sons"),
        *("veldrune-a60", "Moorgarth Trust", "Moorgarth\u00a0Trust", "Moorgarth&nbsp;Trust"),
    ],
)
def test_a_name_that_is_left_is_refused(named_campaign: Path, tmp_path: Path, text: str) -> None:
    names = code_names(read_campaign(named_campaign), SALT)
    folder = tmp_path / "edition"
    folder.mkdir()
    (folder / "page.html").write_text("Power in watts, of a tube-1.")
    check_public(folder, names)
    (folder / "page.html").write_text(f"<p>{text}</p>")
    with pytest.raises(PublishError, match=r"page\.html"):
        check_public(folder, names)


def test_the_salt_stays_with_the_full_edition(named_campaign: Path, tmp_path: Path) -> None:
    place = tmp_path / "out"
    (place / "data").mkdir(parents=True)
    first = edition_salt(place, None)
    assert len(first) == 32
    assert edition_salt(place, None) != first
    write_redaction(place, first, code_names(read_campaign(named_campaign), first))
    assert edition_salt(place, None) == first == read_salt(place / REDACTION)
    assert edition_salt(tmp_path / "elsewhere", place / REDACTION) == first
    assert public_place(place) == tmp_path / "out-public"


@pytest.mark.parametrize("content", ["", "[]", "{}", '{"salt": "short"}', '{"salt": 5}'])
def test_a_file_without_salt_is_refused(tmp_path: Path, content: str) -> None:
    file = tmp_path / "redaction.json"
    file.write_text(content)
    with pytest.raises(PublishError, match="salt"):
        read_salt(file)


def test_the_public_campaign_is_gone_afterwards(named_campaign: Path) -> None:
    with public_campaign(named_campaign, read_campaign(named_campaign), SALT) as public:
        folder = public.folder
        assert folder.name == "moorgarth"
        assert (folder / "lamps.csv").is_file()
    assert not folder.exists()
