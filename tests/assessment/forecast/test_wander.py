"""The wandering rate: its normal algebra against dense covariances and plain simulation."""

import numpy as np
import pytest
from scipy.stats import multivariate_normal

from assessment.forecast.wander import (
    State,
    advance,
    ahead,
    clock_covariance,
    drawn,
    measured,
    start,
    transition,
)

SD, SPAN = 0.2, 1.5
TIMES = np.array([0.0, 0.4, 1.3, 1.9, 4.0])


def _history(errors: np.ndarray, rates: np.ndarray, variance: float) -> State:
    state, before = start(1, SD), 0.0
    for time, error, rate in zip(TIMES, errors, rates, strict=True):
        if time > before:
            state = advance(state, time - before, SD, SPAN)
        state = measured(state, np.array([error]), np.array([rate]), variance)
        before = time
    return state


def test_filter_is_the_conjugate_normal() -> None:
    """Likelihood and last state as the joint normal of all readings gives them (scipy.stats)."""
    errors = np.array([0.01, -0.05, 0.2, 0.3, 0.5])
    rates, variance = np.array([1.0, 1.1, 1.4, 1.6, 2.5]), 0.04
    state = _history(errors, rates, variance)
    dense = clock_covariance(TIMES, SD, SPAN)
    spread = dense * np.outer(rates, rates) + variance * np.eye(5)
    assert state.log_likelihood[0] == pytest.approx(multivariate_normal.logpdf(errors, cov=spread))
    gain = (dense[-1] * rates) @ np.linalg.inv(spread)
    assert state.d[0] == pytest.approx(gain @ errors)
    assert state.var_d[0] == pytest.approx(dense[-1, -1] - gain @ (dense[-1] * rates))


def test_two_steps_are_one() -> None:
    whole = advance(start(1, SD), 2.0, SD, SPAN)
    halves = advance(advance(start(1, SD), 0.7, SD, SPAN), 1.3, SD, SPAN)
    for name in ("var_d", "cov", "var_w"):
        assert getattr(whole, name) == pytest.approx(getattr(halves, name))
    assert whole.var_w == pytest.approx(SD**2)


@pytest.mark.parametrize("x", [1e-6, 0.0099, 0.0101, 1.0, 50.0])
def test_transition_meets_the_dense_covariance(x: float) -> None:
    # From w = 0 known, var D is the stationary one less what w₀ explains.
    t = transition(x * SPAN, SD, SPAN)
    dense = clock_covariance(np.array([0.0, x * SPAN]), SD, SPAN)[1, 1]
    assert t.var_d + t.gain**2 * SD**2 == pytest.approx(dense, rel=1e-5)


def test_ahead_as_simulated_step_by_step() -> None:
    rng = np.random.default_rng(4)
    n, steps, h = 40_000, 20, 0.1
    leads, wanders = ahead(
        np.zeros(n), SD * rng.standard_normal(n), np.full(n, h), SD, SPAN,
        rng.standard_normal((steps, n)),
    )  # fmt: skip
    assert np.mean(leads[-1]) == pytest.approx(0.0, abs=4 * np.std(leads[-1]) / np.sqrt(n))
    assert np.std(wanders[-1]) == pytest.approx(SD, rel=0.02)
    # To first order D is the integral of w; e^w − 1 adds about s²/4 of its variance.
    dense = clock_covariance(np.array([0.0, steps * h]), SD, SPAN)[1, 1]
    assert np.var(leads[-1]) == pytest.approx(dense, rel=0.04)


def test_drawn_has_the_state_s_moments() -> None:
    state = _history(np.array([0.0, 0.1, 0.2, 0.1, 0.3]), np.ones(5), 0.01)
    many = State(*(np.repeat(getattr(state, name), 50_000) for name in state.__dataclass_fields__))
    z = np.random.default_rng(1).standard_normal((2, 50_000))
    d, w = drawn(many, z[0], z[1])
    expected = [[state.var_d[0], state.cov[0]], [state.cov[0], state.var_w[0]]]
    assert np.cov(d, w) == pytest.approx(np.array(expected), rel=0.08)


def test_an_impossible_sample_has_no_likelihood() -> None:
    state = measured(start(2, SD), np.array([0.1, -np.inf]), np.array([1.0, np.inf]), 0.01)
    assert np.isfinite(state.log_likelihood[0]) and state.log_likelihood[1] == -np.inf
    assert np.all(np.isfinite(state.d)) and np.all(np.isfinite(state.var_d))
