"""Through crack at one edge of a plate whose ends are held from turning, under membrane stress.

Held: two sections of the plate, the held length L apart with the crack between them, stay parallel
while the plate's force is what it is without the crack. The crack alone would turn them against
one another; the moment that turns them back closes the crack. An endless L holds nothing, and the
free-ended solution is left; a shorter one holds better.

Derived here. Per unit thickness, α = a/W, s = bending stress of the restraining moment at the edge:

    K = (F_m σ + F_b s) √(πa), the free-ended factors of ``edge_crack``
    turn of the crack  = ∂/∂M ∫ K²/E' da = (12π/E') (σ A + s B),
        A = ∫₀^α x F_m F_b dx, B = ∫₀^α x F_b² dx        (Castigliano: dU/da = K²/E')
    turn of the plate  = M L/(E' I) = 2 s L/(E' W)
    both together nil:  s/σ = −6π A/(L/W + 6π B)

E' drops out, the same in plate and crack. Where the sections are held sideways too, or the crack
is not midway, they hold better, and the true K is lower. A bending stress is given in full: the
relief that held ends bring to it is not taken.
"""

from functools import cache

import numpy as np
from scipy.interpolate import CubicHermiteSpline

from assessment.relations import edge_crack
from assessment.validity import Floats, Range, Validity

VALIDITY = Validity(
    relation="geometry factor of an edge crack in tension, ends held from turning",
    source=(
        "derived here: the free-ended factors in tension and bending (handbook of Tada, Paris & "
        "Irwin) and the turn of the crack by Castigliano's theorem"
    ),
    accuracy="1.5 % (measured here against plane finite elements, L/W 1.5 to 10, a/W 0.05 to 0.9)",
    ranges=(
        Range("a/W", "crack length over plate width", 0.0, 0.9, True, False),
        Range("L/W", "held length over plate width", 1.5),
    ),
    witness="derivation; confirmed by plane finite elements with evenly moved ends",
    tests=(
        "tests/external/fem/test_plane_plates.py::test_an_edge_crack_with_held_ends",
        "tests/external/test_plate_held.py",
    ),
)
_DEEPEST = 0.98


def tension(relative: Floats, length: Floats) -> Floats:
    """F in K = F σ √(πa), a/W in (0, 0.98), length : L/W. NaN beyond 0.98."""
    stress = relief(relative, length)
    return np.asarray(edge_crack.tension(relative) + stress * edge_crack.bending(relative))


def relief(relative: Floats, length: Floats) -> Floats:
    """s/σ = −6π A/(L/W + 6π B), the bending stress of the restraining moment; at most nil."""
    both, bend = (curve(relative) for curve in _turns())
    return np.asarray(-6.0 * np.pi * both / (length + 6.0 * np.pi * bend))


@cache
def _turns() -> tuple[CubicHermiteSpline, CubicHermiteSpline]:
    """A and B at 1,961 depths by Gauss's rule between them, their slopes being the integrands."""
    marks = np.linspace(0.0, _DEEPEST, 1961)
    points, weights = np.polynomial.legendre.leggauss(6)
    half = 0.5 * np.diff(marks)[:, None]
    x = marks[:-1, None] + half * (1.0 + points)
    curves = []
    for first in (edge_crack.tension, edge_crack.bending):
        steps = np.sum(weights * half * x * first(x) * edge_crack.bending(x), axis=1)
        slope = np.zeros_like(marks)
        slope[1:] = marks[1:] * first(marks[1:]) * edge_crack.bending(marks[1:])
        total = np.concatenate([[0.0], np.cumsum(steps)])
        curves.append(CubicHermiteSpline(marks, total, slope, extrapolate=False))
    return curves[0], curves[1]
