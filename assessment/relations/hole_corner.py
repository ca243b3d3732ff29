"""Quarter-elliptical corner cracks at a round hole in the middle of a plate, one or two.

Remote tension by a published equation. The load of a pin is an own computation: the equation,
times the ratio of a pair of pins to tension that through cracks have at the same distance from the
bore.
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

from . import hole_through

MU = 0.85
# φ: the end along the bore (deepest) and the end along the width (surface).
ANGLES = (np.pi / 2, 0.0)
_RANGES = (
    Range("a/c", "crack depth along the bore over its length", 0.2, 2.0),
    Range("a/t", "crack depth over thickness", 0.0, 1.0, True, True),
    Range("R/t", "hole radius over thickness", 0.5, 2.0),
    Range("2(R + c)/W", "hole and crack over half the width", 0.0, 0.5, True, True),
)

TENSION = Validity(
    relation="stress intensity of a corner crack at a hole in tension",
    source=(
        "J. C. Newman & I. S. Raju, Stress-intensity factor equations for cracks in "
        "three-dimensional finite bodies, NASA TM-83200 (1981) / ASTM STP 791 (1983) I-238; one "
        "crack from two: R. C. Shah, ASTM STP 590 (1976) 429, as given there"
    ),
    accuracy=(
        "generally 5 % (stated); measured here against own three-dimensional elements on a coarse "
        "mesh: 4 % low to 13 % high at the end along the bore, 10 % low to 14 % high at the end "
        "along the width; finite width was compared for through cracks alone"
    ),
    ranges=_RANGES,
    witness=(
        "coefficients from memory; values agree with the check values from memory; "
        "three-dimensional finite elements over the range of shapes, depths and holes"
    ),
    tests=("tests/external/test_holes_corner.py",),
)
PIN = Validity(
    relation="stress intensity of a corner crack at a hole with a pin's load",
    source=(
        "own computation, published nowhere: half of remote tension and half of a pair of pins, "
        "the latter the published equation times the ratio of through cracks at the same distance"
    ),
    accuracy=(
        "the pair of pins against own three-dimensional elements on a coarse mesh: 6 % low to 13 % "
        "high at the end along the bore; at the end along the width 8 % low to 20 % high, more for "
        "long shallow cracks at small holes (60 % high at a/c = 0.25, R/t = 0.5); the pressure of "
        "a loose or tight pin differs from the one assumed"
    ),
    ranges=(*_RANGES, Range("D/W", "hole diameter over plate width", 0.01, 0.5, False, False)),
    witness="three-dimensional finite elements over the range of shapes, depths and holes",
    tests=("tests/external/test_holes_corner.py::test_tension_and_pin_by_solid_elements",),
)


def validity_values(
    a: Floats, c: Floats, thickness: float, radius: float, width: float
) -> dict[str, Floats]:
    """The symbols of TENSION and PIN. a, c in m of any one shape."""
    a, c = np.broadcast_arrays(np.asarray(a, dtype=float), np.asarray(c, dtype=float))
    return {
        "a/c": a / c,
        "a/t": a / thickness,
        "R/t": np.full_like(a, radius / thickness),
        "2(R + c)/W": 2.0 * (radius + c) / width,
        "D/W": np.full_like(a, 2.0 * radius / width),
    }


def tension(
    a: Floats, c: Floats, thickness: float, radius: float, width: float, cracks: int
) -> Floats:
    """K ÷ σ in √m at the deepest and the surface point, shape (2, ...), remote tension σ:

    K = σ √(πa/Q) [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g₁ g₂ g₃ g₄ f_φ f_w, two cracks; for one times
    √{[4/π + ac/(2tR)]/[4/π + ac/(tR)]}. a, c, thickness, radius, width : m
    """
    base = wide(a, c, thickness, radius, cracks)
    return np.asarray(base * _finite_width(a, c, thickness, radius, width, cracks))


def wide(a: Floats, c: Floats, thickness: float, radius: float, cracks: int) -> Floats:
    """K ÷ σ in a wide plate, two cracks or one."""
    share = _share(a, c, thickness, radius, cracks)
    return np.asarray(wide_pair_of_cracks(a, c, thickness, radius) * share)


def wide_pair_of_cracks(a: Floats, c: Floats, thickness: float, radius: float) -> Floats:
    """K ÷ σ of two cracks in a wide plate, shape (2, ...)."""
    m, g3_shape, g4, q = _shape(a / c, a / thickness)
    common = m * g3_shape * g4 * np.sqrt(np.pi * a / q)
    return np.stack([common * _at(angle, a, c, thickness, radius) for angle in ANGLES])


def _shape(shape: Floats, depth: Floats) -> tuple[Floats, Floats, Floats, Floats]:
    """M, the factor of g₃ that depends on a/c, g₄ and Q; shape = a/c, depth = a/t."""
    deep = shape > 1.0
    s = np.where(deep, 1.0, shape)
    i = np.where(deep, 1.0 / np.where(deep, shape, 1.0), 1.0)
    m1 = np.where(deep, np.sqrt(i) * (1.0 + 0.04 * i), 1.13 - 0.09 * s)
    m2 = np.where(deep, 0.2 * i**4, -0.54 + 0.89 / (0.2 + s))
    m3 = np.where(deep, -0.11 * i**4, 0.5 - 1.0 / (0.65 + s) + 14.0 * (1.0 - s) ** 24)
    g3 = np.where(deep, 1.13 - 0.09 * i, 1.0 + 0.04 * s)
    g4 = np.where(deep, 1.0, 1.0 - 0.7 * (1.0 - depth) * (s - 0.2) * (1.0 - s))
    q = 1.0 + 1.464 * np.where(deep, i, s) ** 1.65
    return m1 + m2 * depth**2 + m3 * depth**4, g3, g4, q


def _at(angle: float, a: Floats, c: Floats, thickness: float, radius: float) -> Floats:
    """g₁ g₂ f_φ and the rest of g₃ at the angle φ:

    g₁ = 1 + [0.1 + 0.35 (a/t)²] (1 − sin φ)², with c/a before (a/t)² where a > c
    g₂ = (1 + 0.358 λ + 1.425 λ² − 1.578 λ³ + 2.156 λ⁴)/(1 + 0.13 λ²), λ = 1/[1 + (c/R) cos(0.85 φ)]
    g₃ : [1 + 0.1 (1 − cos φ)²] [0.85 + 0.15 (a/t)^¼]
    f_φ = [(a/c)² cos²φ + sin²φ]^¼ where a ≤ c, else [cos²φ + (c/a)² sin²φ]^¼
    """
    shape, depth = a / c, a / thickness
    sine, cosine = np.sin(angle), np.cos(angle)
    inverse = np.minimum(1.0, 1.0 / shape)
    g1 = 1.0 + (0.1 + 0.35 * inverse * depth**2) * (1.0 - sine) ** 2
    part = 1.0 / (1.0 + c / radius * np.cos(MU * angle))
    g2 = 1.0 + part * (0.358 + part * (1.425 + part * (-1.578 + part * 2.156)))
    g2 = g2 / (1.0 + 0.13 * part**2)
    g3 = (1.0 + 0.1 * (1.0 - cosine) ** 2) * (0.85 + 0.15 * depth**0.25)
    along = np.minimum(1.0, shape) ** 2 * cosine**2 + inverse**2 * sine**2
    return np.asarray(g1 * g2 * g3 * along**0.25)


def _finite_width(
    a: Floats, c: Floats, thickness: float, radius: float, width: float, cracks: int
) -> Floats:
    """f_w = √(sec(πR/W) sec{π(2R + nc)/[4(W/2 − c) + 2nc] √(a/t)})."""
    angle = np.pi * (2.0 * radius + cracks * c) / (4.0 * (width / 2.0 - c) + 2.0 * cracks * c)
    with np.errstate(invalid="ignore", divide="ignore"):
        cosines = np.cos(np.pi * radius / width) * np.cos(angle * np.sqrt(a / thickness))
        return np.asarray(1.0 / np.sqrt(cosines))


def pin(a: Floats, c: Floats, thickness: float, radius: float, width: float, cracks: int) -> Floats:
    """K ÷ σ_b in √m, shape (2, ...), σ_b = P/(D t), of a pin whose load one end takes up:

    K = [K_tension D/W + K_pair]/2, K_pair = K_tension(wide) G(c cos 0.85φ)/F(c cos 0.85φ) g_w(c),
    F, G and g_w of through cracks (hole_through)
    """
    base = wide(a, c, thickness, radius, cracks)
    return np.asarray(base * _pin_over_wide(a, c, thickness, radius, width, cracks))


def _pin_over_wide(
    a: Floats, c: Floats, thickness: float, radius: float, width: float, cracks: int
) -> Floats:
    remote = _finite_width(a, c, thickness, radius, width, cracks) * 2.0 * radius / width
    pair = pair_over_tension(c, radius, cracks)
    return np.asarray((remote + pair * hole_through.pair_width(c, radius, width, cracks)) / 2.0)


def pair_of_pins(a: Floats, c: Floats, thickness: float, radius: float, cracks: int) -> Floats:
    """K ÷ σ_b in √m in a wide plate, shape (2, ...), of a pair of pins pressing the bore apart."""
    base = wide(a, c, thickness, radius, cracks)
    return np.asarray(base * pair_over_tension(c, radius, cracks))


def _share(a: Floats, c: Floats, thickness: float, radius: float, cracks: int) -> Floats:
    """K of one crack over that of two."""
    if cracks == 2:
        return np.asarray(1.0)
    area = a * c / (thickness * radius)
    return np.asarray(np.sqrt((4.0 / np.pi + area / 2.0) / (4.0 / np.pi + area)))


def pair_over_tension(c: Floats, radius: float, cracks: int) -> Floats:
    """At both points, at the lengths c cos 0.85φ that the equation itself takes for the hole."""
    lengths = np.stack([c * np.cos(MU * angle) for angle in ANGLES])
    pair = hole_through.pair_wide(lengths, radius, cracks)
    return np.asarray(pair / hole_through.tension_wide(lengths, radius, cracks))


def stress_intensity(
    a: Floats,
    c: Floats,
    membrane: Floats,
    bearing: Floats,
    thickness: float,
    radius: float,
    width: float,
    cracks: int,
) -> Floats:
    """K in MPa√m at the deepest and the surface point, shape (2, ...).

    a : depth along the bore, c : length from it, in m; membrane : MPa, the stress that passes the
    hole by; bearing : P/(D t) in MPa; thickness, radius, width : m; cracks : 1 or 2
    """
    with np.errstate(invalid="ignore", divide="ignore"):
        base = wide(a, c, thickness, radius, cracks)
        by_tension = base * _finite_width(a, c, thickness, radius, width, cracks)
        by_pin = base * _pin_over_wide(a, c, thickness, radius, width, cracks)
        # Point by point: the loads may stand on an axis of their own before the samples.
        return np.stack(
            [t * membrane + p * bearing for t, p in zip(by_tension, by_pin, strict=True)]
        )
