"""A tensile stress-strain curve: what it says of strength, and how much energy it takes to break.

A strong metal need not be tough: strength is the height of the curve, the energy is the area below
it, and toughness against a crack is neither: see the plastic zone and the fracture toughness.
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from assessment.validity import Floats

OFFSET = 0.002


@dataclass(frozen=True)
class TensileCurve:
    """points : (strain, stress in MPa), strains rising from above nil; engineering or true."""

    points: tuple[tuple[float, float], ...]
    true: bool

    def true_points(self) -> tuple[Floats, Floats]:
        """True strain and true stress from the origin up to the largest load.

        ε = ln(1 + e), σ = s (1 + e) hold until the piece necks, at the largest engineering stress.
        """
        strain, stress = np.asarray(((0.0, 0.0), *self.points)).T
        if self.true:
            return strain, stress
        neck = int(np.argmax(stress)) + 1
        return np.log1p(strain[:neck]), stress[:neck] * (1.0 + strain[:neck])

    def strain_at(self, stress: Floats) -> Floats:
        """True strain at a true stress, in straight lines; NaN above the curve.

        Along a plateau the larger strain counts, which is the side of the lower diagram.
        """
        strains, stresses = self.true_points()
        highest = np.maximum.accumulate(stresses)
        last = np.flatnonzero(np.append(np.diff(highest) > 0.0, True))
        first = np.append(0, last[:-1] + 1)
        # A plateau becomes a step: its first strain just below, its last at the stress itself.
        at = np.stack([np.nextafter(highest[last], -np.inf), highest[last]], axis=1).ravel()
        reached = np.stack([strains[first], strains[last]], axis=1).ravel()
        return np.asarray(np.interp(stress, at, reached, right=np.nan), dtype=float)


@dataclass(frozen=True)
class Summary:
    """proof : stress at 0.2 % plastic strain, MPa, None where the curve does not reach it
    ultimate : largest stress of the curve as given, MPa; energy : area under it, MJ/m³
    """

    proof: float | None
    ultimate: float
    energy: float


def summary(curve: TensileCurve, elastic_modulus: float) -> Summary:
    """What a reader asks of a tensile curve. elastic_modulus : MPa."""
    strain, stress = np.asarray(((0.0, 0.0), *curve.points)).T
    area = float(np.sum(np.diff(strain) * (stress[1:] + stress[:-1]) / 2.0))
    return Summary(_proof(strain, stress, elastic_modulus), float(np.max(stress)), area)


def _proof(strain: Floats, stress: Floats, elastic_modulus: float) -> float | None:
    """Where the line of the modulus through 0.2 % strain meets the curve."""
    above = stress - elastic_modulus * (strain - OFFSET)
    crossed = np.flatnonzero((above[1:] <= 0.0) & (above[:-1] > 0.0))
    if not len(crossed):
        return None
    i = int(crossed[0])
    share = above[i] / (above[i] - above[i + 1])
    return float(stress[i] + share * (stress[i + 1] - stress[i]))


def rising(points: Sequence[tuple[float, float]]) -> bool:
    """The stress nowhere falls."""
    return all(b[1] >= a[1] for a, b in zip(points, points[1:], strict=False))
