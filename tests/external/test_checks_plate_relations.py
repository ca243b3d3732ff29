"""Plate relations against the equation, the table it was fitted to, and forms of other authors.

fixtures/checks/plate-relations.json: nr81 is the 1981 equation itself (read in part, the rest from
memory), rn79 the finite-element table it was fitted to (from memory, medium confidence). The other
records are forms that are not used here, at half the width: each must agree within what it states.
"""

import json
import math
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from assessment import KINDS

CHECKS = json.loads(
    (Path(__file__).parents[2] / "fixtures/checks/plate-relations.json").read_text("utf-8")
)
BY_ID = {check["id"]: check for check in CHECKS}
SURFACE = KINDS["plate-surface"]
BODY = {"thickness": 0.02, "width": 1e4}  # so wide that its width plays no part


def starting(*prefixes: str) -> list[str]:
    return [name for name in BY_ID if name.startswith(prefixes)]


def k_at(check: dict[str, Any], load: str) -> float:
    """K ÷ √(πa/Q) at the point of the record, for 1 MPa."""
    shape, depth = check["inputs"]["a/c"][0], check["inputs"]["a/t"][0]
    deepest = check["id"].endswith(("phi90", "p1.0"))
    a = depth * BODY["thickness"]
    k = SURFACE.stress_intensity(np.array([a, a / shape]), {load: np.asarray(1.0)}, BODY)
    q = 1.0 + 1.464 * min(shape, 1.0 / shape) ** 1.65
    return float(k[0 if deepest else 1]) / math.sqrt(math.pi * a / q)


@pytest.mark.parametrize("name", starting("nr81_F"))
def test_the_equation_in_tension(name: str) -> None:
    check = BY_ID[name]
    assert k_at(check, "membrane") == pytest.approx(check["value"], rel=1e-5), check["source"]


@pytest.mark.parametrize("name", starting("nr81_H"))
def test_the_equation_in_bending(name: str) -> None:
    check = BY_ID[name]
    ratio = k_at(check, "bending") / k_at(check, "membrane")
    assert ratio == pytest.approx(check["value"], rel=2e-5, abs=2e-5), check["source"]


@pytest.mark.parametrize("name", starting("rn79"))
def test_the_table_that_the_equation_was_fitted_to(name: str) -> None:
    """6 %, which is what the equation and the table agree to, not the 5 % that is stated."""
    check = BY_ID[name]
    assert k_at(check, "membrane") == pytest.approx(check["value"], rel=0.06), check["source"]


# Each form's own accuracy, as it states it or (where that does not hold) as it was measured.
OTHER_FORMS = [
    ("cct_form_feddersen_0.5", "plate-through-centre", "membrane", 0.003),
    ("cct_form_koiter_0.5", "plate-through-centre", "membrane", 0.01),
    ("edge_tension_poly_0.5", "plate-through-edge", "membrane", 0.007),
    ("edge_tension_brown_srawley_0.5", "plate-through-edge", "membrane", 0.005),
    ("edge_tension_dowling_0.5", "plate-through-edge", "membrane", 0.005),
    ("edge_purebend_brown_srawley_0.5", "plate-through-edge", "bending", 0.005),
]


def half_way(kind: str, load: str) -> float:
    size = 0.05 if kind == "plate-through-edge" else 0.025
    body = {"width": 0.1, "thickness": 0.01, "ends": "free"}
    k = KINDS[kind].stress_intensity(np.array([size]), {load: np.asarray(1.0)}, body)
    return float(k[0]) / math.sqrt(math.pi * size)


@pytest.mark.parametrize(("name", "kind", "load", "tolerance"), OTHER_FORMS)
def test_forms_of_other_authors(name: str, kind: str, load: str, tolerance: float) -> None:
    check = BY_ID[name]
    assert half_way(kind, load) == pytest.approx(check["value"], rel=tolerance), check["source"]


def test_the_any_depth_bending_form_differs_at_half_the_width() -> None:
    """Read, and wrong: it states 0.5 %, and is 1.5 % low at 0.5 against an independent computation,
    which is why it is not used there."""
    check = BY_ID["edge_bending_tada_0.5"]
    assert check["value"] / half_way("plate-through-edge", "bending") == pytest.approx(
        0.985, abs=0.004
    )


def test_every_record_is_used() -> None:
    used = {name for name, *_ in OTHER_FORMS} | set(starting("nr81_F", "nr81_H", "rn79"))
    assert used | {"edge_bending_tada_0.5"} == set(BY_ID)
