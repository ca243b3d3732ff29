"""The crack to scale in the wall: one look across the metal, both scales equal.

The body is drawn as far as it matters: a wide plate is broken off at its sides.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from math import cos, hypot, pi, sin, sqrt

from . import ink
from .drawing import Chart, Figure, Table, draw
from .layers import Point, View, path, segments, words
from .words import millimetres

WIDTH = 300.0
TALLEST = 240.0


@dataclass(frozen=True)
class SectionStory:
    """shape : how the crack lies, one of SHAPES; sizes in mm as in the case document

    surface : half an ellipse from this side, depth_mm deep and length_mm long in a wall of
        thickness_mm; through : length_mm long, through the wall, in the middle of width_mm;
    edge : length_mm from the edge of width_mm, through the wall; bar : from the outside of a
        round bar of diameter thickness_mm
    stop_mm : the depth (surface, bar) or length (through, edge) at which use stops
    """

    what: str
    shape: str
    thickness_mm: float
    length_mm: float | None
    depth_mm: float | None = None
    width_mm: float | None = None
    stop_mm: float | None = None
    decimal_sign: str = "."

    def mm(self, value: float) -> str:
        return millimetres(value, self.decimal_sign)


SHAPES = ("surface", "through", "edge", "bar")


def section_figure(story: SectionStory, *, name: str = "section") -> Figure:
    """Raises ValueError for a shape that is not known or a size that the shape needs."""
    if story.shape not in SHAPES:
        raise ValueError(f"no such shape: {story.shape!r}")
    needed = {
        "surface": (story.depth_mm, story.length_mm),
        "bar": (story.depth_mm,),
        "through": (story.length_mm,),
        "edge": (story.length_mm,),
    }[story.shape]
    if any(size is None for size in needed):
        raise ValueError(f"a {story.shape} crack cannot be drawn without its sizes")
    chart = _bar(story) if story.shape == "bar" else _wall(story)
    return draw(name, title(story), chart, table(story), decimal_sign=story.decimal_sign)


def title(story: SectionStory) -> str:
    wall = "bar" if story.shape == "bar" else "wall"
    if story.depth_mm is None or story.shape in ("through", "edge"):
        return f"{story.what} goes through the wall of {story.mm(story.thickness_mm)}."
    part = round(100 * story.depth_mm / story.thickness_mm)
    return f"{story.what} reaches {part} % into the {wall} of {story.mm(story.thickness_mm)}."


def table(story: SectionStory) -> Table:
    rows = [
        ("depth", story.depth_mm),
        ("length", story.length_mm),
        ("diameter" if story.shape == "bar" else "wall", story.thickness_mm),
        ("width", story.width_mm),
        ("stop", story.stop_mm),
    ]
    return Table(
        ("what", "size"), tuple((name, story.mm(size)) for name, size in rows if size is not None)
    )


def _wall(story: SectionStory) -> Chart:
    """A piece of the wall around the crack: thickness up, length across."""
    length, wall = story.length_mm or 0.0, story.thickness_mm
    reach = 1.15 * story.stop_mm if story.stop_mm and story.shape != "surface" else 0.0
    shown = max(1.5 * length, 3.0 * wall, reach)
    whole = story.width_mm is not None and story.width_mm <= 1.3 * shown
    if whole and story.width_mm:
        shown = story.width_mm
    at_edge = story.shape == "edge"
    left = 0.0 if at_edge else -shown / 2
    per_px = max(shown / WIDTH, wall / TALLEST)
    view = View((left, left + shown), (0.0, wall), shown / per_px, wall / per_px)
    middle = left + shown / 2
    outline = [((left, 0.0), (left + shown, 0.0)), ((left, wall), (left + shown, wall))]
    if whole or at_edge:
        outline.append(((left, 0.0), (left, wall)))
    if whole:
        outline.append(((left + shown, 0.0), (left + shown, wall)))
    layers = [_filled(view, _front(story)), segments(view, outline, ink.INK, 2)]
    layers += _stop(story, view)
    layers += [
        words(view, (middle, 0.0), "this side", dy=14),
        words(view, (middle, wall), "far side", dy=-12),
    ]
    return {"width": view.width, "height": view.height, "layer": layers}


def _front(story: SectionStory) -> list[tuple[float, float, float]]:
    """(x, low, high): the cracked face."""
    length, wall = story.length_mm or 0.0, story.thickness_mm
    if story.shape == "surface":
        depth = story.depth_mm or 0.0
        across = [length / 2 * cos(pi * n / 60) for n in range(61)]
        half = length / 2
        return [(x, 0.0, depth * sqrt(max(0.0, 1 - (x / half) ** 2))) for x in across]
    ends = (0.0, length) if story.shape == "edge" else (-length / 2, length / 2)
    return [(x, 0.0, wall) for x in ends]


def _stop(story: SectionStory, view: View) -> list[Chart]:
    if story.stop_mm is None:
        return []
    stop, wall = story.stop_mm, story.thickness_mm
    if story.shape == "surface":
        lines = [((view.x[0], stop), (view.x[1], stop))] if stop <= wall else []
    elif story.shape == "edge":
        lines = [((stop, 0.0), (stop, wall))]
    else:
        lines = [((s * stop / 2, 0.0), (s * stop / 2, wall)) for s in (-1, 1)]
    inside = [line for line in lines if view.x[0] <= line[0][0] <= view.x[1]]
    return [segments(view, inside, ink.INK, 4)] if inside else []


def _filled(view: View, edges: Sequence[tuple[float, float, float]]) -> Chart:
    """The broken face in solid ink."""
    return {
        "data": {"values": [{"x": x, "y": low, "y2": high} for x, low, high in edges]},
        "mark": {"type": "area", "color": ink.INK, "opacity": 1, "clip": True},
        "encoding": view.encoding(y2={"field": "y2"}),
    }


def _bar(story: SectionStory) -> Chart:
    """The round bar with the crack at its foot, its front an arc about the mouth's middle."""
    radius = story.thickness_mm / 2
    depth = story.depth_mm or 0.0
    reach = radius * 1.04
    view = View((-reach, reach), (-reach, reach), 200.0, 200.0)
    turns = [2 * pi * n / 120 for n in range(121)]
    outline = [(radius * cos(t), radius * sin(t)) for t in turns]
    layers = [
        _filled(view, _bar_face(radius, depth)),
        path(view, outline, ink.INK, 2, clip=False),
    ]
    if story.stop_mm is not None and story.stop_mm < 2 * radius:
        layers += [path(view, _arc(radius, story.stop_mm), ink.INK, 4)]
    return {"width": view.width, "height": view.height, "layer": layers}


def _bar_face(radius: float, depth: float) -> list[tuple[float, float, float]]:
    """(x, low, high) of the face between the bar's outside and the crack's front."""
    ends = _arc(radius, depth)
    return [(x, -sqrt(max(0.0, radius**2 - x**2)), y) for x, y in ends]


def _arc(radius: float, depth: float) -> list[Point]:
    """The front: points at ``depth`` from the mouth's middle that lie inside the bar."""
    points = []
    for n in range(181):
        t = pi * n / 180
        x, y = depth * cos(t), -radius + depth * sin(t)
        if hypot(x, y) <= radius:
            points.append((x, y))
    return points
