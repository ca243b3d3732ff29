"""What must hold for any surface crack: more of what drives it never makes it live longer."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from assessment.failure import reserves
from assessment.growth import CycleBlock, Paris, Walker, grow
from assessment.kinds import KINDS
from tests.assessment.plain import Steel

KIND = KINDS["plate-surface"]
BODY = {"thickness": 0.02, "width": 0.4}
PEAK = {"membrane": np.asarray(140.0), "bending": np.asarray(40.0)}

cases = given(
    a=st.floats(0.001, 0.008),
    shape=st.floats(0.25, 1.0),
    stress=st.floats(20.0, 120.0),
    bend=st.floats(0.0, 1.0),
    m=st.floats(2.0, 4.0),
    threshold=st.sampled_from([0.0, 3.0, 6.0]),
)
few = settings(max_examples=6, deadline=None)


def life(x0, blocks, law, peak=1.0, toughness=100.0):
    """Usage to fracture, collapse or the end of the relation; endless where nothing grows."""
    loads = {name: peak * value for name, value in PEAK.items()}

    def margin(x):
        return reserves(KIND, x, loads, BODY, Steel(), toughness, "diagram")[0] - 1.0

    grown = grow(KIND, x0, BODY, law, blocks, margin)
    assert np.all(np.isfinite(grown.usage))
    return np.where(grown.end == 3, np.inf, grown.usage)


def blocks_of(stress, bend, per_usage=10.0):
    return (CycleBlock({"membrane": stress, "bending": bend * stress}, 0.2, None, per_usage),)


@few
@cases
def test_life_falls_as_load_or_growth_constant_rises(a, shape, stress, bend, m, threshold):
    x0 = np.array([a, a / shape])
    blocks = blocks_of(stress, bend)
    plain = float(life(x0, blocks, Paris(1e-12, m, threshold))[0])
    assert float(life(x0, blocks, Paris(1.3e-12, m, threshold))[0]) <= plain
    assert float(life(x0, blocks_of(1.1 * stress, bend), Paris(1e-12, m, threshold))[0]) <= plain
    assert float(life(x0, blocks, Paris(1e-12, m, threshold), peak=1.1)[0]) <= plain * (1 + 1e-9)
    if np.isfinite(plain) and plain > 0.0:
        faster = float(life(x0, blocks, Paris(2e-12, m, threshold))[0])
        assert faster == pytest.approx(plain / 2.0, rel=1e-8)


@few
@cases
def test_life_falls_as_the_crack_is_larger(a, shape, stress, bend, m, threshold):
    law = Paris(1e-12, m, threshold)
    sizes = np.array([[a, 1.2 * a], [a / shape, 1.2 * a / shape]])
    first, second = life(sizes, blocks_of(stress, bend), law)
    assert second <= first


@few
@cases
def test_splitting_or_reordering_blocks_changes_nothing(a, shape, stress, bend, m, threshold):
    law, x0 = Walker(1e-12, m, 0.6, threshold), np.array([a, a / shape])
    one, other = blocks_of(stress, bend, 9.0), blocks_of(0.7 * stress, bend, 40.0)
    split = blocks_of(stress, bend, 4.0) + blocks_of(stress, bend, 5.0)
    whole = float(life(x0, one + other, law)[0])
    assert float(life(x0, other + split, law)[0]) == pytest.approx(whole, rel=1e-9, abs=0.0)


@few
@cases
def test_a_life_does_not_depend_on_its_neighbours(a, shape, stress, bend, m, threshold):
    law, blocks = Paris(1e-12, m, threshold), blocks_of(stress, bend)
    sizes = np.array([[a, 0.0015, 0.009, 0.5 * a], [a / shape, 0.005, 0.02, a]])
    many = life(sizes, blocks, law)
    for index in range(sizes.shape[1]):
        alone = life(sizes[:, index], blocks, law)
        assert many[index] == pytest.approx(alone[0], rel=1e-9, abs=0.0)


@few
@cases
def test_usage_counts_cycles_and_nothing_else(a, shape, stress, bend, m, threshold):
    """Ten times the cycles in a unit of usage: a tenth of the usage."""
    law, x0 = Paris(1e-12, m, threshold), np.array([a, a / shape])
    slow = float(life(x0, blocks_of(stress, bend, 1.0), law)[0])
    fast = float(life(x0, blocks_of(stress, bend, 10.0), law)[0])
    assert fast == pytest.approx(slow / 10.0, rel=1e-8, abs=0.0)
