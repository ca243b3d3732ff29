"""The failure assessment diagram, Option 1: from yield and ultimate strength alone.

Continuous yielding, with L_r = reference stress / yield strength:

    f(L_r) = (1 + L_r²/2)^(-1/2) [0.3 + 0.7 exp(−μ L_r⁶)]          L_r ≤ 1
    f(L_r) = f(1) L_r^((N − 1)/(2N))                                1 < L_r ≤ L_r,max
    μ = min(0.001 E/σ_Y, 0.6),  N = 0.3 (1 − σ_Y/σ_U)

Discontinuous yielding (a yield plateau):

    f(L_r) = (1 + L_r²/2)^(-1/2)                                    L_r < 1
    f(1)   = (λ + 1/(2λ))^(-1/2),  λ = 1 + E Δε/σ_Y,  Δε = 0.0375 (1 − σ_Y/1000)
    f(L_r) = f(1) L_r^((N − 1)/(2N))                                1 < L_r ≤ L_r,max

L_r,max = (σ_Y + σ_U)/(2 σ_Y); f is nil beyond.
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

OPTION_1 = Validity(
    relation="failure assessment diagram, Option 1",
    source=(
        "BS 7910:2013 (and later), 7.3.3; R6 Revision 4 (2001), Option 1; SINTAP (1999), basic "
        "level"
    ),
    accuracy="a lower bound to the curves of many materials; no figure is stated",
    ranges=(
        Range("σ_Y", "the yield strength, for discontinuous yielding", 0.0, 946.0, unit="MPa"),
    ),
    witness=(
        "formula from memory; values for two steels agree with the check values (from memory, "
        "high confidence); μ, N and the cut-off recomputed"
    ),
    tests=(
        "tests/external/test_failure_diagram.py",
        "tests/assessment/failure/test_diagram.py",
    ),
)


def lr_max(yield_strength: float, ultimate_strength: float) -> float:
    """The cut-off, (σ_Y + σ_U)/(2 σ_Y); strengths in MPa."""
    return (yield_strength + ultimate_strength) / (2.0 * yield_strength)


def option_1(
    load_ratio: Floats | float,
    yield_strength: float,
    ultimate_strength: float,
    elastic_modulus: float,
    yielding: str,
) -> Floats:
    """The largest acceptable toughness ratio K_r at a load ratio L_r ≥ 0.

    load_ratio : any shape; strengths and modulus in MPa; yielding "continuous" or "discontinuous"
    Returns an array of the shape of load_ratio, nil beyond L_r,max.
    Raises ValueError for another word in ``yielding``.
    """
    lr = np.asarray(load_ratio, dtype=float)
    strain_hardening = 0.3 * (1.0 - yield_strength / ultimate_strength)
    if yielding == "continuous":
        below = _continuous(lr, elastic_modulus / yield_strength)
        at_one = float(_continuous(np.asarray(1.0), elastic_modulus / yield_strength))
    elif yielding == "discontinuous":
        below = 1.0 / np.sqrt(1.0 + 0.5 * lr**2)
        at_one = _plateau(yield_strength, elastic_modulus)
    else:
        raise ValueError(f"yielding is {yielding!r}; it is continuous or discontinuous")
    value = np.where(lr < 1.0, below, at_one)
    if strain_hardening > 0.0:
        exponent = (strain_hardening - 1.0) / (2.0 * strain_hardening)
        value = np.where(lr > 1.0, at_one * np.maximum(lr, 1.0) ** exponent, value)
    return np.where(lr > lr_max(yield_strength, ultimate_strength), 0.0, value)


def _continuous(lr: Floats, modulus_over_yield: float) -> Floats:
    mu = min(0.001 * modulus_over_yield, 0.6)
    return np.asarray((0.3 + 0.7 * np.exp(-mu * lr**6)) / np.sqrt(1.0 + 0.5 * lr**2))


def _plateau(yield_strength: float, elastic_modulus: float) -> float:
    """f(1) after the drop along the yield plateau."""
    strain = 0.0375 * (1.0 - yield_strength / 1000.0)
    lam = 1.0 + elastic_modulus * strain / yield_strength
    return float((lam + 1.0 / (2.0 * lam)) ** -0.5)
