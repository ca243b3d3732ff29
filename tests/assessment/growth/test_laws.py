"""Growth laws, and what of a cycle they see at each point of the front."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment.growth import CycleBlock, Paris, TwoStage, Walker, cycles_per_usage, rates
from assessment.kinds import KINDS
from tests.assessment.plain import constant_factor

KIND, BODY = constant_factor(1.0)
X = np.array([1.0 / np.pi])  # K equals the stress
LAW = Paris(1e-11, 3.0)


def rate(law, *, range_, ratio=None, maximum=None, per_usage=1.0):
    maxima = None if maximum is None else {"membrane": maximum}
    block = CycleBlock({"membrane": range_}, ratio, maxima, per_usage)
    return float(rates(KIND, X, BODY, law, (block,))[0])


def test_paris_by_hand():
    assert rate(Paris(2e-12, 3.0), range_=10.0, ratio=0.0) == pytest.approx(2e-9, rel=1e-12)


def test_no_growth_at_the_threshold_or_below():
    law = Paris(1e-11, 3.0, threshold=5.0)
    k = float(KIND.stress_intensity(X, {"membrane": np.asarray(1.0)}, BODY)[0])
    assert rate(law, range_=4.999 / k, ratio=0.0) == 0.0
    assert rate(law, range_=5.001 / k, ratio=0.0) > 0.0
    assert rate(Paris(1e-11, 3.0, threshold=5.0 * k), range_=5.0, ratio=0.0) == 0.0


def test_two_stages_meet_where_the_lines_cross():
    law = TwoStage(1e-16, 8.0, 1e-11, 3.0)
    assert law.crossing == pytest.approx(10.0, rel=1e-12)  # 1e-16 ΔK⁸ = 1e-11 ΔK³
    assert rate(law, range_=5.0, ratio=0.0) == pytest.approx(1e-16 * 5.0**8, rel=1e-12)
    assert rate(law, range_=20.0, ratio=0.0) == pytest.approx(1e-11 * 20.0**3, rel=1e-12)


@given(st.floats(0.0, 0.9), st.floats(1.0, 50.0), st.floats(0.3, 1.0))
def test_walker_by_its_formula(ratio, range_, gamma):
    expected = 1e-11 * (range_ / (1.0 - ratio) ** (1.0 - gamma)) ** 3.2
    assert rate(Walker(1e-11, 3.2, gamma), range_=range_, ratio=ratio) == pytest.approx(expected)


def test_walker_threshold_is_the_one_at_stress_ratio_nil():
    law = Walker(1e-11, 3.0, 0.5, threshold=10.0)
    # At R = 0.75 a range of 6 counts as 12, and 4.9 as 9.8.
    assert rate(law, range_=6.0, ratio=0.75) > 0.0
    assert rate(law, range_=4.9, ratio=0.75) == 0.0


@pytest.mark.parametrize("law", [LAW, Walker(1e-11, 3.0, 0.5)])
def test_the_part_of_a_cycle_that_shuts_the_crack_counts_for_nothing(law):
    """ASTM E647's definition of the range: K_min counts as nil when negative."""
    full = rate(law, range_=20.0, ratio=-1.0)
    assert full == pytest.approx(rate(law, range_=10.0, ratio=0.0), rel=1e-12)


def test_a_cycle_that_never_opens_the_crack_does_not_grow_it():
    assert rate(LAW, range_=20.0, maximum=-5.0) == 0.0
    assert rate(LAW, range_=20.0, maximum=0.0) == 0.0
    assert rate(LAW, range_=20.0, maximum=5.0) == pytest.approx(rate(LAW, range_=5.0, ratio=0.0))


@given(st.floats(-0.9, 0.9), st.floats(1.0, 50.0))
def test_stress_ratio_and_maximum_say_the_same(ratio, range_):
    law = Walker(1e-11, 3.0, 0.6)
    by_ratio = rate(law, range_=range_, ratio=ratio)
    assert by_ratio == pytest.approx(rate(law, range_=range_, maximum=range_ / (1.0 - ratio)))


def test_each_point_of_the_front_has_its_own_stress_ratio():
    """Bending of the opposite sign shuts the deepest point and opens the surface less."""
    kind, body = KINDS["plate-surface"], {"thickness": 0.02, "width": 0.4}
    x = np.array([0.014, 0.03])
    law = Walker(1e-12, 3.0, 0.5)
    block = CycleBlock(
        {"membrane": 60.0, "bending": 60.0}, None, {"membrane": 100.0, "bending": 60.0}, 7.0
    )
    found = rates(kind, x, body, law, (block,))

    def k(membrane, bending):
        loads = {"membrane": np.asarray(membrane), "bending": np.asarray(bending)}
        return kind.stress_intensity(x, loads, body)

    first, second = k(100.0, 60.0), k(40.0, 0.0)
    high, low = np.maximum(first, second), np.minimum(first, second)
    ratio = low / high
    assert abs(ratio[0] - ratio[1]) > 0.05
    expected = 7.0 * 1e-12 * ((high - low) / (1.0 - ratio) ** 0.5) ** 3.0
    assert found == pytest.approx(expected, rel=1e-12)


def test_blocks_add_up_and_a_split_block_is_the_same():
    one = CycleBlock({"membrane": 30.0}, 0.1, None, 12.0)
    other = CycleBlock({"membrane": 50.0}, 0.4, None, 3.0)
    parts = (
        CycleBlock({"membrane": 30.0}, 0.1, None, 7.0),
        CycleBlock({"membrane": 30.0}, 0.1, None, 5.0),
    )
    both = rates(KIND, X, BODY, LAW, (one, other))
    assert both == pytest.approx(
        rates(KIND, X, BODY, LAW, (one,)) + rates(KIND, X, BODY, LAW, (other,))
    )
    assert both == pytest.approx(rates(KIND, X, BODY, LAW, (*parts, other)), rel=1e-12)
    assert cycles_per_usage((*parts, other)) == cycles_per_usage((one, other)) == 15.0
