"""Through crack at one edge of a plate whose ends are free to rotate: tension and bending.

In tension one handbook form holds at any depth. In bending the fourth-degree polynomial is within
0.4 % up to a/W = 0.6 and falls away fast beyond, while the any-depth form is up to 2.3 % low near
0.3, 0.7 % low at 0.6 and right from there on (both measured against independent computations):
the two are joined around 0.6.
"""

import numpy as np

from assessment.relations import weight_function
from assessment.validity import Floats, Range, Validity

JOIN = (0.58, 0.63)
# Below this depth the two closed forms differ by too little to say how a falling stress acts.
APART_FROM = 0.3
# K ÷ (σ √(πa)) of an edge crack in a half plane, stress σ (1 − x/a): H. Tada, P. C. Paris & G. R.
# Irwin, The Stress Analysis of Cracks Handbook, p. 8.3 (0.439, from memory); 0.43866
# computed independently.
HALF_PLANE_LINEAR = 0.43866

TENSION = Validity(
    relation="geometry factor of an edge crack in tension, ends free to rotate",
    source=(
        "H. Tada, P. C. Paris & G. R. Irwin, The Stress Analysis of Cracks Handbook, 3rd ed. "
        "(ASME, 2000), p. 2.11, any-depth form"
    ),
    accuracy="0.5 % at any depth (stated); measured here: 0.7 % high at a/W = 0.05",
    ranges=(Range("a/W", "crack length over plate width", 0.0, 1.0, True, True),),
    witness="from memory; confirmed by an independent computation and by finite elements",
    tests=(
        "tests/external/fem/test_plane.py::test_edge_crack_in_tension",
        "tests/external/test_stress_intensity_values.py",
        "tests/external/test_limiting_cases.py::test_a_small_edge_crack_has_the_factor_of_a_half_plane",
    ),
)
BENDING = Validity(
    relation="geometry factor of an edge crack in bending",
    source=(
        "polynomial: B. Gross & J. E. Srawley, NASA TN D-2603 (1965), as in the handbook of Tada, "
        "Paris & Irwin, p. 2.14; any-depth form: the same page; joined here from a/W = 0.58 to 0.63"
    ),
    accuracy="0.6 % (measured here against independent computations, not stated)",
    ranges=(Range("a/W", "crack length over plate width", 0.0, 1.0, True, True),),
    witness="from memory; confirmed by an independent computation and by finite elements",
    tests=(
        "tests/external/fem/test_plane.py::test_edge_crack_in_bending",
        "tests/external/test_stress_intensity_values.py",
        "tests/external/test_limiting_cases.py::test_a_deep_edge_crack_in_bending_follows_its_ligament",
    ),
)
HELD = Validity(
    relation="an edge crack in a plate whose ends are held, no held length given",
    source="none without body.held_length_mm: the free-ended solution, the higher one, is shown",
    accuracy="none stated",
    ranges=(Range("ends", "the ends are held (1) and not free (0)", 0.0, 0.0, stated=False),),
    witness="none",
    tests=(
        "tests/external/test_plate_held.py::test_held_without_a_held_length_is_referred_and_with_it_computed",
    ),
)


def _common(relative: Floats) -> tuple[Floats, Floats, Floats]:
    angle = np.pi / 2 * relative
    return np.sqrt(np.tan(angle) / angle), 1.0 - np.sin(angle), np.cos(angle)


def tension(relative: Floats) -> Floats:
    """F in K = F σ √(πa), α = a/W in (0, 1), remote tension:

    F = √(2/(πα) tan(πα/2)) [0.752 + 2.02 α + 0.37 (1 − sin(πα/2))³] / cos(πα/2)
    """
    root, rest, cosine = _common(relative)
    return np.asarray(root * (0.752 + 2.02 * relative + 0.37 * rest**3) / cosine)


def bending(relative: Floats) -> Floats:
    """F in K = F σ √(πa), σ the outer-fibre bending stress at the cracked edge, α = a/W:

    α ≤ 0.58: 1.122 − 1.40 α + 7.33 α² − 13.08 α³ + 14.0 α⁴
    α ≥ 0.63: √(2/(πα) tan(πα/2)) [0.923 + 0.199 (1 − sin(πα/2))⁴] / cos(πα/2)
    in between: from the one to the other in proportion
    """
    root, rest, cosine = _common(relative)
    any_depth = root * (0.923 + 0.199 * rest**4) / cosine
    a = relative
    polynomial = 1.122 + a * (-1.40 + a * (7.33 + a * (-13.08 + 14.0 * a)))
    weight = np.clip((a - JOIN[0]) / (JOIN[1] - JOIN[0]), 0.0, 1.0)
    return np.asarray((1.0 - weight) * polynomial + weight * any_depth)


def falling(relative: Floats) -> Floats:
    """F in K = F σ √(πa) under the stress σ (1 − x/a), ends free, α = a/W.

    From α = 0.3 on by superposition: [F_b − (1 − 2α) F_m] / 2α. Below, a parabola from the half
    plane to there, within 0.8 % of finite elements.
    """

    def apart(at: Floats) -> Floats:
        return (bending(at) - (1.0 - 2.0 * at) * tension(at)) / (2.0 * at)

    at_join = apart(np.asarray(APART_FROM))
    shallow = HALF_PLANE_LINEAR + (at_join - HALF_PLANE_LINEAR) * (relative / APART_FROM) ** 2
    return np.where(relative < APART_FROM, shallow, apart(np.asarray(relative)))


def stress_intensity_of_profile(
    a: Floats, profile: weight_function.Profile, width: float
) -> Floats:
    """K in MPa√m of a stress along the line of the crack, ends free. a, width : m."""
    relative = np.asarray(a, dtype=float) / width
    return weight_function.deepest(a, tension(relative), falling(relative), profile)
