"""What several kinds share: reading loads, plain fronts, and lines of the working."""

from collections.abc import Mapping, Sequence

import numpy as np

from assessment.validity import Floats, Mark, Validity

from .base import Body, Loads, WorkingStep

Checks = Sequence[tuple[Validity, Mapping[str, Floats]]]


def load(loads: Loads, name: str) -> Floats:
    """A load in MPa, nil where it is absent: the document's own rule for a kind's loads."""
    return np.asarray(loads.get(name, 0.0), dtype=float)


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
    """Membrane + bending, which the geometry factor is divided by; None where it is nil."""
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
