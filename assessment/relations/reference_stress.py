"""Reference stress: the stress at which the metal left beside the crack gives way.

Load ratio L_r = reference stress ÷ yield strength. All stresses in MPa, lengths in m; bending that
closes the crack counts as bending all the same (its magnitude).
"""

from functools import cache

import numpy as np

from assessment.validity import Floats, Range, Validity

THROUGH = Validity(
    relation="reference stress of a through crack in a plate",
    source="BS 7910:2013, annex P, through-thickness flaw in a plate (rotation restrained)",
    accuracy="a lower bound of the limit load",
    ranges=(Range("2a/W", "crack length over plate width", 0.0, 1.0, False, True),),
    witness="formula read; for membrane stress it is the net-section stress",
    tests=("tests/external/test_limiting_cases.py::test_a_centre_crack_leaves_the_net_section",),
)
EDGE = Validity(
    relation="reference stress of an edge crack in a plate, ends free to rotate",
    source=(
        "lower-bound limit analysis of the ligament under force and moment, plane stress, derived "
        "here; the same model as in A. G. Miller, Review of limit loads of structures containing "
        "defects, Int. J. Press. Vess. Piping 32 (1988) 197-327"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/W", "crack length over plate width", 0.0, 1.0, False, True),),
    witness="derivation; limits: no crack, pure bending 2/3, deep crack",
    tests=(
        "tests/external/test_limiting_cases.py::test_the_edge_ligament_carries_its_force_and_moment",
    ),
)
SURFACE = Validity(
    relation="reference stress of a surface crack in a plate",
    source="BS 7910:2013, annex P, surface flaw in a plate (bending restrained), local",
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory; agrees with the check values from memory; limits: no crack, long crack",
    tests=(
        "tests/external/test_stress_intensity_values.py",
        "tests/external/test_limiting_cases.py::test_a_long_surface_crack_is_a_strip_cut_to_what_is_left",
    ),
)
CYLINDER = Validity(
    relation="reference stress of an axial surface crack in a cylinder",
    source="BS 7910:2005 and 2013, annex P, axial internal surface flaw: 1.2 M_s P_m",
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory (medium confidence); agrees with the check value from memory",
    tests=("tests/external/test_stress_intensity_values.py",),
)
BAR = Validity(
    relation="reference stress of a cracked round bar",
    source=(
        "plastic section of the bar cut off straight at the crack's depth, derived here: "
        "N/A + (M + N e)/Z with the plastic modulus Z of what is left about the axis that halves "
        "its area, e the distance of that axis from the bar's"
    ),
    accuracy="below the limit load: it takes more metal away than the crack does, and adds force "
    "and moment instead of combining them",
    ranges=(Range("a/D", "crack depth over bar diameter", 0.0, 1.0, False, True),),
    witness="derivation; limits: no crack in tension, 3π/16 in bending",
    tests=(
        "tests/external/test_limiting_cases.py::test_a_cut_bar_against_its_areas_by_quadrature",
    ),
)
THICKNESS = Validity(
    relation="reference stress by the thickness that is left",
    source="net section of the thickness; where the basis gives a limit load table, that table",
    accuracy="as the table; the net section neglects what stands beside the crack",
    ranges=(),
    witness="data of the basis",
    tests=("tests/external/test_ranges.py",),
)


def through(membrane: Floats, bending: Floats, relative: Floats) -> Floats:
    """[P_b + √(P_b² + 9 P_m²)] / [3 (1 − 2a/W)]."""
    pb, pm = np.abs(bending), np.abs(membrane)
    return np.asarray((pb + np.sqrt(pb**2 + 9.0 * pm**2)) / (3.0 * (1.0 - relative)))


def edge(membrane: Floats, bending: Floats, relative: Floats) -> Floats:
    """Ligament l = W − a under N = P_m W and M = P_b W²/6 + P_m W a/2 about its own middle:

    σ = 2 m + √(4 m² + n²) with n = N/l, m = M/l² per unit thickness: the force and moment at which
    a rectangle of stress ±σ carries both.
    """
    left = 1.0 - relative
    n = membrane / left
    m = np.abs(bending / 6.0 + membrane * relative / 2.0) / left**2
    return np.asarray(2.0 * m + np.sqrt(4.0 * m**2 + n**2))


def surface(
    membrane: Floats, bending: Floats, a: Floats, c: Floats, thickness: float, width: float
) -> Floats:
    """[P_b + √(P_b² + 9 P_m² (1 − α)²)] / [3 (1 − α)²], with
    α = (a/B)/(1 + B/c) where W ≥ 2(c + B), else α = (2a/B)(c/W)."""
    wide = width >= 2.0 * (c + thickness)
    alpha = np.where(wide, (a / thickness) / (1.0 + thickness / c), 2.0 * a / thickness * c / width)
    left = 1.0 - alpha
    pb, pm = np.abs(bending), np.abs(membrane)
    return np.asarray((pb + np.sqrt(pb**2 + 9.0 * (pm * left) ** 2)) / (3.0 * left**2))


def cylinder_inside(
    pressure: Floats, a: Floats, c: Floats, thickness: float, radius: float
) -> Floats:
    """1.2 M_s P_m, M_s = [1 − a/(B M_T)]/[1 − a/B], M_T = √(1 + 1.6 c²/(r B)), r the mean radius.

    P_m is the hoop stress p R_i/B plus the pressure p that acts on the crack's faces.
    """
    mean = radius + thickness / 2.0
    m_t = np.sqrt(1.0 + 1.6 * c**2 / (mean * thickness))
    m_s = (1.0 - a / (thickness * m_t)) / (1.0 - a / thickness)
    return np.asarray(1.2 * m_s * np.abs(pressure) * (radius / thickness + 1.0))


def bar(membrane: Floats, bending: Floats, relative: Floats) -> Floats:
    """Reference stress of a bar cut off straight at the crack's depth, relative = a/D."""
    grid, area, shift, modulus = _cut_bar()
    a = np.interp(relative, grid, area)
    e = np.interp(relative, grid, shift)
    z = np.interp(relative, grid, modulus)
    full_area, elastic_modulus = np.pi / 4.0, np.pi / 32.0
    force = np.abs(membrane) * full_area
    moment = np.abs(bending * elastic_modulus + membrane * full_area * e)
    with np.errstate(divide="ignore"):
        return np.asarray(force / a + moment / z)


@cache
def _cut_bar() -> tuple[Floats, Floats, Floats, Floats]:
    """Area, shift of the halving axis and plastic modulus of a bar of diameter 1 cut off at a
    depth, from closed forms at 4,001 depths; straight lines between them are exact to 2e-5 up to
    a depth of 0.98. With nothing left the area and modulus are nil, and the stress is endless."""
    depths = 0.5 * (1.0 - np.cos(np.linspace(0.0, np.pi, 4001)))
    top = 0.5 - depths
    area = _area_below(top)
    # The axis that halves what is left, between the bottom and the cut: bisection to rounding.
    low, high = np.full_like(top, -0.5), top
    for _ in range(60):
        axis = 0.5 * (low + high)
        less = _area_below(axis) < 0.5 * area
        low, high = np.where(less, axis, low), np.where(less, high, axis)
    # The integral of |y - axis|, from ∫ y dA = -(2/3) (1/4 - y²)^(3/2).
    modulus = (4.0 * _beside(axis) ** 1.5 - 2.0 * _beside(top) ** 1.5) / 3.0
    return depths, area, -axis, modulus


def _beside(y: Floats) -> Floats:
    """1/4 - y²: the square of half the chord at height y."""
    return np.maximum(0.25 - y**2, 0.0)


def _area_below(y: Floats) -> Floats:
    """Area of a circle of diameter 1 below the chord at height y, from -1/2 to 1/2."""
    within = np.clip(2.0 * y, -1.0, 1.0)  # rounding alone leaves this interval
    return np.asarray(y * np.sqrt(_beside(y)) + 0.25 * np.arcsin(within) + np.pi / 8.0)
