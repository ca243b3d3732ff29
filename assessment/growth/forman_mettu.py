"""The law of Forman and Mettu: closure, threshold and instability in one equation."""

from dataclasses import dataclass

import numpy as np

from assessment.validity import Floats

from .closure import opening


@dataclass(frozen=True)
class FormanMettu:
    """da/dN = C [(1 − f)/(1 − R) ΔK]^n (1 − ΔK_th/ΔK)^p / (1 − K_max/K_c)^q.

    c : m/cycle at 1 MPa√m; n, p, q : exponents; k_c, threshold (ΔK_th) : MPa√m
    constraint : α and peak_over_flow : S_max/σ_0 of Newman's closure function f (closure.py)
    Source: R. G. Forman & S. R. Mettu, Behavior of surface and corner cracks subjected to tensile
    and bending loads in Ti-6Al-4V alloy, ASTM STP 1131 (1992) 519-546 (form from memory).
    ΔK is the whole range, K_max − K_min, also where K_min is negative: what of it opens the crack
    is for f to say. ΔK_th is the one value given, at any R. Growth ends where K_max reaches K_c.
    """

    c: float
    n: float
    p: float
    q: float
    k_c: float
    constraint: float
    peak_over_flow: float
    threshold: float = 0.0
    by_ratio: tuple[tuple[float, float], ...] | None = None
    name = "forman-mettu"
    formula = "da/dN = C [(1 − f)/(1 − R) ΔK]^n (1 − ΔK_th/ΔK)^p / (1 − K_max/K_c)^q"
    signed = True

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return delta_k

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        open_part = (1.0 - opening(ratio, self.constraint, self.peak_over_flow)) / (1.0 - ratio)
        above = np.maximum(1.0 - self.threshold / effective, 0.0) ** self.p
        # Mirrored beyond K_c, as in Forman's law.
        left = np.abs(1.0 - effective / (1.0 - ratio) / self.k_c) + 1e-12
        return np.asarray(self.c * (open_part * effective) ** self.n * above / left**self.q)
