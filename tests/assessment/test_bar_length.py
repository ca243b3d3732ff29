"""A bar's crack longer than the front that the published factor assumes is referred."""

import copy
from typing import Any

import pytest

from assessment import assess

from .examples import SURFACE


def bar(length_mm: float | None) -> dict[str, Any]:
    case = copy.deepcopy(SURFACE)
    case["crack"] = {
        "kind": "bar-surface",
        "depth_mm": 5.0,
        "sizing": {"method": "ultrasonic", "depth_sd_mm": 0.3, "length_sd_mm": 0.5},
    }
    if length_mm is not None:
        case["crack"]["length_mm"] = length_mm
    case["body"] = {"diameter_mm": 80}
    case["loading"]["peak"] = {"membrane_mpa": 20, "bending_mpa": 90}
    case["loading"]["cycles"] = [{"bending_range_mpa": 30, "stress_ratio": 0.1, "per_usage": 1}]
    return case


# R = 40 mm, a = 5 mm: θ = π/2 − 2 arctan(1 − a/R) = 0.133 rad, 2c = 2Rθ = 10.65 mm.
@pytest.mark.parametrize(("length", "referred"), [(None, False), (10.5, False), (25.0, True)])
def test_length_against_the_assumed_front(length: float | None, referred: bool) -> None:
    outcome = assess(bar(length))
    said = " ".join(outcome["disposition"]["reasons"])
    assert ("10.65 mm long" in said) is referred
    assert (outcome["disposition"]["verdict"] == "refer") is referred
