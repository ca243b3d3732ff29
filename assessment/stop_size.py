"""The size at or beyond which the verdict would be withdraw, or repair before return to service.

It travels to the tablets, where it is compared with a size just typed. So it must never be too
large, and "beyond" must hold: the first size of a scan that stops is taken, and everything past it
counts as stop, also where a later size would be judged more easily. A size that leaves the range
of a relation stops as well, because nothing can be said of it, and one that goes through the wall.

The scan goes along a shape (depth to length). For the known crack that is its present shape; for a
new crack several shapes are scanned and the smallest depth and the smallest length of them are
given, each standing alone.

Strength is judged by the limit function of the bounding look. Whether a day (or, at a reduced load,
the shortest interval) is left is judged without a growth computation, by a bound: growth at the
speed that the crack would have at the end of that time, which is never slower than it truly grows
while its speed rises. Where that errs, the stop size comes out smaller.
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any

import numpy as np
from numpy.typing import NDArray

from assessment.corners import Corner, corners, sizes_to_corner
from assessment.document.case import Case, Crack
from assessment.estimate import Look
from assessment.growth import rates
from assessment.interval import rate
from assessment.lifetime import blocks_for, margin
from assessment.restriction import least_factor
from assessment.validity import Floats

Stops = Callable[[float | None, float | None], bool]
"""(depth, length) in m → whether a crack of that size is a stop."""

# Half-circle, and two longer fronts. Common practice, no source: what is found at a surface lies
# between these.
NEW_SHAPES = (1.0, 0.4, 0.2)
_GROWTH = 1.3
_MOST_STEPS = 80
_HALVINGS = 10


@dataclass(frozen=True)
class StopSize:
    """Depth and length in m, each alone a stop; None where the kind has no such size."""

    depth: float | None
    length: float | None


@dataclass(frozen=True)
class StopSizes:
    """Of the known crack and of a new one; ``why_not`` where there are none."""

    known: StopSize | None = None
    new: StopSize | None = None
    why_not: str | None = None


def stop_sizes(case: Case, look: Look, lacks: Sequence[str], outside: bool) -> StopSizes:
    """The stop sizes under the bounding look.

    lacks : keys that it needs and are missing; outside : today's size is outside a range
    """
    crack, per_day = case.crack, rate(case.usage)
    if lacks:
        return StopSizes(why_not=f"what it needs is missing: {', '.join(lacks)}")
    if outside:
        return StopSizes(why_not="today's bounding size is outside a published range")
    if crack.sizing is None:
        return StopSizes(why_not="crack.sizing, the error of a measurement here, is missing")
    if per_day is None or case.criteria.life_factor is None:
        return StopSizes(why_not="usage.per_day or criteria.life_factor is missing")
    stops = _stops(case, look, per_day.per_day * case.criteria.life_factor)
    known = None
    if crack.found:
        smallest = 0.02 if stops(crack.depth, crack.length) else 1.0
        known = first_stop(stops, crack.depth, crack.length, smallest)
    new = smallest_of([first_stop(stops, *size, 1.0) for size in _new_shapes(crack, case.body)])
    why_not = "no size that stops was met" if known is None and new is None else None
    return StopSizes(known, new, why_not)


def _stops(case: Case, look: Look, day: float) -> Stops:
    """``day`` : usage of one day times the factor on life."""
    crack = case.crack
    deviations = case.criteria.size_confidence_sd or 0.0
    restricted = case.owner.allows_restriction
    least, shortest = least_factor(case)[0], case.criteria.shortest_interval_days or 0.0
    reduced = look.at_load(least, case.loading.cycles_fall)

    def stops(depth: float | None, length: float | None) -> bool:
        measured = sizes_to_corner(crack.kind, case.body, depth, length)
        if measured.became or measured.broken is not None:
            return True
        sizes = corners(replace(crack, depth=depth, length=length), case.body, deviations)
        if holds(look, sizes):
            return not lasts(look, sizes, day)
        if not restricted or not holds(replace(look, reserve=1.0), sizes):
            return True
        enough = day * max(1.0, shortest)
        return not (holds(reduced, sizes) and lasts(reduced, sizes, enough))

    return stops


def holds(look: Look, sizes: Sequence[Corner]) -> bool:
    """Every corner is unbroken and has the reserve of the look, and the largest is in range.

    Another corner may be out of range only because a small crack with a large sizing error may be
    narrower than any front in the tables. That refers the case; it is no stop.
    """
    if any(corner.broken is not None for corner in sizes):
        return False
    largest = sizes[0]
    inside = bool(np.all(largest.kind.inside(largest.x, largest.body)))
    return inside and all(_stands(look, corner, x) for corner, x in _together(sizes))


def lasts(look: Look, sizes: Sequence[Corner], usage: float) -> bool:
    """Every corner still holds after ``usage``, by the bound that the module's text gives."""
    if not look.cycles:
        return True
    return all(_still_stands(look, corner, x, usage) for corner, x in _together(sizes))


def _together(sizes: Sequence[Corner]) -> list[tuple[Corner, Floats]]:
    """Corners of one kind and body with their fronts side by side."""
    groups: dict[tuple[str, bool], list[Corner]] = {}
    for corner in sizes:
        groups.setdefault((corner.kind.name, corner.became), []).append(corner)
    return [(of[0], np.stack([one.x for one in of], axis=1)) for of in groups.values()]


def _stands(look: Look, corner: Corner, x: Floats) -> bool:
    with np.errstate(all="ignore"):
        return bool(np.all(_outside(corner, x) | (margin(look, corner, x) > 0.0)))


def _outside(corner: Corner, x: Floats) -> NDArray[np.bool_]:
    return np.asarray(~np.broadcast_to(corner.kind.inside(x, corner.body), x.shape[1:]))


def _still_stands(look: Look, corner: Corner, start: Floats, usage: float) -> bool:
    kind, body, blocks = corner.kind, corner.body, blocks_for(look, corner)
    x = start
    for _ in range(2):
        with np.errstate(all="ignore"):
            x = start + usage * np.asarray(rates(kind, x, body, look.growth, blocks))
        if not bool(np.all(np.isfinite(x))) or not bool(np.all(kind.wall(x, body) > 0.0)):
            return False
    left_range = bool(np.any(_outside(corner, x) & ~_outside(corner, start)))
    return not left_range and _stands(look, corner, x)


def first_stop(
    stops: Stops, depth: float | None, length: float | None, smallest: float
) -> StopSize | None:
    """The first size along one shape that stops, from ``smallest`` (a factor on the size) up, to
    within a part in three thousand on the small side. None where the scan meets no stop."""

    def at(factor: float) -> tuple[float | None, float | None]:
        return (
            None if depth is None else factor * depth,
            None if length is None else factor * length,
        )

    before, factor = 0.0, smallest
    for _ in range(_MOST_STEPS):
        if stops(*at(factor)):
            break
        before, factor = factor, factor * _GROWTH
    else:
        return None
    for _ in range(_HALVINGS):
        middle = 0.5 * (before + factor)
        if stops(*at(middle)):
            factor = middle
        else:
            before = middle
    return StopSize(*at(before or factor))


def smallest_of(found: Sequence[StopSize | None]) -> StopSize | None:
    """The smallest depth and the smallest length of several scans; None where one met no stop."""
    sizes = [one for one in found if one is not None]
    if len(sizes) < len(found) or not sizes:
        return None
    depths = [one.depth for one in sizes if one.depth is not None]
    lengths = [one.length for one in sizes if one.length is not None]
    return StopSize(min(depths, default=None), min(lengths, default=None))


def _new_shapes(crack: Crack, body: Mapping[str, Any]) -> list[tuple[float | None, float | None]]:
    """Small cracks of the kind, from which the scan for a new crack starts."""
    small = 0.02 * min(value for value in body.values() if isinstance(value, float))
    sizes = crack.kind.sizes
    if "depth_mm" in sizes and "length_mm" in sizes:
        return [(small, 2.0 * small / shape) for shape in NEW_SHAPES]
    return [(small if "depth_mm" in sizes else None, small if "length_mm" in sizes else None)]
