"""How wrong the inputs may be: the factor found changes the verdict, a little less does not."""

from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from assessment.document import read_case
from assessment.document.case import Case
from assessment.forecast import sensitivity
from assessment.forecast.sensitivity import Margin, margins, measure_next, sentence
from assessment.procedure import compute
from tests.assessment.examples import surface


def decided(case: Case) -> tuple[str, float | None]:
    with np.errstate(all="ignore"):
        found = compute(case)
    return found.decision.verdict, None if found.next is None else float(found.next.days)


def case_of(**changes: Any) -> Case:
    return read_case(surface(**changes))


def test_the_factor_found_is_where_the_verdict_changes() -> None:
    case = case_of(loading__cycles__0__per_usage=200)
    verdict, _ = decided(case)
    for one in margins(case, decided):
        assert one.factor is not None, one.words()
        worse = sensitivity._WORSE[one.what]
        assert decided(worse(case, one.factor))[0] == one.becomes != verdict
        assert decided(worse(case, 0.99 * one.factor))[0] == verdict


def test_growth_by_the_interval_s_own_factor() -> None:
    """Life goes as 1/C (Paris): a part that must be looked at before the longest interval is watch
    once the bounding life over the life factor falls below it."""
    case = case_of(loading__cycles__0__per_usage=200, material__growth__threshold_mpa_sqrt_m=0)
    with np.errstate(all="ignore"):
        found = compute(case)
    assert found.decision.verdict == "continue" and found.bounding.life.usage is not None
    per_day = 4.0
    expected = found.bounding.life.usage / 2.0 / per_day / 365.0
    growth = next(one for one in margins(case, decided) if one.what == "growth rate")
    assert growth.becomes == "watch" and growth.factor == pytest.approx(expected, rel=0.05)


def test_what_to_measure_next_moves_the_governing_rule_most() -> None:
    case = case_of(loading__cycles__0__per_usage=3000)
    _, now = decided(case)
    one = measure_next(case, decided)
    assert one is not None and now is not None and one.days > now
    # The basis's bounding rate is twice the mean: knowing the mean gains more than half the error.
    assert one.what == "Measuring the growth rate of this material"
    said = sentence(now, one)
    assert "would move the next inspection from" in said and "changes nothing until" in said
    # It changes nothing by itself.
    assert decided(case)[1] == now


def test_sizing_where_that_is_what_is_uncertain() -> None:
    case = case_of(loading__cycles__0__per_usage=3000, crack__sizing__depth_sd_mm=1.5)
    case = replace(
        case,
        material=replace(
            case.material, bounding=replace(case.material.bounding, growth=case.material.growth)
        ),
    )
    one = measure_next(case, decided)
    assert one is not None and one.what == "Sizing the depth to ±0.75 mm"


def test_where_nothing_would_move_it() -> None:
    assert "No single better measurement" in sentence(30.0, None)
    assert "no change" in Margin("load", None, None).words()
