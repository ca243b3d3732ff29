import numpy as np
import pytest
from scipy.stats import norm

from assessment.forecast.points import (
    effective_size,
    normals,
    quantiles,
    systematic,
    uniforms,
    weights_of,
)


def test_same_seed_same_points_and_even_cover() -> None:
    first, second = uniforms(1024, 3, 5), uniforms(1024, 3, 5)
    assert np.array_equal(first, second) and not np.array_equal(first, uniforms(1024, 3, 6))
    assert np.all((first > 0.0) & (first < 1.0))
    # One point in each of 1024 strips of every axis: what makes a Sobol sequence.
    assert all(len(set(np.floor(row * 1024))) == 1024 for row in first)


def test_normals_are_normal() -> None:
    z = normals(4096, 2, 1)
    assert np.quantile(z, [0.01, 0.5, 0.99]) == pytest.approx(norm.ppf([0.01, 0.5, 0.99]), abs=0.02)


def test_only_powers_of_two() -> None:
    with pytest.raises(ValueError, match="power of two"):
        uniforms(1000, 2, 1)


def test_weights_and_their_effective_size() -> None:
    assert weights_of(np.array([0.0, -np.inf, np.nan, 0.0])) == pytest.approx([0.5, 0, 0, 0.5])
    assert effective_size(np.full(10, 0.1)) == pytest.approx(10.0)
    assert effective_size(np.array([1.0, 0.0])) == 1.0
    with pytest.raises(ValueError, match="no sample explains"):
        weights_of(np.full(3, -np.inf))


def test_systematic_draws_shares() -> None:
    assert np.bincount(systematic(np.array([0.5, 0.0, 0.25, 0.25]), 8)).tolist() == [4, 0, 2, 2]


def test_weighted_quantiles() -> None:
    x = np.random.default_rng(2).standard_normal(20_000)
    # Weights e^x turn N(0, 1) into N(1, 1).
    shares = np.array([0.05, 0.5, 0.95])
    found = quantiles(x, shares, weights_of(x))
    assert found == pytest.approx(1.0 + norm.ppf(shares), abs=0.06)
    even = np.full(5, 0.2)
    assert quantiles(np.arange(5.0), np.array([0.5]), even) == pytest.approx([2.0])
    got = quantiles(np.array([1.0, 2.0, np.inf]), np.array([0.1, 0.5, 0.9]), np.full(3, 1 / 3))
    assert got.tolist()[0] == 1.0 and got.tolist()[1] == 2.0 and np.isinf(got[2])
