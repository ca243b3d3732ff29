"""A figure, and how its one definition (a Vega-Lite chart) becomes an SVG text.

The chart is plain data; nothing is fetched. The SVG has no script, no style and no address in it,
which a page's content security policy and the record's renderer both count on.
"""

import re
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from html import escape
from pathlib import Path
from typing import Any

import vl_convert

from . import ink
from .words import locale_format

FONT = "B612, DejaVu Sans, sans-serif"
FONT_FOLDERS = ("/usr/share/fonts/opentype/b612", "/usr/share/fonts/truetype/dejavu")
VEGA_LITE = "v6.1"

Chart = dict[str, Any]


@dataclass(frozen=True)
class Table:
    """The figure's numbers: one heading a column, texts as they are printed."""

    headings: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    notes: tuple[str, ...] = ()


@dataclass(frozen=True)
class Figure:
    """name : tells the figures of a page apart; title : a sentence with the answer."""

    name: str
    title: str
    page_svg: str
    print_svg: str
    table: Table


def draw(name: str, title: str, chart: Chart, table: Table, *, decimal_sign: str = ".") -> Figure:
    """name must be a plain word (letters, digits, hyphen): ids in the SVG begin with it."""
    svg = _finished(_converted(chart, decimal_sign), name, title)
    return Figure(name, title, ink.for_page(svg), ink.for_print(svg), table)


@cache
def _fonts_registered() -> bool:
    """Once a process: the measuring of words needs the face that will show them."""
    folders = [folder for folder in FONT_FOLDERS if Path(folder).is_dir()]
    for folder in folders:
        vl_convert.register_font_directory(folder)
    return bool(folders)


def _converted(chart: Chart, decimal_sign: str) -> str:
    _fonts_registered()
    return str(
        vl_convert.vegalite_to_svg(
            {**chart, "config": CONFIG},
            vl_version=VEGA_LITE,
            allowed_base_urls=[],
            format_locale=locale_format(decimal_sign),
        )
    )


def _finished(svg: str, name: str, title: str) -> str:
    """Ids that no other figure of the page has, and a name for those who hear the page."""
    if not re.fullmatch(r"[A-Za-z][A-Za-z0-9-]*", name):
        raise ValueError(f"a figure's name is a plain word, not {name!r}")
    # The converter numbers clips through a whole process: ours begin anew in each figure.
    clips = {old: f"{name}-{n}" for n, old in enumerate(re.findall(r'<clipPath id="(\w+)"', svg))}
    svg = re.sub(r'(<clipPath id=")(\w+)', lambda found: found[1] + clips[found[2]], svg)
    svg = re.sub(r'(<[^<>]* clip-path="url\(#)(\w+)', lambda found: found[1] + clips[found[2]], svg)
    # Unsaid weight is the page's own, so that the sun look can make all text bold.
    svg = re.sub(r'(<[^<>]*) font-weight="normal"', r"\1", svg)
    # The figure has one name, its title; its inner groups are no pictures of their own.
    inner = r' (?:role="graphics-[a-z]+"|aria-roledescription="[^"]*"|aria-hidden="true")'
    svg = re.sub(r"<g [^<>]*>", lambda found: re.sub(inner, "", found[0]), svg)
    size = re.search(r'width="([\d.]+)" height="([\d.]+)" viewBox="[^"]*"', svg)
    if size is None:
        raise ValueError("the chart came back without a size")
    body = svg[svg.index(">") + 1 :]
    width, height = size.groups()
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" class="chart" role="img"'
        f' aria-label="{escape(title, quote=True)}"'
        f' width="{width}" height="{height}" viewBox="0 0 {width} {height}">{body}'
    )


CONFIG: Mapping[str, Any] = {
    "aria": False,
    "font": FONT,
    "background": None,
    "padding": {"left": 2, "right": 14, "top": 2, "bottom": 2},
    "view": {"stroke": None},
    "concat": {"spacing": 8},
    "axis": {
        "domainColor": ink.INK,
        "domainWidth": 2,
        "tickColor": ink.INK,
        "tickWidth": 1,
        "tickSize": 6,
        "labelColor": ink.INK,
        "labelFontSize": 14,
        "labelPadding": 4,
        "titleColor": ink.INK,
        "titleFontSize": 14,
        "titleFontWeight": "normal",
        "titlePadding": 8,
        "grid": False,
    },
    "text": {"color": ink.INK, "fontSize": 14, "lineHeight": 18},
    "mark": {"color": ink.INK},
    "point": {"opacity": 1},
}
