"""A find looked back at: grown backward to each earlier look that found nothing there.

The size it must have had then, by the mean growth, is shown and kept as a trial of the method that
missed it. Steps of fourth order in s as in ``assessment.forecast.paths``, taken backward.
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from assessment.corners import Corner
from assessment.estimate import Look
from assessment.growth import rates
from assessment.lifetime import blocks_for
from assessment.validity import Floats

_STEP = 0.05
_MOST = 400


@dataclass(frozen=True)
class Then:
    """before : usage before the find; depth, length in m, None where the kind has none

    note : None, or why the size is not known: below the threshold growth says nothing of the past
    """

    before: float
    depth: float | None
    length: float | None
    note: str | None


def looked_back(look: Look, corner: Corner, before: Sequence[float]) -> tuple[Then, ...]:
    """Sizes at so much usage before the size of ``corner``, each above nil.

    Raises ValueError for a usage that is not above nil.
    """
    if any(not usage > 0.0 for usage in before):
        raise ValueError("a look back goes to usage before the find")
    usages, fronts, stopped = _backward(look, corner, max(before, default=0.0))
    return tuple(_then(corner, usage, usages, fronts, stopped) for usage in before)


def _backward(look: Look, corner: Corner, most: float) -> tuple[Floats, Floats, bool]:
    """Usage before and front at each step; True where growth stopped explaining the size."""
    blocks = blocks_for(look, corner)

    def slope(x: Floats) -> tuple[Floats, float] | None:
        if not blocks or not np.all(x > 0.0):
            return None
        r = rates(corner.kind, x, corner.body, look.growth, blocks)
        v = float(np.sum(r / x))
        return (r / v, 1.0 / v) if np.isfinite(v) and v > 0.0 else None

    x, usage = corner.x.copy(), 0.0
    usages, fronts = [0.0], [x]
    for _ in range(_MOST):
        if usage >= most:
            return np.array(usages), np.array(fronts), False
        stages: list[tuple[Floats, float]] = []
        for share in (0.0, 0.5, 0.5, 1.0):
            at = x - share * _STEP * stages[-1][0] if stages else x
            found = slope(at)
            if found is None:
                return np.array(usages), np.array(fronts), True
            stages.append(found)
        weights = (1.0, 2.0, 2.0, 1.0)
        x = x - _STEP / 6.0 * sum(w * s[0] for w, s in zip(weights, stages, strict=True))
        usage += _STEP / 6.0 * sum(w * s[1] for w, s in zip(weights, stages, strict=True))
        usages.append(usage)
        fronts.append(x)
    return np.array(usages), np.array(fronts), True


def _then(corner: Corner, before: float, usages: Floats, fronts: Floats, stopped: bool) -> Then:
    if stopped and before > usages[-1]:
        return Then(
            before, None, None,
            "so long ago the crack was too small to grow by the mean law: its size is not known",
        )  # fmt: skip
    front = np.exp([np.interp(before, usages, row) for row in np.log(fronts).T])
    depth, length = corner.kind.sizes_of(front, corner.body)
    return Then(
        before,
        None if depth is None else float(depth),
        None if length is None else float(length),
        None,
    )
