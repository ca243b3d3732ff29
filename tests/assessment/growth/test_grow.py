"""A run from a size to its end: accuracy against closed forms, every end, every edge."""

import numpy as np
import pytest

from assessment.growth import CycleBlock, Paris, TwoStage, Walker, grow
from assessment.kinds import KINDS
from tests.assessment.plain import constant_factor

KIND, BODY = constant_factor(1.12)
PLATE = KINDS["plate-surface"]
PLATE_BODY = {"thickness": 0.02, "width": 0.4}


def block(range_=60.0, ratio=0.0, per_usage=1.0):
    return CycleBlock({"membrane": range_}, ratio, None, per_usage)


def to(size):
    """A margin that is gone at a size."""
    return lambda x: size - x[0]


def forever(x):
    return np.ones(x.shape[1])


def run(law, x0, margin, blocks=None, kind=KIND, body=BODY, **options):
    blocks = (block(),) if blocks is None else blocks
    return grow(
        kind, np.atleast_1d(np.asarray(x0, dtype=float)), body, law, blocks, margin, **options
    )


def closed(c, m, stress, factor, a0, a1):
    """Paris integrated with a constant geometry factor."""
    s = c * (factor * stress * np.sqrt(np.pi)) ** m
    if m == 2.0:
        return np.log(a1 / a0) / s
    p = 1.0 - m / 2.0
    return (a1**p - a0**p) / (s * p)


@pytest.mark.parametrize("m", [1.0, 2.0, 2.25, 3.0, 4.0, 7.0])
@pytest.mark.parametrize("ends", [(0.005, 0.04), (0.001, 0.001001), (1e-5, 0.5)])
def test_life_is_the_closed_form_integral_of_paris_law(m, ends):
    found = run(Paris(2e-11, m), ends[0], to(ends[1]))
    assert found.end_words() == "failed"
    assert found.usage[0] == pytest.approx(closed(2e-11, m, 60.0, 1.12, *ends), rel=1e-6)
    assert found.x[0, 0] == pytest.approx(ends[1], rel=1e-9)


def test_the_same_check_fails_for_a_law_that_is_one_percent_off():
    found = run(Paris(2.02e-11, 3.0), 0.005, to(0.04))
    assert found.usage[0] != pytest.approx(closed(2e-11, 3.0, 60.0, 1.12, 0.005, 0.04), rel=5e-3)


def test_two_stages_are_two_closed_forms_one_after_the_other():
    law = TwoStage(1e-16, 8.0, 1e-11, 3.0)
    crossing = (law.crossing / (1.12 * 60.0)) ** 2 / np.pi
    a0, a1 = 0.3 * crossing, 20.0 * crossing
    expected = closed(1e-16, 8.0, 60.0, 1.12, a0, crossing) + closed(
        1e-11, 3.0, 60.0, 1.12, crossing, a1
    )
    assert run(law, a0, to(a1)).usage[0] == pytest.approx(expected, rel=1e-5)


def test_a_block_that_wakes_up_at_its_threshold_counts_from_there_on():
    """Two blocks; the small one is asleep until its range reaches the threshold, on the way."""
    law = Paris(1e-11, 3.0, threshold=6.0)
    small, large = block(20.0, per_usage=1000.0), block(60.0)
    wakes = (6.0 / (1.12 * 20.0)) ** 2 / np.pi
    a0, a1 = 0.4 * wakes, 3.0 * wakes
    asleep = closed(1e-11, 3.0, 60.0, 1.12, a0, wakes)
    share = 1.0 + 1000.0 * (20.0 / 60.0) ** 3
    awake = closed(1e-11, 3.0, 60.0, 1.12, wakes, a1) / share
    found = run(law, a0, to(a1), (small, large))
    assert found.usage[0] == pytest.approx(asleep + awake, rel=1e-6)
    assert any(abs(a / wakes - 1.0) < 1e-8 for a in found.path_x[0])


def test_many_thresholds_one_after_the_other():
    """Twenty bins of a spectrum wake one by one; the closed form goes from one to the next."""
    law = Paris(1e-11, 3.0, threshold=5.0)
    stresses = np.linspace(12.0, 60.0, 20)
    counts = 2.0 ** np.arange(20, 0, -1)
    bins = tuple(block(s, per_usage=n) for s, n in zip(stresses, counts, strict=True))
    wakes = (5.0 / (1.12 * stresses)) ** 2 / np.pi
    a0, a1 = 1.01 * wakes[-1], 1.3 * wakes[0]
    edges = sorted([a0, *wakes[(wakes > a0) & (wakes < a1)], a1])
    expected = 0.0
    for low, high in zip(edges, edges[1:], strict=False):
        on = wakes <= low * (1 + 1e-12)
        share = np.sum(counts[on] * stresses[on] ** 3)
        expected += closed(1e-11, 3.0, 1.0, 1.12, low, high) / share
    assert run(law, a0, to(a1), bins).usage[0] == pytest.approx(expected, rel=1e-6)


def test_errors_fall_with_the_tolerance():
    law, exact = Paris(2e-11, 7.0), closed(2e-11, 7.0, 60.0, 1.12, 0.001, 0.5)
    errors = [
        abs(run(law, 0.001, to(0.5), tolerance=t).usage[0] / exact - 1.0)
        for t in (1e-3, 1e-5, 1e-7)
    ]
    assert errors[0] < 1e-2
    assert errors[0] > 2 * errors[1] > 4 * errors[2]
    assert errors[2] < 1e-7


def test_below_the_threshold_nothing_grows():
    found = run(Paris(1e-11, 3.0, threshold=50.0), 0.001, forever)
    assert (found.end_words(), found.usage[0], found.x[0, 0]) == ("no growth", 0.0, 0.001)


def test_without_cycles_nothing_grows():
    assert run(Paris(1e-11, 3.0), 0.001, forever, ()).end_words() == "no growth"


def test_fully_compressive_cycles_grow_nothing():
    shut = (CycleBlock({"membrane": 80.0}, None, {"membrane": -10.0}, 1.0),)
    for law in (Paris(1e-11, 3.0), Walker(1e-11, 3.0, 0.5)):
        assert run(law, 0.001, forever, shut).end_words() == "no growth"


def test_a_start_that_has_failed_lives_no_longer():
    found = run(Paris(1e-11, 3.0), 0.04, to(0.04))
    assert (found.end_words(), found.usage[0]) == ("failed", 0.0)


def test_it_ends_at_the_far_wall():
    kind, body = constant_factor(1.12, thickness=0.02)
    found = run(Paris(1e-11, 3.0), 0.005, forever, kind=kind, body=body)
    assert found.end_words() == "break-through"
    assert found.x[0, 0] == pytest.approx(0.02, rel=1e-9)
    assert found.usage[0] == pytest.approx(closed(1e-11, 3.0, 60.0, 1.12, 0.005, 0.02), rel=1e-6)


def test_it_ends_where_the_table_ends():
    body = {"thickness": 0.05, "table": ((0.001, 1.12), (0.01, 1.12), (0.02, 1.12))}
    found = run(Paris(1e-11, 3.0), 0.005, forever, body=body)
    assert found.end_words() == "out of range"
    assert found.x[0, 0] == pytest.approx(0.02, rel=1e-6)
    assert found.usage[0] == pytest.approx(closed(1e-11, 3.0, 60.0, 1.12, 0.005, 0.02), rel=1e-5)


def test_a_start_outside_the_table_is_out_of_range_at_once():
    body = {"thickness": 0.05, "table": ((0.001, 1.12), (0.02, 1.12))}
    found = run(Paris(1e-11, 3.0), 0.03, forever, body=body)
    assert (found.end_words(), found.usage[0]) == ("out of range", 0.0)


def test_a_crack_whose_range_falls_dies_out_at_its_threshold():
    """A geometry factor that falls faster than √a rises: K peaks, then falls to the threshold."""
    body = {"thickness": 0.5, "table": ((0.001, 3.0), (0.01, 2.0), (0.1, 0.3), (0.4, 0.1))}
    law = Paris(1e-11, 3.0, threshold=12.0)
    found = run(law, 0.002, forever, body=body)
    assert found.end_words() == "no growth"
    assert 0.0 < found.usage[0] < np.inf
    k = KIND.stress_intensity(found.x[:, 0], {"membrane": np.asarray(60.0)}, body)
    assert k[0] == pytest.approx(12.0, rel=1e-6)


def test_one_direction_alone_grows():
    """The surface point of a long shallow crack is below a threshold that its depth exceeds."""
    loads = {"membrane": np.asarray(60.0), "bending": np.asarray(0.0)}
    x0 = np.array([0.002, 0.02])
    deep, surface = PLATE.stress_intensity(x0, loads, PLATE_BODY)
    law = Paris(1e-11, 3.0, threshold=0.5 * (deep + surface))
    x1 = np.array([0.003, 0.02])
    assert PLATE.stress_intensity(x1, loads, PLATE_BODY)[1] < law.threshold
    found = run(law, x0, to(0.003), kind=PLATE, body=PLATE_BODY)
    assert found.end_words() == "failed"
    assert found.x[:, 0] == pytest.approx([0.003, 0.02], rel=1e-9)
    assert found.x[1, 0] == 0.02


def test_the_path_runs_from_start_to_end_and_never_back():
    found = run(Paris(1e-11, 3.0), np.array([0.002, 0.006]), to(0.012), kind=PLATE, body=PLATE_BODY)
    assert found.path_usage[0] == 0.0
    assert found.path_usage[-1] == found.usage[0]
    assert found.path_x[:, 0] == pytest.approx([0.002, 0.006])
    assert found.path_x[:, -1] == pytest.approx(found.x[:, 0])
    assert np.all(np.diff(found.path_usage) > 0.0)
    assert np.all(np.diff(found.path_x, axis=1) >= 0.0)


@pytest.mark.parametrize("start", np.linspace(0.006, 0.0155, 12))
def test_a_narrow_band_of_failing_sizes_is_not_stepped_over(start):
    """K need not rise with size: a margin that goes and comes back within a step ends the run."""

    def margin(x):
        return np.where(x[0] < 0.0163, 0.016 - x[0], x[0] - 0.0167)

    found = run(Paris(1e-11, 3.0), start, margin)
    assert found.end_words() == "failed"
    assert found.x[0, 0] == pytest.approx(0.016, rel=1e-9)
    assert found.usage[0] == pytest.approx(closed(1e-11, 3.0, 60.0, 1.12, start, 0.016), rel=1e-6)


def test_every_end_in_one_run_side_by_side():
    """Neighbours that fail, break through, stop and never start leave each other alone."""
    kind, body = constant_factor(1.12, thickness=0.02)
    law = Paris(1e-11, 3.0, threshold=4.0)
    starts = np.array([[0.0005, 0.005, 0.0199, 0.02, 0.0150001]])
    margin = lambda x: np.where(x[0] < 0.016, 0.016 - x[0], x[0] - 0.0165)  # noqa: E731
    many = run(law, starts, margin, kind=kind, body=body)
    words = [many.end_words(i) for i in range(5)]
    assert words == ["no growth", "failed", "break-through", "break-through", "failed"]
    for i in range(5):
        one = run(law, starts[:, i], margin, kind=kind, body=body)
        assert many.usage[i] == pytest.approx(one.usage[0], rel=1e-9, abs=0.0)
        assert many.x[:, i] == pytest.approx(one.x[:, 0], rel=1e-9)
