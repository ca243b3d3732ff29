"""The six verdict marks: an outline and a hatch that can be told apart without colour.

A mark never stands without its word and its sentence; that is the caller's part. Everything is
drawn in ``currentColor``, so a mark takes the ink of the text that it stands in.
"""

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import count
from math import sqrt
from re import sub

BOX = 48
OUTLINE = 3
HATCH = 1.8


@dataclass(frozen=True)
class Mark:
    """outline : SVG path in the 48-unit box; hatch : drawn inside it; solid : filled with ink."""

    outline: str
    hatch: str = ""
    solid: bool = False


def _n(value: float) -> str:
    return f"{value:.2f}".rstrip("0").rstrip(".")


def _line(x1: float, y1: float, x2: float, y2: float) -> str:
    return f"M{_n(x1)} {_n(y1)}L{_n(x2)} {_n(y2)}"


def _strokes(lines: Iterator[str]) -> str:
    return f'<path fill="none" stroke="currentColor" stroke-width="{HATCH}" d="{"".join(lines)}"/>'


def _level(apart: float) -> Iterator[str]:
    steps = int(BOX / 2 / apart)
    for step in range(-steps, steps + 1):
        y = BOX / 2 + step * apart
        yield _line(0, y, BOX, y)


def _slant(apart: float, rising: bool = True) -> Iterator[str]:
    """Lines at 45 degrees, ``apart`` measured square to them, one through the middle."""
    step = apart * sqrt(2)
    turns = int(BOX / step) + 1
    for turn in range(-turns, turns + 1):
        at = turn * step
        yield _line(at, BOX, at + BOX, 0) if rising else _line(at, 0, at + BOX, BOX)


def _crossed(apart: float) -> Iterator[str]:
    yield from _slant(apart)
    yield from _slant(apart, rising=False)


def _dots(apart: float, radius: float) -> str:
    steps = int(BOX / 2 / apart)
    places = [BOX / 2 + step * apart for step in range(-steps, steps + 1)]
    return "".join(
        f'<circle fill="currentColor" cx="{_n(x)}" cy="{_n(y)}" r="{_n(radius)}"/>'
        for y in places
        for x in places
    )


# In order of strictness.
MARKS = {
    "continue": Mark("M4 24a20 20 0 1 0 40 0a20 20 0 1 0 -40 0Z"),
    "watch": Mark("M2 24Q24 -4 46 24Q24 52 2 24Z", _dots(8, 1.7)),
    "restrict": Mark("M4 5L24 15L44 5V43L24 33L4 43Z", _strokes(_level(6.75))),
    "repair": Mark("M6 6H42V42H6Z", _strokes(_slant(5))),
    "refer": Mark("M3 7H29L46 24L29 41H3Z", _strokes(_crossed(6))),
    "withdraw": Mark("M14 2H34L44 13V46H4V13ZM24 8a5 5 0 1 0 .01 0Z", solid=True),
}

_serial = count(1)


def mark_svg(verdict: str, size: float = 24, *, unit: str = "", key: str = "") -> str:
    """The mark of a verdict as an inline SVG, ``size`` in px or in ``unit`` ("mm", "rem").

    key : makes the id of its clip unique on the page; left out, a running number does. Where the
        bytes must be the same each time (the printed record), the caller gives one.

    The SVG is hidden from screen readers: the word stands beside it. Raises KeyError for a word
    that is no verdict.
    """
    mark = MARKS[verdict]
    side = f"{_n(size)}{unit}"
    clip = f"mark-{verdict}-{sub('[^A-Za-z0-9-]', '', key) or next(_serial)}"
    inside = (
        f'<clipPath id="{clip}"><path d="{mark.outline}"/></clipPath>'
        f'<g clip-path="url(#{clip})">{mark.hatch}</g>'
        if mark.hatch
        else ""
    )
    fill = 'fill="currentColor" fill-rule="evenodd"' if mark.solid else 'fill="none"'
    return (
        f'<svg class="mark" width="{side}" height="{side}" viewBox="0 0 {BOX} {BOX}"'
        f' aria-hidden="true" focusable="false">{inside}'
        f'<path {fill} stroke="currentColor" stroke-width="{OUTLINE}" stroke-linejoin="miter"'
        f' d="{mark.outline}"/></svg>'
    )
