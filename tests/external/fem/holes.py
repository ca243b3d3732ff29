"""K of through cracks at a hole or in a lug by finite elements: an independent computation.

Published nowhere. Plane strain (the plates) or plane stress (the lugs), nine-node quadrilaterals
with curved sides on rays from the bore, graded towards the crack tip at y = 0, x = R + a, and the
J integral as a domain integral (scikit-fem). Lengths in units of half the width: W/2 = 1.
"""

from collections.abc import Callable

import numpy as np
import scipy.sparse as sp
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.sparse.linalg import splu
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
)
from skfem.helpers import ddot, sym_grad, trace

Floats = NDArray[np.float64]
NU = 0.3
SHEAR = 1 / (2 * (1 + NU))
LAME = {"strain": NU / ((1 + NU) * (1 - 2 * NU)), "stress": NU / (1 - NU**2)}
MODULUS = {"strain": 1 / (1 - NU**2), "stress": 1.0}


def graded(length: float, cells: int, first: float) -> Floats:
    """Marks from 0 to length in a geometric row that begins with a cell of size first."""
    if first * cells >= length:
        return np.linspace(0.0, length, cells + 1)
    ratio = brentq(lambda r: first * (r**cells - 1) / (r - 1) - length, 1.0001, 60.0)
    marks = np.concatenate([[0.0], np.cumsum(first * ratio ** np.arange(cells))])
    marks[-1] = length
    return marks


def plate(
    radius: float, a: float, cracks: int, load: str, height: float = 4.0, fine: int = 1
) -> float:
    """K ÷ (σ √(πa)) of a plate of half width 1, a crack of length a at one or both sides.

    load : "tension" (σ at the ends, free to rotate), "pin-pair" (the pressure of a pin on both
        halves of the bore, σ = P/(2R) per unit thickness)
    """
    end = np.pi / 2 if cracks == 2 else np.pi
    corners = [np.pi / 4] if cracks == 2 else [np.pi / 4, 3 * np.pi / 4]

    def outline(angle: Floats) -> Floats:
        return 1.0 / np.maximum(np.abs(np.cos(angle)), np.abs(np.sin(angle)))

    first = 3e-3 * min(a, 1 - radius - a)
    angles = _angles(end, corners, first / (radius + a), fine)
    mesh = _mesh(radius, a, angles, outline, first, fine, above=(corners, height))
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    if load == "tension":
        top = mesh.facets_satisfying(lambda x: np.isclose(x[1], height), boundaries_only=True)
        force = LinearForm(lambda v, w: v[1]).assemble(
            FacetBasis(mesh, basis.elem, facets=top, intorder=5)
        )
    else:
        # Each half of the bore carries P = 2R σ: ∫ p sin θ R dθ with p = (4σ/π) sin θ.
        force = _bore_pressure(mesh, basis, radius, lambda s: 4 / np.pi * np.abs(s))
    x, y = basis.doflocs
    tiny = 1e-9
    ahead = (np.abs(y) < tiny) & ((x > radius + a - tiny) | (x < 0))
    fixed = np.intersect1d(np.nonzero(ahead)[0], basis.get_dofs().all("u^2"))
    if cracks == 2:
        middle = basis.get_dofs().all("u^1")
        middle = middle[np.abs(x[middle]) < tiny]
    else:
        middle = basis.get_dofs().all("u^1")
        middle = middle[[np.argmin(np.abs(x[middle] + 1.0) + np.abs(y[middle]))]]
    fixed = np.union1d(fixed, middle)
    free = np.setdiff1d(np.arange(basis.N), fixed)
    hold = sp.eye(basis.N, format="csc")[:, free]
    u = _solved(basis, force, hold, "strain")
    reach = min(a, 1 - radius - a)
    j = 2 * _domain_j(basis, u, radius + a, reach, "strain")
    return float(np.sqrt(j * MODULUS["strain"] / (np.pi * a)))


def ring(radius: float, a: float) -> float:
    """K ÷ (σ √(πa)), σ = P/(2R), of a ring of outer radius 1 with two cracks, pressed open by a
    pair of pins: as narrow as a lug, and symmetric."""
    first = 3e-3 * min(a, 1 - radius - a)
    angles = _angles(np.pi / 2, [], first / (radius + a), 1)
    mesh = _mesh(radius, a, angles, np.ones_like, first, 1, above=None)
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    force = _bore_pressure(mesh, basis, radius, lambda s: 4 / np.pi * np.abs(s))
    x, y = basis.doflocs
    up, along = basis.get_dofs().all("u^2"), basis.get_dofs().all("u^1")
    ahead = up[(np.abs(y[up]) < 1e-9) & (x[up] > radius + a - 1e-9)]
    free = np.setdiff1d(np.arange(basis.N), np.union1d(ahead, along[np.abs(x[along]) < 1e-9]))
    u = _solved(basis, force, sp.eye(basis.N, format="csc")[:, free], "strain")
    j = 2 * _domain_j(basis, u, radius + a, min(a, 1 - radius - a), "strain")
    return float(np.sqrt(j * MODULUS["strain"] / (np.pi * a)))


def lug(
    radius: float, a: float, head: float, shape: str = "round", length: float = 4.0, fine: int = 1
) -> float:
    """K ÷ (σ √(πa)), σ = P/(2R) per unit thickness, of a lug of half width 1, one crack square to
    the load; the shank is held by a uniform stress at its far end, the bore carries the cosine
    pressure of a pin towards the head.

    head : bore centre to the free end. shape : "round" (a half circle of radius 1 at the end, its
        centre head − 1 above that of the bore; an ellipse below head = 1) or "square"
    """

    def outline(angle: Floats) -> Floats:
        c, s = np.cos(angle), np.sin(angle)
        with np.errstate(divide="ignore", invalid="ignore"):
            side = 1.0 / np.abs(c)
            down = 1.0 / np.abs(s)
            if shape == "square":
                up = head / np.abs(s)
            elif head >= 1.0:
                d = head - 1.0
                up = d * s + np.sqrt(np.maximum(1.0 - d**2 * c**2, 0.0))
                up = np.where(side * s < d, np.inf, up)
            else:
                up = 1.0 / np.sqrt(c**2 + (s / head) ** 2)
                side = np.where(s > 0, np.inf, side)
        return np.minimum(side, np.where(s > 0, up, down))

    turn = np.arctan(head if shape == "square" else max(head - 1.0, 0.0))
    corners = [turn, np.pi - turn] if turn > 1e-9 else []
    corners += [5 * np.pi / 4, 7 * np.pi / 4]
    first = 3e-3 * min(a, 1 - radius - a)
    angles = _angles(2 * np.pi, corners, first / (radius + a), fine, both=True)
    mesh = _mesh(radius, a, angles, outline, first, fine, above=(corners[-2:], -length))
    basis = Basis(mesh, ElementVector(ElementQuad2()), intorder=5)
    down = mesh.facets_satisfying(lambda x: np.isclose(x[1], -length), boundaries_only=True)
    force = -LinearForm(lambda v, w: v[1]).assemble(
        FacetBasis(mesh, basis.elem, facets=down, intorder=5)
    )
    force *= radius  # P = 2R over the width 2
    force += _bore_pressure(mesh, basis, radius, lambda s: 4 / np.pi * np.maximum(s, 0.0))
    u = _solved(basis, force, _joined(mesh, basis, radius + a), "stress")
    j = _domain_j(basis, u, radius + a, min(a, 1 - radius - a), "stress")
    return float(np.sqrt(j / (np.pi * a)))


def _angles(
    end: float, corners: list[float], first: float, fine: int, both: bool = False
) -> Floats:
    """Rays from 0 to end, graded towards 0 (and towards end), one in each corner of the outline."""
    near = np.pi / 5
    rays = [graded(near, 14 * fine, first)]
    if both:
        rays.append(end - rays[0])
    marks = [near, *[c for c in corners if near < c < (end - near if both else end)]]
    marks.append(end - near if both else end)
    marks = sorted(set(marks) | {m for m in (np.pi / 2, np.pi, 3 * np.pi / 2) if m < marks[-1]})
    for low, high in zip(marks[:-1], marks[1:], strict=True):
        cells = max(2, int(np.ceil((high - low) / (np.pi / 16)))) * fine
        rays.append(np.linspace(low, high, cells + 1))
    inside = [c for c in corners if c <= near or (both and c >= end - near)]
    found = np.sort(np.concatenate([*rays, np.asarray(inside)]))
    keep = np.concatenate([[True], np.diff(found) > 1e-3 * first])
    return np.asarray(found[keep])


def _mesh(radius, a, angles, outline, first, fine, above):  # type: ignore[no-untyped-def]
    """Rays from the bore to the outline, and a strip beyond it between two of its corners."""
    reach = 1.0 - radius
    back = graded(a, 13 * fine, first)
    on = graded(reach - a, 13 * fine, first)
    s = np.unique(np.concatenate([a - back, a + on])) / reach
    s[np.abs(s - 1) < 1e-12] = 1.0
    base = MeshQuad.init_tensor(s, angles)
    far = 1.0
    if above is not None:
        corners, far = above
        strip = 1 + graded(1.0, 6 * fine, 0.15 / (abs(far) - 1.0) / fine)[1:]
        base = MeshQuad.init_tensor(np.concatenate([s, strip]), angles)
        middle = base.p[:, base.t].mean(1)
        high = corners[1] if len(corners) > 1 else angles[-1]
        outside = (middle[0] > 1) & ((middle[1] < corners[0]) | (middle[1] > high))
        base = base.remove_elements(np.nonzero(outside)[0])
    quadratic = MeshQuad2.from_mesh(base)
    p, angle = quadratic.doflocs
    r = radius + np.minimum(p, 1.0) * (outline(angle) - radius)
    x, y = r * np.cos(angle), r * np.sin(angle)
    sign = np.sign(far)
    y = np.where(p > 1, sign * (1 + (p - 1) * (abs(far) - 1)), y)
    # On the rays along the crack plane rounding would part the two faces.
    y = np.where(np.isclose(np.abs(np.sin(angle)), 0.0, atol=1e-15 + 1e-6 * first), 0.0, y)
    return MeshQuad2(np.array([x, y]), quadratic.t)


def _bore_pressure(mesh, basis, radius, pressure: Callable[[Floats], Floats]):  # type: ignore[no-untyped-def]
    """Forces of a pressure on the bore, given by the sine of the angle from the crack plane."""
    bore = mesh.facets_satisfying(
        lambda x: x[0] ** 2 + x[1] ** 2 < radius**2 * (1 + 1e-9), boundaries_only=True
    )

    def form(v, w):  # type: ignore[no-untyped-def]
        sine = w.x[1] / np.hypot(w.x[0], w.x[1])
        return -pressure(sine) * (w.n[0] * v[0] + w.n[1] * v[1])

    return LinearForm(form).assemble(FacetBasis(mesh, basis.elem, facets=bore, intorder=7))


def _joined(mesh, basis, tip):  # type: ignore[no-untyped-def]
    """Unknowns of a body cut open along y = 0, x > R: the cut is closed ahead of the tip, and the
    body is held against moving and turning at the far end of its shank."""
    n = basis.N
    x, y = basis.doflocs
    target = np.arange(n)
    for name in ("u^1", "u^2"):
        dofs = basis.get_dofs().all(name)
        cut = dofs[(np.abs(y[dofs]) < 1e-12) & (x[dofs] > tip - 1e-12)]
        order = cut[np.argsort(x[cut])]
        same = np.isclose(x[order][1:], x[order][:-1], rtol=0, atol=1e-10)
        target[order[1:][same]] = order[:-1][same]
    u1, u2 = basis.get_dofs().all("u^1"), basis.get_dofs().all("u^2")
    far = y.min()
    bottom1 = u1[np.isclose(y[u1], far)]
    bottom2 = u2[np.isclose(y[u2], far)]
    fixed = {
        int(bottom1[np.argmin(np.abs(x[bottom1]))]),
        int(bottom2[np.argmin(x[bottom2])]),
        int(bottom2[np.argmax(x[bottom2])]),
    }
    # Two forces hold what is in balance already: they come out nil.
    keep = np.asarray([k for k in np.unique(target) if k not in fixed])
    place = -np.ones(n, dtype=int)
    place[keep] = np.arange(len(keep))
    rows = np.nonzero(place[target] >= 0)[0]
    return sp.csc_matrix((np.ones(len(rows)), (rows, place[target[rows]])), shape=(n, len(keep)))


def _solved(basis, force, hold, plane):  # type: ignore[no-untyped-def]
    @BilinearForm
    def stiffness(u, v, w):  # type: ignore[no-untyped-def]
        e, g = sym_grad(u), sym_grad(v)
        return LAME[plane] * trace(e) * trace(g) + 2 * SHEAR * ddot(e, g)

    matrix = (hold.T @ stiffness.assemble(basis) @ hold).tocsc()
    return hold @ splu(matrix).solve(hold.T @ force)


def _domain_j(basis, u, tip, reach, plane):  # type: ignore[no-untyped-def]
    scalar = basis.with_element(ElementQuad2())
    distance = np.maximum(np.abs(scalar.doflocs[0] - tip), np.abs(scalar.doflocs[1])) / reach
    q = np.clip((0.3 - distance) / 0.21, 0.0, 1.0)
    lame = LAME[plane]

    @Functional
    def domain_j(w):  # type: ignore[no-untyped-def]
        g = w["u"].grad
        e = 0.5 * (g + np.swapaxes(g, 0, 1))
        s = 2 * SHEAR * e
        s[0, 0] += lame * (e[0, 0] + e[1, 1])
        s[1, 1] += lame * (e[0, 0] + e[1, 1])
        dq, energy = w["q"].grad, 0.5 * (s * e).sum((0, 1))
        return (s[0, 0] * g[0, 0] + s[1, 0] * g[1, 0] - energy) * dq[0] + (
            s[0, 1] * g[0, 0] + s[1, 1] * g[1, 0]
        ) * dq[1]

    return domain_j.assemble(basis, u=basis.interpolate(u), q=scalar.interpolate(q))
