"""The shape of the Option 1 diagram. Its published values are in tests/external."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment.failure import OPTION_1, limit_curve, lr_max, option_1
from tests.assessment.plain import Steel

STEEL = (355.0, 490.0, 207e3)
BOTH = pytest.mark.parametrize("yielding", ["continuous", "discontinuous"])


@BOTH
def test_it_starts_at_one_and_never_rises(yielding):
    lr = np.linspace(0.0, 1.3, 2000)
    f = option_1(lr, *STEEL, yielding)
    assert f[0] == 1.0
    assert np.all(np.diff(f) <= 0.0)


@BOTH
def test_it_reaches_the_cut_off_and_is_nil_beyond(yielding):
    end = lr_max(355.0, 490.0)
    assert option_1(end, *STEEL, yielding) > 0.0
    assert option_1(np.nextafter(end, 2.0), *STEEL, yielding) == 0.0


def test_continuous_yielding_has_no_step_at_one():
    sides = option_1([1.0 - 1e-9, 1.0, 1.0 + 1e-9], *STEEL, "continuous")
    assert sides == pytest.approx([sides[1]] * 3, rel=1e-7)


def test_the_yield_plateau_drops_at_one_to_the_value_by_hand():
    """By hand for σ_Y 355, E 207,000 MPa: Δε = 0.0375 × 0.645 = 0.0241875, λ = 1 + 207000 × Δε/355
    = 15.10370, f(1) = (λ + 1/(2λ))^(-1/2) = 0.257029."""
    before, at, after = option_1([1.0 - 1e-12, 1.0, 1.0 + 1e-9], *STEEL, "discontinuous")
    assert before == pytest.approx(1.5**-0.5, rel=1e-9)
    assert at == pytest.approx(0.257029, rel=1e-5)
    assert after == pytest.approx(at, rel=1e-6)


@given(st.floats(200.0, 900.0), st.floats(1.0, 1.8), st.floats(0.0, 2.0), st.floats(60e3, 220e3))
def test_a_plateau_is_never_the_easier_one_past_yield(sigma_y, ratio, lr, modulus):
    """Past L_r = 1 the diagram with a plateau lies inside the one without."""
    strengths = (sigma_y, ratio * sigma_y, modulus)
    if lr >= 1.0:
        plain = option_1(lr, *strengths, "continuous")
        assert option_1(lr, *strengths, "discontinuous") <= plain * (1.0 + 1e-12)


def test_no_hardening_ends_at_yield():
    assert lr_max(500.0, 500.0) == 1.0
    assert option_1([1.0, 1.0001], 500.0, 500.0, 207e3, "continuous")[1] == 0.0


def test_an_unknown_kind_of_yielding_is_misuse():
    with pytest.raises(ValueError, match="plateau"):
        option_1(0.5, *STEEL, "plateau")


def test_the_drawn_curve_lies_on_the_diagram_and_closes_on_the_axis():
    curve = np.array(limit_curve(Steel(yielding="discontinuous")))
    assert curve[:-1, 1] == pytest.approx(option_1(curve[:-1, 0], *STEEL, "discontinuous"))
    assert tuple(curve[-1]) == (lr_max(355.0, 490.0), 0.0)


@pytest.mark.parametrize(("sigma_y", "marked"), [(946.0, 0), (946.1, 1)])
def test_just_outside_the_range_of_the_yield_plateau_there_is_a_mark(sigma_y, marked):
    assert len(OPTION_1.marks({"σ_Y": sigma_y})) == marked
