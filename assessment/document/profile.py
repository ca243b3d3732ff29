"""Reads a stress ``profile``: [[x_mm, stress_mpa], …] from the cracked surface inwards."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from assessment.document.fields import Fields, as_number
from assessment.document.refusal import CaseRefused
from assessment.kinds.base import Kind
from assessment.kinds.parts import PROFILE
from assessment.relations.weight_function import Profile

POINTS = 200
MM = 1e-3


@dataclass
class Profiles:
    """The profiles of one document, each under the load name that it gets."""

    kind: Kind
    body: Mapping[str, Any]
    by_name: dict[str, Profile] = field(default_factory=dict)

    def read(self, fields: Fields) -> dict[str, float]:
        """The profile of one section as a load that acts once; empty where there is none."""
        if "profile" not in fields:
            return {}
        over = self.kind.profile_over
        if over is None:
            raise fields.refuse(
                "profile",
                f"cracks of kind {self.kind.name!r} have no weight function here: give the stress "
                "by its named loads.",
            )
        name = f"{PROFILE} {len(self.by_name) + 1}"
        self.by_name[name] = _points(fields, over, float(self.body[over]))
        return {name: 1.0}

    def stress(self, loads: Mapping[str, float], x: float) -> float:
        """The stress in MPa of all loads at a distance from the cracked surface, without crack."""
        depth = float(self.body[str(self.kind.profile_over)])
        total = loads.get("membrane", 0.0) + loads.get("bending", 0.0) * (1.0 - 2.0 * x / depth)
        for name, times in loads.items():
            if name.startswith(PROFILE):
                places, stresses = np.asarray(self.by_name[name], dtype=float).T
                total += times * float(np.interp(x, places, stresses))
        return total

    def places(self) -> list[float]:
        """Every distance at which some profile has a point."""
        return sorted({x for points in self.by_name.values() for x, _ in points})


def _points(fields: Fields, over: str, depth: float) -> Profile:
    points: list[tuple[float, float]] = []
    for where, x, stress in fields.pairs("profile", as_number, POINTS):
        if points and x * MM <= points[-1][0]:
            raise CaseRefused(where, "distances in a profile rise from row to row.")
        points.append((x * MM, stress))
    if len(points) < 2 or points[0][0] != 0.0:
        raise fields.refuse(
            "profile", "a profile starts at 0, the cracked surface, and has two points or more."
        )
    # A wall typed in decimals and a last point typed alike may differ by rounding.
    if points[-1][0] < depth * (1.0 - 1e-12):
        raise fields.refuse(
            "profile",
            f"the profile ends at {points[-1][0] / MM:g} mm; it has to reach through the {over} of "
            f"{depth / MM:g} mm.",
        )
    if not any(stress for _, stress in points):
        raise fields.refuse("profile", "a profile of nil stress alone: leave it out.")
    return tuple(points)
