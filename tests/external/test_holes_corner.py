"""Corner cracks at a hole against the equation from memory and three-dimensional elements."""

import json
import math
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from assessment import KINDS
from assessment.relations import hole_corner

from .fem.hole_solid import Corner, front_factors

CHECKS = json.loads((Path(__file__).parents[2] / "fixtures/checks/holes.json").read_text("utf-8"))
EQUATION = [
    check
    for check in CHECKS
    if check["id"].startswith("cornerhole") and check["inputs"]["phi"][0] in (0, 90)
]
COARSE = (6, 5, 5, 9)


@pytest.mark.parametrize("check", EQUATION, ids=lambda check: check["id"])
def test_the_equation(check: dict[str, Any]) -> None:
    """Newman & Raju, NASA TM-83200 (1981), evaluated from memory by someone else."""
    shape, depth, hole, phi = (check["inputs"][key][0] for key in ("a/c", "a/t", "r/t", "phi"))
    a = np.asarray(depth)
    k = hole_corner.wide_pair_of_cracks(a, a / shape, 1.0, hole)
    q = 1.0 + 1.464 * min(shape, 1.0 / shape) ** 1.65
    found = k[0 if phi == 90 else 1] / math.sqrt(math.pi * depth / q)
    assert float(found) == pytest.approx(check["value"], rel=2e-5), check["source"]


@pytest.mark.parametrize("shape", [0.5, 2.0])
def test_tension_and_pin_by_solid_elements(shape: float) -> None:
    """R = t, a/t = 0.5, two cracks; the coarse mesh is 1 % low. The bands are those stated."""
    a = 0.5
    c = a / shape
    _, by_elements = front_factors(Corner(a, c, 1.0, 1.0, 20.0 + 3 * c), COARSE)
    size, length = np.asarray(a), np.asarray(c)
    here = hole_corner.wide_pair_of_cracks(size, length, 1.0, 1.0) / math.sqrt(math.pi * a)
    deepest, surface = here / by_elements["tension"][[-1, 0]]
    assert 0.97 < deepest < 1.13 and 0.90 < surface < 1.14
    pair = hole_corner.pair_of_pins(size, length, 1.0, 1.0, 2) / math.sqrt(math.pi * a)
    deepest, surface = pair / by_elements["pin-pair"][[-1, 0]]
    assert 0.94 < deepest < 1.13 and 0.92 < surface < 1.20


def test_the_shape_of_the_equation_hardly_jumps_at_a_quarter_circle() -> None:
    """As published M₂ and M₃ differ by 1 % and 4 % there: up to 0.2 % of K."""
    for depth in (0.1, 0.4, 0.7):
        a = np.asarray(depth)
        one, other = (
            hole_corner.wide_pair_of_cracks(a, a * scale, 1.0, 1.0)
            for scale in (0.999999, 1.000001)
        )
        assert np.allclose(one, other, rtol=3e-3)


def test_one_crack_and_two_small_ones_are_alike() -> None:
    a = np.asarray(1e-6)
    one, two = (hole_corner.tension(a, a, 0.01, 0.01, 1.0, cracks) for cracks in (1, 2))
    assert np.allclose(one, two, rtol=1e-4)


@pytest.mark.parametrize("name", ["one", "two"])
def test_through_the_thickness_it_becomes_the_through_crack(name: str) -> None:
    body = {"width": 0.4, "thickness": 0.02, "hole_diameter": 0.04}
    became = KINDS[f"hole-corner-{name}"].becomes(np.array([0.02, 0.03]), body)
    assert became is not None
    assert became == (f"hole-through-{name}", None, 0.03, body)
    assert KINDS[became[0]].through


def test_many_samples_and_loads_on_their_own_axis() -> None:
    body = {"width": 0.4, "thickness": 0.02, "hole_diameter": 0.04}
    x = np.array([[0.004, 0.005, 0.006], [0.01, 0.01, 0.012]])
    loads = {"membrane": np.array([[1.0], [0.0]]), "pin_load": np.array([[0.0], [1.0]])}
    kind = KINDS["hole-corner-one"]
    k = kind.stress_intensity(x, loads, body)
    assert k.shape == (2, 2, 3)
    alone = kind.stress_intensity(x[:, 1], {"pin_load": np.asarray(1.0)}, body)
    assert np.allclose(k[:, 1, 1], alone)
