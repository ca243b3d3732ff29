"""What the two axial surface cracks of a cylinder share: only their relations differ."""

from collections.abc import Callable
from dataclasses import dataclass
from functools import partial

import numpy as np

from assessment.validity import Floats, Mark, Validity

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep


@dataclass(frozen=True)
class Side:
    """stress_intensity, reference : (a, c, pressure, thickness, inner radius) to MPa√m, to MPa
    values : (a, c, thickness, inner radius) to the symbols of ``validity``
    formula, reference_formula : as printed in the working
    """

    stress_intensity: Callable[..., Floats]
    values: Callable[..., dict[str, Floats]]
    validity: Validity
    formula: str
    reference: Callable[..., Floats]
    reference_validity: Validity
    reference_formula: str


def surface_kind(name: str, words: str, side: Side) -> Kind:
    """The kind of one side."""
    return Kind(
        name=name,
        words=words,
        body_keys=("inner_radius_mm", "thickness_mm"),
        load_keys=("pressure_mpa",),
        sizes=("depth_mm", "length_mm"),
        points=two_points.AT,
        front=two_points.front,
        sizes_of=lambda x, body: (x[0], 2.0 * x[1]),
        stress_intensity=partial(_k, side),
        reference_stress=partial(_reference, side),
        nominal_stress=hoop,
        impossible=two_points.deeper_than_wall,
        wall=lambda x, body: np.stack([body["thickness"] - x[0], np.full_like(x[1], np.inf)]),
        inside=lambda x, body: parts.all_hold(_checks(side, x, body)),
        marks=partial(_marks, side),
        relations=(side.validity, side.reference_validity),
        working=partial(_working, side),
        becomes=lambda x, body: None,
        leaks_to=_becomes_through,
    )


def hoop(loads: Loads, body: Body) -> float | None:
    """The nominal stress that the geometry factor is divided by; None without pressure."""
    stress = float(parts.load(loads, "pressure")) * body["inner_radius"] / body["thickness"]
    return float(stress) if stress != 0.0 else None


def _k(side: Side, x: Floats, loads: Loads, body: Body) -> Floats:
    pressure = parts.load(loads, "pressure")
    return side.stress_intensity(x[0], x[1], pressure, body["thickness"], body["inner_radius"])


def _reference(side: Side, x: Floats, loads: Loads, body: Body) -> Floats:
    pressure = parts.load(loads, "pressure")
    return side.reference(pressure, x[0], x[1], body["thickness"], body["inner_radius"])


def _checks(side: Side, x: Floats, body: Body) -> parts.Checks:
    values = side.values(x[0], x[1], body["thickness"], body["inner_radius"])
    return ((side.validity, values), (side.reference_validity, {"a/t": values["a/t"]}))


def _marks(side: Side, x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(side, x, body))


def _becomes_through(x: Floats, body: Body) -> tuple[str, float | None, float, Body]:
    """Through the wall it is a through crack of its surface length."""
    return ("cylinder-axial-through", None, float(2.0 * x[1]), body)


def _working(side: Side, x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    pressure = float(parts.load(loads, "pressure"))
    numbers = (
        f"p = {pressure:g} MPa, R_i = {parts.millimetres(body['inner_radius'])}, "
        f"t = {parts.millimetres(body['thickness'])}"
    )
    nominal = pressure * body["inner_radius"] / body["thickness"]
    return (
        WorkingStep(
            "Hoop stress (nominal)",
            "σ_h = p R_i/t",
            numbers,
            nominal,
            "MPa",
            "thin-wall equilibrium",
        ),
        *two_points.k_steps(x, loads, body, partial(_k, side), side.formula, side.validity.source),
        parts.step_reference(
            side.reference_formula,
            numbers,
            _reference(side, x, loads, body),
            side.reference_validity.source,
        ),
    )
