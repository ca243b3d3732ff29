"""The forecast by size alone."""

import numpy as np
import pytest

from assessment.forecast.history import recorded_ahead, size_quantiles, sizes_ahead, times_to, trend
from assessment.forecast.points import quantiles
from assessment.forecast.population import Population, learn

from .cracks import Truth, made_up

TIMES = np.linspace(0.0, 1.0, 7)
LEVELS = np.array([0.05, 0.5, 0.95])
STEP = 0.01


def fleet_of(count: int, seed: int, mean: float = -1.0, exponent_sd: float = 0.25) -> list[Truth]:
    rng = np.random.default_rng(seed)
    return [
        made_up(
            rng, mean + 0.2 * rng.standard_normal(), 2.0 + exponent_sd * rng.standard_normal(), 0.8,
            np.linspace(0.0, 1.5, 10),
        )
        for _ in range(count)
    ]  # fmt: skip


@pytest.fixture(scope="module")
def fleet() -> Population:
    return learn([(one.times, one.sizes) for one in fleet_of(20, 1)], STEP)


def test_learning_finds_what_the_fleet_was_made_with(fleet: Population) -> None:
    mean = fleet.weights @ fleet.mean
    # The reference size is the fleet's own middle: move the made log rate there.
    made = -1.0 + (2.0 - 1.0) * np.log(fleet.reference)
    assert mean == pytest.approx([made, 2.0], abs=0.2)
    spread = np.sqrt(np.einsum("d,dii->i", fleet.weights, fleet.covariance))
    assert spread[0] == pytest.approx(np.hypot(0.2, 0.25 * np.log(fleet.reference)), rel=0.5)
    assert fleet.weights @ fleet.error_sd == pytest.approx(0.005, rel=0.4)
    assert fleet.effective > 30


def test_a_plain_history_is_continued(fleet: Population) -> None:
    one = made_up(np.random.default_rng(5), -1.0, 2.0, 0.8, TIMES, wander_sd=0.0)
    for known in (None, fleet):
        found = trend(one.times, one.sizes, STEP, known)
        assert found.effective > 400
        low, middle, high = size_quantiles(found, sizes_ahead(found, np.array([1.3])), LEVELS)[0]
        assert low < one.at(1.3) < high
        assert middle == pytest.approx(one.at(1.3), rel=0.05)
        life = quantiles(times_to(found, 1.5), LEVELS, found.weights)
        assert life[0] < one.time_to(1.5) < life[2]


def test_the_fleet_sharpens(fleet: Population) -> None:
    widths: list[list[float]] = [[], []]
    for one in fleet_of(6, 33):
        for row, known in zip(widths, (None, fleet), strict=True):
            found = trend(one.times[:3], one.sizes[:3], STEP, known)
            low, _, high = quantiles(times_to(found, 1.2), LEVELS, found.weights)
            row.append(high - low)
    assert np.mean(widths[1]) < 0.7 * np.mean(widths[0])


def test_changing_the_history_changes_the_answer(fleet: Population) -> None:
    one = fleet_of(1, 34)[0]
    sooner = one.sizes[:5] + np.array([0.0, 0.01, 0.02, 0.03, 0.05])
    medians = [
        quantiles(times_to(found, 1.5), np.array([0.5]), found.weights)[0]
        for found in (trend(one.times[:5], s, STEP, fleet) for s in (one.sizes[:5], sooner))
    ]
    assert medians[1] < medians[0] - 0.02


def test_a_crack_unlike_its_fleet_is_told_and_followed(fleet: Population) -> None:
    fast = made_up(np.random.default_rng(3), 0.2, 2.0, 0.8, np.linspace(0, 0.4, 7), wander_sd=0.05)
    found = trend(fast.times, fast.sizes, STEP, fleet)
    assert found.unlike > 0.9
    like = fleet_of(1, 35)[0]
    assert trend(like.times[:5], like.sizes[:5], STEP, fleet).unlike < 0.2
    low, _, high = size_quantiles(found, sizes_ahead(found, np.array([0.45])), LEVELS)[0]
    assert low < fast.at(0.45) < high


def test_what_is_recorded_is_wider_than_what_is(fleet: Population) -> None:
    one = fleet_of(1, 36)[0]
    found = trend(one.times[:6], one.sizes[:6], STEP, fleet)
    true, read = (
        size_quantiles(found, ahead(found, one.times[6:7]), LEVELS)[0]
        for ahead in (sizes_ahead, recorded_ahead)
    )
    assert read[2] - read[0] > true[2] - true[0]


def test_samples_do_not_decide() -> None:
    """Another seed and four times the samples: the same quantiles within sampling error."""
    one = fleet_of(1, 37)[0]
    answers = []
    for samples, seed in ((4096, 3), (16384, 77)):
        found = trend(one.times[:5], one.sizes[:5], STEP, None, samples, seed)
        answers.append(quantiles(times_to(found, 1.5), LEVELS, found.weights) - found.last)
    assert answers[0] == pytest.approx(answers[1], rel=0.08)


@pytest.mark.parametrize(
    ("times", "sizes", "why"),
    [
        ([0.0], [1.0], "at least two readings"),
        ([0.0, 0.0], [1.0, 1.1], "rise"),
        ([0.0, 1.0], [0.0, 1.1], "above nil"),
    ],
)
def test_bad_readings_are_refused(times: list[float], sizes: list[float], why: str) -> None:
    with pytest.raises(ValueError, match=why):
        trend(np.array(times), np.array(sizes), STEP, learn([(TIMES, 1.0 + TIMES)], STEP))


def test_times_ahead_are_ahead() -> None:
    found = trend(TIMES, 0.8 + 0.2 * TIMES, STEP)
    with pytest.raises(ValueError, match="last reading on"):
        sizes_ahead(found, np.array([0.5]))
