"""Growth of many samples of one crack at once: one kind, one body, each with its own start, growth
constants, factor on stress and margin.

The independent variable is that of integrate.py, ds = Σ (x_i'/x_i) dU, so that a fixed step serves
every life. Steps are those of the classic order-4 method; the slope at the new size, which the next
step needs anyway, gives an error of order 3, and a step whose error is too large is halved for that
sample alone. Thresholds and ends are met as in integrate.py: which cycles grow which point is
frozen within a step, and both the flip and the end are found by real re-steps within a bracket.

Accuracy: life within 0.5 % (tests/full/growth.py). K need not rise with size: a band of failing
sizes narrower than a step (about 20 % of the size) may be stepped over, where integrate.py looks
closer.

Source: W. Kutta, Beitrag zur näherungsweisen Integration totaler Differentialgleichungen, Z. Math.
Phys. 46 (1901) 435-453; the bracket by M. Dowell & P. Jarratt, A modified regula falsi method,
BIT 11 (1971) 168-174 (the "Illinois" weights).
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind
from assessment.validity import Floats

from .integrate import BROKEN, FAILED, OUTSIDE, RUNNING, STOPPED, UNFINISHED
from .laws import GrowthLaw
from .loads import CycleBlock
from .rates import drive_of
from .samples import AnySamples, Flags, Rows, Samples, law_of_samples

Ends = NDArray[np.int_]
Bools = NDArray[np.bool_]
SampleMargin = Callable[[Floats, Rows], Floats]

STEP = 0.35
CHUNK = 4096
STEP_ERROR = 2e-3
BRACKET = 2e-4
COARSEST = 1e-3
ROUNDS = 60
MOST_STEPS = 4000
SMALLEST = 2.0**-20


@dataclass(frozen=True)
class BatchGrowth:
    """How each sample went.

    usage : usage to the end, shape (samples,); for "no growth" the usage up to where it stopped
    end : index into ENDS, shape (samples,)
    x_end : the front at the end, shape (front variables, samples), m
    x_at : the front at each usage asked for, shape (front variables, usages, samples), m; NaN past
        the end of a sample
    """

    usage: Floats
    end: Ends
    x_end: Floats
    x_at: Floats


def grow_batch(
    kind: Kind,
    x0: Floats,
    body: Body,
    law: GrowthLaw,
    blocks: Sequence[CycleBlock],
    margin: SampleMargin,
    *,
    each: Mapping[str, Floats] | None = None,
    stress_factor: Floats | float = 1.0,
    at_usage: Sequence[float] = (),
    step: float = STEP,
    chunk: int = CHUNK,
) -> BatchGrowth:
    """Run every sample from its start to its end.

    x0 : front variables in m, shape (n, samples)
    law, each : the law, and its constants that differ between samples (``law_of_samples``)
    blocks : cycles of all samples; at least one
    margin : (x of shape (n, some), which samples these are) to (some,); the run ends where it is
        nil or less. ``lambda x, rows: limit[rows] - ...`` gives each sample its own limit
    stress_factor : on the cyclic loads, not on residual stress nor on what the margin takes as
        peak; a number or one a sample, positive
    at_usage : usages at which the sizes are wanted, not negative
    step : in s; a half as long step costs twice and is about 16 times as exact
    chunk : samples worked on together

    Raises ValueError for wrong shapes, no cycles, or a factor or usage out of its range. Edge cases
    are data, as in ``grow``. A sample's answer does not depend on the others, nor on ``chunk``.
    """
    start = np.asarray(x0, dtype=float)
    if start.ndim != 2:
        raise ValueError(f"x0 has shape {start.shape}; it is (front variables, samples)")
    if not blocks:
        raise ValueError("no cycles are given, so that nothing grows: give at least one block")
    samples = start.shape[1]
    factor = np.broadcast_to(np.asarray(stress_factor, dtype=float), (samples,))
    if not np.all(factor > 0.0) or not np.all(np.isfinite(factor)):
        raise ValueError("a stress factor is a finite number above nil")
    wanted = np.asarray(at_usage, dtype=float)
    if not np.all(wanted >= 0.0):
        raise ValueError("a usage at which a size is wanted is not negative")
    whole = AnySamples(
        kind, body, law_of_samples(law, each or {}, samples), drive_of(blocks), factor
    )
    found = _empty(start, wanted.size)
    for first in range(0, samples, chunk):
        rows = np.arange(first, min(first + chunk, samples))
        _Run(kind, body, margin, whole.take(rows), rows, found, wanted, step).to_the_end()
    return found


def _empty(start: Floats, usages: int) -> BatchGrowth:
    n, samples = start.shape
    end = np.full(samples, UNFINISHED)
    return BatchGrowth(np.zeros(samples), end, start.copy(), np.full((n, usages, samples), np.nan))


@dataclass
class _State:
    """Samples side by side: y = (x, U), what is seen there, the flags and the slope."""

    y: Floats
    seen: Floats
    flags: Flags
    slope: Floats

    def take(self, rows: Rows) -> "_State":
        return _State(
            self.y[:, rows], self.seen[..., rows], self.flags[..., rows], self.slope[:, rows]
        )

    def put(self, rows: Rows, other: "_State") -> None:
        self.y[:, rows], self.seen[..., rows] = other.y, other.seen
        self.flags[..., rows], self.slope[:, rows] = other.flags, other.slope


class _Run:
    """One chunk while it runs. Only samples that still grow are kept."""

    def __init__(
        self,
        kind: Kind,
        body: Body,
        margin: SampleMargin,
        samples: Samples,
        rows: Rows,
        found: BatchGrowth,
        wanted: Floats,
        step: float,
    ) -> None:
        self.kind, self.body, self.margin = kind, body, margin
        self.samples, self.rows = samples, rows
        self.found, self.wanted, self.step = found, wanted, step
        self.h = np.full(rows.size, step)
        y = np.concatenate([found.x_end[:, rows], np.zeros((1, rows.size))])
        with np.errstate(all="ignore"):
            seen = samples.see(y[:-1])
            flags = samples.flags(seen)
            self.at = _State(y, seen, flags, _slope(samples, y[:-1], seen, flags))
        found.x_at[:, wanted == 0.0, rows[0] : rows[-1] + 1] = y[:-1, None, :]

    def to_the_end(self) -> None:
        with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
            end, _ = self._ended(self.at, self.samples, self.rows)
            self._leave(end)
            for _ in range(MOST_STEPS):
                if self.rows.size == 0:
                    break
                self._advance()
            self._store(np.arange(self.rows.size), np.full(self.rows.size, UNFINISHED))

    def _advance(self) -> None:
        before, h = self.at, self.h
        after, error = _step(self.samples, before, h)
        end, left = self._ended(after, self.samples, self.rows)
        too_far = (error > STEP_ERROR) & (h > SMALLEST)
        flipped = np.any(_flat(after.flags != self.samples.flags(after.seen)), axis=0)
        split = np.flatnonzero(~too_far & ((end != RUNNING) | flipped))
        taken = h.copy()
        if split.size:
            end[split], taken[split] = self._locate(after, split, left[:, split])
        if np.any(too_far):
            back = np.flatnonzero(too_far)
            after.put(back, before.take(back))
            end[back] = RUNNING
        self._record(before, after, taken, ~too_far)
        self.at = after
        self.h = np.where(too_far, 0.5 * h, np.minimum(2.0 * h, self.step))
        if split.size:
            self._thaw(split)
        self._leave(end)

    def _thaw(self, rows: Rows) -> None:
        """New flags where a step was split, and the slope with them."""
        part, samples = self.at.take(rows), self.samples.take(rows)
        part.flags = samples.flags(part.seen)
        part.slope = _slope(samples, part.y[:-1], part.seen, part.flags)
        self.at.put(rows, part)

    def _ended(self, at: _State, samples: Samples, rows: Rows) -> tuple[Ends, Floats]:
        """The end reached at these sizes, RUNNING elsewhere; and what is left of margin, room and
        threshold gap, shape (3, samples), NaN out of range."""
        x = at.y[:-1]
        finite = np.all(np.isfinite(at.y), axis=0)
        safe = x if np.all(finite) else np.where(finite, x, 1.0)
        room = np.min(np.atleast_2d(self.kind.wall(safe, self.body)), axis=0)
        broken = finite & (room <= 0.0)
        # Beyond the wall nothing is evaluated: the margin there would be of no crack at all.
        margin = np.where(broken | ~finite, np.nan, self.margin(safe, rows))
        outside = ~finite | ~np.broadcast_to(self.kind.inside(safe, self.body), finite.shape)
        end = np.full(finite.shape, RUNNING)
        end[outside | np.isnan(margin)] = OUTSIDE
        end[(margin <= 0.0) | (finite & samples.unstable(at.seen))] = FAILED
        end[broken] = BROKEN
        at_rest = ~np.any(_flat(at.flags), axis=0)
        end[(end == RUNNING) & at_rest] = STOPPED
        left = np.stack([margin, room, samples.gap(at.seen, at.flags)])
        # At the far wall the room is all that is known.
        left[0::2, broken] = np.inf
        left[:, end == OUTSIDE] = np.nan
        return end, left

    def _locate(self, after: _State, split: Rows, left: Floats) -> tuple[Ends, Floats]:
        """Put the state just beyond the first end or flip into ``after``; the end, and the way."""
        before, samples, rows = self.at.take(split), self.samples.take(split), self.rows[split]
        _, whole = self._ended(before, samples, rows)
        # Margin and room in shares of what they are at the start of the step.
        whole[2] = 1.0
        g_low = np.ones(split.size)
        # The bracket is closed to a share of the life so far or of the way to the event.
        of_life = BRACKET * before.y[-1] / before.slope[-1]
        high = self.h[split].copy()
        low, g_high = np.zeros(split.size), np.min(left / whole, axis=0)
        side = np.zeros(split.size, dtype=int)
        best, best_low = after.take(split), before.take(np.arange(split.size))
        for _ in range(ROUNDS):
            close = np.clip(of_life, BRACKET * high, COARSEST)
            open_ = np.flatnonzero(high - low > close)
            if open_.size == 0:
                break
            h = _between(low[open_], high[open_], g_low[open_], g_high[open_], close[open_])
            part = samples.take(open_)
            tried, _ = _step(part, before.take(open_), h)
            end, left = self._ended(tried, part, rows[open_])
            g = np.min(left / whole[:, open_], axis=0)
            beyond = (end != RUNNING) | np.any(_flat(tried.flags != part.flags(tried.seen)), axis=0)
            up, down = open_[beyond], open_[~beyond]
            high[up], g_high[up] = h[beyond], g[beyond]
            low[down], g_low[down] = h[~beyond], g[~beyond]
            # The end that stays loses half its weight, else the bracket hardly closes.
            g_low[up] = np.where(side[up] > 0, 0.5 * g_low[up], g_low[up])
            g_high[down] = np.where(side[down] < 0, 0.5 * g_high[down], g_high[down])
            side[up], side[down] = 1, -1
            best.put(up, tried.take(np.flatnonzero(beyond)))
            best_low.put(down, tried.take(np.flatnonzero(~beyond)))
        end, _ = self._ended(best, samples, rows)
        # Where the far side cannot be evaluated, the near side is the end of the range.
        lost = np.flatnonzero(~np.all(np.isfinite(best.y), axis=0))
        best.put(lost, best_low.take(lost))
        high[lost] = low[lost]
        # At rest with the flags of before is for the flags of after to say.
        end[end == STOPPED] = RUNNING
        after.put(split, best)
        return end, high

    def _record(self, before: _State, after: _State, h: Floats, kept: Bools) -> None:
        """The sizes wanted between two states, by a cubic through both and their slopes."""
        for index, usage in enumerate(self.wanted):
            here = kept & (before.y[-1] < usage) & (usage <= after.y[-1])
            rows = np.flatnonzero(here)
            if rows.size:
                start, stop = before.take(rows), after.take(rows)
                self.found.x_at[:, index, self.rows[rows]] = _size_at(usage, start, stop, h[rows])

    def _leave(self, end: Ends) -> None:
        """Store the samples that have ended, and go on with the others."""
        at_rest = ~np.any(_flat(self.at.flags), axis=0)
        end = np.where((end == RUNNING) & at_rest, STOPPED, end)
        over = end != RUNNING
        if not np.any(over):
            return
        self._store(np.flatnonzero(over), end[over])
        still = np.flatnonzero(~over)
        self.at, self.h = self.at.take(still), self.h[still]
        self.samples, self.rows = self.samples.take(still), self.rows[still]

    def _store(self, rows: Rows, end: Ends) -> None:
        where = self.rows[rows]
        self.found.usage[where] = self.at.y[-1, rows]
        self.found.x_end[:, where] = self.at.y[:-1, rows]
        self.found.end[where] = end


def _slope(samples: Samples, x: Floats, seen: Floats, flags: Flags) -> Floats:
    """d(x, U)/ds; NaN where nothing grows or K cannot be evaluated."""
    r = samples.rates(seen, flags)
    v = r[0] / x[0] if len(x) == 1 else np.sum(r / x, axis=0)
    slope = np.empty((len(x) + 1, x.shape[1]))
    slope[-1] = 1.0 / v
    slope[:-1] = r * slope[-1]
    return slope


def _step(samples: Samples, at: _State, h: Floats) -> tuple[_State, Floats]:
    """One step with frozen flags, and its error relative to size and usage."""
    slopes = [at.slope]
    for part in (0.5, 0.5, 1.0):
        x = at.y[:-1] + (part * h) * slopes[-1][:-1]
        slopes.append(_slope(samples, x, samples.see(x), at.flags))
    first, second, third, last = slopes
    middle, ends = second + third, first + last
    y = at.y + (h / 6.0) * (ends + 2.0 * middle)
    seen = samples.see(y[:-1])
    after = _State(y, seen, at.flags.copy(), _slope(samples, y[:-1], seen, at.flags))
    # The same step with the slope at its end in place of the last stage is of order 3. A rate that
    # starts as a root or from nil, just above a threshold, shows in the bend of the slope alone.
    off = np.maximum(np.abs(last - after.slope), np.abs(ends - middle))
    error = np.max((h / 6.0) * off / y, axis=0)
    return after, error


def _between(low: Floats, high: Floats, g_low: Floats, g_high: Floats, close: Floats) -> Floats:
    """Where to look next: where a straight line is nil, half-way where there is none."""
    width = high - low
    share = np.where((g_low > 0.0) & (g_high <= 0.0), g_low / (g_low - g_high), 0.5)
    least = np.minimum(0.5 * close / width, 0.5)
    return low + width * np.clip(share + 0.5 * least * np.sign(0.5 - share), least, 1.0 - least)


def _size_at(usage: float, start: _State, stop: _State, h: Floats) -> Floats:
    """x where the cubic of usage over s has this value. Usage rises, so Newton from a line."""
    u0, u1 = start.y[-1], stop.y[-1]
    d0, d1 = h * start.slope[-1], h * stop.slope[-1]
    low, high = np.zeros(h.size), np.ones(h.size)
    for _ in range(30):
        t = 0.5 * (low + high)
        less = _cubic(t, u0, u1, d0, d1) < usage
        low, high = np.where(less, t, low), np.where(less, high, t)
    return _cubic(high, start.y[:-1], stop.y[:-1], h * start.slope[:-1], h * stop.slope[:-1])


def _cubic(t: Floats, y0: Floats, y1: Floats, d0: Floats, d1: Floats) -> Floats:
    """Hermite's cubic for t from 0 to 1."""
    rest = 1.0 - t
    return np.asarray(
        rest**2 * ((1.0 + 2.0 * t) * y0 + t * d0) + t**2 * ((3.0 - 2.0 * t) * y1 - rest * d1)
    )


def _flat(flags: Flags) -> Flags:
    return np.asarray(flags).reshape(-1, flags.shape[-1])
