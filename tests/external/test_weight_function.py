"""Stress profiles: the weight functions against outside values, elements and plain integrals."""

import math
from typing import Any

import numpy as np
import pytest
from scipy.integrate import quad

from assessment import KINDS
from assessment.relations import edge_crack, surface_crack, weight_function

from .checks import BY_ID, given, starting
from .fem.plane import factor_of_faces
from .fem.solid_wall import Shape
from .fem.solid_wall import surface_crack as by_solid_elements

ONE = np.asarray(1.0)
SHAPES = [(0.2, 0.2), (0.2, 0.8), (0.4, 0.5), (0.6, 0.02), (1.0, 0.2), (1.0, 0.79)]
COARSE = {"along": 8, "inner": 5, "outer": 5, "across": 7, "far": 3, "first": 0.04}


def line(stress: Any, a: float, end: float, points: int = 400) -> list[tuple[float, float]]:
    """A stress of x/a as a broken line that is fine within the crack."""
    at = np.union1d(np.linspace(0.0, min(a, end), points), [a / 2.0, end])
    return [(float(x), float(stress(x / a))) for x in at]


def surface_k(shape: float, depth: float, stress: Any) -> Any:
    """K ÷ √(πa) at the deepest and the surface point of a plate of thickness 1."""
    a = np.asarray(depth)
    points = line(stress, depth, 1.0)
    k = surface_crack.stress_intensity_of_profile(a, a / shape, points, 1.0, 1e6)
    return k / math.sqrt(math.pi * depth)


@pytest.mark.parametrize(("shape", "depth"), SHAPES)
@pytest.mark.parametrize(("membrane", "bending"), [(1.0, 0.0), (0.0, 1.0), (2.0, -0.7)])
def test_tension_and_bending_come_back(
    shape: float, depth: float, membrane: float, bending: float
) -> None:
    """The closed solutions of the same crack, to the last digits."""
    a = np.asarray(depth)
    points = [(0.0, membrane + bending), (1.0, membrane - bending)]
    found = surface_crack.stress_intensity_of_profile(a, a / shape, points, 1.0, 40.0)
    closed = surface_crack.stress_intensity(
        a, a / shape, np.asarray(membrane), np.asarray(bending), 1.0, 40.0
    )
    assert found == pytest.approx(closed, rel=1e-9)


@pytest.mark.parametrize("relative", [0.3, 0.5, 0.79])
def test_an_edge_crack_in_tension_and_bending_comes_back(relative: float) -> None:
    a = np.asarray(relative)
    for load, points in (
        (edge_crack.tension(a), [(0.0, 1.0), (1.0, 1.0)]),
        (edge_crack.bending(a), [(0.0, 1.0), (1.0, -1.0)]),
    ):
        found = edge_crack.stress_intensity_of_profile(a, points, 1.0)
        assert found == pytest.approx(load * math.sqrt(math.pi * relative), rel=1e-9)


def test_an_edge_crack_in_a_half_plane() -> None:
    """1.1215, 0.439 for the stress that falls to the tip (Tada, Paris & Irwin, p. 8.3, from
    memory), the rest computed independently (wf_edge records)."""
    a = np.asarray(1e-6)
    factors = [
        float(edge_crack.stress_intensity_of_profile(a, line(s, 1e-6, 1.0), 1.0))
        / math.sqrt(math.pi * 1e-6)
        for s in (lambda v: 1.0, lambda v: max(1.0 - v, 0.0), lambda v: min(v, 1.0))
    ]
    assert factors[0] == pytest.approx(1.1215, rel=0.005)
    assert factors[1] == pytest.approx(BY_ID["wf_edge_halfplane_check"]["value"], abs=1e-3)
    assert factors[1] == pytest.approx(BY_ID["wf_edge_linear_num"]["value"], rel=1e-4)
    assert factors[2] == pytest.approx(0.68286, rel=0.01)


@pytest.mark.parametrize("name", starting("surf_fe_linear_deep"))
def test_a_falling_stress_against_another_computation(name: str) -> None:
    """Three-dimensional elements of another make. 4 % for the flat shapes, which is the band of the
    equation; a half circle falls so fast that the equation's own error is twice as large a part."""
    check = BY_ID[name]
    shape, depth = given(check, "a/c"), given(check, "a/t")
    found = surface_k(shape, depth, lambda v: 1.0 - v)[0] * math.sqrt(1.0 + 1.464 * shape**1.65)
    band = 0.15 if shape == 1.0 else 0.06
    assert found == pytest.approx(check["value"], rel=band), check["source"]
    uniform = surface_k(shape, depth, lambda v: 1.0)[0] * math.sqrt(1.0 + 1.464 * shape**1.65)
    assert abs(found - check["value"]) < 0.05 * uniform


@pytest.mark.parametrize("name", starting("sg91_deep"))
def test_the_published_coefficients_of_the_form(name: str) -> None:
    """Theirs, from their own two factors (from memory): the same algebra as here."""
    check = BY_ID[name]
    uniform, falling, m1, m2, m3 = check["value"]
    root = math.sqrt(1.0 + 1.464 * given(check, "a/c") ** 1.65)

    def theirs(x: float) -> float:
        u = 1.0 - x
        form = 1.0 + m1 * math.sqrt(u) + m2 * u + m3 * u**1.5
        return 2.0 * form * x**2 / math.sqrt(2.0 * math.pi)

    square = quad(theirs, 0.0, 1.0, weight="alg", wvar=(0.0, -0.5))[0]
    here = weight_function.deepest(
        ONE, np.asarray(uniform / root), np.asarray(falling / root), line(lambda v: v**2, 1.0, 1.0)
    )
    assert float(here) == pytest.approx(square, rel=2e-4), check["source"]


@pytest.mark.parametrize("relative", [0.02, 0.1, 0.3, 0.6, 0.8])
@pytest.mark.parametrize(
    ("stress", "low", "high"),
    [
        (lambda v: (1.0 - v) ** 2, 0.97, 1.01),
        (lambda v: (1.0 - v) ** 3, 0.955, 1.01),
        (lambda v: v**2, 0.99, 1.021),
        (lambda v: v**3, 0.985, 1.022),
        (lambda v: np.maximum(1.0 - 2.0 * v, 0.0), 0.95, 1.01),
    ],
)
def test_edge_cracks_against_plane_elements(
    relative: float, stress: Any, low: float, high: float
) -> None:
    a = np.asarray(relative)
    found = edge_crack.stress_intensity_of_profile(a, line(stress, relative, 1.0), 1.0)
    here = float(found) / math.sqrt(math.pi * relative)
    assert low <= here / factor_of_faces(relative, stress) <= high


def test_the_face_loads_of_the_elements_are_tension_and_bending() -> None:
    from .fem.plane import geometry_factor

    for relative in (0.2, 0.6):
        pulled = factor_of_faces(relative, lambda v: 1.0 + 0.0 * v)
        bent = factor_of_faces(relative, lambda v, a=relative: 1.0 - 2.0 * a * v)
        assert pulled == pytest.approx(geometry_factor("edge", relative, "tension"), rel=1e-3)
        assert bent == pytest.approx(geometry_factor("edge", relative, "bending"), rel=1e-3)


@pytest.mark.parametrize(("shape", "depth"), [(0.4, 0.5), (0.2, 0.8), (0.6, 0.5), (0.99, 0.5)])
def test_surface_cracks_against_solid_elements(shape: float, depth: float) -> None:
    """Square and cube of what is left, square of the depth, and a kink: as the accuracy says."""
    radius = 2000.0  # so large that the wall is a plate
    stresses = [
        lambda v: (1.0 - v) ** 2,
        lambda v: (1.0 - v) ** 3,
        lambda v: np.maximum(1.0 - 2.0 * v, 0.0),
        lambda v: v**2,
        lambda v: 1.0 + 0.0 * v,
    ]
    faces = [lambda x, r, s=s: s((r - radius) / depth) for s in stresses]
    c = depth / shape
    _, k = by_solid_elements(depth, c, Shape(False, True, radius, 1.0, c + 6.0), faces, **COARSE)
    elements = k[:, [-1, 0]] / math.sqrt(math.pi * depth)
    for stress, theirs in zip(stresses, elements, strict=True):
        here = surface_k(shape, depth, stress)
        assert np.all(here - theirs > -0.025 * elements[-1])
        assert np.all(here - theirs < 0.11 * elements[-1])
        if stress is not stresses[3]:
            assert 0.94 <= here[0] / theirs[0] <= 1.16 and 0.95 <= here[1] / theirs[1] <= 1.09


@pytest.mark.parametrize(("shape", "depth"), SHAPES)
def test_the_closed_integrals_against_plain_quadrature(shape: float, depth: float) -> None:
    """A broken line with a jump of slope inside and outside the crack, piece by piece."""
    points = [(0.0, 3.0), (0.1, -1.0), (0.45, 2.0), (1.0, 0.5)]
    uniform, falling = np.asarray(0.9), np.asarray(0.35)
    x, s = zip(*points, strict=True)
    inside = [p for p in x if p < depth] + [depth]

    def integral(weight: Any) -> float:
        pieces = zip(inside[:-1], inside[1:], strict=True)
        return sum(quad(weight, low, high, limit=200)[0] for low, high in pieces)

    m3 = 12.0 * math.pi / math.sqrt(2.0) * 0.35 - 6.0 * math.pi / math.sqrt(2.0) * 0.9 + 1.6
    m1 = math.pi / math.sqrt(2.0) * 0.9 - 4.0 - m3 / 2.0

    def deep(at: float) -> float:
        u = 1.0 - at / depth
        form = 1.0 + m1 * math.sqrt(u) + 3.0 * u + m3 * u**1.5
        return float(np.interp(at, x, s)) * 2.0 * form / math.sqrt(2.0 * math.pi * (depth - at))

    found = weight_function.deepest(np.asarray(depth), uniform, falling, points)
    assert float(found) == pytest.approx(integral(deep), rel=1e-6)


def test_more_points_on_the_same_line_change_nothing() -> None:
    few = [(0.0, 100.0), (0.4, 20.0), (1.0, -50.0)]
    many = [(x, float(np.interp(x, *zip(*few, strict=True)))) for x in np.linspace(0, 1, 151)]
    many = sorted({*many, *few})
    a, c = np.array([0.05, 0.39, 0.4, 0.41, 0.7]), np.array([0.2, 0.5, 0.5, 0.6, 1.0])
    one, two = (
        surface_crack.stress_intensity_of_profile(a, c, points, 1.0, 40.0) for points in (few, many)
    )
    assert one == pytest.approx(two, rel=1e-9)


def test_a_profile_is_one_load_among_others_in_every_kind_that_takes_it() -> None:
    """Linear, and alike for one front or many."""
    body: dict[str, Any] = {"width": 0.4, "thickness": 0.02, "attachment_length": 0.03}
    body |= {"ends": "free"}
    for name, kind in KINDS.items():
        if kind.profile_over is None:
            continue
        wall = body[kind.profile_over]
        body["profiles"] = {"profile 1": [(0.0, 80.0), (wall / 3, 10.0), (wall, -5.0)]}
        x = np.array([[0.004, 0.007], [0.01, 0.012]])[: len(kind.points)]
        both = kind.stress_intensity(x, {"membrane": ONE, "profile 1": 2.0 * ONE}, body)
        apart = kind.stress_intensity(x, {"membrane": ONE}, body)
        apart = apart + 2.0 * kind.stress_intensity(x, {"profile 1": ONE}, body)
        assert both == pytest.approx(apart, rel=1e-12), name
        single = kind.stress_intensity(x[:, 0], {"membrane": ONE, "profile 1": 2.0 * ONE}, body)
        assert single == pytest.approx(both[:, 0], rel=1e-12), name


def test_the_section_sees_its_force_and_moment() -> None:
    """Against plain integrals; a straight line is its own membrane and bending stress."""
    assert weight_function.section_stresses([(0.0, 130.0), (0.02, 70.0)], 0.02) == pytest.approx(
        (100.0, 30.0)
    )
    points = [(0.0, 200.0), (0.003, -20.0), (0.02, 40.0), (0.05, 0.0)]
    x, s = zip(*points, strict=True)

    def over(weight: Any) -> float:
        pieces = ((0.0, 0.003), (0.003, 0.02), (0.02, 0.03))
        return sum(
            quad(lambda v: weight(v) * float(np.interp(v, x, s)), low, high)[0]
            for low, high in pieces
        )

    force, moment = over(lambda v: 1.0) / 0.03, 6.0 * over(lambda v: 0.015 - v) / 0.03**2
    assert weight_function.section_stresses(points, 0.03) == pytest.approx((force, moment))
    with pytest.raises(ValueError, match="cover"):
        weight_function.section_stresses(points, 0.06)
