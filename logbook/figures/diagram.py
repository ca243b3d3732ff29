"""The failure assessment diagram: where the crack stands between running and giving way.

Both scales are equal. Across: the load ratio; up: the toughness ratio. Inside the line it holds.
Nothing is computed here but where things stand on paper.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from math import cos, hypot, pi, sin

from . import ink
from .drawing import Chart, Figure, Table, draw
from .hatch import slant_hatch
from .layers import Point, View, dots, path, segments, words
from .place import Place, Plan
from .words import number

WIDTH = 432.0
# What lies further out than this is said in words, or the line would be a speck in a corner.
FAR = 3.0


@dataclass(frozen=True)
class DiagramStory:
    """what : who is meant, e.g. "Crack 2"; all points are (load ratio, toughness ratio).

    curve : the limit, from left to right, ending where it meets the axis or the cut-off
    now : the worst case of the last look; ring : half of the 90 % spread in each ratio
    reserve : the factor on all primary loads that brings ``now`` to the line
    asked : the reserve that is required; ray_start : where the ray begins (residual stress)
    past : earlier looks with their years
    """

    what: str
    curve: tuple[Point, ...]
    now: Point
    reserve: float | None = None
    asked: float | None = None
    ray_start: Point = (0.0, 0.0)
    ring: Point | None = None
    past: tuple[tuple[Point, str], ...] = ()
    method: str = ""
    decimal_sign: str = "."

    def n(self, value: float) -> str:
        return number(value, 2, self.decimal_sign)

    def at(self, factor: float) -> Point:
        """Where the point goes when the primary loads are multiplied by ``factor``."""
        (x0, y0), (x1, y1) = self.ray_start, self.now
        return (x0 + factor * (x1 - x0), y0 + factor * (y1 - y0))

    def limit(self, load_ratio: float) -> float:
        """The limiting toughness ratio; 0 past the end of the line."""
        for (x1, y1), (x2, y2) in pairwise(self.curve):
            if x1 <= load_ratio <= x2 and x2 > x1:
                return y1 + (y2 - y1) * (load_ratio - x1) / (x2 - x1)
        return 0.0

    @property
    def holds(self) -> bool:
        return self.now[1] <= self.limit(self.now[0])


def diagram_figure(story: DiagramStory, *, name: str = "diagram") -> Figure:
    """Raises ValueError for a curve of fewer than two points."""
    if len(story.curve) < 2:
        raise ValueError("the limit curve needs at least two points")
    return draw(name, title(story), _chart(story), table(story), decimal_sign=story.decimal_sign)


def title(story: DiagramStory) -> str:
    """The answer in a sentence."""
    place = "holds at the largest load" if story.holds else "does not hold at the largest load"
    begun = f"{story.what}, taken at its worst, {place}"
    if story.reserve is None:
        return f"{begun}."
    ended = f"it would break at {story.n(story.reserve)} × this load"
    if story.asked is None:
        return f"{begun}; {ended}."
    enough = "is asked for" if story.reserve >= story.asked else "is asked for, which it lacks"
    return f"{begun}; {ended}, and {story.n(story.asked)} {enough}."


def table(story: DiagramStory) -> Table:
    rows = [
        (when, story.n(point[0]), story.n(point[1]), story.n(story.limit(point[0])))
        for point, when in (*story.past, (story.now, "now, at its worst"))
    ]
    notes = [] if story.reserve is None else [f"Breaks at {story.n(story.reserve)} × this load."]
    if story.asked is not None:
        notes.append(f"Reserve asked for: {story.n(story.asked)}.")
    if story.ray_start != (0.0, 0.0):
        start = f"({story.n(story.ray_start[0])}, {story.n(story.ray_start[1])})"
        notes.append(f"The ray starts at {start}: residual stress alone.")
    end = story.curve[-1][0]
    notes.append(f"The line ends at load ratio {story.n(end)}.")
    if story.method:
        notes.append(f"Line: {story.method}.")
    return Table(
        ("look", "load ratio", "toughness ratio", "limit of the toughness ratio"),
        tuple(rows),
        tuple(notes),
    )


# --- drawing -----------------------------------------------------------------------------------


def _reach(story: DiagramStory) -> Point:
    points = [story.now, *(point for point, _ in story.past)]
    points += [story.at(factor) for factor in (story.reserve, story.asked) if factor is not None]
    across = [story.curve[-1][0] * 1.38, *(x * 1.12 for x, _ in points if x <= FAR)]
    up = [1.22, *(y * 1.12 for _, y in points if y <= FAR)]
    return max(across), max(up)


def _chart(story: DiagramStory) -> Chart:
    right, top = _reach(story)
    # Equal scales: one unit is as long across as it is up.
    height = WIDTH * top / right
    view = View((0.0, right), (0.0, top), WIDTH, height, _axis("bottom"), _axis("left"))
    return {"width": WIDTH, "height": height, "layer": _plot(story, view)}


def _axis(orient: str) -> Chart:
    names = {
        "bottom": "load ratio: at 1 the metal left beside the crack gives way",
        "left": None,
    }
    return {
        "orient": orient,
        "title": names[orient],
        "titleAnchor": "start",
        "format": ".1f",
        "tickMinStep": 0.2,
        "tickCount": 7,
    }


def _plot(story: DiagramStory, view: View) -> list[Chart]:
    plan = Plan(view)
    closed = [*story.curve, (story.curve[-1][0], 0.0)]
    _take_what_is_drawn(story, plan, closed)
    hatch = slant_hatch(view, lambda x, y: y > story.limit(x))
    _put_now_words(story, plan)
    _put_ray_words(story, plan)
    for point, year in _past_in(story, view):
        plan.put(year, _around(point, 9))
    _put_region_words(story, plan)
    up = "toughness ratio: at 1 the crack runs"
    return [
        segments(view, hatch, ink.PENCIL, 1),
        *plan.plates(),
        words(view, (0.0, view.y[1]), up, align="left", dx=-24, dy=-18),
        path(view, closed, ink.INK, 4, strokeJoin="miter", clip=False),
        *_ray(story, view),
        *[dots(view, [point], "circle", 50, hollow=True) for point, _ in _past_in(story, view)],
        *_now(story, view),
        *plan.words(),
    ]


def _take_what_is_drawn(story: DiagramStory, plan: Plan, closed: Sequence[Point]) -> None:
    plan.take_line(closed, reach=4)
    plan.take_point(story.now, reach=11)
    for point, _ in story.past:
        plan.take_point(point)
    plan.take_line([story.ray_start, story.at(_ray_end(story))])
    if story.reserve is not None:
        plan.take_point(story.at(story.reserve), reach=9)
    if story.asked is not None:
        plan.take_line(_across_ray(story, plan.view, story.asked, 13))


def _ray_end(story: DiagramStory) -> float:
    return max([1.0, *(factor for factor in (story.reserve, story.asked) if factor is not None)])


def _ray(story: DiagramStory, view: View) -> list[Chart]:
    """The ruler of load: from nothing through now to where it breaks."""
    end = story.at(_ray_end(story))
    layers = [path(view, [story.ray_start, end], ink.INK, 1.5, strokeDash=[7, 5])]
    if story.ray_start != (0.0, 0.0):
        layers.append(dots(view, [story.ray_start], "diamond", 80, hollow=True))
    ruler = [_across_ray(story, view, factor, 5) for factor in _ruler(story)]
    if ruler:
        layers.append(segments(view, ruler, ink.INK, 1.5))
    if story.reserve is not None and _within(view, story.at(story.reserve)):
        layers.append(dots(view, [story.at(story.reserve)], "square", 140))
    if story.asked is not None and _within(view, story.at(story.asked)):
        layers.append(segments(view, [_across_ray(story, view, story.asked, 13)], ink.INK, 4))
    return layers


def _put_ray_words(story: DiagramStory, plan: Plan) -> None:
    view = plan.view
    if story.reserve is not None and _within(view, story.at(story.reserve)):
        text = [f"breaks at {story.n(story.reserve)} ×", "this load"]
        at = story.at(story.reserve)
        plan.put(text, [*_around(at, 14), *_around(at, 28)], bold=True)
    if story.asked is not None and _within(view, story.at(story.asked)):
        places = _beside_ray(story, view, story.asked, (20, 28, 36))
        places += _around(story.at(story.asked), 26)
        plan.put(f"asked for: {story.n(story.asked)}", places)
    if story.ray_start != (0.0, 0.0):
        plan.put("residual stress alone", _around(story.ray_start))
    for factor in _ruler(story):
        decimals = 0 if float(factor).is_integer() else 1
        text_of = number(factor, decimals, story.decimal_sign)
        plan.put(text_of, _beside_ray(story, view, factor, (14, 20, 26)))


def _ruler(story: DiagramStory) -> list[float]:
    """1.2, 1.4 … up to the line, in wider steps where there would be more than six; left out next
    to the two heavy marks, which carry their own words."""
    if story.reserve is None:
        return []
    steps = (0.2, 0.5, 1.0, 2.0, 5.0, 10.0, 20.0, 50.0)
    step = next((one for one in steps if (story.reserve - 1.0) / one <= 6), None)
    if step is None:
        return []
    heavy = [one for one in (1.0, story.asked, story.reserve) if one is not None]
    marks = [round(n * step, 1) for n in range(1, int(story.reserve / step) + 1)]
    return [
        mark for mark in marks if mark > 1 and all(abs(mark - one) > 0.3 * step for one in heavy)
    ]


def _direction(story: DiagramStory, view: View) -> Point:
    """Of the ray, on paper; straight up where the point has not left its start."""
    (x0, y0), (x1, y1) = story.ray_start, story.now
    across, up = (x1 - x0) / view.px_x, (y1 - y0) / view.px_y
    length = hypot(across, up)
    return (across / length, up / length) if length else (0.0, 1.0)


def _across_ray(
    story: DiagramStory, view: View, factor: float, reach: float
) -> tuple[Point, Point]:
    x, y = story.at(factor)
    u, v = _direction(story, view)
    aside, rise = -v * reach * view.px_x, u * reach * view.px_y
    return ((x - aside, y - rise), (x + aside, y + rise))


def _beside_ray(
    story: DiagramStory, view: View, factor: float, reaches: Sequence[float]
) -> list[Place]:
    u, v = _direction(story, view)
    at = story.at(factor)
    return [
        Place(at, align, side * v * reach, side * u * reach)
        for reach in reaches
        for side, align in ((1, "left"), (-1, "right"))
    ]


def _around(at: Point, reach: float = 12) -> list[Place]:
    level = [Place(at, "left", reach, dy) for dy in (0, -16, 16)]
    level += [Place(at, "right", -reach, dy) for dy in (0, -16, 16)]
    return level + [Place(at, "center", 0, dy) for dy in (-2 * reach, 2 * reach)]


def _now(story: DiagramStory, view: View) -> list[Chart]:
    if not _within(view, story.now):
        return []
    ring = [] if story.ring is None else [_ellipse(story.now, story.ring)]
    layers = [path(view, points, ink.INK, 1.5) for points in ring]
    return [*layers, dots(view, [story.now], "circle", 260)]


def _put_now_words(story: DiagramStory, plan: Plan) -> None:
    if _within(plan.view, story.now):
        places = [*_around(story.now, 16), *_around(story.now, 30)]
        plan.put("now, at its worst", places, bold=True)
        return
    said = f"load ratio {story.n(story.now[0])}, toughness ratio {story.n(story.now[1])}"
    corner = (plan.view.x[1] - 8 * plan.view.px_x, plan.view.y[1])
    places = [Place(corner, "right", 0, dy) for dy in (22, 62, 102)]
    plan.put(["now, beyond this picture:", said], places, bold=True)


def _ellipse(middle: Point, half: Point) -> list[Point]:
    turns = [2 * pi * n / 72 for n in range(73)]
    return [(middle[0] + half[0] * cos(t), middle[1] + half[1] * sin(t)) for t in turns]


def _past_in(story: DiagramStory, view: View) -> list[tuple[Point, str]]:
    return [(point, year) for point, year in story.past if _within(view, point)]


def _put_region_words(story: DiagramStory, plan: Plan) -> None:
    view = plan.view
    far = (view.x[1] - 8 * view.px_x, view.y[0])
    inside = [
        Place((part * story.curve[-1][0], rise), "center")
        for rise in (0.12, 0.3, 0.5, 0.7)
        for part in (0.3, 0.6, 0.8)
    ]
    run = [
        Place((view.x[0] + across * view.px_x, view.y[1]), "left", 0, dy)
        for across in (10, 90, 170)
        for dy in (16, 40)
    ]
    run += [Place((far[0], view.y[1]), "right", 0, dy) for dy in (70, 94)]
    give = [Place(far, "right", 0, -dy) for dy in (24, 54, 84, 114)]
    plan.put("runs suddenly", run)
    plan.put(["gives way by", "stretching"], give)
    plan.put("holds", inside, bold=True)


def _within(view: View, point: Point) -> bool:
    return view.x[0] <= point[0] <= view.x[1] and view.y[0] <= point[1] <= view.y[1]
