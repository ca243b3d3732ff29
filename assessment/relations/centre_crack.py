"""Through crack in the centre of a plate under membrane stress."""

import numpy as np

from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="geometry factor of a centre crack",
    source=(
        "H. Tada, P. C. Paris & G. R. Irwin, The Stress Analysis of Cracks Handbook, 3rd ed. "
        "(ASME, 2000), p. 2.2, modified secant form"
    ),
    accuracy="0.1 % at any width (stated; confirmed: worst 0.11 % at 2a/W = 0.9)",
    ranges=(Range("2a/W", "crack length over plate width", 0.0, 1.0, True, True),),
    witness="from memory; confirmed by an independent computation and by finite elements",
    tests=(
        "tests/external/fem/test_plane.py::test_centre_crack_in_tension",
        "tests/external/test_stress_intensity_values.py",
        "tests/external/test_limiting_cases.py::test_a_centre_crack_in_a_wide_plate_has_factor_one",
    ),
)


def factor(relative: Floats) -> Floats:
    """F = (1 − 0.025 α² + 0.06 α⁴) √sec(πα/2), α = 2a/W in (0, 1); K = F σ √(πa)."""
    square = relative**2
    return np.asarray(
        (1.0 - 0.025 * square + 0.06 * square**2) / np.sqrt(np.cos(np.pi / 2 * relative))
    )
