"""Lugs against plane finite elements, published nowhere, and against a pin in a plate."""

import math

import numpy as np
import pytest

from assessment import KINDS
from assessment.relations import hole_corner, hole_through, lug

from .fem import holes
from .fem.hole_solid import Corner, front_factors

# R, head, a over the ligament, in half widths: most of them between the points that were fitted.
LUGS = [
    (0.2, 1.0, 0.05),
    (0.25, 1.25, 0.25),
    (0.33, 1.1, 0.6),
    (0.45, 1.8, 0.05),
    (0.5, 1.0, 0.5),
    (0.55, 2.6, 0.35),
    (0.65, 1.07, 0.01),
    (0.7, 1.5, 0.85),
]


@pytest.mark.parametrize(("radius", "head", "used"), LUGS)
def test_the_fit_keeps_to_the_elements(radius: float, head: float, used: float) -> None:
    a = used * (1 - radius)
    found = float(lug.through(np.asarray(a), radius, 2.0, head))
    assert found == pytest.approx(holes.lug(radius, a, head), rel=0.01)


@pytest.mark.parametrize(("radius", "used"), [(0.3, 0.1), (0.5, 0.5), (0.3, 0.5)])
def test_a_square_end_is_on_the_safe_side(radius: float, used: float) -> None:
    """Stated: 1 % to 9 % lower."""
    a = used * (1 - radius)
    ratio = holes.lug(radius, a, 1.0, "square") / float(
        lug.through(np.asarray(a), radius, 2.0, 1.0)
    )
    assert 0.90 < ratio < 0.99


@pytest.mark.parametrize("used", [0.02, 0.1, 0.3])
@pytest.mark.parametrize("radius", [0.2, 0.3, 0.5])
def test_a_long_head_is_a_plate_with_a_pin(radius: float, used: float) -> None:
    """The plate's K leaves the sliding out, and its width factor is a published one."""
    a = np.asarray(used * (1 - radius))
    plate = float(hole_through.pin(a, radius, 2.0, 1))
    assert float(lug.through(a, radius, 2.0, 3.0)) == pytest.approx(plate, rel=0.03)


def test_the_kind_reads_its_load_in_kilonewtons() -> None:
    """30 kN on 40 mm by 20 mm is a bearing stress of 37.5 MPa."""
    body = {"width": 0.1, "thickness": 0.02, "hole_diameter": 0.04, "head": 0.06}
    loads = {"pin_load": np.asarray(30.0)}
    kind = KINDS["lug-through"]
    assert kind.nominal_stress(loads, body) == pytest.approx(37.5)
    k = float(kind.stress_intensity(np.array([0.005]), loads, body)[0])
    f = float(lug.through(np.asarray(0.005), 0.02, 0.1, 0.06))
    assert k == pytest.approx(f * 37.5 * math.sqrt(math.pi * 0.005))


@pytest.mark.parametrize(("rim", "shape", "depth"), [(2.0, 1.001, 0.6)])
def test_corner_cracks_by_solid_rings(rim: float, shape: float, depth: float) -> None:
    """The way a lug's corner crack is built, on rings of two corner cracks: R = t = 1."""
    a, c = np.asarray(depth), np.asarray(depth * shape)
    _, solid = front_factors(
        Corner(depth, depth * shape, 1.0, 1.0, rim), (6, 5, 5, 8), ("pin-pair",)
    )
    area = float(np.pi / 4 * a * c)
    narrow = holes.ring(1 / rim, area / rim) / float(
        hole_through.pair_wide(np.asarray(area), 1.0, 2)
    )
    built = hole_corner.pair_of_pins(a, c, 1.0, 1.0, 2) / math.sqrt(math.pi * depth) * narrow
    deepest, surface = built / solid["pin-pair"][[-1, 0]]
    assert 0.98 < deepest < 1.10 and 0.97 < surface < 1.24
