"""cylinder-axial-through: an axial crack through the wall of a cylinder under pressure."""

import numpy as np

from assessment.relations import cylinder_through, reference_cylinders
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _mean_radius(body: Body) -> float:
    return float(body["inner_radius"] + body["thickness"] / 2.0)


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / np.sqrt(_mean_radius(body) * body["thickness"]))


def _hoop(loads: Loads, body: Body) -> Floats:
    return np.asarray(parts.load(loads, "pressure") * body["inner_radius"] / body["thickness"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    f = cylinder_through.axial(_relative(x, body))
    return np.asarray(f * _hoop(loads, body) * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    pressure = parts.load(loads, "pressure")
    return reference_cylinders.axial_through(
        pressure, x[0], body["thickness"], body["inner_radius"]
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = {
        "c/√(Rt)": _relative(x, body),
        "R/t": np.asarray(_mean_radius(body) / body["thickness"]),
    }
    return ((cylinder_through.AXIAL, values),)


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    f, hoop = cylinder_through.axial(relative), float(_hoop(loads, body))
    numbers = f"x = c/√(Rt) = {float(relative):.4g}"
    return (
        parts.step_factor(
            "Geometry factor",
            "F = √(1 + 0.52 x + 1.29 x² − 0.074 x³)",
            numbers,
            f,
            cylinder_through.AXIAL.source,
        ),
        parts.step_k(
            "tip",
            "K = (p R_i/t) F √(πc)",
            f"p R_i/t = {hoop:.4g} MPa, F = {float(f):.4g}, c = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            cylinder_through.AXIAL.source,
        ),
        parts.step_reference(
            "σ_ref = 1.2 M_T p R_i/t, M_T = √(1 + 1.6 c²/(r t))",
            f"p R_i/t = {hoop:.4g} MPa, c = {parts.millimetres(x[0])}, "
            f"r = {parts.millimetres(_mean_radius(body))}",
            _reference(x, loads, body),
            reference_cylinders.AXIAL_THROUGH.source,
        ),
    )


KIND = Kind(
    name="cylinder-axial-through",
    words="a crack along a cylinder, through its wall",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=("pressure_mpa",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length) / 2.0,
    sizes_of=lambda x, body: (None, 2.0 * x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.hoop,
    impossible=lambda x, body: None,
    wall=lambda x, body: np.full_like(x, np.inf),
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(cylinder_through.AXIAL, reference_cylinders.AXIAL_THROUGH),
    working=_working,
    becomes=lambda x, body: None,
)
