"""K along an elliptical crack front by three-dimensional finite elements: an independent
computation, published nowhere.

A box 0 ≤ x ≤ reach, −below ≤ z ≤ thickness, 0 ≤ y ≤ height above the plane of the crack, with the
ellipse (x/c)² + (z/a)² ≤ 1 open at y = 0. With nothing below, whether x = 0 and z = 0 are planes of
symmetry or free sides makes it a surface crack (x), an inner crack midway (x and z) or a corner
crack (neither); with a part below it is an inner crack anywhere (x = 0 a plane of symmetry).
Twenty-seven-node bricks on a grid of confocal ellipses and hyperbolas, which stand at right angles
to the front; a load on the far end alone, which is free to turn; the J integral as a domain
integral over one front node at a time, read as plane strain (scikit-fem). At a free side, where
the singularity is another one, that reading is a convention: a few per cent.
"""

from dataclasses import dataclass

import numpy as np
import scipy.sparse as sparse
from numpy.typing import NDArray
from scipy.optimize import brentq
from scipy.sparse.linalg import splu
from scipy.special import ellipe
from skfem import Basis, ElementHex2, MeshHex, MeshHex2

NU = 0.3
LAME = NU / ((1 + NU) * (1 - 2 * NU))
SHEAR = 1 / (2 * (1 + NU))
NIL = 1e-9
Array = NDArray[np.float64]


@dataclass(frozen=True)
class Fineness:
    """Cells around a quarter of the front, behind it, ahead of it, along y and in the far part of
    the width; the cell at the front over the smaller half axis; rings of cells that J uses."""

    around: int = 10
    behind: int = 6
    ahead: int = 7
    up: int = 8
    far: int = 4
    first: float = 0.03
    rings: int = 2


FULL = Fineness()
COARSE = Fineness(around=6, behind=4, ahead=5, up=6, far=3, first=0.06, rings=1)


@dataclass(frozen=True)
class Crack:
    """Lengths in any one unit: a along z, c along x."""

    a: float
    c: float
    thickness: float
    reach: float
    height: float
    kind: str  # "surface", "corner" or "inner"
    below: float = 0.0


def boundary_factors(crack: Crack, fineness: Fineness = FULL) -> tuple[Array, Array]:
    """Angles in degrees from the end along x to the end along z (from the lower to the upper end
    where there is a part below), and F in K = σ √(πa/Q) F there, Q = E(k)², shape (2, angles):
    tension, and bending of σ (1 − 2z/thickness)."""
    grid = _Grid(crack, fineness)
    loads = [grid.end_load(lambda z: 1.0 + 0.0 * z)]
    loads.append(grid.end_load(lambda z: 1.0 - 2.0 * z / crack.thickness))
    moved = grid.solve(np.stack(loads, axis=1))
    tension, bending, both = (
        grid.k_along(one.reshape(-1, 3)) for one in (*moved.T, moved.sum(axis=1))
    )
    # J knows no sign: what bending adds to the J of tension has that of K, which may close.
    k = np.stack([tension, (both**2 - tension**2 - bending**2) / (2.0 * tension)])
    small, large = sorted((crack.a, crack.c))
    q = ellipe(1.0 - (small / large) ** 2) ** 2
    return np.degrees(grid.angles), k / np.sqrt(np.pi * crack.a / q)


def _graded(length: float, cells: int, first: float) -> Array:
    """Marks from 0 to length, the first cell given, each next one longer by the same ratio."""
    if first * cells >= length:
        return np.linspace(0.0, length, cells + 1)
    ratio = brentq(lambda r: first * (r**cells - 1) / (r - 1) - length, 1.0 + 1e-9, 60.0)
    marks = np.concatenate([[0.0], np.cumsum(first * ratio ** np.arange(cells))])
    marks[-1] = length
    return marks


def _shapes(t: Array) -> Array:
    return np.array([0.5 * t * (t - 1), 1 - t * t, 0.5 * t * (t + 1)])


def _slopes(t: Array) -> Array:
    return np.array([t - 0.5, -2 * t, t + 0.5])


class _Grid:
    """The grid in (p, φ, y): p from 0 (the focal line) over 1 (the front) to 2 (the end of the
    fan) and 3 (the far side); φ the parametric angle."""

    def __init__(self, crack: Crack, fine: Fineness) -> None:
        self.crack, self.fine = crack, fine
        self.small = min(crack.a, crack.c)
        self.focal = crack.c**2 - crack.a**2
        self.fan = min(crack.reach, crack.c + 1.2 * min(crack.thickness, 3 * crack.a))
        if crack.reach - self.fan < 0.3 * crack.c:
            self.fan = crack.reach
        self.corner = self._corner(crack.thickness)
        self.lower = self._corner(crack.below) if crack.below else 0.0
        self._marks()
        reference = MeshHex.init_tensor(self.p_marks, self.angles, self.y_marks)
        middle = reference.p[:, reference.t].mean(axis=1)
        above = (middle[1] > self.corner) | (middle[1] < -self.lower)
        beyond = np.nonzero((middle[0] > 2) & above)[0]
        if len(beyond):
            reference = reference.remove_elements(beyond)
        curved = MeshHex2.from_mesh(reference)
        mesh = MeshHex2(self._place(curved.doflocs), curved.t)
        self.basis = Basis(mesh, ElementHex2(), intorder=4)
        self.at = Basis(curved, ElementHex2(), intorder=4).doflocs
        self.where = self.basis.doflocs
        self.same = self._sewn()
        self.dofs = self.same[self.basis.element_dofs]
        self.dx = self.basis.dx
        self.grad = np.array([self.basis.basis[k][0].grad for k in range(27)])

    def _r(self, along: Array, other: float, limit: float, angle: Array) -> Array:
        return np.sqrt((limit / np.maximum(along, 1e-12)) ** 2 - other + 0.0 * angle)

    def _corner(self, depth: float) -> float:
        """The angle of the hyperbola through the corner x = fan, z = depth."""
        ends = (1e-6, np.pi / 2 - 1e-6)
        return float(brentq(lambda f: self._to_top(f, depth) - self._to_side(f), *ends))

    def _to_side(self, angle: Array) -> Array:
        """r at which the hyperbola of an angle meets x = fan."""
        return self._r(np.cos(angle), max(self.focal, 0.0), self.fan, angle)

    def _to_top(self, angle: Array, depth: float) -> Array:
        """r at which it meets z = depth."""
        return self._r(np.sin(angle), max(-self.focal, 0.0), depth, angle)

    def _angles(self) -> Array:
        """From the end along x to the end along z, with a mark at each corner of the box."""
        corners = sorted({self.corner, self.lower or self.corner})
        around = self.fine.around
        cells, marks = [], [np.zeros(1)]
        for start, end in zip([0.0, *corners], corners, strict=False):
            share = round(around * (end - start) / (np.pi / 2))
            cells.append(min(max(2, share), around - 2))
        cells.append(max(2, around - sum(cells)))
        for start, end, n in zip([0.0, *corners], [*corners, np.pi / 2], cells, strict=True):
            marks.append(np.linspace(start, end, n + 1)[1:])
        return np.concatenate(marks)

    def _sewn(self) -> NDArray[np.int64]:
        """For each node the one that stands for it: above and below the focal line, which is one
        line for both, the grid would be slit there."""
        p, angle, y = self.at
        same = np.arange(self.basis.N)
        line = np.nonzero(np.abs(p) < NIL)[0]
        node = {(round(angle[k], 9), round(y[k], 9)): k for k in line if angle[k] >= 0}
        for k in line:
            same[k] = node[round(abs(angle[k]), 9), round(y[k], 9)]
        return same

    def _marks(self) -> None:
        fine, crack = self.fine, self.crack
        self.angles = self._angles()
        if crack.below:
            self.angles = np.concatenate([-self.angles[:0:-1], self.angles])
        inner = 1.0 - _graded(1.0, fine.behind, fine.first)[::-1]
        top = self._to_top(np.pi / 2, crack.thickness)
        room = max(self._to_side(0.0), top) - self.small
        outer = 1.0 + _graded(1.0, fine.ahead, fine.first * self.small / room)
        marks = [inner, outer]
        if crack.reach > self.fan:
            step = 0.4 * (self.fan - crack.c) / (crack.reach - self.fan)
            marks.append(2.0 + _graded(1.0, fine.far, min(step, 0.9 / fine.far))[1:])
        self.p_marks = np.unique(np.concatenate(marks))
        self.y_marks = _graded(crack.height / self.small, fine.up, fine.first)

    def _place(self, points: Array) -> Array:
        p, angle, y = points
        depth = np.where(angle < 0, self.crack.below, self.crack.thickness)
        corner, size = np.where(angle < 0, self.lower, self.corner), np.abs(angle)
        end = np.where(
            size <= corner + 1e-12,
            self._to_side(np.minimum(size, corner)),
            self._to_top(np.maximum(size, corner), depth),
        )
        r = np.where(
            p <= 1, self.small * p, self.small + (np.minimum(p, 2) - 1) * (end - self.small)
        )
        x = np.sqrt(r * r + max(self.focal, 0.0)) * np.cos(angle)
        z = np.sqrt(r * r + max(-self.focal, 0.0)) * np.sin(angle)
        x = np.where(p > 2, self.fan + (p - 2) * (self.crack.reach - self.fan), x)
        return np.array([x, y * self.small, z])

    def end_load(self, stress) -> Array:  # type: ignore[no-untyped-def]
        """Forces of a stress along y on the far end, by quadrature on each of its faces."""
        force = np.zeros(3 * self.basis.N)
        points, weights = np.polynomial.legendre.leggauss(3)
        for nodes in self._end_faces():
            xz = self.where[:, nodes][[0, 2]]
            for u, wu in zip(points, weights, strict=True):
                for v, wv in zip(points, weights, strict=True):
                    n = np.outer(_shapes(u), _shapes(v))
                    du = (xz * np.outer(_slopes(u), _shapes(v))).sum((1, 2))
                    dv = (xz * np.outer(_shapes(u), _slopes(v))).sum((1, 2))
                    area = abs(du[0] * dv[1] - du[1] * dv[0]) * wu * wv
                    force[3 * self.same[nodes] + 1] += n * area * stress((xz[1] * n).sum())
        return force

    def _end_faces(self):  # type: ignore[no-untyped-def]
        p, angle, y = self.at
        top = np.nonzero(np.abs(y - self.y_marks[-1]) < NIL)[0]
        node = {(round(p[k], 9), round(angle[k], 9)): k for k in top}
        for i in range(len(self.p_marks) - 1):
            for j in range(len(self.angles) - 1):
                middle = 0.5 * (self.angles[j] + self.angles[j + 1])
                if self.p_marks[i] >= 2 - NIL and not -self.lower < middle < self.corner:
                    continue
                (p0, p1), (f0, f1) = self.p_marks[i : i + 2], self.angles[j : j + 2]
                yield np.array(
                    [
                        [node[round(pp, 9), round(ff, 9)] for ff in (f0, (f0 + f1) / 2, f1)]
                        for pp in (p0, (p0 + p1) / 2, p1)
                    ]
                )

    def solve(self, forces: Array) -> Array:
        used = (3 * np.unique(self.same)[:, None] + np.arange(3)).ravel()
        free = np.setdiff1d(used, self._fixed())
        part = self._stiffness()[free][:, free].tocsc()
        options = {"SymmetricMode": True}
        lu = splu(part, permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.0, options=options)
        moved = np.zeros_like(forces)
        moved[free] = lu.solve(forces[free])
        return moved

    def _stiffness(self) -> sparse.coo_matrix:
        cells = self.dofs.shape[1]
        g = self.grad.transpose(2, 0, 1, 3).reshape(cells, 81, -1)
        m = ((g * self.dx[:, None, :]) @ g.transpose(0, 2, 1)).reshape(cells, 27, 3, 27, 3)
        k = LAME * m + SHEAR * m.transpose(0, 1, 4, 3, 2)
        trace = SHEAR * np.einsum("eakbk->eab", m)
        for i in range(3):
            k[:, :, i, :, i] += trace
        index = (3 * self.dofs.T[:, :, None] + np.arange(3)).reshape(cells, 81)
        rows, columns = np.repeat(index, 81, axis=1).ravel(), np.tile(index, (1, 81)).ravel()
        size = 3 * self.basis.N
        return sparse.coo_matrix((k.ravel(), (rows, columns)), shape=(size, size)).tocsc()

    def _fixed(self) -> NDArray[np.int64]:
        """The ligament in y, planes of symmetry, and else just what keeps the body in place."""
        p, _, y = self.at
        x, z = self.where[0], self.where[2]
        near = NIL * self.crack.height
        fixed = [3 * np.nonzero((np.abs(y) < NIL) & (p >= 1 - NIL))[0] + 1]
        ground = np.abs(y) < NIL

        def one_at(px: float, pz: float) -> int:
            return int(np.argmin(np.where(ground, np.hypot(x - px, z - pz), np.inf)))

        far_x, far_z = self.crack.reach, self.crack.thickness
        if self.crack.kind in ("surface", "inner"):
            fixed.append(3 * np.nonzero(np.abs(x) < near)[0])
        else:
            fixed.append(np.array([3 * one_at(far_x, 0.0), 3 * one_at(far_x, far_z)]))
        if self.crack.kind == "inner" and not self.crack.below:
            fixed.append(3 * np.nonzero(np.abs(z) < near)[0] + 2)
        else:
            fixed.append(np.array([3 * one_at(far_x, 0.0) + 2]))
        return np.unique(np.concatenate(fixed))

    def k_along(self, moved: Array) -> Array:
        """K at each node of the front: J over a hat of its own, as plane strain."""
        p, angle, y = self.at
        rings = self.fine.rings
        front = int(np.searchsorted(self.p_marks, 1 - NIL))
        inner, outer = self.p_marks[front - rings - 1], self.p_marks[front + rings + 1]
        inner_1, outer_1 = self.p_marks[front - 1], self.p_marks[front + 1]
        up, up_1 = self.y_marks[rings + 1], self.y_marks[1]
        fall = np.minimum(
            np.where(
                p < 1,
                np.clip((p - inner) / (inner_1 - inner), 0, 1),
                np.clip((outer - p) / (outer - outer_1), 0, 1),
            ),
            np.clip((up - y) / (up - up_1), 0, 1),
        )
        near = np.nonzero((fall[self.dofs] > 0).any(axis=0))[0]
        grad, dofs, dx = self.grad[:, :, near], self.dofs[:, near], self.dx[near]
        slope = np.einsum("aien,aej->jien", grad, moved[dofs])
        strain = 0.5 * (slope + slope.swapaxes(0, 1))
        stress = 2 * SHEAR * strain
        for i in range(3):
            stress[i, i] += LAME * (strain[0, 0] + strain[1, 1] + strain[2, 2])
        flow = np.einsum("ijen,jken->iken", stress, slope)
        for i in range(3):
            flow[i, i] -= 0.5 * (stress * strain).sum((0, 1))
        outward = np.array([np.cos(angle) / self.crack.c, 0 * angle, np.sin(angle) / self.crack.a])
        outward /= np.linalg.norm(outward, axis=0)
        fine = np.linspace(self.angles[0], np.pi / 2, 20001)
        length = np.hypot(self.crack.c * np.sin(fine), self.crack.a * np.cos(fine))
        found = []
        for hat in np.eye(len(self.angles)):
            q = fall * np.interp(angle, self.angles, hat) * outward
            dq = np.einsum("aien,jae->jien", grad, q[:, dofs])
            j = 2 * np.einsum("iken,kien,en->", flow, dq, dx)
            share = np.trapezoid(np.interp(fine, self.angles, hat) * length, fine)
            found.append(np.sqrt(max(j, 0.0) / (1 - NU**2) / share))
        return np.array(found)
