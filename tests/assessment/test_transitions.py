"""Past break-through the run goes on and names each change; the life that decides does not."""

from typing import Any

import pytest

from assessment import assess
from tests.assessment.examples import surface

DEEP: dict[str, Any] = {
    "crack__depth_mm": 8.0,
    "crack__length_mm": 17.0,
    "body": {"width_mm": 400, "thickness_mm": 12},
    "loading__peak": {"membrane_mpa": 110},
}


def kind(name: str, sizes: dict[str, float], **body: float) -> dict[str, Any]:
    return {
        **DEEP,
        "crack__kind": name,
        "crack__depth_mm": sizes["depth"],
        "crack__length_mm": sizes["length"],
        "body": {"width_mm": 400, "thickness_mm": 12, **body},
    }


def test_a_surface_crack_goes_on_as_a_through_crack() -> None:
    found = assess(surface(**DEEP))
    life = found["life"]
    assert life["ends_by"] == "break-through"
    (step,) = life["beyond"]["transitions"]
    assert (step["from"], step["to"]) == ("plate-surface", "plate-through-centre")
    assert step["usage"] == life["usage"] and step["depth_mm"] is None
    through = assess(
        surface(
            crack={"kind": "plate-through-centre", "length_mm": step["length_mm"],
                   "sizing": "none: as it becomes"},
            body=DEEP["body"],
            loading__peak=DEEP["loading__peak"],
        )
    )  # fmt: skip
    assert life["beyond"]["usage"] == pytest.approx(
        life["usage"] + through["life"]["usage"], rel=1e-6
    )
    assert life["beyond"]["ends_by"] == through["life"]["ends_by"]


def test_a_corner_crack_at_a_hole_goes_on_as_a_through_crack_there() -> None:
    changes = kind("hole-corner-one", {"depth": 9.0, "length": 8.0}, hole_diameter_mm=30)
    life = assess(surface(**changes))["life"]
    assert life["ends_by"] == "break-through"
    assert [step["to"] for step in life["beyond"]["transitions"]] == ["hole-through-one"]
    assert life["beyond"]["usage"] > life["usage"]


@pytest.mark.parametrize(
    ("name", "sizes", "body"),
    [
        ("plate-corner", {"depth": 9.0, "length": 9.0}, {}),
        ("plate-embedded", {"depth": 5.0, "length": 9.0}, {"ligament_mm": 2.5}),
    ],
)
def test_where_the_published_range_ends_before_the_wall_the_run_ends_there(
    name: str, sizes: dict[str, float], body: dict[str, float]
) -> None:
    """Their equations hold to 0.8 of the way: nothing is said of what they become."""
    changes = kind(name, sizes, **body)
    life = assess(surface(**{**changes, "loading__cycles__0__per_usage": 200}))["life"]
    assert life["ends_by"] == "out of range" and life["beyond"] is None


def test_a_life_that_ends_otherwise_has_nothing_beyond() -> None:
    found = assess(surface(loading__peak={"membrane_mpa": 300}))
    assert found["life"]["ends_by"] != "break-through" and found["life"]["beyond"] is None


def test_a_pressure_boundary_has_nothing_beyond() -> None:
    found = assess(
        surface(
            crack={"kind": "cylinder-axial-inside", "depth_mm": 7.0, "length_mm": 20.0,
                   "sizing": "none: cut piece"},
            body={"inner_radius_mm": 120, "thickness_mm": 12},
            loading__peak={"pressure_mpa": 5},
            loading__cycles=[{"pressure_range_mpa": 5, "stress_ratio": 0, "per_usage": 50}],
        )
    )  # fmt: skip
    assert found["life"]["beyond"] is None


def test_what_lies_beyond_changes_no_verdict_and_no_date() -> None:
    found = assess(surface(**DEEP))
    rule = next(one for one in found["rules"] if one["usage"] is not None)
    assert rule["usage"] <= 1250 + found["bounding"]["life"]["usage"]
    assert found["bounding"]["life"].get("beyond") is None
