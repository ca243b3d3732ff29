"""Published worked examples as whole cases, with the answers that are printed.

The records, with their sources and whether each was read or recalled from memory, are in
fixtures/checks/worked-examples.json; the cases in fixtures/cases/. What a printed example leaves
out (modulus, strengths where it checks no collapse) is filled in with values that do not touch the
printed answer, and each test says so.
"""

import json
from pathlib import Path

import pytest

from assessment import assess

FIXTURES = Path(__file__).resolve().parents[3] / "fixtures"
RECORDS = {
    record["id"]: record
    for record in json.loads((FIXTURES / "checks/worked-examples.json").read_text())
}


def outcome_of(name: str):
    return assess((FIXTURES / "cases" / f"{name}.json").read_text())


def test_callister_design_example_life_and_critical_size():
    """W. D. Callister, Materials Science and Engineering, Design Example on component life, from
    memory: 5.49e6 cycles, critical size 20 mm (19.9 before rounding). The strengths are ours."""
    record = RECORDS["life_callister"]
    outcome = outcome_of("callister-allowable-flaw")
    assert outcome["life"]["cycles"] == pytest.approx(record["value"], rel=0.005)
    assert outcome["critical"]["depth_mm"] == pytest.approx(19.9, rel=0.005)
    assert outcome["critical"]["cause"] == "fracture"


def test_shigley_bar_in_bending_life():
    """Shigley's Mechanical Engineering Design, Example 6-1, from memory: 64.7e3 cycles, in units of
    inch and ksi converted exactly. Strengths and modulus are ours."""
    record = RECORDS["life_shigley"]
    outcome = outcome_of("shigley-bar-in-bending")
    assert outcome["life"]["cycles"] == pytest.approx(record["value"], rel=0.005)


def test_dowling_11_4_with_the_printed_geometry_factor_of_one():
    """N. E. Dowling, Example 11.4, from memory: the closed form with F = 1 gives 77,600 cycles to
    15.8 mm. With F = 1 throughout, fracture itself comes later than 15.8 mm (which the book gets
    with the varying F), so the cycles are read off the path at 15.8 mm."""
    final, _, cycles = RECORDS["life_dowling_11.4"]["value"]
    path = outcome_of("dowling-11-4-geometry-factor-one")["life"]["path"]
    before, after = next(
        (low, high) for low, high in zip(path, path[1:], strict=False) if high[1] >= final
    )
    share = (final - before[1]) / (after[1] - before[1])
    found = before[0] + share * (after[0] - before[0])
    assert found == pytest.approx(cycles, rel=0.005)


def test_dowling_11_4_with_the_varying_geometry_factor():
    """The same plate as the centre crack it is: 15.8 mm printed (from memory); 75,517 cycles is an
    independent computation with Koiter's factor, which is up to 0.9 % low, hence 2 % on life."""
    final = RECORDS["life_dowling_11.4"]["value"][0]
    outcome = outcome_of("dowling-11-4-centre-crack")
    assert outcome["life"]["cycles"] == pytest.approx(
        RECORDS["life_dowling_11.4_varF"]["value"], rel=0.02
    )
    assert outcome["critical"]["length_mm"] / 2 == pytest.approx(final, rel=0.015)


def test_dowling_8_6b_allowable_force_has_the_printed_safety_factor():
    """N. E. Dowling, 4th ed. (2013), read: at 74.4 kN the safety factor against KIc is 3. The book
    uses Koiter's factor; with Isida's the force is 73.8 kN, so the factor differs by 0.9 %."""
    record = RECORDS["dow_8.6b"]
    outcome = outcome_of("dowling-8-6b-allowable-force")
    assert record["value"] == 74.4
    assert outcome["failure"]["reserve_on_load"] == pytest.approx(3.0, rel=0.012)
    assert outcome["stress_intensity"][0]["k_mpa_sqrt_m"] == pytest.approx(66 / 3, rel=0.012)
