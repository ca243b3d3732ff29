"""Reads ``tensile_curve``: the stress-strain curve of a tensile test."""

from assessment.document.crack import TABLE_POINTS
from assessment.document.fields import Fields, as_number
from assessment.document.refusal import CaseRefused
from assessment.failure.tensile import TensileCurve, rising

# The proof stress of the curve and the yield strength beside it may differ by what two test pieces
# of one metal do. Common practice, no source.
PROOF_SLACK = 0.15


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
