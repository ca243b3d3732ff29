"""Fatigue crack growth: laws, cycle blocks, and the run from a size to an end."""

from .batch import BatchGrowth, grow_batch
from .closure import CLOSURE, opening
from .forman import Forman
from .forman_mettu import FormanMettu
from .integrate import ENDS, Growth, grow
from .laws import GrowthLaw, Paris, TwoStage, Walker
from .loads import CycleBlock, cycles_per_usage
from .rates import rates

__all__ = [
    "CLOSURE",
    "ENDS",
    "BatchGrowth",
    "CycleBlock",
    "Forman",
    "FormanMettu",
    "Growth",
    "GrowthLaw",
    "Paris",
    "TwoStage",
    "Walker",
    "cycles_per_usage",
    "grow",
    "grow_batch",
    "opening",
    "rates",
]
