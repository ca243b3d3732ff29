"""Quarter-elliptical crack at a corner of a plate under tension and bending, at its two ends."""

import numpy as np

from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of a corner crack in a plate",
    source=(
        "J. C. Newman & I. S. Raju, Stress-intensity factor equations for cracks in "
        "three-dimensional finite bodies subjected to tension and bending loads, NASA TM-85793 "
        "(1984), and Computational Methods in the Mechanics of Fracture (1986), ch. 9"
    ),
    accuracy=(
        "5 % against the finite elements it was fitted to (stated); measured here in tension, the "
        "ends of the plate free to turn: from 4 % below to 23 % above up to c/W = 0.2, from 4 % "
        "below to 42 % above at c/W = 0.4, where f_w is far on the safe side"
    ),
    ranges=(
        Range("a/c", "depth along the thickness over length along the width", 0.2, 2.0),
        Range("a/t", "crack depth over wall thickness", 0.0, 0.8, True, False),
        Range("c/W", "crack length over plate width", 0.0, 0.5, True, True),
    ),
    witness=(
        "from memory; confirmed at both ends by an independent three-dimensional computation for "
        "a/c 0.3 to 2, a/t 0.2 to 0.8, c/W 0.05 to 0.4; the printed limit of a quarter circle"
    ),
    tests=(
        "tests/external/test_plate_solids.py::test_a_corner_crack",
        "tests/external/test_plate_kinds.py::test_corner",
        "tests/external/test_plate_kinds.py::test_a_small_quarter_circle_has_the_printed_factor",
    ),
)
BENDING = Validity(
    relation="stress intensity of a corner crack in a plate in bending",
    source=VALIDITY.source + ": H",
    accuracy=(
        "measured here up to c/W = 0.2: from 5 % below to 15 % above, of the value in tension of "
        "the same stress"
    ),
    ranges=(
        Range("c/W in bending", "crack length over plate width, in bending", 0.0, 0.2, True, False),
    ),
    witness=(
        "from memory; confirmed by the same computation up to c/W = 0.2; at 0.4 it is too low by "
        "up to 20 % of the value in tension at the end along the thickness, so that such a crack "
        "is referred"
    ),
    tests=(
        "tests/external/test_plate_solids.py::test_a_corner_crack",
        "tests/external/test_plate_solids.py::test_a_wide_corner_crack_in_bending_is_below_the_elements_and_so_referred",
    ),
)


def validity_values(a: Floats, c: Floats, thickness: float, width: float) -> dict[str, Floats]:
    """The symbols of VALIDITY and BENDING."""
    part = c / width
    return {"a/c": a / c, "a/t": a / thickness, "c/W": part, "c/W in bending": part}


def stress_intensity(
    a: Floats, c: Floats, membrane: Floats, bending: Floats, thickness: float, width: float
) -> Floats:
    """K in MPa√m at the end along the thickness (φ = 90°) and along the width (φ = 0), (2, ...).

    K = (σ_m + H σ_b) √(πa/Q) F(a/c, a/t, φ) f_w
    a, c : along the thickness and along the width, m; membrane, bending : MPa, bending across the
    thickness, positive where it opens the crack at the surface along which c runs;
    thickness, width : m
    """
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    depth = a / thickness
    deep, wide, root = terms(a, c, thickness)
    bend_deep, bend_wide = bending_factors(a / c, depth)
    finite = finite_width(c / width, depth)
    return np.stack(
        [
            (membrane + bend_deep * bending) * deep * finite * root,
            (membrane + bend_wide * bending) * wide * finite * root,
        ]
    )


def terms(a: Floats, c: Floats, thickness: float) -> tuple[Floats, Floats, Floats]:
    """F at the end along the thickness and along the width, and √(πa/Q)."""
    shape, depth = a / c, a / thickness
    deep = factor(shape, depth, np.pi / 2)
    return deep, factor(shape, depth, 0.0), np.sqrt(np.pi * a / shape_factor(shape))


def shape_factor(shape: Floats) -> Floats:
    """Q = 1 + 1.464 (a/c)^1.65, or with c/a where that is below 1."""
    return np.asarray(1.0 + 1.464 * np.minimum(shape, 1.0 / shape) ** 1.65)


def factor(shape: Floats, depth: Floats, phi: float) -> Floats:
    """F = [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g₁ g₂ f_φ in tension, without f_w.

    shape : a/c; depth : a/t; phi : parametric angle in radians, nil at the end along the width
    """
    shallow = shape <= 1.0
    s = np.where(shallow, shape, 1.0)
    i = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    m1 = np.where(shallow, 1.08 - 0.03 * s, np.sqrt(i) * (1.08 - 0.03 * i))
    m2 = np.where(shallow, -0.44 + 1.06 / (0.3 + s), 0.375 * i**2)
    m3 = np.where(shallow, -0.5 + 0.25 * s + 14.8 * (1.0 - s) ** 15, -0.25 * i**2)
    m = m1 + m2 * depth**2 + m3 * depth**4
    # In a deep crack the shorter side, c, takes the place of a in g₁ and g₂.
    ratio = depth * i
    sine, cosine = np.sin(phi), np.cos(phi)
    g1 = 1.0 + (0.08 + 0.40 * ratio**2) * (1.0 - sine) ** 3
    g2 = 1.0 + (0.08 + 0.15 * ratio**2) * (1.0 - cosine) ** 3
    f = ((s * cosine) ** 2 + (i * sine) ** 2) ** 0.25
    return np.asarray(m * g1 * g2 * f)


def finite_width(relative: Floats, depth: Floats) -> Floats:
    """f_w = 1 − 0.2 λ + 9.4 λ² − 19.4 λ³ + 27.1 λ⁴, λ = (c/W) √(a/t)."""
    lam = relative * np.sqrt(depth)
    return np.asarray(1.0 + lam * (-0.2 + lam * (9.4 + lam * (-19.4 + 27.1 * lam))))


def bending_factors(shape: Floats, depth: Floats) -> tuple[Floats, Floats]:
    """H₂ at φ = 90° and H₁ at φ = 0."""
    shallow = shape <= 1.0
    s = np.where(shallow, shape, 1.0)
    i = np.where(shallow, 1.0, 1.0 / np.where(shape > 0.0, shape, np.nan))
    g21 = np.where(shallow, -1.22 - 0.12 * s, -2.11 + 0.77 * i)
    g22 = np.where(
        shallow,
        0.64 - 1.05 * s**0.75 + 0.47 * s**1.5,
        0.64 - 0.72 * i**0.75 + 0.14 * i**1.5,
    )
    linear = np.where(shallow, -0.34 - 0.11 * s, -(0.04 + 0.41 * i))
    square = np.where(shallow, 0.0, 0.55 - 1.93 * i**0.75 + 1.38 * i**1.5)
    return 1.0 + depth * (g21 + g22 * depth), 1.0 + depth * (linear + square * depth)
