"""How residual stress and load act together on a yielding crack: the term ρ."""

import numpy as np

from assessment.validity import Floats, Range, Validity

RHO = Validity(
    relation="plasticity interaction of residual stress and load, simplified",
    source=(
        "R6 revision 3, appendix 4, and BS 7910:2005, annex R, simplified: ρ from χ = K_s L_r / K_p"
    ),
    accuracy="an upper bound (stated)",
    ranges=(Range("χ", "residual K times load ratio over K of the load", 0.0, 4.0),),
    witness=(
        "from memory; no value from outside: its limits (nil without load or without residual "
        "stress, nil from L_r = 1.05 on, steady at L_r = 0.8 and 1.05) are tested"
    ),
    tests=("tests/assessment/failure/test_residual.py",),
)
FULL_BELOW, NIL_FROM = 0.8, 1.05


def rho(chi: Floats, load_ratio: Floats) -> Floats:
    """ρ, which is added to K_r.

    ρ₁ = 0.1 χ^0.714 − 0.007 χ² + 3·10⁻⁵ χ⁵, and 0.25 where χ > 5.2; ρ = ρ₁ up to L_r = 0.8, then
    4 ρ₁ (1.05 − L_r), nil from 1.05 on. chi : K_s L_r / K_p ≥ 0, which the load does not change.
    """
    curve = 0.1 * chi**0.714 - 0.007 * chi**2 + 3e-5 * chi**5
    first = np.where(chi > 5.2, 0.25, curve)
    share = np.clip((NIL_FROM - load_ratio) / (NIL_FROM - FULL_BELOW), 0.0, 1.0)
    return np.asarray(first * share)
