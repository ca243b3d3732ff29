"""K of a crack at the toe of a fillet weld by plane finite elements: published nowhere.

Plane strain, nine-node quadrilaterals on one grid that is graded towards the crack tip and folded
into flanks of 45° above the plate. The plate fills y from 0 to 1 (its thickness is 1), the
attachment stands on it from x = 0 to L, and the crack runs from the toe at x = 0 straight down
through the plate by a. Both faces of the crack are free. K is taken from the J integral, so it
holds what little sliding there is too.
"""

import numpy as np
from numpy.typing import NDArray
from skfem import (
    Basis,
    ElementQuad2,
    ElementVector,
    Functional,
    MeshQuad,
    condense,
    solve,
)

from .plane import LAME, NU, SHEAR, _graded, _stiffness

REACH = 4.0  # plate before and behind the attachment, in thicknesses


def geometry_factor(a: float, attachment: float | None, load: str, both: bool = False) -> float:
    """K ÷ (σ √(πa)) of a toe crack of depth a (plate thickness 1).

    attachment : L, toe to toe; None: a plain plate
    load : "tension", or "bending" with unit stress at the cracked surface
    both : an attachment on the other surface too
    """
    mesh = _mesh(a, attachment, both)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    force = _ends(mesh, basis, load)
    still = _held(basis)
    u = solve(*condense(_stiffness().assemble(basis), force, D=still))
    return _factor(basis, u, a)


def _lines(a: float, attachment: float | None) -> tuple[NDArray[np.float64], ...]:
    first = 2e-4 * min(a, 1.0 - a)
    length = attachment or 1.0
    right = _graded(length / 2.0, 18, first)
    turned = length - _graded(length / 2.0, 10, 1e-3 * length)
    after = length + _graded(REACH, 12, 0.02)
    xs = np.concatenate([-_graded(REACH, 20, first), right, turned, after])
    tip = 1.0 - a
    ys = np.concatenate([tip - _graded(tip, 16, first), tip + _graded(a, 14, first)])
    return np.unique(np.round(xs, 12)), np.unique(np.round(ys, 12))


def _mesh(a: float, attachment: float | None, both: bool) -> MeshQuad:
    xs, ys = _lines(a, attachment)
    leg = 0.0 if attachment is None else attachment / 3.0
    above = np.concatenate([np.linspace(0.0, leg, 7)[1:], np.linspace(leg, 3 * leg, 5)[1:]])
    if attachment is not None:
        near = _graded(leg, 9, 0.02 * leg)[1:]
        above = np.concatenate([near, leg + np.linspace(0.0, 2.0 * leg, 5)[1:]])
        below = -above[::-1] if both else np.empty(0)
        ys = np.concatenate([below, ys, 1.0 + above])
    grid = MeshQuad.init_tensor(xs, ys)
    middle = grid.p[:, grid.t].mean(axis=1)
    on = attachment is not None and (middle[0] > 0.0) & (middle[0] < attachment)
    keep = ((middle[1] > 0.0) & (middle[1] < 1.0)) | on
    p, t = _cut(grid.p, grid.t[:, keep], middle[0, keep] > 0.0, a)
    if attachment is not None:
        p = _folded(p, attachment, leg)
    used, t = np.unique(t, return_inverse=True)
    return MeshQuad(p[:, used], t.reshape(4, -1))


def _cut(p, t, right, a):  # type: ignore[no-untyped-def]
    """Nodes of the crack faces doubled: the elements on the right get their own."""
    tip = 1.0 - a
    face = np.flatnonzero((np.abs(p[0]) < 1e-12) & (p[1] > tip + 1e-9) & (p[1] < 1.0 + 1e-9))
    own = np.arange(p.shape[1])
    own[face] = p.shape[1] + np.arange(len(face))
    t = t.copy()
    t[:, right] = own[t[:, right]]
    return np.concatenate([p, p[:, face]], axis=1), t


def _folded(p, length, leg):  # type: ignore[no-untyped-def]
    """Flanks of 45° up to the leg, upright from there."""
    up = np.where(p[1] > 1.0, p[1] - 1.0, np.where(p[1] < 0.0, -p[1], 0.0))
    lean = np.minimum(up, leg)
    inside = up > 0.0
    x = np.where(inside, lean + p[0] * (length - 2.0 * lean) / length, p[0])
    return np.stack([x, p[1]])


def _ends(mesh, basis, load):  # type: ignore[no-untyped-def]
    """Consistent nodal forces on both ends, in balance."""
    force = basis.zeros()
    for at, sign in ((mesh.p[0].min(), -1.0), (mesh.p[0].max(), 1.0)):
        dofs = basis.get_dofs(mesh.facets_satisfying(lambda x, at=at: np.isclose(x[0], at)))
        end = dofs.all("u^1")
        y = basis.doflocs[1, end]
        end, y = end[np.argsort(y)], np.sort(y)
        stress = np.ones_like(y) if load == "tension" else 2.0 * y - 1.0
        cell = y[2::2] - y[:-2:2]
        s0, s1, s2 = stress[:-2:2], stress[1:-1:2], stress[2::2]
        np.add.at(force, end[:-2:2], sign * cell * (4 * s0 + 2 * s1 - s2) / 30)
        np.add.at(force, end[1:-1:2], sign * cell * (2 * s0 + 16 * s1 + 2 * s2) / 30)
        np.add.at(force, end[2::2], sign * cell * (-s0 + 2 * s1 + 4 * s2) / 30)
    return force


def _held(basis):  # type: ignore[no-untyped-def]
    """Three freedoms at two corners of the far end, against rigid motion alone."""
    x, y = basis.doflocs
    far = np.flatnonzero(np.isclose(x, x.max()) & (np.isclose(y, 0.0) | np.isclose(y, 1.0)))
    low = far[np.isclose(y[far], 0.0)]
    return np.concatenate([low, far[np.isclose(y[far], 1.0)][:1]])


def _factor(basis, u, a):  # type: ignore[no-untyped-def]
    tip, reach = 1.0 - a, min(a, 1.0 - a)
    scalar = basis.with_element(ElementQuad2())
    x, y = scalar.doflocs
    distance = np.maximum(np.abs(x), np.abs(y - tip)) / reach
    q = np.clip((0.3 - distance) / 0.21, 0.0, 1.0)

    @Functional
    def domain_j(w):  # type: ignore[no-untyped-def]
        g = w["u"].grad
        e = 0.5 * (g + np.swapaxes(g, 0, 1))
        s = 2 * SHEAR * e
        s[0, 0] += LAME * (e[0, 0] + e[1, 1])
        s[1, 1] += LAME * (e[0, 0] + e[1, 1])
        dq, energy = w["q"].grad, 0.5 * (s * e).sum((0, 1))
        # The crack runs towards -y.
        along = (s[0, 0] * g[0, 1] + s[1, 0] * g[1, 1]) * dq[0]
        across = (s[0, 1] * g[0, 1] + s[1, 1] * g[1, 1] - energy) * dq[1]
        return -(along + across)

    j = domain_j.assemble(basis, u=basis.interpolate(u), q=scalar.interpolate(q))
    return float(np.sqrt(j / (1 - NU**2)) / np.sqrt(np.pi * a))
