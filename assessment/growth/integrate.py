"""Growth of a crack front from a size to its end, for one crack or many at once.

The independent variable is s with ds = Σ (x_i'/x_i) dU over the points of the front (U is usage),
so that steps are alike whatever the life: dx_i/ds = r_i/v and dU/ds = 1/v with v = Σ r_i/x_i.

Steps are those of Dormand & Prince (1980), order 5 with an embedded order 4, adaptive for each
sample on its own. Which blocks grow which point is frozen within a step: where a threshold is
crossed, the step is split there, since the rate jumps. The end (the margin gone, the far wall
reached, the published range left) is found by real re-steps within the last step. K need not rise
with size, so each step is also looked at between its ends: a band of failing sizes is met if it is
wider than an eighth of a step, 4 % of the size.

Source: J. R. Dormand & P. J. Prince, A family of embedded Runge-Kutta formulae, J. Comput. Appl.
Math. 6 (1980) 19-26.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind
from assessment.validity import Floats

from .laws import GrowthLaw
from .loads import CycleBlock
from .rates import Drive, drive_of, effective_ranges, grows, k_by_load, rates_from, unstable

Bools = NDArray[np.bool_]
Margin = Callable[[Floats], Floats]

# How a run can end. "failed" is the margin's own end: the caller knows whether it is fracture,
# collapse or the reserve on load.
ENDS = ("failed", "break-through", "out of range", "no growth", "not converged")
FAILED, BROKEN, OUTSIDE, STOPPED, UNFINISHED = range(5)
RUNNING = -1

TOLERANCE = 1e-7
FIRST_STEP = 0.05
LARGEST_STEP = 0.3
MOST_STEPS = 1500
HALVINGS = 60
BRACKET = 1e-11
LOOKS = 8

_A = (
    (),
    (1 / 5,),
    (3 / 40, 9 / 40),
    (44 / 45, -56 / 15, 32 / 9),
    (19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729),
    (9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656),
    (35 / 384, 0.0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84),
)
_ERROR = (
    71 / 57600,
    0.0,
    -71 / 16695,
    71 / 1920,
    -17253 / 339200,
    22 / 525,
    -1 / 40,
)


@dataclass(frozen=True)
class Growth:
    """How each run went.

    usage : usage to the end, shape (samples,); for "no growth" the usage up to where it stopped
    x : the front at the end, shape (front variables, samples), m
    end : index into ENDS, shape (samples,)
    path_usage, path_x : the accepted steps of the first sample, from the start to the end
    """

    usage: Floats
    x: Floats
    end: NDArray[np.int_]
    path_usage: Floats
    path_x: Floats

    def end_words(self, sample: int = 0) -> str:
        return ENDS[int(self.end[sample])]


@dataclass(frozen=True)
class _Problem:
    kind: Kind
    body: Body
    law: GrowthLaw
    drive: Drive
    margin: Margin

    def effective(self, x: Floats) -> tuple[Floats, Floats]:
        unit_k = k_by_load(self.kind, x, self.drive.names, self.body)
        return effective_ranges(self.drive, unit_k, self.law)

    def growing(self, x: Floats) -> Bools:
        return grows(*self.effective(x), self.law)

    def slope(self, y: Floats, growing: Bools) -> Floats:
        """d(x, U)/ds; NaN where nothing grows or K cannot be evaluated."""
        x = y[:-1]
        effective, ratio = self.effective(x)
        r = rates_from(self.drive, effective, ratio, self.law, growing)
        v = np.sum(r / x, axis=0)
        with np.errstate(divide="ignore", invalid="ignore"):
            return np.concatenate([r / v, (1.0 / v)[None]])

    def ended(self, x: Floats) -> NDArray[np.int_]:
        """Index into ENDS where the run is over at this size, RUNNING elsewhere."""
        finite = np.all(np.isfinite(x), axis=0)
        safe = np.where(finite, x, 1.0)
        room = np.min(np.atleast_2d(self.kind.wall(safe, self.body)), axis=0)
        broken = finite & (room <= 0.0)
        # Beyond the wall nothing is evaluated: the margin there would be of no crack at all.
        margin = np.where(broken | ~finite, np.nan, self.margin(safe))
        outside = ~finite | ~np.broadcast_to(self.kind.inside(safe, self.body), finite.shape)
        end = np.full(finite.shape, RUNNING)
        end = np.where(outside | np.isnan(margin), OUTSIDE, end)
        failed = ~np.isnan(margin) & (margin <= 0.0)
        if hasattr(self.law, "k_c"):
            failed |= finite & unstable(*self.effective(safe), self.law)
        end = np.where(failed, FAILED, end)
        return np.where(broken, BROKEN, end)


def grow(
    kind: Kind,
    x0: Floats,
    body: Body,
    law: GrowthLaw,
    blocks: Sequence[CycleBlock],
    margin: Margin,
    tolerance: float = TOLERANCE,
) -> Growth:
    """Run every sample from x0 to its end.

    x0 : front variables in m, shape (n,) or (n, samples)
    margin : x of shape (n, samples) to (samples,); the run ends where it is nil or less
    tolerance : of each step, relative in size and usage

    Edge cases are data: a start that has failed, broken through or left the range ends at usage
    nil; one that nothing grows ends as "no growth". A sample's run does not depend on the others.
    """
    start = np.asarray(x0, dtype=float).reshape(len(x0), -1)
    p = _Problem(kind, body, law, drive_of(blocks) if blocks else _none(kind), margin)
    run = _Run(p, start, tolerance)
    for _ in range(MOST_STEPS):
        alive = np.flatnonzero(run.end == RUNNING)
        if alive.size == 0:
            break
        run.advance(alive)
    run.end[run.end == RUNNING] = UNFINISHED
    usage, path = zip(*run.path, strict=True)
    return Growth(run.y[-1], run.y[:-1], run.end, np.array(usage), np.array(path).T)


def _none(kind: Kind) -> Drive:
    name = (kind.load_keys[0].rpartition("_")[0],)
    return Drive(name, np.zeros((1, 1)), np.zeros((1, 1)), np.zeros(1), np.zeros((1, 1)))


class _Run:
    """The state of all samples while they run."""

    def __init__(self, problem: _Problem, start: Floats, tolerance: float) -> None:
        self.p = problem
        self.tolerance = tolerance
        samples = start.shape[1]
        self.y = np.concatenate([start, np.zeros((1, samples))])
        self.h = np.full(samples, FIRST_STEP)
        self.end = np.asarray(problem.ended(start), dtype=int)
        self.path: list[tuple[float, Floats]] = [(0.0, start[:, 0].copy())]

    def advance(self, alive: NDArray[np.int_]) -> None:
        y, h = self.y[:, alive], self.h[alive]
        growing = self.p.growing(y[:-1])
        still = ~np.any(growing, axis=(0, 1))
        self.end[alive[still]] = STOPPED
        if np.any(still):
            alive, y, h = alive[~still], y[:, ~still], h[~still]
            growing = growing[:, :, ~still]
            if alive.size == 0:
                return
        new, error = self._step(y, h, growing)
        size = self._error_size(y, new, error)
        taken = ~(size > 1.0)  # NaN counts as taken: the step left what can be evaluated
        self.h[alive] = np.minimum(h * _next_factor(size), LARGEST_STEP)
        if not np.any(taken):
            return
        self._accept(alive[taken], y[:, taken], h[taken], growing[:, :, taken], new[:, taken])

    def _accept(
        self,
        alive: NDArray[np.int_],
        y: Floats,
        h: Floats,
        growing: Bools,
        new: Floats,
    ) -> None:
        end = self.p.ended(new[:-1])
        share = self._first_end_between(y, new)
        split = (end != RUNNING) | (share < 1.0) | self._flipped(new, growing)
        if np.any(split):
            at = self._bisect(y[:, split], (share * h)[split], growing[:, :, split])
            new = new.copy()
            new[:, split] = at
            end[split] = self.p.ended(at[:-1])
        # A state that cannot be evaluated is not kept: the run ends at the last good one.
        good = np.all(np.isfinite(new), axis=0)
        self.y[:, alive] = np.where(good, new, y)
        self.end[alive] = np.where(good, end, OUTSIDE)
        self.h[alive] = np.where(split, FIRST_STEP, self.h[alive])
        if alive[0] == 0:
            self.path.append((float(self.y[-1, 0]), self.y[:-1, 0].copy()))

    def _first_end_between(self, y: Floats, new: Floats) -> Floats:
        """The share of the step after which the run seems over, 1 where it does not before its end.

        A straight line between the two sizes is enough to look along; the re-steps find the place.
        """
        shares = np.arange(1, LOOKS) / LOOKS
        way = (new - y)[:-1, :, None] * shares
        between = (y[:-1, :, None] + way).reshape(len(y) - 1, -1)
        over = (self.p.ended(between) != RUNNING).reshape(-1, LOOKS - 1)
        over &= np.all(np.isfinite(new), axis=0)[:, None]
        return np.where(np.any(over, axis=1), shares[np.argmax(over, axis=1)], 1.0)

    def _flipped(self, new: Floats, growing: Bools) -> Bools:
        x = new[:-1]
        safe = np.where(np.isfinite(x), x, 1.0)
        return np.asarray(np.any(self.p.growing(safe) != growing, axis=(0, 1)))

    def _bisect(self, y: Floats, h: Floats, growing: Bools) -> Floats:
        """The first state at which the run ends or a threshold is crossed, just beyond it.

        The bracket is cut into several parts at once, each a real step from the same start: a
        single crack costs as much as a few dozen steps side by side.
        """
        samples = h.size
        parts = max(2, min(32, 2048 // (samples * growing.shape[0])))
        low, high = np.zeros(samples), h.copy()
        many_y, many_growing = np.repeat(y, parts, axis=1), np.repeat(growing, parts, axis=2)
        share = np.arange(1, parts + 1) / parts
        for _ in range(HALVINGS):
            tried = low[:, None] + (high - low)[:, None] * share
            tried[:, -1] = high
            state, _ = self._step(many_y, tried.ravel(), many_growing)
            beyond = (self.p.ended(state[:-1]) != RUNNING) | self._flipped(state, many_growing)
            beyond = beyond.reshape(samples, parts)
            beyond[:, -1] = True
            first = np.argmax(beyond, axis=1)
            row = np.arange(samples)
            low = np.where(first > 0, tried[row, first - 1], low)
            high = tried[row, first]
            # Of the way to the event, so that a life of a few cycles is as exact as a long one.
            if np.all(high - low <= BRACKET * high):
                break
        state, _ = self._step(y, high, growing)
        # Where the far side cannot be evaluated, the near side is the end of the range.
        near, _ = self._step(y, low, growing)
        return np.where(np.all(np.isfinite(state), axis=0), state, near)

    def _step(self, y: Floats, h: Floats, growing: Bools) -> tuple[Floats, Floats]:
        slopes: list[Floats] = []
        with np.errstate(invalid="ignore", over="ignore", divide="ignore"):
            for row in _A:
                at = y
                if row:
                    at = y + h * sum(a * k for a, k in zip(row, slopes, strict=True) if a)
                slopes.append(self.p.slope(at, growing))
            error = h * sum(e * k for e, k in zip(_ERROR, slopes, strict=True) if e)
        # The last row of _A is the step itself (the method re-uses its last stage).
        return at, error

    def _error_size(self, y: Floats, new: Floats, error: Floats) -> Floats:
        """Largest error over tolerance; usage is weighed against the whole of it so far."""
        with np.errstate(invalid="ignore", divide="ignore"):
            scale = self.tolerance * np.maximum(np.abs(y), np.abs(new))
            return np.asarray(np.max(np.abs(error) / scale, axis=0))


def _next_factor(size: Floats) -> Floats:
    with np.errstate(divide="ignore", invalid="ignore"):
        factor = np.clip(0.9 * size**-0.2, 0.2, 4.0)
    return np.where(np.isfinite(factor), factor, 1.0)
