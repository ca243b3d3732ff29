"""cylinder-girth-through: a girth crack through the wall of a cylinder: axial stress, global
bending, and the pressure on the crack's faces. Axial stress of closed ends is not implied."""

import numpy as np

from assessment.relations import cylinder_through, reference_cylinders
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _mean_radius(body: Body) -> float:
    return float(body["inner_radius"] + body["thickness"] / 2.0)


def _part(x: Floats, body: Body) -> Floats:
    """θ/π; the length is measured along the wall at mid-thickness."""
    return np.asarray(x[0] / (np.pi * _mean_radius(body)))


def _axial(loads: Loads) -> Floats:
    return np.asarray(parts.load(loads, "membrane") + parts.load(loads, "pressure"))


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    ratio = _mean_radius(body) / body["thickness"]
    tension, bending = cylinder_through.girth(_part(x, body), ratio)
    stress = tension * _axial(loads) + bending * parts.load(loads, "global_bending")
    return np.asarray(stress * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_cylinders.girth_through(
        _axial(loads), parts.load(loads, "global_bending"), np.pi * _part(x, body)
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    part = _part(x, body)
    ratio = np.asarray(_mean_radius(body) / body["thickness"])
    return (
        (cylinder_through.GIRTH, {"θ/π": part, "R/t": ratio}),
        (reference_cylinders.GIRTH_THROUGH, {"θ/π": part}),
    )


def _impossible(x: Floats, body: Body) -> str | None:
    if x[0] >= np.pi * _mean_radius(body):
        return f"the crack ({parts.millimetres(2 * x[0])}) is longer than the girth."
    return None


def _nominal(loads: Loads, body: Body) -> float | None:
    total = float(parts.load(loads, "membrane") + parts.load(loads, "global_bending"))
    return total or None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    part = _part(x, body)
    tension, bending = cylinder_through.girth(part, _mean_radius(body) / body["thickness"])
    axial, bend = float(_axial(loads)), float(parts.load(loads, "global_bending"))
    numbers = f"θ/π = {float(part):.4g}, R/t = {_mean_radius(body) / body['thickness']:.4g}"
    return (
        parts.step_factor(
            "Geometry factor, axial stress",
            "F_t = 1 + A [5.3303 (θ/π)^1.5 + 18.773 (θ/π)^4.24]",
            numbers,
            tension,
            cylinder_through.GIRTH.source,
        ),
        parts.step_factor(
            "Geometry factor, global bending",
            "F_b = 1 + A [4.5967 (θ/π)^1.5 + 2.6422 (θ/π)^4.24]",
            numbers,
            bending,
            cylinder_through.GIRTH.source,
        ),
        parts.step_k(
            "tip",
            "K = [F_t (σ_m + p) + F_b σ_b] √(πRθ)",
            f"F_t = {float(tension):.4g}, F_b = {float(bending):.4g}, σ_m + p = {axial:g} MPa, "
            f"σ_b = {bend:g} MPa, Rθ = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            cylinder_through.GIRTH.source,
        ),
        parts.step_reference(
            "σ_ref: (π/4) σ_b/σ = sin β − ½ sin θ, β = [π − θ − π (σ_m + p)/σ]/2",
            f"σ_m + p = {axial:g} MPa, σ_b = {bend:g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_cylinders.GIRTH_THROUGH.source,
        ),
    )


KIND = Kind(
    name="cylinder-girth-through",
    words="a crack round a cylinder, through its wall",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=("membrane_mpa", "global_bending_mpa", "pressure_mpa"),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length) / 2.0,
    sizes_of=lambda x, body: (None, 2.0 * x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=_nominal,
    impossible=_impossible,
    wall=lambda x, body: (np.pi * _mean_radius(body) - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(cylinder_through.GIRTH, reference_cylinders.GIRTH_THROUGH),
    working=_working,
    becomes=lambda x, body: None,
)
