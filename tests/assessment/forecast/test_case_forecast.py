"""The forecast of a case: closed forms, conjugate posteriors, and that history changes the
answer."""

from typing import Any

import numpy as np
import pytest
from scipy.stats import norm

from assessment.document import read_case
from assessment.forecast import priors
from assessment.forecast.case_forecast import Forecast, Outlook, outlook
from assessment.forecast.paths import at_usage, run
from assessment.procedure import compute
from tests.assessment.examples import DROP, surface

from .test_paths import CENTRE, best, same

NIL = {
    "log10_c_sd": 0.0, "m_sd": 0.0, "c_m_correlation": 0.0, "toughness_cov": 0.0, "stress_cov": 0.0,
}  # fmt: skip
SCATTER = {
    "log10_c_sd": 0.15, "m_sd": 0.1, "c_m_correlation": -0.9, "toughness_cov": 0.15,
    "stress_cov": 0.05,
}  # fmt: skip
CUT = "none: measured on the cut piece (invented)"


def ahead(**changes: Any) -> tuple[Outlook, float]:
    case = read_case(surface(**changes))
    with np.errstate(all="ignore"):
        found = compute(read_case(surface(**{**changes, "uncertainty": NIL, "history": []})))
        life = found.best_life.usage
        assert life is not None
        return outlook(case, found.best_look, found.best.corner, life), life


def forecast(**changes: Any) -> tuple[Forecast, float]:
    found, life = ahead(**changes)
    assert found.forecast is not None, found.why_not
    return found.forecast, life


@pytest.fixture
def steady(monkeypatch: pytest.MonkeyPatch) -> None:
    """Rates that do not wander."""
    monkeypatch.setattr(priors, "WANDER", priors.Lognormal(1e-9, 0.0))


def test_log_normal_life_where_only_c_scatters(steady: None) -> None:
    """life = life₀·10^−δ with δ ~ N(0, s): log-normal in closed form."""
    found, life = forecast(uncertainty={**NIL, "log10_c_sd": 0.2}, crack__sizing=CUT)
    levels = np.array([0.01, 0.05, 0.5, 0.95])
    expected = life * 10.0 ** (0.2 * norm.ppf(levels))
    assert found.quantiles(levels) == pytest.approx(expected, rel=0.01)
    assert found.probability_by(expected) == pytest.approx(levels, abs=1e-3)
    assert found.effective == pytest.approx(8192)
    assert found.smallest_probability == pytest.approx(10 / 8192)


def test_correlated_c_and_m_scatter_least_where_they_pivot(steady: None) -> None:
    """sd of ln rate at K: √(s_c² + 2 ρ s_c s_m log10 K + (s_m log10 K)²)·ln 10, K near the
    start."""
    base = {**NIL, "log10_c_sd": 0.2, "m_sd": 0.15}
    widths = []
    for correlation in (-0.95, 0.0, 0.95):
        found, _ = forecast(uncertainty={**base, "c_m_correlation": correlation}, crack__sizing=CUT)
        low, high = found.quantiles(np.array([0.16, 0.84]))
        widths.append(np.log10(high / low) / 2.0)
    # ΔK at the start is about 8 MPa√m (working of the case), rising from there.
    log_k = np.log10(9.0)
    expected = [
        np.sqrt(0.04 + 2 * r * 0.2 * 0.15 * log_k + (0.15 * log_k) ** 2) for r in (-0.95, 0, 0.95)
    ]
    assert widths == pytest.approx(expected, rel=0.15)
    assert widths[0] < widths[1] < widths[2]


def centre(**changes: Any) -> dict[str, Any]:
    few = {"loading__cycles__0__per_usage": 2}
    return {**CENTRE, **few, "material__growth__threshold_mpa_sqrt_m": 0, **changes}


def test_the_conjugate_posterior(steady: None) -> None:
    """Little growth is a straight line: y = a₀ + r·t with a₀ and r normal, and normal errors.

    The posterior of r is that of linear regression with a normal prior, in closed form.
    """
    sd, s_c = 0.004, 0.02
    times = np.array([0.0, 400.0, 800.0, 1200.0])
    look, corner, _ = best(**centre(crack__length_mm=20.0))
    grown_by = 2e3 * float(run(look, corner, same(corner)).slope[0, 0, 0]) * 1200.0
    # Faster than the mean law by a twentieth, and not quite on a line.
    sizes = 20.0 + 1.05 * grown_by * np.array([0.0, 0.32, 0.69, 1.0])
    assert grown_by < 0.6
    looks = [
        {"on": f"2025-0{n + 1}-01", "at": t, "length_mm": y,
         "sizing": {"method": "eye", "length_sd_mm": sd}}
        for n, (t, y) in enumerate(zip(times[:-1], sizes[:-1], strict=True))
    ]  # fmt: skip
    found, _ = forecast(
        **centre(
            uncertainty={**NIL, "log10_c_sd": s_c}, history=looks, crack__length_mm=sizes[-1],
            crack__sizing={"method": "eye", "length_sd_mm": sd}, usage__at=times[-1],
            usage__readings=[], as_of=DROP,
        )
    )  # fmt: skip
    # The rate of the mean law, by the same paths with nothing scattered.
    slope = float(np.median(found.paths.slope[0, 0])) * 2e3
    rate_sd = slope * np.log(10.0) * s_c
    design = np.c_[np.ones(4), times]
    precision = design.T @ design / sd**2 + np.diag([0.0, rate_sd**-2])
    mean = np.linalg.solve(
        precision, design.T @ sizes / sd**2 + np.array([0.0, slope / rate_sd**2])
    )
    expected, spread = mean[1] / slope, np.sqrt(np.linalg.inv(precision)[1, 1]) / slope
    speed = found.drawn.speed
    got = float(found.weights @ speed)
    assert got == pytest.approx(expected, abs=0.1 * spread)
    assert np.sqrt(found.weights @ (speed - got) ** 2) == pytest.approx(spread, rel=0.06)
    # The check can fail: the prior alone is far from it.
    assert abs(expected - 1.0) > 0.3 * spread


def looks(sizes: list[tuple[float, float, float]], sd: float = 0.1) -> list[dict[str, Any]]:
    return [
        {"on": f"2025-{n + 1:02d}-04", "at": at, "depth_mm": depth, "length_mm": length,
         "sizing": {"method": "ultrasonic", "depth_sd_mm": sd, "length_sd_mm": 2 * sd}}
        for n, (at, depth, length) in enumerate(sizes)
    ]  # fmt: skip


FAST = {"uncertainty": SCATTER, "loading__cycles__0__per_usage": 1000}
TIMES = (20.0, 430.0, 840.0, 1250.0)


def grown(speed: float = 1.0, depth: float = 2.0, length: float = 9.0) -> list[tuple[float, ...]]:
    """(at, depth, length) at TIMES of a crack that grows ``speed`` times the mean law."""
    look, corner, _ = best(**FAST, crack__depth_mm=depth, crack__length_mm=length)
    found = run(look, corner, same(corner))
    sizes = [at_usage(found, np.array([speed * (at - TIMES[0])]))[0][:, 0] for at in TIMES]
    return [(at, 1e3 * x[0], 2e3 * x[1]) for at, x in zip(TIMES, sizes, strict=True)]


def crack(sizes: list[tuple[float, ...]], sd: float = 0.1) -> dict[str, Any]:
    """The case of those sizes, the last of them the last look."""
    *earlier, (_, depth, length) = sizes
    return {
        **FAST, "history": looks(earlier, sd), "crack__depth_mm": depth,
        "crack__length_mm": length,
        "crack__sizing": {"method": "ultrasonic", "depth_sd_mm": sd, "length_sd_mm": 2 * sd},
    }  # fmt: skip


def test_changing_the_history_changes_the_answer() -> None:
    """The same last size, come to from a smaller one: it grows faster, and lives less long."""
    sizes = grown()
    medians = []
    for share in (1.0, 0.85):
        told = [(at, share * d, share * w) for at, d, w in sizes[:-1]] + sizes[-1:]
        found, _ = forecast(**crack(told))
        medians.append(float(found.quantiles(np.array([0.5]))[0]))
    assert medians[1] < 0.9 * medians[0]


def test_history_finds_the_speed_and_narrows() -> None:
    found, _ = forecast(**crack(grown(speed=1.3), sd=0.03))
    speed = found.weights @ found.drawn.speed
    assert found.effective > 1000
    wide, _ = forecast(**{**crack(grown(speed=1.3), sd=0.03), "history": []})
    assert wide.weights @ wide.drawn.speed < speed
    ends = np.array([0.05, 0.95])
    assert np.diff(np.log(found.quantiles(ends))) < 0.7 * np.diff(np.log(wide.quantiles(ends)))


def test_samples_are_drawn_anew_where_the_sizes_are_sharp() -> None:
    found, _ = forecast(**crack(grown(speed=1.2), sd=0.01))
    assert found.refined and found.effective > 1000


def test_an_outlier_is_flagged_and_kept() -> None:
    sizes = grown()
    at, depth, length = sizes[1]
    sizes[1] = (at, depth + 0.8, length)
    found, _ = forecast(**crack(sizes))
    far = [(t.reading.at, t.reading.which) for t in found.told if abs(t.deviations) > 3.0]
    assert (at, "depth") in far and len(found.told) == 6


def test_growth_that_the_basis_explains_and_not() -> None:
    found, _ = ahead(**crack(grown()))
    assert found.surprise is not None and 0.2 < found.surprise.probability <= 1.0
    # Upper 95 % of the growth measured over that of the mean law: just above its own.
    assert found.surprise.factor is not None and 1.0 < found.surprise.factor < 1.5
    slow, _ = ahead(**crack(grown(speed=2.5, depth=1.0, length=4.5), sd=0.03))
    assert slow.surprise is not None and slow.surprise.probability < 0.02
    assert slow.surprise.factor is not None and 2.5 < slow.surprise.factor < 3.0


@pytest.mark.parametrize(
    ("changes", "why"),
    [
        ({"uncertainty": {**SCATTER, "m_sd": DROP}}, "uncertainty.m_sd is missing"),
        ({"crack__sizing": DROP}, "crack.sizing is missing"),
        ({"crack__depth_basis": "at least"}, "lower bound"),
    ],
)
def test_what_is_missing_is_named(changes: dict[str, Any], why: str) -> None:
    changes = {"uncertainty": SCATTER, **changes}
    uncertainty = {k: v for k, v in changes["uncertainty"].items() if v is not DROP}
    found, _ = ahead(**{**changes, "uncertainty": uncertainty})
    assert found.forecast is None and found.why_not is not None and why in found.why_not


def test_a_history_that_contradicts_the_basis_gives_no_number() -> None:
    # Depth grows and length does not, to a hundredth of a millimetre.
    sizes = [(at, depth, 9.0) for at, depth, _ in grown()]
    found, _ = ahead(**crack(sizes, sd=0.01))
    assert found.forecast is None and "contradicts the basis" in str(found.why_not)


def test_what_is_not_weighed_is_named() -> None:
    told = crack(grown()[:2] + grown()[3:])
    del told["history"][1]["sizing"]
    found, _ = forecast(**told)
    assert found.looks.left_out == (
        "The size of 2025-02-04 is not weighed: the sizing error of its method is missing.",
    )
    assert len(found.told) == 2


def test_same_case_same_answer_and_another_seed_nearly_so() -> None:
    levels = np.array([0.05, 0.5, 0.95])
    first, again, other = (
        forecast(**crack(grown()), seed=seed)[0].quantiles(levels) for seed in (0, 0, 41)
    )
    assert np.array_equal(first, again)
    assert not np.array_equal(first, other) and first == pytest.approx(other, rel=0.02)
