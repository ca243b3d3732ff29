"""Probability of detection against size."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from scipy.special import expit, log_expit, log_ndtr, logit, ndtr, ndtri

from assessment.validity import Floats

SHAPES = ("log-odds", "log-normal")
MOST = 0.99
"""No method finds every crack of any size: paint, dirt, a missed spot (common practice, no
source)."""


@dataclass(frozen=True)
class Curve:
    """POD(a) = F((ln a − μ)/σ), F the logistic ("log-odds") or the normal ("log-normal") function.

    mu : log of the size found in half of all looks, of a in the unit of ``size``; sigma : spread >
    0 dimension : "length" or "depth", what a is; most : no probability above this, below 1 Source:
    MIL-HDBK-1823A (2009), appendix G, hit/miss models; ASTM E2862. With g = β₀ + β₁ ln a there, μ =
    −β₀/β₁ and σ = 1/β₁. The cap is ours.
    """

    shape: str
    mu: float
    sigma: float
    dimension: str
    most: float = MOST

    def __post_init__(self) -> None:
        if self.shape not in SHAPES:
            raise ValueError(f"a detection curve is one of {', '.join(SHAPES)}, not {self.shape!r}")
        if not self.sigma > 0.0:
            raise ValueError("the spread of a detection curve is above nil")
        if not 0.0 < self.most < 1.0:
            raise ValueError("the most that a method finds lies between 0 and 1")

    def probability(self, size: Floats | float) -> Floats:
        """Probability of finding a crack of this size, capped."""
        return np.minimum(self.uncapped(size), self.most)

    def uncapped(self, size: Floats | float) -> Floats:
        """The curve itself; nil at nil size."""
        with np.errstate(divide="ignore"):
            z = (np.log(np.asarray(size, dtype=float)) - self.mu) / self.sigma
        return np.asarray(expit(z) if self.shape == "log-odds" else ndtr(z))

    def size_found(self, probability: float) -> float:
        """The size found with this probability. Raises ValueError at or above the cap."""
        if not 0.0 < probability < self.most:
            raise ValueError(f"the curve gives probabilities between 0 and {self.most:g}")
        return float(np.exp(self.mu + self.sigma * score(self.shape, probability)))


def score(shape: str, probability: float) -> float:
    """F⁻¹ of a probability."""
    return float(logit(probability) if shape == "log-odds" else ndtri(probability))


def log_shares(shape: str, z: Floats) -> tuple[Floats, Floats]:
    """ln F(z) and ln(1 − F(z)), exact in both tails."""
    logs = log_expit if shape == "log-odds" else log_ndtr
    return np.asarray(logs(z)), np.asarray(logs(-z))


def found_in_any(probabilities: Sequence[float], independent: bool = False) -> float:
    """Probability that at least one of several looks finds the crack.

    By default full dependence: what hides a crack from one look hides it from the next by the same
    method, so that it is the best single look. ``independent`` : looks that a person has shown to
    be (another method, another access): 1 − Π (1 − p), still capped. Source: common practice, no
    source.
    """
    values = np.asarray(probabilities, dtype=float)
    if not values.size:
        return 0.0
    if not independent:
        return float(np.max(values))
    return min(1.0 - float(np.prod(1.0 - values)), MOST)
