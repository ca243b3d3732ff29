"""The power law of size in closed form, against SciPy's integration of the same equation."""

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from assessment.forecast.rate_law import rate_at, size_after, time_between


@pytest.mark.parametrize("exponent", [-0.5, 0.5, 1.0, 1.0 + 1e-8, 1.5, 2.6])
def test_size_and_time_as_integrated(exponent: float) -> None:
    log_rate, start = np.log(0.4), 0.8
    run = solve_ivp(
        lambda _, x: np.exp(log_rate) * x**exponent, (0, 0.9), [start], rtol=1e-11, atol=1e-13
    )
    end = run.y[0, -1]
    found = size_after(np.array(0.9), np.array(log_rate), np.array(exponent), np.array(start))
    assert found == pytest.approx(end, rel=1e-6)
    way = time_between(np.array(start), np.array(end), np.array(log_rate), np.array(exponent))
    assert way == pytest.approx(0.9, rel=1e-6)


def test_a_runaway_is_infinite_from_its_time_on() -> None:
    # x = 1/(1 − t) for p = 2 from 1: closed form.
    times = np.array([0.5, 0.999, 1.0, 2.0])
    sizes = size_after(times, np.array(0.0), np.array(2.0), np.array(1.0))
    assert sizes[:2] == pytest.approx([2.0, 1000.0])
    assert np.all(np.isinf(sizes[2:]))


def test_rate_is_the_slope_of_size() -> None:
    log_rate, exponent, start = np.array(0.3), np.array(1.7), np.array(0.9)
    h = 1e-6
    ends = size_after(np.array([0.2 - h, 0.2 + h]), log_rate, exponent, start)
    middle = size_after(np.array(0.2), log_rate, exponent, start)
    assert (ends[1] - ends[0]) / (2 * h) == pytest.approx(rate_at(middle, log_rate, exponent))
