"""Where words can stand in a figure without covering what is drawn."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import pairwise

from . import ink
from .drawing import Chart
from .layers import LINE, Point, View, boxes, many_words, text_width


@dataclass(frozen=True)
class Rect:
    """In px, from the view's bottom left."""

    left: float
    bottom: float
    right: float
    top: float

    def covers(self, other: "Rect") -> float:
        """The area that both share, px²."""
        wide = min(self.right, other.right) - max(self.left, other.left)
        tall = min(self.top, other.top) - max(self.bottom, other.bottom)
        return max(wide, 0.0) * max(tall, 0.0)


@dataclass(frozen=True)
class Place:
    """A place for words: an anchor in data units, the side they run to, and an offset in px."""

    at: Point
    align: str
    dx: float = 0
    dy: float = 0


class Plan:
    """What is taken in a view; words go to the first place that is free, or the least taken."""

    def __init__(self, view: View) -> None:
        self.view = view
        self.taken: list[Rect] = []
        self._put: list[tuple[Rect, Place, tuple[str, ...], str]] = []

    def px(self, at: Point) -> Point:
        return (
            (at[0] - self.view.x[0]) / self.view.px_x,
            (at[1] - self.view.y[0]) / self.view.px_y,
        )

    def take_point(self, at: Point, reach: float = 7) -> None:
        x, y = self.px(at)
        self.taken.append(Rect(x - reach, y - reach, x + reach, y + reach))

    def take_line(self, points: Iterable[Point], reach: float = 3) -> None:
        """A line by the points along it, six px apart at most; what leaves the view takes nothing,
        however far it runs."""
        spots = [self.px(point) for point in points]
        for start, end in pairwise(spots):
            inside = self._within(start, end)
            if inside is None:
                continue
            (x1, y1), (x2, y2) = inside
            parts = max(1, round(max(abs(x2 - x1), abs(y2 - y1)) / 6))
            for n in range(parts + 1):
                x, y = x1 + (x2 - x1) * n / parts, y1 + (y2 - y1) * n / parts
                self.taken.append(Rect(x - reach, y - reach, x + reach, y + reach))

    def _within(self, start: Point, end: Point) -> tuple[Point, Point] | None:
        """The part of a straight line that lies in the view, by its fractions at the four edges."""
        first, last = 0.0, 1.0
        for a, b, most in (
            (start[0], end[0], self.view.width),
            (start[1], end[1], self.view.height),
        ):
            if a == b:
                if not 0 <= a <= most:
                    return None
                continue
            near, far = sorted(((0 - a) / (b - a), (most - a) / (b - a)))
            first, last = max(first, near), min(last, far)
        if first > last:
            return None
        run = (end[0] - start[0], end[1] - start[1])
        return (
            (start[0] + first * run[0], start[1] + first * run[1]),
            (start[0] + last * run[0], start[1] + last * run[1]),
        )

    def put(
        self, text: str | Sequence[str], places: Sequence[Place], *, bold: bool = False
    ) -> None:
        """The words on a plate, at the best of the places; that ground is then taken."""
        lines = (text,) if isinstance(text, str) else tuple(text)
        wide = max(text_width(line, bold) for line in lines) + 8
        tall = float(LINE * len(lines) + 2)
        best = min(places, key=lambda place: self._cost(self._rect(place, wide, tall)))
        rect = self._rect(best, wide, tall)
        self.taken.append(rect)
        self._put.append((rect, best, lines, "bold" if bold else "normal"))

    def plates(self) -> list[Chart]:
        """In the sheet's colour: they lie over hatch and under every stroke."""
        corners = [
            (self._data(rect.left, rect.bottom), self._data(rect.right, rect.top))
            for rect, *_ in self._put
        ]
        return [boxes(self.view, corners, ink.SHEET)] if corners else []

    def words(self) -> list[Chart]:
        """They lie over all; one layer for all words of a kind, since each layer takes time."""
        kinds: dict[tuple[str, str], list[tuple[Point, tuple[str, ...]]]] = {}
        for rect, place, lines, weight in self._put:
            x = {"left": rect.left + 4, "right": rect.right - 4}.get(
                place.align, (rect.left + rect.right) / 2
            )
            # Several lines hang from the first one's middle.
            at = self._data(x, rect.top - 1 - LINE / 2)
            kinds.setdefault((place.align, weight), []).append((at, lines))
        return [
            many_words(self.view, put, align=align, fontWeight=weight)
            for (align, weight), put in kinds.items()
        ]

    def _data(self, x: float, y: float) -> Point:
        return (self.view.x[0] + x * self.view.px_x, self.view.y[0] + y * self.view.px_y)

    def _rect(self, place: Place, wide: float, tall: float) -> Rect:
        x, y = self.px(place.at)
        x, y = x + place.dx, y - place.dy
        left = {"left": x - 4, "center": x - wide / 2, "right": x - wide + 4}[place.align]
        return Rect(left, y - tall / 2, left + wide, y + tall / 2)

    def _cost(self, rect: Rect) -> float:
        covered = sum(rect.covers(other) for other in self.taken)
        outside = (
            max(0.0, -rect.left)
            + max(0.0, rect.right - self.view.width)
            + max(0.0, -rect.bottom)
            + max(0.0, rect.top - self.view.height)
        )
        return covered + 100 * outside
