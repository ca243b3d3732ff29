"""How fast each point of the front grows, per unit of usage.

ΔK is the part of the cycle that opens the crack: K_max − max(K_min, 0), the definition of ASTM
E647 (3.2, crack-tip stress intensity range; K_min is taken as nil for negative stress ratios). A
cycle whose K_max is not positive does not grow the crack. This holds where residual stress is
nil; an as-welded crack sees the full range, and is referred until that is computed.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind
from assessment.validity import Floats

from .laws import GrowthLaw
from .loads import CycleBlock


@dataclass(frozen=True)
class Drive:
    """Cycle blocks as arrays over (blocks, loads): the loads at the two ends of each cycle."""

    names: tuple[str, ...]
    upper: Floats
    lower: Floats
    per_usage: Floats
    residual: Floats


def drive_of(blocks: Sequence[CycleBlock]) -> Drive:
    held = blocks[0].residual
    names = tuple(dict.fromkeys(name for one in blocks for name in (*one.ranges, *one.residual)))
    ranges = np.array([[block.ranges.get(n, 0.0) for n in names] for block in blocks])
    upper = np.array([[_upper(block, n) for n in names] for block in blocks])
    per_usage = np.array([block.per_usage for block in blocks])
    residual = np.array([[held.get(n, 0.0) for n in names]])
    return Drive(names, upper, upper - ranges, per_usage, residual)


def _upper(block: CycleBlock, name: str) -> float:
    if block.stress_ratio is not None:
        return block.ranges.get(name, 0.0) / (1.0 - block.stress_ratio)
    return 0.0 if block.maxima is None else block.maxima.get(name, 0.0)


def k_by_load(kind: Kind, x: Floats, names: Sequence[str], body: Body) -> Floats:
    """K in MPa√m for 1 MPa of each load: shape (loads, points, samples). x : (points, samples)."""
    # The loads stand on an axis of their own, so that the geometry is worked out once for all.
    one_each = {name: row[:, None] for name, row in zip(names, np.eye(len(names)), strict=True)}
    return np.moveaxis(kind.stress_intensity(x, one_each, body), 1, 0)


def effective_ranges(drive: Drive, unit_k: Floats, law: GrowthLaw) -> Floats:
    """The law's effective range, shape (blocks, points, samples); nil where it stays shut."""
    first = _weighed(drive.upper, unit_k)
    second = _weighed(drive.lower, unit_k)
    if np.any(drive.residual != 0.0):
        # What presses the crack shut is not counted on (decisions: no credit where not proved).
        held = np.maximum(_weighed(drive.residual, unit_k), 0.0)
        first, second = first + held, second + held
    high = np.maximum(np.maximum(first, second), 0.0)
    low = np.maximum(np.minimum(first, second), 0.0)
    ratio = np.divide(low, high, out=np.zeros_like(low), where=high > 0.0)
    return law.effective(high - low, ratio)


def rates_from(
    drive: Drive, effective: Floats, law: GrowthLaw, growing: NDArray[np.bool_]
) -> Floats:
    """m per unit of usage at each point, summed over the blocks that grow it."""
    # The rate is evaluated where it counts only; elsewhere 1 stands in and is masked out.
    per_cycle = np.where(growing, law.rate_at(np.where(effective > 0.0, effective, 1.0)), 0.0)
    return _weighed(drive.per_usage, per_cycle)


def _weighed(weights: Floats, values: Floats) -> Floats:
    """Sum over the first axis of ``values``, for each row of ``weights``."""
    flat = weights @ values.reshape(len(values), -1)
    return np.asarray(flat.reshape(weights.shape[:-1] + values.shape[1:]))


def rates(
    kind: Kind, x: Floats, body: Body, law: GrowthLaw, blocks: Sequence[CycleBlock]
) -> Floats:
    """m per unit of usage at each point of the front, shape of x. x : (points, ...) in m."""
    x2, shape = _two_axes(x)
    drive = drive_of(blocks)
    effective = effective_ranges(drive, k_by_load(kind, x2, drive.names, body), law)
    found = rates_from(drive, effective, law, effective > law.threshold)
    return found.reshape(shape)


def _two_axes(x: Any) -> tuple[Floats, tuple[int, ...]]:
    array = np.asarray(x, dtype=float)
    return array.reshape(array.shape[0], -1), array.shape
