"""When the place is looked at again: the rules, the date a counter reading falls on, the earliest.

Dates round down and counter readings round down, so that rounding never makes an inspection later.
Days are whole days from the last look.
"""

import datetime
import math
from collections.abc import Sequence
from dataclasses import dataclass

from scipy.special import stdtrit

from assessment.document.case import Case, Usage

NOT_COMPUTED = "not computed yet"

LIFE = "bounding life divided by the life factor"
FORECAST = "forecast of the probability of failure"
DETECTABILITY = "what the last method can find"
LONGEST = "longest interval"
FIXED = "fixed date"
MEASURED_GROWTH = "growth measured against growth the basis explains"


@dataclass(frozen=True)
class Rule:
    """One rule: the counter reading and date that it gives, or why it gives none."""

    rule: str
    usage: float | None = None
    on: datetime.date | None = None
    why_not: str | None = None


@dataclass(frozen=True)
class Rate:
    """Usage per day, and how it came about."""

    per_day: float
    words: str


@dataclass(frozen=True)
class Next:
    """The next inspection: whichever comes first of counter reading and date.

    days : whole days from the last look to ``on``
    left : False where as_of has reached ``on`` or ``usage``
    """

    usage: float | None
    on: datetime.date
    governed_by: str
    days: int
    left: bool


def rate(usage: Usage) -> Rate | None:
    """Usage per day for turning a counter reading into a date, on the fast side.

    At least ``per_day`` and the plain rate of the readings (last minus first, by days). From three
    readings on, also the upper end of the rate's 90 % interval: each step between readings is
    taken as rate × days with a variance that grows with the days, so that
    s² = Σ (step − rate·days)² / days ÷ (steps − 1) and the half-width is
    t(0.95, steps − 1)·s/√(all days). Source: common practice, no source for the choice of 90 %;
    the estimate is weighted least squares through the origin.
    """
    if usage.per_day is None:
        return None
    best = Rate(usage.per_day, "per_day of the document")
    steps = _steps(usage)
    if not steps:
        return best
    days = sum(step[0] for step in steps)
    plain = sum(step[1] for step in steps) / days
    best = max(best, Rate(plain, "plain rate of the counter's readings"), key=_per_day)
    if len(steps) < 2:
        return best
    freedom = len(steps) - 1
    scatter = sum((used - plain * span) ** 2 / span for span, used in steps) / freedom
    fast = plain + float(stdtrit(freedom, 0.95)) * math.sqrt(scatter / days)
    words = f"faster end of the 90 % interval of the rate, from {len(steps) + 1} readings"
    return max(best, Rate(fast, words), key=_per_day)


def _per_day(one: Rate) -> float:
    return one.per_day


def _steps(usage: Usage) -> list[tuple[int, float]]:
    """(days, usage) between readings on different dates, the last look taken as a reading."""
    last = dict(usage.readings)
    if usage.on is not None and usage.at is not None:
        last.setdefault(usage.on, usage.at)
    readings = sorted(last.items())
    return [
        ((later[0] - sooner[0]).days, later[1] - sooner[1])
        for sooner, later in zip(readings, readings[1:], strict=False)
    ]


def date_of(remaining: float, per_day: float, start: datetime.date) -> datetime.date | None:
    """The date by which ``remaining`` usage is used up; None beyond the calendar."""
    days = remaining / per_day
    if not days < (datetime.date.max - start).days:
        return None
    return start + datetime.timedelta(days=math.floor(days))


def round_down(reading: float) -> float:
    """A counter reading to a thousandth, never later than it is."""
    return math.floor(reading * 1000.0) / 1000.0 if abs(reading) < 1e12 else reading


@dataclass(frozen=True)
class Ahead:
    """What the forecast says to the rules.

    remaining : usage at which the probability of failure reaches the target; None where ``why_not``
    measured_growth : how the measured growth lies against the basis, in words
    """

    remaining: float | None
    why_not: str | None
    measured_growth: str


@dataclass(frozen=True)
class FromMissed:
    """Bounding life in usage from the size that the last method could miss, or why there is
    none."""

    usage: float | None
    why_not: str | None


def rules(
    case: Case,
    life_usage: float | None,
    why_no_life: str | None,
    ahead: Ahead | None = None,
    missed: FromMissed | None = None,
) -> tuple[Rule, ...]:
    """All rules in their order. ``life_usage`` is the bounding life in usage from the last look."""
    return (
        _life(case, life_usage, why_no_life),
        _forecast(case, ahead),
        _detectability(case, missed),
        _longest(case),
        _fixed(case),
        Rule(MEASURED_GROWTH, why_not=NOT_COMPUTED if ahead is None else ahead.measured_growth),
    )


def _forecast(case: Case, ahead: Ahead | None) -> Rule:
    if ahead is None:
        return Rule(FORECAST, why_not="no crack was measured")
    if ahead.remaining is None:
        return Rule(FORECAST, why_not=ahead.why_not)
    return _after(FORECAST, case, ahead.remaining)


def _detectability(case: Case, missed: FromMissed | None) -> Rule:
    if missed is None:
        return Rule(DETECTABILITY, why_not=NOT_COMPUTED)
    if missed.usage is None:
        return Rule(DETECTABILITY, why_not=missed.why_not)
    if case.criteria.life_factor is None:
        return Rule(DETECTABILITY, why_not="criteria.life_factor is missing")
    return _after(DETECTABILITY, case, missed.usage / case.criteria.life_factor)


def _after(name: str, case: Case, remaining: float) -> Rule:
    """The rule that ends with so much usage from the last look."""
    usage, per_day = case.usage, rate(case.usage)
    if usage.at is None:
        return Rule(name, why_not="usage.at is missing")
    reading = round_down(usage.at + remaining)
    if usage.on is None or per_day is None:
        return Rule(name, usage=reading, why_not="no date: usage.on or usage.per_day is missing")
    on = date_of(remaining, per_day.per_day, usage.on)
    why_not = None if on else "no date: it lies beyond the year 9999"
    return Rule(name, usage=reading, on=on, why_not=why_not)


def _life(case: Case, life_usage: float | None, why_no_life: str | None) -> Rule:
    factor = case.criteria.life_factor
    if life_usage is None:
        return Rule(LIFE, why_not=why_no_life)
    if factor is None:
        return Rule(LIFE, why_not="criteria.life_factor is missing")
    return _after(LIFE, case, life_usage / factor)


def _longest(case: Case) -> Rule:
    days, start = case.criteria.longest_interval_days, case.usage.on
    if days is None or start is None:
        key = "usage.on" if days is not None else "criteria.longest_interval_days"
        return Rule(LONGEST, why_not=f"{key} is missing")
    on = date_of(days, 1.0, start)
    return Rule(LONGEST, on=on, why_not=None if on else "it lies beyond the year 9999")


def _fixed(case: Case) -> Rule:
    fixed = case.owner.fixed_date
    if fixed is None:
        return Rule(FIXED, why_not="the owner names no fixed date")
    return Rule(f"{FIXED}: {fixed.source}", on=fixed.on)


def governing(case: Case, all_rules: Sequence[Rule]) -> Next | None:
    """The earliest of the rules; None where no rule gives a date.

    The counter reading is the smallest that any rule gives: whichever of date and reading comes
    first ends the interval, also where the date comes from a rule without a reading.
    """
    dated = [(one.on, one.rule) for one in all_rules if one.on is not None]
    if not dated or case.usage.on is None:
        return None
    on, name = min(dated, key=lambda pair: pair[0])
    readings = [one.usage for one in all_rules if one.usage is not None]
    usage = min(readings, default=None)
    reached = case.as_of_on is not None and case.as_of_on >= on
    used = usage is not None and case.as_of_at is not None and case.as_of_at >= usage
    return Next(usage, on, name, (on - case.usage.on).days, left=not (reached or used))
