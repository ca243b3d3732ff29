"""Stress intensity and reference stress against values from outside.

fixtures/checks/stress-intensity.json holds each value with its source and how it was had: "read"
in the source, from "memory", or "computed" by an independent method and published nowhere. The
tolerance is what that evidence supports, and says nothing better.
"""

import json
import math
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from assessment import KINDS

CHECKS = json.loads(
    (Path(__file__).parents[2] / "fixtures/checks/stress-intensity.json").read_text("utf-8")
)
BY_ID = {check["id"]: check for check in CHECKS}
ONE = np.asarray(1.0)


def given(check: dict[str, Any], name: str) -> float:
    return float(check["inputs"][name][0])


def first_input(check: dict[str, Any]) -> float:
    return float(next(iter(check["inputs"].values()))[0])


def factor(kind: str, x: list[float], body: dict[str, Any], load: str, point: int = 0) -> float:
    """K ÷ (σ √(πa)) at a point of the front."""
    k = KINDS[kind].stress_intensity(np.asarray(x), {load: ONE}, body)
    return float(k[point]) / math.sqrt(math.pi * x[0])


def centre(check: dict[str, Any]) -> float:
    body = {"width": 0.2, "thickness": 0.01}
    return factor("plate-through-centre", [0.1 * first_input(check)], body, "membrane")


def edge(load: str) -> Any:
    def value(check: dict[str, Any]) -> float:
        body = {"width": 0.1, "thickness": 0.01, "ends": "free"}
        return factor("plate-through-edge", [0.1 * first_input(check)], body, load)

    return value


def q(shape: float) -> float:
    """The shape factor by which the three-dimensional values are divided: exact to 0.13 %."""
    return 1.0 + 1.464 * min(shape, 1.0 / shape) ** 1.65


def surface(load: str) -> Any:
    def value(check: dict[str, Any]) -> float:
        shape, depth = given(check, "a/c"), given(check, "a/t")
        a = 0.02 * depth
        c = a / shape
        # c/b is the crack's half length over half the width.
        width = 2.0 * c / check["inputs"].get("c/b", [0.2])[0]
        body = {"thickness": 0.02, "width": width}
        return factor("plate-surface", [a, c], body, load) * math.sqrt(q(shape))

    return value


def bending_over_tension(check: dict[str, Any]) -> float:
    return float(surface("bending")(check) / surface("membrane")(check))


def cylinder(check: dict[str, Any]) -> float:
    shape, depth = given(check, "a/c"), given(check, "a/t")
    thickness = 0.02
    radius = thickness / given(check, "t/Ri")
    a = thickness * depth
    body = {"thickness": thickness, "inner_radius": radius}
    point = 0 if given(check, "phi") == 90 else 1
    found = factor("cylinder-axial-inside", [a, a / shape], body, "pressure", point)
    return found * math.sqrt(q(shape)) * thickness / radius


def bar(load: str) -> Any:
    def value(check: dict[str, Any]) -> float:
        return factor("bar-surface", [0.1 * first_input(check)], {"diameter": 0.1}, load)

    return value


def ref_through(check: dict[str, Any]) -> float:
    # A plate's through crack has membrane alone as a kind; the relation takes bending too.
    from assessment.relations import reference_stress

    return float(
        reference_stress.through(
            np.asarray(given(check, "Pm")),
            np.asarray(given(check, "Pb")),
            np.asarray(given(check, "2a/W")),
        )
    )


def ref_surface(check: dict[str, Any]) -> float:
    loads = {
        "membrane": np.asarray(given(check, "Pm")),
        "bending": np.asarray(given(check, "Pb")),
    }
    x = np.asarray([given(check, "a"), given(check, "c")]) / 1e3
    body = {"thickness": given(check, "B") / 1e3, "width": 1.0}
    return float(KINDS["plate-surface"].reference_stress(x, loads, body))


def ref_cylinder(check: dict[str, Any]) -> float:
    """The check value takes the hoop stress alone; ours adds the pressure on the crack's faces."""
    thickness, mean = given(check, "B") / 1e3, given(check, "r") / 1e3
    radius = mean - thickness / 2.0
    hoop = given(check, "Pm")
    pressure = np.asarray(hoop / (radius / thickness + 1.0))
    x = np.asarray([given(check, "a"), given(check, "c")]) / 1e3
    body = {"thickness": thickness, "inner_radius": radius}
    return float(KINDS["cylinder-axial-inside"].reference_stress(x, {"pressure": pressure}, body))


# id prefix: how to compute it here, relative tolerance. The first prefix that fits counts.
RULES: tuple[tuple[str, Any, float], ...] = (
    ("cct_num", centre, 0.0015),
    ("cct_isida", centre, 0.0015),
    ("cct_form_tada", centre, 1e-5),
    ("edge_tension_tada", edge("membrane"), 1e-5),
    ("edge_tension", edge("membrane"), 0.007),
    ("edge_bending_poly", edge("bending"), 1e-4),
    ("edge_bending", edge("bending"), 0.006),
    ("surf_fe_tension", surface("membrane"), 0.06),
    ("surf_fe_bendH", bending_over_tension, 0.06),
    ("cyl_int_nr", cylinder, 0.001),
    ("cyl_int_fe", cylinder, 0.06),
    ("bar_fs_tension", bar("membrane"), 1e-4),
    ("bar_fs_bending", bar("bending"), 1e-4),
    ("ref_through", ref_through, 1e-5),
    ("ref_surface", ref_surface, 1e-5),
    ("ref_cyl_axial_surface", ref_cylinder, 1e-5),
)
LIMITS = ("edge_halfplane", "dow_halfcircle", "dow_shaft")
# At a/t = 0.8 the 1981 equation lies above the elements by up to 10 % at the deepest point (a/c =
# 0.4), which is on the safe side; where bending nearly cancels there, its ratio H is compared by
# difference.
DEEP = 0.10
SMALL_H = 0.06


def rule_of(check: dict[str, Any]) -> tuple[Any, float]:
    for prefix, compute, tolerance in RULES:
        if check["id"].startswith(prefix):
            return compute, tolerance
    raise AssertionError(f"no rule for {check['id']}")


@pytest.mark.parametrize("name", [c["id"] for c in CHECKS if c["id"] not in LIMITS])
def test_value_from_outside(name: str) -> None:
    check = BY_ID[name]
    compute, tolerance = rule_of(check)
    if "_at0.8" in name and name.startswith("surf_fe"):
        tolerance = DEEP
    said = f"{check['source']} ({check['how']}, confidence {check['confidence']})"
    here = compute(check)
    if name.startswith("surf_fe_bendH"):
        assert here == pytest.approx(check["value"], rel=tolerance, abs=SMALL_H), said
    else:
        assert here == pytest.approx(check["value"], rel=tolerance), said


def test_a_small_edge_crack_is_one_in_a_half_plane() -> None:
    check = BY_ID["edge_halfplane"]  # from memory, confirmed by several exact solutions
    body = {"width": 1.0, "thickness": 0.01, "ends": "free"}
    for load in ("membrane", "bending"):
        here = factor("plate-through-edge", [1e-6], body, load)
        assert here == pytest.approx(check["value"], rel=0.001)


def test_a_small_half_circle_in_the_surface() -> None:
    check = BY_ID["dow_halfcircle"]  # read: Dowling, 4th ed., figure 8.17(b): 0.728 at the surface
    body = {"width": 10.0, "thickness": 1.0}
    here = factor("plate-surface", [1e-5, 1e-5], body, "membrane", point=1)
    assert here == pytest.approx(check["value"], rel=0.002)


def test_a_shallow_crack_in_a_shaft_is_near_the_half_circle() -> None:
    """Dowling, 4th ed., figure 8.17(d), read: 0.728 for a half circle. The published factor for
    its own arc front starts at 0.657 (a band of 10 %)."""
    here = factor("bar-surface", [1e-6], {"diameter": 0.1}, "membrane")
    assert here == pytest.approx(BY_ID["dow_shaft"]["value"], rel=0.10)
