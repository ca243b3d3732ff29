"""A reduced load at which the bounding crack has its reserve and long enough to run.

The reserve alone is not enough: at the load that just restores it, any growth takes it away again.
So the load sought is the largest one at which the interval of rule 1 is still the shortest that is
practical. Only the reducible part of the peak load comes down, and never below what the cycles
reach where these do not fall with it.
"""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from assessment.bounding import Bounding, bounding
from assessment.corners import Corner
from assessment.document.case import Case
from assessment.document.profile import Profiles
from assessment.estimate import Look
from assessment.growth import CycleBlock
from assessment.kinds.parts import PROFILE

_STEPS = 6


@dataclass(frozen=True)
class ReducedLoad:
    """``factor`` on the peak load, the bounding look at that load, and the limit in words."""

    factor: float
    bounding: Bounding
    words: str


Days = Callable[[Bounding], int | None]
"""The days of the governing interval that a bounding look leaves; None where there are none."""


def reduced_load(
    case: Case, look: Look, sizes: Sequence[Corner], full: Bounding, days: Days
) -> tuple[ReducedLoad | None, str]:
    """The restriction, or why there is none (the reason is empty where nobody asked)."""
    reserve, shortest = full.reserve, case.criteria.shortest_interval_days
    if not case.owner.allows_restriction or full.acceptable is not True:
        return None, ""
    if reserve is None or shortest is None:
        return None, "Whether a reduced load restores it could not be computed."
    least, why_least = least_factor(case)
    most = min(1.0, reserve / look.reserve)
    if most < least:
        return None, f"No reduced load restores it: {why_least}."

    def at(factor: float) -> Bounding:
        return bounding(look.at_load(factor, case.loading.cycles_fall), sizes)

    def lasts(found: Bounding) -> bool:
        left = days(found)
        restored = found.reserve is not None and found.reserve >= look.reserve
        return restored and left is not None and left >= shortest

    factor, found = least, at(least)
    if not lasts(found):
        return None, f"No reduced load leaves an interval of {shortest:g} days: {why_least}."
    for _ in range(_STEPS):
        middle = 0.5 * (factor + most)
        tried = at(middle)
        if lasts(tried):
            factor, found = middle, tried
        else:
            most = middle
    return ReducedLoad(factor, found, _words(case, factor)), ""


def least_factor(case: Case) -> tuple[float, str]:
    """The smallest factor that a limiter can bring about, and what holds it up."""
    part = case.loading.reducible
    least = 0.01 if part is None else max(0.01, 1.0 - part)
    why = "only a part of the load can be reduced" if part is not None else "even at no load"
    if not case.loading.cycles_fall:
        for block in case.loading.cycles:
            reached = _reached(case, block)
            if reached > least:
                least = min(1.0, reached)
                why = "the cycles reach as high and do not fall with the peak"
    return least, why


def _reached(case: Case, block: CycleBlock) -> float:
    """The largest part of the peak that one block of cycles reaches, load by load; nil for none."""
    peak = case.loading.peak
    if "profiles" in case.body:
        return _reached_along(case, block)
    parts_of = (_largest(block, name) / value for name, value in peak.items() if value > 0.0)
    return max(parts_of, default=0.0)


def _reached_along(case: Case, block: CycleBlock) -> float:
    """The same where a stress profile acts: place by place through the section."""
    profiles = Profiles(case.crack.kind, case.body, dict(case.body["profiles"]))
    largest = {name: _largest(block, name) for name in block.ranges}
    stresses = (
        (profiles.stress(largest, x), profiles.stress(case.loading.peak, x))
        for x in profiles.places()
    )
    return max((cycle / peak for cycle, peak in stresses if peak > 0.0), default=0.0)


def _largest(block: CycleBlock, name: str) -> float:
    """The largest value of one load in a cycle."""
    if block.maxima is not None:
        return block.maxima.get(name, 0.0)
    return block.ranges.get(name, 0.0) / (1.0 - (block.stress_ratio or 0.0))


def _words(case: Case, factor: float) -> str:
    parts = [
        f"{math.floor(factor * 1000.0) / 10.0:g} % of the stress profile"
        if name.startswith(PROFILE)
        else f"{name} {_down(factor * value)} MPa"
        for name, value in case.loading.peak.items()
        if value
    ]
    tail = "the cycles fall with it" if case.loading.cycles_fall else "the cycles stay as they are"
    if case.loading.reducible is None:
        tail += ", and the whole peak load is taken as reducible"
    percent = math.floor(factor * 1000.0) / 10.0
    return (
        f"Peak load limited to {percent:g} % of the peak of the basis ({', '.join(parts)}); {tail}."
    )


def _down(value: float) -> str:
    """A stress to a tenth, never above it."""
    return f"{math.floor(abs(value) * 10.0) / 10.0 * math.copysign(1.0, value):g}"
