"""A detection curve fitted to hits and misses, with likelihood-ratio bounds."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.optimize import brentq, minimize_scalar
from scipy.stats import chi2

from assessment.validity import Floats

from .curves import SHAPES, Curve, log_shares, score

ADVISED = 60
"""Hits and misses together that ASTM E2862 and MIL-HDBK-1823A ask for (from memory)."""
_STEPS = 100
_WIDEST = 40.0


@dataclass(frozen=True)
class Fit:
    """curve : the likeliest; a50, a90 : its sizes; a90_95 : upper 95 % bound of a90, None where the
    trials give no bound, then ``why_not``

    trials, hits : counts; cautions : in sentences
    """

    curve: Curve
    a50: float
    a90: float
    a90_95: float | None
    why_not: str | None
    log_likelihood: float
    trials: int
    hits: int
    cautions: tuple[str, ...]


def fit(
    sizes: Sequence[float] | Floats,
    hits: Sequence[bool] | NDArray[np.bool_],
    shape: str,
    dimension: str,
) -> Fit:
    """The likeliest curve of hit/miss trials.

    sizes : true sizes > 0, one for each trial; hits : True where the crack was found
    a90/95 is the upper end of a90 whose profile likelihood lies within χ²(0.90, 1)/2 of the
    largest, the one-sided bound of 95 %. Source: MIL-HDBK-1823A (2009), appendix G; the profile as
    in W. Q. Meeker & L. A. Escobar, Statistical Methods for Reliability Data (1998), ch. 8 (chapter
    from memory). Raises ValueError, in words, where no curve can be fitted.
    """
    a, found = _checked(sizes, hits, shape)
    x = np.log(a)
    beta = _likeliest(x, found, shape)
    if not beta[1] > 0.0:
        raise ValueError("larger cracks were not found more often: no detection curve fits")
    largest = _log_likelihood(beta, x, found, shape)
    curve = Curve(shape, float(-beta[0] / beta[1]), float(1.0 / beta[1]), dimension)
    bound, why_not = _upper(curve, x, found, largest)
    few = len(a) < ADVISED
    return Fit(
        curve=curve,
        a50=float(np.exp(curve.mu)),
        a90=curve.size_found(0.9),
        a90_95=bound,
        why_not=why_not,
        log_likelihood=largest,
        trials=len(a),
        hits=int(np.sum(found)),
        cautions=(f"Only {len(a)} trials; at least {ADVISED} are advised.",) if few else (),
    )


def _checked(
    sizes: Sequence[float] | Floats, hits: Sequence[bool] | NDArray[np.bool_], shape: str
) -> tuple[Floats, NDArray[np.bool_]]:
    a, found = np.asarray(sizes, dtype=float), np.asarray(hits, dtype=bool)
    if shape not in SHAPES:
        raise ValueError(f"a detection curve is one of {', '.join(SHAPES)}, not {shape!r}")
    if a.ndim != 1 or a.shape != found.shape:
        raise ValueError("each trial has one size and one answer: found or not")
    if not np.all(a > 0.0) or not np.all(np.isfinite(a)):
        raise ValueError("the size of every trial is above nil")
    if not np.any(found) or np.all(found):
        raise ValueError("a fit needs both hits and misses")
    if np.max(a[~found]) <= np.min(a[found]) or np.max(a[found]) <= np.min(a[~found]):
        raise ValueError(
            "the sizes of hits and misses do not overlap, so that any steep curve fits: trials of "
            "sizes in between are needed"
        )
    return a, found


def _log_likelihood(beta: Floats, x: Floats, found: NDArray[np.bool_], shape: str) -> float:
    hit, miss = log_shares(shape, beta[0] + beta[1] * x)
    return float(np.sum(np.where(found, hit, miss)))


def _likeliest(x: Floats, found: NDArray[np.bool_], shape: str) -> Floats:
    """Newton's method on β₀ + β₁ x; the log likelihood of both shapes is concave in β."""
    middle, scale = float(np.mean(x)), float(np.std(x))
    z = (x - middle) / scale
    design = np.c_[np.ones_like(z), z]
    beta, value = np.zeros(2), _log_likelihood(np.zeros(2), z, found, shape)
    for _ in range(_STEPS):
        slope, curvature = _derivatives(design @ beta, found, shape)
        push = design.T @ slope
        step = np.linalg.solve(design.T @ (curvature[:, None] * design), push)
        share = 1.0
        while _log_likelihood(beta + share * step, z, found, shape) < value and share > 1e-10:
            share *= 0.5
        beta = beta + share * step
        value = _log_likelihood(beta, z, found, shape)
        if np.max(np.abs(push)) < 1e-10 * len(x):
            return np.array([beta[0] - beta[1] * middle / scale, beta[1] / scale])
    raise ValueError("the fit of the detection curve did not converge")


def _derivatives(z: Floats, found: NDArray[np.bool_], shape: str) -> tuple[Floats, Floats]:
    """First derivative of each trial's log likelihood in z, and the second with its sign turned."""
    hit, miss = log_shares(shape, z)
    if shape == "log-odds":
        p = np.exp(hit)
        return np.where(found, 1.0 - p, -p), p * (1.0 - p)
    log_density = -0.5 * z**2 - 0.5 * np.log(2.0 * np.pi)
    up, down = np.exp(log_density - hit), np.exp(log_density - miss)
    return np.where(found, up, -down), np.where(found, up * (z + up), down * (down - z))


def _upper(
    curve: Curve, x: Floats, found: NDArray[np.bool_], largest: float
) -> tuple[float | None, str | None]:
    """Upper bound of a90 by its profile likelihood."""
    z90, allowed = score(curve.shape, 0.9), 0.5 * float(chi2.ppf(0.90, 1))
    likeliest = curve.mu + curve.sigma * z90

    def short(log_a90: float) -> float:
        return largest - _profile(log_a90, z90, curve, x, found) - allowed

    step = curve.sigma
    while short(likeliest + step) < 0.0:
        step *= 2.0
        if step > _WIDEST * curve.sigma:
            return None, "the trials do not bound the size found with 90 %: more are needed"
    return float(np.exp(brentq(short, likeliest, likeliest + step, xtol=1e-12))), None


def _profile(
    log_a90: float, z90: float, curve: Curve, x: Floats, found: NDArray[np.bool_]
) -> float:
    """Largest log likelihood of curves whose a90 is this one, over their spread."""

    def down(log_sigma: float) -> float:
        slope = np.exp(-log_sigma)
        beta = np.array([z90 - slope * log_a90, slope])
        return -_log_likelihood(beta, x, found, curve.shape)

    start = float(np.log(curve.sigma))
    # The likelihood is concave in the slope, so that there is one top in its log.
    best = minimize_scalar(
        down, bounds=(start - 6.0, start + 6.0), method="bounded", options={"xatol": 1e-9}
    )
    return -float(best.fun)
