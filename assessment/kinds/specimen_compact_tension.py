"""specimen-compact-tension: the standard compact specimen under a force."""

import numpy as np

from assessment.relations import reference_plates, specimens
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep

KN = 1e-3  # kN to MN, so that forces over m² are MPa


def _relative(x: Floats, body: Body) -> Floats:
    return np.asarray(x[0] / body["width"])


def _nominal(loads: Loads, body: Body) -> Floats:
    """P / (B W), MPa."""
    return np.asarray(parts.load(loads, "load") * KN / (body["thickness"] * body["width"]))


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    with np.errstate(invalid="ignore"):
        f = specimens.compact(_relative(x, body))
        return np.asarray(f * _nominal(loads, body) * np.sqrt(body["width"]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    """The force acts W measured from the load line, so at a + (W − a)/2 from the middle."""
    relative, nominal = _relative(x, body), _nominal(loads, body)
    return reference_plates.ligament(nominal, nominal * (1.0 + relative) / 2.0, 1.0 - relative)


def _checks(x: Floats, body: Body) -> parts.Checks:
    value = {"a/W": _relative(x, body)}
    return ((specimens.COMPACT, value), (reference_plates.SPECIMEN, value))


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    relative = _relative(x, body)
    f = specimens.compact(relative)
    numbers = f"α = a/W = {float(relative):.4g}"
    force = float(parts.load(loads, "load"))
    return (
        parts.step_factor(
            "Geometry factor",
            "f = (2 + α)/(1 − α)^1.5 (0.886 + 4.64 α − 13.32 α² + 14.72 α³ − 5.6 α⁴)",
            numbers,
            f,
            specimens.COMPACT.source,
        ),
        parts.step_k(
            "tip",
            "K = P f / (B √W)",
            f"P = {force:g} kN, f = {float(f):.4g}, B = {parts.millimetres(body['thickness'])}, "
            f"W = {parts.millimetres(body['width'])}",
            _k(x, loads, body)[0],
            specimens.COMPACT.source,
        ),
        parts.step_reference(
            "σ_ref = 2m + √(4m² + n²), n = (P/BW)/(1 − α), m = (P/BW)(1 + α)/[2 (1 − α)²]",
            f"P/BW = {float(_nominal(loads, body)):.4g} MPa, {numbers}",
            _reference(x, loads, body),
            reference_plates.SPECIMEN.source,
        ),
    )


KIND = Kind(
    name="specimen-compact-tension",
    words="the crack of a compact tension specimen",
    body_keys=("width_mm", "thickness_mm"),
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
    relations=(specimens.COMPACT, reference_plates.SPECIMEN),
    working=_working,
    becomes=lambda x, body: None,
)
