"""Sampled growth against the tight one-by-one integrator."""

from collections.abc import Iterator
from typing import Any

import numpy as np
import pytest

from assessment.corners import Corner
from assessment.document import read_case
from assessment.estimate import Look
from assessment.forecast.paths import Samples, at_usage, front_of, run
from assessment.growth import grow
from assessment.lifetime import blocks_for, margin
from assessment.procedure import compute
from tests.assessment.examples import surface

ONE = np.ones(1)


def best(**changes: Any) -> tuple[Look, Corner, float | None]:
    with np.errstate(all="ignore"):
        found = compute(read_case(surface(**changes)))
    return found.best_look, found.best.corner, found.best_life.usage


def same(corner: Corner, count: int = 1) -> Samples:
    ones = np.ones(count)
    return Samples(np.repeat(corner.x[:, None], count, axis=1), 0.0 * ones, ones, ones)


CENTRE = {
    "crack": {
        "kind": "plate-through-centre", "found": True, "length_mm": 20,
        "sizing": {"method": "eye", "length_sd_mm": 0.5},
    },
    "body": {"width_mm": 200, "thickness_mm": 12},
    "loading__peak": {"membrane_mpa": 150},
}  # fmt: skip
CASES: list[dict[str, Any]] = [
    {},
    {"loading__cycles__0__membrane_range_mpa": 40},
    {"loading__residual": {"membrane_mpa": 60, "source": "measured (invented)"}},
    {"crack__depth_mm": 1.0, "crack__length_mm": 4.0},
    CENTRE,
]


@pytest.mark.parametrize("changes", CASES)
def test_life_as_the_tight_integrator_has_it(changes: dict[str, Any]) -> None:
    look, corner, life = best(**changes)
    assert life is not None
    assert run(look, corner, same(corner)).end[0] == pytest.approx(life, rel=5e-3)


def test_scattered_samples_one_by_one() -> None:
    look, corner, _ = best()
    rng = np.random.default_rng(8)
    n = 12
    start = corner.x[:, None] * np.exp(0.2 * rng.standard_normal((2, n)))
    ones = np.ones(n)
    samples = Samples(start, 0.0 * ones, ones, np.exp(0.2 * rng.standard_normal(n)))
    found = run(look, corner, samples)
    from dataclasses import replace

    for i in range(n):
        one = replace(look, toughness=look.toughness * float(samples.toughness[i]))
        tight = grow(
            corner.kind, start[:, i], corner.body, look.growth, blocks_for(look, corner),
            lambda x, one=one: margin(one, corner, x),
        )  # fmt: skip
        assert found.end[i] == pytest.approx(tight.usage[0], rel=5e-3)


def test_exponent_and_stress_are_the_law_s() -> None:
    """Paris: m raised by δ is the case with that m; stress by f is the case with all stress by
    f."""
    look, corner, _ = best(material__growth__threshold_mpa_sqrt_m=0)
    raised = run(look, corner, Samples(corner.x[:, None], 0.2 * ONE, ONE, ONE)).end[0]
    _, _, life = best(material__growth__m=3.2, material__growth__threshold_mpa_sqrt_m=0)
    assert raised == pytest.approx(life, rel=5e-3)
    stressed = run(look, corner, Samples(corner.x[:, None], 0.0 * ONE, 1.1 * ONE, ONE)).end[0]
    _, _, life = best(
        material__growth__threshold_mpa_sqrt_m=0, loading__peak__membrane_mpa=165,
        loading__peak__bending_mpa=22, loading__cycles__0__membrane_range_mpa=99,
    )  # fmt: skip
    assert stressed == pytest.approx(life, rel=5e-3)


def test_sizes_on_the_way() -> None:
    look, corner, life = best()
    assert life is not None
    found = run(look, corner, same(corner))
    tight = grow(
        corner.kind, corner.x, corner.body, look.growth, blocks_for(look, corner),
        lambda x: margin(look, corner, x), tolerance=1e-10,
    )  # fmt: skip
    for share in (0.2, 0.6, 0.9):
        x, slope = at_usage(found, np.array([share * life]))
        expected = [np.interp(share * life, tight.path_usage, row) for row in tight.path_x]
        assert x[:, 0] == pytest.approx(expected, rel=4e-3)
        ahead = at_usage(found, np.array([share * life + 50.0]))[0]
        assert slope[:, 0] == pytest.approx((ahead - x)[:, 0] / 50.0, rel=0.05)
    beyond, still = at_usage(found, np.array([2.0 * life]))
    assert beyond[:, 0] == pytest.approx(found.last[:, 0]) and not np.any(still)


def test_ends_that_are_data() -> None:
    look, corner, _ = best()
    start = np.stack([corner.x, 1.0e-4 * corner.x, np.array([0.021, 0.03])], axis=1)
    ones = np.ones(3)
    found = run(look, corner, Samples(start, 0.0 * ones, ones, ones))
    assert np.isfinite(found.end[0]) and found.end[0] > 0.0
    assert np.isinf(found.end[1])  # below the threshold: it never grows
    assert found.end[2] == 0.0  # deeper than the wall


def _sizes() -> Iterator[tuple[np.ndarray, np.ndarray]]:
    rng = np.random.default_rng(2)
    yield 3e-3 * (1.0 + 0.1 * rng.random(7)), 12e-3 * (1.0 + 0.1 * rng.random(7))


def test_fronts_of_many_sizes() -> None:
    _, corner, _ = best()
    for depth, length in _sizes():
        found = front_of(corner, depth, length)
        one_by_one = [
            corner.kind.front(d, w, corner.body) for d, w in zip(depth, length, strict=True)
        ]
        assert found == pytest.approx(np.array(one_by_one).T)
