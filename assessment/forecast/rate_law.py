"""Growth by size alone: da/dt = exp(θ)·(a/a₁)^p, in closed form.

Sizes here are over the reference size a₁ (x = a/a₁), so that dx/dt = e^θ·x^p: θ is the log of the
rate at the reference size, p the exponent. With q = 1 − p, x^q = x₀^q + q·e^θ·t. For p > 1 the size
has no bound in finite time: it is infinite from there on, which is data, not an error.

Source: separation of variables; with ΔK ∝ √a the law of Paris & Erdogan (1963) has p = m/2.
"""

import numpy as np

from assessment.validity import Floats

_STRAIGHT = 1e-7


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
