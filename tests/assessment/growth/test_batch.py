"""Many samples at once: exact, each on its own, and the same as one case alone."""

import numpy as np
import pytest

from assessment.growth import CycleBlock, Paris, batch, grow, grow_batch
from assessment.growth.integrate import ENDS
from assessment.kinds import KINDS
from tests.assessment.growth.test_grow import closed
from tests.assessment.growth.tight import CASES, LAWS, worst
from tests.assessment.plain import constant_factor

KIND, BODY = constant_factor(1.12)
PLATE = KINDS["plate-surface"]
PLATE_BODY = {"thickness": 0.02, "width": 0.4}
BLOCKS = (CycleBlock({"membrane": 60.0}, 0.0, None, 1.0),)
FAILED, STOPPED = ENDS.index("failed"), ENDS.index("no growth")


def to(size):
    return lambda x, rows: size - x[0]


def alone(law, x0, blocks=BLOCKS, end=0.04, **options):
    x = np.atleast_2d(x0)
    return grow_batch(KIND, x, BODY, law, blocks, to(end), **options)


@pytest.mark.parametrize("m", [2.0, 3.0, 4.0])
def test_life_is_the_closed_form_integral_of_paris_law(m):
    a0 = np.array([0.001, 0.005, 0.0399])
    found = alone(Paris(2e-11, m), a0)
    expected = [closed(2e-11, m, 60.0, 1.12, a, 0.04) for a in a0]
    assert np.all(found.end == FAILED)
    assert found.usage == pytest.approx(expected, rel=5e-4)
    assert found.x_end[0] == pytest.approx(0.04, rel=1.1e-3)  # the bracket left around the end


def plate_samples(count, seed=3):
    rng = np.random.default_rng(seed)
    x0 = np.stack([rng.uniform(0.001, 0.008, count), rng.uniform(0.002, 0.02, count)])
    each = {"log10_c": rng.normal(-11, 0.2, count), "m": rng.normal(3, 0.2, count)}
    return x0, each, rng.uniform(40, 120, count)


def plate_run(x0, each, toughness, **options):
    def margin(x, rows):
        k = PLATE.stress_intensity(x, {"membrane": 150.0}, PLATE_BODY)
        return toughness[rows] - np.max(k, axis=0)

    blocks = (
        CycleBlock({"membrane": 100.0}, 0.1, None, 1.0),
        CycleBlock({"membrane": 30.0}, 0.1, None, 500.0),
    )
    law = Paris(1e-11, 3.0, threshold=2.5)
    return grow_batch(PLATE, x0, PLATE_BODY, law, blocks, margin, each=each, **options)


def test_neighbours_and_chunks_do_not_touch_an_answer():
    x0, each, toughness = plate_samples(60)
    whole = plate_run(x0, each, toughness, at_usage=(100.0, 2000.0))
    turned = np.arange(60)[::-1]
    other = plate_run(
        x0[:, turned],
        {name: values[turned] for name, values in each.items()},
        toughness[turned],
        chunk=7,
        at_usage=(100.0, 2000.0),
    )
    assert other.usage[turned] == pytest.approx(whole.usage, rel=1e-12)
    assert np.array_equal(other.end[turned], whole.end)
    np.testing.assert_allclose(other.x_at[..., turned], whole.x_at, rtol=1e-12)


def test_one_alone_is_itself_in_a_batch():
    x0, each, toughness = plate_samples(40)
    whole = plate_run(x0, each, toughness)
    for i in (0, 17, 39):
        one = plate_run(
            x0[:, [i]], {name: values[[i]] for name, values in each.items()}, toughness[[i]]
        )
        assert one.usage[0] == pytest.approx(whole.usage[i], rel=1e-9)
        assert one.x_end[:, 0] == pytest.approx(whole.x_end[:, i], rel=1e-9)


def test_a_finer_step_is_of_order_four(monkeypatch):
    monkeypatch.setattr(batch, "COARSEST", 1e-13)
    law, a0 = Paris(2e-11, 3.4), np.array([0.001])
    exact = closed(2e-11, 3.4, 60.0, 1.12, 0.001, 0.04)
    # 0.04/0.001 in a whole number of steps, so that no step is cut at the end.
    span = float(np.log(40.0))
    errors = [
        abs(alone(law, a0, end=0.04 * (1 - 1e-12), step=span / n).usage[0] / exact - 1)
        for n in (16, 32, 64)
    ]
    orders = np.log2(np.divide(errors[:-1], errors[1:]))
    assert np.all((orders > 3.7) & (orders < 4.4)), orders


def test_with_only_c_uncertain_life_is_exactly_as_lognormal_as_c():
    """Life is in inverse proportion to C, whatever the crack: log life = const − log C."""
    log10_c = np.random.default_rng(5).normal(-11, 0.3, 500)
    found = alone(Paris(1e-11, 3.0), np.full(500, 0.004), each={"log10_c": log10_c})
    shift = np.log10(found.usage) + log10_c
    assert np.ptp(shift) < 1e-9
    assert np.std(np.log10(found.usage)) == pytest.approx(np.std(log10_c), rel=1e-9)


def test_what_nothing_grows_stays_as_it_is():
    found = alone(Paris(1e-11, 3.0, threshold=50.0), np.array([0.001, 0.002]), at_usage=(0.0, 5.0))
    assert np.all(found.end == STOPPED)
    assert np.all(found.usage == 0.0)
    assert np.array_equal(found.x_end, [[0.001, 0.002]])


def test_sizes_at_past_usages_are_those_of_a_closed_form_and_none_after_the_end():
    """m = 2: a = a₀ exp(S U)."""
    s = 2e-11 * (1.12 * 60.0) ** 2 * np.pi
    life = np.log(0.04 / 0.005) / s
    usages = np.array([0.0, 0.25, 0.5, 0.99, 1.01]) * life
    found = alone(Paris(2e-11, 2.0), np.array([0.005]), at_usage=usages)
    assert found.x_at[0, :4, 0] == pytest.approx(0.005 * np.exp(s * usages[:4]), rel=5e-4)
    assert np.isnan(found.x_at[0, 4, 0])


def test_a_factor_on_stress_is_the_same_as_that_stress():
    law, a0 = Paris(2e-11, 3.0, threshold=4.0), np.full(3, 0.003)
    factors = np.array([0.8, 1.0, 1.3])
    found = alone(law, a0, stress_factor=factors)
    for factor, usage in zip(factors, found.usage, strict=True):
        scaled = (CycleBlock({"membrane": 60.0 * factor}, 0.0, None, 1.0),)
        assert alone(law, a0[:1], scaled).usage[0] == pytest.approx(usage, rel=1e-12)


def test_agrees_with_the_adaptive_run_at_a_threshold_that_wakes_on_the_way():
    x0, each, toughness = plate_samples(4)
    found = plate_run(x0, each, toughness)
    blocks = (
        CycleBlock({"membrane": 100.0}, 0.1, None, 1.0),
        CycleBlock({"membrane": 30.0}, 0.1, None, 500.0),
    )
    for i in range(4):

        def margin(x, limit=toughness[i]):
            return limit - np.max(
                PLATE.stress_intensity(x, {"membrane": 150.0}, PLATE_BODY), axis=0
            )

        law = Paris(10.0 ** each["log10_c"][i], each["m"][i], threshold=2.5)
        tight = grow(PLATE, x0[:, i], PLATE_BODY, law, blocks, margin)
        assert found.usage[i] == pytest.approx(tight.usage[0], rel=5e-3)
        assert found.end[i] == tight.end[0]


@pytest.mark.parametrize(
    ("options", "words"),
    [
        ({"each": {"q": np.ones(1)}}, "no constant 'q'"),
        ({"each": {"c": np.ones(1), "log10_c": np.ones(1)}}, "given twice"),
        ({"each": {"m": np.ones(2)}}, "one value a sample"),
        ({"each": {"m": np.array([np.nan])}}, "not finite"),
        ({"stress_factor": 0.0}, "above nil"),
        ({"at_usage": (-1.0,)}, "not negative"),
        ({"blocks": ()}, "at least one block"),
    ],
)
def test_what_cannot_be_is_said(options, words):
    with pytest.raises(ValueError, match=words):
        alone(Paris(1e-11, 3.0), np.array([0.001]), **options)


@pytest.mark.parametrize("law", LAWS)
def test_life_is_that_of_a_tight_general_purpose_solver(law):
    error, others = worst("plate-surface", law, 2)
    assert error < 0.005
    assert others == 0


@pytest.mark.parametrize("kind", sorted(set(CASES) - {"plate-surface"}))
def test_so_it_is_for_every_other_kind_part_through(kind):
    error, others = worst(kind, "paris", 1)
    assert error < 0.005
    assert others == 0
