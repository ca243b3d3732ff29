"""Axial semi-elliptical crack on the outside of a cylinder under internal pressure."""

import numpy as np

from assessment.relations.surface_crack import shape_terms
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of an axial surface crack outside a cylinder",
    source=(
        "J. C. Newman & I. S. Raju, Stress-intensity factors for internal and external surface "
        "cracks in cylindrical vessels, J. Pressure Vessel Technol. 104 (1982) 293-298"
    ),
    accuracy="5 % against the finite elements it was fitted to (stated)",
    ranges=(
        Range("a/c", "crack depth over half its length", 0.2, 1.0),
        Range("a/t", "crack depth over wall thickness", 0.0, 0.8, True, False),
        Range("t/R", "wall thickness over inner radius", 0.1, 0.25),
    ),
    witness=(
        "from memory; within 2 % of an independent three-dimensional computation at a/t = 0.2, and "
        "within 6 % of the plate's equation under Lamé's hoop stress up to a/t = 0.8"
    ),
)


def stress_intensity(
    a: Floats, c: Floats, pressure: Floats, thickness: float, radius: float
) -> Floats:
    """K in MPa√m at the deepest and the surface point, shape (2, ...).

    K = (p R_i/t) √(πa/Q) F,  F = 0.97 [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g f_φ f_c
    f_c = [(R_o² + R_i²)/(R_o² − R_i²) − 1 + 0.5 √(a/t)] t/R_i
    a, c : depth and half length in m; pressure : MPa, inside; thickness, radius (inner) : m
    """
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    depth = a / thickness
    deep, surface, g, q = shape_terms(a / c, depth**2)
    outer = radius + thickness
    thick = (outer**2 + radius**2) / (outer**2 - radius**2)
    curved = (thick - 1.0 + 0.5 * np.sqrt(depth)) * thickness / radius
    nominal = pressure * radius / thickness * np.sqrt(np.pi * a / q) * 0.97 * curved
    return np.stack([nominal * deep, nominal * surface * g])
