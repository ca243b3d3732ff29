"""The measured sizes of a crack, as the forecast weighs them.

A size counts where its counter reading and the error of its method are known, and the depth where
it was measured: an assumed depth is no measurement. What does not count is named, never dropped in
silence.
"""

from dataclasses import dataclass

from assessment.document.case import Case, Sizing
from assessment.document.case import Look as Earlier

# A crack whose depth was not measured at the start: sd of the log of its depth-to-length ratio
# about the ratio of the last look (common practice, no source).
RATIO_LOG_SD = 0.3


@dataclass(frozen=True)
class Start:
    """Where the samples start, bias taken off, in m; ``at`` is the counter reading or None.

    ratio : depth over length where the depth at the start follows from the length
    """

    at: float | None
    depth: float | None
    depth_sd: float
    length: float | None
    length_sd: float
    ratio: float | None = None
    ratio_log_sd: float = 0.0


@dataclass(frozen=True)
class Reading:
    """One measured size, bias taken off, m. which : "depth" or "length"."""

    at: float
    which: str
    size: float
    sd: float
    words: str


@dataclass(frozen=True)
class Looks:
    """Start, the readings after it in order of usage, and what was left out, in sentences."""

    start: Start
    readings: tuple[Reading, ...]
    left_out: tuple[str, ...]


@dataclass(frozen=True)
class _Sized:
    at: float | None
    depth: float | None
    length: float | None
    sizing: Sizing | None
    words: str


def looks_of(case: Case) -> Looks:
    """Raises ValueError, in words, where the last look itself cannot be used."""
    last = _last(case)
    if last.sizing is None:
        raise ValueError("crack.sizing is missing")
    if case.crack.depth_basis == "at least":
        raise ValueError("the depth is a lower bound only")
    assumed = case.crack.depth_basis in ("assumed", "at most")
    ratio = _ratio(case) if assumed else None
    usable, left_out = _usable(case, last)
    if not usable:
        return Looks(_start(last, ratio, 0.0), (), left_out)
    first = usable[0]
    if first.length is not None and first.depth is None and case.crack.depth is not None:
        start = _start(first, _ratio(case), 0.0 if assumed else RATIO_LOG_SD)
    else:
        start = _start(first, ratio, 0.0)
    later = [*usable[1:], last]
    readings = [one for sized in later for one in _readings(sized, assumed)]
    return Looks(start, tuple(readings), left_out)


def _last(case: Case) -> _Sized:
    crack = case.crack
    return _Sized(case.usage.at, crack.depth, crack.length, crack.sizing, f"{case.usage.on}")


def _ratio(case: Case) -> float | None:
    """Depth over length of the last look, biases taken off."""
    crack, sizing = case.crack, case.crack.sizing
    if crack.depth is None or crack.length is None or sizing is None:
        return None
    return (crack.depth - sizing.depth_bias) / (crack.length - sizing.length_bias)


def _usable(case: Case, last: _Sized) -> tuple[list[_Sized], tuple[str, ...]]:
    usable: list[_Sized] = []
    left_out: list[str] = []
    for look in case.history:
        why = _why_not(case, look, last, usable)
        if why is None:
            words = f"{look.on}"
            usable.append(_Sized(look.at, look.depth, look.length, look.sizing, words))
        elif look.depth is not None or look.length is not None:
            left_out.append(f"The size of {look.on} is not weighed: {why}.")
    return usable, tuple(left_out)


def _why_not(case: Case, look: Earlier, last: _Sized, before: list[_Sized]) -> str | None:
    needs_length = case.crack.length is not None and not before
    if look.at is None:
        return "its counter reading is missing"
    if last.at is None:
        return "the counter reading of the last look is missing"
    if look.sizing is None:
        return "the sizing error of its method is missing"
    if not look.at < last.at or (before and look.at <= (before[-1].at or 0.0)):
        return "its counter reading is not before that of the next look"
    if needs_length and look.length is None:
        return "no length was measured, and it would be the first"
    if look.depth is None and look.length is None:
        return "nothing was measured"
    if _exact(look.sizing, look.depth, look.length):
        return "it is said to have no error, which no sample can meet"
    if _exact(last.sizing, last.depth, last.length):
        return "the last size is said to have no error, so the forecast starts from it alone"
    return None


def _exact(sizing: Sizing | None, depth: float | None, length: float | None) -> bool:
    if sizing is None:
        return False
    exact_depth = depth is not None and sizing.depth_sd == 0.0
    return exact_depth or (length is not None and sizing.length_sd == 0.0)


def _start(sized: _Sized, ratio: float | None, ratio_log_sd: float) -> Start:
    sizing = sized.sizing
    if sizing is None:
        raise ValueError("crack.sizing is missing")
    return Start(
        at=sized.at,
        depth=None if sized.depth is None else sized.depth - sizing.depth_bias,
        depth_sd=sizing.depth_sd,
        length=None if sized.length is None else sized.length - sizing.length_bias,
        length_sd=sizing.length_sd,
        ratio=ratio,
        ratio_log_sd=ratio_log_sd,
    )


def _readings(sized: _Sized, depth_assumed: bool) -> list[Reading]:
    sizing, at = sized.sizing, sized.at
    if sizing is None or at is None:
        return []
    found = []
    if sized.depth is not None and not depth_assumed:
        size = sized.depth - sizing.depth_bias
        found.append(Reading(at, "depth", size, sizing.depth_sd, sized.words))
    if sized.length is not None:
        size = sized.length - sizing.length_bias
        found.append(Reading(at, "length", size, sizing.length_sd, sized.words))
    return found
