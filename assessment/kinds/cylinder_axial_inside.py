"""cylinder-axial-inside: a crack along the bore of a cylinder, pressure also on its faces."""

import numpy as np

from assessment.relations import cylinder_inside, reference_stress
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    return cylinder_inside.stress_intensity(
        x[0], x[1], parts.load(loads, "pressure"), body["thickness"], body["inner_radius"]
    )


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_stress.cylinder_inside(
        parts.load(loads, "pressure"), x[0], x[1], body["thickness"], body["inner_radius"]
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = cylinder_inside.validity_values(x[0], x[1], body["thickness"], body["inner_radius"])
    return (
        (cylinder_inside.VALIDITY, values),
        (reference_stress.CYLINDER, {"a/t": values["a/t"]}),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def hoop(loads: Loads, body: Body) -> float | None:
    """The nominal stress that the geometry factor is divided by; None without pressure."""
    stress = float(parts.load(loads, "pressure")) * body["inner_radius"] / body["thickness"]
    return float(stress) if stress != 0.0 else None


def becomes_through(x: Floats, body: Body) -> tuple[str, float | None, float, Body]:
    """Through the wall it is a through crack of its surface length."""
    return ("cylinder-axial-through", None, float(2.0 * x[1]), body)


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    pressure = float(parts.load(loads, "pressure"))
    numbers = (
        f"p = {pressure:g} MPa, R_i = {parts.millimetres(body['inner_radius'])}, "
        f"t = {parts.millimetres(body['thickness'])}"
    )
    nominal = pressure * body["inner_radius"] / body["thickness"]
    return (
        WorkingStep(
            "Hoop stress (nominal)",
            "σ_h = p R_i/t",
            numbers,
            nominal,
            "MPa",
            "thin-wall equilibrium",
        ),
        *two_points.k_steps(
            x,
            loads,
            body,
            _k,
            "K = (p R_i/t) √(πa/Q) F, in F the curvature "
            "f_c = [(R_o² + R_i²)/(R_o² − R_i²) + 1 − 0.5√(a/t)] t/R_i",
            cylinder_inside.VALIDITY.source,
        ),
        parts.step_reference(
            "σ_ref = 1.2 M_s (σ_h + p), M_s = [1 − a/(t M_T)]/[1 − a/t], M_T = √(1 + 1.6 c²/(r t))",
            numbers,
            _reference(x, loads, body),
            reference_stress.CYLINDER.source,
        ),
    )


KIND = Kind(
    name="cylinder-axial-inside",
    words="a crack along the inside of a cylinder",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=("pressure_mpa",),
    sizes=("depth_mm", "length_mm"),
    points=two_points.AT,
    front=two_points.front,
    sizes_of=lambda x, body: (x[0], 2.0 * x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=hoop,
    impossible=two_points.deeper_than_wall,
    wall=lambda x, body: np.stack([body["thickness"] - x[0], np.full_like(x[1], np.inf)]),
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(cylinder_inside.VALIDITY, reference_stress.CYLINDER),
    working=_working,
    becomes=lambda x, body: None,
    leaks_to=becomes_through,
)
