"""Elliptical crack inside a plate under membrane stress, at the end nearer a surface and at the
end of its length."""

import numpy as np

from assessment.relations.corner_crack import shape_factor
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="stress intensity of an elliptical crack inside a plate",
    source=(
        "J. C. Newman & I. S. Raju, NASA TM-85793 (1984), embedded elliptical crack midway in a "
        "plate; nearer one surface by BS 7910:2013 annex M: as midway in a plate of thickness "
        "2 (a + p), p the nearer ligament"
    ),
    accuracy="3 % for a crack midway (stated); measured here, midway and nearer one surface: from "
    "1 % below to 7 % above",
    ranges=(
        Range("a/c", "crack height over its length", 0.2, 2.0),
        Range("a/(a + p)", "half height over half height and nearer ligament", 0.0, 0.8, True),
        Range("2c/W", "crack length over plate width", 0.0, 0.5, True, True),
    ),
    witness=(
        "from memory; confirmed by two independent three-dimensional computations, midway and off "
        "the middle (a/c 0.2 to 2, a/(a + p) 0.25 to 0.8), and by the exact ellipse in an endless "
        "body"
    ),
    tests=(
        "tests/external/test_plate_solids.py::test_an_inner_crack",
        "tests/external/test_plate_kinds.py::test_an_ellipse_in_an_endless_body",
    ),
)


def validity_values(a: Floats, c: Floats, to_surface: Floats, width: float) -> dict[str, Floats]:
    """The symbols of VALIDITY."""
    return {"a/c": a / c, "a/(a + p)": a / to_surface, "2c/W": 2.0 * c / width}


def stress_intensity(
    a: Floats, c: Floats, membrane: Floats, to_surface: Floats, width: float
) -> Floats:
    """K in MPa√m at the end nearer the surface (φ = 90°) and at the end of the length, (2, ...).

    K = σ √(πa/Q) F f_w, with t the distance from the crack's middle to the nearer surface.
    a, c : half height and half length, m; membrane : MPa; to_surface, width : m
    """
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    shape, depth = a / c, a / to_surface
    with np.errstate(invalid="ignore"):
        # Beyond the surface, or half the width, there is no value: NaN ends a growth run.
        finite_width = 1.0 / np.sqrt(np.cos(np.pi * c / width * np.sqrt(depth)))
        common = membrane * np.sqrt(np.pi * a / shape_factor(shape)) * finite_width
        deep, end = factor(shape, depth, np.pi / 2), factor(shape, depth, 0.0)
    return np.stack([common * deep, common * end])


def factor(shape: Floats, depth: Floats, phi: float) -> Floats:
    """F = [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g f_φ, without f_w.

    shape : a/c; depth : a/t, t from the crack's middle to the nearer surface; phi : parametric
    angle in radians, nil at the end of the length
    """
    shallow = shape <= 1.0
    s, i = np.where(shallow, shape, 1.0), np.where(shallow, 1.0, 1.0 / shape)
    power = shape**1.5
    m = np.sqrt(i) + 0.05 / (0.11 + power) * depth**2 + 0.29 / (0.23 + power) * depth**4
    end = depth**4 * np.sqrt(2.6 - 2.0 * depth) / (1.0 + 4.0 * shape)
    g = 1.0 - end * np.abs(np.cos(phi))
    f = ((s * np.cos(phi)) ** 2 + (i * np.sin(phi)) ** 2) ** 0.25
    return np.asarray(m * g * f)
