"""From standard normals to samples of a crack: what scatters, and by how much.

z[0] log10 C, z[1] m, correlated normals; z[2] stress, z[3] toughness: log-normal factors, stress of
median 1, toughness of mean 1, since the document states the mean; z[4] depth, z[5] length at the
start: normal about the size measured there less its bias, cut off at nil; z[6], z[7] how much the
rate wanders and for how long (``priors``). Source for the shapes: common practice, no source; log10
C and m as correlated normals as in D. A. Virkler, B. M. Hillberry & P. K. Goel, J. Eng. Mater.
Technol. 101 (1979) 148-153.
"""

from dataclasses import dataclass

import numpy as np
from scipy.special import ndtr, ndtri

from assessment.corners import Corner
from assessment.document.case import Case, Uncertainty
from assessment.validity import Floats

from . import priors
from .looks import Start
from .paths import Samples, front_of

DIMENSIONS = 8
NEEDED = ("log10_c_sd", "m_sd", "c_m_correlation", "toughness_cov", "stress_cov")


@dataclass(frozen=True)
class Scatter:
    """Standard deviations that the document gives; none is missing."""

    log10_c: float
    m: float
    correlation: float
    toughness: float
    stress: float


def scatter_of(uncertainty: Uncertainty) -> Scatter:
    """Raises ValueError naming the first key that is missing."""
    values = [getattr(uncertainty, key) for key in NEEDED]
    for key, value in zip(NEEDED, values, strict=True):
        if value is None:
            raise ValueError(f"uncertainty.{key} is missing")
    return Scatter(values[0], values[1], values[2], values[3], values[4])


@dataclass(frozen=True)
class Drawn:
    """Samples for ``paths.run`` and what stands beside them, each (samples,).

    speed : by how much the clock runs faster than usage, 10^(δ log10 C)
    rest_mean, rest_sd : mean and sd of δ log10 C given m
    """

    samples: Samples
    speed: Floats
    wander_sd: Floats
    wander_span: Floats
    rest_mean: Floats
    rest_sd: float


def draw(z: Floats, scatter: Scatter, start: Start, corner: Corner, span: float) -> Drawn:
    """z : (8, samples); span : of the history or life, that wander's duration is measured by."""
    shift_m = scatter.m * z[1]
    rest_mean = scatter.log10_c * scatter.correlation * z[1]
    rest_sd = scatter.log10_c * float(np.sqrt(1.0 - scatter.correlation**2))
    log_c = rest_mean + rest_sd * z[0]
    stress_sd, toughness_sd = (
        np.sqrt(np.log1p(cov**2)) for cov in (scatter.stress, scatter.toughness)
    )
    depth, length = sizes(z[4:6], start)
    return Drawn(
        samples=Samples(
            start=front_of(corner, depth, length),
            exponent=shift_m,
            stress=np.exp(stress_sd * z[2]),
            toughness=np.exp(toughness_sd * z[3] - 0.5 * toughness_sd**2),
        ),
        speed=10.0**log_c,
        wander_sd=priors.WANDER.median * np.exp(priors.WANDER.log_sd * z[6]),
        wander_span=span * priors.WANDER_SPAN.median * np.exp(priors.WANDER_SPAN.log_sd * z[7]),
        rest_mean=rest_mean,
        rest_sd=rest_sd,
    )


def sizes(z: Floats, start: Start) -> tuple[Floats | None, Floats | None]:
    """True depth and length at the start, m, from standard normals (2, samples)."""
    length = None if start.length is None else _above_nil(start.length, start.length_sd, z[1])
    if start.ratio is not None and length is not None:
        return start.ratio * length * np.exp(start.ratio_log_sd * z[0]), length
    depth = None if start.depth is None else _above_nil(start.depth, start.depth_sd, z[0])
    return depth, length


def _above_nil(mean: float, sd: float, z: Floats) -> Floats:
    """Normal cut off at nil, from a standard normal."""
    if sd == 0.0:
        return np.full(z.shape, mean)
    # From the upper tail, where the digits of a probability near 1 would be lost.
    most = float(ndtr(mean / sd))
    # What cannot be told from nil or one is the nearest probability that can.
    tail = np.clip(most * ndtr(-z), np.finfo(float).tiny, np.nextafter(1.0, 0.0))
    return np.asarray(mean - sd * ndtri(tail))


def span_of(case: Case, start: Start, life: float) -> float:
    """What the duration of wander is measured by: the history where there is one, else the life."""
    now = case.usage.at
    if now is not None and start.at is not None and now > start.at:
        return now - start.at
    return life
