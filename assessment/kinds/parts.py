"""What several kinds share: reading loads, plain fronts, and lines of the working."""

from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from assessment.relations import weight_function
from assessment.relations.weight_function import Profile
from assessment.validity import Floats, Mark, Validity

from .base import Body, Loads, WorkingStep

Checks = Sequence[tuple[Validity, Mapping[str, Floats]]]


def load(loads: Loads, name: str) -> Floats:
    """A load in MPa, nil where it is absent: the document's own rule for a kind's loads."""
    return np.asarray(loads.get(name, 0.0), dtype=float)


INTEGRAL = "∫₀ᵃ σ(x) m(x, a) dx, m by the universal weight function"
PROFILE = "profile"
"""A stress profile is a load named "profile 1" and so on. Its points stand in ``body["profiles"]``
under that name, and its value says how many times they act, so that K stays linear in the loads."""


def profiles(loads: Loads, body: Body) -> Iterator[tuple[Floats, Profile]]:
    """How many times each stress profile acts, and its points."""
    for name in loads:
        if name.startswith(PROFILE):
            yield load(loads, name), body["profiles"][name]


def section(loads: Loads, body: Body, depth: float) -> tuple[Floats, Floats]:
    """Membrane and bending stress in MPa, with what the profiles bring into the section."""
    membrane, bending = load(loads, "membrane"), load(loads, "bending")
    for times, points in profiles(loads, body):
        force, moment = weight_function.section_stresses(points, depth)
        membrane, bending = membrane + times * force, bending + times * moment
    return membrane, bending


def said(loads: Loads, body: Body) -> str:
    """The loads in words, for the working."""
    words = []
    for name, value in sorted(loads.items()):
        if name.startswith(PROFILE):
            points = body["profiles"][name]
            first, last = points[0], points[-1]
            words.append(
                f"{float(value):g} × {name} ({first[1]:g} MPa at the surface to {last[1]:g} MPa at "
                f"{millimetres(last[0])}, {len(points)} points)"
            )
        else:
            words.append(f"{name} = {float(value):g} MPa")
    return ", ".join(words)


def with_integral(formula: str, loads: Loads) -> str:
    """The formula of K, with the weight function's integral where a profile acts."""
    return f"{formula} + {INTEGRAL}" if any(n.startswith(PROFILE) for n in loads) else formula


def one(value: float | None) -> Floats:
    """A front of one variable. ValueError where the size is missing."""
    if value is None:
        raise ValueError("this kind needs a size that is not given")
    return np.asarray([value], dtype=float)


def all_hold(checks: Checks) -> Floats:
    inside = np.asarray(True)
    for validity, values in checks:
        inside = inside & validity.holds(values)
    return inside


def marks_of(checks: Checks) -> tuple[Mark, ...]:
    """For one single case: every range that is left."""
    found: list[Mark] = []
    for validity, values in checks:
        found += validity.marks({name: float(value) for name, value in values.items()})
    return tuple(found)


def nominal(loads: Loads, body: Body) -> float | None:
    """Membrane + bending, which the geometry factor is divided by; None where it is nil or where
    a profile acts too, which no one number stands for."""
    if any(name.startswith(PROFILE) for name in loads):
        return None
    total = float(load(loads, "membrane") + load(loads, "bending"))
    return total if total != 0.0 else None


def longer_than_wide(x: Floats, body: Body) -> str | None:
    """A crack from one edge that leaves nothing of the width."""
    if x[0] >= body["width"]:
        size, width = millimetres(x[0]), millimetres(body["width"])
        return f"the crack ({size}) is as long as the width ({width})."
    return None


def millimetres(value: Floats | float) -> str:
    return f"{float(value) * 1e3:.4g} mm"


def step_k(at: str, formula: str, numbers: str, k: Floats | float, source: str) -> WorkingStep:
    name = f"Stress intensity factor, {at}"
    return WorkingStep(name, formula, numbers, float(k), "MPa√m", source)


def step_factor(
    name: str, formula: str, numbers: str, value: Floats | float, source: str
) -> WorkingStep:
    return WorkingStep(name, formula, numbers, float(value), "", source)


def step_reference(formula: str, numbers: str, value: Floats | float, source: str) -> WorkingStep:
    return WorkingStep("Reference stress", formula, numbers, float(value), "MPa", source)
