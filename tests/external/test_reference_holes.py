"""Reference stress at holes: limits by hand, and balance of the section integrated."""

import numpy as np
import pytest

from assessment.relations import reference_holes

NIL = np.asarray(0.0)
ONE = np.asarray(1.0)
W, D = 0.2, 0.04
R = D / 2


@pytest.mark.parametrize("cracks", [1, 2])
def test_without_a_crack_it_is_the_net_section(cracks):
    found = reference_holes.through(ONE, NIL, NIL, R, W, cracks)
    assert found == pytest.approx(W / (W - D), rel=1e-12)
    found = reference_holes.corner(ONE, NIL, NIL, NIL, 0.01, R, W, cracks)
    assert found == pytest.approx(W / (W - D), rel=1e-12)


def test_two_cracks_leave_the_net_section():
    found = reference_holes.through(ONE, NIL, np.asarray(0.03), R, W, 2)
    assert found == pytest.approx(W / (W - D - 0.06), rel=1e-12)


@pytest.mark.parametrize("a", [0.001, 0.02, 0.05, 0.079])
def test_one_crack_balances_force_and_moment(a):
    """Integrated over the section: +σ on both ligaments but −σ on the strip at the far edge."""
    sigma = float(reference_holes.through(ONE, NIL, np.asarray(a), R, W, 1))
    x = np.linspace(-W / 2, W / 2, 2_000_001)
    middle = (x[1:] + x[:-1]) / 2
    strip = (W - D - a - W / sigma) / 2
    metal = (middle < -R) | (middle > R + a)
    stress = np.where(metal, np.where(middle < -W / 2 + strip, -sigma, sigma), 0.0)
    step = x[1] - x[0]
    assert stress.sum() * step == pytest.approx(W, rel=1e-4)
    assert (stress * middle).sum() * step == pytest.approx(0.0, abs=1e-4 * W * W)


def test_the_pin_is_carried_by_the_section_too():
    """P/t = σ_b D, over the same metal."""
    found = reference_holes.through(NIL, ONE, np.asarray(0.03), R, W, 2)
    assert found == pytest.approx(D / (W - D - 0.06), rel=1e-12)


@pytest.mark.parametrize("cracks", [1, 2])
def test_a_corner_crack_through_the_thickness_is_at_least_the_through_crack(cracks):
    c = np.asarray(0.02)
    corner = reference_holes.corner(ONE, ONE, np.asarray(0.01), c, 0.01, R, W, cracks)
    assert corner >= reference_holes.through(ONE, ONE, c, R, W, cracks)


def test_a_lug_takes_the_worst_of_section_shear_and_bearing():
    wide = reference_holes.lug(ONE, ONE, np.asarray(0.001), R, W, 1.0)
    assert wide == pytest.approx(1.0)  # bearing P/(D t) itself
    short = reference_holes.lug(ONE, ONE, np.asarray(0.001), R, W, R + 0.01)
    assert short == pytest.approx(D / 0.01)  # two planes of 10 mm at half the yield each
    narrow = reference_holes.lug(ONE, ONE, NIL, R, 0.06, 1.0)
    assert narrow == pytest.approx(D / (0.06 - D))
