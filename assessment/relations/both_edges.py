"""Equal through cracks at both edges of a plate under membrane stress."""

import numpy as np

from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="geometry factor of equal cracks at both edges",
    source=(
        "H. Tada, P. C. Paris & G. R. Irwin, The Stress Analysis of Cracks Handbook, 3rd ed. "
        "(ASME, 2000), p. 2.6; as read in N. E. Dowling, Mechanical Behavior of Materials, 4th ed. "
        "(2013), fig. 8.12"
    ),
    accuracy="0.5 % at any depth (stated); measured here: −0.8 % near 2a/W = 0.6, +0.6 % near 0.2",
    ranges=(Range("2a/W", "the two crack lengths over plate width", 0.0, 1.0, True, True),),
    witness="read; confirmed by an independent computation and by finite elements",
    tests=(
        "tests/external/fem/test_plane_plates.py::test_cracks_at_both_edges",
        "tests/external/test_plate_kinds.py::test_both_edges",
    ),
)


def factor(relative: Floats) -> Floats:
    """F = (1 + 0.122 cos⁴(πα/2)) √(2/(πα) tan(πα/2)), α = 2a/W in (0, 1); K = F σ √(πa).

    a is the length of each crack, W the whole width.
    """
    angle = np.pi / 2 * relative
    return np.asarray((1.0 + 0.122 * np.cos(angle) ** 4) * np.sqrt(np.tan(angle) / angle))
