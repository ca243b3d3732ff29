"""K of one or two cracks at a round hole in a strip, by plane finite elements.

An independent computation, published nowhere. Lines run from the hole's wall to the strip's edges,
so that near the tip cells are square and equal ahead of and behind it. Radius of the hole 1; the
upper half is modelled, for two cracks the right half of it.
"""

import numpy as np
from skfem import (
    Basis,
    BilinearForm,
    ElementQuad2,
    ElementVector,
    FacetBasis,
    Functional,
    LinearForm,
    MeshQuad,
    MeshQuad2,
    condense,
    solve,
)
from skfem.helpers import ddot, sym_grad, trace

from .plane import LAME, NU, SHEAR, _graded

HEIGHT = 3.0  # half the strip's length over its half width


def factor(length: float, half_width: float, cracks: int, load: str, cells: int = 14) -> float:
    """K ÷ √(πL) for L = ``length``, lengths over the hole's radius.

    cells : ahead of and behind the tip; the relative error falls from 0.5 % at 14
    load : "tension", unit stress at the far ends; "pin pair", pressure |sin θ| on the hole's wall
    """
    tip = length / (half_width - 1.0)
    first = 4e-3 * min(tip, 1.0 - tip)
    ps = np.unique(
        np.concatenate([tip - _graded(tip, cells, first), tip + _graded(1.0 - tip, cells, first)])
    )
    thetas = _angles(first * (half_width - 1.0) / (1.0 + length), cracks, cells + 2)
    mesh, reference = _mesh(ps, thetas, half_width)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=6)
    scalar = basis.with_element(ElementQuad2())
    p, theta = _at_nodes(reference, scalar)

    @BilinearForm
    def stiffness(u, v, w):  # type: ignore[no-untyped-def]
        e, g = sym_grad(u), sym_grad(v)
        return LAME * trace(e) * trace(g) + 2 * SHEAR * ddot(e, g)

    fixed = _fixed(scalar, p, theta, tip, cracks)
    u = solve(*condense(stiffness.assemble(basis), _force(mesh, load, half_width), D=fixed))
    reach = 0.4 * min(tip, 1.0 - tip)
    turn = reach * (half_width - 1.0) / (1.0 + length)
    distance = np.maximum(np.abs(p - tip) / reach, theta / turn)
    q = np.clip((1.0 - distance) / 0.7, 0.0, 1.0)
    j = 2 * _domain_j.assemble(basis, u=basis.interpolate(u), q=scalar.interpolate(q))
    return float(np.sqrt(j / (1 - NU**2)) / np.sqrt(np.pi * length))


def _angles(first: float, cracks: int, cells: int) -> np.ndarray:
    """From the crack round the hole, with a line into each corner of the strip."""
    corner, few = np.arctan(HEIGHT), max(4, cells // 4)
    ends = np.linspace(corner, np.pi / 2, few + 1)[1:]
    if cracks == 1:
        beyond = np.linspace(np.pi / 2, np.pi - corner, few + 1)[1:]
        ends = np.concatenate([ends, beyond, np.linspace(np.pi - corner, np.pi, 2 * few + 1)[1:]])
    return np.concatenate([_graded(corner, cells, first), ends])


def _mesh(ps, thetas, half_width):  # type: ignore[no-untyped-def]
    """The mesh, and the same in (p, θ): p from 0 at the wall to 1 at the strip's edge."""
    flat = MeshQuad2.from_mesh(MeshQuad.init_tensor(ps, thetas))
    p, theta = flat.doflocs
    with np.errstate(divide="ignore"):
        edge = np.minimum(
            half_width / np.maximum(np.abs(np.cos(theta)), 1e-300),
            HEIGHT * half_width / np.maximum(np.sin(theta), 1e-300),
        )
    r = 1.0 + p * (edge - 1.0)
    return MeshQuad2(np.array([r * np.cos(theta), r * np.sin(theta)]), flat.t), flat


def _at_nodes(reference, scalar):  # type: ignore[no-untyped-def]
    """(p, θ) of each node: the two meshes number their nodes alike."""
    return Basis(reference, ElementQuad2(), intorder=2).doflocs


def _fixed(scalar, p, theta, tip, cracks):  # type: ignore[no-untyped-def]
    small = 1e-9
    ahead = (theta < small) & (p > tip - small)
    if cracks == 2:
        middle = np.abs(theta - np.pi / 2) < small
        return np.concatenate([2 * np.flatnonzero(ahead) + 1, 2 * np.flatnonzero(middle)])
    back = np.abs(theta - np.pi) < small
    corner = np.flatnonzero(back & (p > 1 - small))
    return np.concatenate([2 * np.flatnonzero(ahead | back) + 1, 2 * corner])


def _force(mesh, load, half_width):  # type: ignore[no-untyped-def]
    top = HEIGHT * half_width
    if load == "tension":
        facets = mesh.facets_satisfying(lambda x: np.isclose(x[1], top))
    else:
        facets = mesh.facets_satisfying(lambda x: np.hypot(x[0], x[1]) < 1.0 + 1e-6)
    facet_basis = FacetBasis(mesh, ElementVector(ElementQuad2()), facets=facets, intorder=6)

    @LinearForm
    def traction(v, w):  # type: ignore[no-untyped-def]
        if load == "tension":
            return v[1]
        r = np.hypot(w.x[0], w.x[1])
        sine = np.abs(w.x[1]) / r
        return sine * (v[0] * w.x[0] + v[1] * w.x[1]) / r

    return traction.assemble(facet_basis)


@Functional
def _domain_j(w):  # type: ignore[no-untyped-def]
    g = w["u"].grad
    e = 0.5 * (g + np.swapaxes(g, 0, 1))
    s = 2 * SHEAR * e
    s[0, 0] += LAME * (e[0, 0] + e[1, 1])
    s[1, 1] += LAME * (e[0, 0] + e[1, 1])
    dq, energy = w["q"].grad, 0.5 * (s * e).sum((0, 1))
    return (s[0, 0] * g[0, 0] + s[1, 0] * g[1, 0] - energy) * dq[0] + (
        s[0, 1] * g[0, 0] + s[1, 1] * g[1, 0]
    ) * dq[1]
