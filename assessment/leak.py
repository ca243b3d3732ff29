"""Pressure boundaries: what a crack through one means, and whether a crack leaks before it breaks.

Break-through of a pressure boundary ends the life. Where no leak is tolerated, a crack that is
through is withdrawn. It is called leak before break only where the owner says that a leak is
detected and tolerated, and where the through crack that it becomes is stable with the demanded
reserve; otherwise break-through comes first.

The published ranges stop short of the far wall, and growth with them. From there on the ligament
is taken to give way at once, and each end of the crack to run by as much as the ligament, or by
more in the measure in which the ends grow faster than the depth there: an assumption, no source.
"""

from dataclasses import dataclass

import numpy as np

from assessment.corners import Corner
from assessment.document.case import Case
from assessment.estimate import Look, estimate
from assessment.growth import rates
from assessment.kinds import KINDS
from assessment.lifetime import LifeFound, blocks_for
from assessment.validity import Floats

ENDS = ("break-through", "out of range")
THROUGH_NOW = "The crack goes through a pressure boundary, and no leak is tolerated here."


def leaks_now(case: Case, corner: Corner) -> bool:
    """A measured crack through the wall of what holds pressure, where no leak is tolerated."""
    holds_pressure = bool(case.loading.peak.get("pressure"))
    through = corner.kind.through and case.crack.found
    return through and holds_pressure and not case.owner.leak_tolerated


@dataclass(frozen=True)
class Leak:
    """holds : it leaks before it breaks; reserve of the through crack, None where not known."""

    holds: bool
    reserve: float | None
    length: float | None
    words: str


def leak_before_break(case: Case, look: Look, corner: Corner, lived: LifeFound) -> Leak | None:
    """None for a kind that is no pressure boundary, or where something else ends the life."""
    to = corner.kind.leaks_to
    if to is None or lived.ends_by not in ENDS:
        return None
    if not case.owner.leak_tolerated:
        return Leak(False, None, None, "Break-through comes first: no leak is tolerated here.")
    if lived.end is None:
        return Leak(False, None, None, "Break-through comes first: the crack is through today.")
    name, _, length, body = to(_run_through(look, corner, lived.end), corner.body)
    kind = KINDS[name]
    x = np.asarray(kind.front(None, length, body), dtype=float)
    through = estimate(look, Corner(kind, body, None, length, x))
    reserve, size = through.point.reserve, f"{length * 1e3:.4g} mm"
    if through.marks or reserve is None:
        why = " ".join(mark.sentence() for mark in through.marks)
        return Leak(
            False, reserve, length, f"Break-through comes first: whether a through crack of {size} "
            f"holds is not known. {why}".strip(),
        )  # fmt: skip
    if reserve < look.reserve:
        return Leak(
            False, reserve, length,
            f"Break-through comes first: the through crack of {size} would have a reserve on load "
            f"of {reserve:.3g}, below the {look.reserve:g} demanded.",
        )  # fmt: skip
    return Leak(
        True, reserve, length,
        f"Leak before break: the through crack of {size} would have a reserve on load of "
        f"{reserve:.3g}. The leak must be found and the part taken out of use at once.",
    )  # fmt: skip


def _run_through(look: Look, corner: Corner, x: Floats) -> Floats:
    """The front once the ligament is gone, from the last size inside the published range."""
    left = max(float(np.ravel(corner.kind.wall(x, corner.body))[0]), 0.0)
    if left == 0.0 or not look.cycles:
        return x
    deep, end = np.ravel(rates(corner.kind, x, corner.body, look.growth, blocks_for(look, corner)))[
        :2
    ]
    faster = max(1.0, float(end / deep)) if deep > 0.0 else 1.0
    return np.asarray([float(x[0]) + left, float(x[1]) + left * faster])
