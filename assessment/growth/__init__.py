"""Fatigue crack growth: laws, cycle blocks, and the run from a size to an end."""

from .integrate import ENDS, Growth, grow
from .laws import GrowthLaw, Paris, TwoStage, Walker
from .loads import CycleBlock, cycles_per_usage
from .rates import rates

__all__ = [
    "ENDS",
    "CycleBlock",
    "Growth",
    "GrowthLaw",
    "Paris",
    "TwoStage",
    "Walker",
    "cycles_per_usage",
    "grow",
    "rates",
]
