"""A case and its outcome in the contract's form, with invented numbers, as far as figures read."""

from math import exp

CASE = {
    "case": 1,
    "crack": {"kind": "plate-surface", "found": True, "depth_mm": 8.4, "length_mm": 24.0},
    "body": {"width_mm": 300.0, "thickness_mm": 22.0},
    "material": {
        "yield_mpa": 355.0,
        "toughness": {"model": "fixed", "k_mat_mpa_sqrt_m": 96.0},
        "growth": {"law": "paris", "c": 5e-12, "m": 3.0},
        "typical": False,
    },
    "loading": {
        "peak": {"membrane_mpa": 121.0},
        "residual": "none: stress relieved, certificate 88",
        "cycles": [{"membrane_range_mpa": 80.0, "stress_ratio": 0.1, "per_usage": 1}],
        "temperature_c": -10,
    },
    "usage": {"unit": "lift", "per_day": 8, "at": 12600, "on": "2026-05-04"},
    "criteria": {"fracture": "diagram", "load_reserve": 1.4, "life_factor": 2},
}

OUTCOME = {
    "outcome": 1,
    "critical": {"depth_mm": 20.8, "length_mm": 60.0, "cause": "fracture"},
    "life": {
        "usage": 7000.0,
        "ends_by": "fracture",
        "path": [[80.0 * n, 8.4 * exp(n / 96), 24.0 * exp(n / 96)] for n in range(88)],
    },
    "bounding": {
        "depth_mm": 9.6,
        "failure": {"load_ratio": 0.42, "toughness_ratio": 0.40, "reserve_on_load": 1.98},
        "life": {
            "usage": 3600.0,
            "ends_by": "fracture",
            "path": [[40.0 * n, 9.6 * exp(n / 132), 26.0 * exp(n / 132)] for n in range(91)],
        },
    },
    "rules": [
        {"rule": "life", "usage": 14400.0, "on": "2026-12-14", "why_not": None},
        {"rule": "forecast", "usage": None, "on": None, "why_not": "not computed yet"},
        {"rule": "find", "usage": None, "on": None, "why_not": "not computed yet"},
        {"rule": "longest", "usage": 15500.0, "on": "2027-05-04", "why_not": None},
        {"rule": "fixed", "usage": None, "on": None, "why_not": "none is set"},
    ],
    "next_inspection": {"usage": 14400.0, "on": "2026-12-14", "governed_by": "life"},
    "stop_size": {"depth_mm": 16.0, "length_mm": 44.0},
    "cautions": ["No credit is taken for load-order retardation."],
    "working": [
        {
            "step": "Stress intensity at the deepest point",
            "formula": "K = F · σ · √(π · a / Q)",
            "with": "1.09 · 121 MPa · √(π · 9.6 mm / 1.46)",
            "value": 19.04,
            "unit": "MPa√m",
            "source": "Newman & Raju 1981, equation 1",
        }
    ],
    "figures": {
        "diagram": {
            "limit_curve": [[1.2 * n / 40, 1.0 - 0.45 * (1.2 * n / 40) ** 2] for n in range(41)],
            "points": [],
        }
    },
}
