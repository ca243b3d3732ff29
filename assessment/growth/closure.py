"""Newman's closure function: from which part of the cycle on a crack is open."""

import math

import numpy as np

from assessment.validity import Floats, Range, Validity

CLOSURE = Validity(
    relation="crack closure of constant-amplitude cycles, Newman's function",
    source="J. C. Newman, Jr., A crack opening stress equation for fatigue crack growth, Int. J. "
    "Fracture 24 (1984) R131-R135; R below −1 as in R. G. Forman & S. R. Mettu, ASTM STP 1131 "
    "(1992) 519-546",
    accuracy="as the strip-yield model it was fitted to; no figure known",
    ranges=(
        Range("α", "constraint factor, 1 plane stress to 3 plane strain", 1.0, 3.0),
        Range("S_max/σ_0", "largest stress over flow stress", 0.0, 0.8),
    ),
    witness=(
        "from memory; fully open at R = 1; the two branches meet at R = 0 and with one slope at "
        "α where the source says so; the published value of 0.3 or so for R = 0 in plane strain"
    ),
    tests=("tests/assessment/growth/test_forman.py",),
)


def opening(ratio: Floats, constraint: float, peak_over_flow: float) -> Floats:
    """f = K_opening / K_max.

    f = max(R, A₀ + A₁R + A₂R² + A₃R³) for R ≥ 0; A₀ + A₁R for −2 ≤ R < 0; A₀ − 2A₁ below
    A₀ = (0.825 − 0.34α + 0.05α²) [cos(π S/2)]^{1/α}, A₁ = (0.415 − 0.071α) S, A₃ = 2A₀ + A₁ − 1,
    A₂ = 1 − A₀ − A₁ − A₃, S = S_max/σ_0

    ratio : R below 1, any shape; constraint : α; peak_over_flow : S
    """
    r: Floats = np.asarray(ratio, dtype=float)
    a0, a1 = _first_two(constraint, peak_over_flow)
    a3 = 2.0 * a0 + a1 - 1.0
    a2 = 1.0 - a0 - a1 - a3
    pulled = np.maximum(r, a0 + r * (a1 + r * (a2 + r * a3)))
    pushed = a0 + a1 * np.maximum(r, -2.0)
    return np.asarray(np.where(r >= 0.0, pulled, pushed), dtype=float)


def _first_two(alpha: float, s: float) -> tuple[float, float]:
    shape = 0.825 - 0.34 * alpha + 0.05 * alpha**2
    a0 = shape * math.pow(math.cos(math.pi * s / 2.0), 1.0 / alpha)
    return a0, (0.415 - 0.071 * alpha) * s
