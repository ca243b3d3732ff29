"""Ends of the relations where the answer is known without them."""

import math

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.optimize import brentq

from assessment.kinds import KINDS
from assessment.relations import bar, reference_stress

PLATE = {"width": 0.2, "thickness": 0.02, "ends": "free"}
ONE, NIL = np.asarray(1.0), np.asarray(0.0)


def factor(kind, x, body, point=0, **loads):
    loads = {name: np.asarray(value) for name, value in loads.items()}
    k = KINDS[kind].stress_intensity(np.asarray(x), loads, body)
    return float(k[point]) / math.sqrt(math.pi * x[0])


def reference(kind, x, body, **loads):
    loads = {name: np.asarray(value) for name, value in loads.items()}
    return float(KINDS[kind].reference_stress(np.asarray(x), loads, body))


def test_a_centre_crack_in_a_wide_plate_has_factor_one():
    assert factor("plate-through-centre", [1e-6], PLATE, membrane=1.0) == pytest.approx(1, rel=1e-8)


@pytest.mark.parametrize("load", ["membrane", "bending"])
def test_a_small_edge_crack_has_the_factor_of_a_half_plane(load):
    """1.1215 (Koiter 1956 and later; from memory, confirmed by several exact solutions)."""
    small = factor("plate-through-edge", [1e-8], PLATE, **{load: 1.0})
    assert small == pytest.approx(1.1215, rel=1e-3)


def test_a_deep_edge_crack_in_bending_follows_its_ligament():
    """Half-plane notch, l = W − a: K √(l³) / M = 3.975 (Benthem & Koiter 1973, from memory)."""
    relative = 0.995
    left = (1 - relative) * PLATE["width"]
    moment = PLATE["width"] ** 2 / 6  # for outer-fibre stress 1
    k = factor("plate-through-edge", [relative * 0.2], PLATE, bending=1.0) * math.sqrt(
        math.pi * relative * 0.2
    )
    assert k * left**1.5 / moment == pytest.approx(3.975, rel=0.01)


@pytest.mark.parametrize("size", [0.0, 1e-12])
@pytest.mark.parametrize("load", ["membrane", "bending"])
def test_without_a_crack_the_reference_stress_is_that_of_the_whole_section(size, load):
    """Stress itself under membrane; two thirds of the outer-fibre stress for a rectangle and
    3π/16 for a circle in bending (plastic over elastic modulus, by hand)."""
    edge = reference("plate-through-edge", [size], PLATE, **{load: 1.0})
    assert edge == pytest.approx(1.0 if load == "membrane" else 2 / 3, rel=1e-9)
    round_ = reference("bar-surface", [size], {"diameter": 0.05}, **{load: 1.0})
    assert round_ == pytest.approx(1.0 if load == "membrane" else 3 * math.pi / 16, rel=1e-7)
    surface = reference("plate-surface", [size, 0.01], PLATE, **{load: 1.0})
    assert surface == pytest.approx(1.0 if load == "membrane" else 2 / 3, rel=1e-9)
    if load == "membrane":
        assert reference("plate-through-centre", [size], PLATE, membrane=1.0) == pytest.approx(1.0)


@pytest.mark.parametrize("relative", [0.1, 0.5, 0.9])
def test_a_centre_crack_leaves_the_net_section(relative):
    found = reference("plate-through-centre", [relative * 0.1], PLATE, membrane=1.0)
    assert found == pytest.approx(1 / (1 - relative), rel=1e-12)


def test_a_deep_edge_crack_under_force_bends_its_ligament():
    """By hand: the moment N W/2 of the ligament outweighs N; σ → 4 M/l² with M = N W/2."""
    left = 1e-4
    found = float(reference_stress.edge(ONE, NIL, np.asarray(1 - left)))
    assert found * left**2 == pytest.approx(2.0, rel=1e-3)


@pytest.mark.parametrize(("membrane", "bending"), [(1.0, 0.0), (0.0, 1.0), (1.0, 0.6), (1.0, -0.9)])
@pytest.mark.parametrize("relative", [0.05, 0.3, 0.7])
def test_the_edge_ligament_carries_its_force_and_moment(membrane, bending, relative):
    """Integrated: a ligament of ±σ_ref about its own neutral line balances the loads."""
    sigma = reference(
        "plate-through-edge", [relative * 0.2], PLATE, membrane=membrane, bending=bending
    )
    left = 1 - relative
    # n σ-units of force need a middle strip of 2y; the rest is the couple.
    y = membrane / (2 * sigma)
    moment = sigma * (left**2 / 4 - y**2)
    assert moment == pytest.approx(abs(bending / 6 + membrane * relative / 2), rel=1e-9)


def test_a_long_surface_crack_is_a_strip_cut_to_what_is_left():
    """a/t = 0.4 and endless: membrane 1/(1 − 0.4), bending (2/3)/(1 − 0.4)²."""
    body = {"thickness": 0.02, "width": 1e9}
    x = [0.008, 1e5]
    assert reference("plate-surface", x, body, membrane=1.0) == pytest.approx(1 / 0.6, rel=1e-5)
    assert reference("plate-surface", x, body, bending=1.0) == pytest.approx(2 / 3 / 0.36, rel=1e-5)


def test_a_small_half_circle_at_depth_is_near_two_over_pi():
    """2/π = 0.637 embedded (exact); at the surface the front factor is 1.03 to 1.04 of it."""
    found = factor("plate-surface", [1e-5, 1e-5], {"thickness": 1.0, "width": 10.0}, membrane=1.0)
    assert 1.02 < found / (2 / math.pi) < 1.05


def test_a_long_shallow_surface_crack_is_near_an_edge_crack():
    """a/c → 0: 1.13 in the equation, 1.1215 exactly."""
    found = factor("plate-surface", [1e-5, 1e-1], {"thickness": 1.0, "width": 1e3}, membrane=1.0)
    assert found == pytest.approx(1.1215, rel=0.01)


@pytest.mark.parametrize("load", ["membrane", "bending"])
@pytest.mark.parametrize("depth", [0.1, 0.4, 0.7])
def test_the_equation_hardly_jumps_where_depth_meets_half_length(load, depth):
    """As published: M₂ is 0.2017 from one side and 0.2 from the other, M₃ −0.1061 and −0.11, which
    is 0.17 % of K at a/t = 0.7 and less where it is shallower."""
    body = {"thickness": 0.02, "width": 10.0}
    a = depth * 0.02
    for point in (0, 1):
        below = factor("plate-surface", [a, a * (1 + 1e-9)], body, point, **{load: 1.0})
        above = factor("plate-surface", [a, a * (1 - 1e-9)], body, point, **{load: 1.0})
        assert below == pytest.approx(above, rel=0.002)


def test_a_thin_cylinder_is_a_plate_under_its_hoop_stress():
    """t/R → 0: the curvature factor is 1, and 0.97 of the plate's value is left (from memory)."""
    x, t, radius = [0.0002, 0.0005], 0.02, 2e4
    found = factor(
        "cylinder-axial-inside", x, {"thickness": t, "inner_radius": radius}, pressure=1.0
    )
    plate = factor("plate-surface", x, {"thickness": t, "width": 1e4}, membrane=radius / t)
    assert found / plate == pytest.approx(0.97, rel=1e-5)


@pytest.mark.parametrize("relative", [0.001, 0.1, 0.25, 0.4, 0.6, 0.9])
@pytest.mark.parametrize(("membrane", "bending"), [(1.0, 0.0), (0.0, 1.0), (0.7, 0.4)])
def test_a_cut_bar_against_its_areas_by_quadrature(relative, membrane, bending):
    """N/A + (M + N e)/Z with A, e, Z integrated over the chord (independent computation)."""
    top = 0.5 - relative

    def chord(y):
        return 2 * math.sqrt(max(0.25 - y * y, 0.0))

    def over(low, high, arm=lambda y: 1.0):
        return quad(lambda y: chord(y) * arm(y), low, high, epsabs=1e-13, limit=200)[0]

    area = over(-0.5, top)
    axis = brentq(lambda y: over(-0.5, y) - area / 2, -0.5, top, xtol=1e-13)
    modulus = over(-0.5, axis, lambda y: axis - y) + over(axis, top, lambda y: y - axis)
    whole = math.pi / 4
    moment = bending * math.pi / 32 - membrane * whole * axis
    expected = membrane * whole / area + moment / modulus
    found = reference_stress.bar(np.asarray(membrane), np.asarray(bending), np.asarray(relative))
    assert float(found) == pytest.approx(expected, rel=2e-5)


@pytest.mark.parametrize("half_angle", [0.1, 0.5, 1.2])
def test_the_assumed_front_of_a_bar_meets_its_surface_at_right_angles(half_angle):
    """Drawn: the arc's circle stands at R/cos θ from the axis and has radius R tan θ, so that
    the radii of both circles are at right angles where they meet."""
    radius = 0.02
    centre, arc = radius / math.cos(half_angle), radius * math.tan(half_angle)
    assert radius**2 + arc**2 == pytest.approx(centre**2, rel=1e-12)
    depth = radius - (centre - arc)
    length = float(bar.surface_length(np.asarray(depth), 2 * radius))
    assert length == pytest.approx(2 * radius * half_angle, rel=1e-9)
