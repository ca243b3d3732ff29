"""plate-surface: a semi-elliptical crack in the surface of a plate, membrane and bending."""

import numpy as np

from assessment.relations import reference_stress, surface_crack, weight_function
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending = parts.load(loads, "membrane"), parts.load(loads, "bending")
    k = surface_crack.stress_intensity(
        x[0], x[1], membrane, bending, body["thickness"], body["width"]
    )
    return with_profiles(k, x, loads, body)


def with_profiles(k: Floats, x: Floats, loads: Loads, body: Body) -> Floats:
    """K with that of the stress profiles. k : shape (2, ...)"""
    for times, points in parts.profiles(loads, body):
        more = surface_crack.stress_intensity_of_profile(
            x[0], x[1], points, body["thickness"], body["width"]
        )
        k = np.stack([k[point] + times * more[point] for point in (0, 1)])
    return k


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane, bending = parts.section(loads, body, body["thickness"])
    return reference_stress.surface(membrane, bending, x[0], x[1], body["thickness"], body["width"])


def checks(x: Floats, body: Body) -> parts.Checks:
    values = surface_crack.validity_values(x[0], x[1], body["thickness"], body["width"])
    profile = {name: values[name] for name in ("a/c", "a/t")}
    return (
        (surface_crack.VALIDITY, values),
        (reference_stress.SURFACE, {"a/t": values["a/t"]}),
        *(((weight_function.SURFACE, profile),) if "profiles" in body else ()),
    )


def _impossible(x: Floats, body: Body) -> str | None:
    if 2.0 * x[1] > body["width"]:
        return (
            f"the crack ({parts.millimetres(2 * x[1])}) is longer than the plate is wide "
            f"({parts.millimetres(body['width'])})."
        )
    return two_points.deeper_than_wall(x, body)


def _wall(x: Floats, body: Body) -> Floats:
    return np.stack([body["thickness"] - x[0], body["width"] / 2.0 - x[1]])


def _becomes(x: Floats, body: Body) -> tuple[str, float | None, float, Body] | None:
    """Through the wall it is assessed as a through crack of its surface length."""
    return ("plate-through-centre", None, float(2.0 * x[1]), body)


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(checks(x, body))


def reference_step(x: Floats, loads: Loads, body: Body) -> WorkingStep:
    """The line of the working for the reference stress."""
    membrane, bending = (float(value) for value in parts.section(loads, body, body["thickness"]))
    return parts.step_reference(
        "σ_ref = [P_b + √(P_b² + 9 P_m² (1 − α)²)] / [3 (1 − α)²], α = (a/t)/(1 + t/c)",
        f"P_m = {membrane:g} MPa, P_b = {bending:g} MPa, a = {parts.millimetres(x[0])}, "
        f"c = {parts.millimetres(x[1])}, t = {parts.millimetres(body['thickness'])}",
        _reference(x, loads, body),
        reference_stress.SURFACE.source,
    )


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    return (
        *two_points.k_steps(
            x,
            loads,
            body,
            _k,
            "K = (σ_m + H σ_b) √(πa/Q) F(a/c, a/t, φ, c/W)",
            surface_crack.VALIDITY.source,
        ),
        reference_step(x, loads, body),
    )


KIND = Kind(
    name="plate-surface",
    words="a crack in the surface of a plate, not through it",
    body_keys=("width_mm", "thickness_mm"),
    load_keys=("membrane_mpa", "bending_mpa"),
    sizes=("depth_mm", "length_mm"),
    points=two_points.AT,
    front=two_points.front,
    sizes_of=lambda x, body: (x[0], 2.0 * x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=_wall,
    inside=lambda x, body: parts.all_hold(checks(x, body)),
    marks=_marks,
    relations=(surface_crack.VALIDITY, reference_stress.SURFACE, weight_function.SURFACE),
    profile_over="thickness",
    working=_working,
    becomes=_becomes,
)
