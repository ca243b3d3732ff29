"""Stop size: never too large, the first of a scan, and the verdict really turns there."""

import pytest

from assessment import assess
from assessment.stop_size import StopSize, first_stop, smallest_of
from tests.assessment.examples import DROP, place, surface


def test_the_first_stop_counts_where_later_sizes_are_judged_more_easily():
    def stops(depth, length):
        return 2.0 < depth < 4.0 or depth > 9.0

    found = first_stop(stops, 1.0, None, 1.0)
    assert 1.99 < found.depth <= 2.0 and found.length is None


def test_a_scan_without_a_stop_gives_none():
    assert first_stop(lambda depth, length: False, 1.0, 1.0, 1.0) is None
    assert smallest_of([StopSize(1.0, 2.0), None]) is None
    assert smallest_of([StopSize(1.0, 4.0), StopSize(2.0, 3.0)]) == StopSize(1.0, 3.0)


def turns(case, outcome) -> tuple[dict, dict]:
    """The dispositions just inside and just beyond the stop size, with the same shape."""
    stop = outcome["stop_size"]
    found = []
    for factor in (0.98, 1.02):
        crack = {**case["crack"]}
        crack["depth_mm"] = factor * stop["depth_mm"]
        crack["length_mm"] = factor * stop["length_mm"]
        found.append(assess({**case, "crack": crack})["disposition"])
    return found[0], found[1]


def is_stop(disposition) -> bool:
    return disposition["verdict"] == "withdraw" or disposition["before_return"]


@pytest.mark.parametrize(
    "changes",
    [
        {},
        {"criteria__fracture": "toughness"},
        {"loading__peak": {"membrane_mpa": 220}},
        {"crack__depth_mm": 2.0, "crack__length_mm": 20.0},
        {"loading__cycles__0__per_usage": 4000},
    ],
)
def test_the_verdict_turns_at_the_stop_size(changes):
    case = surface(**changes)
    inside, beyond = turns(case, assess(case))
    assert not is_stop(inside)
    assert is_stop(beyond) or beyond["verdict"] == "refer"


def test_a_crack_past_its_stop_size_still_has_one_smaller_than_itself():
    case = surface(crack__depth_mm=14, crack__length_mm=80)
    outcome = assess(case)
    assert is_stop(outcome["disposition"])
    assert outcome["stop_size"]["depth_mm"] < 14


def test_a_new_crack_has_its_own_stop_size():
    new = assess(surface())["stop_size"]["new_crack"]
    assert 0 < new["depth_mm"] < 20 and 0 < new["length_mm"] < 200


def test_a_larger_sizing_error_never_gives_a_larger_stop_size():
    sizes = [
        assess(surface(crack__sizing__depth_sd_mm=sd))["stop_size"]["depth_mm"]
        for sd in (0.0, 0.5, 1.0, 2.0)
    ]
    assert sizes == sorted(sizes, reverse=True)


def test_no_stop_size_where_the_decision_lacks_something():
    stop = assess(surface(material__bounding=DROP))["stop_size"]
    assert stop["depth_mm"] is None and "material.bounding" in stop["why_not"]


def test_a_place_needs_the_sizing_error_of_a_measurement_there():
    assert "sizing" in assess(place())["stop_size"]["why_not"]
    sizing = {"method": "ultrasonic", "depth_sd_mm": 0.3, "length_sd_mm": 0.5}
    stop = assess(place(crack__sizing=sizing))["stop_size"]
    assert stop["depth_mm"] == stop["new_crack"]["depth_mm"] > 0
