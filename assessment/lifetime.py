"""From a size on: how it grows now, how long it lives, and at which size it fails."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from assessment.corners import Corner
from assessment.estimate import (
    TOUGHNESS_ALONE_BELOW,
    Estimate,
    Look,
    arrays,
    estimate,
    loads_for,
)
from assessment.failure import FULL_BELOW, limit, lr_max, ratios
from assessment.growth import CycleBlock, Growth, cycles_per_usage, grow, rates
from assessment.kinds.base import Kind
from assessment.validity import Floats

PATH_POINTS = 200
_SCAN_POINTS = 400
_HALVINGS = 50


@dataclass(frozen=True)
class LifeFound:
    """Life from the last look.

    cycles, usage : None where there is none to state; ``why`` then says so
    ends_by : "fracture", "collapse", "reserve on load", "break-through" or "out of range"
    path : (usage, depth in mm or None, length in mm or None), at most 200 points
    end : front variables at the end, m
    """

    cycles: float | None = None
    usage: float | None = None
    ends_by: str | None = None
    path: tuple[tuple[float, float | None, float | None], ...] = ()
    why: str | None = None
    converged: bool = True
    end: Floats | None = None


@dataclass(frozen=True)
class Critical:
    """The first failing size on the way, in m, and the stress at which the present size fails."""

    depth: float | None
    length: float | None
    stress: float | None
    cause: str | None
    why: str | None = None


def blocks_for(look: Look, corner: Corner) -> tuple[CycleBlock, ...]:
    """The cycles as the corner's kind takes them."""
    return tuple(
        CycleBlock(
            ranges=loads_for(corner, block.ranges),
            stress_ratio=block.stress_ratio,
            maxima=None if block.maxima is None else loads_for(corner, block.maxima),
            per_usage=block.per_usage,
            residual=loads_for(corner, look.residual) if look.residual else {},
        )
        for block in look.cycles
    )


def margin(look: Look, corner: Corner, x: Floats) -> Floats:
    """Above nil where the reserve on load exceeds the one at which life ends.

    The point is taken at ``look.reserve`` times the peak load and compared with the limit, which
    has the same sign as reserve − look.reserve and needs no root. x : (front variables, samples).
    """
    if not look.residual:
        return _margin_at(look, corner, x, look.reserve)
    # On the way to the full load ρ is largest where it starts to fall, so both are looked at.
    loads = arrays(loads_for(corner, look.peak))
    lr = corner.kind.reference_stress(x, loads, corner.body) / look.material.yield_strength
    with np.errstate(divide="ignore"):
        knee = np.where(lr > 0.0, np.minimum(FULL_BELOW / lr, look.reserve), look.reserve)
    at_full, at_knee = (_margin_at(look, corner, x, f) for f in (look.reserve, knee))
    return np.minimum(at_full, at_knee)


def _margin_at(look: Look, corner: Corner, x: Floats, factor: Floats | float) -> Floats:
    """Limit less what acts, at so many times the peak load."""
    material = look.material
    loads = arrays(loads_for(corner, look.peak))
    held = arrays(loads_for(corner, look.residual)) if look.residual else {}
    found = ratios(corner.kind, x, loads, corner.body, material, look.toughness, held)
    ratio, lr = found.load_ratio, factor * found.load_ratio
    cut_off = lr_max(material.yield_strength, material.ultimate_strength)
    kr = found.toughness_ratio(factor, False)
    alone = np.minimum(1.0 - kr, 1.0 - lr / cut_off)
    low = look.fracture == "toughness"
    if low and not look.decides:
        return alone
    if not look.has_diagram:
        return np.minimum(alone, TOUGHNESS_ALONE_BELOW - ratio) if look.decides else alone
    drawn = np.where(
        np.isnan(lr), np.nan, limit(lr, material) - found.toughness_ratio(factor, True)
    )
    return np.where(ratio < TOUGHNESS_ALONE_BELOW, alone, drawn) if low else drawn


def lives(look: Look, sizes: Sequence[Corner]) -> list[LifeFound]:
    """The life of each size, which are all of one kind and body and so grow together. Only the
    first has a path."""
    if not look.cycles:
        return [LifeFound(why="no cycles are given, so the crack does not grow")] * len(sizes)
    first = sizes[0]
    blocks = blocks_for(look, first)
    grown = grow(
        first.kind,
        np.stack([corner.x for corner in sizes], axis=1),
        first.body,
        look.growth,
        blocks,
        lambda x: margin(look, first, x),
    )
    return [_life(look, corner, grown, index) for index, corner in enumerate(sizes)]


def life(look: Look, corner: Corner) -> LifeFound:
    """The life of one size, with its path."""
    return lives(look, (corner,))[0]


def _life(look: Look, corner: Corner, grown: Growth, index: int) -> LifeFound:
    end, usage = grown.end_words(index), float(grown.usage[index])
    path = _path(corner, grown) if index == 0 else ()
    if end == "no growth":
        return LifeFound(path=path, why=_no_growth(usage))
    if end == "not converged" or not np.isfinite(usage):
        why = "the growth computation did not come to an end in the steps allowed"
        return LifeFound(path=path, why=why, converged=False)
    if end == "out of range" and usage == 0.0:
        return LifeFound(why="the size is outside a published range: growth is not computed")
    x = grown.x[:, index]
    if end == "failed":
        end = _cause(look, corner, x)
    cycles = usage * cycles_per_usage(look.cycles)
    return LifeFound(cycles, usage, end, path, end=x)


def _no_growth(usage: float) -> str:
    if usage > 0.0:
        return (
            f"the crack stops growing after {usage:.6g} of usage: no cycle is above the threshold"
        )
    return "the crack does not grow: no cycle is above the threshold"


def _cause(look: Look, corner: Corner, x: Floats) -> str:
    if look.reserve > 1.0:
        return "reserve on load"
    there = Corner(corner.kind, corner.body, corner.depth, corner.length, x)
    return estimate(look, there).point.cause or "fracture"


def _path(corner: Corner, grown: Growth) -> tuple[tuple[float, float | None, float | None], ...]:
    count = len(grown.path_usage)
    step = max(1, -(-(count - 1) // (PATH_POINTS - 1)))
    kept = sorted({*range(0, count, step), count - 1})[: PATH_POINTS - 1] + [count - 1]
    rows = []
    for index in dict.fromkeys(kept):
        usage, x = float(grown.path_usage[index]), grown.path_x[:, index]
        if np.isfinite(usage) and bool(np.all(np.isfinite(x))):
            rows.append((usage, *sizes_in_mm(corner, x)))
    return tuple(rows)


def sizes_in_mm(corner: Corner, x: Floats) -> tuple[float | None, float | None]:
    """Depth and length of a front, in mm."""
    depth, length = corner.kind.sizes_of(x, corner.body)
    return (
        None if depth is None else 1e3 * float(depth),
        None if length is None else 1e3 * float(length),
    )


def growth_now(look: Look, corner: Corner) -> dict[str, float | None]:
    """Growth of depth and length per unit of usage at the present size, in mm."""
    if not look.cycles:
        return {"depth_mm_per_usage": 0.0, "length_mm_per_usage": 0.0}
    speed = rates(corner.kind, corner.x, corner.body, look.growth, blocks_for(look, corner))
    now = sizes_in_mm(corner, corner.x)
    # Sizes are sums of front variables, so growing the front by its speed shows theirs.
    grown = sizes_in_mm(corner, corner.x + np.asarray(speed))
    found = [
        None if a is None or b is None or not np.isfinite(b - a) else b - a
        for a, b in zip(now, grown, strict=True)
    ]
    return {"depth_mm_per_usage": found[0], "length_mm_per_usage": found[1]}


def critical(look: Look, one: Estimate, lived: LifeFound) -> Critical:
    """The first failing size met when the crack grows; along its present shape where it does not
    grow."""
    corner = one.corner
    stress = _failing_stress(look, one)
    if lived.end is not None:
        depth, length = sizes_in_mm(corner, lived.end)
        return Critical(_m(depth), _m(length), stress, lived.ends_by)
    x = _first_failing(look, corner)
    if x is None:
        return Critical(None, None, stress, None, "no failing size inside the published range")
    depth, length = sizes_in_mm(corner, x)
    cause = _cause(look, corner, x)
    if not bool(np.all(np.atleast_1d(corner.kind.wall(x, corner.body)) > 0.0)):
        cause = "break-through"
    return Critical(_m(depth), _m(length), stress, cause)


def _m(size: float | None) -> float | None:
    return None if size is None else 1e-3 * size


def _failing_stress(look: Look, one: Estimate) -> float | None:
    loads = arrays(loads_for(one.corner, look.peak))
    nominal = one.corner.kind.nominal_stress(loads, one.corner.body)
    reserve = one.point.reserve
    return None if nominal is None or reserve is None else float(nominal) * reserve


def _first_failing(look: Look, corner: Corner) -> Floats | None:
    """Scan along the present shape up to the wall, then halve: K need not rise with size."""
    kind, body = corner.kind, corner.body
    room = np.atleast_1d(kind.wall(corner.x, body))
    most = float(np.min((corner.x + room) / corner.x))
    if not most > 1.0:
        return corner.x
    scale = np.linspace(1.0, most, _SCAN_POINTS)
    x = corner.x[:, None] * scale
    inside = np.broadcast_to(kind.inside(x, body), scale.shape)
    fails = _fails(look, corner, kind, x) & inside
    if not bool(np.any(fails)):
        return None
    first = int(np.argmax(fails))
    low, high = scale[max(first - 1, 0)], scale[first]
    for _ in range(_HALVINGS if first else 0):
        middle = 0.5 * (low + high)
        if bool(_fails(look, corner, kind, corner.x[:, None] * middle)[0]):
            high = middle
        else:
            low = middle
    return np.asarray(corner.x * high)


def _fails(look: Look, corner: Corner, kind: Kind, x: Floats) -> NDArray[np.bool_]:
    broken = np.min(np.atleast_2d(kind.wall(x, corner.body)), axis=0) <= 0.0
    with np.errstate(all="ignore"):
        return np.asarray(broken | (margin(look, corner, x) <= 0.0))
