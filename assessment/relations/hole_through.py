"""Through cracks at a round hole in the middle of a plate: remote tension and the load of a pin.

One crack, or two of equal length on opposite sides, square to the load. The wide-plate factors are
fits of an own computation; finite width is a published form in tension, an own fit for the pin.

The load of a pin that is taken up at one end of the plate is, by mirroring, half of: the same load
as remote tension, plus a pair of pins that press the two halves of the bore apart. Only the opening
mode counts: the sliding that one pin alone brings is left out.
"""

from collections.abc import Sequence

import numpy as np

from assessment.validity import Floats, Range, Validity

# Powers 0 to 6 of λ = R/(R + a): F for one and for two cracks.
TENSION_TERMS = {
    1: (0.70761, 0.75911, 0.22017, 1.05223, 0.63024, -0.44394, 0.4389),
    2: (1.00044, 0.48388, 0.54975, 0.18265, 1.55809, -1.37501, 0.96424),
}
# Powers 0 to 5 of λ, then the factor of (1 − λ) ln(1 − λ).
PAIR_TERMS = {
    1: (0.99381, 0.8609, 0.15383, -0.30866, 0.1579, -0.04029, 1.02658),
    2: (0.63652, 1.41603, -0.31019, 0.00447, -0.14487, 0.21627, 1.09684),
}
# Rows: powers 0 to 3 of D/W; columns: powers 0 to 3 of a over the ligament.
PAIR_WIDTH_TERMS = {
    1: (
        (1.0051, -0.6837, 0.5166, 0.1044),
        (0.0403, 3.9892, -1.5594, -2.5673),
        (0.5552, -10.9275, 4.5497, 12.2231),
        (2.7897, 11.8511, -3.006, -18.4437),
    ),
    2: (
        (0.9967, -0.4691, 0.8594, -0.0814),
        (0.1429, 1.8382, -1.2856, 0.0116),
        (0.1048, -0.4478, 1.2278, -0.7585),
        (3.343, -1.8484, 5.8474, -5.8241),
    ),
}

TENSION = Validity(
    relation="stress intensity of a through crack at a hole in tension",
    source=(
        "wide plate: own computation by the integral equation of dislocations beside a round "
        "hole, fitted here; finite width: J. C. Newman & I. S. Raju, NASA TM-83200 (1981) / "
        "ASTM STP 791 (1983) I-238, f_w at a/t = 1, from memory"
    ),
    accuracy=(
        "wide plate: the fit is within 0.02 % of the computation, which agrees to 0.07 % with "
        "J. C. Newman, NASA TN D-6376 (1971), for two cracks; with finite width, against plane "
        "finite elements: 2 % low to 6 % high up to half of the ligament, to 15 % high at nine "
        "tenths of it (measured, the high ones at D/W = 0.5)"
    ),
    ranges=(
        Range("a/R", "crack length over hole radius", 0.0, 100.0, True, False),
        Range("D/W", "hole diameter over plate width", 0.01, 0.5, False, False),
        Range("a/l", "crack length over the ligament beside the hole", 0.0, 0.9, True, False),
    ),
    witness=(
        "wide plate: values from memory (NASA TN D-6376) and an independent computation; finite "
        "width: plane finite elements over the whole range"
    ),
    tests=("tests/external/test_holes_through.py",),
)
PIN = Validity(
    relation="stress intensity of a through crack at a hole with a pin's load",
    source=(
        "own computation, published nowhere: half of remote tension and half of a pair of pins; "
        "bearing pressure as the sine of the angle from the crack, without friction; integral "
        "equation for the wide plate, plane finite elements for the width, both fitted here"
    ),
    accuracy=(
        "fit of the pair: 0.06 % in a wide plate, with finite width 1.5 % (4 % at D/W = 0.01); the "
        "pin's load together: 1 % low to 3 % high up to half of the ligament, to 8 % high at nine "
        "tenths of it (against plane finite elements); the pressure of "
        "a loose or tight pin differs from the one assumed"
    ),
    ranges=TENSION.ranges,
    witness="plane finite elements over the range; limit: a pair of forces on a long crack",
    tests=(
        "tests/external/test_holes_through.py",
        "tests/external/test_lugs.py::test_a_long_head_is_a_plate_with_a_pin",
    ),
)


def validity_values(a: Floats, radius: float, width: float) -> dict[str, Floats]:
    """The symbols of TENSION and PIN. a in m of any shape, from the bore."""
    a = np.asarray(a, dtype=float)
    return {
        "a/R": a / radius,
        "D/W": np.full_like(a, 2.0 * radius / width),
        "a/l": a / (width / 2.0 - radius),
    }


def tension_wide(a: Floats, radius: float, cracks: int) -> Floats:
    """F in K = F σ √(πa) in a wide plate: Σ c_k λ^k, λ = R/(R + a)."""
    return _series(_part(a, radius), TENSION_TERMS[cracks])


def tension_width(a: Floats, radius: float, width: float, cracks: int) -> Floats:
    """f_w = √(sec(πR/W) sec{π(2R + na)/[4(W/2 − a) + 2na]}), n = 1 or 2 cracks.

    NaN where the secant has no meaning, which ends a growth run.
    """
    angle = np.pi * (2.0 * radius + cracks * a) / (4.0 * (width / 2.0 - a) + 2.0 * cracks * a)
    with np.errstate(invalid="ignore", divide="ignore"):
        return np.asarray(1.0 / np.sqrt(np.cos(np.pi * radius / width) * np.cos(angle)))


def pair_wide(a: Floats, radius: float, cracks: int) -> Floats:
    """G in K = G σ_b √(πa) of a pair of pins that press the bore apart, σ_b = P/(D t):

    two cracks: G = λ g, one: G = λ^1.5 g, g = Σ c_k λ^k + d (1 − λ) ln(1 − λ), λ = R/(R + a)
    """
    part = _part(a, radius)
    *powers, mixed = PAIR_TERMS[cracks]
    rest = 1.0 - part
    g = _series(part, powers) + mixed * rest * np.log(rest)
    return np.asarray(part ** (1.0 if cracks == 2 else 1.5) * g)


def pair_width(a: Floats, radius: float, width: float, cracks: int) -> Floats:
    """g_w of a pair of pins: Σ c_ij (D/W)^i ξ^j / √(1 − ξ), ξ = a/(W/2 − R)."""
    used = a / (width / 2.0 - radius)
    with np.errstate(invalid="ignore", divide="ignore"):
        hole = np.asarray(2.0 * radius / width)
        by_crack = [_series(hole, row) for row in zip(*PAIR_WIDTH_TERMS[cracks], strict=True)]
        return np.asarray(_series(used, by_crack) / np.sqrt(1.0 - used))


def tension(a: Floats, radius: float, width: float, cracks: int) -> Floats:
    """F in K = F σ √(πa), a from the bore, σ the remote stress on the whole width."""
    a = np.asarray(a, dtype=float)
    return np.asarray(tension_wide(a, radius, cracks) * tension_width(a, radius, width, cracks))


def pin(a: Floats, radius: float, width: float, cracks: int) -> Floats:
    """F in K = F σ_b √(πa), σ_b = P/(D t), of a pin whose load one end of the plate takes up:

    F = (F_tension D/W + G g_w) / 2
    """
    a = np.asarray(a, dtype=float)
    remote = tension(a, radius, width, cracks) * 2.0 * radius / width
    return np.asarray(
        (remote + pair_wide(a, radius, cracks) * pair_width(a, radius, width, cracks)) / 2.0
    )


def stress_intensity(
    a: Floats,
    membrane: Floats,
    bearing: Floats,
    radius: float,
    width: float,
    cracks: int,
) -> Floats:
    """K in MPa√m. membrane : MPa, the stress that passes the hole by; bearing : P/(D t) in MPa;
    a, radius, width : m; cracks : 1 or 2."""
    a = np.asarray(a, dtype=float)
    with np.errstate(invalid="ignore"):
        stress = tension(a, radius, width, cracks) * membrane
        stress = stress + pin(a, radius, width, cracks) * bearing
        return np.asarray(stress * np.sqrt(np.pi * a))


def _series(x: Floats, terms: Sequence[Floats | float]) -> Floats:
    """Σ terms_k x^k (Horner)."""
    total = np.asarray(terms[-1], dtype=float)
    for term in reversed(terms[:-1]):
        total = total * x + term
    return np.asarray(total)


def _part(a: Floats, radius: float) -> Floats:
    return np.asarray(radius / (radius + np.asarray(a, dtype=float)))
