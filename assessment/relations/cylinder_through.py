"""Through-wall cracks in cylinders: axial under pressure, girth under axial stress and bending."""

import numpy as np

from assessment.validity import Floats, Range, Validity

AXIAL = Validity(
    relation="stress intensity of an axial through-wall crack in a cylinder",
    source=(
        "A. Zahoor, Ductile Fracture Handbook, EPRI NP-6301 (1989), as read in T. L. Anderson, "
        "Fracture Mechanics, table 12.31"
    ),
    accuracy="none stated; above Folias' shell solution by up to 10 %",
    ranges=(
        Range("c/√(Rt)", "half length over √(mean radius × wall)", 0.0, 5.0, True, False),
        Range("R/t", "mean radius over wall thickness", 5.0, None, stated=False),
    ),
    witness="read; lies above E. S. Folias, Int. J. Fracture Mech. 1 (1965) 104-113",
)
GIRTH = Validity(
    relation="stress intensity of a girth through-wall crack in a cylinder",
    source=(
        "A. Zahoor, Closed form expressions for fracture mechanics analysis of cracked pipes, J. "
        "Pressure Vessel Technol. 107 (1985) 203-205, as read in T. L. Anderson, Fracture "
        "Mechanics, table 12.29"
    ),
    accuracy="none stated",
    ranges=(
        Range("θ/π", "half angle of the crack over half a turn", 0.0, 0.55, True, False),
        Range("R/t", "mean radius over wall thickness", 5.0, 20.0),
    ),
    witness="read; limit of a short crack: factor 1, the flat plate",
)


def axial(relative: Floats) -> Floats:
    """F in K = σ_h F √(πc): √(1 + 0.52 x + 1.29 x² − 0.074 x³), x = c/√(R t)."""
    x = relative
    return np.asarray(np.sqrt(1.0 + x * (0.52 + x * (1.29 - 0.074 * x))))


def girth(part: Floats, radius_over_thickness: float) -> tuple[Floats, Floats]:
    """F_t and F_b in K = (σ_t F_t + σ_b F_b) √(πRθ), part = θ/π.

    F_t = 1 + A [5.3303 (θ/π)^1.5 + 18.773 (θ/π)^4.24]
    F_b = 1 + A [4.5967 (θ/π)^1.5 + 2.6422 (θ/π)^4.24]
    A = (0.125 R/t − 0.25)^0.25 up to R/t = 10, (0.4 R/t − 3)^0.25 from there on
    """
    r = radius_over_thickness
    a = max(0.125 * r - 0.25, 0.0) ** 0.25 if r <= 10.0 else (0.4 * r - 3.0) ** 0.25
    low, high = part**1.5, part**4.24
    tension = 1.0 + a * (5.3303 * low + 18.773 * high)
    return tension, 1.0 + a * (4.5967 * low + 2.6422 * high)
