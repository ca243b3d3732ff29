"""Semi-elliptical surface crack in a plate under tension and bending, at its two named points."""

import numpy as np

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
    "others: within 6 %, and up to 9.7 % high at a/t = 0.8",
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
        "from memory; confirmed by an independent three-dimensional computation (a band of 6 %, "
        "10 % at a/t = 0.8) and by the printed limit of a half circle"
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
    a, c = np.broadcast_arrays(np.asarray(a, dtype=float), np.asarray(c, dtype=float))
    deep, surface, root = _boundary(a, c, thickness, width)
    bend_deep, bend_surface = _bending_factors(a / c, a / thickness)
    return np.stack(
        [
            (membrane + bend_deep * bending) * deep * root,
            (membrane + bend_surface * bending) * surface * root,
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
    safe_shape = np.where(shallow, shape, 1.0)
    inverse = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    q = 1.0 + 1.464 * np.where(shallow, safe_shape, inverse) ** 1.65
    m1 = np.where(shallow, 1.13 - 0.09 * safe_shape, np.sqrt(inverse) * (1.0 + 0.04 * inverse))
    m2 = np.where(shallow, -0.54 + 0.89 / (0.2 + safe_shape), 0.2 * inverse**4)
    m3 = np.where(
        shallow,
        0.5 - 1.0 / (0.65 + safe_shape) + 14.0 * (1.0 - safe_shape) ** 24,
        -0.11 * inverse**4,
    )
    m = m1 + m2 * depth_squared + m3 * depth_squared**2
    g = 1.1 + 0.35 * np.where(shallow, 1.0, inverse) * depth_squared
    # f_φ: deepest 1 (a/c ≤ 1) or √(c/a); surface √(a/c) or 1.
    f_deep = np.where(shallow, 1.0, np.sqrt(inverse))
    f_surface = np.where(shallow, np.sqrt(safe_shape), 1.0)
    return m * f_deep, m * f_surface, g, q


def _bending_factors(shape: Floats, depth: Floats) -> tuple[Floats, Floats]:
    """H at the deepest (H₂) and at the surface point (H₁)."""
    shallow = shape <= 1.0
    s = np.where(shallow, shape, 1.0)
    i = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    g21 = np.where(shallow, -1.22 - 0.12 * s, -2.11 + 0.77 * i)
    g22 = np.where(
        shallow,
        0.55 - 1.05 * s**0.75 + 0.47 * s**1.5,
        0.55 - 0.72 * i**0.75 + 0.14 * i**1.5,
    )
    h1_linear = np.where(shallow, -0.34 - 0.11 * s, -(0.04 + 0.41 * i))
    h1_square = np.where(shallow, 0.0, 0.55 - 1.93 * i**0.75 + 1.38 * i**1.5)
    return 1.0 + depth * (g21 + g22 * depth), 1.0 + depth * (h1_linear + h1_square * depth)
