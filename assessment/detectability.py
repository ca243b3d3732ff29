"""Rule 3: how long a crack that the last method could have missed would live.

The size found with 90 % at 95 % confidence could be missed. A surface method's is a length, which
two front shapes turn into a depth: the shape of this crack, and a round front; likewise the other
way. The worse is taken.
"""

import numpy as np

from assessment.corners import sizes_to_corner
from assessment.document import Case
from assessment.estimate import Look
from assessment.interval import FromMissed
from assessment.lifetime import life
from assessment.validity import Floats


def from_missed(case: Case, look: Look) -> FromMissed:
    """The shortest bounding life from the size that the last method could miss."""
    detection, kind = case.detection, case.crack.kind
    if detection is None:
        return FromMissed(None, "detection.a90_95_mm is missing")
    sizes = _sizes(case)
    if not sizes:
        return FromMissed(None, f"a crack of kind {kind.name!r} has no {detection.dimension}")
    lives = []
    for depth, length in sizes:
        corner = sizes_to_corner(kind, case.body, depth, length)
        if corner.broken is not None:
            return FromMissed(0.0, None)
        found = life(look, corner)
        if found.usage is None:
            # One shape that does not grow is no reason to leave out the other.
            lives.append((np.inf, found.why))
        else:
            lives.append((found.usage, None))
    usage, why = min(lives, key=lambda pair: pair[0])
    return FromMissed(None, why) if not np.isfinite(usage) else FromMissed(float(usage), None)


def _sizes(case: Case) -> list[tuple[float | None, float | None]]:
    """Depth and length of what could be missed, in each front shape."""
    detection, crack = case.detection, case.crack
    if detection is None:
        return []
    size, by_length = detection.a90_95, detection.dimension == "length"
    if crack.depth is None and crack.length is None:
        return []
    if crack.depth is None:
        return [(None, size)] if by_length else []
    if crack.length is None:
        return [] if by_length else [(size, None)]
    ratios = {crack.depth / crack.length, _round(case)}
    return [(ratio * size, size) if by_length else (size, size / ratio) for ratio in sorted(ratios)]


def _round(case: Case) -> float:
    """Depth over length of a round front: equal front variables."""
    x: Floats = np.asarray(case.crack.kind.front(1.0, 1.0, case.body), dtype=float)
    return float(x[1] / x[0])
