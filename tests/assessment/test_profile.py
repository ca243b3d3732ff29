"""A stress profile in a case: read, refused, and worth what membrane and bending are worth."""

import copy
from typing import Any

import pytest

from assessment import KINDS, CaseRefused, assess, read_case
from assessment.corners import sizes_to_corner
from assessment.estimate import loads_for
from tests.assessment.examples import surface

STRAIGHT = [[0, 290], [20, 250]]  # 270 MPa membrane and 20 MPa bending
NAMED = {"membrane_mpa": 270, "bending_mpa": 20}
STEADY = "none: steady"
FALLING = [[0, 200], [4, 90], [20, 40]]


def with_profile(points: Any = STRAIGHT, **changes: Any) -> dict[str, Any]:
    return surface(loading__peak={"profile": points}, **changes)


def without_names(outcome: dict[str, Any]) -> dict[str, Any]:
    """What does not speak of the loads by their names."""
    kept = copy.deepcopy(outcome)
    for key in ("working", "cautions", "restriction", "figures", "marks"):
        kept.pop(key, None)
    for one in kept["stress_intensity"]:
        one.pop("geometry_factor")
    kept["critical"].pop("stress_mpa")
    return kept


def test_a_straight_profile_is_membrane_and_bending() -> None:
    plain, profile = assess(surface(loading__peak=NAMED)), assess(with_profile())
    assert profile["stress_intensity"][0]["geometry_factor"] is None
    for key in ("failure", "life", "bounding", "rules", "next_inspection", "disposition"):
        assert _close(without_names(profile)[key], without_names(plain)[key]), key


def _close(one: Any, other: Any) -> bool:
    if isinstance(one, dict):
        return one.keys() == other.keys() and all(_close(one[k], other[k]) for k in one)
    if isinstance(one, list):
        return len(one) == len(other) and all(map(_close, one, other))
    if isinstance(one, float):
        return other == pytest.approx(one, rel=1e-6)
    return bool(one == other)


def test_cycles_by_profile_are_those_by_ranges() -> None:
    ranges = [
        {
            "membrane_range_mpa": 80,
            "bending_range_mpa": 10,
            "stress_ratio": 0.1,
            "per_usage": 20,
        }
    ]
    as_profile = [{"profile": [[0, 90], [20, 70]], "stress_ratio": 0.1, "per_usage": 20}]
    plain, profile = (
        assess(surface(loading__peak=NAMED, loading__cycles=cycles))
        for cycles in (ranges, as_profile)
    )
    assert profile["life"]["usage"] == pytest.approx(plain["life"]["usage"], rel=1e-6)
    assert profile["growth_now"] == pytest.approx(plain["growth_now"], rel=1e-9)


def test_residual_stress_by_profile() -> None:
    held = {"profile": [[0, 100], [20, 60]], "source": "hole drilling (invented)"}
    named = {"membrane_mpa": 80, "bending_mpa": 20, "source": "hole drilling (invented)"}
    by_profile, by_name = (assess(surface(loading__residual=one)) for one in (held, named))
    for one, other in zip(by_profile["stress_intensity"], by_name["stress_intensity"], strict=True):
        assert one["residual_k_mpa_sqrt_m"] == pytest.approx(other["residual_k_mpa_sqrt_m"])
    assert by_profile["failure"] == pytest.approx(by_name["failure"], rel=1e-9)
    assert any("profile" in step["with"] for step in by_profile["working"])


def test_a_falling_stress_is_milder_than_its_largest_all_over() -> None:
    falling = assess(with_profile(FALLING, loading__cycles=STEADY))
    everywhere = assess(surface(loading__peak={"membrane_mpa": 200}))
    for one, other in zip(falling["stress_intensity"], everywhere["stress_intensity"], strict=True):
        assert 0.0 < one["k_mpa_sqrt_m"] < other["k_mpa_sqrt_m"]
    assert any("∫" in step["formula"] for step in falling["working"])


def test_once_through_the_profile_counts_at_its_largest_stress() -> None:
    body = {
        "width": 0.2,
        "thickness": 0.02,
        "profiles": {"profile 1": [(0.0, -30.0), (0.02, 90.0)]},
    }
    through = sizes_to_corner(KINDS["plate-surface"], body, 0.02, 0.06)
    assert loads_for(through, {"membrane": 10.0, "profile 1": 1.0}) == {"membrane": 100.0}
    still = sizes_to_corner(KINDS["plate-surface"], body, 0.01, 0.06)
    assert loads_for(still, {"profile 1": 1.0}) == {"profile 1": 1.0}


def test_a_profile_over_a_long_flat_crack_is_marked_and_referred() -> None:
    flat = assess(with_profile(FALLING, crack__length_mm=40, loading__cycles=STEADY))
    assert flat["disposition"]["verdict"] in ("refer", "withdraw")
    assert any(
        "any stress through the thickness" in reason for reason in flat["disposition"]["reasons"]
    )


def test_an_edge_crack_takes_its_profile_over_the_width() -> None:
    changes = {
        "crack": {"kind": "plate-through-edge", "length_mm": 20, "sizing": "none: cut piece"},
        "body": {"width_mm": 100, "thickness_mm": 20, "ends": "free"},
    }
    plain = assess(
        surface(
            loading__peak={"membrane_mpa": 60, "bending_mpa": 40},
            **changes,
            loading__cycles="none: steady",
        )
    )
    profile = assess(
        surface(
            loading__peak={"profile": [[0, 100], [100, 20]]},
            **changes,
            loading__cycles="none: steady",
        )
    )
    k = [one["stress_intensity"][0]["k_mpa_sqrt_m"] for one in (plain, profile)]
    assert k[1] == pytest.approx(k[0], rel=0.003)
    assert profile["failure"]["load_ratio"] == pytest.approx(plain["failure"]["load_ratio"])
    changes["body"]["ends"] = "held"
    with pytest.raises(CaseRefused, match="ends are free"):
        read_case(
            surface(
                loading__peak={"profile": [[0, 100], [100, 20]]},
                **changes,
                loading__cycles="none: steady",
            )
        )


REFUSED = [
    ([[0, 100]], "two points"),
    ([[1, 100], [20, 50]], "starts at 0"),
    ([[0, 100], [19, 50]], "has to reach through the thickness of 20 mm"),
    ([[0, 100], [5, 20], [5, 30], [20, 0]], "rise from row to row"),
    ([[0, 0], [20, 0]], "nil stress"),
    ([[0, 100], [20]], "pair"),
    ([[0, "much"], [20, 1]], "number"),
    ([[x, 1] for x in range(201)], "200"),
]


@pytest.mark.parametrize(("points", "words"), REFUSED)
def test_a_bad_profile_is_refused(points: Any, words: str) -> None:
    with pytest.raises(CaseRefused) as caught:
        read_case(with_profile(points))
    assert "profile" in caught.value.where and words in caught.value.why


def test_what_a_profile_cannot_go_with_is_refused() -> None:
    other = surface(
        crack={"kind": "plate-through-centre", "length_mm": 10, "sizing": "none: cut piece"},
        loading__peak={"profile": STRAIGHT},
    )
    with pytest.raises(CaseRefused, match="no weight function"):
        read_case(other)
    no_ratio = surface(loading__cycles=[{"profile": [[0, 9], [20, 7]], "per_usage": 20}])
    with pytest.raises(CaseRefused):
        read_case(no_ratio)
    both = surface(loading__residual={"profile": STRAIGHT, "level": "as-welded", "source": "x"})
    with pytest.raises(CaseRefused, match="not both"):
        read_case(both)


def test_cycles_may_not_exceed_the_peak_anywhere_along_the_profile() -> None:
    cycles = [{"profile": [[0, 120], [20, 120]], "stress_ratio": 0.0, "per_usage": 20}]
    with pytest.raises(CaseRefused, match="20 mm exceeds the peak of 110"):
        read_case(with_profile([[0, 170], [20, 110]], loading__cycles=cycles))
    assert read_case(with_profile([[0, 170], [20, 120]], loading__cycles=cycles))


def test_a_reduced_load_names_the_profile() -> None:
    found = assess(
        with_profile(
            [[0, 330], [20, 180]],
            owner={"allows_restriction": True},
            loading__reducible_part=1.0,
            loading__cycles=[{"profile": [[0, 60], [20, 40]], "stress_ratio": 0.1, "per_usage": 5}],
        )
    )
    assert found["disposition"]["verdict"] == "restrict", found["disposition"]
    assert "% of the stress profile" in found["restriction"]["words"]
