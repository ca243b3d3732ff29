"""Cylinder kinds against values from outside (fixtures/checks) and their limits."""

import math

import numpy as np
import pytest
from scipy.optimize import brentq

from assessment import KINDS, assess
from assessment.relations import (
    cylinder_outside,
    cylinder_through,
    reference_cylinders,
    surface_crack,
)
from tests.assessment.examples import surface

from .checks import BY_ID, given, starting

ENDS = {"90": 0, "0": 1}


def outside(shape: float, depth: float, slender: float) -> np.ndarray:
    """F at the two points: K ÷ (p R_i/t) √(πa/Q), wall 1."""
    a = np.asarray(depth)
    k = cylinder_outside.stress_intensity(a, a / shape, np.asarray(slender), 1.0, 1.0 / slender)
    q = 1.0 + 1.464 * shape**1.65
    return np.asarray(k / math.sqrt(math.pi * depth / q))


@pytest.mark.parametrize("name", [n for n in starting("cyl_ext") if n.rsplit("phi", 1)[1] in ENDS])
def test_axial_outside(name: str) -> None:
    """The equation's values are from memory, those of the elements an independent computation."""
    check = BY_ID[name]
    found = outside(given(check, "a/c"), given(check, "a/t"), given(check, "t/Ri"))
    point = ENDS[name.rsplit("phi", 1)[1]]
    tolerance = 0.03 if "_fe_" in name else 2e-3
    assert float(found[point]) == pytest.approx(check["value"], rel=tolerance)


@pytest.mark.parametrize("slender", [0.1, 0.25])
@pytest.mark.parametrize("shape", [0.2, 0.4, 1.0])
@pytest.mark.parametrize("depth", [0.2, 0.5, 0.8])
def test_axial_outside_by_the_plate_under_lames_stress(
    slender: float, shape: float, depth: float
) -> None:
    """Lamé's hoop stress as membrane and bending on a flat plate: curvature alone is left out."""
    inner = 1.0 / slender
    outer = inner + 1.0

    def hoop(r: float) -> float:
        return inner**2 / (outer**2 - inner**2) * (1.0 + outer**2 / r**2)

    membrane, bending = (hoop(outer) + hoop(inner)) / 2, (hoop(outer) - hoop(inner)) / 2
    a = np.asarray(depth)
    plate = surface_crack.stress_intensity(
        a, a / shape, np.asarray(membrane), np.asarray(bending), 1.0, 1e6
    )
    k = cylinder_outside.stress_intensity(a, a / shape, np.asarray(1.0), 1.0, inner)
    np.testing.assert_allclose(k / plate, 1.0, atol=0.06)


@pytest.mark.parametrize("name", starting("axial_twc"))
def test_axial_through(name: str) -> None:
    check = BY_ID[name]
    found = cylinder_through.axial(np.asarray(given(check, "x")))
    assert float(found) == pytest.approx(check["value"], rel=1e-5)


@pytest.mark.parametrize("name", starting("folias"))
def test_axial_through_lies_above_folias(name: str) -> None:
    """Shell theory, M = √(1 + 1.255 λ² − 0.0135 λ⁴), λ = c/√(Rt)."""
    check = BY_ID[name]
    above = float(cylinder_through.axial(np.asarray(given(check, "lambda")))) / check["value"]
    assert 1.0 <= above <= 1.11


@pytest.mark.parametrize("name", starting("circ_twc_tension", "circ_twc_bending"))
def test_girth_through(name: str) -> None:
    check = BY_ID[name]
    pair = cylinder_through.girth(np.asarray(given(check, "theta/pi")), given(check, "R/t"))
    found = pair[0] if "tension" in name else pair[1]
    assert float(found) == pytest.approx(check["value"], rel=1e-5)


def test_a_short_girth_crack_is_one_in_a_plate() -> None:
    body = {"inner_radius": 0.1, "thickness": 0.01}
    k = KINDS["cylinder-girth-through"].stress_intensity(
        np.array([1e-7]), {"membrane": np.asarray(1.0)}, body
    )
    assert k / math.sqrt(math.pi * 1e-7) == pytest.approx([1.0], rel=1e-4)


def test_axial_reference_stresses() -> None:
    """BS 7910:2005 annex P, from memory: 1.2 M_T P_m and 1.2 M_s P_m."""
    c, r, b = 0.06, 0.5, 0.012
    found = 1.2 * float(reference_cylinders.folias(np.asarray(c), r, b))
    assert found == pytest.approx(1.68, rel=1e-6)


@pytest.mark.parametrize("theta", [0.0, 0.3, 1.0, 1.6])
def test_net_section_collapse_round_the_girth(theta: float) -> None:
    """Force alone: σ_m/σ = 1 − θ/π − (2/π) asin(½ sin θ); moment alone: M = 4 σ R² t (cos(θ/2) −
    ½ sin θ), which is (π/4) σ_b/σ. Both from the stress blocks, by hand."""
    half = np.asarray(theta)
    one, nil = np.asarray(1.0), np.asarray(0.0)
    force = float(reference_cylinders.girth_through(one, nil, half))
    part = 1 - theta / math.pi - 2 / math.pi * math.asin(0.5 * math.sin(theta))
    assert force == pytest.approx(1 / part, rel=1e-9)
    moment = float(reference_cylinders.girth_through(nil, one, half))
    whole = math.cos(theta / 2) - 0.5 * math.sin(theta)
    assert moment == pytest.approx(math.pi / 4 / whole, rel=1e-9)


def test_force_and_moment_together_by_another_way() -> None:
    """The same equation solved apart, by scipy."""
    theta, m, b = 0.7, 120.0, 60.0

    def left(flow: float) -> float:
        beta = (math.pi - theta - math.pi * m / flow) / 2
        return math.sin(beta) - 0.5 * math.sin(theta) - math.pi / 4 * b / flow

    expected = brentq(left, m / (1 - theta / math.pi), 5000)
    found = reference_cylinders.girth_through(np.asarray(m), np.asarray(b), np.asarray(theta))
    assert float(found) == pytest.approx(expected, rel=1e-9)


def vessel(**changes: object) -> dict[str, object]:
    return surface(
        crack={
            "kind": "cylinder-axial-inside", "depth_mm": 6.0, "length_mm": 20.0,
            "sizing": "none: measured on the cut piece",
        },
        body={"inner_radius_mm": 120.0, "thickness_mm": 12.0},
        loading__peak={"pressure_mpa": 6.0},
        loading__cycles=[{"pressure_range_mpa": 6.0, "stress_ratio": 0.0, "per_usage": 20}],
        **changes,
    )  # fmt: skip


def test_leak_before_break_is_said_only_where_a_leak_is_tolerated_and_the_crack_holds() -> None:
    plain = assess(vessel())
    assert plain["bounding"]["life"]["ends_by"] in ("break-through", "out of range")
    assert plain["leak"]["leak_before_break"] is False
    assert "Break-through comes first" in plain["leak"]["words"]
    tolerated = assess(vessel(owner={"leak_tolerated": True}))
    assert tolerated["leak"]["leak_before_break"] is True
    assert tolerated["leak"]["reserve_on_load"] > 1.4
    assert any("Leak before break" in said for said in tolerated["cautions"])
    # The life ends at break-through all the same.
    assert tolerated["next_inspection"] == plain["next_inspection"]
    much = assess(vessel(owner={"leak_tolerated": True}, criteria__load_reserve=50.0))
    assert much["leak"] is None or much["leak"]["leak_before_break"] is False
