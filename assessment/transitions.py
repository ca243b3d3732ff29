"""What a crack becomes on its way: through the wall, out to the edge, and on to the end.

The life that decides ends at break-through. What follows is shown beside it and never lengthens
it: how long the through crack that it becomes would still hold, step by step.
"""

from dataclasses import dataclass

from assessment.corners import Corner, sizes_to_corner
from assessment.estimate import Look
from assessment.lifetime import LifeFound, life, sizes_in_mm

# A crack inside becomes one in the surface, which becomes one through: no kind changes more often.
MOST = 4


@dataclass(frozen=True)
class Transition:
    """usage : from the last look to the change; sizes in mm of the crack that it becomes, None
    where the kind has none; before, after : names of the kinds"""

    usage: float
    before: str
    after: str
    depth: float | None
    length: float | None


@dataclass(frozen=True)
class Beyond:
    """The way past break-through. usage : from the last look to the last end that was found, None
    where the crack stops growing on the way; ends_by : that end; why : where there is none"""

    transitions: tuple[Transition, ...]
    usage: float | None
    ends_by: str | None
    why: str | None


def beyond(look: Look, corner: Corner, lived: LifeFound) -> Beyond | None:
    """What follows a life that ends by break-through, or None where it does not, or where nothing
    is left to become (a pressure boundary, a section that parts)."""
    steps: list[Transition] = []
    usage = lived.usage
    while lived.ends_by == "break-through" and usage is not None and len(steps) < MOST:
        after = _after(corner, lived)
        if after is None:
            break
        steps.append(
            Transition(usage, corner.kind.name, after.kind.name, *sizes_in_mm(after, after.x))
        )
        corner, lived = after, life(look, after)
        usage = None if lived.usage is None else usage + lived.usage
    if not steps:
        return None
    return Beyond(tuple(steps), usage, lived.ends_by, lived.why)


def _after(corner: Corner, lived: LifeFound) -> Corner | None:
    if lived.end is None or corner.kind.becomes(lived.end, corner.body) is None:
        return None
    depth, length = sizes_in_mm(corner, lived.end)
    metres = (None if size is None else 1e-3 * size for size in (depth, length))
    after = sizes_to_corner(corner.kind, corner.body, *metres)
    return after if after.became and after.broken is None else None
