"""Axial semi-elliptical crack on the inside of a cylinder under pressure, also on its faces."""

import numpy as np

from assessment.relations.surface_crack import shape_terms
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of an axial surface crack inside a cylinder",
    source=(
        "J. C. Newman & I. S. Raju, Stress-intensity factors for internal surface cracks in "
        "cylindrical pressure vessels, J. Pressure Vessel Technol. 102 (1980) 342-346 (NASA "
        "TM-80073, 1979) and 104 (1982) 293-298"
    ),
    accuracy="5 % against the finite elements it was fitted to (stated); measured here: 2 % low to "
    "7 % high for t/R from 0.02 to 0.1, and 5 % low to 10 % high at t/R = 0.5",
    # Published for t/R from 0.1 to 0.25; on both sides own finite elements bear it out.
    ranges=(
        Range("a/c", "crack depth over half its length", 0.2, 1.0),
        Range("a/t", "crack depth over wall thickness", 0.0, 0.8, True, False),
        Range("t/R", "wall thickness over inner radius", 0.02, 0.5, basis="confirmed here"),
    ),
    witness=(
        "from memory; confirmed by an independent three-dimensional computation (a band of 6 %)"
    ),
    tests=(
        "tests/external/test_cylinders.py",
        "tests/external/fem/test_cylinders.py::test_an_inside_crack_against_another_computation",
        "tests/external/test_limiting_cases.py::test_a_thin_cylinder_is_a_plate_under_its_hoop_stress",
    ),
)


def validity_values(a: Floats, c: Floats, thickness: float, radius: float) -> dict[str, Floats]:
    """The symbols of VALIDITY."""
    return {"a/c": a / c, "a/t": a / thickness, "t/R": np.asarray(thickness / radius)}


def stress_intensity(
    a: Floats, c: Floats, pressure: Floats, thickness: float, radius: float
) -> Floats:
    """K in MPa√m at the deepest and the surface point, shape (2, ...).

    K = (p R_i/t) √(πa/Q) F,  F = 0.97 [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g f_φ f_c
    f_c = [(R_o² + R_i²)/(R_o² − R_i²) + 1 − 0.5 √(a/t)] t/R_i
    The pressure on the crack faces is in f_c (the + 1).
    a, c : depth and half length in m; pressure : MPa; thickness, radius (inner) : m
    """
    a, c = np.broadcast_arrays(np.asarray(a, dtype=float), np.asarray(c, dtype=float))
    depth = a / thickness
    deep, surface, g, q = shape_terms(a / c, depth**2)
    outer = radius + thickness
    thick = (outer**2 + radius**2) / (outer**2 - radius**2)
    curved = (thick + 1.0 - 0.5 * np.sqrt(depth)) * thickness / radius
    nominal = pressure * radius / thickness * np.sqrt(np.pi * a / q) * 0.97 * curved
    return np.stack([nominal * deep, nominal * surface * g])
