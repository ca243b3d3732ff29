"""plate-corner: a quarter-elliptical crack at a corner of a plate, membrane and bending."""

import numpy as np

from assessment.relations import corner_crack, reference_plates
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep

AT = ("end along the thickness", "end along the width")


def _placed(depth: float | None, length: float | None, loads: frozenset[str], body: Body) -> Body:
    """Whether the plate is bent, for which the relation is confirmed less far."""
    return {**body, "bent": "bending" in loads}


def _front(depth: float | None, length: float | None, body: Body) -> Floats:
    """x[0] = a, along the thickness; x[1] = c, along the width."""
    return two_points.two(depth, length)


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending = parts.load(loads, "membrane"), parts.load(loads, "bending")
    return corner_crack.stress_intensity(
        x[0], x[1], membrane, bending, body["thickness"], body["width"]
    )


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending = parts.load(loads, "membrane"), parts.load(loads, "bending")
    return reference_plates.corner(membrane, bending, x[0], x[1], body["thickness"], body["width"])


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = corner_crack.validity_values(x[0], x[1], body["thickness"], body["width"])
    checks = [
        (corner_crack.VALIDITY, values),
        (reference_plates.CORNER, {"a/t": values["a/t"]}),
    ]
    # A body that was not placed does not say: then bending is not ruled out.
    if body.get("bent", True):
        checks.append((corner_crack.BENDING, values))
    return tuple(checks)


def _impossible(x: Floats, body: Body) -> str | None:
    if x[1] >= body["width"]:
        return (
            f"the crack ({parts.millimetres(x[1])}) is as long as the plate is wide "
            f"({parts.millimetres(body['width'])})."
        )
    return two_points.deeper_than_wall(x, body)


def _becomes(x: Floats, body: Body) -> tuple[str, float | None, float, Body] | None:
    """Through the wall it is assessed as an edge crack, its ends free: the higher of the two."""
    plate = {"width": body["width"], "thickness": body["thickness"], "ends": "free"}
    return ("plate-through-edge", None, float(x[1]), plate)


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    membrane, bending = (float(parts.load(loads, n)) for n in ("membrane", "bending"))
    return (
        *two_points.k_steps(
            x,
            loads,
            body,
            _k,
            "K = (σ_m + H σ_b) √(πa/Q) F(a/c, a/t, φ) f_w(c/W)",
            corner_crack.VALIDITY.source,
            ("end along the thickness (φ = 90°)", "end along the width (φ = 0)"),
        ),
        parts.step_reference(
            "σ_ref = [p_b + √(p_b² + 9 p_m²)] / 3, p_b = P_b/(1 − α)², α = (a/t)/(1 + t/c), "
            "p_m the larger of P_m/(1 − α) and P_m W/[√(W² − 2ac(W − c)/t) − ac/t]",
            f"P_m = {membrane:g} MPa, P_b = {bending:g} MPa, a = {parts.millimetres(x[0])}, "
            f"c = {parts.millimetres(x[1])}, t = {parts.millimetres(body['thickness'])}, "
            f"W = {parts.millimetres(body['width'])}",
            _reference(x, loads, body),
            reference_plates.CORNER.source,
        ),
    )


KIND = Kind(
    name="plate-corner",
    words="a crack at a corner of a plate, through neither face",
    body_keys=("width_mm", "thickness_mm"),
    load_keys=("membrane_mpa", "bending_mpa"),
    sizes=("depth_mm", "length_mm"),
    points=AT,
    placed=_placed,
    front=_front,
    sizes_of=lambda x, body: (x[0], x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: np.stack([body["thickness"] - x[0], body["width"] - x[1]]),
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(corner_crack.VALIDITY, corner_crack.BENDING, reference_plates.CORNER),
    working=_working,
    becomes=_becomes,
)
