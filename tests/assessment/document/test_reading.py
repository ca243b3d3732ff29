"""Strict reading: what JSON commonly forgives is refused by its key."""

import json

import pytest

from assessment import CaseRefused, read_case
from tests.assessment.examples import DROP, place, surface


def refused(document) -> CaseRefused:
    with pytest.raises(CaseRefused) as caught:
        read_case(document)
    assert caught.value.why.strip()
    return caught.value


def text_with(replaced: str, by: str) -> str:
    text = json.dumps(surface())
    assert replaced in text
    return text.replace(replaced, by, 1)


def test_text_bytes_and_dict_read_the_same():
    case = surface()
    text = json.dumps(case)
    assert read_case(case) == read_case(text) == read_case(text.encode())


def test_sizes_and_body_are_in_metres():
    case = read_case(surface())
    assert case.crack.depth == pytest.approx(0.003)
    assert case.crack.length == pytest.approx(0.012)
    assert case.body["thickness"] == pytest.approx(0.02)
    assert case.missing == ()


@pytest.mark.parametrize(
    ("replaced", "by", "where", "words"),
    [
        ('"depth_mm": 3.0', '"depth_mm": 3.0, "depth_mm": 4.0', "crack.depth_mm", "twice"),
        ('"depth_mm": 3.0', '"depth_mm": NaN', "crack.depth_mm", "not finite"),
        ('"depth_mm": 3.0', '"depth_mm": 1e999', "crack.depth_mm", "not finite"),
        ('"depth_mm": 3.0', '"depth_mm": -Infinity', "crack.depth_mm", "not finite"),
        ('"depth_mm": 3.0', '"depth_mm": 1' + "0" * 400, "crack.depth_mm", "not finite"),
        ('"depth_mm": 3.0', '"depth_mm": true', "crack.depth_mm", "number"),
        ('"depth_mm": 3.0', '"depth_mm": "3.0"', "crack.depth_mm", "number"),
        ('"depth_mm": 3.0', '"depth_mm": 0', "crack.depth_mm", "above 0"),
        ('"depth_mm": 3.0', '"depht_mm": 3.0', "crack.depht_mm", "depth_mm"),
        ('"method": "ultrasonic"', '"method": "\\ud800"', "crack.sizing.method", "UTF-8"),
        ('"method": "ultrasonic"', '"method": "a\\u0000b"', "crack.sizing.method", "null"),
    ],
)
def test_refused_by_its_key(replaced, by, where, words):
    why = refused(text_with(replaced, by))
    assert why.where == where
    assert words in why.why


@pytest.mark.parametrize(
    "document",
    [b"\xff\xfe", "", "[", "{", "null", "3", '"text"', "[" * 100_000, "1" * 5000, "{}{}", "[]"],
)
def test_what_is_no_document_is_refused(document):
    assert refused(document).where


def test_more_than_a_megabyte_is_refused():
    assert "limit" in refused(" " * 1_000_001).why


def test_deeper_than_twelve_levels_is_refused():
    nested = 1
    for _ in range(12):
        nested = [nested]
    assert "12 levels" in refused(surface(population={"deep": nested})).why


@pytest.mark.parametrize(
    ("changes", "where"),
    [
        ({"history": [{"on": "2026-01-01"}] * 501}, "history"),
        ({"loading__cycles": surface()["loading"]["cycles"] * 201}, "loading.cycles"),
        ({"loading__cycles": []}, "loading.cycles"),
        ({"crack": DROP}, "crack"),
        ({"crack__kind": "plate-sideways"}, "crack.kind"),
        ({"crack__kind": "plate-diagonal"}, "crack.kind"),
        ({"crack__length_mm": DROP}, "crack.length_mm"),
        ({"crack__depth_mm": 25}, "crack.depth_mm"),
        ({"crack__length_mm": 201}, "crack.length_mm"),
        ({"crack__depth_basis": "assumed"}, "crack.depth_source"),
        ({"crack__assumed": {}}, "crack.assumed"),
        ({"crack__sizing": "certificate 88"}, "crack.sizing"),
        ({"crack__sizing": "none:"}, "crack.sizing"),
        ({"crack__sizing__depth_bias_mm": 3.0}, "crack.sizing.depth_bias_mm"),
        ({"body__thickness_mm": DROP}, "body.thickness_mm"),
        ({"body__radius_mm": 3}, "body.radius_mm"),
        ({"material__yield_mpa": 600}, "material.yield_mpa"),
        ({"material__poisson": DROP}, "material.poisson"),
        ({"material__yielding": DROP}, "material.yielding"),
        ({"material__toughness": DROP}, "material.toughness"),
        (
            {"material__toughness": {"model": "charpy", "energy_j": 40}},
            "material.toughness.correlation",
        ),
        (
            {"material__growth": {"law": "forman", "c": 1, "m": 3}},
            "material.growth.k_c_mpa_sqrt_m",
        ),
        ({"material__bounding__growth": {"law": "paris", "c": 1}}, "material.bounding.growth.m"),
        ({"material__growth__c": -1}, "material.growth.c"),
        ({"material__growth__m": 30}, "material.growth.m"),
        ({"material__bounding__growth__m": -1}, "material.bounding.growth.m"),
        ({"loading__peak": {}}, "loading.peak"),
        ({"loading__peak": {"profile": [[0, 1], [1, 2]]}}, "loading.peak.profile"),
        ({"loading__residual": "certificate 88"}, "loading.residual"),
        ({"loading__cycles__0__stress_ratio": 1}, "loading.cycles[0].stress_ratio"),
        ({"loading__cycles__0__stress_ratio": DROP}, "loading.cycles[0].stress_ratio"),
        ({"loading__cycles__0__membrane_max_mpa": 9}, "loading.cycles[0].stress_ratio"),
        ({"loading__cycles__0__stress_ratio": 0.5}, "loading.cycles[0].membrane_range_mpa"),
        ({"loading__cycles__0__per_usage": 0}, "loading.cycles[0].per_usage"),
        ({"usage__on": "2026-02-30"}, "usage.on"),
        ({"usage__on": "20260504"}, "usage.on"),
        ({"usage__readings": [["2026-01-02", 5], ["2026-01-01", 6]]}, "usage.readings[1]"),
        ({"usage__readings": [["2026-01-01", 5], ["2026-01-02", 4]]}, "usage.readings[1]"),
        ({"history": [{"on": "2026-05-05"}]}, "history[0].on"),
        ({"as_of": {"on": "2026-05-03"}}, "as_of.on"),
        ({"criteria__fracture": "guess"}, "criteria.fracture"),
        ({"criteria__load_reserve": 0.9}, "criteria.load_reserve"),
        ({"criteria__shortest_interval_days": 400}, "criteria.shortest_interval_days"),
        ({"previous": {"verdict": "fine"}}, "previous.verdict"),
        ({"look": {"shortfalls": [3]}}, "look.shortfalls[0]"),
        ({"case": 2}, "case"),
        ({"cases": 1}, "cases"),
    ],
)
def test_structural_faults_are_refused_by_their_key(changes, where):
    assert refused(surface(**changes)).where == where


def test_a_maximum_equal_to_the_peak_passes_and_one_above_it_does_not():
    # 135 / (1 - 0.1) = 150 but for rounding; a part in 1e9 is allowed, more is not.
    assert read_case(surface(loading__cycles__0__membrane_range_mpa=135)).loading.cycles
    above = surface(loading__cycles__0__membrane_range_mpa=135 * (1 + 3e-9))
    assert refused(above).where == "loading.cycles[0].membrane_range_mpa"


@pytest.mark.parametrize(
    ("changes", "key"),
    [
        ({"crack__sizing": DROP}, "crack.sizing"),
        ({"crack__sizing__depth_sd_mm": DROP}, "crack.sizing.depth_sd_mm"),
        ({"crack__depth_basis": "at least"}, "crack.depth_mm"),
        ({"material__typical": True}, "material.typical"),
        ({"material__bounding": DROP}, "material.bounding.toughness"),
        ({"material__bounding__growth": DROP}, "material.bounding.growth"),
        ({"material__bounding__stands_for": DROP}, "material.bounding.stands_for"),
        ({"loading__residual": DROP}, "loading.residual"),
        ({"loading__cycles": DROP}, "loading.cycles"),
        ({"usage": DROP}, "usage.per_day"),
        ({"criteria": DROP}, "criteria.load_reserve"),
        ({"criteria__life_factor": DROP}, "criteria.life_factor"),
        ({"criteria__shortest_interval_days": DROP}, "criteria.shortest_interval_days"),
    ],
)
def test_what_only_the_decision_needs_is_listed_not_refused(changes, key):
    case = surface(**changes)
    if changes.get("usage") is DROP:
        del case["as_of"]
    assert key in [need.key for need in read_case(case).missing]


def test_where_nothing_was_found_detection_is_needed():
    assert read_case(place()).missing == ()
    assert [n.key for n in read_case(place(detection=DROP)).missing] == ["detection.a90_95_mm"]


def test_none_with_a_reason_is_an_answer():
    case = read_case(surface(crack__sizing="none: measured on the cut piece"))
    assert case.missing == ()
    assert case.crack.sizing.depth_sd == 0.0
