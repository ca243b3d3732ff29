"""Leak before break is said only where a leak is tolerated and the through crack holds."""

from typing import Any

import pytest

from assessment import assess
from tests.assessment.examples import surface


def vessel(**changes: Any) -> dict[str, Any]:
    return surface(
        crack={
            "kind": "cylinder-axial-inside", "depth_mm": 6.0, "length_mm": 20.0,
            "sizing": "none: measured on the cut piece",
        },
        body={"inner_radius_mm": 120.0, "thickness_mm": 12.0},
        loading__peak={"pressure_mpa": 6.0},
        loading__cycles=[{"pressure_range_mpa": 6.0, "stress_ratio": 0.0, "per_usage": 20}],
        **changes,
    )  # fmt: skip


def test_leak_before_break_is_said_only_where_a_leak_is_tolerated_and_the_crack_holds() -> None:
    plain = assess(vessel())
    assert plain["bounding"]["life"]["ends_by"] in ("break-through", "out of range")
    assert plain["leak"]["leak_before_break"] is False
    assert "Break-through comes first" in plain["leak"]["words"]
    tolerated = assess(vessel(owner={"leak_tolerated": True}))
    assert tolerated["leak"]["leak_before_break"] is True
    assert tolerated["leak"]["reserve_on_load"] > 1.4
    assert any("Leak before break" in said for said in tolerated["cautions"])
    # The life ends at break-through all the same.
    assert tolerated["next_inspection"] == plain["next_inspection"]
    much = assess(vessel(owner={"leak_tolerated": True}, criteria__load_reserve=50.0))
    assert much["leak"] is None or much["leak"]["leak_before_break"] is False


@pytest.mark.parametrize(
    ("kind", "peak"),
    [
        ("cylinder-axial-through", {"pressure_mpa": 6.0}),
        ("cylinder-girth-through", {"membrane_mpa": 30.0, "pressure_mpa": 6.0}),
    ],
)
def test_through_a_pressure_boundary_is_withdrawn_unless_a_leak_is_tolerated(
    kind: str, peak: dict[str, float]
) -> None:
    def through(**changes: Any) -> dict[str, Any]:
        return assess(
            surface(
                crack={"kind": kind, "length_mm": 10.0, "sizing": "none: cut piece"},
                body={"inner_radius_mm": 120.0, "thickness_mm": 12.0},
                loading__peak=peak,
                loading__cycles="none: steady",
                **changes,
            )
        )

    leaking = through()
    assert leaking["disposition"]["verdict"] == "withdraw"
    assert "no leak is tolerated" in leaking["disposition"]["reasons"][0]
    assert leaking["stop_size"]["depth_mm"] is None and leaking["stop_size"]["length_mm"] is None
    assert through(owner={"leak_tolerated": True})["disposition"]["verdict"] != "withdraw"


def test_a_girth_crack_without_pressure_is_no_leak() -> None:
    case = surface(
        crack={"kind": "cylinder-girth-through", "length_mm": 10.0, "sizing": "none: cut piece"},
        body={"inner_radius_mm": 120.0, "thickness_mm": 12.0},
        loading__peak={"membrane_mpa": 60.0},
        loading__cycles="none: steady",
    )
    assert assess(case)["disposition"]["verdict"] != "withdraw"
