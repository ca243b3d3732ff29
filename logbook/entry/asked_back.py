"""Which sizes are asked back against the last one: told here alone, also to the tablets."""

from dataclasses import dataclass
from decimal import Decimal

# A size this many times the last one (or one over it) looks like a slipped decimal point.
SLIPPED = Decimal(5)
# Two sizes differ by chance by up to about twice the square root of two of their own error.
BY_CHANCE = Decimal("2.83")

# A reading this many times what the days since the last one explain looks like a slipped digit.
JUMP = Decimal(20)


@dataclass(frozen=True)
class AskedBack:
    """at_least_mm and at_most_mm: a size at or beyond looks like a slipped decimal point.
    shrunk_below_mm: a smaller one wants a reason, since a crack does not shrink."""

    at_most_mm: Decimal
    at_least_mm: Decimal
    shrunk_below_mm: Decimal


def asked_back(last_mm: Decimal, sd_mm: Decimal | None) -> AskedBack:
    """last_mm : the last size; sd_mm : the sizing error of its method, None where not known"""
    allowed = Decimal(0) if sd_mm is None else sd_mm * BY_CHANCE
    return AskedBack(last_mm / SLIPPED, last_mm * SLIPPED, last_mm - allowed)


def counter_asked_above(last: Decimal, per_day: Decimal, days: int) -> Decimal:
    """The reading above which the counter is asked back.

    last : the last reading; per_day : counts a day; days : since the last look
    """
    return last + JUMP * (max(days, 0) + 30) * per_day
