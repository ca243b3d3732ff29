"""plate-through-centre: a through crack in the middle of a plate under membrane stress."""

import numpy as np

from assessment.relations import centre_crack, reference_stress
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(2.0 * x[0] / body["width"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    with np.errstate(invalid="ignore"):
        f = centre_crack.factor(_relative(x, body))
        return np.asarray(f * parts.load(loads, "membrane") * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    nil = np.asarray(0.0)
    return reference_stress.through(parts.load(loads, "membrane"), nil, _relative(x, body))


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"2a/W": _relative(x, body)}
    return ((centre_crack.VALIDITY, value), (reference_stress.THROUGH, value))


def _impossible(x: Floats, body: Body) -> str | None:
    if 2.0 * x[0] >= body["width"]:
        return (
            f"the crack ({parts.millimetres(2 * x[0])}) is as wide as the plate "
            f"({parts.millimetres(body['width'])})."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    numbers = f"2a/W = {float(relative):.4g}"
    f = centre_crack.factor(relative)
    return (
        parts.step_factor(
            "Geometry factor",
            "F = (1 − 0.025 α² + 0.06 α⁴) √sec(πα/2), α = 2a/W",
            numbers,
            f,
            centre_crack.VALIDITY.source,
        ),
        parts.step_k(
            "tip",
            "K = F σ √(πa)",
            f"F = {float(f):.4g}, σ = {float(parts.load(loads, 'membrane')):g} MPa, "
            f"a = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            centre_crack.VALIDITY.source,
        ),
        parts.step_reference(
            "σ_ref = P_m / (1 − 2a/W)",
            f"P_m = {float(parts.load(loads, 'membrane')):g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_stress.THROUGH.source,
        ),
    )


KIND = Kind(
    name="plate-through-centre",
    words="a crack through the plate, in its middle",
    body_keys=("width_mm", "thickness_mm"),
    load_keys=("membrane_mpa",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(None if length is None else length / 2.0),
    sizes_of=lambda x, body: (None, 2.0 * x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: (body["width"] / 2.0 - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(centre_crack.VALIDITY, reference_stress.THROUGH),
    working=_working,
    becomes=lambda x, body: None,
)
