"""K of one or two radial cracks at a round hole in an endless plate, by dislocation densities.

An independent computation, published nowhere. The hole's radius is 1, the crack lies on the real
axis from 1 to 1 + L. The stress of a dislocation beside a free hole comes from Muskhelishvili's
potentials by reflection in the circle; a crack that opens into the hole has its closing
dislocation at the hole's middle.

N. I. Muskhelishvili, Some Basic Problems of the Mathematical Theory of Elasticity (1953); F.
Erdogan & G. D. Gupta, Q. Appl. Math. 29 (1972) 525-534.
"""

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]


def tension(x: Floats) -> Floats:
    """σ_yy ahead of the hole under unit tension across the crack (Kirsch 1898)."""
    return 1.0 + 0.5 / x**2 + 1.5 / x**4


def both_ways(x: Floats) -> Floats:
    """The same under equal tension in both directions."""
    return 1.0 + 1.0 / x**2


def pin_pair(x: Floats, terms: int = 400) -> Floats:
    """The same under pressure |sin θ| on the hole's wall: two pins that push apart.

    Michell's solution term by term, |sin θ| = 2/π − (4/π) Σ cos 2kθ / (4k² − 1).
    """
    total = (2.0 / np.pi) / x**2
    for k in range(1, terms):
        n = 2 * k
        term = 0.5 * (-n * x ** (-n - 2.0) + (n - 2.0) * x**-n)
        total = total - 4.0 / np.pi / (n**2 - 1.0) * term
    return total


def _stress(x: Floats, xi: Floats) -> Floats:
    """σ_yy at x of a dislocation at xi beside the free hole, without its own 2/(x − xi)."""
    w = 1.0 / x
    g, g1, g2, g0 = 1 / (w - xi), -1 / (w - xi) ** 2, 2 / (w - xi) ** 3, -1 / xi
    psi1 = 1 / (w - xi) + xi / (w - xi) ** 2
    psi2 = -1 / (w - xi) ** 2 - 2 * xi / (w - xi) ** 3
    phi = -(g - g0) + w * g1 + w**2 * psi1
    phi1 = -(w**3) * g2 - w**4 * psi2 - 2 * w**3 * psi1
    psi = g * w**2 + w**2 * phi - w * phi1 + g0 * w**2
    return 2 * phi + x * phi1 + psi


def factor(
    length: float, cracks: int, stress: Callable[[Floats], Floats], nodes: int = 60
) -> float:
    """F = K / √(πL) for unit load, L the length of each crack over the hole's radius.

    With ξ = 1 + L u² the density is h(u)/√(1 − u²), h even and smooth: the tip is at u = 1, and at
    the mouth, u = 0, a dislocation leaves through the free surface. Gauss-Chebyshev on the half.
    """
    # Of an odd number of nodes the middle one, at the mouth, weighs nothing and is left out.
    k, count = np.arange(1, nodes + 1), 2 * nodes + 1
    u, v = np.cos((2 * k - 1) * np.pi / (2 * count)), np.cos(k * np.pi / count)
    columns, rows = 1 + length * u[None, :] ** 2, 1 + length * v[:, None] ** 2
    kernel = 2 / (rows - columns) + _stress(rows, columns)
    if cracks == 2:
        kernel = kernel - 2 / (rows + columns) - _stress(rows, -columns)
    else:
        kernel = kernel - 2 / rows - 2 / rows**3
    matrix = kernel * (np.pi / count) * 2 * length * u[None, :]
    h = np.linalg.solve(matrix, -stress(rows[:, 0]))
    # h at the tip from the even Chebyshev polynomials through its values.
    even = 2 * np.arange(nodes)
    values = np.cos(even[None, :] * ((2 * k - 1) * np.pi / (2 * count))[:, None])
    tip = np.sum(np.linalg.solve(values, h))
    # ∫ 2 b/√r dr/(ρ + r) = 2πb/√ρ with b = h(1) √L, and K = σ √(2πρ).
    return float(abs(2.0 * np.pi * np.sqrt(2.0) * tip))
