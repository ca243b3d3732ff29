"""Rules, rate of usage and dates; every rounding goes to the earlier side."""

import datetime

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy import stats

from assessment.document import read_case
from assessment.document.case import Usage
from assessment.interval import (
    FIXED,
    FORECAST,
    LIFE,
    LONGEST,
    date_of,
    governing,
    rate,
    round_down,
    rules,
)
from tests.assessment.examples import DROP, surface

START = datetime.date(2026, 5, 4)


def usage(*readings, per_day=4.0, at=1250.0) -> Usage:
    dated = tuple((datetime.date.fromisoformat(on), float(value)) for on, value in readings)
    return Usage("hour", per_day, at, START, dated)


def test_without_readings_the_rate_is_per_day():
    assert rate(usage()).per_day == 4.0


def test_two_readings_give_the_plain_rate_where_it_is_faster():
    # 1250 - 250 = 1000 hours in 100 days; the last look is the second reading.
    assert rate(usage(("2026-01-24", 250))).per_day == pytest.approx(10.0)
    assert rate(usage(("2026-01-24", 250), per_day=12.0)).per_day == 12.0


def test_three_readings_give_the_faster_end_of_the_interval():
    # Steps of 100 days with 900 and 1100 hours: rate 10, scatter (100² + 100²)/100 = 200 with one
    # degree of freedom; t(0.95, 1) = 6.3138; half-width 6.3138·√(200/200) (by hand).
    found = rate(usage(("2025-10-16", 0.0), ("2026-01-24", 900), at=2000.0))
    assert found.per_day == pytest.approx(10.0 + stats.t.ppf(0.95, 1), rel=1e-12)
    assert "90 %" in found.words


def test_an_even_counter_has_no_spread():
    found = rate(usage(("2025-10-16", 0), ("2026-01-24", 1000), at=2000.0))
    assert found.per_day == pytest.approx(10.0)


@given(
    st.lists(st.tuples(st.integers(1, 200), st.floats(0, 1000)), min_size=1, max_size=8),
    st.floats(0.1, 50.0),
)
def test_never_slower_than_per_day_or_the_plain_rate(steps, per_day):
    on, at, readings = datetime.date(2020, 1, 1), 0.0, []
    for days, used in steps:
        readings.append((on, at))
        on, at = on + datetime.timedelta(days=days), at + used
    found = rate(Usage("hour", per_day, at, on, tuple(readings))).per_day
    plain = at / (on - readings[0][0]).days
    assert found >= per_day and found >= plain * (1 - 1e-12)


def test_dates_and_readings_round_down():
    assert date_of(9.99, 1.0, START) == START + datetime.timedelta(days=9)
    assert date_of(0.99, 1.0, START) == START
    assert date_of(1e300, 1.0, START) is None
    assert round_down(12.34567) == 12.345


def test_all_rules_are_listed_with_why_not():
    case = read_case(surface())
    found = {one.rule: one for one in rules(case, 1000.0, None)}
    assert found[LIFE].usage == 1250 + 500
    assert found[LONGEST].on == START + datetime.timedelta(days=365)
    assert found[FORECAST].why_not == "no crack was measured"
    assert found[FIXED].why_not
    assert len(found) == 6
    assert all(one.on or one.why_not for one in found.values())


def test_the_earliest_governs_and_is_named():
    case = read_case(surface(owner={"fixed_date": {"on": "2026-06-01", "source": "port rules"}}))
    found = governing(case, rules(case, 1e9, None))
    assert found.on == datetime.date(2026, 6, 1)
    assert "port rules" in found.governed_by
    assert found.days == 28
    assert found.left


def test_the_reading_is_given_also_where_a_date_governs():
    case = read_case(surface())
    found = governing(case, rules(case, 40_000.0, None))
    assert found.governed_by == LONGEST
    assert found.usage == 1250 + 20_000


def test_as_of_past_the_reading_leaves_nothing():
    case = read_case(surface(as_of={"on": "2026-05-20", "at": 1800}))
    assert not governing(case, rules(case, 1000.0, None)).left
    assert governing(case, rules(case, 1200.0, None)).left


@pytest.mark.parametrize(
    "key", ["usage__at", "usage__on", "usage__per_day", "criteria__life_factor"]
)
def test_what_is_missing_is_named(key):
    case = surface(**{key: DROP})
    del case["as_of"]
    life = rules(read_case(case), 1000.0, None)[0]
    assert key.replace("__", ".") in life.why_not
