"""How fast each point of the front grows, per unit of usage.

ΔK is the part of the cycle that opens the crack: K_max − max(K_min, 0), the definition of ASTM
E647 (3.2, crack-tip stress intensity range; K_min is taken as nil for negative stress ratios). A
cycle whose K_max is not positive does not grow the crack. Residual stress moves both ends of the
cycle, so that an as-welded crack sees the full range at a high stress ratio. A law that has its own
closure function takes the whole range with its sign.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind
from assessment.validity import Floats

from .laws import GrowthLaw, threshold_at
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


def effective_ranges(
    drive: Drive, unit_k: Floats, law: GrowthLaw, factor: Floats | float = 1.0
) -> tuple[Floats, Floats]:
    """The law's effective range and the stress ratio, each of shape (blocks, points, samples); the
    range is nil where the crack stays shut. factor : on the cyclic loads, not on residual stress,
    a number or one for each sample"""
    first = _weighed(drive.upper, unit_k) * factor
    second = _weighed(drive.lower, unit_k) * factor
    if np.any(drive.residual != 0.0):
        # What presses the crack shut is not counted on (decisions: no credit where not proved).
        held = np.maximum(_weighed(drive.residual, unit_k), 0.0)
        first, second = first + held, second + held
    high = np.maximum(np.maximum(first, second), 0.0)
    low = np.minimum(first, second)
    low = np.where(high > 0.0, low, 0.0) if law.signed else np.maximum(low, 0.0)
    ratio = np.divide(low, high, out=np.zeros_like(low), where=high > 0.0)
    return law.effective(high - low, ratio), ratio


def grows(effective: Floats, ratio: Floats, law: GrowthLaw) -> NDArray[np.bool_]:
    """Which block grows which point: above the threshold at its stress ratio."""
    return np.asarray(effective > threshold_at(law, ratio))


def unstable(effective: Floats, ratio: Floats, law: GrowthLaw) -> NDArray[np.bool_]:
    """True per sample where the largest K of some cycle has reached the law's K_c."""
    k_c = getattr(law, "k_c", None)
    if k_c is None:
        return np.zeros(effective.shape[-1], dtype=bool)
    return np.asarray(np.any(effective / (1.0 - ratio) >= k_c, axis=(0, 1)))


def rates_from(
    drive: Drive,
    effective: Floats,
    ratio: Floats,
    law: GrowthLaw,
    growing: NDArray[np.bool_],
) -> Floats:
    """m per unit of usage at each point, summed over the blocks that grow it."""
    # The rate is evaluated where it counts only; elsewhere 1 stands in and is masked out.
    rate = law.rate_at(np.where(effective > 0.0, effective, 1.0), ratio)
    return _weighed(drive.per_usage, np.where(growing, rate, 0.0))


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
    effective, ratio = effective_ranges(drive, k_by_load(kind, x2, drive.names, body), law)
    found = rates_from(drive, effective, ratio, law, grows(effective, ratio, law))
    return found.reshape(shape)


def _two_axes(x: Any) -> tuple[Floats, tuple[int, ...]]:
    array = np.asarray(x, dtype=float)
    return array.reshape(array.shape[0], -1), array.shape
