"""Cracks in one side of a straight lug with a round end, square to the load of its pin.

An own computation by plane finite elements over a grid of hole, head and crack, fitted here; it is
published nowhere. The bore carries a pressure as the sine of the angle from the crack (no friction)
and the load lies along the lug.
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

from . import hole_corner, hole_through

# By powers 0 to 3 of D/W; in each, rows: powers 0 to 4 of W/(2H); columns: powers 0 to 3 of
# a over the ligament.
TERMS = (
    (
        (1.1635, -0.1211, -2.1579, 1.8696),
        (-1.249, -1.237, 13.7036, -12.5209),
        (3.3842, 1.7332, -33.7944, 32.384),
        (-3.8816, -0.5695, 35.8687, -35.809),
        (1.6004, 0.1778, -14.0195, 14.0309),
    ),
    (
        (-2.8089, 1.1734, 4.1502, -1.1372),
        (14.136, -3.3203, -17.6987, 1.7065),
        (-38.9115, 10.5898, 58.8621, -16.9071),
        (45.1342, -11.5894, -89.7458, 41.2116),
        (-18.3322, 2.8281, 47.4913, -26.1847),
    ),
    (
        (6.3774, -6.0326, -0.2936, -3.6851),
        (-39.7806, 38.8968, -26.6664, 42.6824),
        (105.3751, -98.1409, 31.7178, -79.2006),
        (-118.3478, 97.6334, 37.0283, 27.9426),
        (48.2023, -30.6014, -51.9999, 17.4268),
    ),
    (
        (-6.3421, 6.2642, 2.266, -0.214),
        (45.199, -48.4158, 14.4394, -21.2026),
        (-119.5958, 124.1397, -6.9624, 28.9919),
        (133.7455, -128.1629, -53.3238, 18.6777),
        (-53.7796, 43.0871, 56.8872, -35.1273),
    ),
)

VALIDITY = Validity(
    relation="stress intensity of a through crack in a lug",
    source=(
        "own computation, published nowhere: plane finite elements (plane stress, Poisson's ratio "
        "0.3) over 396 lugs, fitted here; head a half circle as wide as the lug"
    ),
    accuracy=(
        "the fit is within 1 % of the elements, between its points too; the elements within 0.5 %; "
        "a square end is 1 % to 9 % lower; measured on six lugs, a "
        "pressure spread evenly over half the bore gives 7 % to 27 % less and one drawn together "
        "as the square of the sine 3 % to 7 % more; K is taken from the whole energy release, "
        "the small sliding part counted as opening"
    ),
    ranges=(
        Range("D/W", "hole diameter over lug width", 0.2, 0.7),
        Range("2H/W", "twice the head (bore centre to free edge) over lug width", 1.0, 3.0),
        Range("a/l", "crack length over the ligament beside the bore", 0.0, 0.9, True, False),
    ),
    witness=(
        "finer meshes, points between those fitted; a long head agrees with the pin's load at a "
        "hole in a plate, which has an integral equation behind it"
    ),
    tests=("tests/external/test_lugs.py",),
)

CORNER = Validity(
    relation="stress intensity of a corner crack in a lug",
    source=(
        "own computation, published nowhere: the equation of Newman & Raju for one corner crack "
        "at a hole (NASA TM-83200, 1981), brought to the lug by through cracks of the same "
        "distance and of the same area"
    ),
    accuracy=(
        "compared on rings with two corner cracks, pressed open by pins, against own "
        "three-dimensional elements on a coarse mesh: 1 % low to 8 % high at the end along the "
        "bore, 2 % low to 22 % high at the end along the width; the pressure of the pin as for "
        "through cracks"
    ),
    ranges=(
        Range("a/c", "crack depth along the bore over its length", 0.5, 2.0),
        Range("a/t", "crack depth over thickness", 0.0, 0.8, True, False),
        Range("R/t", "bore radius over thickness", 0.5, 2.0),
        Range("D/W", "hole diameter over lug width", 0.2, 0.6),
        Range("2H/W", "twice the head (bore centre to free edge) over lug width", 1.0, 3.0),
        Range("c/l", "crack length over the ligament beside the bore", 0.0, 0.7, True, False),
    ),
    witness="three-dimensional finite elements of rings as narrow as lugs; no lug itself",
    tests=("tests/external/test_lugs.py::test_corner_cracks_by_solid_rings",),
)


def corner_values(
    a: Floats, c: Floats, thickness: float, radius: float, width: float, head: float
) -> dict[str, Floats]:
    """The symbols of CORNER. a, c in m of any one shape."""
    a, c = np.broadcast_arrays(np.asarray(a, dtype=float), np.asarray(c, dtype=float))
    return {
        "a/c": a / c,
        "a/t": a / thickness,
        "R/t": np.full_like(a, radius / thickness),
        "D/W": np.full_like(a, 2.0 * radius / width),
        "2H/W": np.full_like(a, 2.0 * head / width),
        "c/l": c / (width / 2.0 - radius),
    }


def validity_values(a: Floats, radius: float, width: float, head: float) -> dict[str, Floats]:
    """The symbols of VALIDITY. a in m of any shape, from the bore."""
    a = np.asarray(a, dtype=float)
    return {
        "D/W": np.full_like(a, 2.0 * radius / width),
        "2H/W": np.full_like(a, 2.0 * head / width),
        "a/l": a / (width / 2.0 - radius),
    }


def through(a: Floats, radius: float, width: float, head: float) -> Floats:
    """F in K = F σ_b √(πa), σ_b = P/(D t) in MPa, K in MPa√m; a, radius, width, head in m:

    F = (F_∞ D/W + G_∞)/2 · S(ξ), S = Σ c_ijk (D/W)^i (W/2H)^j ξ^k / [(1 − D/W) √(1 − ξ)],
    ξ = a/(W/2 − R), F_∞ and G_∞ the factors of one crack at a hole in a wide plate in tension and
    under a pair of pins (hole_through). NaN where the crack is longer than the ligament.
    """
    a = np.asarray(a, dtype=float)
    hole = 2.0 * radius / width
    wide = hole_through.tension_wide(a, radius, 1) * hole + hole_through.pair_wide(a, radius, 1)
    return np.asarray(wide / 2.0 * _body(a, radius, width, head))


def _body(a: Floats, radius: float, width: float, head: float) -> Floats:
    """S(ξ): what the finite width and head of the lug add."""
    hole, used = 2.0 * radius / width, a / (width / 2.0 - radius)
    rows = np.polynomial.polynomial.polyval(width / (2.0 * head), np.swapaxes(TERMS, 0, 1))
    by_crack = np.polynomial.polynomial.polyval(hole, rows)
    with np.errstate(invalid="ignore", divide="ignore"):
        series = np.polynomial.polynomial.polyval(used, by_crack)
        return np.asarray(series / ((1.0 - hole) * np.sqrt(1.0 - used)))


def corner(
    a: Floats, c: Floats, thickness: float, radius: float, width: float, head: float
) -> Floats:
    """K ÷ σ_b in √m of a corner crack, at its end along the bore and along the width, (2, ...):

    K = K_corner (D/W + G_∞(l)/F_∞(l))/2 · S(ξ_A), l = c cos(0.85 φ), ξ_A that of a through crack of
    the same area, π a c/(4 t). K_corner : one corner crack at a hole in a wide plate in tension
    (hole_corner). a along the bore, c from it, thickness, radius, width, head : m
    """
    a, c = np.broadcast_arrays(np.asarray(a, dtype=float), np.asarray(c, dtype=float))
    ratio = (2.0 * radius / width + hole_corner.pair_over_tension(c, radius, 1)) / 2.0
    body = _body(np.pi / 4.0 * a * c / thickness, radius, width, head)
    return np.asarray(hole_corner.wide(a, c, thickness, radius, 1) * ratio * body)
