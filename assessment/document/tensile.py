"""Reads ``tensile_curve``: the stress-strain curve of a tensile test."""

from typing import Any

from assessment.document.crack import TABLE_POINTS
from assessment.document.fields import Fields, as_number
from assessment.document.refusal import CaseRefused
from assessment.failure.tensile import Summary, TensileCurve, rising, summary


def read_tensile(
    material: Fields, yield_strength: float, ultimate_strength: float
) -> TensileCurve | None:
    """{"strain": "engineering" or "true", "points": [[strain, stress_mpa], …]}, or None."""
    if "tensile_curve" not in material:
        return None
    where = material.path("tensile_curve")
    fields = Fields(where, material.values["tensile_curve"], ("strain", "points", "source"))
    kind = fields.choice("strain", ("engineering", "true"))
    points: list[tuple[float, float]] = []
    for at, strain, stress in fields.pairs("points", as_number, TABLE_POINTS):
        if strain <= (points[-1][0] if points else 0.0):
            raise CaseRefused(at, "strains rise from point to point and start above 0.")
        if stress <= 0.0:
            raise CaseRefused(at, "a stress is above 0.")
        points.append((strain, stress))
    if len(points) < 3:
        raise fields.refuse("points", "a curve needs three points or more.")
    curve = TensileCurve(tuple(points), kind == "true")
    if kind == "true" and not rising(points):
        raise fields.refuse("points", "a true stress does not fall with strain.")
    flow = (yield_strength + ultimate_strength) / 2.0
    highest = float(max(curve.true_points()[1]))
    if highest < flow:
        raise fields.refuse(
            "points",
            f"the curve ends at a true stress of {highest:.4g} MPa and has to reach the flow "
            f"strength of {flow:.4g} MPa, the mean of yield and ultimate.",
        )
    return curve


def tensile_summary(material: dict[str, Any]) -> Summary | None:
    """Proof stress, ultimate strength and energy of a material's curve; None where it has none.

    material : the section of the case document. Raises CaseRefused as reading the case does.
    """
    if "tensile_curve" not in material:
        return None
    fields = Fields("material", material, material)
    strengths = (fields.number(f"{name}_mpa", above=0.0) for name in ("yield", "ultimate"))
    curve = read_tensile(fields, *strengths)
    modulus = fields.number("elastic_modulus_mpa", above=0.0)
    return None if curve is None else summary(curve, modulus)
