"""No case, however odd, makes a fault, a number that is none, or work without end.

A valid case of some kind has a few of its values replaced, dropped or doubled by hypothesis; it is
then refused by its key and reason, or answered with finite numbers and a known verdict.
"""

import copy
import json
import math
from typing import Any

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from assessment import KINDS, CaseRefused, assess, outcome_text
from assessment.verdict import STRICTNESS
from tests.external.test_directions import CASES, case_of

ODD = st.one_of(
    st.sampled_from([0, -1, 1e-300, 1e300, 1e-9, 1e9, -0.0, 5e-324, 2**63, 0.5, 1, 2, 100]),
    st.floats(allow_nan=True, allow_infinity=True),
    st.sampled_from([None, True, "", "none", "none: no reason", "held", "as-welded", "2026-01-01"]),
    st.sampled_from([[], {}, [[0, 1]], [[0, 1], [1, 2]], {"law": "paris"}, {"model": "fixed"}]),
)
SCALES = st.sampled_from([1e-6, 1e-3, 0.1, 0.5, 0.9, 0.999, 1.001, 1.5, 3, 10, 1e3, 1e6])
EXTRA = {
    "profile": [[0, 100], [20, 50]],
    "rate": "impact",
    "zone": "weld",
    "diagram": "option 2",
    "level": "as-welded",
    "membrane_mpa": 80,
    "temperature_c": -273,
    "held_length_mm": 300,
    "why_smaller": "ground",
    "nobody_knows": 1,
}
# Fronts times points at which K is worked out. The most that was seen is 160,000, with a reduced
# load solved for.
BUDGET = 400_000


def starting(kind: str) -> dict[str, Any]:
    """A valid case of the kind, its own to spoil."""
    if kind in CASES:
        return copy.deepcopy(case_of(kind))
    case = copy.deepcopy(case_of("cylinder-girth-through"))
    case["crack"]["kind"] = kind
    case["loading"]["peak"] = {"pressure_mpa": 6.0}
    case["loading"]["cycles"][0] = {"pressure_range_mpa": 3.0, "stress_ratio": 0.1, "per_usage": 20}
    case["owner"] = {"leak_tolerated": True}
    return case


def paths(part: Any, so_far: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    found = []
    items = part.items() if isinstance(part, dict) else enumerate(part)
    for key, value in items:
        found.append((*so_far, key))
        if isinstance(value, dict | list):
            found += paths(value, (*so_far, key))
    return found


def parent(case: Any, path: tuple[Any, ...]) -> Any:
    for key in path[:-1]:
        case = case[key]
    return case


def spoil(case: dict[str, Any], draw: Any) -> None:
    path = draw(st.sampled_from(paths(case)))
    holder, key = parent(case, path), path[-1]
    how = draw(st.sampled_from(["odd", "scale", "scale", "drop", "extra"]))
    number = isinstance(holder[key], int | float) and not isinstance(holder[key], bool)
    if how == "scale" and number:
        holder[key] *= draw(SCALES)
    elif how == "drop":
        del holder[key]
    elif how == "extra" and isinstance(holder, dict):
        name = draw(st.sampled_from(sorted(EXTRA)))
        holder[name] = copy.deepcopy(EXTRA[name])
    else:
        holder[key] = copy.deepcopy(draw(ODD))


def numbers(part: Any) -> list[float]:
    if isinstance(part, dict):
        return [n for value in part.values() for n in numbers(value)]
    if isinstance(part, list):
        return [n for value in part for n in numbers(value)]
    return [part] if isinstance(part, float) else []


@pytest.mark.parametrize("kind", sorted(KINDS))
@settings(max_examples=6, deadline=None, suppress_health_check=list(HealthCheck))
@given(data=st.data())
def test_refused_by_its_key_or_answered_in_finite_numbers(kind: str, data: Any) -> None:
    case = starting(kind)
    for _ in range(data.draw(st.integers(1, 4))):
        spoil(case, data.draw)
    try:
        found = assess(copy.deepcopy(case))
    except CaseRefused as refused:
        assert refused.where.strip() and refused.why.strip()
        return
    assert all(math.isfinite(number) for number in numbers(found))
    assert found["disposition"]["verdict"] in STRICTNESS and found["disposition"]["reasons"]
    assert len(found["life"]["path"]) <= 200
    assert json.loads(outcome_text(found)) == json.loads(json.dumps(found, allow_nan=False))


@pytest.mark.parametrize("kind", sorted(KINDS))
def test_a_case_takes_no_more_than_a_fixed_budget_of_evaluations(
    kind: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Counted at the door of the relation: fronts times loads of every K that is worked out."""
    counted = {"fronts": 0}
    true_k = KINDS[kind].stress_intensity

    def counting(x: Any, loads: Any, body: Any) -> Any:
        counted["fronts"] += int(np.size(x))
        return true_k(x, loads, body)

    monkeypatch.setitem(KINDS[kind].__dict__, "stress_intensity", counting)
    for spoiled in ({}, {"per_usage": 1e9}, {"per_usage": 1e-9}):
        case = starting(kind)
        case["loading"]["cycles"][0] |= spoiled
        case["owner"] = {"allows_restriction": True}
        case["criteria"]["load_reserve"] = 3.0
        assess(case)
        assert 0 < counted["fronts"] < BUDGET, spoiled
        counted["fronts"] = 0


def test_every_start_is_a_case_that_is_answered() -> None:
    for kind in KINDS:
        assert assess(starting(kind))["stress_intensity"], kind
