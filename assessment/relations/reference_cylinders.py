"""Reference stress of cracked cylinders beside that of the inside axial crack."""

import numpy as np

from assessment.validity import Floats, Range, Validity

HALVINGS = 60
AXIAL_OUTSIDE = Validity(
    relation="reference stress of an axial surface crack outside a cylinder",
    source="BS 7910:2005 and 2013, annex P, axial surface flaw: 1.2 M_s P_m",
    accuracy="a lower bound of the limit load",
    ranges=(Range("a/t", "crack depth over wall thickness", 0.0, 1.0, False, True),),
    witness="from memory (medium confidence); agrees with the check value from memory",
)
AXIAL_THROUGH = Validity(
    relation="reference stress of an axial through-wall crack in a cylinder",
    source="BS 7910:2005 and 2013, annex P, axial through-thickness flaw: 1.2 M_T P_m",
    accuracy="a lower bound of the limit load",
    ranges=(),
    witness="from memory (medium confidence); agrees with the check value from memory",
)
GIRTH_THROUGH = Validity(
    relation="reference stress of a girth through-wall crack in a cylinder",
    source=(
        "net-section collapse of a thin cylinder under axial force and bending moment "
        "(equilibrium); the same model as M. F. Kanninen et al., EPRI NP-192 (1976)"
    ),
    accuracy="the limit load of a thin cylinder that cannot ovalise",
    ranges=(Range("θ/π", "half angle of the crack over half a turn", 0.0, 1.0, False, True),),
    witness="derivation; limits: no crack, force alone, moment alone",
)


def folias(half_length: Floats, mean_radius: float, thickness: float) -> Floats:
    """M_T = √(1 + 1.6 c²/(r B))."""
    return np.asarray(np.sqrt(1.0 + 1.6 * half_length**2 / (mean_radius * thickness)))


def axial_outside(
    pressure: Floats, a: Floats, c: Floats, thickness: float, radius: float
) -> Floats:
    """1.2 M_s P_m, M_s = [1 − a/(B M_T)]/[1 − a/B], P_m = p R_i/B."""
    m_t = folias(c, radius + thickness / 2.0, thickness)
    m_s = (1.0 - a / (thickness * m_t)) / (1.0 - a / thickness)
    return np.asarray(1.2 * m_s * np.abs(pressure) * radius / thickness)


def axial_through(pressure: Floats, c: Floats, thickness: float, radius: float) -> Floats:
    """1.2 M_T P_m, P_m = p R_i/B."""
    m_t = folias(c, radius + thickness / 2.0, thickness)
    return np.asarray(1.2 * m_t * np.abs(pressure) * radius / thickness)


def girth_through(axial: Floats, bending: Floats, half_angle: Floats) -> Floats:
    """The flow stress σ at which what is left carries axial stress and global bending:

    (π/4) σ_b/σ = sin β − ½ sin θ, β = [π − θ − π σ_m/σ]/2. Bisection between the stress that the
    net section carries without bending and without end.
    """
    m, b, theta = np.broadcast_arrays(
        np.abs(axial), np.abs(bending), np.asarray(half_angle, dtype=float)
    )
    least = m / np.maximum(1.0 - theta / np.pi, 1e-300)
    whole = np.cos(theta / 2.0) - 0.5 * np.sin(theta)  # sin β − ½ sin θ without force
    with np.errstate(divide="ignore", invalid="ignore"):
        most = least + np.pi / 4.0 * b / whole + m / np.maximum(whole, 1e-300)
        low, high = least, 4.0 * most + 1e-300
        for _ in range(HALVINGS):
            middle = 0.5 * (low + high)
            beta = 0.5 * (np.pi - theta - np.pi * m / middle)
            carries = np.sin(beta) - 0.5 * np.sin(theta) >= np.pi / 4.0 * b / middle
            high, low = np.where(carries, middle, high), np.where(carries, low, middle)
        return np.asarray(np.where((m == 0.0) & (b == 0.0), 0.0, np.where(whole > 0, high, np.inf)))
