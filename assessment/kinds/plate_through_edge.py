"""plate-through-edge: a through crack at one edge of a plate, membrane stress and in-plane bending.

Ends free to rotate. For held ends no solution is confirmed here: the free-ended one, which is
higher, is shown and marked, so that the case is referred.
"""

import numpy as np

from assessment.relations import edge_crack, reference_stress
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / body["width"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    relative = _relative(x, body)
    with np.errstate(invalid="ignore"):
        stress = edge_crack.tension(relative) * parts.load(loads, "membrane")
        stress = stress + edge_crack.bending(relative) * parts.load(loads, "bending")
        return np.asarray(stress * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_stress.edge(
        parts.load(loads, "membrane"), parts.load(loads, "bending"), _relative(x, body)
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"a/W": _relative(x, body)}
    held = {"ends": np.asarray(1.0 if body["ends"] == "held" else 0.0)}
    return (
        (edge_crack.TENSION, value),
        (edge_crack.BENDING, value),
        (reference_stress.EDGE, value),
        (edge_crack.HELD, held),
    )


def _impossible(x: Floats, body: Body) -> str | None:
    if x[0] >= body["width"]:
        return (
            f"the crack ({parts.millimetres(x[0])}) is as long as the plate is wide "
            f"({parts.millimetres(body['width'])})."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    numbers = f"α = a/W = {float(relative):.4g}"
    membrane, bending = (float(parts.load(loads, n)) for n in ("membrane", "bending"))
    tension, bend = edge_crack.tension(relative), edge_crack.bending(relative)
    return (
        parts.step_factor(
            "Geometry factor, tension",
            "F_m = √(2/(πα) tan(πα/2)) [0.752 + 2.02 α + 0.37 (1 − sin(πα/2))³] / cos(πα/2)",
            numbers,
            tension,
            edge_crack.TENSION.source,
        ),
        parts.step_factor(
            "Geometry factor, bending",
            "F_b = 1.122 − 1.40 α + 7.33 α² − 13.08 α³ + 14.0 α⁴, any-depth form from α = 0.63",
            numbers,
            bend,
            edge_crack.BENDING.source,
        ),
        parts.step_k(
            "tip",
            "K = (F_m σ_m + F_b σ_b) √(πa)",
            f"F_m = {float(tension):.4g}, F_b = {float(bend):.4g}, σ_m = {membrane:g} MPa, "
            f"σ_b = {bending:g} MPa, a = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            edge_crack.TENSION.source,
        ),
        parts.step_reference(
            "σ_ref = 2m + √(4m² + n²), n = P_m/(1 − α), m = (P_b/6 + P_m α/2)/(1 − α)²",
            f"P_m = {membrane:g} MPa, P_b = {bending:g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_stress.EDGE.source,
        ),
    )


KIND = Kind(
    name="plate-through-edge",
    words="a crack through the plate, from one edge",
    body_keys=("width_mm", "thickness_mm", "ends"),
    load_keys=("membrane_mpa", "bending_mpa"),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length),
    sizes_of=lambda x, body: (None, x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: (body["width"] - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(
        edge_crack.TENSION,
        edge_crack.BENDING,
        edge_crack.HELD,
        reference_stress.EDGE,
    ),
    working=_working,
    becomes=lambda x, body: None,
)
