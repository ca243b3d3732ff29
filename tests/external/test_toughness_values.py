"""Charpy correlations, the Master Curve and the loading-rate shift against values from outside.

fixtures/checks/further-relations.json names the source of each and whether it was read or recalled.
"""

import math
from typing import Any

import numpy as np
import pytest
from scipy.optimize import brentq

from assessment import assess
from assessment.toughness import CORRELATIONS, Charpy, Conditions, MasterCurve, named, toughness
from assessment.toughness.loading_rate import shift
from assessment.toughness.master_curve import at_size, tolerance
from tests.assessment.examples import surface

from .checks import BY_ID, given, starting

FOOT_POUND = 1.3558179483  # J, exact to the digits shown
KSI = 6.894757293168  # MPa
KSI_ROOT_INCH = KSI * math.sqrt(0.0254)


def conditions(**changes: Any) -> Conditions:
    return Conditions(
        **(
            {"temperature": 20.0, "elastic_modulus": 207e3, "poisson": 0.3, "yield_strength": 355.0}
            | changes
        )
    )


def by_charpy(correlation: str, energy: float, **changes: Any) -> float:
    return toughness(Charpy(energy, 20.0, correlation), conditions(**changes)).value


@pytest.mark.parametrize("name", starting("sailors"))
def test_sailors_and_corten(name: str) -> None:
    check = BY_ID[name]
    found = by_charpy("Sailors & Corten 1972", given(check, "CVN"))
    assert found == pytest.approx(check["value"], rel=1e-5), check["source"]


@pytest.mark.parametrize("name", starting("roberts"))
def test_roberts_and_newton(name: str) -> None:
    check = BY_ID[name]
    found = by_charpy("Roberts & Newton 1981", given(check, "CVN"))
    assert found == pytest.approx(check["value"], rel=1e-5), check["source"]


@pytest.mark.parametrize("name", starting("b79J_lower"))
def test_annex_j_in_transition(name: str) -> None:
    check = BY_ID[name]
    found = by_charpy("BS 7910 annex J", given(check, "Cv"), thickness=given(check, "B") / 1e3)
    assert found == pytest.approx(check["value"], rel=1e-5), check["source"]


def test_annex_j_on_the_upper_shelf_is_capped() -> None:
    """98.2 at 80 J (from memory); the transition formula alone would give 107."""
    check = BY_ID["b79J_upper"]
    found = by_charpy("BS 7910 annex J", given(check, "Cv"), thickness=0.025)
    assert found == pytest.approx(check["value"], rel=1e-9)
    assert 12.0 * math.sqrt(80.0) > 107.0


@pytest.mark.parametrize("name", starting("barsom_kid"))
def test_barsoms_dynamic_toughness(name: str) -> None:
    """Read; the form in SI units is 0.45 % below the exact conversion."""
    check = BY_ID[name]
    found = by_charpy(
        "Barsom 1975",
        given(check, "CVN") * FOOT_POUND,
        elastic_modulus=given(check, "E") * KSI / 1e3,
    )
    assert found == pytest.approx(check["value"] * KSI_ROOT_INCH, rel=0.006), check["source"]


@pytest.mark.parametrize("name", starting("rnb"))
def test_rolfe_novak_and_barsom(name: str) -> None:
    """Read; the form in SI units lies 0.6 % below the exact conversion."""
    check = BY_ID[name]
    found = by_charpy(
        "Rolfe, Novak & Barsom 1970",
        given(check, "CVN") * FOOT_POUND,
        yield_strength=given(check, "sy") * KSI,
    )
    assert found == pytest.approx(check["value"] * KSI_ROOT_INCH, rel=0.007), check["source"]


@pytest.mark.parametrize(
    ("correlation", "us_form"),
    [
        ("Sailors & Corten 1972", lambda ft_lb: 15.5 * math.sqrt(ft_lb)),
        ("Roberts & Newton 1981", lambda ft_lb: 9.35 * ft_lb**0.63),
    ],
)
def test_the_forms_in_foot_pounds(correlation: str, us_form: Any) -> None:
    """The same correlations as they were printed in ksi and ft lb (from memory)."""
    for ft_lb in (8.0, 20.0, 45.0):
        found = by_charpy(correlation, ft_lb * FOOT_POUND)
        assert found == pytest.approx(us_form(ft_lb) * KSI_ROOT_INCH, rel=0.003)


@pytest.mark.parametrize("name", [one for one in starting("mc_") if "size" not in one])
def test_master_curve(name: str) -> None:
    """The tolerance bounds that the standard prints are rounded: within 0.4 %."""
    check = BY_ID[name]
    found = tolerance(given(check, "T-T0"), given(check, "p"))
    assert found == pytest.approx(check["value"], rel=0.004), check["source"]


@pytest.mark.parametrize("name", starting("mc_size"))
def test_master_curve_for_another_size(name: str) -> None:
    check = BY_ID[name]
    measured, size = given(check, "KJc"), given(check, "B") / 1e3
    at_25 = brentq(lambda k: at_size(k, size) - measured, 20.0, 1000.0)
    assert at_25 == pytest.approx(check["value"], rel=1e-6), check["source"]


def test_master_curve_is_a_weibull_distribution_of_slope_four() -> None:
    """Its median, its 63 % point and its weakest link: a front twice as long breaks as the weaker
    of two."""
    median = tolerance(0.0, 0.5)
    assert median == pytest.approx(20.0 + math.log(2.0) ** 0.25 * 88.0)
    assert tolerance(0.0, 1.0 - math.exp(-1.0)) == pytest.approx(108.0)
    k = tolerance(-20.0, 0.3)
    both = at_size(tolerance(-20.0, 1.0 - (1.0 - 0.3) ** 0.5), 0.0125)
    assert at_size(k, 0.025) == pytest.approx(k)
    assert both == pytest.approx(at_size(tolerance(-20.0, 1.0 - 0.7**0.5), 0.0125))
    # P(K) of length 2B is 1 − (1 − P)² at the same K.
    p_single = 0.3
    k_single = at_size(tolerance(-20.0, p_single), 0.025)
    assert at_size(tolerance(-20.0, 1.0 - (1.0 - p_single) ** 2), 0.05) == pytest.approx(
        20.0
        + (k_single - 20.0)
        * (math.log((1.0 - p_single) ** -2.0) / math.log(1.0 / (1.0 - p_single))) ** 0.25
        * 0.5**0.25
    )


@pytest.mark.parametrize("name", starting("tshift"))
def test_the_shift_with_the_rate_of_loading(name: str) -> None:
    check = BY_ID[name]
    found = shift("impact", given(check, "sy") * KSI)
    assert found == pytest.approx(check["value"] / 1.8, abs=0.3), check["source"]
    assert shift("intermediate", 345.0) == pytest.approx(0.75 * shift("impact", 345.0))
    assert shift("static", 345.0) == 0.0 and shift("impact", 1100.0) == 0.0


def test_correlations_are_found_by_their_published_names() -> None:
    for said in ("Roberts & Newton", "roberts and newton 1981", "ROBERTS-NEWTON"):
        assert named(said) is CORRELATIONS["Roberts & Newton 1981"]
    assert named("BS7910 Annex J") is CORRELATIONS["BS 7910 annex J"]
    assert named("somebody") is None and named("") is None


def test_each_correlation_rises_with_energy_and_says_where_it_ends() -> None:
    for name, one in CORRELATIONS.items():
        strength = 800.0 if "σ_Y" in {r.symbol for r in one.validity.ranges} else 355.0
        low, high = one.validity.ranges[0].low, one.validity.ranges[0].high
        assert low is not None and high is not None
        values = [by_charpy(name, e, yield_strength=strength) for e in np.linspace(low, high, 20)]
        assert all(np.diff(values) > 0.0), name
        for energy in (0.99 * low, 1.01 * high):
            found = toughness(Charpy(energy, 20.0, name), conditions(yield_strength=strength))
            assert any(mark.range.symbol == "C_v" for mark in found.marks), name


def test_colder_than_the_charpy_test_nothing_is_known() -> None:
    model = Charpy(27.0, -20.0, "BS 7910 annex J")
    assert toughness(model, conditions(temperature=-20.0)).marks == ()
    assert toughness(model, conditions(temperature=10.0)).marks == ()
    assert toughness(model, conditions(temperature=-20.1)).marks


def test_master_curve_fifty_degrees_around_t0_and_not_beyond() -> None:
    model = MasterCurve(-30.0, 0.05)
    for temperature, marked in ((-80.0, False), (20.0, False), (-80.1, True), (20.1, True)):
        found = toughness(model, conditions(temperature=temperature))
        assert bool(found.marks) is marked
    slow, fast = (
        toughness(model, conditions(temperature=20.0, rate=rate)).value
        for rate in ("static", "impact")
    )
    assert fast == pytest.approx(
        toughness(model, conditions(temperature=20.0 - shift("impact", 355.0))).value
    )
    assert fast < slow


ANNEX_J = {
    "model": "charpy",
    "energy_j": 40,
    "temperature_c": -10,
    "correlation": "BS 7910 annex J",
}
MEAN = {**ANNEX_J, "correlation": "Sailors & Corten 1972"}
CURVE = {"model": "master-curve", "t0_c": -40, "probability": 0.05}


def test_a_case_by_charpy_energy() -> None:
    found = assess(surface(material__toughness=MEAN, material__bounding__toughness=ANNEX_J))
    assert found["toughness_mpa_sqrt_m"] == pytest.approx(14.6 * math.sqrt(40.0))
    # The wall of 20 mm is longer than the front of 3 mm by 12 mm.
    assert found["bounding"]["toughness_mpa_sqrt_m"] == pytest.approx(
        min(20.0 + (12.0 * math.sqrt(40.0) - 20.0) * 1.25**0.25, 0.54 * 40.0 + 55.0)
    )
    assert any("Sailors" in step["source"] for step in found["working"])


def test_a_mean_fit_gives_no_bounding_value() -> None:
    found = assess(surface(material__toughness=MEAN, material__bounding__toughness=MEAN))
    assert found["disposition"]["verdict"] in ("refer", "withdraw")
    assert any("middle of its data" in reason for reason in found["disposition"]["reasons"])
    median = assess(surface(material__bounding__toughness={**CURVE, "probability": 0.5}))
    assert any("0.05 or less" in reason for reason in median["disposition"]["reasons"])


def test_a_case_by_master_curve_with_the_size_of_its_front() -> None:
    narrow = assess(surface(material__bounding__toughness=CURVE))
    k_25 = tolerance(30.0, 0.05)
    assert narrow["bounding"]["toughness_mpa_sqrt_m"] == pytest.approx(at_size(k_25, 0.020))
    long = assess(surface(material__bounding__toughness=CURVE, crack__length_mm=60))
    assert long["bounding"]["toughness_mpa_sqrt_m"] < at_size(k_25, 0.060)
    assert long["bounding"]["toughness_mpa_sqrt_m"] > at_size(k_25, 0.062)


def test_a_fast_load_on_one_value_is_referred_and_on_a_curve_is_shifted() -> None:
    fixed = assess(surface(loading__rate="impact"))
    assert any("fast load" in reason for reason in fixed["disposition"]["reasons"])
    curve = {"material__toughness": CURVE, "material__bounding__toughness": CURVE}
    warm = {**curve, "loading__temperature_c": 30}
    slow, fast = (assess(surface(**warm, loading__rate=rate)) for rate in ("static", "impact"))
    assert fast["toughness_mpa_sqrt_m"] < slow["toughness_mpa_sqrt_m"]
    assert any("read at" in step["step"] for step in fast["working"])


def test_the_zone_is_recorded() -> None:
    found = assess(surface(material__zone="heat-affected"))
    assert any("(heat-affected)" in step["step"] for step in found["working"])
