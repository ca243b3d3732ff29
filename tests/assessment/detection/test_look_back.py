"""Looking back is growing forward, turned round; and rule 3 from the size that could be missed."""

from typing import Any

import numpy as np
import pytest

from assessment import assess
from assessment.corners import sizes_to_corner
from assessment.detection.look_back import looked_back
from assessment.forecast.paths import at_usage, run
from assessment.interval import DETECTABILITY
from tests.assessment.examples import DETECTION, surface
from tests.assessment.forecast.test_paths import CENTRE, best, same


@pytest.mark.parametrize("changes", [{}, CENTRE])
def test_forward_again_it_is_the_find(changes: dict[str, Any]) -> None:
    look, corner, _ = best(**changes)
    for then in looked_back(look, corner, [2000.0, 9000.0]):
        assert then.note is None
        past = sizes_to_corner(corner.kind, corner.body, then.depth, then.length)
        x = at_usage(run(look, past, same(past)), np.array([then.before]))[0][:, 0]
        assert x == pytest.approx(corner.x, rel=2e-3)
        assert np.all(past.x < corner.x)


def test_before_it_could_grow_its_size_is_not_known() -> None:
    look, corner, _ = best()
    near, far = looked_back(look, corner, [100.0, 1e8])
    assert near.note is None and far.depth is None and "too small to grow" in str(far.note)
    with pytest.raises(ValueError, match="before the find"):
        looked_back(look, corner, [0.0])


def three(**changes: Any) -> dict[str, Any]:
    found = assess(surface(**changes))
    return next(one for one in found["rules"] if one["rule"] == DETECTABILITY)


def test_rule_3_is_the_life_of_what_could_be_missed() -> None:
    found = assess(surface(detection=DETECTION, material__growth__c=1e-11))
    rule = next(one for one in found["rules"] if one["rule"] == DETECTABILITY)
    # 5 mm long: as deep as half of that where round, a quarter in the shape of this crack. The
    # bounding look of that crack alone, measured without error, gives the same lives.
    lives = [
        assess(
            surface(
                crack__depth_mm=depth, crack__length_mm=5.0, criteria__size_confidence_sd=0,
                crack__sizing="none: invented",
            )
        )["bounding"]["life"]["usage"]
        for depth in (2.5, 1.25)
    ]  # fmt: skip
    assert rule["usage"] == pytest.approx(1250 + min(lives) / 2, abs=0.01)


def test_a_method_that_misses_more_gives_less_time() -> None:
    readings = [three(detection={**DETECTION, "a90_95_mm": size})["usage"] for size in (4, 8, 16)]
    assert readings[0] > readings[1] > readings[2]
    by_depth = three(detection={**DETECTION, "dimension": "depth", "a90_95_mm": 2.5})["usage"]
    assert by_depth is not None


def test_without_a_detection_curve_rule_3_says_so() -> None:
    assert three()["why_not"] == "detection.a90_95_mm is missing"
