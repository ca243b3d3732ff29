"""cylinder-axial-through: a crack through the wall along a cylinder under pressure, which also
leaks into the crack and is taken in full on its faces."""

import numpy as np

from assessment.relations import axial_through, reference_cylinders
from assessment.validity import Floats, Mark

from . import parts
from .axial import hoop
from .base import Body, Kind, Loads, WorkingStep


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    return axial_through.stress_intensity(
        x[0], parts.load(loads, "pressure"), body["thickness"], body["inner_radius"]
    )


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_cylinders.axial_through(
        parts.load(loads, "pressure"), x[0], body["thickness"], body["inner_radius"]
    )


def _values(x: Floats, body: Body) -> dict[str, Floats]:
    mean = body["inner_radius"] + body["thickness"] / 2.0
    return axial_through.validity_values(x[0], body["thickness"], mean)


def _checks(x: Floats, body: Body) -> parts.Checks:
    return ((axial_through.VALIDITY, _values(x, body)),)


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    along = _values(x, body)["c/√(R t)"]
    f = axial_through.factor(along)
    numbers = (
        f"p = {float(parts.load(loads, 'pressure')):g} MPa, "
        f"R_i = {parts.millimetres(body['inner_radius'])}, "
        f"t = {parts.millimetres(body['thickness'])}, c = {parts.millimetres(x[0])}"
    )
    source = axial_through.VALIDITY.source
    return (
        parts.step_factor(
            "Geometry factor",
            "F = √(1 + 0.52x + 1.29x² − 0.074x³), x = c/√(R_m t)",
            f"x = {float(along):.4g}",
            f,
            source,
        ),
        parts.step_k(
            "tip, mean through the wall",
            "K = (p R_i/t + p) F √(πc)",
            f"F = {float(f):.4g}, {numbers}",
            _k(x, loads, body)[0],
            source,
        ),
        parts.step_reference(
            "σ_ref = 1.2 M_T (p R_i/t + p), M_T = √(1 + 1.6 c²/(R_m t))",
            numbers,
            _reference(x, loads, body),
            reference_cylinders.AXIAL_THROUGH.source,
        ),
    )


KIND = Kind(
    name="cylinder-axial-through",
    words="a crack through the wall, along a cylinder",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=("pressure_mpa",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(None if length is None else length / 2.0),
    sizes_of=lambda x, body: (None, 2.0 * x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=hoop,
    impossible=lambda x, body: None,
    wall=lambda x, body: np.full_like(x, np.inf),
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(axial_through.VALIDITY, reference_cylinders.AXIAL_THROUGH),
    working=_working,
    becomes=lambda x, body: None,
)
