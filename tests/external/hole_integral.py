"""K of cracks at a round hole in an endless plate by an integral equation, published nowhere.

Edge dislocations along the crack beside a traction-free circle of radius 1 (the image terms by
analytic continuation over the circle, as in N. I. Muskhelishvili, Some Basic Problems of the
Mathematical Theory of Elasticity, from memory), collocated with the weight √((1 + u)/(1 − u)).
"""

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]


def tension(x: Floats) -> Floats:
    """Stress across the crack's line without the crack, remote stress 1 (Kirsch 1898)."""
    return 1 + 0.5 / x**2 + 1.5 / x**4


def pin_pair(x: Floats) -> Floats:
    """The same under a pressure (4/π) |sin θ| on the bore, bearing stress 1: a Fourier series."""
    mean = 4 / np.pi
    m = 2.0 * np.arange(1, 3001)[:, None]
    wave = -(4 / np.pi) * mean / (m**2 - 1)
    terms = wave * ((m / 2 - 1) * x**-m - m / 2 * x ** (-m - 2))
    return np.asarray(mean * 2 / np.pi / x**2 + terms.sum(0))


def _image(x: Floats, t: Floats) -> Floats:
    """What the circle adds to 1/(x − t), the stress of a dislocation at t; with the opposite one in
    the hole, since the crack opens into it."""
    q = 1 / x
    phi = 1 / (q - t)
    d_phi, dd_phi = -(phi**2), 2 * phi**3
    psi, d_psi = phi + t * phi**2, -(phi**2) - 2 * t * phi**3
    inner = phi - q * d_phi - q**2 * psi
    d_inner = -q * dd_phi - 2 * q * psi - q**2 * d_psi
    phi_1, d_phi_1 = -(inner + 1 / t), d_inner / x**2
    psi_1 = (phi_1 - x * d_phi_1 + phi - 1 / t) / x**2
    return np.asarray((2 * phi_1 + x * d_phi_1 + psi_1) / 2 - (1 / x + 1 / x**3))


def factor(
    length: float, cracks: int, stress: Callable[[Floats], Floats] = tension, points: int = 200
) -> float:
    """F in K = F σ √(πa), a = length ÷ radius; cracks : 1, or 2 opposite each other."""
    i = np.arange(1, points + 1)
    angle = (2 * i - 1) * np.pi / (2 * points + 1)
    u, weight = np.cos(angle), 2 * np.pi * (1 + np.cos(angle)) / (2 * points + 1)
    v = np.cos(2 * i * np.pi / (2 * points + 1))
    t = 1 + length * (1 + u) / 2
    x = 1 + length * (1 + v) / 2
    x_grid, t_grid = np.meshgrid(x, t, indexing="ij")
    kernel = 1 / (x_grid - t_grid) + _image(x_grid, t_grid)
    if cracks == 2:
        kernel -= 1 / (x_grid + t_grid) + _image(x_grid, -t_grid)
    density = np.linalg.solve(kernel * weight * length / 2, stress(x))
    # The value at the tip from the polynomials that belong to the weight.
    k = np.arange(points)
    waves = np.cos((2 * k + 1) * angle[:, None] / 2) / np.cos(angle[:, None] / 2)
    tip = (waves * (weight * density)[:, None]).sum() / np.pi
    return float(abs(tip) * np.pi * np.sqrt(2))
