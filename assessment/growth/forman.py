"""Forman's law: growth that rises without bound as the largest K of the cycle nears K_c."""

from dataclasses import dataclass

import numpy as np

from assessment.validity import Floats


@dataclass(frozen=True)
class Forman:
    """da/dN = C ΔK^m / [(1 − R) K_c − ΔK].

    c : in m/cycle · MPa√m for ΔK in MPa√m and K_c in MPa√m; m : exponent; k_c, threshold : MPa√m
    Source: R. G. Forman, V. E. Kearney & R. M. Engle, Numerical analysis of crack propagation in
    cyclic-loaded structures, J. Basic Eng. 89 (1967) 459-464. Range: R from 0 to below 1; for a
    cycle that shuts the crack its open part counts, with R nil. Growth ends where the largest K of
    a cycle reaches K_c.
    """

    c: float
    m: float
    k_c: float
    threshold: float = 0.0
    by_ratio: tuple[tuple[float, float], ...] | None = None
    name = "forman"
    formula = "da/dN = C ΔK^m / [(1 − R) K_c − ΔK]"
    signed = False

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return delta_k

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        # Beyond K_c, where a step may look before it is cut back, the mirrored value keeps the
        # step finite; the run ends at K_c itself.
        left = np.abs((1.0 - ratio) * self.k_c - effective) + 1e-12 * self.k_c
        return np.asarray(self.c * effective**self.m / left)
