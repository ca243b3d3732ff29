"""The few kinds of layer that the figures are put together from, in Vega-Lite's words.

Places are data coordinates on the two scales of a view; every layer of a view names the same
domains, so that none of them stretches a scale.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

from PIL import ImageFont

from . import ink
from .drawing import FONT_FOLDERS, Chart

Point = tuple[float, float]
FONT_SIZE = 14
LINE = 18


@dataclass(frozen=True)
class View:
    """A rectangle with two linear scales. x, y : (low, high); width, height : px.

    x_axis, y_axis : Vega-Lite axes; every layer carries the same, so that they stay one.
    """

    x: Point
    y: Point
    width: float
    height: float
    x_axis: Chart | None = None
    y_axis: Chart | None = None

    @property
    def px_x(self) -> float:
        """Data units of one pixel across."""
        return (self.x[1] - self.x[0]) / self.width

    @property
    def px_y(self) -> float:
        return (self.y[1] - self.y[0]) / self.height

    def encoding(self, **more: Any) -> Chart:
        def channel(field: str, domain: Point, axis: Chart | None) -> Chart:
            scale = {"domain": list(domain), "nice": False, "zero": False}
            return {"field": field, "type": "quantitative", "scale": scale, "axis": axis}

        return {
            "x": channel("x", self.x, self.x_axis),
            "y": channel("y", self.y, self.y_axis),
            **more,
        }


def path(view: View, points: Sequence[Point], colour: str, width: float, **mark: Any) -> Chart:
    """A line through the points in their order, clipped to the view."""
    values = [{"x": x, "y": y, "n": n} for n, (x, y) in enumerate(points)]
    order = {"order": {"field": "n", "type": "quantitative"}}
    return {
        "data": {"values": values},
        "mark": {"type": "line", "color": colour, "strokeWidth": width, "clip": True, **mark},
        "encoding": view.encoding(**order),
    }


def segments(
    view: View, lines: Sequence[tuple[Point, Point]], colour: str, width: float, **mark: Any
) -> Chart:
    """Straight strokes from a point to a point."""
    values = [{"x": x1, "y": y1, "x2": x2, "y2": y2} for (x1, y1), (x2, y2) in lines]
    to = {"x2": {"field": "x2"}, "y2": {"field": "y2"}}
    return {
        "data": {"values": values},
        "mark": {"type": "rule", "color": colour, "strokeWidth": width, **mark},
        "encoding": view.encoding(**to),
    }


def band(view: View, edges: Sequence[tuple[float, float, float]], colour: str) -> Chart:
    """An area between (x, low, high), edged in pencil."""
    values = [{"x": x, "y": low, "y2": high} for x, low, high in edges]
    line = {"color": ink.PENCIL, "strokeWidth": 1}
    return {
        "data": {"values": values},
        "mark": {"type": "area", "color": colour, "opacity": 1, "clip": True, "line": line},
        "encoding": view.encoding(y2={"field": "y2"}),
    }


def boxes(view: View, corners: Sequence[tuple[Point, Point]], fill: str) -> Chart:
    """Filled rectangles, each from its low to its high corner."""
    values = [{"x": x, "y": y, "x2": x2, "y2": y2} for (x, y), (x2, y2) in corners]
    to = {"x2": {"field": "x2"}, "y2": {"field": "y2"}}
    return {
        "data": {"values": values},
        "mark": {"type": "rect", "opacity": 1, "fill": fill, "stroke": None},
        "encoding": view.encoding(**to),
    }


def dots(
    view: View,
    points: Sequence[Point],
    shape: str,
    size: float,
    colour: str = ink.INK,
    *,
    hollow: bool = False,
) -> Chart:
    """Marks of one shape; ``size`` is the area in px², hollow ones show the sheet inside."""
    mark: Chart = {"type": "point", "shape": shape, "size": size, "opacity": 1}
    mark |= {"fill": ink.SHEET if hollow else colour, "stroke": colour, "strokeWidth": 2}
    return {
        "data": {"values": [{"x": x, "y": y} for x, y in points]},
        "mark": mark,
        "encoding": view.encoding(),
    }


def words(view: View, at: Point, text: str, **mark: Any) -> Chart:
    """Text at a place; mark takes Vega-Lite's align, dx, dy, fontWeight."""
    return many_words(view, [(at, (text,))], **mark)


def many_words(view: View, put: Sequence[tuple[Point, tuple[str, ...]]], **mark: Any) -> Chart:
    """Texts of one kind, each with its place; of several lines, the place is the first one's."""
    values = [{"x": x, "y": y, "text": list(lines)} for (x, y), lines in put]
    return {
        "data": {"values": values},
        "mark": {"type": "text", "baseline": "middle", "lineHeight": LINE, **mark},
        "encoding": view.encoding(text={"field": "text", "type": "nominal"}),
    }


def text_width(text: str, bold: bool = False) -> float:
    """Width in px at the figures' one size."""
    return float(_face(bold).getlength(text))


@cache
def _face(bold: bool) -> ImageFont.FreeTypeFont:
    names = (
        ("B612-Bold.otf", "DejaVuSans-Bold.ttf") if bold else ("B612-Regular.otf", "DejaVuSans.ttf")
    )
    for folder, name in zip(FONT_FOLDERS, names, strict=True):
        if (Path(folder) / name).is_file():
            return ImageFont.truetype(str(Path(folder) / name), FONT_SIZE)
    raise FileNotFoundError(
        "Neither fonts-b612 nor fonts-dejavu-core is installed: figures cannot be set."
    )
