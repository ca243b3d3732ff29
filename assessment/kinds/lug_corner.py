"""lug-corner: a quarter-elliptical crack from a corner of a lug's bore, under its pin's load."""

import numpy as np

from assessment.relations import lug, reference_holes
from assessment.validity import Floats, Mark

from . import hole_corner, hole_parts, lug_through, parts, two_points
from .base import Body, Kind, Loads, WorkingStep


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    by_pin = lug.corner(
        x[0],
        x[1],
        body["thickness"],
        hole_parts.radius(body),
        body["width"],
        body["head"],
    )
    bearing = hole_parts.bearing(loads, body)
    with np.errstate(invalid="ignore"):
        return np.stack([p * bearing for p in by_pin])


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    """The crack counts as its rectangle a × c."""
    return reference_holes.lug(
        hole_parts.bearing(loads, body),
        np.asarray(x[0] / body["thickness"]),
        x[1],
        hole_parts.radius(body),
        body["width"],
        body["head"],
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    radius, width, head = hole_parts.radius(body), body["width"], body["head"]
    return (
        (lug.CORNER, lug.corner_values(x[0], x[1], body["thickness"], radius, width, head)),
        (reference_holes.LUG, lug.validity_values(x[1], radius, width, head)),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _impossible(x: Floats, body: Body) -> str | None:
    return lug_through.no_room(x[1], body) or two_points.deeper_than_wall(x, body)


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    said = f"a = {parts.millimetres(x[0])}, c = {parts.millimetres(x[1])}"
    bearing = float(hole_parts.bearing(loads, body))
    numbers = f"σ_b = {bearing:.4g} MPa, {lug_through.numbers(body)}"
    return (
        hole_parts.nominal_step(loads, body),
        *hole_corner.k_steps(
            x,
            _k(x, loads, body),
            "K = σ_b K_corner (D/W + G_∞(l)/F_∞(l))/2 S(ξ_A), l = c cos(0.85 φ), "
            "ξ_A from the area π a c/(4 t)",
            f"{numbers}, t = {parts.millimetres(body['thickness'])}",
            lug.CORNER.source,
        ),
        lug_through.reference_step(said, body, _reference(x, loads, body)),
    )


KIND = Kind(
    name="lug-corner",
    words="a crack in one corner of a lug's bore, not through the lug",
    body_keys=lug_through.BODY,
    load_keys=("pin_load_kn",),
    sizes=("depth_mm", "length_mm"),
    points=two_points.AT,
    front=hole_corner.front,
    sizes_of=lambda x, body: (x[0], x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=hole_parts.nominal,
    impossible=_impossible,
    wall=hole_corner.wall,
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(lug.CORNER, reference_holes.LUG),
    working=_working,
    becomes=lambda x, body: ("lug-through", None, float(x[1]), body),
)
