"""Which sizes are asked back against the last one: told here alone, also to the tablets."""

from dataclasses import dataclass
from decimal import Decimal

# A size this many times the last one (or one over it) looks like a slipped decimal point.
SLIPPED = Decimal(5)
# Two sizes differ by chance by up to about twice the square root of two of their own error.
BY_CHANCE = Decimal("2.83")


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
