"""Through cracks at one side or at both sides of a round hole: bypass stress and pin load.

Lengths over the hole's radius R; L is the crack from the hole's wall, s = L/(R + L).
"""

import numpy as np
from scipy.interpolate import RectBivariateSpline

from assessment.validity import Floats, Range, Validity

EDGE_FACTOR = 1.12152226  # of an edge crack in a half plane
_TWO_SOURCE = (
    "two cracks: J. C. Newman, An improved method of collocation for the stress analysis of "
    "cracked plates with various shaped boundaries, NASA TN D-6376 (1971), table 3; "
)
_ONE_SOURCE = "one crack: own computation by dislocation densities, published nowhere; "
_WIDTH_SOURCE = (
    "finite width: J. C. Newman, Predicting failure of specimens with either surface cracks or "
    "corner cracks at holes, NASA TN D-8244 (1976)"
)
TENSION = Validity(
    relation="stress intensity of through cracks at a hole under bypass stress",
    source=_TWO_SOURCE + _ONE_SOURCE + _WIDTH_SOURCE,
    accuracy=(
        "0.1 % in an endless plate (measured); in a strip 0 to 6 % above plane finite elements, "
        "most where a crack comes near the edge"
    ),
    ranges=(
        Range("L/R", "crack length over hole radius", 0.0, 20.0, True, False),
        Range("hole and crack/W", "hole and cracks over plate width", 0.0, 0.85, True, False),
    ),
    witness=(
        "the table of the source from memory, met to four figures by an independent computation; "
        "finite width from memory, confirmed by plane finite elements"
    ),
)
PIN = Validity(
    relation="stress intensity of through cracks at a hole under a pin load",
    source=(
        "own computation, published nowhere: half of the pin force as stress at both ends and half "
        "as two pins that push apart (exact for a crack across the load), pressure on the hole's "
        "wall as the sine of the angle; endless plate by dislocation densities, the strip by plane "
        "finite elements"
    ),
    accuracy="1 % (measured between the two computations)",
    ranges=(
        Range("2R/W", "hole diameter over plate width", 0.1, 0.6),
        Range("L/(W/2 − R)", "crack length over what is beside the hole", 0.0, 0.8, True, False),
    ),
    witness="own computation by two methods",
)

# F = e₀ (1 − s) + e₁ s + s (1 − s) Σ c_i sⁱ; fitted to 0.02 % over all s.
_TENSION = {
    1: (2.0**-0.5, (-4.6332, 4.6329, -3.0622, 1.4403, -0.26205)),
    2: (1.0, (-4.9172, 6.2721, -5.6952, 3.3615, -0.89069)),
}
# F = (1 − s)^power [e₀ + c₀ s ln s + Σ c_i sⁱ]; fitted to 0.05 % up to s = 0.95.
_PIN = {
    1: (1.5, 0.82216, (-0.49076, -0.258, 0.10078)),
    2: (1.0, 0.87959, (-0.96615, 0.54114, -0.78132, 0.27923)),
}
# Two pins that push apart in a strip: K over K in an endless plate. Rows by 2R/W, columns by
# L/(W/2 − R); the first column is what the next three tend to, alike for one crack and for two.
_HOLE = (0.1, 0.2, 0.3, 0.4, 0.5, 0.6)
_REACH = (0.0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8)
_STRIP = {
    1: (
        (1.0143, 1.0235, 1.0356, 1.0696, 1.1209, 1.1964, 1.3074, 1.4734, 1.7320, 2.1731),
        (1.0575, 1.0755, 1.0957, 1.1459, 1.2145, 1.3099, 1.4443, 1.6392, 1.9366, 2.4396),
        (1.1410, 1.1669, 1.1954, 1.2641, 1.3527, 1.4704, 1.6306, 1.8564, 2.1937, 2.7569),
        (1.2825, 1.3160, 1.3536, 1.4440, 1.5571, 1.7017, 1.8924, 2.1540, 2.5364, 3.1661),
        (1.5120, 1.5573, 1.6053, 1.7227, 1.8681, 2.0485, 2.2789, 2.5859, 3.0237, 3.7324),
        (1.9040, 1.9606, 2.0212, 2.1762, 2.3692, 2.6037, 2.8933, 3.2661, 3.7805, 4.5925),
    ),
    2: (
        (1.0143, 1.0273, 1.0463, 1.1016, 1.1851, 1.3048, 1.4748, 1.7200, 2.0907, 2.7131),
        (1.0575, 1.0800, 1.1090, 1.1839, 1.2865, 1.4263, 1.6183, 1.8884, 2.2887, 2.9502),
        (1.1410, 1.1713, 1.2095, 1.3058, 1.4311, 1.5951, 1.8135, 2.1134, 2.5488, 3.2565),
        (1.2825, 1.3200, 1.3673, 1.4870, 1.6397, 1.8337, 2.0851, 2.4220, 2.9006, 3.6648),
        (1.5120, 1.5556, 1.6136, 1.7610, 1.9481, 2.1813, 2.4762, 2.8607, 3.3938, 4.2283),
        (1.9040, 1.9540, 2.0254, 2.2105, 2.4469, 2.7380, 3.0980, 3.5546, 4.1695, 5.1070),
    ),
}
_SURFACE = {n: RectBivariateSpline(_HOLE, _REACH, table) for n, table in _STRIP.items()}


def tension(length: Floats, cracks: int) -> Floats:
    """F in K = F σ √(πL), endless plate, stress σ at both far ends. length : L/R; cracks : 1, 2."""
    s = length / (1.0 + length)
    end, terms = _TENSION[cracks]
    start = 3.0 * EDGE_FACTOR
    return np.asarray(start * (1.0 - s) + end * s + s * (1.0 - s) * _series(s, terms))


def pin_pair(length: Floats, cracks: int) -> Floats:
    """F in K = F p √(πL), endless plate, two pins that push apart, p = 2P/(πRt)."""
    s = length / (1.0 + length)
    power, log, terms = _PIN[cracks]
    start = 4.0 / np.pi * EDGE_FACTOR
    inner = start + log * s * np.log(s) + s * _series(s, terms)
    return np.asarray((1.0 - s) ** power * inner)


def strip_tension(length: Floats, half_width: float, cracks: int) -> Floats:
    """f_w = √{sec(π/2b) sec[π(2 + nL)/(4(b − L) + 2nL)]}, all over R; b half the width."""
    n, b = cracks, half_width
    whole = (2.0 + n * length) / (4.0 * (b - length) + 2.0 * n * length)
    with np.errstate(invalid="ignore"):
        # A crack that leaves no ligament has no value: NaN, which ends a growth run.
        left = np.cos(np.pi / (2.0 * b)) * np.where(whole < 0.5, np.cos(np.pi * whole), np.nan)
        return np.asarray(1.0 / np.sqrt(left))


def strip_pin(length: Floats, half_width: float, cracks: int) -> Floats:
    """The strip's factor on the pair of pins, from the table; NaN outside it."""
    hole, reach = 1.0 / half_width, np.asarray(length / (half_width - 1.0))
    known = (reach >= _REACH[0]) & (reach <= _REACH[-1]) & (_HOLE[0] <= hole <= _HOLE[-1])
    # Outside the table the middle of it stands in, and is not taken.
    at = np.where(known, reach, 0.5)
    rows = np.broadcast_to(min(max(hole, _HOLE[0]), _HOLE[-1]), at.shape)
    return np.where(known, _SURFACE[cracks].ev(rows, at), np.nan)


def _series(s: Floats, terms: tuple[float, ...]) -> Floats:
    total = np.zeros_like(s)
    for term in reversed(terms):
        total = total * s + term
    return total
