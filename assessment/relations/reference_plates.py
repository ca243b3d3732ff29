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
    tests=("tests/external/test_plate_kinds.py::test_reference_stresses_at_their_ends",),
)
EDGE_HELD = Validity(
    relation="reference stress of an edge crack in a plate, ends held from turning",
    source=(
        "lower-bound limit analysis of the ligament, plane stress, derived here: the strip beside "
        "the crack carries the force straight to the ends, which take its eccentricity; bending in "
        "full"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/W", "crack length over plate width", 0.0, 1.0, False, True),),
    witness="derivation; limits: net section in tension, no crack in bending 2/3",
    tests=(
        "tests/external/test_plate_held.py::test_the_ligament_carries_the_force_without_its_eccentricity",
    ),
)
CORNER = Validity(
    relation="reference stress of a corner crack in a plate",
    source=(
        "the larger in membrane stress of BS 7910:2013, annex P, surface flaw in a plate (bending "
        "restrained), local, of which a corner crack is one half by symmetry about the side of the "
        "plate; and of a lower-bound limit analysis of the whole section, free to turn in the "
        "plane of the plate, derived here"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness=(
        "from memory for the surface flaw; derivation, an edge crack being the limit; limits: no "
        "crack, long crack"
    ),
    tests=("tests/external/test_reference_corner.py",),
)
EMBEDDED = Validity(
    relation="reference stress of a crack inside a plate",
    source="BS 7910:2013, annex P, embedded flaw in a plate, local",
    accuracy="a lower bound of the limit load",
    ranges=(Range("2a/t", "crack height over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory; limits: no crack, long crack midway (net section)",
    tests=("tests/external/test_plate_kinds.py::test_reference_stresses_at_their_ends",),
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
    tests=("tests/external/test_plate_kinds.py::test_reference_stresses_at_their_ends",),
)


def both_edges(membrane: Floats, relative: Floats) -> Floats:
    """P_m / (1 − 2a/W)."""
    return np.asarray(np.abs(membrane) / (1.0 - relative))


def edge_held(membrane: Floats, bending: Floats, relative: Floats) -> Floats:
    """2 m + √(4 m² + n²), n = P_m/(1 − α), m = (P_b/6)/(1 − α)², α = a/W."""
    left = 1.0 - relative
    return ligament(membrane, np.asarray(bending) / 6.0 / left, left)


def corner(
    membrane: Floats, bending: Floats, a: Floats, c: Floats, thickness: float, width: float
) -> Floats:
    """[p_b + √(p_b² + 9 p_m²)] / 3, with p_b = P_b/(1 − α)² and p_m the larger of P_m/(1 − α) and
    P_m W / [√(W² − 2 a c (W − c)/t) − a c/t].

    α = (a/t)/(1 + t/c) where W ≥ c + t, else (a/t)(c/W): a surface flaw of half length c in a plate
    of twice the width. The second p_m is that of a section without the block a by c, pulled in the
    middle of its width and free to turn there: ±p_m on both sides of the line about which it does
    not turn. Each strip of it bends as a strip that also carries ±p_m.
    """
    pm, pb = np.abs(membrane), np.abs(bending)
    nil = np.zeros(())
    local = reference_stress.surface(pm, nil, a, c, thickness, 2.0 * width)
    bent = 1.5 * reference_stress.surface(nil, pb, a, c, thickness, 2.0 * width)
    part = a / thickness * c / width
    turning = np.sqrt(1.0 - 2.0 * part * (1.0 - c / width)) - part
    pulled = np.maximum(local, pm / turning)
    return np.asarray((bent + np.sqrt(bent**2 + 9.0 * pulled**2)) / 3.0)


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
