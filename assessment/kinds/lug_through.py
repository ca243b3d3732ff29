"""lug-through: a crack through one side of a lug, from the bore, under the load of its pin."""

import numpy as np

from assessment.relations import lug, reference_holes
from assessment.validity import Floats, Mark

from . import hole_parts, parts
from .base import Body, Kind, Loads, WorkingStep

BODY = ("width_mm", "thickness_mm", "hole_diameter_mm", "head_mm")


def no_room(length: Floats, body: Body) -> str | None:
    """Why bore, head and crack do not fit the lug, or None."""
    if body["head"] <= hole_parts.radius(body):
        return (
            f"the head ({parts.millimetres(body['head'])} from the middle of the bore) leaves no "
            f"metal beyond the bore ({parts.millimetres(body['hole_diameter'])} across)."
        )
    return hole_parts.no_room(length, body)


def _factor(x: Floats, body: Body) -> Floats:
    return lug.through(x[0], hole_parts.radius(body), body["width"], body["head"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    with np.errstate(invalid="ignore"):
        stress = _factor(x, body) * hole_parts.bearing(loads, body)
        return np.asarray(stress * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_holes.lug(
        hole_parts.bearing(loads, body),
        np.asarray(1.0),
        x[0],
        hole_parts.radius(body),
        body["width"],
        body["head"],
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = lug.validity_values(x[0], hole_parts.radius(body), body["width"], body["head"])
    return ((lug.VALIDITY, values), (reference_holes.LUG, values))


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def numbers(body: Body) -> str:
    return (
        f"D = {parts.millimetres(body['hole_diameter'])}, W = {parts.millimetres(body['width'])}, "
        f"H = {parts.millimetres(body['head'])}"
    )


def reference_step(said: str, body: Body, value: Floats) -> WorkingStep:
    return parts.step_reference(
        "σ_ref = the largest of σ_b D/(W − D − da − 2s), σ_b D/(H − R) and σ_b, d the part of the "
        "thickness that is cracked, s for balance of moments",
        f"{said}, {numbers(body)}",
        value,
        reference_holes.LUG.source,
    )


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    said = f"a = {parts.millimetres(x[0])}"
    f = _factor(x, body)
    bearing = float(hole_parts.bearing(loads, body))
    return (
        hole_parts.nominal_step(loads, body),
        parts.step_factor(
            "Geometry factor",
            "F = (F_∞ D/W + G_∞)/2 Σ c_ijk (D/W)^i (W/2H)^j ξ^k/[(1 − D/W) √(1 − ξ)], "
            "ξ = a/(W/2 − R)",
            f"{said}, {numbers(body)}",
            f,
            lug.VALIDITY.source,
        ),
        parts.step_k(
            "tip",
            "K = F σ_b √(πa)",
            f"F = {float(f):.4g}, σ_b = {bearing:.4g} MPa, {said}",
            _k(x, loads, body)[0],
            lug.VALIDITY.source,
        ),
        reference_step(said, body, _reference(x, loads, body)),
    )


KIND = Kind(
    name="lug-through",
    words="a crack through one side of a lug, from the bore",
    body_keys=BODY,
    load_keys=("pin_load_kn",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length),
    sizes_of=lambda x, body: (None, x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=hole_parts.nominal,
    impossible=lambda x, body: no_room(x[0], body),
    wall=lambda x, body: np.asarray(hole_parts.ligament(body) - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(lug.VALIDITY, reference_holes.LUG),
    working=_working,
    becomes=lambda x, body: None,
)
