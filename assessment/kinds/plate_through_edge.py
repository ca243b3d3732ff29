"""plate-through-edge: a through crack at one edge of a plate, membrane stress and in-plane bending.

Ends free to turn, or held: two sections, held_length apart with the crack between them, stay
parallel. Held without held_length says too little: the free-ended solution, which is higher, is
shown and marked, so that the case is referred.
"""

import numpy as np

from assessment.relations import (
    edge_crack,
    edge_held,
    reference_plates,
    reference_stress,
    weight_function,
)
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / body["width"])


def _holds(body: Body) -> bool:
    """The ends are held, and it is known how far apart."""
    return body["ends"] == "held" and "held_length" in body


def _long(body: Body) -> Floats:
    return np.asarray(body["held_length"] / body["width"])


def _tension(relative: Floats, body: Body) -> Floats:
    if _holds(body):
        return edge_held.tension(relative, _long(body))
    return edge_crack.tension(relative)


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    relative = _relative(x, body)
    with np.errstate(invalid="ignore"):
        stress = _tension(relative, body) * parts.load(loads, "membrane")
        stress = stress + edge_crack.bending(relative) * parts.load(loads, "bending")
        k = stress * np.sqrt(np.pi * x[0])
        for times, points in parts.profiles(loads, body):
            k = k + times * edge_crack.stress_intensity_of_profile(x[0], points, body["width"])
        return np.asarray(k)[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending = parts.section(loads, body, body["width"])
    formula = reference_plates.edge_held if _holds(body) else reference_stress.edge
    return formula(membrane, bending, _relative(x, body))


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"a/W": _relative(x, body)}
    if _holds(body):
        return (
            (edge_held.VALIDITY, value | {"L/W": _long(body)}),
            (edge_crack.BENDING, value),
            (reference_plates.EDGE_HELD, value),
        )
    held = {"ends": np.asarray(1.0 if body["ends"] == "held" else 0.0)}
    return (
        (edge_crack.TENSION, value),
        (edge_crack.BENDING, value),
        (reference_stress.EDGE, value),
        (edge_crack.HELD, held),
        *(((weight_function.EDGE, value),) if "profiles" in body else ()),
    )


def _impossible(x: Floats, body: Body) -> str | None:
    if x[0] >= body["width"]:
        return (
            f"the crack ({parts.millimetres(x[0])}) is as long as the plate is wide "
            f"({parts.millimetres(body['width'])})."
        )
    if body["ends"] == "held" and "profiles" in body:
        return "a stress profile is computed where the ends are free, and these are held."
    if body["ends"] == "free" and "held_length" in body:
        return "a held length goes with ends that are held, and these are free."
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


_FREE = "F_m = √(2/(πα) tan(πα/2)) [0.752 + 2.02 α + 0.37 (1 − sin(πα/2))³] / cos(πα/2)"
_FREE_REFERENCE = "σ_ref = 2m + √(4m² + n²), n = P_m/(1 − α), m = (P_b/6 + P_m α/2)/(1 − α)²"
_HELD = "F_m = F_free − F_b · 6πA/(L/W + 6πB), A = ∫₀^α x F_free F_b dx, B = ∫₀^α x F_b² dx"
_HELD_REFERENCE = "σ_ref = 2m + √(4m² + n²), n = P_m/(1 − α), m = (P_b/6)/(1 − α)²"


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    numbers = f"α = a/W = {float(relative):.4g}"
    membrane, bending = (float(value) for value in parts.section(loads, body, body["width"]))
    tension, bend = _tension(relative, body), edge_crack.bending(relative)
    form, said, source = _FREE, numbers, edge_crack.TENSION.source
    reference, reference_source = _FREE_REFERENCE, reference_stress.EDGE.source
    if _holds(body):
        form, source = _HELD, edge_held.VALIDITY.source
        said = f"{numbers}, F_free = {float(edge_crack.tension(relative)):.4g}, "
        said += f"F_b = {float(bend):.4g}, L/W = {float(_long(body)):.4g}"
        reference, reference_source = _HELD_REFERENCE, reference_plates.EDGE_HELD.source
    return (
        parts.step_factor("Geometry factor, tension", form, said, tension, source),
        parts.step_factor(
            "Geometry factor, bending",
            "F_b = 1.122 − 1.40 α + 7.33 α² − 13.08 α³ + 14.0 α⁴, any-depth form from α = 0.63",
            numbers,
            bend,
            edge_crack.BENDING.source,
        ),
        parts.step_k(
            "tip",
            parts.with_integral("K = (F_m σ_m + F_b σ_b) √(πa)", loads),
            f"F_m = {float(tension):.4g}, F_b = {float(bend):.4g}, "
            f"{parts.said(loads, body)}, a = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            source,
        ),
        parts.step_reference(
            reference,
            f"P_m = {membrane:g} MPa, P_b = {bending:g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_source,
        ),
    )


KIND = Kind(
    name="plate-through-edge",
    words="a crack through the plate, from one edge",
    body_keys=("width_mm", "thickness_mm", "ends"),
    optional_body_keys=("held_length_mm",),
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
        edge_held.VALIDITY,
        reference_stress.EDGE,
        reference_plates.EDGE_HELD,
        weight_function.EDGE,
    ),
    profile_over="width",
    working=_working,
    becomes=lambda x, body: None,
)
