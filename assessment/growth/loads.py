"""Cycle blocks: how often which range comes in one unit of usage."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field


@dataclass(frozen=True)
class CycleBlock:
    """ranges : load name to range in MPa (≥ 0). Either stress_ratio (below 1, of all loads) or
    maxima (load name to the cycle's largest value, MPa). per_usage : cycles per unit of usage.
    residual : load name to residual stress in MPa, alike in all blocks of a crack; it moves both
    ends of the cycle and leaves its range.

    Raises ValueError where neither or both of stress_ratio and maxima are given: none is assumed.
    """

    ranges: Mapping[str, float]
    stress_ratio: float | None
    maxima: Mapping[str, float] | None
    per_usage: float
    residual: Mapping[str, float] = field(default_factory=dict)

    def __post_init__(self) -> None:
        if (self.stress_ratio is None) == (self.maxima is None):
            raise ValueError("a cycle block has either a stress ratio or maxima")


def cycles_per_usage(blocks: Sequence[CycleBlock]) -> float:
    """Cycles of all blocks in one unit of usage."""
    return sum(block.per_usage for block in blocks)
