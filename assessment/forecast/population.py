"""What a fleet teaches: how log rate and exponent scatter between cracks, how rates wander.

Of crack i, (θᵢ, pᵢ) ~ N(μ, Σ), and all share the curvature κ that geometry gives; its rate wanders
(``wander``); a reading at time t has the error of its recording, and one in its time that all
cracks read at t share: y = a(t) + a'(t)·(D(t) + c_t) + e. Straightened at each crack's fitted path
(``outline``) all of it is normal given the seven spreads, and the paths, μ, κ and c integrate out
exactly. The spreads themselves are integrated by importance sampling from a Student t at their
mode.

Sources: the straightened hierarchical model of M. J. Lindstrom & D. M. Bates, Biometrics 46 (1990)
673-687; C. J. Lu & W. Q. Meeker, Technometrics 35 (1993) 161-174, for its use on crack sizes.
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from scipy.optimize import minimize
from scipy.special import gammaln

from assessment.validity import Floats

from . import priors
from .outline import Readings, first_guess, fitted, rates_at, readings, sizes_at, slopes
from .points import effective_size, normals, weights_of
from .rate_law import curvature_lead
from .wander import clock_covariance

_DRAWS = 256
_FREEDOM = 6
_ROUNDS = 3
_FLAT = 100.0
_SEED = 1


@dataclass(frozen=True)
class Population:
    """What was learned, as weighted draws of the spreads. Sizes over ``reference``.

    cracks : how many it was learned from
    weights : (draws,); mean : of (θ, p), (draws, 2); covariance : of a further crack's (θ, p) about
    it, uncertainty of μ included, (draws, 2, 2); curvature : κ, (draws,); wander_sd, wander_span,
    error_sd : (draws,) common_times, common_mean, common_sd : readings' times and the error they
    share, in time common_unseen_sd : of the error at a time that the fleet has not seen effective :
    effective number of the draws
    """

    cracks: int
    reference: float
    weights: Floats
    mean: Floats
    covariance: Floats
    curvature: Floats
    wander_sd: Floats
    wander_span: Floats
    error_sd: Floats
    common_times: Floats
    common_mean: Floats
    common_sd: Floats
    common_unseen_sd: float
    effective: float


@dataclass(frozen=True)
class _Straight:
    """The fleet straightened: y − f + Jφ̂ at each reading, and what it takes to weigh it."""

    values: Floats
    jacobian: Floats
    rates: Floats
    times: Floats
    there: Floats
    at_time: Floats
    curved: Floats
    start: Floats


@dataclass(frozen=True)
class _Scales:
    """Medians that the spreads' priors stand on: readings' span and spacing, recording step."""

    span: float
    spacing: float
    step: float


@dataclass(frozen=True)
class _Fit:
    """For each draw of spreads: log posterior, and normal of z = (μ, κ, c)."""

    log_posterior: Floats
    mean: Floats
    covariance: Floats


def learn(paths: Sequence[tuple[Floats, Floats]], step: float) -> Population:
    """The population of complete (or running) readings of other cracks.

    paths : (times, sizes) of each crack; step : to which sizes are recorded, in the same unit
    Raises ValueError as ``readings`` does, and where there is no crack at all.
    """
    if not paths:
        raise ValueError("a fleet has at least one crack")
    reference = float(np.exp(np.mean(np.concatenate([np.log(sizes) for _, sizes in paths]))))
    data = readings(paths, reference)
    scales = _scales(data, step / reference)
    times = np.unique(np.round(data.times[data.there], 12))
    guess = first_guess(data, priors.EXPONENT_MEAN)
    sd = float(np.sqrt(_reading_variance(np.log(priors.READING_ERROR.median), scales)))
    middle = np.array([np.median(guess[0]), priors.EXPONENT_MEAN])
    spread = np.array([priors.LOG_RATE_SD, priors.EXPONENT_SD])
    spreads, path = _prior_mean(), fitted(data, guess, middle, spread, sd)
    for _ in range(_ROUNDS):
        straight = _straighten(data, path, times)
        spreads = _mode(straight, spreads, scales)
        found = _fit(straight, spreads[:, None], scales)
        covariance = _between(spreads[:, None])[0]
        inner = np.sqrt(np.diag(covariance + found.covariance[0, :2, :2]))
        path = fitted(data, path, found.mean[0, :2], inner, sd)
    return _sampled(_straighten(data, path, times), spreads, scales, times, reference)


def _scales(data: Readings, step: float) -> _Scales:
    last = np.max(data.elapsed, axis=1)
    gaps = np.diff(data.times, axis=1)
    return _Scales(float(np.median(last)), float(np.median(gaps[gaps > 0.0])), step)


_PRIORS = (
    priors.RATE_BETWEEN,
    priors.EXPONENT_BETWEEN,
    priors.Lognormal(1.0, priors.CORRELATION_SD),
    priors.WANDER,
    priors.WANDER_SPAN,
    priors.READING_ERROR,
    priors.COMMON_TIME,
)
# What is held of μ and κ before: as good as nothing of the rate, so nil does as its mean.
_CENTRE = np.array([0.0, priors.EXPONENT_MEAN, priors.CURVATURE_MEAN])
_PRIOR_SD = np.array([one.log_sd for one in _PRIORS])


def _prior_mean() -> Floats:
    return np.log([one.median for one in _PRIORS])


def _reading_variance(log_error: Floats | float, scales: _Scales) -> Floats:
    error = np.exp(log_error) * scales.step
    return np.asarray(np.square(error) + priors.rounding_variance(scales.step))


def _between(spreads: Floats) -> Floats:
    """Σ of each draw, shape (draws, 2, 2)."""
    rate, exponent, correlation = np.exp(spreads[0]), np.exp(spreads[1]), np.tanh(spreads[2])
    cross = rate * exponent * correlation
    return np.moveaxis(np.array([[rate**2, cross], [cross, exponent**2]]), -1, 0)


def _straighten(data: Readings, path: Floats, times: Floats) -> _Straight:
    size = sizes_at(path, data.elapsed)
    usable = data.there & np.isfinite(size)
    jacobian = np.where(usable[..., None], slopes(path, data.elapsed), 0.0)
    linear = np.einsum("cri,ic->cr", jacobian, path)
    at_time = np.isclose(data.times[..., None], times, rtol=0.0, atol=1e-9) & usable[..., None]
    return _Straight(
        values=np.where(usable, data.sizes - np.where(usable, size, 0.0) + linear, 0.0),
        jacobian=jacobian,
        rates=np.where(usable, rates_at(path, np.where(usable, size, 1.0)), 0.0),
        times=data.times,
        there=usable.astype(float),
        at_time=at_time.astype(float),
        curved=np.where(usable, curved_lead(path, np.where(usable, size, 1.0)), 0.0),
        start=path[2],
    )


def curved_lead(path: Floats, size: Floats) -> Floats:
    """Lead of the clock for each unit of curvature."""
    small = 1e-3
    start = np.exp(path[2])[:, None]
    lead = curvature_lead(start, size, path[0][:, None], path[1][:, None], np.asarray(small))
    return lead / small


def _noise(s: _Straight, spreads: Floats, scales: _Scales) -> Floats:
    """Covariance of the readings about the crack's own path, (draws, cracks, readings,
    readings)."""
    sd = np.exp(spreads[3])[:, None]
    span = np.exp(spreads[4])[:, None] * scales.span
    wander = clock_covariance(s.times[None], sd, span)
    wander = wander * (s.rates[..., :, None] * s.rates[..., None, :])
    own = _reading_variance(spreads[5], scales)[:, None, None]
    diagonal = np.where(s.there > 0.0, own, 1.0)
    return np.asarray(wander + diagonal[..., None] * np.eye(s.times.shape[1]))


def _fit(s: _Straight, spreads: Floats, scales: _Scales) -> _Fit:
    """Log posterior of the spreads, with paths, μ and c integrated out. spreads : (7, draws)."""
    draws, seen = spreads.shape[1], s.at_time.shape[-1]
    effects = np.zeros((draws, 3, 3))
    effects[:, :2, :2] = _between(spreads)
    effects[:, 2, 2] = _FLAT
    covariance = _noise(s, spreads, scales) + np.einsum(
        "cri,dij,csj->dcrs", s.jacobian, effects, s.jacobian
    )
    shifts = np.concatenate([s.curved[..., None], s.at_time], axis=-1)
    shared = np.concatenate([s.jacobian[..., :2], s.rates[..., None] * shifts], axis=-1)
    # ln x₀ is measured from the fitted one, μ from a point amid the fleet.
    centre = np.r_[_CENTRE, np.zeros(seen)]
    left = s.values - shared @ centre - s.jacobian[..., 2] * s.start[:, None]
    lower = np.linalg.cholesky(covariance)
    both = np.concatenate([shared, left[..., None]], axis=-1)
    white = np.linalg.solve(lower, np.broadcast_to(both, (draws, *both.shape)))
    gram = np.einsum("dcri,dcrj->dij", white, white)
    prior_precision = np.concatenate(
        [
            np.full((draws, 1), priors.LOG_RATE_SD**-2.0),
            np.full((draws, 1), priors.EXPONENT_SD**-2.0),
            np.full((draws, 1), priors.CURVATURE_SD**-2.0),
            np.repeat(np.exp(-2.0 * spreads[6])[:, None] / scales.spacing**2, seen, axis=1),
        ],
        axis=1,
    )
    precision = gram[:, :-1, :-1] + prior_precision[:, :, None] * np.eye(3 + seen)
    push = gram[:, :-1, -1]
    root = np.linalg.cholesky(precision)
    shift = np.linalg.solve(precision, push[..., None])[..., 0]
    half_logs = np.log(np.diagonal(lower, axis1=-2, axis2=-1)).sum(axis=(1, 2))
    fit = gram[:, -1, -1]
    log_likelihood = (
        -half_logs
        - np.log(np.diagonal(root, axis1=-2, axis2=-1)).sum(axis=1)
        + 0.5 * np.log(prior_precision).sum(axis=1)
        - 0.5 * (fit - np.einsum("di,di->d", push, shift))
    )
    prior = -0.5 * np.sum(((spreads.T - _prior_mean()) / _PRIOR_SD) ** 2, axis=1)
    return _Fit(log_likelihood + prior, centre + shift, np.linalg.inv(precision))


def _mode(s: _Straight, begin: Floats, scales: _Scales) -> Floats:
    nudges = 1e-4 * np.concatenate([np.zeros((7, 1)), np.eye(7), -np.eye(7)], axis=1)

    def down(at: Floats) -> tuple[float, Floats]:
        value = -_fit(s, at[:, None] + nudges, scales).log_posterior
        return float(value[0]), (value[1:8] - value[8:]) / 2e-4

    limits = [(m - 5.0 * d, m + 5.0 * d) for m, d in zip(_prior_mean(), _PRIOR_SD, strict=True)]
    return np.asarray(minimize(down, begin, jac=True, method="L-BFGS-B", bounds=limits).x)


def _hessian(s: _Straight, at: Floats, scales: _Scales) -> Floats:
    size, unit = 0.05, np.eye(7)
    ends = [
        at + size * (a * unit[i] + b * unit[j])
        for i in range(7)
        for j in range(7)
        for a, b in ((1, 1), (1, -1), (-1, 1), (-1, -1))
    ]
    value = -_fit(s, np.array(ends).T, scales).log_posterior.reshape(7, 7, 4)
    return np.asarray((value @ np.array([1.0, -1.0, -1.0, 1.0])) / (4.0 * size**2))


def _sampled(
    s: _Straight, mode: Floats, scales: _Scales, times: Floats, reference: float
) -> Population:
    values, vectors = np.linalg.eigh(_hessian(s, mode, scales))
    # Where the data say nothing, the prior's own spread is the widest that is needed.
    widths = 1.0 / np.sqrt(np.maximum(values, np.max(_PRIOR_SD) ** -2.0))
    points = normals(_DRAWS, 8 + _FREEDOM, _SEED)
    stretch = np.sqrt(_FREEDOM / np.sum(points[7:-1] ** 2, axis=0))
    student = points[:7] * stretch
    spreads = mode[:, None] + vectors @ (widths[:, None] * student)
    log_proposal = -0.5 * (_FREEDOM + 7) * np.log1p(np.sum(student**2, axis=0) / _FREEDOM)
    found = _fit(s, spreads, scales)
    weights = weights_of(found.log_posterior - log_proposal)
    # κ is drawn, and μ is then what it is with that κ.
    curvature_var = found.covariance[:, 2, 2]
    curved = np.sqrt(curvature_var) * points[-1]
    gain = found.covariance[:, :2, 2] / curvature_var[:, None]
    of_mean = found.covariance[:, :2, :2] - gain[:, :, None] * found.covariance[:, None, 2, :2]
    common = found.mean[:, 3:]
    mean = weights @ common
    variance = np.diagonal(found.covariance, axis1=1, axis2=2)[:, 3:]
    spread = weights @ (variance + (common - mean) ** 2)
    return Population(
        cracks=len(s.times),
        reference=reference,
        weights=weights,
        mean=found.mean[:, :2] + gain * curved[:, None],
        covariance=_between(spreads) + of_mean,
        curvature=found.mean[:, 2] + curved,
        wander_sd=np.exp(spreads[3]),
        wander_span=np.exp(spreads[4]) * scales.span,
        error_sd=np.exp(spreads[5]) * scales.step * reference,
        common_times=times,
        common_mean=mean,
        common_sd=np.sqrt(spread),
        common_unseen_sd=float(np.sqrt(weights @ np.exp(2.0 * spreads[6]))) * scales.spacing,
        effective=effective_size(weights),
    )


def log_student_norm(freedom: int, dimensions: int) -> float:
    """Log of the constant of a multivariate Student t of unit scale."""
    return float(
        gammaln(0.5 * (freedom + dimensions))
        - gammaln(0.5 * freedom)
        - 0.5 * dimensions * np.log(freedom * np.pi)
    )
