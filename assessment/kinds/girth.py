"""What the two girth surface cracks share: the cracked side and the pressure on it differ alone."""

from functools import partial

import numpy as np

from assessment.relations import girth_surface, reference_cylinders
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep

LOADS = ("membrane_mpa", "global_bending_mpa", "pressure_mpa")


def surface_kind(name: str, words: str, inside: bool) -> Kind:
    """The kind of one side. inside : the crack is in the bore, with the pressure on its faces."""
    return Kind(
        name=name,
        words=words,
        body_keys=("inner_radius_mm", "thickness_mm"),
        load_keys=LOADS,
        sizes=("depth_mm", "length_mm"),
        points=two_points.AT,
        front=two_points.front,
        sizes_of=lambda x, body: (x[0], 2.0 * x[1]),
        stress_intensity=partial(_k, inside),
        reference_stress=partial(_reference, inside),
        nominal_stress=axial_nominal,
        impossible=partial(_impossible, inside),
        wall=partial(_wall, inside),
        inside=lambda x, body: parts.all_hold(_checks(inside, x, body)),
        marks=partial(_marks, inside),
        relations=(girth_surface.VALIDITY, reference_cylinders.GIRTH_SURFACE),
        working=partial(_working, inside),
        becomes=lambda x, body: None,
        leaks_to=partial(_becomes, inside),
    )


def axial_nominal(loads: Loads, body: Body) -> float | None:
    """Membrane + global bending, which the geometry factor is divided by; None where it is nil."""
    total = float(parts.load(loads, "membrane") + parts.load(loads, "global_bending"))
    return total if total != 0.0 else None


def cracked_radius(inside: bool, body: Body) -> float:
    radius: float = body["inner_radius"]
    return radius if inside else radius + body["thickness"]


def _axial(inside: bool, loads: Loads) -> Floats:
    """Membrane stress, and the pressure on the faces of an inside crack."""
    membrane, pressure = parts.load(loads, "membrane"), parts.load(loads, "pressure")
    return membrane + (pressure if inside else 0.0 * pressure)


def _k(inside: bool, x: Floats, loads: Loads, body: Body) -> Floats:
    return girth_surface.stress_intensity(
        x[0],
        x[1],
        _axial(inside, loads),
        parts.load(loads, "global_bending"),
        cracked_radius(inside, body),
        body["thickness"],
        body["inner_radius"],
    )


def _reference(inside: bool, x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_cylinders.girth_surface(
        _axial(inside, loads),
        parts.load(loads, "global_bending"),
        parts.load(loads, "pressure"),
        x[0],
        x[1],
        cracked_radius(inside, body),
        body["thickness"],
        body["inner_radius"],
    )


def _checks(inside: bool, x: Floats, body: Body) -> parts.Checks:
    values = girth_surface.validity_values(
        x[0], x[1], cracked_radius(inside, body), body["thickness"], body["inner_radius"]
    )
    return (
        (girth_surface.VALIDITY, values),
        (reference_cylinders.GIRTH_SURFACE, {name: values[name] for name in ("a/t", "θ/π")}),
    )


def _marks(inside: bool, x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(inside, x, body))


def _around(inside: bool, body: Body) -> float:
    """Half the way around the cracked surface."""
    return float(np.pi) * cracked_radius(inside, body)


def _impossible(inside: bool, x: Floats, body: Body) -> str | None:
    if x[1] > _around(inside, body):
        return (
            f"the crack ({parts.millimetres(2 * x[1])}) is longer than the way around the "
            f"cylinder ({parts.millimetres(2 * _around(inside, body))})."
        )
    return two_points.deeper_than_wall(x, body)


def _wall(inside: bool, x: Floats, body: Body) -> Floats:
    return np.stack([body["thickness"] - x[0], _around(inside, body) - x[1]])


def _becomes(inside: bool, x: Floats, body: Body) -> tuple[str, float | None, float, Body]:
    """Through the wall it is a through crack of the same angle, its length at mid-thickness."""
    mean = body["inner_radius"] + body["thickness"] / 2.0
    length = 2.0 * float(x[1]) * mean / cracked_radius(inside, body)
    return ("cylinder-girth-through", None, length, body)


def _working(inside: bool, x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    faces = " + p (on the faces)" if inside else ""
    numbers = (
        f"R_i = {parts.millimetres(body['inner_radius'])}, "
        f"t = {parts.millimetres(body['thickness'])}, "
        f"r = {parts.millimetres(cracked_radius(inside, body))}"
    )
    return (
        WorkingStep(
            "Axial stress at the middle of the crack",
            f"σ_m{faces} + σ_gb R_m/R_o, and σ_gb (r − R_m)/R_o as bending of the wall",
            numbers,
            float(
                _axial(inside, loads)
                + parts.load(loads, "global_bending")
                * (body["inner_radius"] + body["thickness"] / 2.0)
                / (body["inner_radius"] + body["thickness"])
            ),
            "MPa",
            "superposition",
        ),
        *two_points.k_steps(
            x,
            loads,
            body,
            partial(_k, inside),
            "K = (σ_m + H σ_b) √(πa/Q) F(a/c, a/t, φ), the plate being wide",
            girth_surface.VALIDITY.source,
        ),
        parts.step_reference(
            "the largest of: net section β = ½(π − αθ − πN/σ), M/σ = (2/π)(2 sin β − α sin θ); "
            "P_m [π(1 − α) + 2α sin(c/R_m)] / {(1 − α)[π − (c/R_m)α]} + 2P_b/[3(1 − α″)²]; "
            "p/ln(R_o/R_i)",
            numbers,
            _reference(inside, x, loads, body),
            reference_cylinders.GIRTH_SURFACE.source,
        ),
    )
