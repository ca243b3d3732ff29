"""Reference stress of cracked cylinders: the stress at which the metal left gives way.

Load ratio L_r = reference stress ÷ yield strength. Stresses in MPa, lengths in m; loads that close
the crack count by their magnitude. Whatever the crack does, the wall itself gives way at
p = σ_Y ln(R_o/R_i) (Tresca, ends free): no reference stress here is below p/ln(R_o/R_i).
"""

import numpy as np

from assessment.validity import Floats, Range, Validity

AXIAL_OUTSIDE = Validity(
    relation="reference stress of an axial surface crack outside a cylinder",
    source="BS 7910:2005 and 2013, annex P, axial surface flaw: 1.2 M_s P_m",
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory (medium confidence); limits: no crack, through the wall as M_T of a "
    "through crack asks, endless length",
    tests=(
        "tests/external/test_cylinders.py::test_thin_wall_limit_of_the_axial_outside_reference",
    ),
)
AXIAL_THROUGH = Validity(
    relation="reference stress of an axial through crack in a cylinder",
    source=(
        "BS 7910:2005 and 2013, annex P, axial through-thickness flaw: 1.2 M_T P_m; M_T after J. "
        "F. Kiefner, W. A. Maxey, R. J. Eiber & A. R. Duffy, ASTM STP 536 (1973) 461-481, and E. "
        "S. Folias, Int. J. Fracture Mech. 1 (1965) 104-113"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(),
    witness="from memory; limits: no crack, long crack; M_T within 3 % of Folias's own expression "
    "up to c/√(R t) = 4",
    tests=(
        "tests/external/test_cylinders.py::test_reference_stress_of_an_axial_through_crack",
        "tests/external/test_cylinders.py::test_bulging_of_the_reference_stress_is_near_folias",
    ),
)
GIRTH_THROUGH = Validity(
    relation="reference stress of a girth through crack in a cylinder",
    source=(
        "net-section collapse of a thin tube under axial force and moment: M. F. Kanninen and "
        "others, EPRI NP-192 (1976); the same balance in A. G. Miller, Int. J. Press. Vess. "
        "Piping 32 (1988) 197-327"
    ),
    accuracy="a lower bound of the limit load of a thin tube",
    ranges=(Range("θ/π", "half the crack's angle over half a turn", 0.0, 0.5),),
    witness="balance of force and moment, integrated independently",
    tests=("tests/external/test_cylinders.py::test_the_tube_carries_its_force_and_moment",),
)
GIRTH_SURFACE = Validity(
    relation="reference stress of a girth surface crack in a cylinder",
    source=(
        "the larger of: net-section collapse of the whole tube (Kanninen and others, EPRI NP-192, "
        "1976), the crack taken as deep as its deepest point all along; and BS 7910:2005 and "
        "2013, annex P, circumferential surface flaw, global bending counted as membrane stress"
    ),
    accuracy="a lower bound of the limit load",
    ranges=(
        Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),
        Range("θ/π", "half the crack's angle over half a turn", 0.0, 0.5),
    ),
    witness="balance of force and moment, integrated independently; the standard's formula from "
    "memory, agrees with the check value from memory; limits: no crack, all the way around",
    tests=(
        "tests/external/test_cylinders.py::test_reference_stress_of_a_girth_surface_crack",
        "tests/external/test_cylinders.py::test_the_tube_carries_its_force_and_moment",
    ),
)


def wall(pressure: Floats, thickness: float, radius: float) -> Floats:
    """p/ln(R_o/R_i): the wall without a crack, elastic - ideally plastic, Tresca."""
    return np.asarray(np.abs(pressure) / np.log1p(thickness / radius))


def bulging(c: Floats, thickness: float, radius: float) -> Floats:
    """M_T = √(1 + 1.6 c²/(R_m t))."""
    return np.asarray(np.sqrt(1.0 + 1.6 * c**2 / ((radius + thickness / 2.0) * thickness)))


def axial_outside(
    pressure: Floats, a: Floats, c: Floats, thickness: float, radius: float
) -> Floats:
    """1.2 M_s P_m, M_s = [1 − a/(t M_T)]/[1 − a/t], P_m the hoop stress p R_i/t."""
    m_s = (1.0 - a / (thickness * bulging(c, thickness, radius))) / (1.0 - a / thickness)
    found = 1.2 * m_s * np.abs(pressure) * radius / thickness
    return np.maximum(found, wall(pressure, thickness, radius))


def axial_through(pressure: Floats, c: Floats, thickness: float, radius: float) -> Floats:
    """1.2 M_T P_m, P_m the hoop stress p R_i/t plus the pressure p that leaks into the crack."""
    found = 1.2 * bulging(c, thickness, radius) * np.abs(pressure) * (radius / thickness + 1.0)
    return np.maximum(found, wall(pressure, thickness, radius))


def girth_net_section(force: Floats, moment: Floats, part: Floats, depth: Floats | float) -> Floats:
    """σ at which a thin tube of ±σ carries an axial stress and a bending stress.

    force : axial stress N/(2πR_m t), ≥ 0; moment : M/(πR_m²t), ≥ 0; part : θ/π of half the crack;
    depth : a/t, 1 for a through crack. With α = a/t the balance is
        β = ½ (π − αθ − π N/σ),  M/σ = (2/π)(2 sin β − α sin θ)
    β the angle of the neutral line from the far side; the crack lies wholly in the tension side
    (true where θ ≤ π/2, which VALIDITY asks). Nil without load.

    With u = 1/σ, g(u) = (2/π)(2 sin β − α sin θ) − M u falls and is concave from u = 0 on, so that
    Newton's steps from the upper end of u come down to the root and cannot overshoot it.
    """
    force, moment, part = np.broadcast_arrays(force, moment, part)
    theta = np.pi * part
    half = 0.5 * (np.pi - depth * theta)
    lost = depth * np.sin(theta)
    # The upper end: no compression left (β = 0), or all of the section for the moment.
    with np.errstate(divide="ignore", invalid="ignore"):
        by_force = np.where(force > 0.0, 2.0 * half / (np.pi * force), np.inf)
        by_moment = np.where(
            moment > 0.0, 2.0 / np.pi * (2.0 * np.sin(half) - lost) / moment, np.inf
        )
        u = np.minimum(by_force, by_moment)
        for _ in range(_NEWTON):
            beta = half - 0.5 * np.pi * force * u
            g = 2.0 / np.pi * (2.0 * np.sin(beta) - lost) - moment * u
            slope = -2.0 * force * np.cos(beta) - moment
            step = np.where((g < 0.0) & (slope < 0.0), g / slope, 0.0)
            u = u - step
        return np.asarray(np.where(force + moment > 0.0, 1.0 / u, 0.0 * part))


_NEWTON = 40


def girth_through(
    membrane: Floats,
    global_bending: Floats,
    pressure: Floats,
    c: Floats,
    thickness: float,
    radius: float,
) -> Floats:
    """Net section under σ_m + p (leaking into the crack) and M, and the wall itself under p.

    c : half length at mid-thickness; global_bending : the elastic stress M R_o/I at the outer fibre
    """
    mean = radius + thickness / 2.0
    moment = np.abs(global_bending) * thin_bending(thickness, radius)
    force = np.abs(membrane) + np.abs(pressure)
    net = girth_net_section(force, moment, np.asarray(c / mean / np.pi), 1.0)
    return np.maximum(net, wall(pressure, thickness, radius))


def girth_surface(
    axial: Floats,
    global_bending: Floats,
    pressure: Floats,
    a: Floats,
    c: Floats,
    cracked_radius: float,
    thickness: float,
    radius: float,
) -> Floats:
    """The larger of the whole tube's net section, the ligament's, and the wall itself under p.

    axial : σ_m, with the pressure on the faces added for an inside crack
    c : half length along the cracked surface, whose radius is cracked_radius
    The standard's formula sees σ_m and the bending stress at the middle of the wall as P_m, the
    rest of the bending through the wall as P_b.
    """
    mean, outer = radius + thickness / 2.0, radius + thickness
    moment = np.abs(global_bending) * thin_bending(thickness, radius)
    part = np.asarray(c / cracked_radius / np.pi)
    net = girth_net_section(np.abs(axial), moment, part, a / thickness)
    membrane = np.abs(axial) + np.abs(global_bending) * mean / outer
    through = np.abs(global_bending) * thickness / (2.0 * outer)
    local = girth_part(membrane, through, a, c, thickness, mean)
    return np.maximum(np.maximum(net, local), wall(pressure, thickness, radius))


def girth_part(
    membrane: Floats, bending: Floats, a: Floats, c: Floats, thickness: float, mean: float
) -> Floats:
    """P_m [π(1 − a/B) + 2(a/B) sin(c/r)] / {(1 − a/B)[π − (c/r)(a/B)]} + 2P_b / [3(1 − α)²],
    α = (a/B)/(1 + B/c), B the wall, r the mean radius."""
    depth, angle = a / thickness, c / mean
    alpha = depth / (1.0 + thickness / c)
    part = (np.pi * (1.0 - depth) + 2.0 * depth * np.sin(angle)) / (
        (1.0 - depth) * (np.pi - angle * depth)
    )
    return np.asarray(membrane * part + 2.0 * bending / (3.0 * (1.0 - alpha) ** 2))


def thin_bending(thickness: float, radius: float) -> float:
    """M/(πR_m²t) per outer-fibre stress M R_o/I: (R_m² + t²/4)/(R_m R_o)."""
    mean = radius + thickness / 2.0
    return (mean**2 + thickness**2 / 4.0) / (mean * (radius + thickness))
