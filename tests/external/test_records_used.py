"""Every record of outside values is a test, or stands here with the reason why it cannot be one."""

import json
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from assessment import KINDS

from .checks import BY_ID, FOLDER, given

ROOT = Path(__file__).parents[2]
# A family of records by how its ids start, and the test that reads it.
TESTED = {
    "dent_": "tests/external/test_plate_kinds.py",
    "corner_": "tests/external/test_plate_kinds.py",
    "ellipse_exact": "tests/external/test_plate_kinds.py",
    "embedded_fe": "tests/external/test_plate_kinds.py",
    "ct_": "tests/external/test_plate_kinds.py",
    "seb_": "tests/external/test_plate_kinds.py",
    "surf_fe_linear_deep": "tests/external/test_weight_function.py",
    "sg91_deep": "tests/external/test_weight_function.py",
    "wf_edge": "tests/external/test_weight_function.py",
    "mk2d": "tests/external/test_weld_toe.py",
    "fad_opt2": "tests/assessment/failure/test_option_2.py",
    "psvalid": "tests/assessment/failure/test_yielding.py",
    "life_forman": "tests/assessment/growth/test_forman.py",
    "b79_threshold": "tests/assessment/growth/test_forman.py",
    "b79_": "tests/cases/test_growth_library.py",
    "barsom_kid": "tests/external/test_toughness_values.py",
    "rnb": "tests/external/test_toughness_values.py",
    "tshift": "tests/external/test_toughness_values.py",
    "sailors": "tests/external/test_toughness_values.py",
    "roberts": "tests/external/test_toughness_values.py",
    "b79J": "tests/external/test_toughness_values.py",
    "mc_": "tests/external/test_toughness_values.py",
    "kic_cal_4340": "tests/external/test_trade.py",
    "kic_cal_soda": "tests/external/test_trade.py",
    "edge_3pt": "tests/external/test_records_used.py",
    "folias": "tests/external/test_cylinders.py",
    "axial_": "tests/external/test_cylinders.py",
    "circ_": "tests/external/test_cylinders.py",
}
# Records that no test of a number can read, and why.
NOT_A_TEST = {
    "rn79": "inside the front: K is computed at its named points alone (the named ones: "
    "test_checks_plate_relations.py)",
    "surf_fe_bendH": "inside the front, as above",
    "surf_fe_tension": "inside the front, as above",
    "nr81_H_ac0.4_at0.5_phi45": "inside the front, as above",
    "nr81_vs_fe_summary": "a summary of rn79",
    "cyl_": "inside the front; the named points: test_cylinders.py by its own fixture",
    "dow_": "the same limit as tests/external/test_plate_kinds.py holds to in closed form",
    "mt_": "the middle tension specimen is the centre crack, whose secant form has its own record",
    "fad_r6r3": "an older diagram, not built: see test_the_older_curve_would_not_pass",
    "fad_strip": "the strip-yield diagram is not built",
    "fad_level1": "the simplified level is not built",
    "ref_cyl": "from memory with medium confidence; other forms are built and held by limit loads",
    "kic_": "toughness of metals that no case here is about: data, not a relation",
}


def records() -> Iterator[dict[str, Any]]:
    yield from json.loads((FOLDER / "further-relations.json").read_text("utf-8"))


@pytest.mark.parametrize("start", TESTED)
def test_the_named_test_reads_its_records(start: str) -> None:
    text = (ROOT / TESTED[start]).read_text("utf-8")
    stem = start.rstrip("_")
    assert stem in text or start == "b79_", start


def test_every_record_is_a_test_or_says_why_not() -> None:
    left = [
        record["id"] for record in records() if not record["id"].startswith((*TESTED, *NOT_A_TEST))
    ]
    assert left == []


def test_no_family_is_named_that_is_not_there() -> None:
    ids = [record["id"] for record in records()]
    for start in (*TESTED, *NOT_A_TEST):
        assert any(one.startswith(start) for one in ids) or start in ("folias", "axial_", "circ_")


def test_brown_and_srawley_bend_specimen() -> None:
    """K = 6 M √a Y/(B W²) with M = P S/4, S = 4 W: the other polynomial for the bend specimen."""
    check = BY_ID["edge_3pt_S4_brown_srawley_0.5"]
    relative = next(float(value[0]) for value in check["inputs"].values())
    width, thickness, span, load = 0.05, 0.025, 0.2, 10.0
    a = relative * width
    body = {"width": width, "thickness": thickness, "span": span}
    found = KINDS["specimen-edge-bend"].stress_intensity(
        np.array([a]), {"load": np.asarray(load)}, body
    )
    moment = load * 1e-3 * span / 4.0
    theirs = 6.0 * moment * np.sqrt(a) * check["value"] / (thickness * width**2)
    assert float(found[0]) == pytest.approx(theirs, rel=0.01), check["source"]
    assert given(check, next(iter(check["inputs"]))) == relative
