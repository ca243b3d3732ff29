"""K of cracks of endless length in a tube by plane finite elements, published nowhere.

Two ends of the three-dimensional cases: a crack along the whole of the axis (a ring in plane
strain) and one all the way around (a body of revolution). Nine-node quadrilaterals on a grid
graded towards the tip; K from the energy released between two neighbouring depths, so that no
integral around the tip is needed. Loads are tractions on the crack faces. E = 1, ν = 0.3.
"""

from collections.abc import Callable
from typing import Any

import numpy as np
from numpy.typing import NDArray
from skfem import Basis, BilinearForm, ElementQuad2, ElementVector, MeshQuad, condense, solve
from skfem.helpers import ddot, sym_grad, trace
from skfem.mesh import MeshQuad2

from .solid_wall import ARC, LAME, NU, SHEAR, graded

Floats = NDArray[np.float64]
Traction = Callable[[Floats], Floats]
STEP = 0.01


def along(a: float, t: float, radius: float, inside: bool, load: Traction) -> float:
    """K of a crack of depth a along the axis of an endless tube. load : face pressure at r."""
    return _from_energy(lambda depth: _ring(depth, t, radius, inside, load), a)


def around(a: float, t: float, radius: float, inside: bool, load: Traction) -> float:
    """K of a crack of depth a all the way around a tube that is long. load : face pressure at r."""
    tip = radius + a if inside else radius + t - a
    energy = _from_energy(lambda depth: _revolved(depth, t, radius, inside, load), a)
    return float(energy / np.sqrt(2 * np.pi * tip))


def _from_energy(energy: Callable[[float], float], a: float) -> float:
    """√(2 E' dU/da), U the energy of the half body."""
    more, less = energy(a * (1 + STEP)), energy(a * (1 - STEP))
    return float(np.sqrt(2 * (more - less) / (2 * STEP * a) / (1 - NU**2)))


def _depths(a: float, t: float) -> Floats:
    first = 1e-3 * min(a, t - a)
    return np.unique(np.concatenate([a - graded(a, 12, first), a + graded(t - a, 12, first)]))


def _ring(a: float, t: float, radius: float, inside: bool, load: Traction) -> float:
    surface, sign = (radius, 1.0) if inside else (radius + t, -1.0)
    height = np.pi * surface
    zs, ys = _depths(a, t), graded(height, 16, 1e-3 * min(a, t - a), 0.5 * ARC * surface)
    plain = MeshQuad2.from_mesh(MeshQuad.init_tensor(zs, ys))
    r, angle = surface + sign * plain.doflocs[0], plain.doflocs[1] / surface
    mesh = MeshQuad2(np.array([sign * r * np.cos(angle), r * np.sin(angle)]), plain.t)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)

    @BilinearForm
    def stiffness(u, v, w):  # type: ignore[no-untyped-def]
        e, g = sym_grad(u), sym_grad(v)
        return LAME * trace(e) * trace(g) + 2 * SHEAR * ddot(e, g)

    x, y = basis.doflocs
    first, second = _components(basis)
    flat = np.abs(y) < 1e-9 * t
    near, far = flat & (sign * x > 0), flat & (sign * x < 0)
    depth = np.where(near, sign * (np.abs(x) - surface), np.inf)
    fixed = np.concatenate(
        [
            np.flatnonzero(second & near & (depth > a * (1 - 1e-9))),
            np.flatnonzero(second & far),
            np.flatnonzero(first & far)[:1],
        ]
    )
    face = np.flatnonzero(second & near & (depth < a * (1 + 1e-9)))
    return _energy(basis, stiffness, fixed, face, np.abs(x[face]), load, lambda r: np.ones_like(r))


def _revolved(a: float, t: float, radius: float, inside: bool, load: Traction) -> float:
    length = 8 * np.sqrt((radius + t) * t)
    zs = _depths(a, t)
    rs = radius + zs if inside else np.sort(radius + t - zs)
    mesh = MeshQuad.init_tensor(rs, graded(length, 18, 1e-3 * min(a, t - a)))
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)

    @BilinearForm
    def stiffness(u, v, w):  # type: ignore[no-untyped-def]
        r = w.x[0]
        e, g, hoop, other = sym_grad(u), sym_grad(v), u[0] / r, v[0] / r
        both = LAME * (trace(e) + hoop) * (trace(g) + other)
        return 2 * np.pi * r * (both + 2 * SHEAR * (ddot(e, g) + hoop * other))

    r, z = basis.doflocs
    _, second = _components(basis)
    flat = second & (np.abs(z) < 1e-9 * t)
    depth = r - radius if inside else radius + t - r
    fixed = np.flatnonzero(flat & (depth > a * (1 - 1e-9)))
    face = np.flatnonzero(flat & (depth < a * (1 + 1e-9)))
    return _energy(basis, stiffness, fixed, face, r[face], load, lambda r: 2 * np.pi * r)


def _components(basis: Any) -> tuple[NDArray[np.bool_], NDArray[np.bool_]]:
    """Which degrees of freedom are the first and which the second displacement."""
    every = basis.get_dofs(elements=np.arange(basis.mesh.t.shape[1]))
    first, second = np.zeros(basis.N, dtype=bool), np.zeros(basis.N, dtype=bool)
    first[every.all("u^1")], second[every.all("u^2")] = True, True
    return first, second


def _energy(
    basis: Any,
    stiffness: Any,
    fixed: NDArray[np.int_],
    face: NDArray[np.int_],
    at: Floats,
    load: Traction,
    weight: Traction,
) -> float:
    """Half of the work of the face pressure (three Gauss points a cell)."""
    order = np.argsort(at)
    face, at = face[order], at[order]
    force = basis.zeros()
    for i in range(0, len(face) - 2, 2):
        for s, w in zip(*np.polynomial.legendre.leggauss(3), strict=True):
            shape = np.array([0.5 * s * (s - 1), 1 - s * s, 0.5 * s * (s + 1)])
            r = shape @ at[i : i + 3]
            half = 0.5 * (at[i + 2] - at[i])
            force[face[i : i + 3]] += shape * load(r) * weight(r) * half * w
    u = solve(*condense(stiffness.assemble(basis), force, D=fixed))
    return float(0.5 * force @ u)
