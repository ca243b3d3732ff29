"""cylinder-axial-outside: a crack along the outside of a cylinder under internal pressure."""

from assessment.relations import cylinder_outside, reference_cylinders

from .axial import Side, surface_kind

KIND = surface_kind(
    "cylinder-axial-outside",
    "a crack along the outside of a cylinder",
    Side(
        stress_intensity=cylinder_outside.stress_intensity,
        values=cylinder_outside.validity_values,
        validity=cylinder_outside.VALIDITY,
        formula="K = (p R_i/t) √(πa/Q) F X, X computed here, in F the curvature "
        "f_c = [(R_o² + R_i²)/(R_o² − R_i²) − 1 + 0.5√(a/t)] t/R_i",
        reference=reference_cylinders.axial_outside,
        reference_validity=reference_cylinders.AXIAL_OUTSIDE,
        reference_formula="σ_ref = 1.2 M_s σ_h, M_s = [1 − a/(t M_T)]/[1 − a/t], "
        "M_T = √(1 + 1.6 c²/(R_m t))",
    ),
)
