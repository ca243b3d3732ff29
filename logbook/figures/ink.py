"""Colours of a figure by what they mean, and their change into a page's or a print's colours.

A figure is drawn once, in the day colours. In a page each becomes the page's own CSS property, so
that day, lamp and sun need no second drawing; in print it becomes ink on white.
"""

import re

INK = "#14202b"
PENCIL = "#4a5660"
RULE = "#6e7f78"
SHEET = "#f8faf6"
WASH_1 = "#93a59b"
WASH_2 = "#b9c6be"
VIOLET = "#4a2a82"

_PROPERTIES = {
    INK: "var(--ink)",
    PENCIL: "var(--pencil)",
    RULE: "var(--rule)",
    SHEET: "var(--sheet)",
    WASH_1: "var(--wash-1)",
    WASH_2: "var(--wash-2)",
    VIOLET: "var(--violet)",
}
_PRINT = {colour: colour for colour in _PROPERTIES} | {SHEET: "#ffffff"}

_TAG = re.compile(r"<[^<>]*>")
_COLOUR = re.compile(r'(?<= )(fill|stroke)="(#[0-9a-fA-F]{3,8})"')


def for_page(svg: str) -> str:
    """The same SVG with CSS properties for colours. Raises KeyError on a colour without meaning."""
    return _recoloured(svg, _PROPERTIES)


def for_print(svg: str) -> str:
    """The same SVG in print colours. Raises KeyError on a colour without meaning."""
    return _recoloured(svg, _PRINT)


def _recoloured(svg: str, colours: dict[str, str]) -> str:
    # Only inside tags: words of people stand between them, whatever they read like.
    def tag(found: re.Match[str]) -> str:
        return _COLOUR.sub(lambda one: f'{one[1]}="{colours[one[2].lower()]}"', found[0])

    return _TAG.sub(tag, svg)
