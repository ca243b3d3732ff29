"""Semi-elliptical crack that runs around a part of a cylinder, inside or outside, not through.

The equation is that of a plate. Along a girth crack the wall is as stiff as a plate's, and the
cylinder holds the plate against bending as the plate's own breadth does: how far this carries was
measured here by three-dimensional finite elements, and the ranges are what they bear out.
"""

import numpy as np

from assessment.relations import surface_crack
from assessment.validity import Floats, Range, Validity

_HERE = "confirmed here"
VALIDITY = Validity(
    relation="stress intensity of a girth surface crack in a cylinder",
    source=(
        "the plate's equation of J. C. Newman & I. S. Raju, Eng. Fract. Mech. 15 (1981) 185-192, "
        "for a wide plate under the axial stress at the middle of the crack, taken linear "
        "through the wall; the same use of it as in BS 7910, annex M"
    ),
    accuracy="none stated; measured here against three-dimensional finite elements, tension and "
    "global bending: at the deepest point 2 % low (5 % for a/c = 0.2, a/t = 0.8 outside) to 20 % "
    "high (inside, deep and long), at the surface point from 1 % high upwards",
    ranges=(
        Range("a/c", "crack depth over half its length", 0.2, 1.0, basis=_HERE),
        Range("a/t", "crack depth over wall thickness", 0.0, 0.8, True, False, basis=_HERE),
        Range("t/R", "wall thickness over inner radius", 0.0, 0.2, True, False, basis=_HERE),
        Range(
            "θ/π", "half the crack's angle over half a turn", 0.0, 0.25, True, False, basis=_HERE
        ),
    ),
    witness="the plate's equation from memory; confirmed for cylinders by an independent "
    "three-dimensional computation for a/c of 0.2, 0.4 and 1, a/t up to 0.8 and t/R of 0.05, 0.1 "
    "and 0.2; as t/R goes to nil the cylinder is the plate",
    tests=(
        "tests/external/test_cylinders.py::test_surface_cracks_against_the_elements",
        "tests/external/test_cylinders.py::test_a_girth_crack_in_a_wide_tube_is_one_in_a_plate",
        "tests/external/fem/test_cylinders.py",
    ),
)


def validity_values(
    a: Floats, c: Floats, cracked_radius: float, thickness: float, radius: float
) -> dict[str, Floats]:
    """The symbols of VALIDITY; c along the cracked surface, whose radius is cracked_radius."""
    return {
        "a/c": a / c,
        "a/t": a / thickness,
        "t/R": np.asarray(thickness / radius),
        "θ/π": c / cracked_radius / np.pi,
    }


def stress_intensity(
    a: Floats,
    c: Floats,
    axial: Floats,
    global_bending: Floats,
    cracked_radius: float,
    thickness: float,
    radius: float,
) -> Floats:
    """K in MPa√m at the deepest and the surface point, shape (2, ...).

    K of a wide plate under σ_m and σ_b: with the stress linear through the wall from the cracked
    surface s₁ to the other s₂, σ_m = axial + (s₁ + s₂)/2 and σ_b = (s₁ − s₂)/2. Global bending
    gives s = σ_gb r/R_o at the middle of the crack, and less beside it, which is left out.
    a, c : depth and half length along the cracked surface in m; axial : MPa, for an inside crack
    with the pressure on its faces; global_bending : MPa at the outer fibre
    """
    mean, outer = radius + thickness / 2.0, radius + thickness
    membrane = axial + global_bending * (mean / outer)
    bending = global_bending * ((cracked_radius - mean) / outer)
    return surface_crack.stress_intensity(a, c, membrane, bending, thickness, np.inf)
