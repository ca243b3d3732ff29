"""An edge crack whose ends are held: its limits, its directions, and where it refers."""

import math

import numpy as np
import pytest
from scipy.integrate import quad

from assessment import KINDS, assess
from assessment.relations import edge_crack, edge_held
from tests.assessment.examples import surface

KIND = KINDS["plate-through-edge"]
PLATE = {"width": 0.1, "thickness": 0.01, "ends": "held"}


def factor(relative: float, body: dict[str, object], **loads: float) -> float:
    x = np.asarray([0.1 * relative])
    k = KIND.stress_intensity(x, {n: np.asarray(v) for n, v in loads.items()}, body)
    return float(k[0]) / math.sqrt(math.pi * x[0])


@pytest.mark.parametrize("relative", [0.02, 0.3, 0.6, 0.9])
@pytest.mark.parametrize("length", [1.5, 6.0])
def test_the_sections_stay_parallel(relative: float, length: float) -> None:
    """By hand, with quadrature: turn of the crack and turn of the plate cancel."""
    s = float(edge_held.relief(np.asarray(relative), np.asarray(length)))

    def turning(x: float) -> float:
        tension, bend = (float(f(np.asarray(x))) for f in (edge_crack.tension, edge_crack.bending))
        return x * bend * (tension + s * bend)

    joins = [x for x in edge_crack.JOIN if x < relative]
    crack = 12.0 * math.pi * quad(turning, 1e-12, relative, points=joins, epsrel=1e-11)[0]
    assert crack == pytest.approx(-2.0 * s * length, rel=1e-7)


@pytest.mark.parametrize("relative", [0.05, 0.4, 0.8])
def test_between_the_free_plate_and_a_short_one(relative: float) -> None:
    """An endless held length holds nothing; a longer one is never milder."""
    lengths = np.array([1.5, 2.0, 3.0, 5.0, 20.0, 1e9])
    found = [factor(relative, PLATE | {"held_length": 0.1 * n}, membrane=1.0) for n in lengths]
    assert np.all(np.diff(found) > 0.0)
    free = factor(relative, PLATE | {"ends": "free"}, membrane=1.0)
    assert found[-1] == pytest.approx(free, rel=1e-6)


def test_bending_is_given_in_full() -> None:
    held = factor(0.4, PLATE | {"held_length": 0.2}, bending=1.0)
    assert held == factor(0.4, PLATE | {"ends": "free"}, bending=1.0)


def test_the_ligament_carries_the_force_without_its_eccentricity() -> None:
    """By hand: 1/(1 − 0.5) in tension; without a crack two thirds of a bending stress."""
    body = PLATE | {"held_length": 0.3}
    one = np.asarray(1.0)
    tension = KIND.reference_stress(np.asarray([0.05]), {"membrane": one}, body)
    assert float(tension) == pytest.approx(2.0)
    bent = KIND.reference_stress(np.asarray([1e-12]), {"bending": one}, body)
    assert float(bent) == pytest.approx(2.0 / 3.0)


def test_beyond_the_tables_growth_finds_no_value() -> None:
    assert math.isnan(factor(0.985, PLATE | {"held_length": 0.3}, membrane=1.0))


def case(**body: object) -> dict[str, object]:
    return surface(
        crack={
            "kind": "plate-through-edge",
            "length_mm": 20.0,
            "sizing": {"method": "ultrasonic", "length_sd_mm": 0.3},
        },
        body={"width_mm": 100.0, "thickness_mm": 10.0, **body},
        loading__peak={"membrane_mpa": 80.0},
        loading__cycles=[{"membrane_range_mpa": 30.0, "stress_ratio": 0.1, "per_usage": 20}],
    )


def test_held_without_a_held_length_is_referred_and_with_it_computed() -> None:
    alone = assess(case(ends="held"))
    assert alone["disposition"]["verdict"] in ("refer", "withdraw")
    assert any("held length" in reason for reason in alone["disposition"]["reasons"])
    known = assess(case(ends="held", held_length_mm=300.0))
    assert known["disposition"]["verdict"] not in ("refer", "withdraw")
    free = assess(case(ends="free"))
    assert known["bounding"]["life"]["usage"] > free["bounding"]["life"]["usage"]


def test_a_held_length_of_free_ends_is_refused() -> None:
    with pytest.raises(ValueError, match="held length"):
        assess(case(ends="free", held_length_mm=300.0))
