"""plate-embedded: an elliptical crack inside a plate, membrane stress.

The middle of the crack stays where it is while it grows; both its ends grow as the one nearer a
surface does, which is the faster.
"""

import numpy as np

from assessment.relations import embedded_crack, reference_plates
from assessment.validity import Floats, Mark

from . import parts, two_points
from .base import Body, Kind, Loads, WorkingStep

AT = ("deepest", "end")


def _placed(depth: float | None, length: float | None, loads: frozenset[str], body: Body) -> Body:
    """The distance from the crack's middle to the nearer surface, which growth leaves alone."""
    if depth is None:
        raise ValueError("this kind needs depth and length")
    return {**body, "middle": body["ligament"] + depth / 2.0}


def _front(depth: float | None, length: float | None, body: Body) -> Floats:
    """x[0] = a, half the height; x[1] = c, half the length."""
    x = two_points.two(depth, length)
    return np.asarray(x / 2.0)


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane = parts.load(loads, "membrane")
    return embedded_crack.stress_intensity(x[0], x[1], membrane, body["middle"], body["width"])


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    return reference_plates.embedded(
        parts.load(loads, "membrane"),
        x[0],
        x[1],
        body["middle"] - x[0],
        body["thickness"],
        body["width"],
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    values = embedded_crack.validity_values(x[0], x[1], body["middle"], body["width"])
    height = {"2a/t": np.asarray(2.0 * x[0] / body["thickness"])}
    return ((embedded_crack.VALIDITY, values), (reference_plates.EMBEDDED, height))


def _impossible(x: Floats, body: Body) -> str | None:
    if body["middle"] > body["thickness"] / 2.0 * (1.0 + 1e-9):
        return (
            f"the crack and its nearer ligament reach beyond the middle of the wall "
            f"({parts.millimetres(body['thickness'])}): give the ligament to the nearer surface."
        )
    if 2.0 * x[1] > body["width"]:
        return (
            f"the crack ({parts.millimetres(2 * x[1])}) is longer than the plate is wide "
            f"({parts.millimetres(body['width'])})."
        )
    return None


def _wall(x: Floats, body: Body) -> Floats:
    return np.stack([body["middle"] - x[0], body["width"] / 2.0 - x[1]])


def _becomes(x: Floats, body: Body) -> tuple[str, float | None, float, Body] | None:
    """Once the nearer ligament is gone: a surface crack as deep as the far end of this one."""
    plate = {"width": body["width"], "thickness": body["thickness"]}
    return ("plate-surface", float(body["middle"] + x[0]), float(2.0 * x[1]), plate)


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    membrane = float(parts.load(loads, "membrane"))
    ligament = body["middle"] - x[0]
    return (
        *two_points.k_steps(
            x,
            loads,
            body,
            _k,
            "K = σ_m √(πa/Q) [M₁ + M₂ (a/(a+p))² + M₃ (a/(a+p))⁴] g f_φ f_w",
            embedded_crack.VALIDITY.source,
            ("end nearer the surface (φ = 90°)", "end of the length (φ = 0)"),
        ),
        parts.step_reference(
            "σ_ref = P_m [α + √(α² + λ)] / λ, λ = (1 − α)² + 4pα/t, α = (2a/t)/(1 + t/c)",
            f"P_m = {membrane:g} MPa, a = {parts.millimetres(x[0])}, c = "
            f"{parts.millimetres(x[1])}, p = {parts.millimetres(ligament)}, t = "
            f"{parts.millimetres(body['thickness'])}",
            _reference(x, loads, body),
            reference_plates.EMBEDDED.source,
        ),
    )


KIND = Kind(
    name="plate-embedded",
    words="a crack inside a plate, reaching no surface",
    body_keys=("width_mm", "thickness_mm", "ligament_mm"),
    load_keys=("membrane_mpa",),
    sizes=("depth_mm", "length_mm"),
    points=AT,
    placed=_placed,
    front=_front,
    sizes_of=lambda x, body: (2.0 * x[0], 2.0 * x[1]),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=_wall,
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(embedded_crack.VALIDITY, reference_plates.EMBEDDED),
    working=_working,
    becomes=_becomes,
)
