"""Leak before break: whether the crack that breaks through first leaks, and then holds.

Break-through of a pressure boundary ends the life all the same. It is called leak before break
only where the owner says that a leak is detected and tolerated, and where the through crack that
it becomes is stable with the demanded reserve; otherwise break-through comes first.
"""

from dataclasses import dataclass

import numpy as np

from assessment.corners import Corner
from assessment.document.case import Case
from assessment.estimate import Look, estimate
from assessment.kinds import KINDS
from assessment.lifetime import LifeFound

# A published range that stops short of the far wall stops the growth there; what would break
# through then is at least as long as the crack at that size.
ENDS = ("break-through", "out of range")


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
    name, _, length, body = to(lived.end, corner.body)
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
