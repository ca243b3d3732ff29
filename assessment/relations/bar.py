"""Surface crack in a round bar under tension and bending, at its deepest point."""

import numpy as np

from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="geometry factor of a surface crack in a round bar",
    source=(
        "R. G. Forman & V. Shivakumar, Growth behavior of surface cracks in the circumferential "
        "plane of solid and hollow cylinders, ASTM STP 905 (1986) 59-74"
    ),
    accuracy="none stated in numbers",
    ranges=(Range("a/D", "crack depth over bar diameter", 0.0, 0.6, True, False),),
    witness=(
        "formula and range from memory (low confidence in the upper end of the range); values "
        "agree with the check values from memory; the shallow limit 0.66 lies in the band 0.66 to "
        "0.73 of a half circle"
    ),
    tests=("tests/external/test_stress_intensity_values.py",),
)
FRONT = Validity(
    relation="the crack front that is assumed in a round bar",
    source="circular arc that meets the surface at right angles, as in the source of the factor",
    accuracy="none stated",
    ranges=(Range("2c given", "the crack is longer than the assumed front", None, None),),
    witness="geometry",
    tests=(
        "tests/external/test_limiting_cases.py::test_the_assumed_front_of_a_bar_meets_its_surface_at_right_angles",
    ),
)


def tension(relative: Floats) -> Floats:
    """F in K = F σ √(πa), λ = a/D, tension:

    F = g [0.752 + 2.02 λ + 0.37 (1 − sin(πλ/2))³],
    g = 0.92 (2/π) sec(πλ/2) √(tan(πλ/2)/(πλ/2))
    """
    g, rest = _common(relative)
    return np.asarray(g * (0.752 + 2.02 * relative + 0.37 * rest**3))


def bending(relative: Floats) -> Floats:
    """The same for bending, σ the outer-fibre stress: F = g [0.923 + 0.199 (1 − sin(πλ/2))⁴]."""
    g, rest = _common(relative)
    return np.asarray(g * (0.923 + 0.199 * rest**4))


def _common(relative: Floats) -> tuple[Floats, Floats]:
    angle = np.pi / 2 * relative
    g = 0.92 * 2.0 / np.pi / np.cos(angle) * np.sqrt(np.tan(angle) / angle)
    return g, 1.0 - np.sin(angle)


def surface_length(a: Floats, diameter: float) -> Floats:
    """Length in m along the surface of the assumed front: an arc normal to the surface.

    With half angle θ of the crack at the bar's centre, a = R [1 − (1 − sin θ)/cos θ], and
    2c = 2 R θ.
    """
    radius = diameter / 2.0
    return np.asarray(diameter * (np.pi / 2 - 2.0 * np.arctan(1.0 - a / radius)))
