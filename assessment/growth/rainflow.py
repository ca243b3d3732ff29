"""Cycles out of a stress history: rainflow counting of ASTM E1049.

Which load came before which is forgotten: no credit is taken for an overload that slows a crack.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from assessment.validity import Validity

RAINFLOW = Validity(
    relation="rainflow counting of a stress history",
    source="ASTM E1049-85 (2017), 5.4.4 rainflow counting, and 5.4.5 simplified for a history that "
    "repeats",
    accuracy="exact counting; the order of the loads is lost",
    ranges=(),
    witness="the worked example of the standard (from memory); counting properties",
    tests=("tests/assessment/growth/test_rainflow.py",),
)


@dataclass(frozen=True)
class Counted:
    """count : 1 for a whole cycle, 0.5 for half of one; low and high in the unit of the history"""

    low: float
    high: float
    count: float

    @property
    def swing(self) -> float:
        return self.high - self.low


def reversals(history: Sequence[float]) -> list[float]:
    """First value, every turning point, last value; equal neighbours count once."""
    points: list[float] = []
    for value in history:
        if points and value == points[-1]:
            continue
        if len(points) > 1 and (points[-1] - points[-2]) * (value - points[-1]) > 0.0:
            points[-1] = value
        else:
            points.append(value)
    return points


def count(history: Sequence[float]) -> list[Counted]:
    """Counting of a history that happens once (5.4.4): what never closes is half a cycle."""
    found: list[Counted] = []
    stack: list[float] = []
    for point in reversals(history):
        stack.append(point)
        while len(stack) >= 3:
            newest, before = abs(stack[-1] - stack[-2]), abs(stack[-2] - stack[-3])
            if newest < before:
                break
            if len(stack) == 3:
                found.append(_cycle(stack[0], stack[1], 0.5))
                del stack[0]
            else:
                found.append(_cycle(stack[-3], stack[-2], 1.0))
                del stack[-3:-1]
    found.extend(_cycle(a, b, 0.5) for a, b in zip(stack, stack[1:], strict=False))
    return found


def count_repeating(history: Sequence[float]) -> list[Counted]:
    """The same for a history that comes again and again (5.4.5): started at its largest value in
    magnitude, every cycle closes."""
    points = reversals(history)
    if len(points) < 2:
        return []
    start = max(range(len(points)), key=lambda i: abs(points[i]))
    turned = [*points[start:], *points[:start], points[start]]
    counted = count(turned)
    # Only the outermost pair is left as two halves: together one whole cycle.
    whole = [one for one in counted if one.count == 1.0]
    halves = sorted((one.low, one.high) for one in counted if one.count == 0.5)
    for first, second in zip(halves[::2], halves[1::2], strict=True):
        whole.append(_cycle(min(first[0], second[0]), max(first[1], second[1]), 1.0))
    return whole


def gathered(cycles: Iterable[Counted], most: int) -> list[Counted]:
    """At most so many kinds of cycle. Cycles alike are one; where there are too many, neighbours in
    size go together under the widest of them, which is the severe side."""
    alike: dict[tuple[float, float], float] = {}
    for one in cycles:
        alike[one.low, one.high] = alike.get((one.low, one.high), 0.0) + one.count
    rows = sorted((high - low, low, high, n) for (low, high), n in alike.items())
    if len(rows) <= most:
        return [Counted(low, high, n) for _, low, high, n in rows]
    each = -(-len(rows) // most)
    bins = [rows[i : i + each] for i in range(0, len(rows), each)]
    return [_together(part) for part in bins]


def _together(part: Sequence[tuple[float, float, float, float]]) -> Counted:
    """The widest swing with the highest top: no less severe than any of them."""
    widest = max(swing for swing, *_ in part)
    high = max(top for _, _, top, _ in part)
    return Counted(high - widest, high, sum(n for *_, n in part))


def _cycle(a: float, b: float, n: float) -> Counted:
    return Counted(min(a, b), max(a, b), n)
