"""Nominal growth of many samples of one crack, from a size to its end, with its way kept.

A narrow way in: what is sampled is the start, the exponent, the stress and the toughness. The
scatter of log10 C is none of it: it multiplies every rate alike, so that it only sets how fast the
usage of a path passes.

Fixed steps of fourth order in s, ds = Σ (x_i'/x_i) dU, as in ``assessment.growth``; the end is
found by halving the last step along its cubic. A threshold is looked at anew at each stage of a
step, so that one which is crossed within a step is smeared over it. Accuracy: measured in
tests/assessment/forecast/test_paths.py against ``assessment.growth.grow``.
"""

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Any, cast

import numpy as np
from numpy.typing import NDArray

from assessment.corners import Corner
from assessment.estimate import Look
from assessment.growth import CycleBlock, rates
from assessment.growth.rates import drive_of, effective_ranges, k_by_load, unstable
from assessment.lifetime import blocks_for, margin
from assessment.validity import Floats

from .altered import Shifted

STEP = 0.3
MOST_STEPS = 400
_HALVINGS = 10
Bools = NDArray[np.bool_]


@dataclass(frozen=True)
class Samples:
    """What differs between samples, each (samples,), the start (front variables, samples) in m.

    exponent : added to m; stress, toughness : factors on all stress and on toughness
    """

    start: Floats
    exponent: Floats
    stress: Floats
    toughness: Floats

    def at(self, index: Any) -> "Samples":
        return Samples(
            self.start[:, index], self.exponent[index], self.stress[index], self.toughness[index]
        )


@dataclass(frozen=True)
class Paths:
    """The ways of all samples on the nominal clock.

    usage : (steps, samples), the last repeated after the end; infinite from where nothing grows
    x, slope : (steps, front variables, samples): front and its growth per usage
    end : usage to the end, (samples,); infinite where the crack stops growing first
    """

    usage: Floats
    x: Floats
    slope: Floats
    end: Floats
    last: Floats


def run(look: Look, corner: Corner, samples: Samples) -> Paths:
    """Grow every sample to its end. ``corner`` gives kind and body; its own size is not used."""
    count = samples.start.shape[1]
    way = _Way(look, corner, samples)
    x = samples.start.copy()
    usage, end = np.zeros(count), np.full(count, np.nan)
    end[way.over(x, np.arange(count))] = 0.0
    slope = way.speed(x, np.arange(count))
    kept: list[tuple[Floats, Floats, Floats]] = [(usage, x, slope)]
    last = x.copy()
    for _ in range(MOST_STEPS):
        alive = np.flatnonzero(np.isnan(end))
        stopped = alive[~np.any(slope[:, alive] > 0.0, axis=0)]
        end[stopped] = np.inf
        alive = alive[np.any(slope[:, alive] > 0.0, axis=0)]
        if not alive.size:
            break
        usage, x, slope = usage.copy(), x.copy(), slope.copy()
        new_x, took = way.step(x[:, alive], slope[:, alive], alive)
        new_slope = way.speed(new_x, alive)
        ended = way.over(new_x, alive)
        if np.any(ended):
            who = alive[ended]
            share = way.halved(
                x[:, who], slope[:, who], new_x[:, ended], new_slope[:, ended], took[ended], who
            )
            at = hermite(
                x[:, who], slope[:, who], new_x[:, ended], new_slope[:, ended], took[ended], share
            )
            end[who] = usage[who] + share * took[ended]
            last[:, who] = at
        x[:, alive], slope[:, alive] = new_x, new_slope
        usage[alive] += took
        kept.append((usage, x, slope))
    else:
        raise RuntimeError("growth of the samples did not come to an end in the steps allowed")
    last[:, np.isinf(end)] = x[:, np.isinf(end)]
    usages, fronts, slopes = (np.stack(rows) for rows in zip(*kept, strict=True))
    return Paths(usages, fronts, slopes, end, last)


class _Way:
    """Rates and ends of samples by their numbers."""

    def __init__(self, look: Look, corner: Corner, samples: Samples) -> None:
        self.look, self.corner, self.samples = look, corner, samples
        self.blocks: Sequence[CycleBlock] = blocks_for(look, corner)

    def law(self, who: NDArray[np.intp]) -> Shifted:
        return Shifted(self.look.growth, self.samples.exponent[who], self.samples.stress[who])

    def speed(self, x: Floats, who: NDArray[np.intp]) -> Floats:
        """Growth per usage; nil where nothing grows, and where it cannot be evaluated."""
        if not self.blocks:
            return np.zeros_like(x)
        law = self.law(who)
        with np.errstate(all="ignore"):
            found = rates(self.corner.kind, x, self.corner.body, law, self.blocks)
        return np.where(np.isfinite(found), found, 0.0)

    def step(self, x: Floats, slope: Floats, who: NDArray[np.intp]) -> tuple[Floats, Floats]:
        """One step of s by Runge and Kutta's fourth order: the new front and the usage it took."""

        def over_s(at: Floats, r: Floats) -> tuple[Floats, Floats]:
            v = np.sum(r / at, axis=0)
            # A stage beyond what can be evaluated keeps the step's own speed; it then ends.
            v = np.where(v > 0.0, v, first)
            r = np.where(v > 0.0, r, slope)
            return r / v, 1.0 / v

        first = np.sum(slope / x, axis=0)
        k1, u1 = slope / first, 1.0 / first
        at = x + 0.5 * STEP * k1
        k2, u2 = over_s(at, self.speed(at, who))
        at = x + 0.5 * STEP * k2
        k3, u3 = over_s(at, self.speed(at, who))
        at = x + STEP * k3
        k4, u4 = over_s(at, self.speed(at, who))
        new = x + STEP / 6.0 * (k1 + 2.0 * k2 + 2.0 * k3 + k4)
        return new, STEP / 6.0 * (u1 + 2.0 * u2 + 2.0 * u3 + u4)

    def over(self, x: Floats, who: NDArray[np.intp]) -> Bools:
        """True where the crack has failed, broken through or left a published range."""
        kind, body = self.corner.kind, self.corner.body
        look = replace(
            self.look,
            # One look for all samples: its numbers broadcast.
            toughness=cast(float, self.look.toughness * self.samples.toughness[who]),
            reserve=cast(float, self.look.reserve * self.samples.stress[who]),
        )
        with np.errstate(all="ignore"):
            room = np.min(np.atleast_2d(kind.wall(x, body)), axis=0)
            left = margin(look, self.corner, x)
            inside = np.broadcast_to(kind.inside(x, body), room.shape)
        ended = np.asarray(~(left > 0.0) | ~(room > 0.0) | ~inside)
        return ended | self.runs_away(x, who)

    def runs_away(self, x: Floats, who: NDArray[np.intp]) -> Bools:
        """True where the growth law itself has the crack fail."""
        law = self.law(who)
        if law.k_c is None or not self.blocks:
            return np.zeros(x.shape[1], dtype=bool)
        drive = drive_of(self.blocks)
        with np.errstate(all="ignore"):
            unit_k = k_by_load(self.corner.kind, x, drive.names, self.corner.body)
            return unstable(*effective_ranges(drive, unit_k, law), law)

    def halved(
        self,
        x: Floats,
        slope: Floats,
        new_x: Floats,
        new_slope: Floats,
        took: Floats,
        who: NDArray[np.intp],
    ) -> Floats:
        """The share of a step's usage after which its end is met."""
        low, high = np.zeros(len(took)), np.ones(len(took))
        for _ in range(_HALVINGS):
            middle = 0.5 * (low + high)
            beyond = self.over(hermite(x, slope, new_x, new_slope, took, middle), who)
            low, high = np.where(beyond, low, middle), np.where(beyond, middle, high)
        return 0.5 * (low + high)


def hermite(
    x: Floats, slope: Floats, new_x: Floats, new_slope: Floats, took: Floats, share: Floats
) -> Floats:
    """The cubic through both ends of a step with their slopes, at a share of its usage."""
    s, one = share, 1.0 - share
    return np.asarray(
        one * one * (1.0 + 2.0 * s) * x
        + s * one * one * took * slope
        + s * s * (3.0 - 2.0 * s) * new_x
        - s * s * one * took * new_slope
    )


def front_of(corner: Corner, depth: Floats | None, length: Floats | None) -> Floats:
    """Front variables of many sizes, (front variables, samples).

    Fronts are sums of sizes in nearly all kinds; where one is not, each size is asked for.
    """
    sizes = [one for one in (depth, length) if one is not None]
    count = len(sizes[0])

    def front(values: Sequence[float]) -> Floats:
        left = iter(values)
        d = None if depth is None else next(left)
        w = None if length is None else next(left)
        return np.asarray(corner.kind.front(d, w, corner.body), dtype=float)

    middle = [float(np.median(one)) for one in sizes]
    columns = []
    for n in range(len(sizes)):
        more = list(middle)
        more[n] *= 2.0
        columns.append((front(more) - front(middle)) / middle[n])

    def straight(values: Sequence[Any]) -> Floats:
        parts = [np.multiply.outer(c, v) for c, v in zip(columns, values, strict=True)]
        return np.asarray(sum(parts))

    probes = [[m * f for m, f in zip(middle, row, strict=False)] for row in ((1, 1), (0.7, 1.9))]
    if all(np.allclose(straight(p), front(p), rtol=1e-12, atol=0.0) for p in probes):
        return straight(sizes)
    return np.stack([front([float(one[n]) for one in sizes]) for n in range(count)], axis=1)


def at_usage(paths: Paths, usage: Floats) -> tuple[Floats, Floats]:
    """Front and slope at a usage of each sample's clock, (front variables, samples); the end's size
    with slope nil beyond the end, the start's before it."""
    count = paths.usage.shape[1]
    rows = np.arange(count)
    after = np.clip(np.sum(paths.usage <= usage, axis=0), 1, max(len(paths.usage) - 1, 1))
    if len(paths.usage) == 1:
        return paths.x[0], np.zeros_like(paths.x[0])
    before = after - 1
    took = paths.usage[after, rows] - paths.usage[before, rows]
    moving = took > 0.0
    share = np.divide(usage - paths.usage[before, rows], took, out=np.zeros(count), where=moving)
    share = np.clip(share, 0.0, 1.0)
    a, b = paths.x[before, :, rows].T, paths.x[after, :, rows].T
    va, vb = paths.slope[before, :, rows].T, paths.slope[after, :, rows].T
    with np.errstate(invalid="ignore"):
        x = hermite(a, va, b, vb, took, share)
    slope = va + share * (vb - va)
    ended = usage >= paths.end
    still = ended | ~moving
    return np.where(ended, paths.last, x), np.where(still, 0.0, slope)
