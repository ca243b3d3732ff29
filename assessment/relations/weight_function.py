"""K of any stress through the thickness, by the universal weight function.

The stress that would act on the plane of the crack without it is given as a broken line. Each
straight part is integrated against the weight function in closed form, so nothing is lost between
the points of the line, and the line's kinks cost nothing.
"""

from collections.abc import Sequence

import numpy as np

from assessment.validity import Floats, Range, Validity

Profile = Sequence[tuple[float, float]]
"""(distance from the cracked surface in m, stress in MPa), distances rising from 0."""

_FORM = (
    "G. Shen & G. Glinka, Universal features of weight functions for cracks in mode I, Eng. Fract. "
    "Mech. 40 (1991) 1135-1146 (the form); coefficients derived here from the closed solutions of "
    "the same crack in tension and bending"
)
SURFACE = Validity(
    relation="stress intensity of a surface crack under any stress through the thickness",
    source=_FORM,
    accuracy="as the closed solutions in tension and bending; for other stresses, measured here, "
    "at most 2.5 % too low in parts of the K of the profile's largest stress acting all over; "
    "where the stress falls inwards 6 % low to 16 % high (deepest), 5 % low to 9 % high (surface)",
    ranges=(
        Range("a/c", "crack depth over half its length", 0.2, 1.0, basis="confirmed here"),
        Range("a/t", "crack depth over wall", 0.0, 0.8, low_open=True, basis="confirmed here"),
    ),
    witness=(
        "form from memory; tension and bending come back exactly; linear stress against values "
        "computed independently; square and cube of the depth against three-dimensional elements"
    ),
    tests=("tests/external/test_weight_function.py",),
)
EDGE = Validity(
    relation="stress intensity of an edge crack under any stress along its line",
    source=_FORM,
    accuracy="as the closed solutions in tension and bending; other stresses, measured here: "
    "rising from the edge 2.1 %, falling to nil within the crack 5 % low to 1 % high",
    ranges=(
        Range("a/W", "crack length over width", 0.0, 0.8, low_open=True, basis="confirmed here"),
    ),
    witness=(
        "form from memory; the half plane under uniform and linear stress; square and cube of the "
        "distance against plane elements"
    ),
    tests=(
        "tests/external/test_weight_function.py::test_edge_cracks_against_plane_elements",
        "tests/external/test_weight_function.py::test_an_edge_crack_in_a_half_plane",
    ),
)


def deepest(a: Floats, uniform: Floats, linear: Floats, profile: Profile) -> Floats:
    """K in MPa√m at the point furthest from the cracked surface (edge crack: its tip).

    K = ∫₀ᵃ σ(x) m(x) dx, m = 2/√(2π(a − x)) [1 + M₁ u^½ + M₂ u + M₃ u^{3/2}], u = 1 − x/a, with
    M₂ = 3 (no curvature of the crack's opening at its mouth), M₁ and M₃ from two known K.

    a : depth in m, any shape; uniform, linear : K ÷ √(πa) there for the stress 1 and the stress
    u = 1 − x/a, of a's shape
    """
    s0, s1 = (np.pi / np.sqrt(2.0) * np.asarray(k, dtype=float) for k in (uniform, linear))
    m3 = 12.0 * s1 - 6.0 * s0 + 8.0 / 5.0
    m1 = s0 - 4.0 - m3 / 2.0
    weights = (1.0, m1, 3.0, m3)
    return np.sqrt(2.0 * a / np.pi) * _sum(weights, _moments(a, profile, from_tip=True))


def surface(a: Floats, uniform: Floats, linear: Floats, profile: Profile) -> Floats:
    """K in MPa√m where the front meets the cracked surface.

    m = 2/√(πx) [1 + N₁ v^½ + N₂ v + N₃ v^{3/2}], v = x/a, with N₁ + N₂ + N₃ = −1 (nil at the
    deepest point), N₁ and N₂ from two known K. Arguments as for ``deepest``.
    """
    s0, s1 = (np.pi / 2.0 * np.asarray(k, dtype=float) for k in (uniform, linear))
    n2 = 15.0 + 60.0 * s0 - 90.0 * s1
    n1 = 30.0 * s1 - 18.0 * s0 - 8.0
    weights = (1.0, n1, n2, -1.0 - n1 - n2)
    return 2.0 * np.sqrt(a / np.pi) * _sum(weights, _moments(a, profile, from_tip=False))


def section_stresses(profile: Profile, depth: float) -> tuple[float, float]:
    """Membrane and bending stress in MPa with the force and moment of the profile over ``depth``.

    σ_m = (1/d) ∫ σ dx, σ_b = (6/d²) ∫ σ (d/2 − x) dx: positive where it opens the cracked surface.
    Raises ValueError where the profile does not reach from 0 to the depth.
    """
    x, s = np.asarray(profile, dtype=float).T
    if x[0] != 0.0 or x[-1] < depth:
        raise ValueError("the profile does not cover the section")
    at = np.append(x[x < depth], depth)
    stress = np.interp(at, x, s)
    width, middle = np.diff(at), 0.5 * (at[1:] + at[:-1])
    mean, slope = 0.5 * (stress[1:] + stress[:-1]), np.diff(stress)
    force = float(np.sum(width * mean))
    moment = float(np.sum(width * (mean * (depth / 2.0 - middle) - slope * width / 12.0)))
    return force / depth, 6.0 * moment / depth**2


def _sum(weights: Sequence[Floats | float], moments: Sequence[Floats]) -> Floats:
    pairs = zip(weights, moments, strict=True)
    return np.asarray(sum(weight * moment for weight, moment in pairs))


def _moments(a: Floats, profile: Profile, *, from_tip: bool) -> tuple[Floats, ...]:
    """∫₀¹ σ r^{(j−1)/2} dr for j = 0 to 3, each of a's shape; r is u (from the tip) or v.

    On each part of the line σ = p + q r. Parts beyond the crack shrink to nothing.
    """
    a = np.asarray(a, dtype=float)
    x, s = (np.asarray(column, dtype=float) for column in zip(*profile, strict=True))
    line = x.reshape(-1, *[1] * a.ndim)
    v = np.minimum(line / a, 1.0)
    slope = np.diff(s) / np.diff(x)
    q = slope.reshape(-1, *[1] * a.ndim) * a
    p = s[:-1].reshape(-1, *[1] * a.ndim) - q * (line[:-1] / a)
    if not from_tip:
        return tuple(np.sum(_part(p, q, v[:-1], v[1:], j), axis=0) for j in range(4))
    return tuple(np.sum(_part(p + q, -q, 1.0 - v[1:], 1.0 - v[:-1], j), axis=0) for j in range(4))


def _part(p: Floats, q: Floats, low: Floats, high: Floats, j: int) -> Floats:
    """∫ (p + q r) r^{(j−1)/2} dr from low to high."""
    first, second = (j + 1) / 2.0, (j + 3) / 2.0
    return np.asarray(
        p * (high**first - low**first) / first + q * (high**second - low**second) / second
    )
