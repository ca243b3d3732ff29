"""The look lives in one file, and every letter that the pages use is in their fonts."""

import re
from pathlib import Path

import pytest
from fontTools.ttLib import TTFont

from logbook.pages.frame import LOOKS

STATIC = Path("logbook/static/logbook")
TEMPLATES = Path("logbook/templates")
TOKENS = STATIC / "css" / "tokens.css"
OTHERS = [path for path in (STATIC / "css").glob("*.css") if path.name not in ("tokens.css",)]
# look.md: paper, sheet, ink, pencil, rule, wash 1, wash 2, violet.
DAY = ["#edf2ec", "#f8faf6", "#14202b", "#4a5660", "#6e7f78", "#93a59b", "#b9c6be", "#4a2a82"]
LAMP = ["#0f1513", "#18201d", "#e3ebe4", "#a3b0a8", "#76857c", "#56655d", "#3a4741", "#c6b0ff"]


def colours_of(rule: str) -> list[str]:
    return re.findall(r"#[0-9a-f]{6}", rule)


def block(selector: str) -> str:
    text = TOKENS.read_text()
    start = text.index(selector + " {")
    return text[start : text.index("}", start)]


def test_the_tokens_are_the_colours_of_the_look():
    assert colours_of(block(":root")) == DAY
    assert colours_of(block(':root[data-look="lamp"]')) == LAMP
    assert set(colours_of(block(':root[data-look="sun"]'))) == {"#ffffff", "#000000"}


@pytest.mark.parametrize("path", OTHERS, ids=lambda path: path.name)
def test_no_colour_and_no_length_outside_the_tokens(path: Path):
    css = re.sub(r"/\*.*?\*/", "", path.read_text(), flags=re.S)
    css = re.sub(r"@media[^{]*\{", "{", css)  # widths at which the layout changes
    assert not re.findall(r"#[0-9a-fA-F]{3,8}\b|rgba?\(|hsla?\(", css)
    assert not re.findall(r"\b\d+(?:\.\d+)?(?:px|pt|mm|rem|em|ms|s)\b", css)
    for wanted in re.findall(r"var\((--[a-z0-9-]+)\)", css):
        assert f"{wanted}:" in TOKENS.read_text(), wanted


@pytest.mark.parametrize("path", sorted([*TEMPLATES.rglob("*.html")]), ids=lambda path: path.name)
def test_no_style_or_script_inside_a_page(path: Path):
    if "records" in path.parts:
        return  # the printed record is no page
    html = path.read_text()
    assert not re.search(r"\sstyle=|<style|\son[a-z]+=|<script(?![^>]*\ssrc=)", html)


def test_three_looks_and_no_fourth():
    assert LOOKS == ("day", "lamp", "sun")


def luminance(colour: str) -> float:
    channels = [int(colour[i : i + 2], 16) / 255 for i in (1, 3, 5)]
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in channels]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(a: str, b: str) -> float:
    high, low = sorted((luminance(a), luminance(b)), reverse=True)
    return (high + 0.05) / (low + 0.05)


@pytest.mark.parametrize("look", [DAY, LAMP], ids=["day", "lamp"])
def test_ink_pencil_and_violet_can_be_read_on_the_sheet(look: list[str]):
    sheet, ink, pencil, violet = look[1], look[2], look[3], look[7]
    assert contrast(ink, sheet) > 13
    assert contrast(pencil, sheet) > 7
    assert contrast(violet, sheet) > 8
    assert contrast(look[4], sheet) > 3.9


def cmap(name: str) -> set[int]:
    return set(TTFont(STATIC / "fonts" / name).getBestCmap())


# These stand in the fallback face, as look.md says.
MISSING = set("ρ∑№")


def test_every_letter_of_the_pages_is_in_both_cuts_of_the_program_s_voice():
    used: set[str] = set()
    sources = [*TEMPLATES.rglob("*.html"), *Path("logbook").rglob("*.py")]
    for path in sources:
        used |= set(path.read_text())
    used = {c for c in used if c.isprintable()} - MISSING
    # Letters that only people's names and words bring stand in the person's voice.
    ours = {c for c in used if not 0x100 <= ord(c) < 0x250}
    for cut in ("b612-regular.woff2", "b612-bold.woff2"):
        have = {chr(c) for c in cmap(cut)}
        assert ours - have == set(), cut


def test_the_symbols_of_the_trade_are_there():
    for cut in ("b612-regular.woff2", "b612-bold.woff2"):
        have = {chr(c) for c in cmap(cut)}
        assert set("√≤≥⁻→−×σΔπ·–…±≈²³⁰°") <= have, cut


def test_digits_of_both_voices_share_one_width():
    for name in ("b612-regular.woff2", "b612-bold.woff2"):
        font = TTFont(STATIC / "fonts" / name)
        names, widths = font.getBestCmap(), font["hmtx"]
        assert len({widths[names[ord(digit)]][0] for digit in "0123456789"}) == 1
    for name in ("bitter-latin-400.woff2", "bitter-latin-700.woff2"):
        tags = {
            f.FeatureTag
            for f in TTFont(STATIC / "fonts" / name)["GSUB"].table.FeatureList.FeatureRecord
        }
        assert {"tnum", "lnum"} <= tags


def test_the_fonts_of_a_tablet_weigh_at_most_90_kb():
    files = list((STATIC / "fonts").glob("*.woff2"))
    assert len(files) == 6
    assert sum(path.stat().st_size for path in files) <= 90_000


def test_each_face_has_its_licence_beside_it():
    for name in ("OFL-B612.txt", "OFL-Bitter.txt"):
        assert "SIL OPEN FONT LICENSE" in (STATIC / "fonts" / name).read_text().upper()
