"""cylinder-girth-through: a crack through the wall that runs around a part of a cylinder.

Loads: axial membrane stress, global bending of the tube (stress at the outer fibre, where the
crack has its middle), pressure, which leaks into the crack and is taken in full on its faces. The
axial stress of closed ends is not implied by it. The length is that at mid-thickness.
"""

import numpy as np

from assessment.relations import girth_through, reference_cylinders
from assessment.validity import Floats, Mark

from . import girth, parts
from .base import Body, Kind, Loads, WorkingStep


def _mean(body: Body) -> float:
    return float(body["inner_radius"] + body["thickness"] / 2.0)


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending, pressure = (
        parts.load(loads, name) for name in ("membrane", "global_bending", "pressure")
    )
    return girth_through.stress_intensity(
        x[0], membrane, bending, pressure, body["thickness"], body["inner_radius"]
    )


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending, pressure = (
        parts.load(loads, name) for name in ("membrane", "global_bending", "pressure")
    )
    return reference_cylinders.girth_through(
        membrane, bending, pressure, x[0], body["thickness"], body["inner_radius"]
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = girth_through.validity_values(x[0], body["thickness"], body["inner_radius"])
    return (
        (girth_through.VALIDITY, values),
        (reference_cylinders.GIRTH_THROUGH, {"θ/π": values["θ/π"]}),
    )


def _impossible(x: Floats, body: Body) -> str | None:
    around = float(np.pi) * _mean(body)
    if x[0] >= around:
        return (
            f"the crack ({parts.millimetres(2 * x[0])}) is as long as the way around the "
            f"cylinder ({parts.millimetres(2 * around)})."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    values = girth_through.validity_values(x[0], body["thickness"], body["inner_radius"])
    part, ratio = values["θ/π"], float(values["R/t"])
    said = ", ".join(f"{name} = {float(value):g} MPa" for name, value in sorted(loads.items()))
    numbers = f"θ/π = {float(part):.4g}, R_m/t = {ratio:.4g}"
    tension, bending = girth_through.tension(part, ratio), girth_through.bending(part, ratio)
    source = girth_through.VALIDITY.source
    return (
        parts.step_factor(
            "Geometry factor, tension",
            "F_t = 1 + A [5.3303 (θ/π)^1.5 + 18.773 (θ/π)^4.24]",
            numbers,
            tension,
            source,
        ),
        parts.step_factor(
            "Geometry factor, global bending",
            "F_b = 1 + A [4.5967 (θ/π)^1.5 + 2.6422 (θ/π)^4.24]",
            numbers,
            bending,
            source,
        ),
        parts.step_k(
            "tip, mean through the wall",
            "K = [(σ_m + p) F_t + σ_gb (R_m² + t²/4)/(R_m R_o) F_b] √(πc)",
            f"F_t = {float(tension):.4g}, F_b = {float(bending):.4g}, "
            f"c = {parts.millimetres(x[0])}, {said}",
            _k(x, loads, body)[0],
            source,
        ),
        parts.step_reference(
            "the larger of: net section β = ½(π − θ − πN/σ), M/σ = (2/π)(2 sin β − sin θ); "
            "p/ln(R_o/R_i)",
            f"{numbers}, {said}",
            _reference(x, loads, body),
            reference_cylinders.GIRTH_THROUGH.source,
        ),
    )


KIND = Kind(
    name="cylinder-girth-through",
    words="a crack through the wall, around a part of a cylinder",
    body_keys=("inner_radius_mm", "thickness_mm"),
    load_keys=girth.LOADS,
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(None if length is None else length / 2.0),
    sizes_of=lambda x, body: (None, 2.0 * x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=girth.axial_nominal,
    impossible=_impossible,
    wall=lambda x, body: (np.pi * _mean(body) - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(girth_through.VALIDITY, reference_cylinders.GIRTH_THROUGH),
    working=_working,
    becomes=lambda x, body: None,
)
