"""hole-through-one, hole-through-two: cracks through the plate from one or both sides of a hole.

Membrane stress passes the hole by; the load of a pin in the hole comes on top of it and is taken up
at one end of the plate.
"""

import numpy as np

from assessment.relations import hole_through, reference_holes
from assessment.validity import Floats, Mark

from . import hole_parts, parts
from .base import Body, Kind, Loads, WorkingStep


def _kind(name: str, words: str, cracks: int) -> Kind:
    def k(x: Floats, loads: Loads, body: Body) -> Floats:
        return hole_through.stress_intensity(
            x[0],
            parts.load(loads, "membrane"),
            hole_parts.bearing(loads, body),
            hole_parts.radius(body),
            body["width"],
            cracks,
        )[None]

    def reference(x: Floats, loads: Loads, body: Body) -> Floats:
        return reference_holes.through(
            parts.load(loads, "membrane"),
            hole_parts.bearing(loads, body),
            x[0],
            hole_parts.radius(body),
            body["width"],
            cracks,
        )

    def working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
        return _working(x, loads, body, cracks, k(x, loads, body)[0], reference(x, loads, body))

    return Kind(
        name=name,
        words=words,
        body_keys=("width_mm", "thickness_mm", "hole_diameter_mm"),
        load_keys=("membrane_mpa", "pin_load_kn"),
        sizes=("length_mm",),
        points=("tip",),
        through=True,
        front=lambda depth, length, body: parts.one(length),
        sizes_of=lambda x, body: (None, x[0]),
        stress_intensity=k,
        reference_stress=reference,
        nominal_stress=hole_parts.nominal,
        impossible=lambda x, body: hole_parts.no_room(x[0], body),
        wall=lambda x, body: np.asarray(hole_parts.ligament(body) - x[0])[None],
        inside=lambda x, body: parts.all_hold(_checks(x, body)),
        marks=_marks,
        relations=(hole_through.TENSION, hole_through.PIN, reference_holes.THROUGH),
        working=working,
        becomes=lambda x, body: None,
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = hole_through.validity_values(x[0], hole_parts.radius(body), body["width"])
    return (
        (hole_through.TENSION, values),
        (hole_through.PIN, values),
        (reference_holes.THROUGH, values),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(
    x: Floats, loads: Loads, body: Body, cracks: int, k: Floats, reference: Floats
) -> tuple[WorkingStep, ...]:
    radius, width = hole_parts.radius(body), body["width"]
    numbers = (
        f"a = {parts.millimetres(x[0])}, R = {parts.millimetres(radius)}, "
        f"W = {parts.millimetres(width)}, n = {cracks}"
    )
    tension = hole_through.tension(x[0], radius, width, cracks)
    pin = hole_through.pin(x[0], radius, width, cracks)
    left = "N/(W − D − 2a)" if cracks == 2 else "N/(W − D − a − 2s), s for balance of moments"
    return (
        hole_parts.nominal_step(loads, body),
        parts.step_factor(
            "Geometry factor, stress that passes the hole by",
            "F_m = Σ c_k λ^k √(sec(πR/W) sec{π(2R + na)/[4(W/2 − a) + 2na]}), λ = R/(R + a)",
            numbers,
            tension,
            hole_through.TENSION.source,
        ),
        parts.step_factor(
            "Geometry factor, pin",
            "F_p = (F_m D/W + G g_w)/2: half remote tension, half a pair of pins",
            numbers,
            pin,
            hole_through.PIN.source,
        ),
        parts.step_k(
            "tip",
            "K = (F_m σ_m + F_p σ_b) √(πa)",
            f"F_m = {float(tension):.4g}, F_p = {float(pin):.4g}, "
            f"σ_m = {float(parts.load(loads, 'membrane')):g} MPa, "
            f"σ_b = {float(hole_parts.bearing(loads, body)):.4g} MPa, {numbers}",
            k,
            hole_through.TENSION.source,
        ),
        parts.step_reference(
            f"σ_ref = {left}, N = σ_m W + σ_b D",
            numbers,
            reference,
            reference_holes.THROUGH.source,
        ),
    )


ONE = _kind("hole-through-one", "a crack through the plate, from one side of a hole", 1)
TWO = _kind("hole-through-two", "cracks through the plate, from both sides of a hole", 2)
