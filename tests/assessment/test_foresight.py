"""What the forecast does to the decision, through the whole way from document to outcome."""

import json
from typing import Any

import pytest

from assessment import assess, outcome_text
from assessment.forecast.surprise import chance
from assessment.interval import FORECAST, MEASURED_GROWTH
from tests.assessment.examples import place, surface
from tests.assessment.forecast.test_case_forecast import FAST, SCATTER, crack, grown


def outcome(**changes: Any) -> dict[str, Any]:
    return assess(surface(**changes))


def rule(found: dict[str, Any], name: str) -> dict[str, Any]:
    return next(one for one in found["rules"] if one["rule"] == name)


def test_the_forecast_gives_rule_2_its_date() -> None:
    found = outcome(**FAST, criteria__failure_probability=0.01)
    two = rule(found, FORECAST)
    assert two["usage"] == pytest.approx(
        1250 + found["forecast"]["usage_quantiles"]["0.01"], abs=0.01
    )
    assert two["on"] == found["forecast"]["date_quantiles"]["0.01"]
    later = rule(outcome(**FAST, criteria__failure_probability=0.05), FORECAST)
    assert later["usage"] > two["usage"]


def test_below_the_smallest_probability_it_is_not_resolved() -> None:
    found = outcome(**FAST, criteria__failure_probability=1e-6)
    two = rule(found, FORECAST)
    assert two["usage"] is None and two["on"] is None
    assert two["why_not"].startswith("not resolved")
    assert found["forecast"]["smallest_probability"] == pytest.approx(10 / 8192)


def test_without_what_it_needs_rule_2_says_so() -> None:
    found = outcome()
    assert found["forecast"] is None
    assert rule(found, FORECAST)["why_not"] == "uncertainty is missing"
    no_target = outcome(**FAST)
    assert rule(no_target, FORECAST)["why_not"] == "criteria.failure_probability is missing"
    nothing_found = assess(place(uncertainty=SCATTER))
    assert nothing_found["forecast"] is None
    assert rule(nothing_found, FORECAST)["why_not"] == "no crack was measured"


def test_a_crack_that_may_already_have_failed_is_withdrawn() -> None:
    found = outcome(
        **FAST, criteria__failure_probability=0.01, as_of={"on": "2026-12-31", "at": 4000}
    )
    assert found["disposition"]["verdict"] == "withdraw"
    assert any("probability of failure is already" in r for r in found["disposition"]["reasons"])


def test_growth_faster_than_the_basis_shortens_the_bounding_life() -> None:
    fast = crack(grown(speed=2.5, depth=1.0, length=4.5), sd=0.03)
    same_growth = {"material__bounding__growth__c": 6.0e-12}
    unasked = outcome(**fast, **same_growth)
    assert "criteria.surprise is missing" in rule(unasked, MEASURED_GROWTH)["why_not"]
    found = outcome(**fast, **same_growth, criteria__surprise=0.05)
    assert found["disposition"]["verdict"] not in ("continue",)
    assert any("faster than its basis" in r for r in found["disposition"]["reasons"])
    lives = [one["bounding"]["life"]["usage"] for one in (found, unasked)]
    # 2.5 times the mean law and a little more, against 1.2 times: about half the life.
    assert lives[0] == pytest.approx(
        lives[1] * 1.2 / found["forecast"]["growth"]["upper_factor"], rel=0.05
    )
    again = outcome(**fast, **same_growth, criteria__surprise=0.05, previous={"grew_faster": True})
    assert again["disposition"]["verdict"] == "refer"


def test_the_outcome_is_plain_and_the_same_again() -> None:
    document = surface(**crack(grown()), criteria__failure_probability=0.01)
    first, second = (outcome_text(assess(document)) for _ in range(2))
    assert first == second
    told = json.loads(first)["forecast"]
    assert [row["words"] for row in told["failure_by"]][0].startswith("fewer than")
    band = told["bands"][0]["depth_mm"]
    assert band["90"][0] <= band["80"][0] <= band["50"][0] <= band["50"][1] <= band["90"][1]
    assert not any(row["outlier"] for row in told["history"]["weighed"])


@pytest.mark.parametrize(
    ("probability", "words"),
    [
        (3e-4, "about 3 in 10,000"),
        (0.031, "about 3 in 100"),
        (0.5, "about 50 in 100"),
        (1e-9, "fewer than 1 in a million"),
        (0.0096, "about 10 in 1,000"),
    ],
)
def test_probabilities_in_words(probability: float, words: str) -> None:
    assert chance(probability) == words
