"""Readings of cracks as padded arrays, and their nominal paths straightened at a size each.

A path is φ = (θ, p, ln x₀): log rate and exponent (``rate_law``) and the log of the size at its
first reading, all over one reference size. Straightened at φ̂, a reading is y ≈ f(φ̂) + J·(φ − φ̂).
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from assessment.validity import Floats

from .rate_law import rate_at, size_after

_NUDGE = 1e-5
_STEPS = 30
_RIDGE = np.array([0.15, 0.6, 0.0])
"""Sd of one Newton step in θ and p, so that a first guess far off does not throw the path away."""


@dataclass(frozen=True)
class Readings:
    """Times and sizes of some cracks, shape (cracks, readings); ``there`` is False for padding.

    Padding repeats the last time, so that nothing is evaluated outside the readings.
    """

    times: Floats
    sizes: Floats
    there: NDArray[np.bool_]

    @property
    def elapsed(self) -> Floats:
        return np.asarray(self.times - self.times[:, :1])


def readings(paths: Sequence[tuple[Floats, Floats]], reference: float) -> Readings:
    """Padded arrays, sizes over the reference size.

    Raises ValueError where a crack has fewer than two readings, times that do not rise, or a size
    that is not above nil.
    """
    longest = max(len(times) for times, _ in paths)
    shape = (len(paths), longest)
    all_times, all_sizes = np.empty(shape), np.ones(shape)
    there = np.zeros(shape, dtype=bool)
    for row, (times, sizes) in enumerate(paths):
        count = len(times)
        if count < 2 or len(sizes) != count:
            raise ValueError("a crack needs at least two readings, each a time and a size")
        if not np.all(np.diff(times) > 0.0):
            raise ValueError("the times of readings rise from one to the next")
        if not np.all(np.asarray(sizes) > 0.0):
            raise ValueError("sizes are above nil")
        all_times[row] = np.r_[times, np.full(longest - count, times[-1])]
        all_sizes[row, :count] = np.asarray(sizes) / reference
        there[row, :count] = True
    return Readings(all_times, all_sizes, there)


def sizes_at(path: Floats, elapsed: Floats) -> Floats:
    """Nominal sizes, shape (cracks, readings). path : (3, cracks); elapsed : from the first one."""
    return size_after(elapsed, path[0][:, None], path[1][:, None], np.exp(path[2])[:, None])


def rates_at(path: Floats, sizes: Floats) -> Floats:
    """Nominal rates at nominal sizes."""
    return rate_at(sizes, path[0][:, None], path[1][:, None])


def slopes(path: Floats, elapsed: Floats) -> Floats:
    """J by central differences, shape (cracks, readings, 3)."""
    columns = []
    for row in range(3):
        nudge = np.zeros((3, 1))
        nudge[row] = _NUDGE
        more, less = sizes_at(path + nudge, elapsed), sizes_at(path - nudge, elapsed)
        columns.append((more - less) / (2.0 * _NUDGE))
    return np.stack(columns, axis=-1)


def first_guess(data: Readings, exponent: float) -> Floats:
    """θ from the mean rate at the mean size, shape (3, cracks)."""
    last = np.sum(data.there, axis=1) - 1
    rows = np.arange(len(last))
    span = data.times[rows, last] - data.times[:, 0]
    first, end = data.sizes[:, 0], data.sizes[rows, last]
    growth = np.maximum(end - first, 0.02 * first) / span
    theta = np.log(growth) - exponent * 0.5 * np.log(first * np.maximum(end, first))
    return np.array([theta, np.full_like(theta, exponent), np.log(first)])


def fitted(
    data: Readings, guess: Floats, prior_mean: Floats, prior_sd: Floats, sd: float
) -> Floats:
    """The likeliest path of each crack by damped Gauss-Newton, shape (3, cracks).

    prior_mean, prior_sd : of θ and p, shape (2,) or (2, cracks); sd : of a reading
    """
    path = guess.copy()
    precision = np.broadcast_to((1.0 / np.square(prior_sd)).T, (path.shape[1], 2))
    for _ in range(_STEPS):
        size = sizes_at(path, data.elapsed)
        good = data.there & np.isfinite(size)
        jacobian = np.where(good[..., None], slopes(path, data.elapsed), 0.0)
        jacobian = np.where(np.isfinite(jacobian), jacobian, 0.0) / sd
        left = np.where(good, data.sizes - np.where(good, size, 0.0), 0.0) / sd
        square = np.einsum("cri,crj->cij", jacobian, jacobian)
        square[:, [0, 1], [0, 1]] += precision
        square[:, 2, 2] += 1e-6
        push = np.einsum("cri,cr->ci", jacobian, left)
        push[:, :2] += precision * (np.broadcast_to(prior_mean.T, (len(push), 2)) - path[:2].T)
        step = np.linalg.solve(square, push[..., None])[..., 0]
        longest = np.max(np.abs(step[:, :2]) / (2.0 * _RIDGE[:2]), axis=1, keepdims=True)
        step = step / np.maximum(longest, 1.0)
        path = path + step.T
        if np.max(np.abs(step)) < 1e-9:
            break
    return path
