"""One thing made worse, at each kind: never an easier verdict, a later look or a larger reserve.

Common sense of the trade, no source.
"""

import datetime

import pytest

from assessment import assess
from assessment.verdict import STRICTNESS
from tests.assessment.examples import changed, surface

HOLE = {"width_mm": 200.0, "thickness_mm": 10.0, "hole_diameter_mm": 20.0}
CORNER = {"depth_mm": 2.0, "length_mm": 3.0}
LUG = {"width_mm": 100.0, "thickness_mm": 20.0, "hole_diameter_mm": 40.0, "head_mm": 55.0}

CASES = {
    "plate-through-centre": (
        {"length_mm": 12.0},
        {"width_mm": 200.0, "thickness_mm": 10.0},
        {"membrane": 100.0},
    ),
    "plate-through-edge": (
        {"length_mm": 6.0},
        {"width_mm": 200.0, "thickness_mm": 10.0, "ends": "free"},
        {"membrane": 100.0, "bending": 10.0},
    ),
    "plate-surface": (
        {"depth_mm": 3.0, "length_mm": 12.0},
        {"width_mm": 200.0, "thickness_mm": 20.0},
        {"membrane": 150.0, "bending": 20.0},
    ),
    "plate-through-both-edges": (
        {"length_mm": 6.0},
        {"width_mm": 200.0, "thickness_mm": 10.0},
        {"membrane": 100.0},
    ),
    "plate-corner": (
        {"depth_mm": 3.0, "length_mm": 6.0},
        {"width_mm": 200.0, "thickness_mm": 20.0},
        {"membrane": 150.0, "bending": 20.0},
    ),
    "plate-embedded": (
        {"depth_mm": 5.0, "length_mm": 12.0},
        {"width_mm": 200.0, "thickness_mm": 20.0, "ligament_mm": 6.0},
        {"membrane": 200.0},
    ),
    "specimen-compact-tension": (
        {"length_mm": 24.0},
        {"width_mm": 50.0, "thickness_mm": 25.0},
        {"load": 10.0},
    ),
    "specimen-edge-bend": (
        {"length_mm": 24.0},
        {"width_mm": 50.0, "thickness_mm": 25.0, "span_mm": 200.0},
        {"load": 10.0},
    ),
    "cylinder-axial-inside": (
        {"depth_mm": 2.0, "length_mm": 12.0},
        {"inner_radius_mm": 100.0, "thickness_mm": 12.0},
        {"pressure": 8.0},
    ),
    "cylinder-axial-outside": (
        {"depth_mm": 2.0, "length_mm": 12.0},
        {"inner_radius_mm": 100.0, "thickness_mm": 12.0},
        {"pressure": 8.0},
    ),
    "cylinder-girth-inside": (
        {"depth_mm": 2.0, "length_mm": 12.0},
        {"inner_radius_mm": 100.0, "thickness_mm": 12.0},
        {"membrane": 60.0, "global_bending": 60.0, "pressure": 8.0},
    ),
    "cylinder-girth-outside": (
        {"depth_mm": 2.0, "length_mm": 12.0},
        {"inner_radius_mm": 100.0, "thickness_mm": 12.0},
        {"membrane": 80.0, "global_bending": 70.0},
    ),
    "cylinder-girth-through": (
        {"length_mm": 12.0},
        {"inner_radius_mm": 100.0, "thickness_mm": 12.0},
        {"membrane": 60.0, "global_bending": 40.0},
    ),
    "bar-surface": ({"depth_mm": 3.0}, {"diameter_mm": 60.0}, {"membrane": 60.0, "bending": 60.0}),
    "hole-through-one": ({"length_mm": 4.0}, HOLE, {"membrane": 60.0, "pin_load": 10.0}),
    "hole-through-two": ({"length_mm": 4.0}, HOLE, {"membrane": 60.0, "pin_load": 10.0}),
    "hole-corner-one": (CORNER, HOLE, {"membrane": 60.0, "pin_load": 10.0}),
    "hole-corner-two": (CORNER, HOLE, {"membrane": 60.0, "pin_load": 10.0}),
    "lug-corner": ({"depth_mm": 3.0, "length_mm": 3.0}, LUG, {"pin_load": 30.0}),
    "lug-through": ({"length_mm": 3.0}, LUG, {"pin_load": 30.0}),
    "weld-toe-surface": (
        {"depth_mm": 2.0, "length_mm": 10.0},
        {
            "width_mm": 200.0,
            "thickness_mm": 20.0,
            "attachment_length_mm": 25.0,
            "weld_condition": "stress-relieved",
        },
        {"membrane": 80.0, "bending": 20.0},
    ),
    "tabulated": (
        {"depth_mm": 3.0},
        {"thickness_mm": 30.0, "table": [[0, 1.1], [20, 1.6]]},
        {"membrane": 100.0},
    ),
}
STRETCH = (1.1, 1.5)
# A through crack's stress is given whatever the thickness, which is then no part of it; a smaller
# radius lowers the hoop stress; a thinner wall moves an inner crack out of its middle; and a
# longer span bends more, as a longer attachment magnifies more.
WITHOUT_A_BAD_DIRECTION = {
    *((kind, "thickness_mm") for kind in CASES if kind.startswith("plate-through")),
    *((kind, "hole_diameter_mm") for kind in CASES if kind.startswith(("hole", "lug"))),
    *((kind, "inner_radius_mm") for kind in CASES if kind.startswith("cylinder")),
    ("cylinder-girth-through", "thickness_mm"),
    ("plate-embedded", "thickness_mm"),
    ("specimen-edge-bend", "span_mm"),
    ("weld-toe-surface", "attachment_length_mm"),
}


def case_of(kind):
    sizes, body, loads = CASES[kind]
    cycles = {f"{name}_range_{unit(name)}": 0.5 * value for name, value in loads.items()}
    return surface(
        crack={
            "kind": kind,
            **sizes,
            "sizing": {"method": "ultrasonic", "depth_sd_mm": 0.2, "length_sd_mm": 0.3},
        },
        body=dict(body),
        loading__peak={f"{name}_{unit(name)}": value for name, value in loads.items()},
        loading__cycles=[{**cycles, "stress_ratio": 0.1, "per_usage": 20}],
    )


def unit(load):
    return "kn" if load in ("load", "pin_load") else "mpa"


def worse(kind):
    """(path, factor that makes it worse) for every number that has a bad direction."""
    sizes, body, loads = CASES[kind]
    up = [f"crack__{size}" for size in sizes]
    up += [f"crack__sizing__{size[:-3]}_sd_mm" for size in sizes]
    up += [f"loading__peak__{name}_{unit(name)}" for name in loads]
    up += [f"loading__cycles__0__{name}_range_{unit(name)}" for name in loads]
    up += ["loading__cycles__0__per_usage", "material__growth__c", "material__bounding__growth__c"]
    down = ["material__bounding__toughness__k_mat_mpa_sqrt_m", "material__yield_mpa"]
    down += ["material__toughness__k_mat_mpa_sqrt_m"]
    # A through crack's stress is given whatever the thickness, which is then no part of it.
    if kind.startswith(("hole", "lug")):
        up.append("body__hole_diameter_mm")
    # An inner crack's ligament counts, and the wall only through its limit load.
    down += [
        f"body__{key}"
        for key, value in body.items()
        if isinstance(value, float) and (kind, key) not in WITHOUT_A_BAD_DIRECTION
    ]
    for path in up:
        yield from ((path, stretch) for stretch in STRETCH)
    for path in down:
        yield from ((path, 1.0 / stretch) for stretch in STRETCH)


ALL = [(kind, path, factor) for kind in CASES for path, factor in worse(kind)]


def value_at(case, path):
    for part in path.split("__"):
        case = case[int(part)] if isinstance(case, list) else case[part]
    return case


def of(number, when_none):
    return when_none if number is None else number


@pytest.fixture(scope="module")
def plain():
    return {kind: assess(case_of(kind)) for kind in CASES}


@pytest.mark.parametrize(("kind", "path", "factor"), ALL)
def test_one_thing_worse(plain, kind, path, factor):
    case = case_of(kind)
    before = plain[kind]
    after = assess(changed(case, **{path: factor * value_at(case, path)}))
    rank = [STRICTNESS.index(one["disposition"]["verdict"]) for one in (before, after)]
    assert rank[1] >= rank[0]
    on = [one["next_inspection"]["on"] for one in (before, after)]
    if on[1] is not None:
        assert datetime.date.fromisoformat(on[1]) <= datetime.date.fromisoformat(on[0])
    for part in ("failure", "bounding"):
        failure = [
            one["bounding"]["failure"] if part == "bounding" else one[part]
            for one in (before, after)
        ]
        assert failure[1]["reserve_on_load"] <= failure[0]["reserve_on_load"] * (1 + 1e-9)
    life = [one["bounding"]["life"]["usage"] for one in (before, after)]
    # No life at all (outside a range, failed today) refers or withdraws, which the verdict shows.
    if life[1] is not None:
        assert life[1] <= life[0] * (1 + 1e-6)
    else:
        assert rank[1] > rank[0]


def test_each_kind_starts_where_both_sides_can_be_told_apart(plain):
    for outcome in plain.values():
        assert outcome["disposition"]["verdict"] in ("continue", "watch")
        assert outcome["bounding"]["life"]["usage"] > 0


def test_a_better_value_is_noticed_as_better(plain):
    """The comparison can fail: half the crack lives longer."""
    better = assess(changed(case_of("plate-surface"), crack__depth_mm=1.5, crack__length_mm=6.0))
    before = plain["plate-surface"]["bounding"]["life"]["usage"]
    assert better["bounding"]["life"]["usage"] > before * 1.01
