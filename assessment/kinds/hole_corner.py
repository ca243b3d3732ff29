"""hole-corner-one, hole-corner-two: quarter-elliptical cracks from a corner of a hole in a plate.

Membrane stress passes the hole by; the load of a pin in the hole comes on top of it and is taken up
at one end of the plate.
"""

import numpy as np

from assessment.relations import hole_corner, reference_holes
from assessment.validity import Floats, Mark

from . import hole_parts, parts, two_points
from .base import Body, Kind, Loads, WorkingStep

POINTS = ("end along the bore (φ = 90°)", "end along the width (φ = 0)")


def front(depth: float | None, length: float | None, body: Body) -> Floats:
    """x[0] = a along the bore, x[1] = c from the bore along the width."""
    if depth is None or length is None:
        raise ValueError("this kind needs depth and length")
    return np.asarray([depth, length])


def impossible(x: Floats, body: Body) -> str | None:
    return hole_parts.no_room(x[1], body) or two_points.deeper_than_wall(x, body)


def wall(x: Floats, body: Body) -> Floats:
    return np.stack([body["thickness"] - x[0], hole_parts.ligament(body) - x[1]])


def k_steps(
    x: Floats, k: Floats, formula: str, numbers: str, source: str
) -> tuple[WorkingStep, ...]:
    said = f"a = {parts.millimetres(x[0])}, c = {parts.millimetres(x[1])}, {numbers}"
    return tuple(
        parts.step_k(at, formula, said, value, source) for at, value in zip(POINTS, k, strict=True)
    )


def _kind(name: str, words: str, cracks: int, through: str) -> Kind:
    def k(x: Floats, loads: Loads, body: Body) -> Floats:
        return hole_corner.stress_intensity(
            x[0],
            x[1],
            parts.load(loads, "membrane"),
            hole_parts.bearing(loads, body),
            body["thickness"],
            hole_parts.radius(body),
            body["width"],
            cracks,
        )

    def reference(x: Floats, loads: Loads, body: Body) -> Floats:
        return reference_holes.corner(
            parts.load(loads, "membrane"),
            hole_parts.bearing(loads, body),
            x[0],
            x[1],
            body["thickness"],
            hole_parts.radius(body),
            body["width"],
            cracks,
        )

    def working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
        return _working(x, loads, body, cracks, k(x, loads, body), reference(x, loads, body))

    def becomes(x: Floats, body: Body) -> tuple[str, float | None, float, Body] | None:
        """Through the thickness it is assessed as a through crack of its length."""
        return (through, None, float(x[1]), body)

    return Kind(
        name=name,
        words=words,
        body_keys=("width_mm", "thickness_mm", "hole_diameter_mm"),
        load_keys=("membrane_mpa", "pin_load_kn"),
        sizes=("depth_mm", "length_mm"),
        points=two_points.AT,
        front=front,
        sizes_of=lambda x, body: (x[0], x[1]),
        stress_intensity=k,
        reference_stress=reference,
        nominal_stress=hole_parts.nominal,
        impossible=impossible,
        wall=wall,
        inside=lambda x, body: parts.all_hold(_checks(x, body)),
        marks=_marks,
        relations=(hole_corner.TENSION, hole_corner.PIN, reference_holes.CORNER),
        working=working,
        becomes=becomes,
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = hole_corner.validity_values(
        x[0], x[1], body["thickness"], hole_parts.radius(body), body["width"]
    )
    return (
        (hole_corner.TENSION, values),
        (hole_corner.PIN, values),
        (reference_holes.CORNER, values),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(
    x: Floats, loads: Loads, body: Body, cracks: int, k: Floats, reference: Floats
) -> tuple[WorkingStep, ...]:
    numbers = (
        f"R = {parts.millimetres(hole_parts.radius(body))}, "
        f"t = {parts.millimetres(body['thickness'])}, W = {parts.millimetres(body['width'])}, "
        f"n = {cracks}, σ_m = {float(parts.load(loads, 'membrane')):g} MPa, "
        f"σ_b = {float(hole_parts.bearing(loads, body)):.4g} MPa"
    )
    return (
        hole_parts.nominal_step(loads, body),
        *k_steps(
            x,
            k,
            "K = √(πa/Q) F(a/c, a/t, c/R, R/t, φ) {σ_m f_w + σ_b [f_w D/W + g_w G/F]/2}",
            numbers,
            hole_corner.TENSION.source,
        ),
        parts.step_reference(
            "σ_ref = the larger of N/(W − D − n(a/t)c − 2s) and N/(W − D)/[1 − (a/t) c/z], "
            "z = c + t, at most the ligament; N = σ_m W + σ_b D; s = 0 for two cracks",
            numbers,
            reference,
            reference_holes.CORNER.source,
        ),
    )


ONE = _kind(
    "hole-corner-one",
    "a crack in one corner of a hole, not through the plate",
    1,
    "hole-through-one",
)
TWO = _kind(
    "hole-corner-two",
    "cracks in two opposite corners of a hole, not through the plate",
    2,
    "hole-through-two",
)
