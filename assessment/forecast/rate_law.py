"""Growth by size alone: da/dt = exp(θ)·(a/a₁)^p, in closed form.

Sizes here are over the reference size a₁ (x = a/a₁), so that dx/dt = e^θ·x^p: θ is the log of the
rate at the reference size, p the exponent. With q = 1 − p, x^q = x₀^q + q·e^θ·t. For p > 1 the size
has no bound in finite time: it is infinite from there on, which is data, not an error.

Source: separation of variables; with ΔK ∝ √a the law of Paris & Erdogan (1963) has p = m/2.
"""

import numpy as np

from assessment.validity import Floats

_STRAIGHT = 1e-7
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(6)
_FARTHEST = 3.0
"""Log of the largest size at which the curvature is followed; beyond, a crack has run away."""


def size_after(time: Floats, log_rate: Floats, exponent: Floats, start: Floats) -> Floats:
    """Size over the reference size, after ``time``; arguments broadcast.

    log_rate : θ, log of reference sizes per unit of time; start : x₀ > 0
    """
    q = 1.0 - exponent
    q = np.where(np.abs(q) < _STRAIGHT, _STRAIGHT, q)
    with np.errstate(all="ignore"):
        # expm1 and log1p keep the digits where q is small.
        grown = np.expm1(q * np.log(start)) + q * np.exp(log_rate) * time
        size = np.exp(np.log1p(np.maximum(grown, -1.0)) / q)
    return np.asarray(np.where((q < 0.0) & (grown <= -1.0), np.inf, size))


def time_between(start: Floats, end: Floats, log_rate: Floats, exponent: Floats) -> Floats:
    """Time from size ``start`` to ``end`` (over the reference size); negative where end < start."""
    q = 1.0 - exponent
    q = np.where(np.abs(q) < _STRAIGHT, _STRAIGHT, q)
    with np.errstate(over="ignore"):
        way = (np.expm1(q * np.log(end)) - np.expm1(q * np.log(start))) / q
        return np.asarray(way * np.exp(-log_rate))


def rate_at(size: Floats, log_rate: Floats, exponent: Floats) -> Floats:
    """da/dt in reference sizes per unit of time."""
    with np.errstate(over="ignore"):
        return np.asarray(np.exp(log_rate + exponent * np.log(size)))


def curvature_lead(
    start: Floats, end: Floats, log_rate: Floats, exponent: Floats, curvature: Floats
) -> Floats:
    """How much sooner ``end`` is reached where ln rate also has ½κ·(ln x)²; sizes over reference.

    The stress intensity of a crack is no exact power of its size: as the far edge nears, its slope
    rises. That is geometry, and so shared by cracks at the same kind of location. With u = ln x:
    ∫ e^(q·u − θ)·(1 − e^(−½κu²)) du, by 6 Gauss points over the whole way.
    """
    first = np.log(start)
    last = np.minimum(np.log(end), _FARTHEST)
    half, middle = 0.5 * (last - first), 0.5 * (last + first)
    total = np.zeros(np.broadcast_shapes(half.shape, np.shape(exponent), np.shape(curvature)))
    with np.errstate(over="ignore", invalid="ignore"):
        for node, weight in zip(_NODES, _WEIGHTS, strict=True):
            u = middle + half * node
            share = -np.expm1(-0.5 * curvature * u * u)
            total += weight * np.exp((1.0 - exponent) * u - log_rate) * share
        return np.asarray(half * total)
