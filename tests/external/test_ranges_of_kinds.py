"""Each bound of each relation of each kind, left by a real crack: the kind itself must mark it.

The list is made from the kinds, so that a new bound without a crack that leaves it fails here.
"""

import numpy as np
import pytest

from assessment import KINDS

PLATE = {"width": 0.4, "thickness": 0.02}
EDGE = PLATE | {"ends": "free"}
HELD = PLATE | {"ends": "held", "held_length": 1.2}
INNER = PLATE | {"ligament": 0.006, "middle": 0.01}
SPECIMEN = {"width": 0.05, "thickness": 0.025, "span": 0.2}
CYLINDER = {"thickness": 0.02, "inner_radius": 0.1}
HOLE = {"width": 0.2, "thickness": 0.01, "hole_diameter": 0.04}


def by_length(scale, body):
    return lambda value: (np.array([value * scale]), body)


def by_radius(value):
    return np.array([0.004, 0.01]), CYLINDER | {"inner_radius": 0.02 / value}


def around(outside, through=False):
    """θ/π: of a shallow wall that is thick enough for its radius."""
    radius = 0.1 + (0.01 if through else 0.02 if outside else 0.0)
    front = (lambda c: [c]) if through else (lambda c: [0.0165, c])
    return lambda value: (np.array(front(value * np.pi * radius)), CYLINDER)


def by_mean_radius(value):
    """R/t of a wall of 20 mm, the crack being a small part of the way around."""
    return np.array([0.01]), CYLINDER | {"inner_radius": 0.02 * (value - 0.5)}


def folias(value):
    return np.array([value * np.sqrt(0.11 * 0.02)]), CYLINDER


def long_and_shallow(value):
    """a/c = 0.1: the bound on depth is 1.25 (0.1 + 0.6) = 0.875 of the wall."""
    a = 0.02 * value * 1.25 * 0.7
    return np.array([a, 10.0 * a]), PLATE | {"width": 4.0}


def by_hole(value):
    return np.array([0.01]), HOLE | {"hole_diameter": 0.2 * value}


def by_bore(value):
    """a/R in a plate so wide that only this bound is left."""
    return np.array([0.02 * value]), HOLE | {"width": 3.9}


CORNER = {"width": 0.4, "thickness": 0.02, "hole_diameter": 0.04}
LUG = {"width": 0.1, "thickness": 0.01, "hole_diameter": 0.04, "head": 0.06}


def lug_hole(value):
    return np.array([0.005]), LUG | {"hole_diameter": 0.1 * value}


def lug_head(value):
    return np.array([0.005]), LUG | {"head": 0.05 * value}


def corner_hole(value):
    """R/t, in a plate so wide that only this bound is left."""
    return np.array([0.005, 0.01]), CORNER | {"hole_diameter": 0.04 * value, "width": 1.0}


def corner_width(value):
    return np.array([0.01, 0.2 * value - 0.02]), CORNER


def corner_small_hole(value):
    """Leaves the other bounds too where it is out at its upper end."""
    return np.array([0.005, 0.01]), CORNER | {"width": 0.04 / value}


def corners(kind):
    return {
        (kind, "a/c"): lambda value: (np.array([0.01 * value, 0.01]), CORNER | {"thickness": 0.03}),
        (kind, "a/t"): lambda value: (np.array([0.02 * value, 0.02]), CORNER),
        (kind, "R/t"): corner_hole,
        (kind, "2(R + c)/W"): corner_width,
        (kind, "D/W"): corner_small_hole,
    }


def in_lug(x, **changes):
    return np.array(x), LUG | changes


LUG_CORNERS = {
    "a/c": lambda value: in_lug([0.004 * value, 0.004]),
    "a/t": lambda value: in_lug([0.01 * value, 0.008]),
    "R/t": lambda value: in_lug([0.004, 0.004], thickness=0.02 / value),
    "D/W": lambda value: in_lug([0.003, 0.003], hole_diameter=0.1 * value),
    "2H/W": lambda value: in_lug([0.004, 0.004], head=0.05 * value),
    "c/l": lambda value: in_lug([0.012, 0.03 * value], thickness=0.02),
    "a/l": lambda value: in_lug([0.012, 0.03 * value], thickness=0.02),
}


TOE = PLATE | {"attachment_length": 0.03}


def toe_depth(value):
    """z/B; the wall is thin, so that the surface point lies inside the range."""
    return np.array([0.02 * value, 0.02]), TOE


def toe_long(value):
    return np.array([0.005, 0.01]), TOE | {"attachment_length": 0.02 * value}


def on_toe(crack):
    """The same front in a plate, along a weld."""

    def crack_of_toe(value):
        x, body = crack(value)
        return x, body | {"attachment_length": 1.5 * body["thickness"]}

    return crack_of_toe


# kind, symbol: the crack whose symbol has a value. Where one kind uses two relations of one symbol
# in different bodies, the relation's words stand in front.
HELD_RELATIONS = [
    r.relation for r in KINDS["plate-through-edge"].relations if "turning" in r.relation
]
CRACKS = {
    **{(relation, "a/W"): by_length(0.4, HELD) for relation in HELD_RELATIONS},
    ("plate-through-edge", "L/W"): lambda value: (
        np.array([0.1]),
        HELD | {"held_length": 0.4 * value},
    ),
    ("plate-through-centre", "2a/W"): by_length(0.2, PLATE),
    ("plate-through-edge", "a/W"): by_length(0.4, EDGE),
    ("plate-through-edge", "ends"): lambda value: (
        np.array([0.02]),
        EDGE | {"ends": "held" if value > 0 else "free"},
    ),
    ("plate-surface", "a/c"): lambda value: (np.array([0.008 * value, 0.008]), PLATE),
    ("plate-surface", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), PLATE),
    ("plate-surface", "a/t ÷ 1.25(a/c + 0.6)"): long_and_shallow,
    ("plate-surface", "2c/W"): lambda value: (np.array([0.005, 0.2 * value]), PLATE),
    ("plate-through-both-edges", "2a/W"): by_length(0.2, PLATE),
    ("plate-corner", "a/c"): lambda value: (np.array([0.008 * value, 0.008]), PLATE),
    ("plate-corner", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), PLATE),
    ("plate-corner", "c/W"): lambda value: (np.array([0.005, 0.4 * value]), PLATE),
    ("plate-corner", "c/W in bending"): lambda value: (np.array([0.005, 0.4 * value]), PLATE),
    ("plate-embedded", "a/c"): lambda value: (np.array([0.004 * value, 0.004]), INNER),
    ("plate-embedded", "a/(a + p)"): lambda value: (np.array([0.01 * value, 0.01]), INNER),
    ("plate-embedded", "2a/t"): lambda value: (np.array([0.01 * value, 0.02]), INNER),
    ("plate-embedded", "2c/W"): lambda value: (np.array([0.003, 0.2 * value]), INNER),
    ("specimen-compact-tension", "a/W"): by_length(0.05, SPECIMEN),
    ("specimen-edge-bend", "a/W"): by_length(0.05, SPECIMEN),
    ("specimen-edge-bend", "S/W"): lambda value: (
        np.array([0.02]),
        SPECIMEN | {"span": 0.05 * value},
    ),
    ("cylinder-axial-inside", "a/c"): lambda value: (np.array([0.01 * value, 0.01]), CYLINDER),
    ("cylinder-axial-inside", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), CYLINDER),
    ("cylinder-axial-inside", "t/R"): by_radius,
    ("hole-through-one", "a/R"): by_bore,
    ("hole-through-one", "D/W"): by_hole,
    ("hole-through-one", "a/l"): by_length(0.08, HOLE),
    ("hole-through-two", "a/R"): by_bore,
    ("hole-through-two", "D/W"): by_hole,
    ("hole-through-two", "a/l"): by_length(0.08, HOLE),
    ("lug-through", "D/W"): lug_hole,
    ("lug-through", "2H/W"): lug_head,
    ("lug-through", "a/l"): by_length(0.03, LUG),
    **{("lug-corner", symbol): crack for symbol, crack in LUG_CORNERS.items()},
    **corners("hole-corner-one"),
    **corners("hole-corner-two"),
    ("cylinder-axial-outside", "a/c"): lambda value: (np.array([0.01 * value, 0.01]), CYLINDER),
    ("cylinder-axial-outside", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), CYLINDER),
    ("cylinder-axial-outside", "t/R"): by_radius,
    ("cylinder-axial-through", "c/√(R t)"): folias,
    ("cylinder-axial-through", "R/t"): by_mean_radius,
    ("cylinder-girth-inside", "a/c"): lambda value: (np.array([0.01 * value, 0.01]), CYLINDER),
    ("cylinder-girth-inside", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), CYLINDER),
    ("cylinder-girth-inside", "t/R"): by_radius,
    ("cylinder-girth-inside", "θ/π"): around(outside=False),
    ("cylinder-girth-outside", "a/c"): lambda value: (np.array([0.01 * value, 0.01]), CYLINDER),
    ("cylinder-girth-outside", "a/t"): lambda value: (np.array([0.02 * value, 0.03]), CYLINDER),
    ("cylinder-girth-outside", "t/R"): by_radius,
    ("cylinder-girth-outside", "θ/π"): around(outside=True),
    ("cylinder-girth-through", "θ/π"): around(outside=False, through=True),
    ("cylinder-girth-through", "R/t"): by_mean_radius,
    ("bar-surface", "a/D"): by_length(0.06, {"diameter": 0.06}),
}
CRACKS |= {
    ("weld-toe-surface", symbol): on_toe(CRACKS["plate-surface", symbol])
    for symbol in ("a/c", "a/t", "a/t ÷ 1.25(a/c + 0.6)", "2c/W")
}
# What the weight functions are confirmed for counts where a profile acts.
EDGE_PROFILE = next(
    r.relation for r in KINDS["plate-through-edge"].relations if "any" in r.relation
)
SURFACE_PROFILE = next(r.relation for r in KINDS["plate-surface"].relations if "any" in r.relation)
BY_PROFILE = TOE | {"profiles": {}}
CRACKS |= {
    (EDGE_PROFILE, "a/W"): by_length(0.4, EDGE | {"profiles": {}}),
    (SURFACE_PROFILE, "a/c"): lambda value: (np.array([0.008 * value, 0.008]), BY_PROFILE),
    (SURFACE_PROFILE, "a/t"): lambda value: (np.array([0.02 * value, 0.03]), BY_PROFILE),
}
CRACKS |= {("weld-toe-surface", "z/B"): toe_depth, ("weld-toe-surface", "L/B"): toe_long}
BOUNDS = [
    (name, relation, bound, side)
    for name, kind in KINDS.items()
    for relation in kind.relations
    for bound in relation.ranges
    for side in ("low", "high")
    # Whether ends are held has one side alone.
    if getattr(bound, side) is not None and (bound.symbol, side) != ("ends", "low")
]


def crack_of(name, relation, range_):
    return CRACKS.get((relation.relation, range_.symbol)) or CRACKS[name, range_.symbol]


def words(bound):
    name, relation, range_, side = bound
    return f"{name}: {relation.relation}: {range_.symbol} {side}"


@pytest.mark.parametrize("bound", BOUNDS, ids=words)
def test_a_crack_just_outside_is_marked_by_its_kind(bound):
    name, relation, range_, side = bound
    away = -1e-9 if side == "low" else 1e-9
    value = getattr(range_, side) + (away if range_.symbol != "ends" else 1.0)
    x, body = crack_of(name, relation, range_)(value)
    with np.errstate(divide="ignore", invalid="ignore"):
        assert not np.all(KINDS[name].inside(x, body))
        marks = KINDS[name].marks(x, body)
    left = [mark for mark in marks if mark.relation == relation.relation]
    assert range_.symbol in {mark.range.symbol for mark in left}
    assert all(mark.sentence() for mark in left)


@pytest.mark.parametrize("bound", BOUNDS, ids=words)
def test_a_crack_just_inside_is_not_marked_for_that_bound(bound):
    name, relation, range_, side = bound
    inward = 1e-9 if side == "low" else -1e-9
    value = getattr(range_, side) + (inward if range_.symbol != "ends" else 0.0)
    if range_.low == range_.high:
        value = range_.low
    x, body = crack_of(name, relation, range_)(value)
    with np.errstate(divide="ignore", invalid="ignore"):
        marks = KINDS[name].marks(x, body)
    assert (relation.relation, range_.symbol) not in {(m.relation, m.range.symbol) for m in marks}


def test_every_kind_but_the_table_has_bounds():
    """A table's bounds are its own first and last size (test_ranges.py)."""
    assert {name for name, *_ in BOUNDS} == set(KINDS) - {"tabulated"}
