"""The priors hold the exponents and curvatures that geometry gives to cracks not near the far
edge."""

import numpy as np
import pytest

from assessment.forecast import priors
from assessment.kinds import KINDS

WIDTH = 0.1


@pytest.mark.parametrize(
    ("name", "body", "load", "share"),
    [
        ("plate-through-centre", {}, "membrane", 0.5),
        ("plate-through-edge", {"ends": "free"}, "membrane", 1.0),
        ("plate-through-edge", {"ends": "free"}, "bending", 1.0),
        ("specimen-compact-tension", {}, "load", 1.0),
        ("specimen-edge-bend", {"span": 4 * WIDTH}, "load", 1.0),
    ],
)
@pytest.mark.parametrize(("low", "high"), [(0.1, 0.2), (0.2, 0.35)])
def test_geometry_lies_inside(
    name: str, body: dict[str, object], load: str, share: float, low: float, high: float
) -> None:
    a = np.geomspace(low, high, 40) * WIDTH * share
    body = {"width": WIDTH, "thickness": 0.01, **body}
    k = KINDS[name].stress_intensity(a[None], {load: np.ones(40)}, body)[0]
    ln_a = np.log(a) - np.mean(np.log(a))
    half_curvature, slope, _ = np.polyfit(ln_a, np.log(k), 2)
    exponent, curvature = 3.0 * slope, 6.0 * half_curvature
    assert abs(exponent - priors.EXPONENT_MEAN) < 2.0 * priors.EXPONENT_SD
    assert abs(curvature - priors.CURVATURE_MEAN) < 2.0 * priors.CURVATURE_SD
