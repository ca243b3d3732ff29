"""weld-toe-surface: a semi-elliptical crack along the toe of a transverse fillet weld.

The stress of the loads is the structural stress at the toe, so the weld's own notch is put on top
by the magnification. Residual stress is taken as it is: it was measured or assumed with the weld
there (BS 7910, annex M, from memory: secondary stresses are not magnified). So is a stress profile:
it holds the notch.
"""

import numpy as np

from assessment.relations import reference_stress, surface_crack, weight_function, weld_toe
from assessment.validity import Floats, Mark

from . import parts, plate_surface, two_points
from .base import Body, Kind, Loads, WorkingStep

HELD = {"membrane": "residual_membrane", "bending": "residual_bending"}


def _magnified(x: Floats, body: Body) -> tuple[Floats, Floats]:
    """M_k in membrane and in bending, each at the deepest and the surface point."""
    z = np.stack([x[0], np.full_like(np.asarray(x[0], dtype=float), weld_toe.AT_SURFACE)])
    return weld_toe.magnification(z, body["attachment_length"], body["thickness"])


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    in_membrane, in_bending = _magnified(x, body)
    membrane, bending = parts.load(loads, "membrane"), parts.load(loads, "bending")
    held = {name: parts.load(loads, by) for name, by in HELD.items()}
    at_points = (
        surface_crack.stress_intensity(
            x[0],
            x[1],
            in_membrane[point] * membrane + held["membrane"],
            in_bending[point] * bending + held["bending"],
            body["thickness"],
            body["width"],
        )[point]
        for point in range(len(two_points.AT))
    )
    return plate_surface.with_profiles(np.stack(tuple(at_points)), x, loads, body)


def _checks(x: Floats, body: Body) -> parts.Checks:
    height = np.asarray(x[0], dtype=float) / body["thickness"]
    surface = weld_toe.AT_SURFACE / body["thickness"]
    long = np.full_like(height, body["attachment_length"] / body["thickness"])
    return (
        *plate_surface.checks(x, body),
        (weld_toe.VALIDITY, {"z/B": height, "L/B": long}),
        (weld_toe.VALIDITY, {"z/B": np.full_like(height, surface), "L/B": long}),
    )


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return tuple(dict.fromkeys(parts.marks_of(_checks(x, body))))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    membrane, bending = _magnified(x, body)
    toe = f"L = {parts.millimetres(body['attachment_length'])}, B = "
    toe += parts.millimetres(body["thickness"])
    steps = tuple(
        parts.step_factor(
            f"Magnification at the weld toe, {load}, {at}",
            "M_k = v (z/B)^w, at least 1",
            f"z = {parts.millimetres(z)}, {toe}",
            value,
            weld_toe.VALIDITY.source,
        )
        for load, factors in (("membrane", membrane), ("bending", bending))
        for at, z, value in zip(two_points.AT, (x[0], weld_toe.AT_SURFACE), factors, strict=True)
    )
    k = two_points.k_steps(
        x,
        loads,
        body,
        _k,
        "K = (M_km σ_m + M_kb H σ_b) √(πa/Q) F(a/c, a/t, φ, c/W)",
        surface_crack.VALIDITY.source,
    )
    return (*steps, *k, plate_surface.reference_step(x, loads, body))


KIND = Kind(
    name="weld-toe-surface",
    words="a crack along the toe of a weld, not through the wall",
    body_keys=("width_mm", "thickness_mm", "attachment_length_mm", "weld_condition"),
    load_keys=("membrane_mpa", "bending_mpa"),
    sizes=("depth_mm", "length_mm"),
    points=two_points.AT,
    front=two_points.front,
    sizes_of=plate_surface.KIND.sizes_of,
    stress_intensity=_k,
    reference_stress=plate_surface.KIND.reference_stress,
    nominal_stress=parts.nominal,
    impossible=plate_surface.KIND.impossible,
    wall=plate_surface.KIND.wall,
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(
        weld_toe.VALIDITY,
        surface_crack.VALIDITY,
        reference_stress.SURFACE,
        weight_function.SURFACE,
    ),
    profile_over="thickness",
    working=_working,
    becomes=plate_surface.KIND.becomes,
    residual_names=HELD,
)
