"""Growth laws with their rates altered: what a forecast scatters, and what was measured."""

from dataclasses import dataclass

import numpy as np

from assessment.growth import GrowthLaw
from assessment.validity import Floats


@dataclass(frozen=True)
class _Altered:
    """A law that keeps its threshold and what it says of the stress ratio."""

    law: GrowthLaw

    @property
    def threshold(self) -> float:
        return self.law.threshold

    @property
    def by_ratio(self) -> tuple[tuple[float, float], ...] | None:
        return self.law.by_ratio

    @property
    def signed(self) -> bool:
        return self.law.signed

    @property
    def k_c(self) -> float | None:
        """The largest K in MPa√m at which the law has the crack run away; None where it has
        none."""
        found: float | None = getattr(self.law, "k_c", None)
        return found


@dataclass(frozen=True)
class Shifted(_Altered):
    """A growth law with its exponent raised and its stress multiplied, sample by sample.

    rate = law's rate · ΔK_eff^exponent (ΔK_eff in MPa√m), ΔK_eff being the law's own of stress·ΔK.
    For Paris, Walker and the like that is C·ΔK_eff^(m + exponent).
    """

    exponent: Floats
    stress: Floats

    @property
    def formula(self) -> str:
        return f"{self.law.formula}, its exponent and stress scattered"

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return self.law.effective(delta_k * self.stress, ratio)

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        return np.asarray(self.law.rate_at(effective, ratio) * effective**self.exponent)


@dataclass(frozen=True)
class Scaled(_Altered):
    """A growth law with all its rates multiplied."""

    factor: float

    @property
    def formula(self) -> str:
        return f"{self.factor:.4g} × ({self.law.formula})"

    def effective(self, delta_k: Floats, ratio: Floats) -> Floats:
        return self.law.effective(delta_k, ratio)

    def rate_at(self, effective: Floats, ratio: Floats) -> Floats:
        return self.factor * self.law.rate_at(effective, ratio)
