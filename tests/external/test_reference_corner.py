"""Reference stress of a corner crack: its limits, and the balance of its section by quadrature."""

import numpy as np
import pytest

from assessment.relations import reference_plates, reference_stress

NIL, ONE = np.asarray(0.0), np.asarray(1.0)


def corner(
    membrane: float, bending: float, a: float, c: float, thickness: float, width: float
) -> float:
    return float(
        reference_plates.corner(
            np.asarray(membrane),
            np.asarray(bending),
            np.asarray(a),
            np.asarray(c),
            thickness,
            width,
        )
    )


@pytest.mark.parametrize("relative", [0.1, 0.5, 0.8])
def test_as_deep_as_the_wall_it_is_an_edge_crack_that_is_free_to_turn(relative: float) -> None:
    deep = corner(1.0, 0.0, 0.02, relative * 0.1, 0.02 * (1 + 1e-12), 0.1)
    edge = float(reference_stress.edge(ONE, NIL, np.asarray(relative)))
    if relative == 0.1:  # the local flaw governs in a wide plate
        assert deep >= edge
    else:
        assert deep == pytest.approx(edge, rel=1e-6)


@pytest.mark.parametrize("depth", [0.2, 0.5, 0.8])
@pytest.mark.parametrize("relative", [0.2, 0.5, 0.7])
def test_the_section_balances_the_force_in_the_middle_of_its_width(
    depth: float, relative: float
) -> None:
    """W = t = 1 by fine strips: of all lines between +p and −p, the one without moment about the
    middle of the width; independent of the closed form."""
    x = (np.arange(400_000) + 0.5) / 400_000
    wall = np.where(x < relative, 1.0 - depth, 1.0)
    moment = np.cumsum(wall * (x - 0.5))
    # Only the line beyond the crack pulls on its side.
    start = int(relative * len(x))
    line = start + int(np.argmin(np.abs(2.0 * moment[start:-1] - moment[-1])))
    area = np.cumsum(wall) / len(x)
    force = 2.0 * area[line] - area[-1]
    part = depth * relative
    form = 1.0 / (np.sqrt(1.0 - 2.0 * part * (1.0 - relative)) - part)
    assert 1.0 / force == pytest.approx(form, rel=1e-4)
    assert corner(1.0, 0.0, depth, relative, 1.0, 1.0) == pytest.approx(form, rel=1e-9)


def test_a_small_crack_leaves_the_whole_section() -> None:
    assert corner(1.0, 0.0, 1e-9, 1e-9, 0.02, 0.1) == pytest.approx(1.0)
    assert corner(0.0, 1.0, 1e-9, 1e-9, 0.02, 0.1) == pytest.approx(2.0 / 3.0)


def test_never_below_the_flaw_of_the_standard() -> None:
    """BS 7910:2013 annex P, from memory: a surface flaw in a plate of twice the width."""
    random = np.random.default_rng(20261201)
    for _ in range(200):
        membrane, bending = random.uniform(0, 100, 2)
        a, c = random.uniform(0.001, 0.019), random.uniform(0.002, 0.05)
        flaw = float(
            reference_stress.surface(
                np.asarray(membrane), np.asarray(bending), np.asarray(a), np.asarray(c), 0.02, 0.2
            )
        )
        assert corner(membrane, bending, a, c, 0.02, 0.1) >= flaw * (1 - 1e-12)
