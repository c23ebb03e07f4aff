"""Same inputs, same bytes: whatever clock, zone, locale, hash seed, jobs, place or file order."""

from __future__ import annotations

import gzip
import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
PROGRAM = """\
import os, sys, time
shift = float(os.environ["SHIFT_S"])
if shift:
    import datetime
    real, real_day, real_time = datetime.datetime, datetime.date, time.time
    class Kind(type):
        def __instancecheck__(cls, item):
            return isinstance(item, cls.__mro__[1])
    class Shifted(real, metaclass=Kind):
        @classmethod
        def now(cls, tz=None):
            return real.fromtimestamp(time.time(), tz)
    class Day(real_day, metaclass=Kind):
        @classmethod
        def today(cls):
            return real.fromtimestamp(time.time()).date()
    datetime.datetime, datetime.date = Shifted, Day
    time.time = lambda: real_time() + shift
from pathlib import Path
if os.environ.get("REVERSED"):
    listed = Path.iterdir
    Path.iterdir = lambda self: iter(sorted(listed(self), reverse=True))
    found = Path.rglob
    Path.rglob = lambda self, pattern: iter(sorted(found(self, pattern), reverse=True))
sys.argv = ["lampassay", *sys.argv[1:]]
if __name__ == "__main__":
    from generator.cli import main
    main()
"""


def tree(folder: Path) -> dict[str, bytes]:
    return {
        path.relative_to(folder).as_posix(): path.read_bytes()
        for path in folder.rglob("*")
        if path.is_file()
    }


def built(campaign: Path, place: Path, jobs: int, **environment: str) -> dict[str, bytes]:
    place.parent.mkdir(parents=True, exist_ok=True)
    program = place.parent / "hostile.py"
    program.write_text(PROGRAM)
    words = ["issue", str(campaign), "--to", str(place), "--jobs", str(jobs)]
    archive = place.with_name("filed.zip")
    done = subprocess.run(
        [sys.executable, str(program), *words, "--archive", str(archive)],
        cwd=place.parent,
        env={
            "PATH": os.environ["PATH"],
            "PYTHONPATH": f"{ROOT}{os.pathsep}{os.environ.get('PYTHONPATH', '')}",
            "SHIFT_S": "0",
            **environment,
        },
        capture_output=True,
        text=True,
        check=False,
        timeout=120,
    )
    assert done.returncode == 0, done.stderr
    return {**tree(place), "filed.zip": archive.read_bytes()}


@pytest.fixture(scope="module")
def two_lamps(tender_folder: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The small campaign elsewhere, its files written in another order and with other times."""
    place = tmp_path_factory.mktemp("elsewhere") / "a folder, with ä" / tender_folder.name
    place.mkdir(parents=True)
    for number, path in enumerate(sorted(tender_folder.rglob("*"), reverse=True)):
        if path.is_file():
            copy = place / path.relative_to(tender_folder)
            copy.parent.mkdir(exist_ok=True)
            shutil.copyfile(path, copy)
            os.utime(copy, (1e9 + number, 1e9 + number))
            copy.chmod(0o600)
    return place


def test_the_bytes_are_those_of_the_inputs_alone(
    tender_folder: Path, two_lamps: Path, tmp_path: Path
) -> None:
    plain = built(
        tender_folder, tmp_path / "one" / "x", 1, TZ="UTC", LC_ALL="C", PYTHONHASHSEED="1"
    )
    hostile = built(
        two_lamps,
        tmp_path / "two words" / "deeper" / "y",
        2,
        TZ="Pacific/Kiritimati",
        LC_ALL="tr_TR.UTF-8",
        LANG="de_DE.UTF-8",
        PYTHONHASHSEED="4711",
        SHIFT_S="400000000",
        REVERSED="yes",
        SOURCE_DATE_EPOCH="1",
        OPENBLAS_NUM_THREADS="2",
    )
    assert sorted(plain) == sorted(hostile)
    assert [name for name in plain if plain[name] != hostile[name]] == []
    assert any(name.endswith(".pdf") for name in plain)


def test_another_packing_of_the_same_data_gives_the_same_figures(
    campaign_folder: Path, pristine: Path, tmp_path: Path
) -> None:
    from generator import pipeline
    from generator.publish.evidence import figures_csv

    copy = Path(shutil.copytree(campaign_folder, tmp_path / campaign_folder.name))
    packed = copy / "light" / "veldrune-a60.csv.gz"
    packed.with_suffix("").write_bytes(gzip.decompress(packed.read_bytes()))
    packed.unlink()
    assert figures_csv(pipeline.assess(copy)) == (pristine / "data" / "figures.csv").read_bytes()
