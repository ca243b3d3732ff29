"""plate-through-both-edges: equal through cracks at both edges of a plate, membrane stress."""

import numpy as np

from assessment.relations import both_edges, reference_plates
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(2.0 * x[0] / body["width"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane = parts.load(loads, "membrane")
    with np.errstate(invalid="ignore"):
        f = both_edges.factor(_relative(x, body))
        return np.asarray(f * membrane * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_plates.both_edges(parts.load(loads, "membrane"), _relative(x, body))


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"2a/W": _relative(x, body)}
    return ((both_edges.VALIDITY, value), (reference_plates.BOTH_EDGES, value))


def _impossible(x: Floats, body: Body) -> str | None:
    if 2.0 * x[0] >= body["width"]:
        return (
            f"the two cracks ({parts.millimetres(x[0])} each) meet in a plate of "
            f"{parts.millimetres(body['width'])}."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    numbers = f"α = 2a/W = {float(relative):.4g}"
    membrane = float(parts.load(loads, "membrane"))
    f = both_edges.factor(relative)
    return (
        parts.step_factor(
            "Geometry factor",
            "F = (1 + 0.122 cos⁴(πα/2)) √(2/(πα) tan(πα/2))",
            numbers,
            f,
            both_edges.VALIDITY.source,
        ),
        parts.step_k(
            "tip",
            "K = F σ √(πa)",
            f"F = {float(f):.4g}, σ = {membrane:g} MPa, a = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            both_edges.VALIDITY.source,
        ),
        parts.step_reference(
            "σ_ref = P_m / (1 − 2a/W)",
            f"P_m = {membrane:g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_plates.BOTH_EDGES.source,
        ),
    )


KIND = Kind(
    name="plate-through-both-edges",
    words="equal cracks through the plate, one from each edge",
    body_keys=("width_mm", "thickness_mm"),
    load_keys=("membrane_mpa",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length),
    sizes_of=lambda x, body: (None, x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: (body["width"] / 2.0 - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(both_edges.VALIDITY, reference_plates.BOTH_EDGES),
    working=_working,
    becomes=lambda x, body: None,
)
