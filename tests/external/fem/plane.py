"""K of a crack in a plate by finite elements: an independent computation, published nowhere.

Plane strain, nine-node quadrilaterals on a grid graded towards the tip, equal cells ahead of and
behind it, and the J integral as a domain integral (scikit-fem). The crack lies on y = 0 from x = 0
to a; above it the half body of height H.
"""

from collections.abc import Callable
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.optimize import brentq
from skfem import (
    Basis,
    BilinearForm,
    ElementQuad2,
    ElementVector,
    FacetBasis,
    Functional,
    LinearForm,
    MeshQuad,
    condense,
    solve,
)
from skfem.helpers import ddot, sym_grad, trace

NU = 0.3
LAME = NU / ((1 + NU) * (1 - 2 * NU))
SHEAR = 1 / (2 * (1 + NU))


def _graded(length: float, cells: int, first: float) -> NDArray[np.float64]:
    ratio = brentq(lambda r: first * (r**cells - 1) / (r - 1) - length, 1.0001, 30.0)
    marks = np.concatenate([[0.0], np.cumsum(first * ratio ** np.arange(cells))])
    marks[-1] = length
    return marks


def geometry_factor(kind: str, relative: float, load: str, height: float = 3.0) -> float:
    """K ÷ (σ √(πa)) for a strip of width 1 (half width for "centre" and "both edges").

    kind : "centre" (symmetric about x = 0), "both edges" (symmetric about x = 1), "edge" (free to
        bend) or "held" (an edge crack; the end at y = height moves evenly, its sides free, and σ is
        the force it takes)
    relative : a ÷ width
    load : "tension" (unit stress at y = height) or "bending" (1 − 2x at y = height)
    """
    a = relative
    reach = min(a, 1.0 - a)
    first = 2e-4 * reach
    xs = np.unique(np.concatenate([a - _graded(a, 14, first), a + _graded(1.0 - a, 14, first)]))
    ys = _graded(height, 18, first)
    mesh = MeshQuad.init_tensor(xs, ys)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    stiffness = _stiffness().assemble(basis)
    fixed = _fixed(mesh, basis, a, kind, 1e-3 * first)
    if kind == "held":
        end = basis.get_dofs(mesh.facets_satisfying(lambda x: np.isclose(x[1], height))).all("u^2")
        moved = basis.zeros()
        moved[end] = 1.0
        u = solve(*condense(stiffness, x=moved, D=np.union1d(fixed, end)))
        return _factor_from_j(basis, u, a, reach) / float((stiffness @ u)[end].sum())
    u = solve(*condense(stiffness, _top_load(mesh, basis, height, load), D=fixed))
    return _factor_from_j(basis, u, a, reach)


def factor_of_faces(relative: float, stress: Callable[[Any], Any], height: float = 3.0) -> float:
    """K ÷ √(πa) of an edge crack, ends free, whose faces bear stress(x/a): by superposition that
    of the crack where this stress would act without it."""
    # x from the tip: the mapping back from a facet asks for exact differences there.
    a, reach = relative, min(relative, 1.0 - relative)
    first = 2e-4 * reach
    xs = np.unique(np.concatenate([-_graded(a, 14, first), _graded(1.0 - a, 14, first)]))
    mesh = MeshQuad.init_tensor(xs, _graded(height, 18, first))
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    face = mesh.facets_satisfying(lambda x: (x[1] < 1e-3 * first) & (x[0] < 0.0))
    on_face = FacetBasis(mesh, ElementVector(ElementQuad2()), facets=face, intorder=8)

    @LinearForm
    def pressure(v, w):  # type: ignore[no-untyped-def]
        return stress(1.0 + w.x[0] / a) * v[1]

    fixed = _fixed(mesh, basis, 0.0, "edge", 1e-3 * first, 1.0 - a)
    u = solve(*condense(_stiffness().assemble(basis), pressure.assemble(on_face), D=fixed))

    @Functional
    def given_way(w):  # type: ignore[no-untyped-def]
        q = np.clip((0.3 + w.x[0] / reach) / 0.21, 0.0, 1.0)
        return stress(1.0 + w.x[0] / a) * w["u"].grad[1, 0] * q

    # What the faces bear inside the domain of the integral belongs to it too.
    j = _j(basis, u, 0.0, reach) - 2 * given_way.assemble(on_face, u=on_face.interpolate(u))
    return float(np.sqrt(j / (1 - NU**2)) / np.sqrt(np.pi * a))


def _stiffness():  # type: ignore[no-untyped-def]
    @BilinearForm
    def stiffness(u, v, w):  # type: ignore[no-untyped-def]
        e, g = sym_grad(u), sym_grad(v)
        return LAME * trace(e) * trace(g) + 2 * SHEAR * ddot(e, g)

    return stiffness


def _top_load(mesh, basis, height, load):  # type: ignore[no-untyped-def]
    """Consistent nodal forces of a linear traction, by Simpson's rule on each top edge."""
    top = basis.get_dofs(mesh.facets_satisfying(lambda x: np.isclose(x[1], height))).all("u^2")
    x = basis.doflocs[0, top]
    top, x = top[np.argsort(x)], np.sort(x)
    stress = np.ones_like(x) if load == "tension" else 1.0 - 2.0 * x
    force = basis.zeros()
    cell = x[2::2] - x[:-2:2]
    # The three shape functions against a linear traction: exact for both loads.
    s0, s1, s2 = stress[:-2:2], stress[1:-1:2], stress[2::2]
    np.add.at(force, top[:-2:2], cell * (4 * s0 + 2 * s1 - s2) / 30)
    np.add.at(force, top[1:-1:2], cell * (2 * s0 + 16 * s1 + 2 * s2) / 30)
    np.add.at(force, top[2::2], cell * (-s0 + 2 * s1 + 4 * s2) / 30)
    return force


def _fixed(mesh, basis, a, kind, tolerance, far_side=1.0):  # type: ignore[no-untyped-def]
    ahead = mesh.facets_satisfying(lambda x: (np.abs(x[1]) < tolerance) & (x[0] > a))
    fixed = basis.get_dofs(ahead).all("u^2")
    if kind in ("centre", "both edges"):
        at = 0.0 if kind == "centre" else 1.0
        middle = mesh.facets_satisfying(lambda x: np.abs(x[0] - at) < tolerance)
        return np.union1d(fixed, basis.get_dofs(middle).all("u^1"))
    far = basis.get_dofs(mesh.facets_satisfying(lambda x: np.isclose(x[0], far_side))).all("u^1")
    return np.union1d(fixed, far[[np.argmin(basis.doflocs[1, far])]])


def _factor_from_j(basis, u, a, reach):  # type: ignore[no-untyped-def]
    return float(np.sqrt(_j(basis, u, a, reach) / (1 - NU**2)) / np.sqrt(np.pi * a))


def _j(basis, u, a, reach):  # type: ignore[no-untyped-def]
    scalar = basis.with_element(ElementQuad2())
    distance = np.maximum(np.abs(scalar.doflocs[0] - a), scalar.doflocs[1]) / reach
    q = np.clip((0.3 - distance) / 0.21, 0.0, 1.0)

    @Functional
    def domain_j(w):  # type: ignore[no-untyped-def]
        g = w["u"].grad
        e = 0.5 * (g + np.swapaxes(g, 0, 1))
        s = 2 * SHEAR * e
        s[0, 0] += LAME * (e[0, 0] + e[1, 1])
        s[1, 1] += LAME * (e[0, 0] + e[1, 1])
        dq, energy = w["q"].grad, 0.5 * (s * e).sum((0, 1))
        return (s[0, 0] * g[0, 0] + s[1, 0] * g[1, 0] - energy) * dq[0] + (
            s[0, 1] * g[0, 0] + s[1, 1] * g[1, 0]
        ) * dq[1]

    return 2 * domain_j.assemble(basis, u=basis.interpolate(u), q=scalar.interpolate(q))
