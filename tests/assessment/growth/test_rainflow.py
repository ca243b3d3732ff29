"""Rainflow counting: the example of ASTM E1049, properties, and whole cases from a history."""

from collections import Counter
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment import CaseRefused, assess, read_case
from assessment.growth.rainflow import Counted, count, count_repeating, gathered, reversals
from tests.assessment.examples import surface

EXAMPLE = [-2, 1, -3, 5, -1, 3, -4, 4, -2]
HISTORY = st.lists(st.integers(-50, 50), min_size=2, max_size=60)


def by_range(cycles: list[Counted]) -> dict[float, float]:
    found: Counter[float] = Counter()
    for one in cycles:
        found[one.swing] += one.count
    return dict(found)


def test_the_example_of_the_standard() -> None:
    """ASTM E1049-85, 5.4.4, Fig. 6 (from memory): ranges 3, 4, 6, 8, 9 counted 0.5, 1.5, 0.5, 1.0,
    0.5."""
    assert by_range(count(EXAMPLE)) == {3: 0.5, 4: 1.5, 6: 0.5, 8: 1.0, 9: 0.5}


def test_the_example_repeated() -> None:
    """5.4.5 (from memory): started at its largest point the same history has whole cycles of 3, 4,
    7 and 9."""
    assert by_range(count_repeating(EXAMPLE)) == {3: 1.0, 4: 1.0, 7: 1.0, 9: 1.0}


@given(HISTORY)
def test_the_largest_range_is_counted_and_points_between_change_nothing(history: list[int]) -> None:
    cycles = count(history)
    if max(history) > min(history):
        assert max(one.swing for one in cycles) == max(history) - min(history)
    slower = [v for pair in zip(history, history[1:], strict=False) for v in
              (pair[0], (pair[0] + pair[1]) / 2)] + [history[-1]]  # fmt: skip
    assert by_range(count(slower)) == by_range(cycles)


@given(HISTORY)
def test_every_reversal_is_used_once(history: list[int]) -> None:
    turns = len(reversals(history)) - 1
    assert sum(2 * one.count for one in count(history)) == turns


@given(HISTORY)
def test_a_repeating_history_has_whole_cycles_alone_wherever_it_starts(history: list[int]) -> None:
    cycles = count_repeating(history)
    assert all(one.count == 1.0 for one in cycles)
    turned = history[3:] + history[:3]
    total = sum(one.swing for one in cycles)
    assert sum(one.swing for one in count_repeating(turned)) == pytest.approx(total)
    if max(history) > min(history):
        assert max(one.swing for one in cycles) == max(history) - min(history)


@given(HISTORY, st.integers(1, 8))
def test_gathered_cycles_are_as_many_and_no_milder(history: list[int], most: int) -> None:
    cycles = count_repeating(history)
    together = gathered(cycles, most)
    assert len(together) <= most
    assert sum(one.count for one in together) == sum(one.count for one in cycles)
    fine = sorted(one.swing for one in cycles for _ in range(int(one.count)))
    coarse = sorted(one.swing for one in together for _ in range(round(one.count)))
    assert all(a <= b + 1e-9 for a, b in zip(fine, coarse, strict=True))


def by_history(values: list[float], **more: Any) -> dict[str, Any]:
    return surface(
        loading__cycles={"history": values, "of": {"membrane_mpa": 1, "bending_mpa": 0.2},
                         "per_usage": 2, **more}
    )  # fmt: skip


def test_a_case_from_a_history_is_the_case_of_its_counted_cycles() -> None:
    values = [0, 100, 20, 80, 20, 100, 0]
    blocks = [
        {"membrane_range_mpa": 100, "bending_range_mpa": 20, "membrane_max_mpa": 100,
         "bending_max_mpa": 20, "per_usage": 2},
        {"membrane_range_mpa": 60, "bending_range_mpa": 12, "membrane_max_mpa": 80,
         "bending_max_mpa": 16, "per_usage": 2},
        {"membrane_range_mpa": 80, "bending_range_mpa": 16, "membrane_max_mpa": 100,
         "bending_max_mpa": 20, "per_usage": 2},
    ]  # fmt: skip
    one, other = assess(by_history(values)), assess(surface(loading__cycles=blocks))
    assert one["life"]["usage"] == pytest.approx(other["life"]["usage"], rel=1e-9)
    assert any("rainflow" in caution.lower() for caution in one["cautions"])
    assert any("largest cycle" in caution for caution in one["cautions"])


@pytest.mark.parametrize(
    ("changes", "key"),
    [
        ({"history": [1]}, "loading.cycles.history"),
        ({"history": [5, 5, 5]}, "loading.cycles.history"),
        ({"history": [0, 1000]}, "loading.cycles.history"),
        ({"history": "up and down"}, "loading.cycles.history"),
        ({"history": [0, None]}, "loading.cycles.history[1]"),
        ({"of": {}}, "loading.cycles.of"),
        ({"of": {"membrane_mpa": 0}}, "loading.cycles.of"),
        ({"per_usage": 0}, "loading.cycles.per_usage"),
        ({"stress_ratio": 0}, "loading.cycles.stress_ratio"),
    ],
)
def test_a_history_that_cannot_be_counted_is_refused(changes: dict[str, Any], key: str) -> None:
    case = by_history([0, 100, 0])
    case["loading"]["cycles"] |= changes
    with pytest.raises(CaseRefused) as caught:
        read_case(case)
    assert caught.value.where == key


def test_a_long_history_is_gathered_on_the_severe_side() -> None:
    values = [float((37 * i) % 101) for i in range(2000)] + [0.0]
    case = by_history([0.9 * v for v in values])
    assert len(read_case(case).loading.cycles) <= 200
