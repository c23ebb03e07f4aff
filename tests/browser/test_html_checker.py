"""The Nu checker reads every type of page."""

from __future__ import annotations

import json
import shutil
import subprocess

import pytest

NU_PATH = ".make/node/node_modules/vnu-jar/build/dist/vnu.jar"

pytestmark = pytest.mark.needs("nu")


def errors(paths, pytestconfig):
    jar = pytestconfig.rootpath / NU_PATH
    ran = subprocess.run(
        [
            shutil.which("java"),
            "-Xss2m",
            "-jar",
            str(jar),
            "--stdout",
            "--exit-zero-always",
            "--format",
            "json",
            *map(str, paths),
        ],
        capture_output=True,
        check=True,
        text=True,
    )
    messages = json.loads(ran.stdout)["messages"]
    return [
        f"{item['url'].rpartition('/')[2]}:{item['lastLine']}: {item['message']}"
        for item in messages
        if item["type"] == "error"
    ]


def test_no_page_has_an_error(pages, pytestconfig):
    assert errors(pages, pytestconfig) == []


def test_an_error_would_be_found(pages, tmp_path, pytestconfig):
    broken = tmp_path / "broken.html"
    text = pages[0].read_text(encoding="utf-8")
    broken.write_text(text.replace("<main", "<main><li", 1), encoding="utf-8")
    assert errors([broken], pytestconfig)
