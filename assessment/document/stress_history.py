"""Reads cycles given as a raw stress history, which is counted into blocks."""

from collections.abc import Mapping

from assessment.document.fields import Fields, as_number
from assessment.growth import CycleBlock
from assessment.growth.rainflow import Counted, count_repeating, gathered
from assessment.kinds.base import Kind

HISTORY_POINTS = 20_000
KEYS = ("history", "of", "per_usage")


def read_history_cycles(
    fields: Fields, kind: Kind, peak: Mapping[str, float], slack: float, most: int
) -> tuple[tuple[CycleBlock, ...], str]:
    """The blocks of {"history": […], "of": {load: MPa for 1 in the history}, "per_usage": …}, and
    a sentence on what was counted.

    history : one course of the load, which repeats; per_usage : how often it comes in one unit of
    usage. Every load follows it in proportion.
    """
    values = [
        as_number(value, f"{fields.path('history')}[{index}]")
        for index, value in enumerate(fields.items("history", HISTORY_POINTS))
    ]
    cycles = gathered(count_repeating(values), most)
    if not cycles:
        raise fields.refuse("history", "a history needs two different values.")
    of = Fields(fields.path("of"), fields.raw("of"), kind.load_keys)
    scale = {key.rpartition("_")[0]: of.number(key) for key in kind.load_keys if key in of}
    if not any(scale.values()):
        raise fields.refuse("of", f"one of {', '.join(kind.load_keys)} is needed, not 0.")
    top, bottom = max(one.high for one in cycles), min(one.low for one in cycles)
    for name, value in scale.items():
        largest = max(value * top, value * bottom)
        if largest > peak[name] + slack * abs(peak[name]):
            raise fields.refuse(
                "history", f"it reaches {largest:g}, above the peak of {peak[name]:g} ({name})."
            )
    often = fields.number("per_usage", above=0.0)
    return tuple(_block(one, scale, often) for one in cycles), _said(values, cycles)


def _block(one: Counted, scale: Mapping[str, float], often: float) -> CycleBlock:
    """A load of negative scale has its maximum where the history has its minimum."""
    return CycleBlock(
        ranges={name: abs(value) * one.swing for name, value in scale.items()},
        stress_ratio=None,
        maxima={name: max(value * one.high, value * one.low) for name, value in scale.items()},
        per_usage=often * one.count,
    )


def _said(values: list[float], cycles: list[Counted]) -> str:
    largest = max(cycles, key=lambda one: one.swing)
    return (
        f"the history of {len(values)} values was counted by rainflow (ASTM E1049, repeating) into "
        f"{len(cycles)} kinds of cycle; the largest cycle runs from {largest.low:g} to "
        f"{largest.high:g}. The order of the loads is not used, and no credit is taken for "
        "overloads."
    )
