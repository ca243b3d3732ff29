"""K along corner cracks at a hole by three-dimensional finite elements, published nowhere.

A disc of thickness t with a hole; two equal corner cracks opposite each other (a quarter disc) or
one (half a disc). Bricks of 27 nodes on coordinates that follow the crack front (confocal ellipses)
and turn about the hole's axis; the J integral as a domain integral at each node ring of the front.
Elastic constants E = 1, ν = 0.3.
"""

from dataclasses import dataclass

import numpy as np
import scipy.sparse as sp
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.sparse.linalg import splu
from skfem import Basis, ElementHex2, FacetBasis, LinearForm, MeshHex
from skfem.mesh import MeshHex2

from .holes import graded

Floats = NDArray[np.float64]
NU = 0.3
LAME = NU / ((1 + NU) * (1 - 2 * NU))
SHEAR = 1 / (2 * (1 + NU))


@dataclass(frozen=True)
class Corner:
    """All lengths in one unit. rim : radius of the disc."""

    a: float
    c: float
    t: float
    radius: float
    rim: float
    cracks: int = 2

    def __post_init__(self) -> None:
        if not self.a < self.t or not self.c < self.rim - self.radius or self.a == self.c:
            raise ValueError("a through crack or an exact quarter circle has no mesh here")


def front_factors(
    crack: Corner,
    cells: tuple[int, int, int, int] = (8, 6, 6, 9),
    loads: tuple[str, ...] = ("tension", "pin-pair"),
) -> tuple[Floats, dict[str, Floats]]:
    """Angles φ (0: end along the width, 90° : end along the bore) and, by load, K ÷ (σ √(πa)).

    "tension": uniaxial σ on the rim; "pin-pair": pressure (4σ/π) |sin θ| on the bore.
    """
    mesh, refs, marks = _mesh(crack, cells)
    basis = Basis(mesh, ElementHex2(), intorder=4)
    stiffness, gradients = _stiffness(basis)
    free = _free(basis, refs, crack)
    factor = splu(
        stiffness[free][:, free].tocsc(),
        permc_spec="MMD_AT_PLUS_A",
        diag_pivot_thresh=0.0,
        options={"SymmetricMode": True},
    )
    found = {}
    for load in loads:
        u = np.zeros(3 * basis.N)
        u[free] = factor.solve(_force(mesh, basis, refs, crack, marks, load)[free])
        k = _k_along(basis, refs, gradients, u.reshape(-1, 3), crack, marks)
        found[load] = k / np.sqrt(np.pi * crack.a)
    return np.degrees(marks[1]), found


def _mesh(crack, cells):  # type: ignore[no-untyped-def]
    """Coordinates p (1 on the front, 2 at the end of the fan), φ, θ; rows of their marks."""
    n_phi, n_in, n_out, n_turn = cells
    a, c, t = crack.a, crack.c, crack.t
    # Semi-axes squared along width and thickness beyond the shorter one's: one of them is nil.
    along, deep = max(c * c - a * a, 0.0), max(a * a - c * c, 0.0)
    short = min(a, c)
    first = 0.03
    fan = min(crack.rim - crack.radius, c + 1.2 * min(t, 3 * a))

    def to_face(phi):  # type: ignore[no-untyped-def]
        return np.sqrt((t / np.sin(np.maximum(phi, 1e-12))) ** 2 - deep)

    def to_side(phi):  # type: ignore[no-untyped-def]
        return np.sqrt((fan / np.maximum(np.cos(phi), 1e-12)) ** 2 - along)

    turn = brentq(lambda f: to_face(f) - to_side(f), 1e-6, np.pi / 2 - 1e-6)
    low = min(n_phi - 2, max(2, round(n_phi * turn / (np.pi / 2))))
    phis = np.concatenate(
        [np.linspace(0, turn, low + 1)[:-1], np.linspace(turn, np.pi / 2, n_phi - low + 1)]
    )
    inner = 1 - graded(1.0, n_in, first)[::-1]
    longest = max(to_side(0.0) - short, to_face(np.pi / 2) - short)
    outer = 1 + graded(1.0, n_out, first * short / longest)
    beyond = np.array([])
    if crack.rim - crack.radius > fan:
        step = 0.25 * (fan - c) / (crack.rim - crack.radius - fan)
        beyond = 2 + graded(1.0, 5, step)[1:]
    ps = np.unique(np.concatenate([inner, outer, beyond]))
    end = np.pi / 2 * (1 if crack.cracks == 2 else 2)
    thetas = graded(
        end,
        n_turn * (1 if crack.cracks == 2 else 2) - (crack.cracks == 1) * 3,
        first * short / (crack.radius + c),
    )
    reference = MeshHex.init_tensor(ps, phis, thetas)
    middle = reference.p[:, reference.t].mean(1)
    reference = reference.remove_elements(np.nonzero((middle[0] > 2) & (middle[1] > turn))[0])
    quadratic = MeshHex2.from_mesh(reference)
    p, phi, theta = quadratic.doflocs
    below = phi <= turn + 1e-12
    edge = np.where(below, to_side(np.minimum(phi, turn)), to_face(np.maximum(phi, turn)))
    r = np.where(p <= 1, short * p, short + (np.minimum(p, 2) - 1) * (edge - short))
    x = np.sqrt(r * r + along) * np.cos(phi)
    x = np.where(p > 2, fan + (p - 2) * (crack.rim - crack.radius - fan), x)
    z = np.sqrt(r * r + deep) * np.sin(phi)
    place = np.array([(crack.radius + x) * np.cos(theta), (crack.radius + x) * np.sin(theta), z])
    mesh = MeshHex2(place, quadratic.t)
    refs = Basis(quadratic, ElementHex2(), intorder=2).doflocs
    return mesh, refs, (ps, phis, thetas)


def _stiffness(basis):  # type: ignore[no-untyped-def]
    gradients = np.array([basis.basis[k][0].grad for k in range(27)])
    cells = basis.element_dofs.shape[1]
    flat = gradients.transpose(2, 0, 1, 3).reshape(cells, 81, -1)
    if basis.dx.min() <= 0:
        raise ValueError("a cell is turned inside out")
    products = ((flat * basis.dx[:, None, :]) @ flat.transpose(0, 2, 1)).reshape(
        cells, 27, 3, 27, 3
    )
    local = LAME * products + SHEAR * products.transpose(0, 1, 4, 3, 2)
    laplace = SHEAR * np.einsum("eakbk->eab", products)
    for i in range(3):
        local[:, :, i, :, i] += laplace
    index = (3 * basis.element_dofs.T[:, :, None] + np.arange(3)).reshape(cells, 81)
    rows, columns = np.repeat(index, 81, axis=1).ravel(), np.tile(index, (1, 81)).ravel()
    size = 3 * basis.N
    matrix = sp.coo_matrix((local.ravel(), (rows, columns)), shape=(size, size)).tocsc()
    return matrix, gradients


def _free(basis, refs, crack):  # type: ignore[no-untyped-def]
    p, phi, theta = refs
    z = basis.doflocs[2]
    end = np.pi / 2 * (1 if crack.cracks == 2 else 2)
    ahead = (theta < 1e-12) & (p >= 1 - 1e-9)
    last = theta > end - 1e-9
    fixed = [3 * np.nonzero(ahead)[0] + 1]
    if crack.cracks == 2:
        fixed.append(3 * np.nonzero(last)[0])
    else:
        fixed.append(3 * np.nonzero(last)[0] + 1)
        fixed.append(np.array([3 * np.argmax(p + 10 * theta)]))
    # One point held along the thickness, and turning about y held by the symmetry or a second.
    rim = np.nonzero(last & (p > p.max() - 1e-9) & (phi < 1e-9))[0]
    fixed.append(np.array([3 * rim[np.argmin(z[rim])] + 2]))
    other = np.nonzero((theta < 1e-12) & (p > p.max() - 1e-9) & (phi < 1e-9))[0]
    if crack.cracks == 1:
        fixed.append(np.array([3 * other[np.argmin(z[other])] + 2]))
    return np.setdiff1d(np.arange(3 * basis.N), np.unique(np.concatenate(fixed)))


def _force(mesh, basis, refs, crack, marks, load):  # type: ignore[no-untyped-def]
    force = np.zeros(3 * basis.N)
    if load == "tension":
        facets = mesh.boundary_facets()
        corners = np.hypot(*mesh.p[:2, mesh.facets[:, facets]])
        facets = facets[np.all(np.abs(corners - crack.rim) < 1e-9 * crack.rim, axis=0)]
        faces = FacetBasis(mesh, basis.elem, facets=facets, intorder=5)
        force[1::3] = LinearForm(lambda v, w: w.n[1] * v).assemble(faces)
        return force
    for face in _bore_faces(refs, crack, marks):
        _press(force, basis.doflocs[:, face], face)
    return force


def _bore_faces(refs, crack, marks):  # type: ignore[no-untyped-def]
    """Nine nodes of each face on the bore; a face may end in a point, so it is integrated here."""
    ps, phis, thetas = marks
    at = {tuple(np.round(one, 9)): k for k, one in enumerate(refs.T)}

    def three(row, i):  # type: ignore[no-untyped-def]
        return row[i], (row[i] + row[i + 1]) / 2, row[i + 1]

    def nodes(points):  # type: ignore[no-untyped-def]
        return np.array([[at[tuple(np.round(one, 9))] for one in line] for line in points])

    for j in range(len(thetas) - 1):
        for i in range(int(np.argmin(np.abs(ps - 2)))):
            yield nodes([[(p, np.pi / 2, th) for th in three(thetas, j)] for p in three(ps, i)])
        if crack.a > crack.c:
            for i in range(len(phis) - 1):
                yield nodes([[(0.0, f, th) for th in three(thetas, j)] for f in three(phis, i)])


def _press(force, place, face):  # type: ignore[no-untyped-def]
    """Adds the pressure (4/π) |sin θ| on one face of nine nodes."""
    points, weights = np.polynomial.legendre.leggauss(3)

    def shape(s):  # type: ignore[no-untyped-def]
        return np.array([s * (s - 1) / 2, 1 - s * s, s * (s + 1) / 2])

    def slope(s):  # type: ignore[no-untyped-def]
        return np.array([s - 0.5, -2 * s, s + 0.5])

    for u, wu in zip(points, weights, strict=True):
        for v, wv in zip(points, weights, strict=True):
            n = np.outer(shape(u), shape(v))
            du = (place * np.outer(slope(u), shape(v))).sum((1, 2))
            dv = (place * np.outer(shape(u), slope(v))).sum((1, 2))
            x, y = (place[:2] * n).sum((1, 2))
            r = np.hypot(x, y)
            size = 4 / np.pi * abs(y) / r * np.linalg.norm(np.cross(du, dv)) * wu * wv
            np.add.at(force, 3 * face.ravel(), size * x / r * n.ravel())
            np.add.at(force, 3 * face.ravel() + 1, size * y / r * n.ravel())


def _k_along(basis, refs, gradients, u, crack, marks):  # type: ignore[no-untyped-def]
    ps, phis, thetas = marks
    p, phi, theta = refs
    tip = int(np.argmin(np.abs(ps - 1)))
    inside = np.clip((p - ps[tip - 3]) / (ps[tip - 1] - ps[tip - 3]), 0, 1)
    outside = np.clip((ps[tip + 3] - p) / (ps[tip + 3] - ps[tip + 1]), 0, 1)
    above = np.clip((thetas[3] - theta) / (thetas[3] - thetas[1]), 0, 1)
    weight = np.minimum(np.where(p < 1, inside, outside), above)
    near = np.nonzero((weight[basis.element_dofs] > 0).any(0))[0]
    g, dofs, dx = gradients[:, :, near], basis.element_dofs[:, near], basis.dx[near]
    du = np.einsum("aien,aej->jien", g, u[dofs].transpose(0, 1, 2))
    strain = 0.5 * (du + du.swapaxes(0, 1))
    stress = 2 * SHEAR * strain
    for i in range(3):
        stress[i, i] += LAME * (strain[0, 0] + strain[1, 1] + strain[2, 2])
    momentum = np.einsum("ijen,jken->iken", stress, du)
    energy = 0.5 * (stress * strain).sum((0, 1))
    for i in range(3):
        momentum[i, i] -= energy
    nx, nz = np.cos(phi) * crack.a / crack.c, np.sin(phi)
    size = np.hypot(nx, nz)
    normal = np.array([nx / size, 0 * nx, nz / size])
    fine = np.linspace(0, np.pi / 2, 20001)
    arc = np.hypot(crack.c * np.sin(fine), crack.a * np.cos(fine))
    k = []
    for one in np.eye(len(phis)):
        q = weight * np.interp(phi, phis, one) * normal
        dq = np.einsum("aien,jae->jien", g, q[:, dofs])
        j = 2 * np.einsum("iken,kien,en->", momentum, dq, dx)
        k.append(
            np.sqrt(
                max(j, 0.0) / (1 - NU**2) / np.trapezoid(np.interp(fine, phis, one) * arc, fine)
            )
        )
    return np.asarray(k)
