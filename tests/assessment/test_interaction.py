"""Neighbours: the exact pair of collinear cracks, the rule's properties, and whole cases."""

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.special import ellipe, ellipk

from assessment import CaseRefused, assess, read_case
from assessment.interaction import Neighbour, combine
from tests.assessment.examples import surface

LENGTH = st.floats(1e-3, 0.1)


def inner_over_alone(c: float, s: float) -> float:
    """K at the inner tips of two equal collinear through cracks of length 2c with s between them,
    over that of one alone (F. Erdogan, 1962; as in Tada, Paris & Irwin, p. 7.1, from memory).

    Tips at b = s/2 and a = b + 2c: K_b = σ √(πb) [(a/b)² E(k)/K(k) − 1] / √((a/b)² − 1),
    k² = 1 − (b/a)².
    """
    b = s / 2.0
    a = b + 2.0 * c
    ratio, m = (a / b) ** 2, 1.0 - (b / a) ** 2
    inner = math.sqrt(b) * (ratio * ellipe(m) / ellipk(m) - 1.0) / math.sqrt(ratio - 1.0)
    return float(inner / math.sqrt(c))


def test_the_exact_pair_at_its_limits() -> None:
    """Far apart, each is alone; a hair apart, the inner tip is far worse."""
    assert inner_over_alone(1.0, 1e4) == pytest.approx(1.0, abs=1e-6)
    assert inner_over_alone(1.0, 0.02) > 2.0


def test_cracks_that_just_count_as_two_disturb_each_other_by_less_than_five_per_cent() -> None:
    """At s = c₁ + c₂, the accuracy that the relation states; one half nearer is not enough."""
    assert inner_over_alone(1.0, 2.0) == pytest.approx(1.048, abs=0.001)
    assert inner_over_alone(1.0, 0.5) > 1.2


@given(LENGTH, LENGTH, st.floats(0.0, 0.3))
def test_whether_two_join_is_the_same_from_either_side(one: float, other: float, s: float) -> None:
    here = combine(0.01, one, [Neighbour("b", 0.02, other, s)])
    there = combine(0.02, other, [Neighbour("a", 0.01, one, s)])
    assert bool(here.joined) is bool(there.joined) is ((one + other) / 2.0 >= s)
    if here.joined:
        assert here.length == pytest.approx(there.length) == pytest.approx(one + s + other)
        assert here.depth == there.depth == 0.02


@given(LENGTH, st.lists(st.tuples(LENGTH, st.floats(0.0, 0.2)), max_size=6))
def test_nothing_joins_what_has_grown_and_nobody_is_lost(
    length: float, others: list[tuple[float, float]]
) -> None:
    given_ = [Neighbour(str(n), None, size, s) for n, (size, s) in enumerate(others)]
    whole = combine(None, length, given_)
    assert whole.length >= length
    assert len(whole.joined) + len(whole.apart) == len(given_)
    assert all((whole.length + one.length) / 2.0 < one.separation for one, _ in whole.apart)
    assert combine(None, length, given_[::-1]).length == pytest.approx(whole.length)


def neighbour(separation: float | None, **more: Any) -> dict[str, Any]:
    made = {"name": "crack 2", "depth_mm": 4.0, "length_mm": 10.0, **more}
    return made if separation is None else made | {"separation_mm": separation}


def test_two_that_count_as_one_are_assessed_as_the_one_they_make() -> None:
    """12 + 5 + 10 mm long and 4 mm deep, since 6 + 5 mm ≥ 5 mm."""
    found = assess(surface(crack__neighbours=[neighbour(5.0)]))
    whole = assess(surface(crack__depth_mm=4.0, crack__length_mm=27.0))
    assert found["failure"] == pytest.approx(whole["failure"], rel=1e-9)
    assert found["life"]["usage"] == pytest.approx(whole["life"]["usage"], rel=1e-9)
    assert found["combined"]["length_mm"] == pytest.approx(27.0)
    assert found["combined"]["joined"][0]["name"] == "crack 2"
    assert any("one crack with crack 2" in caution for caution in found["cautions"])
    assert any("one crack with crack 2" in step["with"] for step in found["working"])


def test_two_that_stand_apart_are_each_their_own_and_it_is_said() -> None:
    alone, found = assess(surface()), assess(surface(crack__neighbours=[neighbour(11.01)]))
    assert found["failure"] == alone["failure"] and found["combined"]["joined"] == []
    assert any("Crack 2 stands apart" in caution for caution in found["cautions"])


def test_an_unknown_distance_is_asked_for_and_the_case_referred() -> None:
    found = assess(surface(crack__neighbours=[neighbour(None)]))
    assert found["disposition"]["verdict"] in ("refer", "withdraw")
    assert any("how far crack 2 lies" in reason for reason in found["disposition"]["reasons"])


def test_a_kind_without_a_rule_is_referred() -> None:
    case = surface(
        crack={"kind": "plate-through-edge", "length_mm": 6.0, "sizing": "none: cut piece",
               "neighbours": [{"name": "crack 2", "length_mm": 4.0, "separation_mm": 2.0}]},
        body={"width_mm": 200, "thickness_mm": 10, "ends": "free"},
    )  # fmt: skip
    found = assess(case)
    assert any("no rule is here" in reason for reason in found["disposition"]["reasons"])


@pytest.mark.parametrize(
    ("neighbours", "key"),
    [
        ([{"name": "crack 2", "depth_mm": 3.0, "separation_mm": 1.0}], "[0].length_mm"),
        ([{"depth_mm": 3.0, "length_mm": 4.0, "separation_mm": 1.0}], "[0].name"),
        ([neighbour(-1.0)], "[0].separation_mm"),
        ([neighbour(1.0, width_mm=3)], "[0].width_mm"),
        ("crack 2", ""),
        ([neighbour(1.0)] * 21, ""),
    ],
)
def test_bad_neighbours_are_refused(neighbours: Any, key: str) -> None:
    with pytest.raises(CaseRefused) as caught:
        read_case(surface(crack__neighbours=neighbours))
    assert caught.value.where.startswith(f"crack.neighbours{key}")
