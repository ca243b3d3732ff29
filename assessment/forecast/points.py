"""Sample points and weights: scrambled Sobol normals, effective sample size, weighted quantiles."""

import numpy as np
from scipy.special import ndtri
from scipy.stats import qmc

from assessment.validity import Floats

# Sobol points lie strictly inside (0, 1) once scrambled, but a double can still round to an end.
_EDGE = 2.0**-40


def uniforms(count: int, dimensions: int, seed: int) -> Floats:
    """Scrambled Sobol points in (0, 1), shape (dimensions, count).

    count : a power of two keeps the points balanced; any other count raises ValueError
    Source: I. M. Sobol, USSR Comput. Math. Math. Phys. 7 (1967) 86-112; scrambling by A. B. Owen,
    J. Complexity 14 (1998) 466-489, as in scipy.stats.qmc.
    """
    if count < 1 or count & (count - 1):
        raise ValueError(f"the number of samples is a power of two, not {count}")
    rng = np.random.default_rng(seed)
    made = qmc.Sobol(dimensions, scramble=True, rng=rng)
    # Two scramblings of one sequence still run alike, so that samples of two calls would depend on
    # each other; in a shuffled order they do not.
    points: Floats = rng.permutation(made.random_base2(count.bit_length() - 1)).T
    return np.asarray(points * (1.0 - 2.0 * _EDGE) + _EDGE)


def normals(count: int, dimensions: int, seed: int) -> Floats:
    """Standard normals from scrambled Sobol points, shape (dimensions, count)."""
    return np.asarray(ndtri(uniforms(count, dimensions, seed)))


def weights_of(log_weights: Floats) -> Floats:
    """Weights that sum to 1. Raises ValueError where no sample has any weight."""
    finite = np.where(np.isnan(log_weights), -np.inf, log_weights)
    largest = np.max(finite)
    if not np.isfinite(largest):
        raise ValueError("no sample explains the history: all weights are nil")
    raw = np.exp(finite - largest)
    return np.asarray(raw / np.sum(raw))


def effective_size(weights: Floats) -> float:
    """Kish's effective sample size, 1 / Σ w² of weights that sum to 1.

    Source: L. Kish, Survey Sampling (1965), 11.7 (section from memory).
    """
    return float(1.0 / np.sum(weights * weights))


def systematic(weights: Floats, count: int) -> np.ndarray[tuple[int], np.dtype[np.intp]]:
    """Indices of ``count`` samples drawn evenly along the cumulative weights, in rising order."""
    at = (np.arange(count) + 0.5) / count
    return np.asarray(np.minimum(np.searchsorted(np.cumsum(weights), at), len(weights) - 1))


def quantiles(values: Floats, levels: Floats, weights: Floats) -> Floats:
    """Weighted quantiles; a value may be infinite.

    Interpolated between the middles of the samples' shares of probability, except towards an
    infinite value, which is taken as it is.
    """
    order = np.argsort(values)
    sorted_values, share = values[order], weights[order]
    middle = np.cumsum(share) - 0.5 * share
    upper = np.clip(np.searchsorted(middle, levels), 0, len(values) - 1)
    lower = np.maximum(upper - 1, 0)
    gap = middle[upper] - middle[lower]
    part = np.divide(levels - middle[lower], gap, out=np.ones_like(gap), where=gap > 0.0)
    low, high = sorted_values[lower], sorted_values[upper]
    with np.errstate(invalid="ignore"):
        between = low + np.clip(part, 0.0, 1.0) * (high - low)
    return np.asarray(np.where(np.isfinite(high) & np.isfinite(low), between, high))
