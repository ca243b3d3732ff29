"""cylinder-axial-inside: a crack along the bore of a cylinder, pressure also on its faces."""

from assessment.relations import cylinder_inside, reference_stress

from .axial import Side, surface_kind

KIND = surface_kind(
    "cylinder-axial-inside",
    "a crack along the inside of a cylinder",
    Side(
        stress_intensity=cylinder_inside.stress_intensity,
        values=cylinder_inside.validity_values,
        validity=cylinder_inside.VALIDITY,
        formula="K = (p R_i/t) √(πa/Q) F, in F the curvature "
        "f_c = [(R_o² + R_i²)/(R_o² − R_i²) + 1 − 0.5√(a/t)] t/R_i",
        reference=reference_stress.cylinder_inside,
        reference_validity=reference_stress.CYLINDER,
        reference_formula="σ_ref = 1.2 M_s (σ_h + p), M_s = [1 − a/(t M_T)]/[1 − a/t], "
        "M_T = √(1 + 1.6 c²/(r t))",
    ),
)
