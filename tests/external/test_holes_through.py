"""Through cracks at a hole against outside values, an integral equation and finite elements."""

import json
import math
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from assessment import KINDS
from assessment.relations import hole_through

from . import hole_integral
from .fem import holes

CHECKS = json.loads((Path(__file__).parents[2] / "fixtures/checks/holes.json").read_text("utf-8"))
BY_ID = {check["id"]: check for check in CHECKS}
RADIUS = 0.005
NAMES = {1: "hole-through-one", 2: "hole-through-two"}
LENGTHS = (0.01, 0.07, 0.35, 1.2, 4.0, 15.0, 50.0)


def starting(*prefixes: str) -> list[dict[str, Any]]:
    return [check for name, check in BY_ID.items() if name.startswith(prefixes)]


def by_id(check: dict[str, Any]) -> str:
    return str(check["id"])


def wide(length: float, cracks: int) -> float:
    """F of the kind for a ÷ R in a plate so wide that its width plays no part (5e-5)."""
    body = {"width": 100.0 * 2 * RADIUS, "thickness": 0.01, "hole_diameter": 2 * RADIUS}
    a = length * RADIUS
    loads = {"membrane": np.asarray(1.0)}
    k = float(KINDS[NAMES[cracks]].stress_intensity(np.array([a]), loads, body)[0])
    width = float(hole_through.tension_width(np.asarray(a), RADIUS, body["width"], cracks))
    return k / math.sqrt(math.pi * a) / width


@pytest.mark.parametrize("check", starting("hole2_newman71"), ids=by_id)
def test_two_cracks_as_published(check: dict[str, Any]) -> None:
    """J. C. Newman, NASA TN D-6376 (1971), boundary collocation; from memory."""
    tip = check["inputs"]["a/R"][0]
    here = wide(tip - 1.0, 2) * math.sqrt((tip - 1.0) / tip)
    # Three digits count at the shortest crack.
    assert here == pytest.approx(check["value"], rel=1e-3 if tip < 1.05 else 3e-4), check["source"]


@pytest.mark.parametrize("check", starting("hole_num_0", "hole_num_1"), ids=by_id)
def test_an_independent_computation(check: dict[str, Any]) -> None:
    cracks = 1 if check["id"].startswith("hole_num_0") else 2
    here = wide(check["inputs"]["L/R"][0], cracks)
    assert here == pytest.approx(check["value"], rel=2.5e-4), check["source"]


def test_one_crack_is_not_bowies() -> None:
    """His one crack (1956, from memory) is 5 % high at a = R, which two computations agree on."""
    here = wide(1.0, 1)
    assert BY_ID["bowie56_one_1.0"]["value"] / here == pytest.approx(1.049, abs=0.002)
    assert holes.plate(0.02, 0.02, 1, "tension", height=2.0) == pytest.approx(here, rel=0.005)


@pytest.mark.parametrize("length", LENGTHS)
@pytest.mark.parametrize("cracks", [1, 2])
def test_the_fits_keep_to_the_integral_equation(length: float, cracks: int) -> None:
    """Stated: 0.02 % in tension, 0.06 % for the pin; twenty radii and more 0.07 % and 0.4 %."""
    a = np.asarray(length)
    tension = hole_integral.factor(length, cracks)
    fit = float(hole_through.tension_wide(a, 1.0, cracks))
    assert fit == pytest.approx(tension, rel=2e-4 if length < 40 else 7e-4)
    pair = hole_integral.factor(length, cracks, hole_integral.pin_pair)
    fit = float(hole_through.pair_wide(a, 1.0, cracks))
    assert fit == pytest.approx(pair, rel=6e-4 if length < 40 else 4e-3)


@pytest.mark.parametrize("cracks", [1, 2])
def test_a_small_crack_is_an_edge_crack_in_the_stress_of_the_bore(cracks: int) -> None:
    """1.1215 times three in tension (Kirsch), times 16/π² under the pair of pins (by hand)."""
    a = np.asarray(1e-9)
    assert hole_through.tension_wide(a, 1.0, cracks) == pytest.approx(3 * 1.1215, rel=3e-4)
    expected = 1.1215 * 16 / np.pi**2
    assert hole_through.pair_wide(a, 1.0, cracks) == pytest.approx(expected, rel=5e-4)


def test_a_long_crack_forgets_the_hole() -> None:
    """Two: a centre crack, or one pressed open by forces 2Rσ_b in its middle, K = P/√(πa). One: a
    centre crack of half the length, K = σ√(πa/2)."""
    a = np.asarray(1e5)
    assert hole_through.tension_wide(a, 1.0, 2) == pytest.approx(1.0, rel=6e-4)
    assert hole_through.tension_wide(a, 1.0, 1) == pytest.approx(math.sqrt(0.5), rel=8e-4)
    assert float(hole_through.pair_wide(a, 1.0, 2) * a) == pytest.approx(2 / np.pi, rel=1e-3)
    one = float(hole_through.pair_wide(a, 1.0, 1) * a**1.5)
    assert one == pytest.approx(1.0, rel=0.01)


@pytest.mark.parametrize(("radius", "used"), [(0.1, 0.3), (0.3, 0.1), (0.3, 0.5), (0.5, 0.5)])
@pytest.mark.parametrize("cracks", [1, 2])
def test_finite_width_by_finite_elements(radius: float, used: float, cracks: int) -> None:
    """Half width 1. Tension by the published width factor: never more than 2 % low, up to 6 % high
    to half the ligament; the pin within 3 %. The elements are within 0.5 %."""
    a = used * (1 - radius)
    size = np.asarray(a)
    tension = holes.plate(radius, a, cracks, "tension")
    ratio = float(hole_through.tension(size, radius, 2.0, cracks)) / tension
    assert 0.98 < ratio < 1.06
    pair = holes.plate(radius, a, cracks, "pin-pair")
    here = hole_through.pair_wide(size, radius, cracks)
    here = float(here * hole_through.pair_width(size, radius, 2.0, cracks))
    assert here == pytest.approx(pair, rel=0.015)
    pin = float(hole_through.pin(size, radius, 2.0, cracks))
    assert 0.99 < pin / ((tension * radius + pair) / 2) < 1.03


def test_the_elements_notice_a_missing_width_factor() -> None:
    a = 0.5 * 0.7
    tension = holes.plate(0.3, a, 2, "tension")
    assert hole_through.tension_wide(np.asarray(a), 0.3, 2) < 0.8 * tension


def test_beyond_the_plate_nothing_is_said() -> None:
    assert np.isnan(hole_through.tension(np.asarray(0.06), 0.005, 0.1, 2))
