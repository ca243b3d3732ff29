"""A surface crack that grows in depth and length at once, against scipy's DOP853 at 1e-10.

An independent computation: reference_growth.py. Twelve seeded cases with two points of the front,
membrane and bending, one to three blocks, with and without threshold; bar 0.05 % of life.
"""

import numpy as np
import pytest

from assessment.growth import CycleBlock, Paris, Walker, grow
from assessment.kinds import KINDS

from .reference_growth import paris, reference_life, walker

KIND = KINDS["plate-surface"]
PEAK = {"membrane": np.asarray(120.0), "bending": np.asarray(60.0)}


def cases():
    random = np.random.default_rng(20260520)
    for number in range(12):
        body = {"thickness": random.uniform(0.012, 0.04), "width": random.uniform(0.3, 0.6)}
        a = random.uniform(0.04, 0.25) * body["thickness"]
        x0 = np.array([a, a / random.uniform(0.3, 1.0)])
        blocks = [
            (
                {"membrane": random.uniform(80, 160), "bending": random.uniform(0, 80)},
                random.uniform(0.0, 0.6),
                float(random.integers(1, 50)),
            )
            for _ in range(1 + number % 3)
        ]
        yield number, body, x0, blocks, random.uniform(2.2, 3.8)


def margin_of(body):
    """The run ends at K = 80 MPa√m at the peak, or at three quarters of the wall."""

    def margin(x):
        x = np.asarray(x)
        k = np.max(KIND.stress_intensity(x, PEAK, body), axis=0)
        return np.minimum(1.0 - k / 80.0, 0.75 - x[0] / body["thickness"])

    return margin


def both(body, x0, blocks, law, plain, threshold):
    """(our life and size, the reference's)."""
    ours = tuple(
        CycleBlock({n: s * (1 - r) for n, s in m.items()}, r, None, p) for m, r, p in blocks
    )
    theirs = [(m, {n: r * s for n, s in m.items()}, p) for m, r, p in blocks]
    grown = grow(KIND, x0, body, law, ours, margin_of(body))
    assert grown.end_words() == "failed"
    reference = reference_life(KIND, body, x0, theirs, plain, threshold, margin_of(body))
    return (float(grown.usage[0]), grown.x[:, 0]), reference


@pytest.mark.parametrize("case", list(cases()), ids=lambda case: f"case{case[0]}")
def test_life_and_final_shape(case):
    number, body, x0, blocks, m = case
    law, plain = Paris(1e-11, m), paris(1e-11, m)
    if number % 2:
        law, plain = Walker(1e-11, m, 0.6), walker(1e-11, m, 0.6)
    (usage, x), (reference, x_reference) = both(body, x0, blocks, law, plain, 0.0)
    assert usage == pytest.approx(reference, rel=5e-4)
    assert usage == pytest.approx(reference, rel=1e-6)  # what it truly reaches
    assert x == pytest.approx(x_reference, rel=1e-6)


@pytest.mark.parametrize("case", list(cases()), ids=lambda case: f"case{case[0]}")
def test_life_with_blocks_that_wake_up_at_a_threshold(case):
    """The threshold lies between the smallest and the largest range at the start."""
    _, body, x0, blocks, m = case
    ranges = [
        KIND.stress_intensity(x0, {n: np.asarray(s * (1 - r)) for n, s in mx.items()}, body)
        for mx, r, _ in blocks
    ]
    threshold = float(0.5 * np.min(ranges) + 0.5 * np.max(ranges))
    law, plain = Paris(1e-11, m, threshold), paris(1e-11, m)
    (usage, _), (reference, _) = both(body, x0, blocks, law, plain, threshold)
    assert usage == pytest.approx(reference, rel=5e-4)
    # The check can fail: a life that ignores the threshold does not pass it.
    ignoring = both(body, x0, blocks, Paris(1e-11, m), plain, 0.0)[0][0]
    assert ignoring != pytest.approx(reference, rel=5e-4)
