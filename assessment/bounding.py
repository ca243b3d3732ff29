"""The look that decides: the worst of the corners, with the characteristic values of the basis."""

from collections.abc import Sequence
from dataclasses import dataclass

from assessment.corners import Corner
from assessment.estimate import Estimate, Look, estimate
from assessment.lifetime import LifeFound, life, lives

_OUTSIDE = "today's bounding size is outside a published range"


@dataclass(frozen=True)
class Bounding:
    """The bounding look at a crack.

    corner : the corner that decides at the peak load
    estimate : that corner at the peak load; None where it has broken through
    acceptable : no corner fails at the peak load and none has broken through; None where a
        corner's reserve could not be computed
    reserve : the smallest reserve on load of the corners; 0 where one has broken through
    life : the shortest life of the corners
    outside : the sentences of all ranges that a corner leaves
    unsettled : why the criterion that the decision needs could not be used, or None
    """

    corner: Corner
    estimate: Estimate | None
    acceptable: bool | None
    reserve: float | None
    life: LifeFound
    outside: tuple[str, ...]
    unsettled: str | None = None


def bounding(look: Look, sizes: Sequence[Corner]) -> Bounding:
    """The worst of the corners."""
    broken = next((corner for corner in sizes if corner.broken is not None), None)
    if broken is not None:
        ended = LifeFound(cycles=0.0, usage=0.0, ends_by="break-through", path=())
        return Bounding(broken, None, False, 0.0, ended, ())
    found = [estimate(look, corner) for corner in sizes]
    worst = min(found, key=_strength)
    known = [one.point.acceptable for one in found]
    acceptable = None if None in known and False not in known else all(known)
    outside = tuple(dict.fromkeys(mark.sentence() for one in found for mark in one.marks))
    return Bounding(
        corner=worst.corner,
        estimate=worst,
        acceptable=acceptable,
        reserve=worst.point.reserve,
        life=LifeFound(why=_OUTSIDE) if outside else shortest_life(look, sizes, worst),
        outside=outside,
        unsettled=next((one.unsettled for one in found if one.unsettled), None),
    )


def _strength(one: Estimate) -> tuple[bool, float]:
    """Orders estimates from worst to best; an unknown reserve comes first."""
    reserve = one.point.reserve
    return (reserve is not None, 0.0 if reserve is None else reserve)


def shortest_life(look: Look, sizes: Sequence[Corner], worst: Estimate) -> LifeFound:
    """The life of the corner that lives shortest.

    Where the reserve is already below the one that ends life, no corner needs to be grown.
    """
    reserve = worst.point.reserve
    if reserve is not None and reserve < look.reserve:
        return LifeFound(cycles=0.0, usage=0.0, ends_by=worst.point.cause, path=())
    # The corner that is worst today is grown first: it most often lives shortest, and only the
    # first of those that grow together keeps its path.
    order = sorted(sizes, key=lambda corner: corner is not worst.corner)
    together = [one for one in order if one.kind is order[0].kind and one.body is order[0].body]
    alone = [one for one in order if not any(one is other for other in together)]
    found = [*zip(together, lives(look, together), strict=True)]
    found.extend((corner, life(look, corner)) for corner in alone)
    faulty = next((one for _, one in found if not one.converged), None)
    if faulty is not None:
        return faulty
    ending = [(corner, one) for corner, one in found if one.usage is not None]
    if not ending:
        return found[0][1]
    corner, shortest = min(ending, key=lambda pair: pair[1].usage or 0.0)
    return shortest if shortest.path else life(look, corner)
