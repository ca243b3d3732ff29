"""Semi-elliptical surface crack in a plate under tension and bending, at its two named points."""

import numpy as np

from assessment.relations import weight_function
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of a semi-elliptical surface crack in a plate",
    source=(
        "J. C. Newman & I. S. Raju, An empirical stress-intensity factor equation for the surface "
        "crack, Eng. Fract. Mech. 15 (1981) 185-192; a/c above 1: the same authors, "
        "Stress-intensity factor equations for cracks in three-dimensional finite bodies, "
        "NASA TM-85793 (1984) / ASTM STP 791 (1983) I-238"
    ),
    accuracy="5 % against the finite elements it was fitted to (stated); measured here against "
    "others: within 6 %, and up to 10 % high at a/t = 0.8; in bending within 5 % of the value in "
    "tension of the same stress, with a/c above 1 too",
    ranges=(
        Range("a/c", "crack depth over half its length", 0.0, 2.0, True, False),
        Range("a/t", "crack depth over wall thickness", 0.0, 1.0, True, True),
        Range(
            "a/t ÷ 1.25(a/c + 0.6)",
            "crack depth over wall thickness, for a long shallow crack",
            0.0,
            1.0,
            True,
            False,
        ),
        Range("2c/W", "crack length over plate width", 0.0, 0.5, True, True),
    ),
    witness=(
        "from memory; confirmed by two independent three-dimensional computations (a band of 6 %, "
        "10 % at a/t = 0.8; a/c 0.2 to 2, a/t 0.2 to 0.8, 2c/W 0.2 and 0.48), in bending with "
        "G₂₂ = 0.55 − 0.72 (c/a)^0.75 + 0.14 (c/a)^1.5, and by the printed limit of a half circle"
    ),
    tests=(
        "tests/external/test_checks_plate_relations.py",
        "tests/external/test_plate_solids.py::test_a_surface_crack",
        "tests/external/test_limiting_cases.py::test_a_small_half_circle_at_depth_is_near_two_over_pi",
    ),
)


def validity_values(a: Floats, c: Floats, thickness: float, width: float) -> dict[str, Floats]:
    """The symbols of VALIDITY. a, c in m of any one shape."""
    depth, shape = a / thickness, a / c
    long = np.where(shape < 0.2, depth / (1.25 * (shape + 0.6)), np.minimum(depth, 1.0))
    return {
        "a/c": shape,
        "a/t": depth,
        "a/t ÷ 1.25(a/c + 0.6)": long,
        "2c/W": 2.0 * c / width,
    }


def stress_intensity(
    a: Floats, c: Floats, membrane: Floats, bending: Floats, thickness: float, width: float
) -> Floats:
    """K in MPa√m at the deepest and the surface point, shape (2, ...).

    K = (σ_m + H σ_b) √(πa/Q) F(a/c, a/t, φ, c/W), φ = 90° at the deepest point, 0 at the surface.
    a, c : depth and half length in m; membrane, bending : MPa, any shapes that broadcast;
    thickness, width : m
    """
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    deep, surface, root = _boundary(a, c, thickness, width)
    bend_deep, bend_surface = _bending_factors(a / c, a / thickness)
    return np.stack(
        [
            (membrane + bend_deep * bending) * deep * root,
            (membrane + bend_surface * bending) * surface * root,
        ]
    )


def stress_intensity_of_profile(
    a: Floats, c: Floats, profile: weight_function.Profile, thickness: float, width: float
) -> Floats:
    """K in MPa√m of a stress through the thickness, at the same two points, shape (2, ...).

    The weight function rests on the equation above: under a stress that falls in a straight line
    to nil at the deepest point it gives F₁ = F (2 + (H − 1) t/a) / 2, which is what tension and
    bending together say, and stays finite for a shallow crack.
    """
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    *factors, root = _boundary(a, c, thickness, width)
    depth = a / thickness
    with np.errstate(divide="ignore", invalid="ignore"):
        per_root = root / np.sqrt(np.pi * a)
        uniform = [factor * per_root for factor in factors]
        slopes = [(bend - 1.0) / depth for bend in _bending_factors(a / c, depth)]
        linear = [one * (2.0 + slope) / 2.0 for one, slope in zip(uniform, slopes, strict=True)]
        return np.stack(
            [
                weight_function.deepest(a, uniform[0], linear[0], profile),
                weight_function.surface(a, uniform[1], linear[1], profile),
            ]
        )


def _boundary(
    a: Floats, c: Floats, thickness: float, width: float
) -> tuple[Floats, Floats, Floats]:
    """F at the deepest and the surface point, and √(πa/Q)."""
    shape, depth = a / c, a / thickness
    square = depth**2
    deep_form, surface_form, correction, q = shape_terms(shape, square)
    with np.errstate(invalid="ignore"):
        # Beyond half the width the secant has no meaning: NaN, which ends a growth run.
        finite_width = 1.0 / np.sqrt(np.cos(np.pi * c / width * np.sqrt(depth)))
        root = np.sqrt(np.pi * a / q)
    return deep_form * finite_width, surface_form * correction * finite_width, root


def shape_terms(shape: Floats, depth_squared: Floats) -> tuple[Floats, Floats, Floats, Floats]:
    """M f_φ at the deepest and at the surface point, g at the surface point, and Q.

    shape : a/c; depth_squared : (a/t)². Shared with cylinders, which use the same M, g, f and Q.
    """
    shallow = shape <= 1.0
    if np.all(shallow):
        return _shallow_terms(shape, depth_squared)
    # Each form is evaluated where it holds; 1 stands in elsewhere and is not taken.
    wide = _shallow_terms(np.where(shallow, shape, 1.0), depth_squared)
    inverse = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    narrow = _deep_terms(inverse, depth_squared)
    one, two, three, four = (np.where(shallow, w, n) for w, n in zip(wide, narrow, strict=True))
    return one, two, three, four


def _shallow_terms(s: Floats, depth_squared: Floats) -> tuple[Floats, Floats, Floats, Floats]:
    """The four terms for s = a/c ≤ 1."""
    rest = (1.0 - s) ** 2
    eighth = rest**2 * rest**2  # multiplied out: a power of 24 costs more than all the rest
    m3 = 0.5 - 1.0 / (0.65 + s) + 14.0 * (eighth * eighth * eighth)
    m2 = -0.54 + 0.89 / (0.2 + s)
    m = 1.13 - 0.09 * s + depth_squared * (m2 + m3 * depth_squared)
    with np.errstate(invalid="ignore"):
        return m, m * np.sqrt(s), 1.1 + 0.35 * depth_squared, 1.0 + 1.464 * s**1.65


def _deep_terms(inverse: Floats, depth_squared: Floats) -> tuple[Floats, Floats, Floats, Floats]:
    """The four terms for inverse = c/a < 1."""
    root, fourth = np.sqrt(inverse), inverse**4
    m = root * (1.0 + 0.04 * inverse)
    m = m + depth_squared * (0.2 * fourth - 0.11 * fourth * depth_squared)
    g = 1.1 + 0.35 * inverse * depth_squared
    return m * root, m, g, 1.0 + 1.464 * inverse**1.65


def _bending_factors(shape: Floats, depth: Floats) -> tuple[Floats, Floats]:
    """H at the deepest (H₂) and at the surface point (H₁)."""
    shallow = shape <= 1.0
    if np.all(shallow):
        return _shallow_bending(shape, depth)
    wide = _shallow_bending(np.where(shallow, shape, 1.0), depth)
    inverse = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    deep, surface = (
        np.where(shallow, w, n) for w, n in zip(wide, _deep_bending(inverse, depth), strict=True)
    )
    return deep, surface


def _shallow_bending(s: Floats, depth: Floats) -> tuple[Floats, Floats]:
    """H₂ and H₁ for s = a/c ≤ 1."""
    with np.errstate(invalid="ignore"):
        power = s**0.75
    g22 = 0.55 - 1.05 * power + 0.47 * power**2
    g21 = -1.22 - 0.12 * s
    return 1.0 + depth * (g21 + g22 * depth), 1.0 - depth * (0.34 + 0.11 * s)


def _deep_bending(inverse: Floats, depth: Floats) -> tuple[Floats, Floats]:
    """H₂ and H₁ for inverse = c/a < 1."""
    power = inverse**0.75
    g21 = -2.11 + 0.77 * inverse
    g22 = 0.55 - 0.72 * power + 0.14 * power**2
    linear = -(0.04 + 0.41 * inverse)
    square = 0.55 - 1.93 * power + 1.38 * power**2
    return 1.0 + depth * (g21 + g22 * depth), 1.0 + depth * (linear + square * depth)
