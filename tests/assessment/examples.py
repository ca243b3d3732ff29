"""Invented cases that the tests change one key at a time."""

import copy
from typing import Any

STEEL = {
    "yield_mpa": 355,
    "ultimate_mpa": 490,
    "elastic_modulus_mpa": 207000,
    "poisson": 0.3,
    "yielding": "discontinuous",
    "toughness": {"model": "fixed", "k_mat_mpa_sqrt_m": 110},
    "growth": {"law": "paris", "c": 5.0e-12, "m": 3.0, "threshold_mpa_sqrt_m": 2.0},
    "bounding": {
        "toughness": {"model": "fixed", "k_mat_mpa_sqrt_m": 80},
        "growth": {"law": "paris", "c": 1.0e-11, "m": 3.0, "threshold_mpa_sqrt_m": 2.0},
        "stands_for": "lowest of three; mean plus two standard deviations (invented)",
    },
    "typical": False,
}

SURFACE: dict[str, Any] = {
    "case": 1,
    "as_of": {"on": "2026-05-04", "at": 1250},
    "crack": {
        "kind": "plate-surface",
        "found": True,
        "depth_mm": 3.0,
        "length_mm": 12.0,
        "sizing": {"method": "ultrasonic", "depth_sd_mm": 0.3, "length_sd_mm": 0.5},
    },
    "body": {"width_mm": 200, "thickness_mm": 20},
    "material": STEEL,
    "loading": {
        "peak": {"membrane_mpa": 150, "bending_mpa": 20},
        "residual": "none: stress relieved (invented)",
        "cycles": [{"membrane_range_mpa": 90, "stress_ratio": 0.1, "per_usage": 20}],
        "temperature_c": -10,
    },
    "usage": {
        "unit": "hour",
        "per_day": 4,
        "at": 1250,
        "on": "2026-05-04",
        "readings": [["2025-05-04", 20], ["2025-11-04", 640]],
    },
    "criteria": {
        "fracture": "diagram",
        "load_reserve": 1.3,
        "life_factor": 2,
        "size_confidence_sd": 2,
        "longest_interval_days": 365,
        "shortest_interval_days": 14,
    },
    "history": [],
    "seed": 0,
}

PLACE_CRACK = {
    "kind": "plate-surface",
    "found": False,
    "on_record": False,
    "assumed": {"depth_mm": 1.5, "length_mm": 6.0, "source": "what the method misses (invented)"},
}
DETECTION = {"method": "magnetic particle", "dimension": "length", "a90_95_mm": 5.0}


def surface(**changes: Any) -> dict[str, Any]:
    """The surface crack, with changes by path: ``crack__depth_mm=4`` or ``DROP`` to leave out."""
    return changed(SURFACE, **changes)


def place(**changes: Any) -> dict[str, Any]:
    """A place where nothing was found."""
    case = copy.deepcopy(SURFACE)
    case["crack"] = copy.deepcopy(PLACE_CRACK)
    case["detection"] = dict(DETECTION)
    return changed(case, **changes)


class _Drop:
    """Marks a key to be left out."""


DROP = _Drop()


def changed(case: dict[str, Any], /, **changes: Any) -> dict[str, Any]:
    """A copy with keys set by path, parts joined with two underscores."""
    case = copy.deepcopy(case)
    for path, value in changes.items():
        *above, last = path.split("__")
        inside: Any = case
        for part in above:
            inside = inside[int(part)] if isinstance(inside, list) else inside.setdefault(part, {})
        if value is DROP:
            del inside[last]
        else:
            inside[last] = value
    return case
