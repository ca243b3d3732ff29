"""The Master Curve: cleavage toughness of ferritic steels through the transition.

K_Jc(P) = 20 + [ln(1/(1 − P))]^(1/4) [11 + 77 exp(0.019 (T − T_0))] for a front of 25 mm, P the
probability of a lower toughness; for a front of B, K = 20 + (K − 20)(25 mm/B)^(1/4).
"""

import math

from assessment.validity import Range, Validity

LEAST = 20.0
REFERENCE_FRONT = 0.025

MASTER_CURVE = Validity(
    relation="the Master Curve of fracture toughness",
    source="ASTM E1921 (median, tolerance bounds, size adjustment; 25 mm as in BS 7910, the "
    "standard's 25.4 mm differs by 0.4 % of what lies above 20)",
    accuracy="Weibull scatter with the slope 4 that the standard states",
    ranges=(Range("T − T_0", "metal temperature over T_0", -50.0, 50.0, unit="°C"),),
    witness="from memory; six values of the tolerance bounds and two of the size adjustment "
    "(from memory), which are rounded to within 0.4 %",
    tests=("tests/external/test_toughness_values.py",),
)


def tolerance(over_t0: float, probability: float) -> float:
    """K_Jc in MPa√m below which a front of 25 mm falls with so much probability.

    over_t0 : T − T_0 in °C; probability : between 0 and 1
    """
    scale = 11.0 + 77.0 * math.exp(0.019 * over_t0)
    return float(LEAST + math.log(1.0 / (1.0 - probability)) ** 0.25 * scale)


def at_size(k_25: float, front: float) -> float:
    """The same for a front of another length in m: more of it meets a weaker spot."""
    return float(LEAST + (k_25 - LEAST) * (REFERENCE_FRONT / front) ** 0.25)
