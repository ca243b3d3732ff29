"""Laws that every kind keeps: K is linear in the loads, and rises with size under one stress all
over the section."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from assessment import KINDS

from .test_ranges_of_kinds import CYLINDER, EDGE, HOLE, INNER, LUG, PLATE, SPECIMEN, TOE

BODIES = {
    "plate-through-centre": PLATE,
    "plate-through-edge": EDGE,
    "plate-through-both-edges": PLATE,
    "plate-surface": PLATE,
    "plate-corner": PLATE,
    "plate-embedded": INNER,
    "hole-through-one": HOLE,
    "hole-through-two": HOLE,
    "hole-corner-one": HOLE,
    "hole-corner-two": HOLE,
    "lug-through": LUG,
    "lug-corner": LUG,
    "cylinder-axial-inside": CYLINDER,
    "cylinder-axial-outside": CYLINDER,
    "cylinder-axial-through": CYLINDER,
    "cylinder-girth-inside": CYLINDER,
    "cylinder-girth-outside": CYLINDER,
    "cylinder-girth-through": CYLINDER,
    "bar-surface": {"diameter": 0.06},
    "weld-toe-surface": TOE,
    "specimen-compact-tension": SPECIMEN,
    "specimen-edge-bend": SPECIMEN,
    "tabulated": {"thickness": 0.02, "table": ((0.0, 1.1), (0.01, 1.3), (0.02, 2.0))},
}
# A crack at a hole leaves the concentration behind, a pin's force and a force on a lug act at one
# place, and the magnification at a weld toe falls away: K need not rise there. A specimen's does.
UNIFORM = [
    name
    for name, kind in KINDS.items()
    if "membrane_mpa" in kind.load_keys and not name.startswith(("hole", "weld"))
]


def loads_of(name: str) -> list[str]:
    return [key.rpartition("_")[0] for key in KINDS[name].load_keys]


def front(name: str, share: float) -> np.ndarray:
    """A front of a fixed shape, this large a part of what is allowed."""
    kind = KINDS[name]
    start = np.array([0.001, 0.0012])[: len(kind.points)]
    while not np.all(kind.inside(start, BODIES[name])):
        start = start * 1.3
    largest = start
    while np.all(kind.inside(largest * 1.05, BODIES[name])) and np.all(
        kind.wall(largest * 1.05, BODIES[name]) > 0.0
    ):
        largest = largest * 1.05
    return np.asarray(start + share * (largest - start))


@pytest.mark.parametrize("name", sorted(KINDS))
@settings(max_examples=15, deadline=None)
@given(st.floats(0.0, 1.0), st.floats(-200.0, 200.0), st.floats(0.1, 5.0))
def test_k_is_linear_in_the_loads(name: str, share: float, value: float, factor: float) -> None:
    x, body = front(name, share), BODIES[name]
    names = loads_of(name)
    single = [KINDS[name].stress_intensity(x, {load: np.asarray(value)}, body) for load in names]
    together = KINDS[name].stress_intensity(
        x, {load: np.asarray(factor * value) for load in names}, body
    )
    assert together == pytest.approx(factor * sum(single), rel=1e-9, abs=1e-12)


@pytest.mark.parametrize("name", UNIFORM)
def test_k_rises_with_size_under_one_stress_all_over(name: str) -> None:
    """The largest K of the front; shape held, as when a crack is found larger than thought."""
    sizes = np.stack([front(name, share) for share in np.linspace(0.0, 1.0, 40)], axis=1)
    k = KINDS[name].stress_intensity(sizes, {"membrane": np.asarray(1.0)}, BODIES[name])
    assert np.all(np.diff(np.max(k, axis=0)) > 0.0)


def test_every_kind_has_a_body_here() -> None:
    assert set(BODIES) == set(KINDS)
