"""How wrong may each input be before the verdict changes, and what to measure next.

The verdict is decided again by the procedure itself, at inputs made worse step by step: nothing
here knows a rule of its own. Nothing here ever makes an interval longer: it is shown beside the
verdict.
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass, replace

from assessment.document import Case

from .altered import Scaled

MOST = 4.0
"""The worst factor that is tried."""
# The factor to about one per cent.
_HALVINGS = 7

Decided = Callable[[Case], tuple[str, float | None]]
"""Verdict of a case and days of its interval, None where there is none."""


@dataclass(frozen=True)
class Margin:
    """what : input in words; factor : by how much it may be worse before the verdict changes to
    ``becomes``, None where it does not change up to MOST"""

    what: str
    factor: float | None
    becomes: str | None

    def words(self) -> str:
        """One sentence."""
        if self.factor is None:
            return f"{self.what}: no change of the verdict up to {MOST:g} times worse."
        return f"{self.what}: {self.factor:.3g} times worse, and the verdict is {self.becomes}."


@dataclass(frozen=True)
class Next:
    """what : what to measure, in words; days : the interval it would then be"""

    what: str
    days: float


def margins(case: Case, decided: Decided) -> tuple[Margin, ...]:
    """For every input the smallest factor that changes the verdict, by halving.

    The verdict is taken to stay changed once it has changed: worse is never better.
    """
    verdict, _ = decided(case)
    return tuple(_margin(what, worse, case, verdict, decided) for what, worse in _WORSE.items())


def _margin(
    what: str,
    worse: Callable[[Case, float], Case | None],
    case: Case,
    verdict: str,
    decided: Decided,
) -> Margin:
    def at(factor: float) -> str:
        changed = worse(case, factor)
        return verdict if changed is None else decided(changed)[0]

    becomes = at(MOST)
    if becomes == verdict:
        return Margin(what, None, None)
    low, high = 1.0, MOST
    for _ in range(_HALVINGS):
        middle = (low * high) ** 0.5
        found = at(middle)
        if found == verdict:
            low = middle
        else:
            high, becomes = middle, found
    return Margin(what, high, becomes)


def _size(case: Case, factor: float) -> Case | None:
    """Depth and length, both larger in proportion, up to just short of the wall."""
    depth, length = case.crack.depth, case.crack.length
    crack = replace(
        case.crack,
        depth=None if depth is None else depth * factor,
        length=None if length is None else length * factor,
    )
    return replace(case, crack=crack)


def _load(case: Case, factor: float) -> Case | None:
    """Peak and cycles alike; what is held in the material stays."""
    loading = case.loading
    cycles = tuple(
        replace(
            block,
            ranges={name: factor * value for name, value in block.ranges.items()},
            maxima=None
            if block.maxima is None
            else {name: factor * value for name, value in block.maxima.items()},
        )
        for block in loading.cycles
    )
    peak = {name: factor * value for name, value in loading.peak.items()}
    return replace(case, loading=replace(loading, peak=peak, cycles=cycles))


def _growth(case: Case, factor: float) -> Case | None:
    """Mean and bounding growth rate alike."""
    material, bounding = case.material, case.material.bounding
    worse = None if bounding.growth is None else Scaled(bounding.growth, factor)
    return replace(
        case,
        material=replace(
            material,
            growth=Scaled(material.growth, factor),
            bounding=replace(bounding, growth=worse),
        ),
    )


_WORSE: Mapping[str, Callable[[Case, float], Case | None]] = {
    "size": _size,
    "load": _load,
    "growth rate": _growth,
}


def measure_next(case: Case, decided: Decided) -> Next | None:
    """The one better measurement that would move the governing interval most; None where none
    would.

    Tried: the sizing error halved, for depth and for length; a rate known to the mean law's. The
    size and the law stay as they are, so that only how sure they are is gained.
    """
    _, now = decided(case)
    if now is None:
        return None
    found = []
    for what, better in _better(case):
        _, days = decided(better)
        if days is not None and days > now:
            found.append(Next(what, days))
    return max(found, key=lambda one: one.days, default=None)


def sentence(now: float, one: Next | None) -> str:
    """What to measure next, in one sentence."""
    if one is None:
        return "No single better measurement tried here would move the next inspection."
    weeks = f"from {_weeks(now)} to about {_weeks(one.days)}"
    return (
        f"{one.what} would move the next inspection {weeks}, if it confirms the values in use; it "
        "changes nothing until it is done."
    )


def _weeks(days: float) -> str:
    if days < 14:
        return f"{days:.0f} days"
    return f"{days / 7.0:.0f} weeks"


def _better(case: Case) -> list[tuple[str, Case]]:
    tried: list[tuple[str, Case]] = []
    sizing = case.crack.sizing
    if sizing is not None:
        finer = {
            "depth": replace(sizing, depth_sd=0.5 * sizing.depth_sd),
            "length": replace(sizing, length_sd=0.5 * sizing.length_sd),
        }
        for name, better in finer.items():
            sd = float(getattr(sizing, f"{name}_sd"))
            if sd > 0.0 and getattr(case.crack, name) is not None:
                what = f"Sizing the {name} to ±{500.0 * sd:.2g} mm"
                tried.append((what, replace(case, crack=replace(case.crack, sizing=better))))
    if case.material.bounding.growth is not None:
        bounding = replace(case.material.bounding, growth=case.material.growth)
        known = replace(case, material=replace(case.material, bounding=bounding))
        tried.append(("Measuring the growth rate of this material", known))
    return tried
