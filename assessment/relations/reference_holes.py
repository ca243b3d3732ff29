"""Reference stress of plates with a cracked hole, and of lugs: equilibrium of what is left.

Each is the stress of a plastic stress field in balance with the load (Tresca), so it is never below
what the limit load asks for, as far as the field reaches. Lengths in m, stresses in MPa.
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

SOURCE = (
    "lower-bound limit analysis of the section through the hole, plane stress, derived here; the "
    "same model as for ligaments in A. G. Miller, Review of limit loads of structures containing "
    "defects, 3rd ed., Int. J. Press. Vess. Piping 32 (1988) 197-327"
)
THROUGH = Validity(
    relation="reference stress of a through crack at a hole",
    source=SOURCE,
    accuracy="a lower bound of the limit load of the section",
    ranges=(Range("a/l", "crack length over the ligament beside the hole", 0.0, 1.0, False, True),),
    witness="derivation; limits: net section without a crack and with two; balance of force and "
    "moment integrated",
    tests=(
        "tests/external/test_reference_holes.py::test_one_crack_balances_force_and_moment",
        "tests/external/test_reference_holes.py::test_two_cracks_leave_the_net_section",
    ),
)
CORNER = Validity(
    relation="reference stress of a corner crack at a hole",
    source=(
        SOURCE + "; the zone that gives way locally is as long as crack and thickness together, "
        "as for surface cracks in BS 7910:2013, annex P (from memory)"
    ),
    accuracy="below the limit load: the quarter ellipse counts as its rectangle",
    ranges=(Range("a/t", "crack depth over thickness", 0.0, 1.0, False, True),),
    witness="derivation; limits: no crack, through crack",
    tests=(
        "tests/external/test_reference_holes.py::test_a_corner_crack_through_the_thickness_is_at_least_the_through_crack",
    ),
)
LUG = Validity(
    relation="reference stress of a cracked lug",
    source=(
        "equilibrium of the section through the bore, of two shear planes from the bore to the "
        "free end (Tresca) and of the bearing face, the worst of the three; derived here"
    ),
    accuracy="an estimate on the low side of each mechanism; bending of the head around the pin "
    "is not looked at",
    ranges=(Range("a/l", "crack length over the ligament beside the bore", 0.0, 1.0, False, True),),
    witness="derivation; limits: net section, shear, bearing",
    tests=(
        "tests/external/test_reference_holes.py::test_a_lug_takes_the_worst_of_section_shear_and_bearing",
    ),
)


def through(
    membrane: Floats, bearing: Floats, a: Floats, radius: float, width: float, cracks: int
) -> Floats:
    """The section carries the bypassing load and the whole of the pin's: N/t = σ W + σ_b D, both
    taken as acting together."""
    force = np.abs(membrane) * width + np.abs(bearing) * 2.0 * radius
    whole = np.asarray(1.0)
    return section(force, whole, np.asarray(a, dtype=float), radius, width, cracks)


def corner(
    membrane: Floats,
    bearing: Floats,
    a: Floats,
    c: Floats,
    thickness: float,
    radius: float,
    width: float,
    cracks: int,
) -> Floats:
    """The larger of two: the whole section, a rectangle a × c taken from its thickness, and the
    zone beside the bore, N/(W − D) ÷ [1 − (a/t) c/z], z = c + t, at most the ligament."""
    a, c = np.asarray(a, dtype=float), np.asarray(c, dtype=float)
    force = np.abs(membrane) * width + np.abs(bearing) * 2.0 * radius
    depth = a / thickness
    whole = section(force, depth, c, radius, width, cracks)
    zone = np.minimum(c + thickness, width / 2.0 - radius)
    with np.errstate(divide="ignore"):
        near = force / (width - 2.0 * radius) / (1.0 - depth * c / zone)
    return np.asarray(np.maximum(whole, near))


def section(
    force: Floats, depth: Floats, a: Floats, radius: float, width: float, cracks: int
) -> Floats:
    """Stress of the section through the hole under a force per thickness, in m MPa.

    depth : the part of the thickness that the crack takes, 1 through; a : its length in m.
    Two cracks: N/(W − D − 2da). One: the load acts in the middle of the plate, whose ends may turn,
    so a strip s at the far edge is pressed for balance of moments: N/(W − D − da − 2s),
    s = W/2 − √(W²/4 − d [(R + a)² − R²]/2).
    """
    left = width - 2.0 * radius - cracks * depth * a
    if cracks == 1:
        shift = depth * ((radius + a) ** 2 - radius**2) / 2.0
        left = left - 2.0 * (width / 2.0 - np.sqrt(width**2 / 4.0 - shift))
    with np.errstate(divide="ignore"):
        return np.asarray(np.abs(force) / left)


def lug(
    bearing: Floats, depth: Floats, a: Floats, radius: float, width: float, head: float
) -> Floats:
    """The largest of: the section σ_b D/left, the shear planes σ_b D/(head − R), the bearing σ_b.

    bearing : P/(D t) in MPa; depth : a/t of a corner crack, 1 through; a : m along the width.
    """
    force = np.abs(bearing) * 2.0 * radius
    net = section(force, np.asarray(depth, dtype=float), np.asarray(a), radius, width, 1)
    rest = np.maximum(force / (head - radius), np.abs(bearing))
    return np.asarray(np.maximum(net, rest))
