"""Growth laws: m/cycle from ΔK in MPa√m and the stress ratio R.

Each law has a threshold on ΔK (the law's own, in MPa√m): no growth at or below it. It may be given
by stress ratio, as a table, for the ratio that acts at each point of the front.
"""

from dataclasses import dataclass
from typing import Protocol

import numpy as np

from assessment.validity import Floats


class GrowthLaw(Protocol):
    """A law gives the effective range that its threshold is compared with, and the rate."""

    @property
    def threshold(self) -> float: ...

    @property
    def formula(self) -> str: ...

    @property
    def by_ratio(self) -> tuple[tuple[float, float], ...] | None:
        """(R, threshold in MPa√m) with R rising; None where one value holds for every R."""
        ...

    @property
    def signed(self) -> bool:
        """The law takes the whole range and a negative R, and says itself what opens the crack."""
        ...

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        """The range in MPa√m that rate and threshold see."""
        ...

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        """m/cycle at an effective range above the threshold."""
        ...


def threshold_at(law: GrowthLaw, ratio: Floats) -> Floats | float:
    """The threshold in MPa√m at a stress ratio; the end values hold beyond the table's ends."""
    if law.by_ratio is None:
        return law.threshold
    ratios, values = np.asarray(law.by_ratio, dtype=float).T
    return np.asarray(np.interp(ratio, ratios, values), dtype=float)


@dataclass(frozen=True)
class Paris:
    """da/dN = C ΔK^m.

    c : m/cycle at 1 MPa√m; m : exponent; threshold : MPa√m
    Source: P. C. Paris & F. Erdogan, A critical analysis of crack propagation laws, J. Basic
    Eng. 85 (1963) 528-533. Range: the middle part of the growth curve; none stated as numbers.
    """

    c: float
    m: float
    threshold: float = 0.0
    by_ratio: tuple[tuple[float, float], ...] | None = None
    signed = False
    name = "paris"
    formula = "da/dN = C ΔK^m"

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return delta_k

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        return np.asarray(self.c * effective**self.m)


@dataclass(frozen=True)
class TwoStage:
    """Two lines on log-log axes: stage 1 below their crossing, stage 2 above.

    c1, c2 : m/cycle at 1 MPa√m; m1, m2 : exponents, m1 ≠ m2; threshold : MPa√m
    Source: BS 7910:2013, 8.2.3, two-stage relationship; R is in the constants.
    """

    c1: float
    m1: float
    c2: float
    m2: float
    threshold: float = 0.0
    by_ratio: tuple[tuple[float, float], ...] | None = None
    signed = False
    name = "two-stage"
    formula = "da/dN = C₁ ΔK^m₁ below the crossing, C₂ ΔK^m₂ above"

    @property
    def crossing(self) -> float:
        """ΔK in MPa√m at which the two lines meet."""
        met: float = (self.c1 / self.c2) ** (1.0 / (self.m2 - self.m1))
        return met

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return delta_k

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        first = self.c1 * effective**self.m1
        second = self.c2 * effective**self.m2
        return np.where(effective < self.crossing, first, second)


@dataclass(frozen=True)
class Walker:
    """da/dN = C ΔK_eff^m with ΔK_eff = ΔK / (1 − R)^(1 − γ); threshold stated at R = 0.

    Source: K. Walker, The effect of stress ratio during crack propagation and fatigue for
    2024-T3 and 7075-T6 aluminum, ASTM STP 462 (1970) 1-14; form as in N. E. Dowling, Mechanical
    Behavior of Materials, 4th ed. (2013), eq. 11.17 (equation number from memory).
    R < 0: the part of the cycle that shuts the crack counts for nothing (rates.py).
    """

    c: float
    m: float
    gamma: float
    threshold: float = 0.0
    by_ratio: tuple[tuple[float, float], ...] | None = None
    signed = False
    name = "walker"
    formula = "da/dN = C [ΔK / (1 − R)^(1 − γ)]^m"

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return np.asarray(delta_k / (1.0 - ratio) ** (1.0 - self.gamma))

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        return np.asarray(self.c * effective**self.m)
