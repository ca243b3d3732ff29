"""Surface, corner and inner cracks in plates against three-dimensional finite elements.

An independent computation, published nowhere: fixtures/checks/plate-solids.json holds it at full
size (computed again by tests/full/plates.py), and one coarse shape of each kind is computed here.
Bending is compared in parts of the value in tension of the same stress, since it passes through
nil. A crack end at a free side is read as plane strain, which is a convention of 2 to 6 %.
"""

import pytest

from assessment import assess
from tests.assessment.examples import surface

from .fem.solid import COARSE, Crack, boundary_factors
from .plate_solids import SHAPES, Shape, by_elements, by_kind, stored

NAMES = {kind: [s for s in SHAPES if s.kind == kind] for kind in ("surface", "corner", "inner")}


def apart(shape: Shape, point: int, load: str) -> float:
    """Kind less elements, over the elements' value in tension."""
    there = stored(shape, point, load)
    return (by_kind(shape)[point, load] - there) / stored(shape, point, "tension")


@pytest.mark.parametrize("shape", NAMES["surface"], ids=str)
def test_a_surface_crack(shape: Shape) -> None:
    """The equation in tension: 2 % below to 4 % above, 10 % above at a/t = 0.8, 6 % below at the
    surface where the crack takes half the width; in bending, with both its forms of H, within 5 %
    of the value in tension."""
    below, above = (0.06 if shape.part > 0.4 else 0.02), (0.105 if shape.depth > 0.7 else 0.04)
    for point in (0, 1):
        assert -below <= apart(shape, point, "tension") <= above
        assert abs(apart(shape, point, "bending")) <= 0.05


@pytest.mark.parametrize("shape", NAMES["corner"], ids=str)
def test_a_corner_crack(shape: Shape) -> None:
    """The equation with its factor for finite width: 4 % below to 23 % above in tension up to
    c/W = 0.2, to 42 % above at 0.4; bending, where it is not referred, 5 % below to 15 % above."""
    wide = shape.part > 0.2
    for point in (0, 1):
        assert -0.04 <= apart(shape, point, "tension") <= (0.42 if wide else 0.23)
        if not wide:
            assert -0.051 <= apart(shape, point, "bending") <= 0.15


def test_a_wide_corner_crack_in_bending_is_below_the_elements_and_so_referred() -> None:
    """The comparison can fail: it does where the kind marks the crack."""
    shape = next(s for s in NAMES["corner"] if s.part == 0.4 and s.shape == 1.0 and s.depth == 0.8)
    assert apart(shape, 0, "bending") < -0.08

    def words(**peak: float) -> str:
        case = surface(
            crack={
                "kind": "plate-corner",
                "depth_mm": 8.0,
                "length_mm": 40.0,
                "sizing": "none: cut (invented)",
            },
            body={"width_mm": 100.0, "thickness_mm": 20.0},
            loading__peak=peak,
            loading__cycles=[{"membrane_range_mpa": 5.0, "stress_ratio": 0.1, "per_usage": 20}],
        )
        return " ".join(assess(case)["disposition"]["reasons"])

    assert "in bending" in words(membrane_mpa=20.0, bending_mpa=5.0)
    assert "in bending" not in words(membrane_mpa=20.0)


@pytest.mark.parametrize("shape", NAMES["inner"], ids=str)
def test_an_inner_crack(shape: Shape) -> None:
    """Midway, and off the middle by the equation of a plate that is thin enough: 1 % below to 7 %
    above."""
    for point in (0, 1):
        assert -0.011 <= apart(shape, point, "tension") <= 0.07


@pytest.mark.parametrize(
    "shape",
    [
        Shape("surface", 2.0, 0.5, 0.2),
        Shape("corner", 1.0, 0.5, 0.2),
        Shape("inner", 2.0, 0.8, 0.2),
    ],
    ids=str,
)
def test_a_coarse_grid_comes_near_the_stored_value(shape: Shape) -> None:
    for (point, load), value in by_elements(shape, COARSE).items():
        tension = stored(shape, point, "tension")
        assert value == pytest.approx(stored(shape, point, load), abs=0.03 * tension)


@pytest.mark.parametrize("shape", [1.0, 0.4, 2.0])
def test_the_elements_against_an_ellipse_in_an_endless_body(shape: float) -> None:
    """Green & Sneddon 1950, exact: with K = σ √(πa)/E(k) F, F at the end of a and at that of c."""
    far = 8.0 * max(1.0, 1.0 / shape)
    _, found = boundary_factors(Crack(1.0, 1.0 / shape, far, far, far, "inner"), COARSE)
    exact = (1.0, shape**0.5) if shape <= 1.0 else (1.0 / shape, shape**-0.5)
    assert found[0][[-1, 0]] == pytest.approx(exact, rel=0.02)
