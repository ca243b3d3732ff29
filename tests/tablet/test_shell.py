"""The page that a tablet keeps: holds nothing of anybody, whole, and within its budget."""

import gzip
import json
import re
import shutil
import subprocess
from pathlib import Path

import pytest
from django.test import Client

from logbook.tablet import shell

STATIC = Path("logbook/static/logbook/tablet")
TOKENS = Path("logbook/static/logbook/css/tokens.css")
BUDGET = 100_000


def test_all_its_script_weighs_less_than_100_kb_compressed() -> None:
    text = b"".join(path.read_bytes() for path in sorted(STATIC.glob("*.js")))
    size = len(gzip.compress(text, 9, mtime=0))
    print(f"script of the tablet: {size} bytes compressed")
    assert size < BUDGET


def test_the_worker_keeps_every_file_that_the_page_asks_for() -> None:
    text = Client().get("/worker.js").content.decode()
    files = json.loads(re.search(r"^const FILES = (.*);$", text, re.M)[1])  # type: ignore[index]
    for module in STATIC.glob("*.js"):
        for asked in re.findall(r'(?:from|import\()\s*"\./([a-z-]+\.js)"', module.read_text()):
            assert f"/static/logbook/tablet/{asked}" in files, (module.name, asked)
    page = Client().get("/tablet/").content.decode()
    for asked in re.findall(r'(?:href|src)="(/static/[^"]+)"', page):
        assert asked in files
    for one in files:
        assert Client().get(one).status_code == 200, one


def test_its_version_changes_with_its_files() -> None:
    assert re.fullmatch("[0-9a-f]{16}", shell.version())


def test_the_page_is_the_same_for_everyone(book: object) -> None:
    assert Client().get("/tablet/").content == Client().get("/tablet/").content


def test_its_style_takes_every_colour_and_length_from_the_tokens() -> None:
    css = re.sub(r"/\*.*?\*/", "", (STATIC / "tablet.css").read_text(), flags=re.S)
    css = re.sub(r"@media[^{]*\{", "{", css)
    assert not re.findall(r"#[0-9a-fA-F]{3,8}\b|rgba?\(|hsla?\(", css)
    assert not re.findall(r"\b\d+(?:\.\d+)?(?:px|pt|mm|rem|em|ms|s)\b", css)
    for wanted in re.findall(r"var\((--[a-z0-9-]+)\)", css):
        assert f"{wanted}:" in TOKENS.read_text(), wanted


def test_no_script_reads_text_as_markup() -> None:
    for module in STATIC.glob("*.js"):
        assert not re.search(r"innerHTML|outerHTML|insertAdjacentHTML|\beval\(", module.read_text())


@pytest.mark.skipif(shutil.which("node") is None, reason="set-up for the tests installs node")
def test_the_modules_by_node_s_own_runner(tmp_path: Path) -> None:
    """Copied beside a package.json: node takes a .js for a module only where one says so."""
    here = tmp_path / "tests" / "tablet"
    here.mkdir(parents=True)
    shutil.copytree(STATIC, tmp_path / STATIC)
    (tmp_path / "package.json").write_text('{"type": "module"}')
    for path in Path("tests/tablet").glob("*.test.mjs"):
        shutil.copy(path, here)
    files = sorted(str(path) for path in here.glob("*.mjs"))
    assert files
    ran = subprocess.run(["node", "--test", *files], capture_output=True, text=True, check=False)
    assert ran.returncode == 0, ran.stdout + ran.stderr
