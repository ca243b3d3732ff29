"""specimen-edge-bend: the standard single-edge-notched bend specimen under a force."""

import numpy as np

from assessment.relations import reference_plates, specimens
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep

KN = 1e-3  # kN to MN, so that forces over m² are MPa


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / body["width"])


def _nominal(loads: Loads, body: Body) -> Floats:
    """P S / (B W²), MPa."""
    force = parts.load(loads, "load") * KN
    return np.asarray(force * body["span"] / (body["thickness"] * body["width"] ** 2))


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    with np.errstate(invalid="ignore"):
        f = specimens.bend(_relative(x, body))
        return np.asarray(f * _nominal(loads, body) * np.sqrt(body["width"]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    """The moment P S/4 alone."""
    nil = np.asarray(0.0)
    return reference_plates.ligament(nil, _nominal(loads, body) / 4.0, 1.0 - _relative(x, body))


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"a/W": _relative(x, body)}
    span = {"S/W": np.asarray(body["span"] / body["width"])}
    return ((specimens.BEND, value | span), (reference_plates.SPECIMEN, value))


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    f = specimens.bend(relative)
    numbers = f"α = a/W = {float(relative):.4g}"
    force = float(parts.load(loads, "load"))
    return (
        parts.step_factor(
            "Geometry factor",
            "f = 3 √α [1.99 − α(1 − α)(2.15 − 3.93 α + 2.7 α²)] / [2 (1 + 2α)(1 − α)^1.5]",
            numbers,
            f,
            specimens.BEND.source,
        ),
        parts.step_k(
            "tip",
            "K = P S f / (B W^1.5)",
            f"P = {force:g} kN, S = {parts.millimetres(body['span'])}, f = {float(f):.4g}, "
            f"B = {parts.millimetres(body['thickness'])}, W = {parts.millimetres(body['width'])}",
            _k(x, loads, body)[0],
            specimens.BEND.source,
        ),
        parts.step_reference(
            "σ_ref = 4 M / (B (W − a)²), M = P S/4",
            f"P = {force:g} kN, S = {parts.millimetres(body['span'])}, {numbers}",
            _reference(x, loads, body),
            reference_plates.SPECIMEN.source,
        ),
    )


KIND = Kind(
    name="specimen-edge-bend",
    words="the crack of an edge-notched bend specimen",
    body_keys=("width_mm", "thickness_mm", "span_mm"),
    load_keys=("load_kn",),
    sizes=("length_mm",),
    points=("tip",),
    through=True,
    front=lambda depth, length, body: parts.one(length),
    sizes_of=lambda x, body: (None, x[0]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=lambda loads, body: float(_nominal(loads, body)) or None,
    impossible=lambda x, body: parts.longer_than_wide(x, body),
    wall=lambda x, body: (body["width"] - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(specimens.BEND, reference_plates.SPECIMEN),
    working=_working,
    becomes=lambda x, body: None,
)
