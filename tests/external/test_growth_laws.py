"""Growth laws against published constants, in the units they were published in.

BS 7910 constants: 1999/2005 tables 4 to 6, 2013 tables 10 to 12, from memory (the recalled
crossings agree with the recalled lines). Steels of Barsom & Rolfe, in SI as in Dowling's table
11.1, and Walker constants of Dowling's table 11.2: from memory.
"""

import json
from pathlib import Path

import numpy as np
import pytest

from assessment.growth import Paris, TwoStage, Walker

CHECKS = Path(__file__).resolve().parents[2] / "fixtures/checks/failure-growth-life.json"
RECORDS = {record["id"]: record for record in json.loads(CHECKS.read_text())}
ROOT_MM = np.sqrt(1000.0)  # 1 MPa√m in N/mm^1.5
KSI_ROOT_INCH = 6.894757293 * np.sqrt(0.0254)  # in MPa√m
INCH = 0.0254


def rate(law, delta_k, ratio=0.0):
    ratio = np.asarray(ratio, dtype=float)
    return law.rate_at(law.effective(np.asarray(delta_k, dtype=float), ratio), ratio)


@pytest.mark.parametrize("name", [n for n in RECORDS if n.startswith("b79_air")])
def test_two_stages_cross_at_the_printed_range(name):
    a1, m1, a2, m2, crossing = RECORDS[name]["value"]
    law = TwoStage(a1 * ROOT_MM**m1 / 1e3, m1, a2 * ROOT_MM**m2 / 1e3, m2)
    assert law.crossing * ROOT_MM == pytest.approx(crossing, rel=0.005)
    below, above = 0.8 * crossing, 1.2 * crossing
    assert 1e3 * rate(law, below / ROOT_MM) == pytest.approx(a1 * below**m1, rel=1e-9)
    assert 1e3 * rate(law, above / ROOT_MM) == pytest.approx(a2 * above**m2, rel=1e-9)


@pytest.mark.parametrize("name", [n for n in RECORDS if n.startswith("barsom_")])
def test_paris_in_inches_and_in_metres_is_the_same_growth(name):
    """The constant printed in mm and the one in inches give one rate, within their digits."""
    si, m, us = RECORDS[name]["value"]
    metric = Paris(si / 1e3, m)
    for k in (15.0, 60.0):
        imperial = us * INCH * (k / KSI_ROOT_INCH) ** m
        assert rate(metric, k) == pytest.approx(imperial, rel=0.01)


@pytest.mark.parametrize("name", [n for n in RECORDS if n.startswith("walker_")])
def test_walker_for_published_metals(name):
    """At R the law is C₀ (1 − R)^(−m(1 − γ)) ΔK^m (Dowling, 11.17-11.18, from memory)."""
    _, _, c0, m, gamma, _ = RECORDS[name]["value"]
    law = Walker(c0 / 1e3, m, gamma)
    assert rate(law, 20.0) == pytest.approx(c0 / 1e3 * 20.0**m, rel=1e-12)
    assert rate(law, 20.0, 0.5) == pytest.approx(c0 / 1e3 * 2 ** (m * (1 - gamma)) * 20.0**m)


def test_walker_constant_at_a_third_as_printed():
    """Dowling, Example 11.4, from memory: C = 1.095e-9 mm/cycle at R = 1/3."""
    record = RECORDS["life_dowling_11.4"]
    value = {key: pair[0] for key, pair in record["inputs"].items()}
    law = Walker(value["C0"] / 1e3, value["m"], value["gamma"])
    printed = Paris(record["value"][1] / 1e3, value["m"])
    assert rate(law, 30.0, 1 / 3) == pytest.approx(float(rate(printed, 30.0)), rel=1e-3)
