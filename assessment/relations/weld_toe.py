"""How much the toe of a fillet weld raises the stress intensity of a crack in a plate."""

import numpy as np

from assessment.validity import Floats, Range, Validity

AT_SURFACE = 0.15e-3
"""Height above the toe, in m, at which the magnification of the surface point is taken (BS 7910,
annex M, from memory: the crack front meets the toe where the magnification itself has no limit)."""

VALIDITY = Validity(
    relation="magnification at the toe of a transverse fillet weld, two-dimensional",
    source=(
        "S. J. Maddox, The Welding Institute; PD 6493:1991 and BS 7910, annex M (two-dimensional "
        "solutions); never below 1, as the standard asks"
    ),
    accuracy="none stated; measured here by plane elements with flanks of 45°: with attachments on "
    "both surfaces 3 % low to 12 % high; with one on the cracked surface alone 2 to 38 % high in "
    "membrane stress and up to 12 % low in bending",
    ranges=(
        Range(
            "z/B", "height above the toe over wall thickness", 0.0015, 0.8, basis="confirmed here"
        ),
        Range("L/B", "attachment, toe to toe, over wall thickness", 0.3, basis="confirmed here"),
    ),
    witness=(
        "from memory; twelve values of the published forms (from memory); plane finite elements "
        "over L/B 0.3 to 5 and z/B 0.0015 to 0.8 in membrane stress and bending"
    ),
    tests=("tests/external/test_weld_toe.py",),
)


def magnification(z: Floats, attachment: float, thickness: float) -> tuple[Floats, Floats]:
    """M_k in membrane stress and in bending, each of z's shape, at least 1.

    M_k = v (z/B)^w, of two branches the larger. The published break between the branches lies
    within a tenth of where they cross; taking the larger keeps M_k without a jump, and at most
    3 % above the published form between the two.

    z : height above the toe in m; attachment : toe to toe in m; thickness : m
    """
    height, long = np.asarray(z, dtype=float) / thickness, attachment / thickness
    with np.errstate(divide="ignore", invalid="ignore"):
        membrane, bending = _membrane(height, long), _bending(height, long)
    return np.maximum(membrane, 1.0), np.maximum(bending, 1.0)


def _membrane(height: Floats, long: float) -> Floats:
    if long > 2.0:
        return np.asarray(np.maximum(0.615 * height**-0.31, 0.83 * height**-0.20))
    near = 0.51 * long**0.27 * height**-0.31
    return np.asarray(np.maximum(near, 0.83 * height ** (-0.15 * long**0.46)))


def _bending(height: Floats, long: float) -> Floats:
    if long > 1.0:
        return np.asarray(np.maximum(0.45 * height**-0.31, 0.68 * height**-0.19))
    near = 0.45 * long**0.21 * height**-0.31
    return np.asarray(np.maximum(near, 0.68 * height ** (-0.19 * long**0.21)))
