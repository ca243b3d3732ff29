"""What is held of one crack before its own readings: a mixture of normals, one for each draw.

With a fleet: the fleet's draws, and beside each a wide one, for the crack may be unlike its fleet.
By Laplace's rule of succession the chance that the next crack is of another sort than all n before
is 1/(n + 1) here (P. S. Laplace 1774, with one pseudo-count for each sort: 1/(n + 2) at the least).
Without a fleet: the wide priors alone.
"""

from dataclasses import dataclass

import numpy as np

from assessment.validity import Floats

from . import priors
from .points import normals
from .population import Population

_DRAWS = 512
_SEED = 2


@dataclass(frozen=True)
class Beliefs:
    """Weighted draws. Sizes over ``reference``; shapes (draws,), (draws, 2), (draws, 2, 2).

    unlike : True for the draws of a crack unlike its fleet
    common_mean, common_var : of the readings' shared error in time, (readings,)
    """

    reference: float
    log_weights: Floats
    mean: Floats
    covariance: Floats
    curvature: Floats
    wander_sd: Floats
    wander_span: Floats
    error_var: Floats
    unlike: np.ndarray[tuple[int], np.dtype[np.bool_]]
    common_mean: Floats
    common_var: Floats


def alone(times: Floats, sizes: Floats, step: float) -> Beliefs:
    """With no fleet. times, sizes : the crack's own readings, for their scale alone."""
    reference = float(np.exp(np.mean(np.log(sizes))))
    z = normals(_DRAWS, 4, _SEED)

    def spread(prior: priors.Lognormal, points: Floats) -> Floats:
        return np.asarray(prior.median * np.exp(prior.log_sd * points))

    growth = max(sizes[-1] - sizes[0], step)
    rate = np.log(growth / reference / (times[-1] - times[0]))
    span = times[-1] - times[0]
    covariance = np.diag(np.square([priors.LOG_RATE_SD, priors.EXPONENT_SD]))
    error = spread(priors.READING_ERROR, z[0]) * step
    return Beliefs(
        reference=reference,
        log_weights=np.full(_DRAWS, -np.log(_DRAWS)),
        mean=np.tile([float(rate), priors.EXPONENT_MEAN], (_DRAWS, 1)),
        covariance=np.tile(covariance, (_DRAWS, 1, 1)),
        curvature=priors.CURVATURE_MEAN + priors.CURVATURE_SD * z[3],
        wander_sd=spread(priors.WANDER, z[1]),
        wander_span=spread(priors.WANDER_SPAN, z[2]) * span,
        error_var=(error**2 + priors.rounding_variance(step)) / reference**2,
        unlike=np.zeros(_DRAWS, dtype=bool),
        common_mean=np.zeros(len(times)),
        common_var=np.zeros(len(times)),
    )


def with_fleet(fleet: Population, times: Floats, step: float) -> Beliefs:
    """Of a further crack of the fleet, read at ``times``."""
    chance = 1.0 / (fleet.cracks + 1.0)
    with np.errstate(divide="ignore"):
        logs = np.log(fleet.weights)
    wide = np.diag(np.square([priors.UNLIKE_LOG_RATE_SD, priors.EXPONENT_SD]))
    centre = np.column_stack([fleet.mean[:, 0], np.full(len(fleet.weights), priors.EXPONENT_MEAN)])
    common_mean, common_var = shared_error(fleet, times)
    error = (fleet.error_sd**2 + priors.rounding_variance(step)) / fleet.reference**2
    return Beliefs(
        reference=fleet.reference,
        log_weights=np.r_[logs + np.log1p(-chance), logs + np.log(chance)],
        mean=np.concatenate([fleet.mean, centre]),
        covariance=np.concatenate([fleet.covariance, fleet.covariance + wide]),
        curvature=np.tile(fleet.curvature, 2),
        wander_sd=np.tile(fleet.wander_sd, 2),
        wander_span=np.tile(fleet.wander_span, 2),
        error_var=np.tile(error, 2),
        unlike=np.repeat([False, True], len(logs)),
        common_mean=common_mean,
        common_var=common_var,
    )


def shared_error(fleet: Population, times: Floats) -> tuple[Floats, Floats]:
    """Mean and variance of the error in time that readings at ``times`` share with the fleet's."""
    same = np.isclose(np.asarray(times)[:, None], fleet.common_times, rtol=0.0, atol=1e-9)
    seen = np.any(same, axis=1)
    at = np.argmax(same, axis=1)
    mean = np.where(seen, fleet.common_mean[at], 0.0)
    variance = np.where(seen, fleet.common_sd[at] ** 2, fleet.common_unseen_sd**2)
    return np.asarray(mean), np.asarray(variance)
