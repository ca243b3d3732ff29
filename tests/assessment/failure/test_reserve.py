"""Where a crack stands, and how much more load it takes."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from assessment.failure import assess_point, lr_max, option_1, reserves
from assessment.growth import CycleBlock, Paris, grow
from assessment.kinds import KINDS
from tests.assessment.plain import Steel, constant_factor, membrane

PLATE = KINDS["plate-through-centre"]
BODY = {"width": 0.2, "thickness": 0.012}
STEEL = Steel()


def at(a, stress, toughness, fracture="diagram", material=STEEL):
    return assess_point(PLATE, np.array([a]), membrane(stress), BODY, material, toughness, fracture)


@settings(max_examples=60)
@given(
    st.floats(0.001, 0.09),
    st.floats(1.0, 600.0),
    st.floats(20.0, 400.0),
    st.sampled_from(["continuous", "discontinuous"]),
)
def test_reserve_times_load_sits_on_the_limit(a, stress, toughness, yielding):
    material = Steel(yielding=yielding)
    point = at(a, stress, toughness, material=material)
    there = at(a, stress * point.reserve, toughness, material=material)
    assert there.reserve == pytest.approx(1.0, rel=1e-9)
    strengths = (355.0, 490.0, 207e3, yielding)
    below = option_1(there.load_ratio * (1 - 1e-6), *strengths)
    above = option_1(there.load_ratio * (1 + 1e-6), *strengths)
    assert above - 1e-5 <= there.toughness_ratio <= below + 1e-5


@given(st.floats(0.001, 0.09), st.floats(1.0, 600.0), st.floats(20.0, 400.0))
def test_acceptable_is_the_same_as_inside_the_diagram(a, stress, toughness):
    point = at(a, stress, toughness)
    if abs(point.reserve - 1.0) > 1e-9:
        assert point.acceptable is (point.toughness_ratio < point.limit)


@given(st.floats(0.001, 0.09), st.floats(1.0, 600.0), st.floats(20.0, 400.0), st.floats(1.01, 3.0))
def test_twice_the_load_halves_the_reserve(a, stress, toughness, factor):
    for fracture in ("toughness", "diagram"):
        one, more = (at(a, s, toughness, fracture).reserve for s in (stress, factor * stress))
        assert one / more == pytest.approx(factor, rel=1e-9)


@given(st.floats(0.001, 0.09), st.floats(1.0, 600.0), st.floats(20.0, 400.0))
def test_the_diagram_never_gives_more_than_toughness_alone(a, stress, toughness):
    alone = at(a, stress, toughness, "toughness").reserve
    assert at(a, stress, toughness, "diagram").reserve <= alone * (1 + 1e-12)


def test_toughness_alone_by_hand():
    """K = σ √(πa) with factor 1: 100 √(π 0.01) = 17.725; toughness 53.174 is three times that."""
    kind, body = constant_factor(1.0)
    x = np.array([0.01])
    point = assess_point(kind, x, membrane(100.0), body, STEEL, 3 * 17.724539, "toughness")
    assert point.reserve == pytest.approx(3.0, rel=1e-6)
    assert point.cause == "fracture"


def test_collapse_is_reference_stress_at_the_mean_of_yield_and_ultimate():
    """By hand: net section of a plate half cracked carries 2σ; 422.5 MPa is the mean strength."""
    point = at(0.05, 100.0, 1e6, "toughness")
    assert point.reserve == pytest.approx(422.5 / 200.0, rel=1e-9)
    assert point.cause == "collapse"
    drawn = at(0.05, 100.0, 1e6, "diagram")
    assert drawn.reserve == pytest.approx(422.5 / 200.0, rel=1e-6)
    assert drawn.cause == "collapse"


@pytest.mark.parametrize("fracture", ["toughness", "diagram"])
def test_pressed_shut_a_crack_cannot_fracture_but_can_collapse(fracture):
    point = at(0.05, -100.0, 50.0, fracture)
    assert point.toughness_ratio == 0.0
    assert point.cause == "collapse"
    assert point.acceptable is True


def test_no_load_has_no_reserve_to_state():
    point = at(0.05, 0.0, 50.0)
    assert (point.reserve, point.cause, point.acceptable) == (None, None, True)


def test_what_cannot_be_evaluated_is_never_acceptable():
    """Outside its table a geometry factor is not a number."""
    table = ((0.001, 1.1), (0.01, 1.2))
    body = {"thickness": 0.03, "table": table}
    for fracture in ("toughness", "diagram"):
        point = assess_point(
            KINDS["tabulated"], np.array([0.02]), membrane(10.0), body, STEEL, 50.0, fracture
        )
        assert (point.reserve, point.acceptable) == (None, None)


def test_the_largest_k_along_the_front_decides():
    kind, body = KINDS["plate-surface"], {"thickness": 0.02, "width": 0.4}
    loads = {"membrane": np.asarray(100.0), "bending": np.asarray(0.0)}
    for x in (np.array([0.004, 0.02]), np.array([0.008, 0.008])):
        k = kind.stress_intensity(x, loads, body)
        point = assess_point(kind, x, loads, body, STEEL, 60.0, "diagram")
        assert point.toughness_ratio == pytest.approx(np.max(k) / 60.0, rel=1e-12)


def test_many_sizes_at_once_are_each_of_them_alone():
    a = np.linspace(0.001, 0.09, 40)
    many, collapse = reserves(PLATE, a[None], membrane(150.0), BODY, STEEL, 80.0, "diagram")
    for index, size in enumerate(a):
        one = at(size, 150.0, 80.0)
        assert many[index] == pytest.approx(one.reserve, rel=1e-12)
        assert ("fracture", "collapse")[int(collapse[index])] == one.cause


@settings(max_examples=25)
@given(st.floats(0.01, 0.08), st.floats(50.0, 200.0), st.sampled_from(["toughness", "diagram"]))
def test_critical_size_and_critical_stress_are_inverse(a, toughness, fracture):
    """The stress at which this size fails is the stress at which a growing crack ends at it."""
    stress = 100.0 * at(a, 100.0, toughness, fracture).reserve
    blocks = (CycleBlock({"membrane": 50.0}, 0.0, None, 1.0),)
    grown = grow(
        PLATE,
        np.array([0.3 * a]),
        BODY,
        Paris(1e-11, 3.0),
        blocks,
        lambda x: reserves(PLATE, x, membrane(stress), BODY, STEEL, toughness, fracture)[0] - 1.0,
    )
    assert grown.end_words() == "failed"
    assert grown.x[0, 0] == pytest.approx(a, rel=1e-7)


def test_without_known_yielding_toughness_alone_is_used():
    unknown = replace(STEEL, yielding=None)
    assert at(0.03, 100.0, 80.0, "diagram", unknown).limit is None
    same = at(0.03, 100.0, 80.0, "toughness").reserve
    assert at(0.03, 100.0, 80.0, "diagram", unknown).reserve == same


def test_reserve_stays_below_the_cut_off():
    point = at(0.001, 100.0, 1e5)
    assert point.reserve * point.load_ratio <= lr_max(355.0, 490.0) * (1 + 1e-12)
