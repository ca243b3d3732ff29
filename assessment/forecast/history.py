"""A crack trended by its sizes alone: from its readings, and its fleet where there is one, to where
it will be. No stress is needed, and none is known.

Samples of the path φ = (θ, p, ln x₀) and of the spreads are drawn from a Student t about the
likeliest path, once for each draw of what was held before (``beliefs``), and weighted by the exact
posterior; wander is integrated by the Kalman filter of ``wander`` and drawn only to look ahead.
"""

from dataclasses import dataclass

import numpy as np
from scipy.special import ndtri
from scipy.stats import chi2

from assessment.validity import Floats

from .beliefs import Beliefs, alone, shared_error, with_fleet
from .outline import Readings, first_guess, fitted, rates_at, readings, sizes_at, slopes
from .points import effective_size, normals, quantiles, systematic, uniforms, weights_of
from .population import Population, curved_lead
from .rate_law import curvature_lead, rate_at, size_after, time_between
from .wander import State, advance, ahead, clock_covariance, drawn, measured, start, time_through

SAMPLES = 4096
_SEED = 3
_FREEDOM = 7
_WIDER = 1.1
_FLAT = 25.0
_STEPS_TO_SIZE = 40
_STEPS_TO_TIME = 3


@dataclass(frozen=True)
class Trend:
    """Weighted samples of a crack's path as its readings leave it; see ``trend``.

    path : (3, samples); lead, wander : D and w at the last reading; sizes over ``reference``
    effective : effective sample size; unlike : probability that the crack is unlike its fleet
    """

    reference: float
    first: float
    last: float
    weights: Floats
    path: Floats
    curvature: Floats
    lead: Floats
    wander: Floats
    wander_sd: Floats
    wander_span: Floats
    error_var: Floats
    step: float
    fleet: Population | None
    effective: float
    unlike: float

    @property
    def samples(self) -> int:
        return len(self.weights)


def trend(
    times: Floats,
    sizes: Floats,
    step: float,
    fleet: Population | None = None,
    samples: int = SAMPLES,
    seed: int = _SEED,
) -> Trend:
    """The crack's path given its readings.

    times, sizes : at least two readings, times rising; step : to which sizes are recorded (0 where
    they are not rounded is not possible: the reading error stands on it); fleet : what other cracks
    taught, in the same units. Raises ValueError where the readings cannot be used.
    """
    if not step > 0.0:
        raise ValueError("the step to which sizes are recorded is above nil")
    times, sizes = np.asarray(times, dtype=float), np.asarray(sizes, dtype=float)
    held = alone(times, sizes, step) if fleet is None else with_fleet(fleet, times, step)
    data = readings([(times + held.common_mean, sizes)], held.reference)
    likeliest = _likeliest(data, held)
    normal = _straight(data, likeliest, held)
    return _weighted(data, held, normal, step, fleet, samples, seed)


def _likeliest(data: Readings, held: Beliefs) -> Floats:
    """The path that reads best, with what was held as a broad guide."""
    weights = np.exp(held.log_weights)
    mean = weights @ held.mean
    spread = np.einsum("d,dii->i", weights, held.covariance) + weights @ (held.mean - mean) ** 2
    sd = float(np.sqrt(weights @ held.error_var))
    return fitted(data, first_guess(data, mean[1]), mean, np.sqrt(spread), sd)


@dataclass(frozen=True)
class _Normals:
    """For each draw: normal of φ and the weight of the draw, both to first order."""

    mean: Floats
    root: Floats
    log_evidence: Floats


def _straight(data: Readings, path: Floats, held: Beliefs) -> _Normals:
    """The posterior to first order about ``path``, for each draw of what was held."""
    size = sizes_at(path, data.elapsed)
    jacobian, rates = slopes(path, data.elapsed)[0], rates_at(path, size)[0]
    value = (data.sizes - size)[0] + jacobian @ path[:, 0]
    noise = clock_covariance(data.times, held.wander_sd, held.wander_span)
    noise = noise + np.diag(held.common_var)
    noise = noise * np.multiply.outer(rates, rates)
    noise = noise + held.error_var[:, None, None] * np.eye(len(value))
    prior = np.zeros((len(noise), 3, 3))
    prior[:, :2, :2] = held.covariance
    prior[:, 2, 2] = _FLAT
    centre = np.column_stack([held.mean, np.full(len(noise), path[2, 0])])
    spread = noise + np.einsum("ri,dij,sj->drs", jacobian, prior, jacobian)
    left = value - centre @ jacobian.T
    gain = prior @ jacobian.T @ np.linalg.inv(spread)
    covariance = prior - gain @ jacobian @ prior
    covariance = 0.5 * (covariance + covariance.transpose(0, 2, 1))
    sign_free = np.linalg.slogdet(spread)[1]
    curved = curved_lead(path, size)
    left = left - np.outer(held.curvature, curved[0] * rates)
    gain = prior @ jacobian.T @ np.linalg.inv(spread)
    mean = centre + np.einsum("dir,dr->di", gain, left)
    misfit = np.einsum("dr,dr->d", left, np.linalg.solve(spread, left[..., None])[..., 0])
    return _Normals(mean, _root(covariance), -0.5 * (sign_free + misfit))


def _root(covariance: Floats) -> Floats:
    """Lower root; a hair is added to the diagonal, relative, against rounding."""
    scale = np.diagonal(covariance, axis1=1, axis2=2)[:, :, None] * np.eye(3)
    return np.asarray(np.linalg.cholesky(covariance + 1e-9 * scale))


def _weighted(
    data: Readings,
    held: Beliefs,
    normal: _Normals,
    step: float,
    fleet: Population | None,
    samples: int,
    seed: int,
) -> Trend:
    chosen = systematic(weights_of(held.log_weights + normal.log_evidence), samples)
    path, log_proposal = _proposed(normal, chosen, samples, seed)
    state = _filtered(data, path, held, chosen)
    off = path[:2].T - held.mean[chosen]
    precision = np.linalg.inv(held.covariance)
    log_det = np.linalg.slogdet(held.covariance)[1]
    log_prior = -0.5 * (np.einsum("ni,nij,nj->n", off, precision[chosen], off) + log_det[chosen])
    logs = log_prior + state.log_likelihood - log_proposal - normal.log_evidence[chosen]
    weights = weights_of(logs)
    lead, wander = drawn(state, *normals(samples, 2, seed + 1))
    return Trend(
        reference=held.reference,
        first=float(data.times[0, 0]),
        last=float(data.times[0, -1]),
        weights=weights,
        path=path,
        curvature=held.curvature[chosen],
        lead=lead,
        wander=wander,
        wander_sd=held.wander_sd[chosen],
        wander_span=held.wander_span[chosen],
        error_var=held.error_var[chosen],
        step=step,
        fleet=fleet,
        effective=effective_size(weights),
        unlike=float(weights @ held.unlike[chosen]),
    )


def _proposed(
    normal: _Normals, chosen: np.ndarray[tuple[int], np.dtype[np.intp]], samples: int, seed: int
) -> tuple[Floats, Floats]:
    """Student t about each draw's normal, and its log density up to a constant."""
    points = uniforms(samples, 4, seed)
    student = ndtri(points[:3]) * np.sqrt(_FREEDOM / chi2.ppf(points[3], _FREEDOM))
    root = _WIDER * normal.root[chosen]
    path = normal.mean[chosen] + np.einsum("nij,jn->ni", root, student)
    log_det = np.sum(np.log(np.diagonal(root, axis1=1, axis2=2)), axis=1)
    tail = 0.5 * (_FREEDOM + 3) * np.log1p(np.sum(student**2, axis=0) / _FREEDOM)
    return path.T, -tail - log_det


def _filtered(
    data: Readings, path: Floats, held: Beliefs, chosen: np.ndarray[tuple[int], np.dtype[np.intp]]
) -> State:
    """(D, w) at the last reading and the likelihood of all, for each sample."""
    sd, span, own = held.wander_sd[chosen], held.wander_span[chosen], held.error_var[chosen]
    state, before = start(path.shape[1], sd), 0.0
    for n, elapsed in enumerate(data.elapsed[0]):
        if n:
            state = advance(state, elapsed - before, sd, span)
        size = _size(np.asarray(elapsed), path, held.curvature[chosen])
        rate = rate_at(size, path[0], path[1])
        variance = own + np.where(np.isfinite(rate), rate, 0.0) ** 2 * held.common_var[n]
        state = measured(state, data.sizes[0, n] - size, rate, variance)
        before = elapsed
    return state


def _size(clock: Floats, path: Floats, curvature: Floats) -> Floats:
    """Nominal size at a clock time; the lead by curvature is that of the way itself, so it is
    found by going round twice."""
    start_size = np.exp(path[2])
    size = size_after(clock, path[0], path[1], start_size)
    if np.any(curvature != 0.0):
        for _ in range(2):
            lead = curvature_lead(start_size, size, path[0], path[1], curvature)
            size = size_after(clock + lead, path[0], path[1], start_size)
    return size


def sizes_ahead(one: Trend, times: Floats) -> Floats:
    """Sizes at ``times`` from the last reading on, shape (times, samples); infinite where the crack
    has run away by then. Raises ValueError for a time before the last reading."""
    times = np.asarray(times, dtype=float)
    if np.any(np.diff(times) < 0.0) or np.any(times < one.last - 1e-9 * abs(one.last) - 1e-12):
        raise ValueError("times ahead rise, from the last reading on")
    made = []
    lead, wander, now = one.lead, one.wander, one.last
    steps = normals(one.samples, _STEPS_TO_TIME * len(times), 5)
    for n, time in enumerate(times):
        part = np.full(one.samples, max(time - now, 0.0) / _STEPS_TO_TIME)
        noise = steps[n * _STEPS_TO_TIME : (n + 1) * _STEPS_TO_TIME]
        leads, wanders = ahead(lead, wander, part, one.wander_sd, one.wander_span, noise)
        lead, wander, now = leads[-1], wanders[-1], max(time, now)
        clock = now - one.first + lead
        made.append(one.reference * _size(clock, one.path, one.curvature))
    return np.array(made)


def recorded_ahead(one: Trend, times: Floats) -> Floats:
    """As ``sizes_ahead``, as they will be recorded: with the errors of reading, of rounding (as a
    spread, not as steps), and of the time that the fleet's readings then shared."""
    times = np.asarray(times, dtype=float)
    mean, variance = np.zeros(len(times)), np.zeros(len(times))
    if one.fleet is not None:
        mean, variance = shared_error(one.fleet, times)
    noise = normals(one.samples, 2 * len(times), 7)
    shifted = np.maximum(times + mean, one.last)
    sizes = sizes_ahead(one, np.maximum.accumulate(shifted))
    rates = one.reference * rate_at(sizes / one.reference, one.path[0], one.path[1])
    own = one.reference * np.sqrt(one.error_var) * noise[: len(times)]
    shared = np.sqrt(variance)[:, None] * noise[len(times) :]
    with np.errstate(invalid="ignore"):
        return np.where(np.isfinite(sizes), sizes + own + rates * shared, np.inf)


def times_to(one: Trend, size: float) -> Floats:
    """Times at which ``size`` is reached, for each sample; the last reading's where it is already
    beyond."""
    log_rate, exponent, start_size = one.path[0], one.path[1], np.exp(one.path[2])
    end = np.asarray(size / one.reference)
    goal = time_between(start_size, end, log_rate, exponent)
    goal = goal - curvature_lead(start_size, end, log_rate, exponent, one.curvature)
    clock = one.last - one.first + one.lead
    noise = normals(one.samples, _STEPS_TO_SIZE, 9)
    took = time_through(goal - clock, one.wander, one.wander_sd, one.wander_span, noise)
    return np.asarray(one.last + took)


def size_quantiles(one: Trend, sizes: Floats, levels: Floats) -> Floats:
    """Quantiles of each row of ``sizes``, shape (rows, levels)."""
    return np.array([quantiles(row, levels, one.weights) for row in sizes])
