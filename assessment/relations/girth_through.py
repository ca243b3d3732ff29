"""Through crack that runs around a part of a cylinder: axial tension and global bending."""

import numpy as np

from assessment.relations.reference_cylinders import thin_bending
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of a girth through crack in a cylinder",
    source=(
        "A. Zahoor, Closed form expressions for fracture mechanics analysis of cracked pipes, J. "
        "Pressure Vessel Technol. 107 (1985) 203-205; tension as read in T. L. Anderson, Fracture "
        "Mechanics, table 12.29"
    ),
    accuracy="none stated; measured here against three-dimensional finite elements, mean through "
    "the wall: tension 4 % low to 6 % high, bending 2 % low to 8 % high; the largest value in the "
    "wall is up to 17 % above the formula's",
    ranges=(
        Range(
            "θ/π",
            "half the crack's angle over half a turn",
            0.0,
            1.0 / 3.0,
            True,
            basis="confirmed here",
        ),
        Range("R/t", "mean radius over wall thickness", 5.0, 20.0),
    ),
    witness="tension read, bending from memory; confirmed by an independent three-dimensional "
    "computation for θ/π from 0.05 to 0.5 and R/t of 5, 10 and 20; the bound on θ/π is where that "
    "begins to lie more than 5 % above (13 % at 0.5 and R/t = 5)",
    tests=(
        "tests/external/test_cylinders.py::test_girth_through_formula",
        "tests/external/fem/test_cylinders.py::test_a_girth_through_crack",
    ),
)


def validity_values(c: Floats, thickness: float, radius: float) -> dict[str, Floats]:
    """The symbols of VALIDITY; c half the length at mid-thickness."""
    mean = radius + thickness / 2.0
    return {"θ/π": c / mean / np.pi, "R/t": np.asarray(mean / thickness)}


def _curvature(ratio: float) -> Floats:
    """A = (0.125 R/t − 0.25)^¼ up to R/t = 10, (0.4 R/t − 3)^¼ beyond; NaN without a value."""
    inside = 0.125 * ratio - 0.25 if ratio <= 10.0 else 0.4 * ratio - 3.0
    return np.asarray(inside**0.25 if inside >= 0.0 else np.nan)


def tension(part: Floats, ratio: float) -> Floats:
    """F_t in K = σ F_t √(πR_mθ): 1 + A [5.3303 (θ/π)^1.5 + 18.773 (θ/π)^4.24]; part = θ/π."""
    return np.asarray(1.0 + _curvature(ratio) * (5.3303 * part**1.5 + 18.773 * part**4.24))


def bending(part: Floats, ratio: float) -> Floats:
    """F_b in K = σ_b F_b √(πR_mθ), σ_b at the mean radius where the crack has its middle:
    1 + A [4.5967 (θ/π)^1.5 + 2.6422 (θ/π)^4.24]."""
    return np.asarray(1.0 + _curvature(ratio) * (4.5967 * part**1.5 + 2.6422 * part**4.24))


def stress_intensity(
    c: Floats,
    membrane: Floats,
    global_bending: Floats,
    pressure: Floats,
    thickness: float,
    radius: float,
) -> Floats:
    """K in MPa√m at the tips, the mean through the wall, shape (1, ...).

    K = [(σ_m + p) F_t + σ_b F_b] √(πR_mθ), R_mθ = c. The pressure that leaks into the crack is
    taken at its full value on all of the faces, which is the most that it can be. It brings no
    axial stress of its own: that of closed ends is part of σ_m.
    c : half length at mid-thickness in m; membrane : axial stress, global_bending : at the outer
    fibre, positive where it opens the middle of the crack, pressure : MPa
    """
    c = np.asarray(c, dtype=float)
    mean = radius + thickness / 2.0
    ratio = mean / thickness
    with np.errstate(invalid="ignore"):
        part = c / mean / np.pi
        stress = (membrane + pressure) * tension(part, ratio)
        stress = stress + global_bending * thin_bending(thickness, radius) * bending(part, ratio)
        return np.asarray(stress * np.sqrt(np.pi * c))[None]
