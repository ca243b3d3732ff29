"""The two tables, row by row, and that no single fact made worse gives an easier verdict."""

import datetime
from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment.interval import Next
from assessment.verdict import (
    STRICTNESS,
    CrackFacts,
    PlaceFacts,
    Restriction,
    decide_crack,
    decide_place,
)

START = datetime.date(2026, 5, 4)


def interval(days: int, left: bool | None = None) -> Next:
    on = START + datetime.timedelta(days=days)
    return Next(1000.0 + days, on, "the rule", days, left=days > 0 if left is None else left)


GOOD = CrackFacts(
    acceptable=True,
    why_not_acceptable="It fails at the peak load.",
    needs=(),
    grew_faster_before=False,
    reserve=2.0,
    demanded=1.3,
    restriction=None,
    why_no_restriction="",
    interval=interval(365),
    shortest=14,
    longest=365,
)
LIMIT = Restriction("Not above 120 MPa.", interval(365))

PLACE = PlaceFacts(
    on_record=False,
    needs=(),
    method_finds=True,
    method_words="It finds 5 mm.",
    interval=interval(365),
    shortest=14,
    longest=365,
)


@pytest.mark.parametrize(
    ("facts", "verdict", "before_return"),
    [
        (GOOD, "continue", False),
        (replace(GOOD, interval=interval(364)), "watch", False),
        (replace(GOOD, interval=interval(14)), "watch", False),
        (replace(GOOD, interval=interval(13)), "repair", False),
        (replace(GOOD, interval=interval(0)), "repair", True),
        (replace(GOOD, interval=interval(13, left=False)), "repair", True),
        (replace(GOOD, interval=interval(100, left=False)), "refer", False),
        (replace(GOOD, reserve=1.2), "repair", True),
        (replace(GOOD, reserve=1.2, restriction=LIMIT), "restrict", False),
        (replace(GOOD, reserve=1.3), "continue", False),
        (replace(GOOD, needs=("x is missing",)), "refer", False),
        (replace(GOOD, grew_faster_before=True), "refer", False),
        (replace(GOOD, acceptable=None, reserve=None), "refer", False),
        (replace(GOOD, interval=None), "refer", False),
        (replace(GOOD, shortest=None), "refer", False),
        (replace(GOOD, acceptable=False, reserve=0.9), "withdraw", False),
        (replace(GOOD, acceptable=False, needs=("x is missing",)), "withdraw", False),
    ],
)
def test_the_first_row_that_applies_gives_the_verdict(facts, verdict, before_return):
    decision = decide_crack(facts)
    assert (decision.verdict, decision.before_return) == (verdict, before_return)
    assert decision.reasons


def test_every_row_that_applies_gives_a_reason_and_the_restriction_stays():
    facts = replace(GOOD, acceptable=False, needs=("x is missing",), reserve=1.2, restriction=LIMIT)
    decision = decide_crack(facts)
    assert decision.verdict == "withdraw"
    told = " ".join(decision.reasons)
    assert "fails" in told and "x is missing" in told and "below the 1.3" in told
    assert decision.conditions == (LIMIT.words,)


def test_the_otherwise_row_stays_silent_when_another_applies():
    told = decide_crack(replace(GOOD, needs=("x is missing",))).reasons
    assert told == ("x is missing",)


@pytest.mark.parametrize(
    ("facts", "verdict"),
    [
        (PLACE, "continue"),
        (replace(PLACE, interval=interval(100)), "watch"),
        (replace(PLACE, interval=interval(10)), "refer"),
        (replace(PLACE, interval=interval(100, left=False)), "refer"),
        (replace(PLACE, on_record=True), "refer"),
        (replace(PLACE, needs=("calibration expired",)), "refer"),
        (replace(PLACE, method_finds=False), "refer"),
        (replace(PLACE, method_finds=None), "refer"),
        (replace(PLACE, interval=None), "refer"),
    ],
)
def test_a_place_without_a_measured_crack(facts, verdict):
    assert decide_place(facts).verdict == verdict


facts_drawn = st.builds(
    CrackFacts,
    acceptable=st.sampled_from([True, False, None]),
    why_not_acceptable=st.just("It fails."),
    needs=st.sampled_from([(), ("x is missing",)]),
    grew_faster_before=st.booleans(),
    reserve=st.none() | st.floats(0.1, 3.0),
    demanded=st.none() | st.floats(1.0, 2.0),
    restriction=st.sampled_from([None, LIMIT]),
    why_no_restriction=st.just(""),
    interval=st.none() | st.integers(0, 800).map(interval),
    shortest=st.none() | st.integers(0, 30).map(float),
    longest=st.none() | st.integers(30, 800).map(float),
)


def strictness(facts: CrackFacts) -> int:
    return STRICTNESS.index(decide_crack(facts).verdict)


@given(facts_drawn)
def test_one_fact_made_worse_never_eases_the_verdict(facts):
    now = strictness(facts)
    worse = [
        replace(facts, acceptable=False),
        replace(facts, needs=(*facts.needs, "y is missing")),
        replace(facts, grew_faster_before=True),
        replace(facts, interval=None, restriction=None),
        replace(facts, shortest=None),
    ]
    if facts.reserve is not None:
        worse.append(replace(facts, reserve=facts.reserve * 0.5))
    if facts.interval is not None:
        worse.append(replace(facts, interval=interval(facts.interval.days // 2)))
    if facts.longest is not None:
        worse.append(replace(facts, longest=facts.longest * 2))
    assert all(strictness(one) >= now for one in worse)


FASTER = replace(GOOD, grew_faster=True, faster_words="It grew faster than its basis explains.")


def test_growth_faster_than_the_basis_is_at_best_watch_and_then_refer() -> None:
    first = decide_crack(FASTER)
    assert first.verdict == "watch" and FASTER.faster_words in first.reasons
    assert decide_crack(replace(FASTER, interval=interval(13))).verdict == "repair"
    again = decide_crack(replace(FASTER, grew_faster_before=True))
    assert again.verdict == "refer" and "too" in again.reasons[0]
    # Judged and found to be as the basis explains: the earlier time no longer counts.
    eased = decide_crack(replace(GOOD, grew_faster=False, grew_faster_before=True))
    assert eased.verdict == "continue"
    unjudged = decide_crack(replace(GOOD, grew_faster=None, grew_faster_before=True))
    assert unjudged.verdict == "refer" and "could not be judged" in unjudged.reasons[0]


def test_a_probability_of_failure_at_the_target_is_withdrawn() -> None:
    failing = decide_crack(replace(GOOD, failing="The probability is already 1 in 100."))
    assert failing.verdict == "withdraw" and failing.reasons[0].startswith("The probability")
