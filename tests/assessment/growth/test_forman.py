"""Forman's law, the law of Forman and Mettu, Newman's closure, thresholds by stress ratio."""

import math
from typing import Any

import numpy as np
import pytest
from hypothesis import given as hypothesis_given
from hypothesis import strategies as st
from scipy.integrate import quad

from assessment import CaseRefused, assess, read_case
from assessment.growth import CycleBlock, Forman, FormanMettu, Paris, grow, opening, rates
from tests.assessment.examples import surface
from tests.assessment.plain import constant_factor
from tests.external.checks import BY_ID

KIND, BODY = constant_factor(1.0)
FORMAN = Forman(c=5e-9, m=2.8, k_c=70.0)
METTU = FormanMettu(
    c=4e-11, n=3.0, p=0.5, q=0.6, k_c=90.0, constraint=2.0, peak_over_flow=0.3, threshold=3.0
)


def blocks(swing: float, ratio: float, per_usage: float = 1.0) -> tuple[CycleBlock, ...]:
    return (CycleBlock({"membrane": swing}, ratio, None, per_usage),)


def rate_of(law: Any, swing: float, ratio: float, a: float = 0.01) -> float:
    return float(rates(KIND, np.array([a]), BODY, law, blocks(swing, ratio))[0])


def test_forman_by_hand() -> None:
    """ΔK = 100 √(π 0.01) = 17.72; R = 0.2: 5e-9 · 17.72^2.8 / (0.8 · 70 − 17.72)."""
    delta_k = 100.0 * math.sqrt(math.pi * 0.01)
    by_hand = 5e-9 * delta_k**2.8 / (0.8 * 70.0 - delta_k)
    assert rate_of(FORMAN, 100.0, 0.2) == pytest.approx(by_hand, rel=1e-12)


def test_forman_life_is_the_closed_form() -> None:
    """With F = 1 and ΔK = S√(πa): ∫ [(1 − R)K_c − ΔK]/(C ΔK^m) da in two powers of a, from a₀ to
    the size at which K_max = K_c. Closed form; also the record life_forman, its own quadrature."""
    swing, ratio, a0 = 120.0, 0.1, 0.002
    a_end = ((1.0 - ratio) * FORMAN.k_c / swing) ** 2 / math.pi
    s, m = swing * math.sqrt(math.pi), FORMAN.m

    def power(exponent: float) -> float:
        return (a_end ** (exponent + 1.0) - a0 ** (exponent + 1.0)) / (exponent + 1.0)

    closed = (1.0 - ratio) * FORMAN.k_c * power(-m / 2.0) / s**m - power((1.0 - m) / 2.0) / s ** (
        m - 1.0
    )
    closed /= FORMAN.c
    run = grow(KIND, np.array([a0]), BODY, FORMAN, blocks(swing, ratio), lambda x: 1.0 + 0.0 * x[0])
    assert run.end_words() == "failed"
    assert float(run.x[0, 0]) == pytest.approx(a_end, rel=1e-6)
    assert float(run.usage[0]) == pytest.approx(closed, rel=1e-5)


def test_forman_against_the_record() -> None:
    record = BY_ID["life_forman"]
    given = {name: float(value[0]) for name, value in record["inputs"].items()}
    law = Forman(c=given["C"], m=given["n"], k_c=given["Kc"])
    a0, a_end = given["ai"], given["af"]
    swing = given["dS"]
    run = grow(
        KIND,
        np.array([a0]),
        BODY,
        law,
        blocks(swing, given["R"]),
        lambda x: a_end - x[0],
    )
    assert float(run.usage[0]) == pytest.approx(record["value"], rel=1e-4), record["source"]


def test_a_start_beyond_k_c_has_failed_and_a_start_just_below_nearly() -> None:
    for share, usage in ((1.001, 0.0), (0.999, None)):
        a0 = (share * FORMAN.k_c / 100.0) ** 2 / math.pi
        run = grow(KIND, np.array([a0]), BODY, FORMAN, blocks(100.0, 0.0), lambda x: 1.0 + 0 * x[0])
        assert run.end_words() == "failed"
        if usage is None:
            assert 0.0 < float(run.usage[0]) < 1.0
        else:
            assert float(run.usage[0]) == usage


def test_closure_at_its_ends() -> None:
    """A whole cycle is open as R nears 1; f is nowhere below R; the branches meet at R = 0."""
    for alpha in (1.0, 1.7, 3.0):
        for s in (0.0, 0.3, 0.8):
            f = opening(np.linspace(-3.0, 0.999, 2000), alpha, s)
            ratio = np.linspace(-3.0, 0.999, 2000)
            assert np.all(f >= np.where(ratio > 0.0, ratio, -np.inf)) and np.all(f < 1.0)
            assert float(opening(np.asarray(0.99999), alpha, s)) == pytest.approx(1.0, abs=1e-4)
            below, above = opening(np.array([-1e-9, 1e-9]), alpha, s)
            assert below == pytest.approx(above, abs=1e-8)
            assert np.all(np.diff(f) >= -1e-12)


def test_closure_values_known_in_the_trade() -> None:
    """From memory: plane stress opens near half the peak at R = 0 and low stress, plane strain near
    a quarter; at R = 0.7 in plane strain the crack is open throughout."""
    assert 0.45 < float(opening(np.asarray(0.0), 1.0, 0.1)) < 0.56
    assert 0.2 < float(opening(np.asarray(0.0), 3.0, 0.1)) < 0.3
    assert float(opening(np.asarray(0.7), 3.0, 0.3)) == pytest.approx(0.7, abs=0.01)


def test_forman_mettu_by_hand() -> None:
    delta_k, ratio = 100.0 * math.sqrt(math.pi * 0.01), 0.1
    a0 = (0.825 - 0.68 + 0.2) * math.cos(math.pi * 0.15) ** 0.5
    a1 = (0.415 - 0.142) * 0.3
    a3 = 2 * a0 + a1 - 1
    a2 = 1 - a0 - a1 - a3
    f = max(ratio, a0 + a1 * ratio + a2 * ratio**2 + a3 * ratio**3)
    by_hand = 4e-11 * ((1 - f) / (1 - ratio) * delta_k) ** 3 * (1 - 3 / delta_k) ** 0.5
    by_hand /= (1 - delta_k / (1 - ratio) / 90) ** 0.6
    assert rate_of(METTU, 100.0, 0.1) == pytest.approx(by_hand, rel=1e-10)


def test_without_its_ends_it_is_paris_law_on_the_open_range() -> None:
    plain = FormanMettu(c=4e-11, n=3.0, p=0.0, q=0.0, k_c=1e9, constraint=2.0, peak_over_flow=0.3)
    f = float(opening(np.asarray(0.3), 2.0, 0.3))
    paris = Paris(4e-11 * ((1 - f) / 0.7) ** 3, 3.0)
    assert rate_of(plain, 80.0, 0.3) == pytest.approx(rate_of(paris, 80.0, 0.3), rel=1e-12)


def test_forman_mettu_life_by_plain_quadrature() -> None:
    swing, ratio, a0 = 90.0, -0.5, 0.004
    a_end = ((1.0 - ratio) * METTU.k_c / swing) ** 2 / math.pi
    cycles = quad(
        lambda a: 1.0 / rate_of(METTU, swing, ratio, a), a0, a_end * (1 - 1e-12), limit=200
    )
    run = grow(KIND, np.array([a0]), BODY, METTU, blocks(swing, ratio), lambda x: 1.0 + 0 * x[0])
    assert float(run.x[0, 0]) == pytest.approx(a_end, rel=1e-5)
    assert float(run.usage[0]) == pytest.approx(cycles[0], rel=1e-4)


def test_the_pressing_half_of_a_cycle_counts_by_closure_alone() -> None:
    """At R = −1 the whole range is twice K_max; what opens is (1 − f) K_max; fully pressed, nil."""
    pressed = rate_of(METTU, 200.0, -1.0)
    pulled = rate_of(METTU, 100.0, 0.0)
    assert 0.5 * pulled < pressed < 2.0 * pulled
    shut = (CycleBlock({"membrane": 100.0}, None, {"membrane": -1.0}, 1.0),)
    assert float(rates(KIND, np.array([0.01]), BODY, METTU, shut)[0]) == 0.0
    assert float(rates(KIND, np.array([0.01]), BODY, FORMAN, shut)[0]) == 0.0


@hypothesis_given(st.floats(5.0, 60.0), st.floats(0.0, 0.8), st.floats(1.02, 1.5))
def test_rates_rise_with_range_and_ratio(delta_k: float, ratio: float, more: float) -> None:
    a = 0.01
    swing = delta_k / math.sqrt(math.pi * a)
    for law in (FORMAN, METTU):
        if delta_k * more / (1 - ratio) >= law.k_c:
            continue
        assert rate_of(law, swing * more, ratio) > rate_of(law, swing, ratio)
        up = ratio + 0.05
        if delta_k / (1 - up) < law.k_c:
            assert rate_of(law, swing, up) >= rate_of(law, swing, ratio) * (1 - 1e-12)


def test_nothing_grows_at_the_threshold_of_its_stress_ratio() -> None:
    """BS 7910, 8.2.3.6 (from memory): 170 − 214 R N/mm^1.5 from R = 0 to 0.5, 63 above."""
    unit = 1e6 / 1e9**0.5 / 1e3  # N/mm^1.5 in MPa√m
    records = {name: BY_ID[f"b79_threshold_R{name}"]["value"] for name in ("-1", "0", "0.4", "0.5")}
    table = ((0.0, 170.0 * unit), (0.4999999, 63.02 * unit), (0.5, 63.0 * unit))
    law = Paris(1e-11, 3.0, by_ratio=table)
    for name, threshold in records.items():
        ratio, a = float(name), 0.01
        open_part = 1.0 / (1.0 - min(ratio, 0.0))  # the range that opens, of the whole
        swing = threshold * unit / math.sqrt(math.pi * a) / open_part
        assert rate_of(law, swing * 0.999, ratio) == 0.0, name
        assert rate_of(law, swing * 1.001, ratio) > 0.0, name


CASE_FORMAN = {"law": "forman", "c": 2e-9, "m": 2.9, "k_c_mpa_sqrt_m": 120}
CASE_METTU = {
    "law": "forman-mettu", "c": 8e-12, "n": 3.1, "p": 0.5, "q": 0.5, "k_c_mpa_sqrt_m": 120,
    "constraint_factor": 2.5, "peak_over_flow_stress": 0.3, "threshold_mpa_sqrt_m": 3,
}  # fmt: skip


@pytest.mark.parametrize("law", [CASE_FORMAN, CASE_METTU])
def test_a_case_by_the_law(law: dict[str, Any]) -> None:
    found = assess(surface(material__growth=law, material__bounding__growth=law))
    assert found["life"]["usage"] > 0.0 and found["life"]["ends_by"]
    worse = assess(
        surface(
            material__growth={**law, "c": law["c"] * 2},
            material__bounding__growth={**law, "c": law["c"] * 2},
        )
    )
    assert worse["life"]["usage"] == pytest.approx(found["life"]["usage"] / 2.0, rel=1e-4)
    assert any("Forman" in step["source"] for step in found["working"])


@pytest.mark.parametrize(
    ("law", "key"),
    [
        ({**CASE_METTU, "constraint_factor": 4}, "constraint_factor"),
        ({**CASE_METTU, "peak_over_flow_stress": 0.9}, "peak_over_flow_stress"),
        ({**CASE_METTU, "threshold_mpa_sqrt_m": 130}, "threshold_mpa_sqrt_m"),
        ({**CASE_FORMAN, "k_c_mpa_sqrt_m": 0}, "k_c_mpa_sqrt_m"),
        ({**CASE_FORMAN, "threshold_by_ratio": [[0.5, 2], [0.1, 3]]}, "threshold_by_ratio[1]"),
        ({**CASE_FORMAN, "threshold_by_ratio": [[0, 2]], "threshold_mpa_sqrt_m": 1},
         "threshold_by_ratio"),
        ({**CASE_METTU, "threshold_by_ratio": [[0, 2]]}, "threshold_by_ratio"),
    ],
)  # fmt: skip
def test_what_the_law_cannot_be_is_refused(law: dict[str, Any], key: str) -> None:
    with pytest.raises(CaseRefused) as caught:
        read_case(surface(material__growth=law))
    assert caught.value.where == f"material.growth.{key}"
