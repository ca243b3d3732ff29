"""The shapes of fixtures/checks/plate-solids.json: how each is computed by three-dimensional
elements, and how the crack kinds give the same number.

Independent computations, published nowhere (tests/external/fem/solid.py). Each value is a geometry
factor K ÷ (σ √(πa)), a half the height of an inner crack.
"""

import json
import math
from dataclasses import dataclass
from pathlib import Path

import numpy as np
from scipy.special import ellipe

from assessment import KINDS

from .fem.solid import FULL, Crack, Fineness, boundary_factors

FILE = Path(__file__).parents[2] / "fixtures/checks/plate-solids.json"
CHECKS = {check["id"]: check for check in json.loads(FILE.read_text("utf-8"))}
LOADS = ("tension", "bending")
# An inner crack off the middle needs both its halves: twice the size, so a little coarser.
HALVES = Fineness(around=8, behind=5, ahead=6, up=7, far=3, first=0.05, rings=1)


@dataclass(frozen=True)
class Shape:
    """a/c, a/t (t from the crack's middle to the nearer surface for an inner crack), c over the
    reach of the box (half the width of the plate, or the whole for a corner crack), and for an
    inner crack the distance of its middle from the other surface over that from the nearer."""

    kind: str
    shape: float
    depth: float
    part: float
    below: float = 0.0

    def __str__(self) -> str:
        off = f"_off{self.below:g}" if self.below else ""
        return f"{self.kind}_ac{self.shape:g}_at{self.depth:g}_cb{self.part:g}{off}"

    def crack(self) -> Crack:
        c, t = 1.0 / self.shape, 1.0 / self.depth
        reach = c / self.part
        height = 1.5 * max(reach, t * (1.0 + self.below))
        return Crack(1.0, c, t, reach, height, self.kind, t * self.below)

    def points(self) -> tuple[str, str]:
        """Names of the two points, the end of a first."""
        kind = {"surface": "plate-surface", "corner": "plate-corner", "inner": "plate-embedded"}
        points = KINDS[kind[self.kind]].points
        return points[0], points[1]


SHAPES = tuple(
    Shape(
        check["kind"],
        *(check["inputs"][name][0] for name in ("a/c", "a/t", "c/b")),
        check["inputs"].get("t'/t", [0.0])[0],
    )
    for check in CHECKS.values()
    if check["id"].endswith("_first_tension")
)


def stored(shape: Shape, point: int, load: str) -> float:
    return float(CHECKS[f"{shape}_{('first', 'second')[point]}_{load}"]["value"])


def by_elements(shape: Shape, fineness: Fineness = FULL) -> dict[tuple[int, str], float]:
    """(point, load) → K ÷ (σ √(πa)); an inner crack has no bending."""
    if shape.below and fineness is FULL:
        fineness = HALVES
    angles, factors = boundary_factors(shape.crack(), fineness)
    end = int(np.argmin(np.abs(angles)))
    q = ellipe(1.0 - min(shape.shape, 1.0 / shape.shape) ** 2)
    loads = LOADS[:1] if shape.kind == "inner" else LOADS
    return {
        (point, load): float(factors[row, at] / q)
        for point, at in ((0, -1), (1, end))
        for row, load in enumerate(loads)
    }


def by_kind(shape: Shape) -> dict[tuple[int, str], float]:
    """The same numbers from the crack kind."""
    a, c, t = 0.01, 0.01 / shape.shape, 0.01 / shape.depth
    reach = c / shape.part
    if shape.kind == "inner":
        kind = KINDS["plate-embedded"]
        body = {"width": 2 * reach, "thickness": t * (1.0 + shape.below), "ligament": t - a}
        body = dict(kind.placed(2 * a, 2 * c, frozenset(), body))
    else:
        kind = KINDS[f"plate-{shape.kind}"]
        width = reach if shape.kind == "corner" else 2.0 * reach
        body = {"width": width, "thickness": t}
    found = {}
    for load, name in (("tension", "membrane"), ("bending", "bending")):
        if shape.kind == "inner" and load == "bending":
            continue
        k = kind.stress_intensity(np.array([a, c]), {name: np.asarray(1.0)}, body)
        for point in (0, 1):
            found[point, load] = float(k[point]) / math.sqrt(math.pi * a)
    return found
