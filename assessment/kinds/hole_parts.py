"""What cracks at holes and in lugs share: the pin's bearing stress, the ligament, their words."""

from typing import Any

import numpy as np

from assessment.validity import Floats

from . import parts
from .base import Body, Loads, WorkingStep

KN_PER_SQUARE_METRE = 1e-3  # in MPa
COUNT = {1: "one side", 2: "both sides"}


def radius(body: Body) -> float:
    return float(body["hole_diameter"]) / 2.0


def ligament(body: Body) -> float:
    """Metal between the bore and the edge of the plate or lug, in m."""
    return float(body["width"]) / 2.0 - radius(body)


def bearing(loads: Loads, body: Body) -> Floats:
    """σ_b = P/(D t) in MPa, P in kN."""
    area = body["hole_diameter"] * body["thickness"]
    return np.asarray(parts.load(loads, "pin_load") * KN_PER_SQUARE_METRE / area)


def nominal(loads: Loads, body: Body) -> float | None:
    """Membrane + bearing stress, which the geometry factor is divided by; None where it is nil."""
    total = float(parts.load(loads, "membrane") + bearing(loads, body))
    return total if total != 0.0 else None


def nominal_step(loads: Loads, body: Body) -> WorkingStep:
    membrane, pin = float(parts.load(loads, "membrane")), float(parts.load(loads, "pin_load"))
    return WorkingStep(
        "Nominal stress",
        "σ_m + σ_b, the bearing stress σ_b = P/(D t)",
        f"σ_m = {membrane:g} MPa, P = {pin:g} kN, D = {parts.millimetres(body['hole_diameter'])}, "
        f"t = {parts.millimetres(body['thickness'])}",
        membrane + float(bearing(loads, body)),
        "MPa",
        "definition",
    )


def no_room(length: Any, body: Body) -> str | None:
    """Why a hole and a crack of this length do not fit the width, or None."""
    if ligament(body) <= 0.0:
        return (
            f"the hole ({parts.millimetres(body['hole_diameter'])}) is as wide as the part "
            f"({parts.millimetres(body['width'])})."
        )
    if length >= ligament(body):
        return (
            f"the crack ({parts.millimetres(length)}) is as long as the metal beside the hole "
            f"({parts.millimetres(ligament(body))})."
        )
    return None
