"""cylinder-axial-outside: an axial crack in the outer surface of a cylinder under pressure."""

import numpy as np

from assessment.relations import cylinder_inside, cylinder_outside, reference_cylinders
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    pressure = parts.load(loads, "pressure")
    return cylinder_outside.stress_intensity(
        x[0], x[1], pressure, body["thickness"], body["inner_radius"]
    )


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    pressure = parts.load(loads, "pressure")
    return reference_cylinders.axial_outside(
        pressure, x[0], x[1], body["thickness"], body["inner_radius"]
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = cylinder_inside.validity_values(x[0], x[1], body["thickness"], body["inner_radius"])
    return (
        (cylinder_outside.VALIDITY, values),
        (reference_cylinders.AXIAL_OUTSIDE, {"a/t": values["a/t"]}),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    pressure = float(parts.load(loads, "pressure"))
    return (
        *two_points.k_steps(
            x,
            loads,
            body,
            _k,
            "K = (p R_i/t) √(πa/Q) 0.97 [M₁ + M₂ (a/t)² + M₃ (a/t)⁴] g f_φ f_c",
            cylinder_outside.VALIDITY.source,
        ),
        parts.step_reference(
            "σ_ref = 1.2 M_s p R_i/t, M_s = [1 − a/(t M_T)]/[1 − a/t], M_T = √(1 + 1.6 c²/(r t))",
            f"p = {pressure:g} MPa, R_i = {parts.millimetres(body['inner_radius'])}, "
            f"t = {parts.millimetres(body['thickness'])}, a = {parts.millimetres(x[0])}, "
            f"c = {parts.millimetres(x[1])}",
            _reference(x, loads, body),
            reference_cylinders.AXIAL_OUTSIDE.source,
        ),
    )


KIND = Kind(
    name="cylinder-axial-outside",
    words="a crack along a cylinder, in its outer surface, not through it",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=("pressure_mpa",),
    sizes=("depth_mm", "length_mm"),
    points=two_points.AT,
    front=two_points.front,
    sizes_of=lambda x, body: (x[0], 2.0 * x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.hoop,
    impossible=two_points.deeper_than_wall,
    wall=lambda x, body: np.stack([body["thickness"] - x[0], np.full_like(x[1], np.inf)]),
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(cylinder_outside.VALIDITY, reference_cylinders.AXIAL_OUTSIDE),
    working=_working,
    becomes=lambda x, body: None,
    leaks_to=lambda x, body: ("cylinder-axial-through", None, float(2.0 * x[1]), body),
)
