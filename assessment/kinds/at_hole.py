"""What through cracks at one and at both sides of a hole share: see the two kinds."""

import numpy as np

from assessment.relations import hole_through, reference_holes
from assessment.validity import Floats, Mark

from . import parts
from .base import Body, Kind, Loads, WorkingStep

KN = 1e-3  # kN to MN, so that forces over m² are MPa


def _radius(body: Body) -> float:
    return float(body["hole_diameter"]) / 2.0


def _pin_stress(loads: Loads, body: Body) -> Floats:
    """The pin force over the whole section, MPa."""
    return np.asarray(parts.load(loads, "pin_load") * KN / (body["width"] * body["thickness"]))


def _nominal(loads: Loads, body: Body) -> float | None:
    """Bypass stress and pin force over the whole section."""
    total = float(parts.load(loads, "membrane") + _pin_stress(loads, body))
    return total or None


def of(name: str, words: str, cracks: int) -> Kind:
    """The kind for so many cracks."""

    def k(x: Floats, loads: Loads, body: Body) -> Floats:
        membrane, pin = parts.load(loads, "membrane"), _pin_stress(loads, body)
        found = tension_k(x, membrane + 0.5 * pin, body)
        if np.any(pin != 0.0):
            found = found + 0.5 * pair_k(x, pin, body)
        return np.asarray(found)[None]

    def tension_k(x: Floats, stress: Floats, body: Body) -> Floats:
        radius = _radius(body)
        length, half = x[0] / radius, body["width"] / (2.0 * radius)
        f = hole_through.tension(length, cracks) * hole_through.strip_tension(length, half, cracks)
        return np.asarray(f * stress * np.sqrt(np.pi * x[0]))

    def pair_k(x: Floats, pin: Floats, body: Body) -> Floats:
        radius = _radius(body)
        length, half = x[0] / radius, body["width"] / (2.0 * radius)
        f = hole_through.pin_pair(length, cracks) * hole_through.strip_pin(length, half, cracks)
        pressure = pin * body["width"] * 2.0 / (np.pi * radius)
        return np.asarray(np.where(pin == 0.0, 0.0, f * pressure) * np.sqrt(np.pi * x[0]))

    def removed(x: Floats, body: Body) -> Floats:
        return np.asarray((body["hole_diameter"] + cracks * x[0]) / body["width"])

    def reference(x: Floats, loads: Loads, body: Body) -> Floats:
        stress = parts.load(loads, "membrane") + _pin_stress(loads, body)
        return reference_holes.net_section(stress, removed(x, body))

    def checks(x: Floats, body: Body) -> parts.Checks:
        radius, half = _radius(body), body["width"] / 2.0
        value = {
            "L/R": np.asarray(x[0] / radius),
            "hole and crack/W": np.asarray((radius + x[0]) / half),
        }
        always = (
            (hole_through.TENSION, value),
            (reference_holes.NET, {"(D + ΣL)/W": removed(x, body)}),
        )
        if not body.get("pinned"):
            return always
        pin = {
            "2R/W": np.asarray(radius / half),
            "L/(W/2 − R)": np.asarray(x[0] / (half - radius)),
        }
        return (*always, (hole_through.PIN, pin))

    def impossible(x: Floats, body: Body) -> str | None:
        beside = body["width"] / 2.0 - _radius(body)
        if beside <= 0.0:
            return f"the hole is as wide as the plate ({parts.millimetres(body['width'])})."
        if x[0] >= beside:
            return (
                f"the crack ({parts.millimetres(x[0])}) is longer than the {beside * 1e3:.4g} mm "
                "beside the hole."
            )
        return None

    def marks(x: Floats, body: Body) -> tuple[Mark, ...]:
        return parts.marks_of(checks(x, body))

    def working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
        radius = _radius(body)
        length, half = x[0] / radius, body["width"] / (2.0 * radius)
        membrane, pin = float(parts.load(loads, "membrane")), float(_pin_stress(loads, body))
        f, width = (
            float(hole_through.tension(length, cracks)),
            float(hole_through.strip_tension(length, half, cracks)),
        )
        numbers = f"L/R = {float(length):.4g}, s = L/(R + L) = {float(length / (1 + length)):.4g}"
        steps = [
            parts.step_factor(
                "Geometry factor, stress at both ends",
                "F = 3.3646 (1 − s) + e s + s (1 − s) Σ c_i sⁱ",
                numbers,
                f,
                hole_through.TENSION.source,
            ),
            parts.step_factor(
                "Factor for finite width",
                "f_w = √{sec(πR/W) sec[π(2R + nL)/(2(W − 2L) + 2nL)]}",
                f"n = {cracks}, W/2R = {half:.4g}",
                width,
                hole_through.TENSION.source,
            ),
        ]
        if pin:
            steps.append(
                parts.step_k(
                    "two pins that push apart",
                    "K₂ = F₂ f₂ (2P/πRt) √(πL)",
                    f"P/Wt = {pin:.4g} MPa, {numbers}",
                    pair_k(x, np.asarray(pin), body),
                    hole_through.PIN.source,
                )
            )
        steps += [
            parts.step_k(
                "tip",
                "K = F f_w (σ + ½ P/Wt) √(πL) + ½ K₂",
                f"F = {f:.4g}, f_w = {width:.4g}, σ = {membrane:g} MPa, P/Wt = {pin:.4g} MPa, "
                f"L = {parts.millimetres(x[0])}",
                k(x, loads, body)[0],
                hole_through.TENSION.source,
            ),
            parts.step_reference(
                "σ_ref = (σ + P/Wt) / [1 − (D + nL)/W]",
                f"σ = {membrane:g} MPa, P/Wt = {pin:.4g} MPa, (D + nL)/W = "
                f"{float(removed(x, body)):.4g}",
                reference(x, loads, body),
                reference_holes.NET.source,
            ),
        ]
        return tuple(steps)

    return Kind(
        name=name,
        words=words,
        body_keys=("width_mm", "thickness_mm", "hole_diameter_mm"),
        load_keys=("membrane_mpa", "pin_load_kn"),
        sizes=("length_mm",),
        points=("tip",),
        through=True,
        placed=lambda depth, length, loads, body: {**body, "pinned": "pin_load" in loads},
        front=lambda depth, length, body: parts.one(length),
        sizes_of=lambda x, body: (None, x[0]),
        stress_intensity=k,
        reference_stress=reference,
        nominal_stress=_nominal,
        impossible=impossible,
        wall=lambda x, body: (body["width"] / 2.0 - _radius(body) - x[0])[None],
        inside=lambda x, body: parts.all_hold(checks(x, body)),
        marks=marks,
        relations=(hole_through.TENSION, hole_through.PIN, reference_holes.NET),
        working=working,
        becomes=lambda x, body: None,
    )
