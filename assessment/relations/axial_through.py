"""Axial through crack in a cylinder under internal pressure."""

import numpy as np

from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of an axial through crack in a cylinder",
    source=(
        "A. Zahoor, Ductile Fracture Handbook (EPRI NP-6301-D, 1989-1991): "
        "√(1 + 0.52x + 1.29x² − 0.074x³), x = c/√(R t), as read in T. L. Anderson, Fracture "
        "Mechanics, table 12.31"
    ),
    accuracy="none stated; measured here against three-dimensional finite elements: 5 to 12 % "
    "above the mean through the wall, and up to 8 % below the largest value in the wall",
    ranges=(
        Range(
            "c/√(R t)",
            "half the crack's length over √(mean radius × wall)",
            0.0,
            5.0,
            True,
            basis="confirmed here",
        ),
        Range("R/t", "mean radius over wall thickness", 5.0, 50.0, basis="confirmed here"),
    ),
    witness="formula read; confirmed by an independent three-dimensional computation for c/√(R t) "
    "from 0.25 to 5 and R/t from 5 to 50; the bound on c/√(R t) is that computation's",
    tests=(
        "tests/external/test_cylinders.py::test_axial_through_formula",
        "tests/external/fem/test_cylinders.py::test_an_axial_through_crack",
    ),
)


def validity_values(c: Floats, thickness: float, mean: float) -> dict[str, Floats]:
    """The symbols of VALIDITY."""
    return {
        "c/√(R t)": c / np.sqrt(mean * thickness),
        "R/t": np.asarray(mean / thickness),
    }


def factor(x: Floats) -> Floats:
    """F in K = σ_h F √(πc): √(1 + 0.52x + 1.29x² − 0.074x³), x = c/√(R t), R the mean radius.

    Beyond x = 5 the cubic bends over: there nothing is confirmed, and near x = 17.8 it is nil.
    NaN where the root has no value.
    """
    with np.errstate(invalid="ignore"):
        return np.asarray(np.sqrt(1.0 + 0.52 * x + 1.29 * x**2 - 0.074 * x**3))


def stress_intensity(c: Floats, pressure: Floats, thickness: float, radius: float) -> Floats:
    """K in MPa√m at the tips, the mean through the wall, shape (1, ...).

    K = (p R_i/t + p) F √(πc): the hoop stress, and the pressure that leaks into the crack, taken
    at its full value on all of the faces, which is the most that it can be.
    c : half length in m; pressure : MPa; thickness, radius (inner) : m
    """
    mean = radius + thickness / 2.0
    f = factor(np.asarray(c, dtype=float) / np.sqrt(mean * thickness))
    with np.errstate(invalid="ignore"):
        return np.asarray(pressure * (radius / thickness + 1.0) * f * np.sqrt(np.pi * c))[None]
