"""Cylinder, bar and edge crack, and a spectrum of five bins, against scipy's DOP853 at 1e-10.

An independent computation: reference_growth.py, which shares nothing but the stress intensity.
"""

import numpy as np
import pytest

from assessment.growth import CycleBlock, Paris, Walker, grow
from assessment.kinds import KINDS

from .reference_growth import paris, reference_life, walker

STARTS = {
    "cylinder-axial-inside": ({"thickness": 0.02, "inner_radius": 0.1}, "pressure", 15.0),
    "bar-surface": ({"diameter": 0.06}, "bending", 120.0),
    "plate-through-edge": ({"width": 0.12, "thickness": 0.01, "ends": "free"}, "bending", 100.0),
}


def start_of(name, random):
    if name == "cylinder-axial-inside":
        a = random.uniform(0.002, 0.006)
        return np.array([a, a / random.uniform(0.35, 0.8)])
    return np.array([random.uniform(0.003, 0.012)])


def end_of(x0):
    """Twice the starting depth, or K unbounded before that: neither leaves a published range."""
    return lambda x: 2.0 * x0[0] - np.asarray(x)[0]


def compared(kind, body, x0, blocks, law, plain, threshold):
    ours = tuple(
        CycleBlock({n: s * (1 - r) for n, s in top.items()}, r, None, count)
        for top, r, count in blocks
    )
    theirs = [(top, {n: r * s for n, s in top.items()}, count) for top, r, count in blocks]
    grown = grow(kind, x0, body, law, ours, end_of(x0))
    assert grown.end_words() == "failed"
    usage, x = reference_life(kind, body, x0, theirs, plain, threshold, end_of(x0))
    return float(grown.usage[0]), grown.x[:, 0], usage, x


@pytest.mark.parametrize("name", STARTS)
@pytest.mark.parametrize("seed", range(4))
def test_life_of_each_front(name, seed):
    random = np.random.default_rng([20260521, seed])
    body, load, stress = STARTS[name]
    x0 = start_of(name, random)
    blocks = [
        ({load: stress * random.uniform(0.6, 1.0)}, random.uniform(0.0, 0.6), 10.0)
        for _ in range(2)
    ]
    m = random.uniform(2.2, 3.8)
    law, plain = Paris(1e-11, m), paris(1e-11, m)
    if seed % 2:
        law, plain = Walker(1e-11, m, 0.6), walker(1e-11, m, 0.6)
    usage, x, reference, x_reference = compared(KINDS[name], body, x0, blocks, law, plain, 0.0)
    assert usage == pytest.approx(reference, rel=1e-6)
    assert x == pytest.approx(x_reference, rel=1e-6)


@pytest.mark.parametrize("name", ["plate-surface", *STARTS])
def test_life_with_five_bins_that_wake_one_after_the_other(name):
    random = np.random.default_rng(20260522)
    body, load, stress = STARTS.get(name) or (
        {"thickness": 0.02, "width": 0.4},
        "membrane",
        140.0,
    )
    kind = KINDS[name]
    x0 = start_of("cylinder-axial-inside" if name == "plate-surface" else name, random)
    tops = stress * np.array([1.0, 0.9, 0.8, 0.7, 0.5])
    blocks = [({load: float(s)}, 0.1, 5.0 * 2.0**i) for i, s in enumerate(tops)]
    k = np.max(kind.stress_intensity(x0, {load: np.asarray(0.9 * stress)}, body))
    threshold = 0.85 * float(k)
    law, plain = Paris(1e-11, 3.1, threshold), paris(1e-11, 3.1)
    usage, x, reference, x_reference = compared(kind, body, x0, blocks, law, plain, threshold)
    assert usage == pytest.approx(reference, rel=1e-5)
    assert x == pytest.approx(x_reference, rel=1e-5)
    # Those that the threshold keeps asleep do matter: without it the life is another.
    ignoring = compared(kind, body, x0, blocks, Paris(1e-11, 3.1), plain, 0.0)[0]
    assert ignoring < 0.99 * usage


def test_a_cycle_block_without_stress_ratio_and_maxima_is_misuse():
    for ratio, maxima in ((None, None), (0.1, {"membrane": 10.0})):
        with pytest.raises(ValueError, match="either"):
            CycleBlock({"membrane": 10.0}, ratio, maxima, 1.0)
