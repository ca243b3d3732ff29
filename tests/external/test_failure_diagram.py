"""The Option 1 diagram against values of BS 7910:2013 and R6 revision 4.

The records (fixtures/checks/failure-growth-life.json) hold the formula from memory with high
confidence; two steels, R6 Rev. 4 (2001), SINTAP basic level, BS 7910:2013 Option 1.
"""

import json
from pathlib import Path

import pytest

from assessment.failure import lr_max, option_1

CHECKS = Path(__file__).resolve().parents[2] / "fixtures/checks/failure-growth-life.json"
RECORDS = {record["id"]: record for record in json.loads(CHECKS.read_text())}
DIAGRAM = [record for record in RECORDS.values() if record["id"].startswith("fad_r6r4")]


def ids(record):
    return record["id"]


def found(record):
    value = {key: pair[0] for key, pair in record["inputs"].items()}
    return float(option_1(value["Lr"], value["sy"], value["su"], value["E"], "continuous"))


@pytest.mark.parametrize("record", DIAGRAM, ids=ids)
def test_the_limit_for_continuous_yielding(record):
    assert found(record) == pytest.approx(record["value"], rel=1e-5, abs=1e-12)


def test_both_steels_and_both_sides_of_the_cut_off_are_among_the_records():
    assert {record["inputs"]["sy"][0] for record in DIAGRAM} == {355.0, 690.0}
    assert {record["value"] == 0.0 for record in DIAGRAM} == {True, False}


def test_the_cut_off():
    assert lr_max(355.0, 490.0) == pytest.approx(RECORDS["fad_lrmax_355"]["value"], rel=1e-6)


def test_the_older_curve_would_not_pass():
    """R6 revision 3, (1 − 0.14 L_r²)(0.3 + 0.7 exp(−0.65 L_r⁶)), at 0.6: 0.9297, not 0.9033."""
    older = (1 - 0.14 * 0.6**2) * (0.3 + 0.7 * 2.718281828 ** (-0.65 * 0.6**6))
    assert older == pytest.approx(0.929744, rel=1e-5)
    assert older != pytest.approx(RECORDS["fad_r6r4_355_0.6"]["value"], rel=1e-2)
