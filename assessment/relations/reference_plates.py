"""Reference stress of the plate kinds beside those in reference_stress.py, and of the specimens.

Stresses in MPa, lengths in m. Load ratio L_r = reference stress ÷ yield strength.
"""

import numpy as np

from assessment.relations import reference_stress
from assessment.validity import Floats, Range, Validity

BOTH_EDGES = Validity(
    relation="reference stress of equal cracks at both edges of a plate",
    source="net section (equilibrium, a lower bound of the limit load in plane stress)",
    accuracy="a lower bound of the limit load",
    ranges=(Range("2a/W", "the two crack lengths over plate width", 0.0, 1.0, False, True),),
    witness="derivation",
)
CORNER = Validity(
    relation="reference stress of a corner crack in a plate",
    source=(
        "BS 7910:2013, annex P, surface flaw in a plate (bending restrained), local, of which a "
        "corner crack is one half by symmetry about the side of the plate"
    ),
    accuracy="a lower bound of the limit load where the plate cannot bend about its own plane",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory for the surface flaw; symmetry; limits: no crack, long crack",
)
EMBEDDED = Validity(
    relation="reference stress of a crack inside a plate",
    source="BS 7910:2013, annex P, embedded flaw in a plate, local",
    accuracy="a lower bound of the limit load",
    ranges=(Range("2a/t", "crack height over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory; limits: no crack, long crack midway (net section)",
)
SPECIMEN = Validity(
    relation="reference stress of a specimen's ligament",
    source=(
        "lower-bound limit analysis of the ligament under force and moment, plane stress, derived "
        "here; compact tension: the form of V. Kumar, M. D. German & C. F. Shih, EPRI NP-1931 "
        "(1981), without its factor 1.072"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/W", "crack length over specimen width", 0.0, 1.0, False, True),),
    witness="derivation",
)


def both_edges(membrane: Floats, relative: Floats) -> Floats:
    """P_m / (1 − 2a/W)."""
    return np.asarray(np.abs(membrane) / (1.0 - relative))


def corner(
    membrane: Floats, bending: Floats, a: Floats, c: Floats, thickness: float, width: float
) -> Floats:
    """As a surface flaw of half length c in a plate of twice the width."""
    return reference_stress.surface(membrane, bending, a, c, thickness, 2.0 * width)


def embedded(
    membrane: Floats, a: Floats, c: Floats, ligament: Floats, thickness: float, width: float
) -> Floats:
    """{3 P_m α + √[9 P_m² α² + 9 P_m² ((1 − α)² + 4 p α/B)]} / {3 [(1 − α)² + 4 p α/B]}, with
    α = (2a/B)/(1 + B/c) where W ≥ 2(c + B), else α = (2a/B)(2c/W). p : the nearer ligament."""
    wide = width >= 2.0 * (c + thickness)
    part = 2.0 * a / thickness
    alpha = np.where(wide, part / (1.0 + thickness / c), part * 2.0 * c / width)
    left = (1.0 - alpha) ** 2 + 4.0 * ligament * alpha / thickness
    return np.asarray(np.abs(membrane) * (alpha + np.sqrt(alpha**2 + left)) / left)


def ligament(force: Floats, moment: Floats, left: Floats) -> Floats:
    """2 m + √(4 m² + n²), n = N/l, m = M/l² per unit thickness: the stress ±σ of a rectangle of
    height l that carries force N and moment M about its own middle."""
    n, m = np.abs(force) / left, np.abs(moment) / left**2
    return np.asarray(2.0 * m + np.sqrt(4.0 * m**2 + n**2))
