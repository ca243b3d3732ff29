"""Units: one crack in inch and ksi and the same in mm and MPa are one case.

Dimensional analysis: lengths times λ, stresses and moduli times μ, K times μ√λ, and the growth
constant with its own dimension, leave load ratio, cycles and verdict as they are. A constant with a
hidden unit breaks this.
"""

import copy
import math
from typing import Any

import pytest

from assessment import assess
from assessment.verdict import STRICTNESS

from .test_directions import CASES, case_of

INCH, KSI = 25.4, 6.894757293168
K_UNIT = KSI * math.sqrt(INCH)
# Constants with a unit of their own: 0.15 mm at a weld toe.
BRITTLE = {"lug-through": 1.1, "lug-corner": 1.05, "hole-corner-one": 1.2, "hole-corner-two": 1.2}
WITH_A_LENGTH_OF_ITS_OWN = {"weld-toe-surface"}


def converted(case: dict[str, Any], length: float, stress: float) -> dict[str, Any]:
    """The same case with every length and stress in another unit."""
    made = copy.deepcopy(case)
    k = stress * math.sqrt(length)
    scales = {"_sqrt_m": k, "_mm": length, "_mpa": stress, "_kn": stress * length**2}

    def walk(part: Any) -> None:
        for key in list(part):
            value = part[key]
            if isinstance(value, dict):
                walk(value)
            elif isinstance(value, list):
                for one in value:
                    if isinstance(one, dict):
                        walk(one)
                    elif key == "table":
                        one[0] *= length
            elif isinstance(value, int | float) and not isinstance(value, bool):
                for ending, scale in scales.items():
                    if key.endswith(ending):
                        part[key] = value * scale
                        break

    walk(made)
    for growth in (made["material"]["growth"], made["material"]["bounding"]["growth"]):
        growth["c"] *= length / k ** growth["m"]
    return made


@pytest.mark.parametrize("kind", sorted(set(CASES) - WITH_A_LENGTH_OF_ITS_OWN))
@pytest.mark.parametrize(("length", "stress"), [(INCH, KSI), (1.0 / INCH, 1.0 / KSI)])
def test_another_unit_is_the_same_case(kind: str, length: float, stress: float) -> None:
    case = case_of(kind)
    # The plateau of discontinuous yielding is published with a strength in MPa.
    case["material"]["yielding"] = "continuous"
    one, other = assess(case), assess(converted(case, length, stress))
    assert one["disposition"]["verdict"] == other["disposition"]["verdict"]
    assert one["next_inspection"]["on"] == other["next_inspection"]["on"]
    for part in (lambda o: o["failure"], lambda o: o["bounding"]["failure"]):
        for key in ("load_ratio", "toughness_ratio", "reserve_on_load"):
            assert part(other)[key] == pytest.approx(part(one)[key], rel=1e-6), key
    assert other["life"]["cycles"] == pytest.approx(one["life"]["cycles"], rel=1e-4)
    k = [o["stress_intensity"][0]["k_mpa_sqrt_m"] for o in (one, other)]
    assert k[1] == pytest.approx(k[0] * stress * math.sqrt(length), rel=1e-9)


@pytest.mark.parametrize("kind", sorted(CASES))
def test_critical_size_and_critical_stress_are_each_others_inverse(kind: str) -> None:
    """Grown to its critical size, the crack has a reserve on load of one at today's peak; loaded
    to its critical stress, today's crack is critical."""
    case = case_of(kind)
    case["crack"]["sizing"] = "none: the critical size itself"
    case["loading"]["cycles"] = "none: steady"
    # So brittle that every kind fails inside its published range.
    present = assess(case)["stress_intensity"]
    k_mat = BRITTLE.get(kind, 1.4) * max(one["k_mpa_sqrt_m"] for one in present)
    case["material"]["toughness"]["k_mat_mpa_sqrt_m"] = k_mat
    found = assess(case)
    critical = found["critical"]
    assert critical["cause"] in ("fracture", "collapse")
    grown = copy.deepcopy(case)
    for size in ("depth_mm", "length_mm"):
        if grown["crack"].get(size) is not None:
            grown["crack"][size] = critical[size]
    if kind == "plate-embedded":  # its middle stays where it is
        more = critical["depth_mm"] - case["crack"]["depth_mm"]
        grown["body"]["ligament_mm"] -= more / 2.0
    assert assess(grown)["failure"]["reserve_on_load"] == pytest.approx(1.0, rel=2e-3)
    loaded = copy.deepcopy(case)
    factor = found["failure"]["reserve_on_load"]
    for key, value in loaded["loading"]["peak"].items():
        loaded["loading"]["peak"][key] = value * factor
    at_limit = assess(loaded)
    assert at_limit["failure"]["reserve_on_load"] == pytest.approx(1.0, rel=1e-6)
    if critical["stress_mpa"] is not None:
        nominal = found["critical"]["stress_mpa"] / factor
        assert at_limit["critical"]["stress_mpa"] == pytest.approx(factor * nominal, rel=1e-6)


def test_the_comparison_notices_a_hidden_unit() -> None:
    """The weld toe has one: its surface point stands 0.15 mm above the toe."""
    case = case_of("weld-toe-surface")
    case["material"]["yielding"] = "continuous"
    one, other = assess(case), assess(converted(case, INCH, KSI))
    surfaces = [o["stress_intensity"][1]["k_mpa_sqrt_m"] for o in (one, other)]
    assert surfaces[1] != pytest.approx(surfaces[0] * K_UNIT, rel=0.01)
    assert set(STRICTNESS) >= {o["disposition"]["verdict"] for o in (one, other)}
