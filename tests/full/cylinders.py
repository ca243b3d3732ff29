"""Every front of fixtures/checks/cylinders-elements.json by finite elements once more.

    python -m tests.full.cylinders [kind …]

About ten seconds a front. Prints the kind's own value and the stored one against the elements, and
exits with 1 where a stored value is not met within 2 %.
"""

import json
import math
import sys
from pathlib import Path
from typing import Any

import numpy as np

from assessment import KINDS
from tests.external.fem.solid_wall import Shape, surface_crack, through_crack

VALUES = Path(__file__).parents[2] / "fixtures/checks/cylinders-elements.json"
GRID = {"along": 10, "inner": 4, "outer": 5, "across": 8, "far": 4, "first": 0.035}
MET = 0.02


def main(kinds: list[str]) -> int:
    worst = 0.0
    for one in json.loads(VALUES.read_text("utf-8"))["values"]:
        if kinds and one["kind"] not in kinds:
            continue
        elements = _through(one) if one["kind"].endswith("through") else _surface(one)
        apart = max(abs(e / s - 1) for e, s in zip(elements, one["factor"], strict=True))
        worst = max(worst, apart)
        said = {key: value for key, value in one.items() if key not in ("factor", "largest")}
        print(f"{said}: elements {np.round(elements, 4)}, stored {one['factor']}{_here(one)}")
    print(f"stored values are met within {worst:.2%}")
    return int(worst > MET)


def _surface(one: dict[str, Any]) -> list[float]:
    radius, a = 1.0 / one["t/R"], float(one["a/t"])
    c = a / one["a/c"] if one["a/c"] < 1.0 else 1.001 * a
    girth, inside = "girth" in one["kind"], one["kind"].endswith("inside")
    length = c + (6.0 * (radius + 1.0) if girth else 4.0 * math.sqrt(radius))
    shape = Shape(girth, inside, radius, 1.0, length)
    _, k = surface_crack(a, c, shape, [_load(one["load"], radius, inside)], **GRID)
    return [float(k[0, i]) / math.sqrt(math.pi * a) for i in (-1, 0)]


def _load(name: str, radius: float, inside: bool) -> Any:
    outer = radius + 1.0
    if name == "membrane":
        return lambda s, r: 1.0 + 0.0 * r
    if name == "global_bending":
        return lambda s, r: r * np.cos(s) / outer
    ring = radius**2 / (outer**2 - radius**2)
    return lambda s, r: ring * (1 + outer**2 / r**2) + float(inside)


def _through(one: dict[str, Any]) -> list[float]:
    mean = float(one["R/t"])
    girth = "girth" in one["kind"]
    c = math.pi * mean * one["θ/π"] if girth else one["c/√(R t)"] * math.sqrt(mean)
    shape = Shape(girth, True, mean - 0.5, 1.0, 8.0 * mean if girth else c + 8.0 * math.sqrt(mean))
    bending = one["load"] == "bending"
    at_surface = c * (mean - 0.5) / mean if girth else c
    _, k = through_crack(
        at_surface, shape, [lambda s, r: r * np.cos(s) / mean if bending else 1.0 + 0.0 * r]
    )
    weights = np.ones(k.shape[1])
    weights[[0, -1]] = 0.5
    square = float((k[0] ** 2 * weights / weights.sum()).sum())
    return [math.sqrt(square * (1 - 0.3**2)) / math.sqrt(math.pi * c)]


def _here(one: dict[str, Any]) -> str:
    if one["kind"].endswith("through"):
        return ""
    radius, a = 1.0 / one["t/R"], float(one["a/t"])
    x, body = np.asarray([a, a / one["a/c"]]), {"thickness": 1.0, "inner_radius": radius}
    k = KINDS[one["kind"]].stress_intensity(x, {one["load"]: np.asarray(1.0)}, body)
    return f", the kind {np.round(k / math.sqrt(math.pi * a), 4)}"


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
