"""The two standard specimens: compact tension, and single-edge-notched bend."""

import numpy as np

from assessment.validity import Floats, Range, Validity

COMPACT = Validity(
    relation="stress intensity of the compact tension specimen",
    source="ASTM E399-20, eq. A4.1 (also E1820 and E647)",
    accuracy="0.5 % for 0.2 ≤ a/W ≤ 1 (stated)",
    ranges=(Range("a/W", "crack length over specimen width", 0.2, 1.0, False, True),),
    witness="read in N. E. Dowling, Mechanical Behavior of Materials, 4th ed. (2013), fig. 8.16",
    tests=("tests/external/test_plate_kinds.py::test_specimens",),
)
BEND = Validity(
    relation="stress intensity of the bend specimen",
    source="ASTM E399-20, eq. A3.1; J. E. Srawley, Int. J. Fracture 12 (1976) 475-476",
    accuracy="0.5 % at any a/W (stated), for a span of four widths",
    ranges=(
        Range("a/W", "crack length over specimen width", 0.0, 1.0, True, True),
        Range("S/W", "span over specimen width", 3.8, 4.2),
    ),
    witness=(
        "read in N. E. Dowling, Mechanical Behavior of Materials, 4th ed. (2013); confirmed by "
        "finite elements"
    ),
    tests=("tests/external/test_plate_kinds.py::test_specimens",),
)


def compact(relative: Floats) -> Floats:
    """f in K = P f / (B √W), α = a/W:

    f = (2 + α)/(1 − α)^1.5 (0.886 + 4.64 α − 13.32 α² + 14.72 α³ − 5.6 α⁴)
    """
    a = relative
    polynomial = 0.886 + a * (4.64 + a * (-13.32 + a * (14.72 - 5.6 * a)))
    return np.asarray((2.0 + a) / (1.0 - a) ** 1.5 * polynomial)


def bend(relative: Floats) -> Floats:
    """f in K = P S f / (B W^1.5), α = a/W, S the span:

    f = 3 √α [1.99 − α(1 − α)(2.15 − 3.93 α + 2.7 α²)] / [2 (1 + 2α)(1 − α)^1.5]
    """
    a = relative
    inner = 1.99 - a * (1.0 - a) * (2.15 + a * (-3.93 + 2.7 * a))
    return np.asarray(3.0 * np.sqrt(a) * inner / (2.0 * (1.0 + 2.0 * a) * (1.0 - a) ** 1.5))
