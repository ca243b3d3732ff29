"""K along cracks in cylinders by three-dimensional finite elements, published nowhere.

27-node bricks on a mapped grid (scikit-fem gives shape functions and quadrature), and the J
integral as a domain integral, per node of the front. The half body on one side of the crack plane
is modelled, with symmetry about the middle of the crack. Loads are tractions on the crack faces,
which by superposition give the K of the stress that would act there without the crack.

Plate coordinates (x along the crack, y across its plane, z into the wall from the cracked surface)
are bent into the cylinder by a ``Shape``. E = 1, Poisson's ratio 0.3; lengths in any one unit.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
import scipy.sparse as sp
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.sparse.linalg import splu
from skfem import Basis, ElementHex2, MeshHex
from skfem.mesh import MeshHex2

Floats = NDArray[np.float64]
Load = Callable[[Floats, Floats], Floats]
"""Face pressure at (angle or length along the crack, radius)."""

NU = 0.3
LAME = NU / ((1 + NU) * (1 - 2 * NU))
SHEAR = 1 / (2 * (1 + NU))
PLANE = 1 / (1 - NU**2)
# A quadratic element follows an arc of 30 degrees to 1e-4 of the radius.
ARC = np.pi / 6
_GAUSS, _WEIGHTS = np.polynomial.legendre.leggauss(3)


@dataclass(frozen=True)
class Shape:
    """How plate coordinates become a cylinder.

    girth : the crack runs around; else along the axis
    inside : from the bore; else from the outside
    radius : inner radius; thickness : of the wall
    length : half the length of the cylinder that is modelled
    """

    girth: bool
    inside: bool
    radius: float
    thickness: float
    length: float

    @property
    def surface(self) -> float:
        """Radius of the cracked surface, along which x (girth) or y (axial) is measured."""
        return self.radius if self.inside else self.radius + self.thickness

    @property
    def sizes(self) -> tuple[float, float]:
        """Half the width in x and the height in y of the half body."""
        around = np.pi * self.surface
        return (around, self.length) if self.girth else (self.length, around)

    def at(self, z: Floats) -> Floats:
        """Radius at depth z."""
        return self.surface + z if self.inside else self.surface - z

    def place(self, p: Floats) -> Floats:
        x, y, z = p
        r, sign = self.at(z), 1.0 if self.inside else -1.0
        angle = (x if self.girth else y) / self.surface
        if self.girth:
            return np.array([r * np.sin(angle), y, sign * r * np.cos(angle)])
        return np.array([x, r * np.sin(angle), sign * r * np.cos(angle)])

    def frame(self, p: Floats) -> tuple[Floats, Floats, Floats]:
        """Unit vectors along x and z in the crack plane, and length along x per unit of x."""
        x, _, z = p
        one, nil, sign = np.ones_like(x), np.zeros_like(x), 1.0 if self.inside else -1.0
        if not self.girth:
            return np.array([one, nil, nil]), np.array([nil, nil, one]), one
        angle = x / self.surface
        along = np.array([np.cos(angle), nil, -sign * np.sin(angle)])
        into = np.array([sign * np.sin(angle), nil, np.cos(angle)])
        return along, into, self.at(z) / self.surface


def graded(length: float, cells: int, first: float, most: float = np.inf) -> Floats:
    """Marks from 0 to length, growing from ``first``; no cell longer than ``most``."""
    if first * cells >= length:
        return np.linspace(0.0, length, cells + 1)
    ratio = brentq(lambda r: first * (r**cells - 1) / (r - 1) - length, 1.0 + 1e-9, 60.0)
    marks = np.concatenate([[0.0], np.cumsum(first * ratio ** np.arange(cells))])
    marks[-1] = length
    long = np.flatnonzero(np.diff(marks) > most)
    if len(long):
        start = marks[long[0]]
        rest = np.linspace(start, length, int(np.ceil((length - start) / most)) + 1)
        marks = np.concatenate([marks[: long[0]], rest])
    return marks


@dataclass(frozen=True)
class _Grid:
    """A block of bricks. ``ref`` holds reference coordinates of the nodes, (3, nodes); the crack
    face is y = 0 and ``behind``; ``faces`` are its cells as (faces, 3, 3) node numbers."""

    mesh: Any
    ref: Floats
    plain: Floats
    basis: Any
    faces: NDArray[np.int_]


class Solved:
    """A half body under unit loads on its crack faces."""

    def __init__(self, grid: _Grid, shape: Shape, fixed: Sequence[NDArray[np.int_]]) -> None:
        self.grid, self.shape = grid, shape
        self.at = grid.basis.doflocs
        self.cells = grid.basis.element_dofs
        self.grads = np.array([grid.basis.basis[k][0].grad for k in range(27)])
        self.dx = grid.basis.dx
        if not (self.dx > 0.0).all():
            raise ValueError("the grid is turned inside out somewhere")
        count = self.at.shape[1]
        self.free = np.setdiff1d(np.arange(3 * count), np.unique(np.concatenate(fixed)))
        stiffness = _stiffness(self.grads, self.dx, self.cells, count)
        self.solver = splu(
            stiffness[self.free][:, self.free].tocsc(),
            permc_spec="MMD_AT_PLUS_A",
            diag_pivot_thresh=0.0,
            options={"SymmetricMode": True},
        )

    def displaced(self, load: Load) -> Floats:
        force = np.zeros(3 * self.at.shape[1])
        for ids, shape, _, _, area in self._face_points():
            pressure = self._pressure(load, ids, shape)
            np.add.at(force, 3 * ids + 1, shape * (pressure * area)[:, None, None])
        u = np.zeros_like(force)
        u[self.free] = self.solver.solve(force[self.free])
        return u.reshape(-1, 3)

    def _pressure(self, load: Load, ids: NDArray[np.int_], shape: Floats) -> Floats:
        p = (self.grid.plain[:, ids] * shape).sum((2, 3))
        along = p[0] / self.shape.surface if self.shape.girth else p[0]
        return load(along, self.shape.at(p[2]))

    def _face_points(self):  # type: ignore[no-untyped-def]
        """For each quadrature point: faces' nodes, shape functions, their in-plane derivatives."""
        ids = self.grid.faces
        xy = self.at[:, ids][[0, 2]]
        for u, wu in zip(_GAUSS, _WEIGHTS, strict=True):
            for v, wv in zip(_GAUSS, _WEIGHTS, strict=True):
                shape = np.outer(_l3(u), _l3(v))
                d1, d2 = np.outer(_d3(u), _l3(v)), np.outer(_l3(u), _d3(v))
                jac = np.array([(xy * d1).sum((2, 3)), (xy * d2).sum((2, 3))])
                det = jac[0, 0] * jac[1, 1] - jac[0, 1] * jac[1, 0]
                slopes = (
                    (jac[1, 1][:, None, None] * d1 - jac[0, 1][:, None, None] * d2),
                    (-jac[1, 0][:, None, None] * d1 + jac[0, 0][:, None, None] * d2),
                )
                dx, dz = (s / det[:, None, None] for s in slopes)
                yield ids, shape, dx, dz, np.abs(det) * wu * wv

    def energy_release(self, u: Floats, extension: Floats, load: Load) -> float:
        """∫ J v ds for a virtual extension of the front, (3, nodes)."""
        near = np.flatnonzero((np.abs(extension[:, self.cells]).max(0) > 0).any(0))
        grads, cells, dx = self.grads[:, :, near], self.cells[:, near], self.dx[near]
        du = np.einsum("aien,aej->jien", grads, u[cells], optimize=True)
        strain = 0.5 * (du + du.swapaxes(0, 1))
        stress = 2 * SHEAR * strain
        for i in range(3):
            stress[i, i] += LAME * (strain[0, 0] + strain[1, 1] + strain[2, 2])
        tensor = np.einsum("ijen,jken->iken", stress, du, optimize=True)
        density = 0.5 * (stress * strain).sum((0, 1))
        for i in range(3):
            tensor[i, i] -= density
        dq = np.einsum("aien,jae->jien", grads, extension[:, cells], optimize=True)
        total = 2 * np.einsum("iken,kien,en->", tensor, dq, dx, optimize=True)
        uy = u[:, 1]
        for ids, shape, dx_, dz_, area in self._face_points():
            q = extension[:, ids]
            slope = (uy[ids] * dx_).sum((1, 2)) * (q[0] * shape).sum((1, 2))
            slope += (uy[ids] * dz_).sum((1, 2)) * (q[2] * shape).sum((1, 2))
            total -= 2 * float((self._pressure(load, ids, shape) * slope * area).sum())
        return float(total)


def _l3(t: float) -> Floats:
    return np.array([0.5 * t * (t - 1), 1 - t * t, 0.5 * t * (t + 1)])


def _d3(t: float) -> Floats:
    return np.array([t - 0.5, -2 * t, t + 0.5])


def _stiffness(grads: Floats, dx: Floats, cells: NDArray[np.int_], count: int) -> Any:
    number = cells.shape[1]
    flat = grads.transpose(2, 0, 1, 3).reshape(number, 81, -1)
    product = ((flat * dx[:, None, :]) @ flat.transpose(0, 2, 1)).reshape(number, 27, 3, 27, 3)
    local = LAME * product + SHEAR * product.transpose(0, 1, 4, 3, 2)
    trace = SHEAR * np.einsum("eakbk->eab", product)
    for i in range(3):
        local[:, :, i, :, i] += trace
    index = (3 * cells.T[:, :, None] + np.arange(3)).reshape(number, 81)
    rows, columns = np.repeat(index, 81, axis=1).ravel(), np.tile(index, (1, 81)).ravel()
    size = (3 * count, 3 * count)
    return sp.coo_matrix((local.ravel(), (rows, columns)), shape=size).tocsc()


def _grid(ref_mesh: Any, plate: Callable[[Floats], Floats], shape: Shape, marks: Any) -> _Grid:
    """``plate`` turns reference coordinates into plate coordinates; ``marks`` are the marks of the
    two reference coordinates on the crack plane, the crack being where the first is below 1."""
    second = MeshHex2.from_mesh(ref_mesh)
    mesh = MeshHex2(shape.place(plate(second.doflocs)), second.t)
    basis = Basis(mesh, ElementHex2(), intorder=4)
    ref = Basis(second, ElementHex2(), intorder=4).doflocs
    flat = np.flatnonzero(np.abs(ref[1]) < 1e-9) if len(marks) == 2 else None
    key = {(round(ref[0, k], 9), round(ref[2, k], 9)): k for k in flat}  # type: ignore[union-attr]
    faces = []
    p, s = marks
    for i in np.flatnonzero(p[1:] <= 1 + 1e-9):
        for j in range(len(s) - 1):
            at_p = (p[i], 0.5 * (p[i] + p[i + 1]), p[i + 1])
            at_s = (s[j], 0.5 * (s[j] + s[j + 1]), s[j + 1])
            faces.append([[key[round(a, 9), round(b, 9)] for b in at_s] for a in at_p])
    return _Grid(mesh, ref, plate(ref), basis, np.array(faces))


def _fixed(
    grid: _Grid, shape: Shape, ahead: NDArray[np.bool_], width: float, height: float
) -> list[NDArray[np.int_]]:
    """Symmetry planes, and one node against sliding along z."""
    x, y, _ = grid.plain
    close = 1e-7 * shape.thickness
    fixed = [3 * np.flatnonzero(ahead) + 1, 3 * np.flatnonzero(np.abs(x) < close)]
    if shape.girth:
        fixed.append(3 * np.flatnonzero(np.abs(x - width) < close))
        node = np.argmin(np.abs(x - width) + np.abs(y))
    else:
        fixed.append(3 * np.flatnonzero(np.abs(y - height) < close) + 1)
        node = np.argmin(np.abs(y - height) + np.abs(x))
    return [*fixed, np.array([3 * node + 2])]


def surface_crack(
    a: float,
    c: float,
    shape: Shape,
    loads: Sequence[Load],
    *,
    along: int = 10,
    inner: int = 5,
    outer: int = 6,
    across: int = 9,
    far: int = 4,
    first: float = 0.03,
) -> tuple[Floats, Floats]:
    """(φ in degrees, K of shape (loads, φ)) along a semi-elliptical front, a < c; φ = 90° deepest.

    Confocal coordinates x = √(r² + f²) cos φ, z = r sin φ with f² = c² − a²: r = a is the front and
    the lines across it meet it at right angles. Beyond the fan stands a block of the same wall.
    """
    t, (width, height) = shape.thickness, shape.sizes
    f2 = c * c - a * a
    edge = min(width, c + 1.2 * min(t, 3 * a))

    def to_back(phi: Floats) -> Floats:
        return t / np.sin(np.maximum(phi, 1e-12))

    def to_side(phi: Floats) -> Floats:
        return np.sqrt((edge / np.maximum(np.cos(phi), 1e-12)) ** 2 - f2)

    corner = brentq(lambda phi: to_back(phi) - to_side(phi), 1e-6, np.pi / 2 - 1e-6)
    low = max(2, round(along * corner / (np.pi / 2)))
    high = max(2, along - low)
    phis = np.concatenate(
        [np.linspace(0, corner, low + 1)[:-1], np.linspace(corner, np.pi / 2, high + 1)]
    )
    reach = max(float(to_side(np.array(0.0))) - a, t - a)
    p = [1 - graded(1.0, inner, first)[::-1], 1 + graded(1.0, outer, first * a / reach)]
    beyond = (width - edge) > 1e-9 * width
    if beyond:
        most = ARC * shape.surface / (width - edge) if shape.girth else np.inf
        p.append(2 + graded(1.0, far, min(0.9 / far, (edge - c) / (width - edge) * 0.6), most)[1:])
    ps = np.unique(np.concatenate(p))
    ys = graded(height / a, across, first, np.inf if shape.girth else ARC * shape.surface / a)
    ref_mesh = MeshHex.init_tensor(ps, ys, phis)
    middle = ref_mesh.p[:, ref_mesh.t].mean(1)
    gone = np.flatnonzero((middle[0] > 2) & (middle[2] > corner))
    if len(gone):
        ref_mesh = ref_mesh.remove_elements(gone)

    def plate(ref: Floats) -> Floats:
        s, y, phi = ref
        side = phi <= corner + 1e-12
        end = np.where(side, to_side(np.minimum(phi, corner)), to_back(np.maximum(phi, corner)))
        r = np.where(s <= 1, a * s, a + (np.minimum(s, 2) - 1) * (end - a))
        x = np.sqrt(r * r + f2) * np.cos(phi)
        x = np.where(s > 2, edge + (s - 2) * (width - edge), x)
        return np.array([x, y * a, r * np.sin(phi)])

    grid = _grid(ref_mesh, plate, shape, (ps, phis))
    ahead = (np.abs(grid.ref[1]) < 1e-9) & (grid.ref[0] >= 1 - 1e-9)
    solved = Solved(grid, shape, _fixed(grid, shape, ahead, width, height))
    # The extension is 1 next to the front and falls to nil three cells away.
    tip = int(np.argmin(np.abs(ps - 1)))
    s, y, phi = grid.ref
    rise = np.interp(s, ps[[tip - 3, tip - 1, tip + 1, tip + 3]], [0, 1, 1, 0])
    rise = np.minimum(rise, np.interp(y, ys[[1, 3]], [1, 0]))
    front = np.array([c * np.cos(phi), 0 * phi, a * np.sin(phi)])
    e_x, e_z, _ = shape.frame(grid.plain)
    stretch = shape.frame(front)[2]
    normal = np.array([a * np.cos(phi), c * stretch * np.sin(phi)])
    normal /= np.hypot(*normal)
    direction = rise * (normal[0] * e_x + normal[1] * e_z)
    fine = np.linspace(0, np.pi / 2, 20001)
    line = np.array([c * np.cos(fine), 0 * fine, a * np.sin(fine)])
    ds = np.hypot(c * shape.frame(line)[2] * np.sin(fine), a * np.cos(fine))
    found = []
    for load in loads:
        u = solved.displaced(load)
        row = []
        for hat in np.eye(len(phis)):
            share = np.trapezoid(np.interp(fine, phis, hat) * ds, fine)
            j = solved.energy_release(u, direction * np.interp(phi, phis, hat), load) / share
            row.append(np.sign(j) * np.sqrt(abs(j) * PLANE))
        found.append(row)
    return np.degrees(phis), np.array(found) * 1.0


def through_crack(
    c: float,
    shape: Shape,
    loads: Sequence[Load],
    *,
    behind: int = 8,
    before: int = 10,
    across: int = 11,
    layers: int = 3,
    first: float = 0.02,
) -> tuple[Floats, Floats]:
    """(z/t, K of shape (loads, z)) of a through crack of half length c along the cracked surface.

    A grid graded towards the straight front; z runs through the wall.
    """
    t, (width, height) = shape.thickness, shape.sizes
    unit = min(c, t)
    arc = ARC * shape.surface
    back = c - graded(c, behind, first * unit, arc if shape.girth else np.inf)[::-1]
    ahead_of = c + graded(width - c, before, first * unit, arc if shape.girth else np.inf)
    xs = np.unique(np.concatenate([back, ahead_of]))
    ps, scale = xs / c, c
    ys = graded(height, across, first * unit, np.inf if shape.girth else arc)
    zs = np.linspace(0, t, layers + 1)
    ref_mesh = MeshHex.init_tensor(ps, ys, zs)

    def plate(ref: Floats) -> Floats:
        return np.array([ref[0] * scale, ref[1], ref[2]])

    grid = _grid(ref_mesh, plate, shape, (ps, zs))
    ahead = (np.abs(grid.ref[1]) < 1e-9) & (grid.ref[0] >= 1 - 1e-9)
    solved = Solved(grid, shape, _fixed(grid, shape, ahead, width, height))
    tip = int(np.argmin(np.abs(ps - 1)))
    s, y, z = grid.ref
    rise = np.interp(s, ps[[tip - 3, tip - 1, tip + 1, tip + 3]], [0, 1, 1, 0])
    rise = np.minimum(rise, np.interp(y, ys[[1, 3]], [1, 0]))
    direction = rise * shape.frame(grid.plain)[0]
    fine = np.linspace(0, t, 2001)
    found = []
    for load in loads:
        u = solved.displaced(load)
        row = []
        for hat in np.eye(len(zs)):
            share = np.trapezoid(np.interp(fine, zs, hat), fine)
            j = solved.energy_release(u, direction * np.interp(z, zs, hat), load) / share
            row.append(np.sign(j) * np.sqrt(abs(j) * PLANE))
        found.append(row)
    return zs / t, np.array(found)
