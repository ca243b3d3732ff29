"""The failure assessment diagram, Option 2: from the tensile stress-strain curve of the metal.

    f(L_r) = [E ε_ref/(L_r σ_Y) + L_r³ σ_Y/(2 E ε_ref)]^(-1/2)      L_r ≤ L_r,max

with ε_ref the true strain at the true stress L_r σ_Y; f is nil beyond L_r,max as in Option 1.
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

from .diagram import lr_max
from .tensile import TensileCurve

OPTION_2 = Validity(
    relation="failure assessment diagram, Option 2",
    source="BS 7910:2013 (and later), 7.3.4; R6 Revision 4 (2001), Option 2",
    accuracy="none stated",
    ranges=(Range("L_r,max σ_Y", "the curve reaches the flow strength", 0.0, stated=False),),
    witness=(
        "formula from memory; one value (from memory); the closed form of a power-law metal; an "
        "elastic metal gives (1 + L_r²/2)^(-1/2)"
    ),
    tests=("tests/assessment/failure/test_option_2.py",),
)


def option_2(
    load_ratio: Floats | float,
    yield_strength: float,
    ultimate_strength: float,
    elastic_modulus: float,
    curve: TensileCurve,
) -> Floats:
    """The largest acceptable toughness ratio K_r at a load ratio L_r ≥ 0; NaN above the curve.

    load_ratio : any shape; strengths and modulus in MPa
    """
    lr = np.asarray(load_ratio, dtype=float)
    safe = np.where(lr > 0.0, lr, 1.0)
    strain = elastic_modulus * curve.strain_at(safe * yield_strength)
    value = 1.0 / np.sqrt(
        strain / (safe * yield_strength) + safe**3 * yield_strength / (2.0 * strain)
    )
    value = np.where(lr > 0.0, value, 1.0)
    return np.where(lr > lr_max(yield_strength, ultimate_strength), 0.0, value)
