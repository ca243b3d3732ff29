"""Holes and lugs against finite elements over their whole ranges: python -m tests.full.holes

Some minutes on two cores. Each line is a bound that a relation states; a broken one raises.
"""

import itertools
import math

import numpy as np

from assessment.relations import hole_corner, hole_through, lug
from tests.external.fem import holes
from tests.external.fem.hole_solid import Corner, front_factors


def plates() -> None:
    """Through cracks: published width factor in tension, own one for the pin."""
    for radius, used, cracks in itertools.product(
        (0.02, 0.1, 0.2, 0.3, 0.4, 0.5), (0.05, 0.2, 0.5, 0.7, 0.89), (1, 2)
    ):
        a = used * (1 - radius)
        size = np.asarray(a)
        elements = holes.plate(radius, a, cracks, "tension")
        tension = float(hole_through.tension(size, radius, 2.0, cracks)) / elements
        pair = holes.plate(radius, a, cracks, "pin-pair")
        pin = float(hole_through.pin(size, radius, 2.0, cracks)) / ((elements * radius + pair) / 2)
        print(f"{cracks} R {radius} used {used}: tension {tension:.3f}, pin {pin:.3f}", flush=True)
        assert 0.975 < tension < (1.06 if used <= 0.5 else 1.16)
        assert 0.98 < pin < (1.035 if used <= 0.5 else 1.085)


def lugs() -> None:
    for radius, head, used in itertools.product(
        (0.2, 0.35, 0.55, 0.7), (1.0, 1.2, 1.7, 3.0), (0.01, 0.1, 0.4, 0.89)
    ):
        a = used * (1 - radius)
        ratio = float(lug.through(np.asarray(a), radius, 2.0, head)) / holes.lug(radius, a, head)
        print(f"lug R {radius} H {head} used {used}: {ratio:.4f}", flush=True)
        assert abs(ratio - 1) < 0.013


def finer_lugs() -> None:
    for radius, used in ((0.3, 0.05), (0.5, 0.5)):
        a = used * (1 - radius)
        assert math.isclose(
            holes.lug(radius, a, 1.0), holes.lug(radius, a, 1.0, fine=2), rel_tol=0.005
        )


def corners() -> None:
    """Two corner cracks in a wide plate, tension and a pair of pins; the coarse mesh is 1 % low."""
    for radius, shape, depth in itertools.product(
        (0.5, 1.0, 2.0), (0.25, 0.5, 0.999, 1.4, 2.0), (0.2, 0.5, 0.8)
    ):
        a, c = depth, depth / shape
        if c > 2.5 * radius:
            continue
        _, found = front_factors(Corner(a, c, 1.0, radius, 20 * radius + 3 * c), (6, 5, 5, 9))
        size, length, root = np.asarray(a), np.asarray(c), math.sqrt(math.pi * a)
        tension = hole_corner.wide_pair_of_cracks(size, length, 1.0, radius) / root
        tension = tension / found["tension"][[-1, 0]]
        pair = hole_corner.pair_of_pins(size, length, 1.0, radius, 2) / root
        pair = pair / found["pin-pair"][[-1, 0]]
        print(f"R {radius} a/c {shape} a/t {depth}: {tension} {pair}", flush=True)
        assert 0.965 < tension[0] < 1.14 and 0.90 < tension[1] < 1.15
        assert 0.94 < pair[0] < 1.14 and 0.92 < pair[1] < 1.65


def rings() -> None:
    """How a lug's corner crack is built, on rings with two of them."""
    for radius, rim, shape, depth in (
        (1.0, 2.0, 0.999, 0.3),
        (1.0, 2.0, 0.6, 0.4),
        (1.0, 2.0, 2.0, 0.6),
        (2.0, 4.0, 0.999, 0.5),
        (1.0, 3.0, 0.999, 0.5),
        (0.5, 1.5, 0.999, 0.5),
    ):
        a, c = np.asarray(depth), np.asarray(depth / shape)
        crack = Corner(depth, depth / shape, 1.0, radius, rim)
        _, solid = front_factors(crack, (6, 5, 6, 9), ("pin-pair",))
        area = np.pi / 4 * a * c
        narrow = holes.ring(radius / rim, float(area) / rim)
        narrow = narrow / float(hole_through.pair_wide(area, radius, 2))
        built = hole_corner.pair_of_pins(a, c, 1.0, radius, 2) / math.sqrt(math.pi * depth) * narrow
        ratio = built / solid["pin-pair"][[-1, 0]]
        print(f"ring R {radius} of {rim}, a/c {shape} a/t {depth}: {ratio}", flush=True)
        assert 0.97 < ratio[0] < 1.10 and 0.96 < ratio[1] < 1.24


if __name__ == "__main__":
    for proof in (plates, lugs, finer_lugs, corners, rings):
        proof()
