"""bar-surface: a crack across a round bar, from its surface, tension and bending.

The front is taken as an arc that meets the surface at right angles; a given length is compared
with that front's, since the published factor knows no other.
"""

import numpy as np

from assessment.relations import bar, reference_stress
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / body["diameter"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    relative = _relative(x, body)
    with np.errstate(invalid="ignore"):
        stress = bar.tension(relative) * parts.load(loads, "membrane")
        stress = stress + bar.bending(relative) * parts.load(loads, "bending")
        return np.asarray(stress * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_stress.bar(
        parts.load(loads, "membrane"), parts.load(loads, "bending"), _relative(x, body)
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"a/D": _relative(x, body)}
    return ((bar.VALIDITY, value), (reference_stress.BAR, value))


def _impossible(x: Floats, body: Body) -> str | None:
    if x[0] >= body["diameter"]:
        return (
            f"the crack ({parts.millimetres(x[0])}) is deeper than the bar "
            f"({parts.millimetres(body['diameter'])})."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    numbers = f"λ = a/D = {float(relative):.4g}"
    membrane, bending = (float(parts.load(loads, n)) for n in ("membrane", "bending"))
    tension, bend = bar.tension(relative), bar.bending(relative)
    source = bar.VALIDITY.source
    return (
        WorkingStep(
            "Length along the surface of the assumed front",
            "2c = D [π/2 − 2 arctan(1 − 2a/D)]",
            numbers,
            float(bar.surface_length(x[0], body["diameter"])) * 1e3,
            "mm",
            bar.FRONT.source,
        ),
        parts.step_factor(
            "Geometry factor, tension",
            "F_m = g [0.752 + 2.02 λ + 0.37 (1 − sin(πλ/2))³]",
            numbers,
            tension,
            source,
        ),
        parts.step_factor(
            "Geometry factor, bending",
            "F_b = g [0.923 + 0.199 (1 − sin(πλ/2))⁴]",
            numbers,
            bend,
            source,
        ),
        parts.step_k(
            "deepest point",
            "K = (F_m σ_m + F_b σ_b) √(πa)",
            f"F_m = {float(tension):.4g}, F_b = {float(bend):.4g}, σ_m = {membrane:g} MPa, "
            f"σ_b = {bending:g} MPa, a = {parts.millimetres(x[0])}",
            _k(x, loads, body)[0],
            source,
        ),
        parts.step_reference(
            "σ_ref = N/A + (M + N e)/Z of the bar cut off at the crack's depth",
            f"P_m = {membrane:g} MPa, P_b = {bending:g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_stress.BAR.source,
        ),
    )


KIND = Kind(
    name="bar-surface",
    words="a crack across a round bar, from its surface",
    body_keys=("diameter_mm",),
    load_keys=("membrane_mpa", "bending_mpa"),
    sizes=("depth_mm",),
    optional_sizes=("length_mm",),
    points=("deepest",),
    front=lambda depth, length, body: parts.one(depth),
    sizes_of=lambda x, body: (x[0], bar.surface_length(x[0], body["diameter"])),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: (body["diameter"] - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(bar.VALIDITY, reference_stress.BAR),
    working=_working,
    becomes=lambda x, body: None,
)
