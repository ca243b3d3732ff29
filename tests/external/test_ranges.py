"""Just outside every stated range the size is marked; just inside it is not."""

from typing import Any

import numpy as np
import pytest

from assessment import KINDS
from assessment.validity import Range, Validity

CASES = [
    (name, relation, bound, side)
    for name, kind in KINDS.items()
    for relation in kind.relations
    for bound in relation.ranges
    for side in ("low", "high")
    if getattr(bound, side) is not None and bound.stated
]


def ids(case: Any) -> str:
    name, relation, bound, side = case
    return f"{name}: {relation.relation}: {bound.symbol} {side}"


@pytest.mark.parametrize("case", CASES, ids=ids)
def test_the_bound_itself_obeys_what_is_stated(
    case: tuple[str, Validity, Range, str],
) -> None:
    _, relation, bound, side = case
    edge = float(getattr(bound, side))
    step = 1e-9 * max(1.0, abs(edge)) * (-1 if side == "low" else 1)
    is_open = getattr(bound, f"{side}_open")
    assert not bound.holds(edge + step)
    assert bool(bound.holds(edge)) is (not is_open)
    assert bound.holds(edge - step)
    values = {r.symbol: _inside(r) for r in relation.ranges}
    assert not relation.marks(values)
    marks = relation.marks(values | {bound.symbol: edge + step})
    assert len(marks) == 1
    assert bound.meaning in marks[0].sentence() and relation.relation in marks[0].sentence()


def _inside(bound: Range) -> float:
    low = bound.low if bound.low is not None else (bound.high or 1.0) - 1.0
    high = bound.high if bound.high is not None else low + 1.0
    return (low + high) / 2.0


PLATE = {"thickness": 0.02, "width": 0.4}
CYLINDER = {"thickness": 0.02, "inner_radius": 0.1}
TABLE = {"thickness": 0.07, "table": ((0.001, 1.5), (0.02, 1.2), (0.05, 1.8))}
EDGE = {"thickness": 0.02, "width": 0.1, "ends": "free"}
HOLE = {"width": 0.2, "thickness": 0.01, "hole_diameter": 0.04}
LUG = {"width": 0.1, "thickness": 0.01, "hole_diameter": 0.04, "head": 0.06}
CORNER = {"width": 0.4, "thickness": 0.02, "hole_diameter": 0.04}
# A front outside one range of its kind, and the words that must mark it.
OUTSIDE = [
    ("plate-surface", [0.0105, 0.005], PLATE, "a/c"),
    ("plate-surface", [0.0199, 0.101], PLATE, "2c/W"),
    ("plate-surface", [0.0195, 0.15], PLATE, "long shallow"),
    ("cylinder-axial-inside", [0.0162, 0.03], CYLINDER, "a/t"),
    ("cylinder-axial-inside", [0.004, 0.0039], CYLINDER, "a/c"),
    ("cylinder-axial-inside", [0.004, 0.0201], CYLINDER, "a/c"),
    ("cylinder-axial-inside", [0.004, 0.01], CYLINDER | {"inner_radius": 0.0399}, "t/R"),
    ("cylinder-axial-inside", [0.004, 0.01], CYLINDER | {"inner_radius": 1.01}, "t/R"),
    ("bar-surface", [0.0601], {"diameter": 0.1}, "a/D"),
    ("tabulated", [0.0009], TABLE, "the crack size"),
    ("tabulated", [0.0501], TABLE, "the crack size"),
    ("plate-through-edge", [0.02], EDGE | {"ends": "held"}, "ends"),
    ("hole-through-one", [0.0721], HOLE, "a/l"),
    ("lug-through", [0.0271], LUG, "a/l"),
    ("lug-corner", [0.0081, 0.008], LUG, "a/t"),
    ("lug-corner", [0.003, 0.0061], LUG, "a/c"),
    ("hole-corner-one", [0.003, 0.0151], CORNER, "a/c"),
    ("hole-corner-two", [0.0101, 0.005], CORNER, "a/c"),
    ("hole-corner-one", [0.005, 0.01], CORNER | {"hole_diameter": 0.0199}, "R/t"),
    ("hole-corner-two", [0.018, 0.081], CORNER, "2(R + c)/W"),
    ("lug-through", [0.005], LUG | {"head": 0.0499}, "2H/W"),
    ("lug-through", [0.005], LUG | {"hole_diameter": 0.0199}, "D/W"),
    ("hole-through-two", [0.01], HOLE | {"hole_diameter": 0.101}, "D/W"),
    ("hole-through-two", [0.01], HOLE | {"hole_diameter": 0.001}, "D/W"),
]


@pytest.mark.parametrize(("name", "x", "body", "words"), OUTSIDE)
def test_a_crack_outside_is_marked(
    name: str, x: list[float], body: dict[str, Any], words: str
) -> None:
    kind = KINDS[name]
    front = np.asarray(x)
    assert not np.all(kind.inside(front, body))
    assert any(words in mark.sentence() for mark in kind.marks(front, body))


def test_a_crack_inside_is_not_marked() -> None:
    inside = [
        ("plate-surface", [0.005, 0.01], PLATE),
        ("cylinder-axial-inside", [0.004, 0.01], CYLINDER),
        ("bar-surface", [0.03], {"diameter": 0.1}),
        ("tabulated", [0.01], TABLE),
        ("plate-through-edge", [0.02], EDGE),
        ("plate-through-centre", [0.02], EDGE),
        ("hole-through-one", [0.02], HOLE),
        ("lug-through", [0.02], LUG),
        ("lug-corner", [0.004, 0.004], LUG),
        ("hole-corner-one", [0.005, 0.01], CORNER),
        ("hole-corner-two", [0.005, 0.01], CORNER),
        ("hole-through-two", [0.02], HOLE),
    ]
    for name, x, body in inside:
        assert np.all(KINDS[name].inside(np.asarray(x), body))
        assert not KINDS[name].marks(np.asarray(x), body)
