"""Made-up cracks whose true life is known, and how often the forecast's bands hold it.

Simulation-based calibration: S. Talts, M. Betancourt, D. Simpson, A. Vehtari & A. Gelman,
Validating Bayesian inference algorithms with simulation-based calibration, arXiv:1804.06788 (2018).
A rank is the forecast's probability of a life shorter than the true one; over many cracks they are
uniform where the forecast is as sure as it says.
"""

from dataclasses import dataclass, replace
from typing import Any

import numpy as np
from numpy.typing import NDArray
from scipy.stats import binom, chisquare

from assessment.corners import Corner, sizes_to_corner
from assessment.document import read_case
from assessment.estimate import Look
from assessment.forecast import case_forecast, priors
from assessment.forecast.paths import Paths, Samples, at_usage, run
from assessment.growth import TwoStage
from tests.assessment.examples import changed, surface

from .test_paths import CENTRE, best

Floats = NDArray[np.float64]
SCATTER = {
    "log10_c_sd": 0.2, "m_sd": 0.1, "c_m_correlation": -0.8, "toughness_cov": 0.1,
    "stress_cov": 0.05,
}  # fmt: skip
TIMES = np.array([0.0, 300.0, 600.0, 900.0, 1200.0])
SIZING_MM = 0.8
COVER = (0.5, 0.8, 0.9)
_FINE = 400


@dataclass(frozen=True)
class World:
    """How the true cracks differ from what the forecast is told.

    told : stated sizing error over the true one; bias : of the sizing, over its sd, not stated
    wander_sd : of all cracks, or None for the forecast's own prior
    exponent_off : growth by two lines that cross at 15 MPa√m, one flatter, one steeper by this
    """

    told: float = 1.0
    bias: float = 0.0
    wander_sd: float | None = None
    exponent_off: float = 0.0


MODEL = World()
# A law that bends by twice the sd of m that the basis states.
OTHER = World(bias=0.3, wander_sd=0.2, exponent_off=0.2)
# One that bends by five times that: the basis is wrong, and says nothing of it.
WRONG_BASIS = World(exponent_off=0.5)


def document(**changes: Any) -> dict[str, Any]:
    """A crack in the middle of a plate that is sized by its length alone."""
    case = {
        **CENTRE, "uncertainty": SCATTER, "material__growth__threshold_mpa_sqrt_m": 0,
        "loading__cycles__0__per_usage": 200, "usage__at": float(TIMES[-1]),
        "usage__readings": [], "as_of": {"on": "2026-05-04", "at": float(TIMES[-1])},
    }  # fmt: skip
    return changed(surface(**case), **changes)


def ranks(cracks: int, seed: int, world: World) -> Floats:
    """Ranks of the remaining life and of today's size, (2, cracks), of cracks that lived till
    then."""
    rng = np.random.default_rng(seed)
    look, corner, _ = best(**_changes())
    found: list[tuple[float, float]] = []
    while len(found) < cracks:
        rank = _one(rng, look, corner, world)
        if rank is not None:
            found.append(rank)
    return np.array(found).T


def _changes() -> dict[str, Any]:
    return {
        **CENTRE, "material__growth__threshold_mpa_sqrt_m": 0, "loading__cycles__0__per_usage": 200
    }  # fmt: skip


def _one(
    rng: np.random.Generator, look: Look, corner: Corner, world: World
) -> tuple[float, float] | None:
    start_mm = rng.uniform(15.0, 30.0)
    paths, speed = _truth(rng, look, corner, start_mm, world)
    times, clock = _clock(rng, world)
    passed = speed * clock
    if np.interp(TIMES[-1], times, passed) >= paths.end[0]:
        return None
    life = float(np.interp(paths.end[0], passed, times, right=np.inf)) - TIMES[-1]
    at_looks = np.interp(TIMES, times, passed)
    true = np.array([2e3 * at_usage(paths, np.array([u]))[0][0, 0] for u in at_looks])
    read = true + SIZING_MM * (world.bias + rng.standard_normal(len(TIMES)))
    sizing = {"method": "eye", "length_sd_mm": world.told * SIZING_MM}
    looks = [
        {"on": f"2025-0{n + 1}-01", "at": float(t), "length_mm": float(y), "sizing": sizing}
        for n, (t, y) in enumerate(zip(TIMES[:-1], read[:-1], strict=True))
    ]
    case = read_case(
        document(history=looks, crack__length_mm=float(read[-1]), crack__sizing=sizing)
    )
    here = sizes_to_corner(corner.kind, corner.body, None, 1e-3 * float(read[-1]))
    with np.errstate(all="ignore"):
        # A fresh seed, so that no two forecasts share their sampling error.
        case = replace(case, seed=int(rng.integers(2**31)))
        ahead = case_forecast.forecast(case, look, here, None)
    by_life = float(ahead.probability_by(np.array([life]))[0])
    now, _ = ahead.sizes_after(0.0, 1)
    return by_life, float(ahead.weights @ (2e3 * now[0] <= true[-1]))


def _truth(
    rng: np.random.Generator, look: Look, corner: Corner, start_mm: float, world: World
) -> tuple[Paths, float]:
    """The true crack's nominal way and the speed of its clock."""
    z = rng.standard_normal(4)
    rho = SCATTER["c_m_correlation"]
    shift = SCATTER["m_sd"] * z[1]
    log_c = SCATTER["log10_c_sd"] * (rho * z[1] + np.sqrt(1.0 - rho**2) * z[0])
    stress_sd, tough_sd = (
        np.sqrt(np.log1p(SCATTER[k] ** 2)) for k in ("stress_cov", "toughness_cov")
    )
    one = np.ones(1)
    samples = Samples(
        corner.x[:, None] * start_mm / (2e3 * corner.x[0]),
        shift * one,
        np.exp(stress_sd * z[2]) * one,
        np.exp(tough_sd * z[3] - 0.5 * tough_sd**2) * one,
    )
    if world.exponent_off:
        c, m = look.growth.c, look.growth.m  # type: ignore[attr-defined]
        off = world.exponent_off
        look = replace(look, growth=TwoStage(c * 15**off, m - off, c * 15**-off, m + off))
    return run(look, corner, samples), float(10.0**log_c)


def _clock(rng: np.random.Generator, world: World) -> tuple[Floats, Floats]:
    """Usage and the clock that a wandering rate makes of it, by small steps."""
    sd = world.wander_sd
    if sd is None:
        sd = priors.WANDER.median * np.exp(priors.WANDER.log_sd * rng.standard_normal())
    log_span = priors.WANDER_SPAN.log_sd * rng.standard_normal()
    span = TIMES[-1] * priors.WANDER_SPAN.median * np.exp(log_span)
    times = np.r_[0.0, np.geomspace(5.0, 200.0 * TIMES[-1], _FINE)]
    w, clock = sd * rng.standard_normal(), [0.0]
    for h in np.diff(times):
        keep = np.exp(-h / span)
        new = keep * w + sd * np.sqrt(1.0 - keep**2) * rng.standard_normal()
        clock.append(clock[-1] + h * 0.5 * (np.exp(w - sd**2 / 2) + np.exp(new - sd**2 / 2)))
        w = new
    return times, np.array(clock)


def coverage(found: Floats) -> list[float]:
    """Share of ranks (cracks,) inside the central bands of COVER."""
    return [float(np.mean(np.abs(found - 0.5) <= c / 2.0)) for c in COVER]


def faults(found: Floats, level: float = 1e-3) -> list[str]:
    """What shows that the forecast is not as sure as it says; empty where nothing does."""
    return [
        f"{name}: {fault}"
        for name, row in zip(("life", "size"), found, strict=True)
        for fault in _faults(row, level)
    ]


def _faults(found: Floats, level: float) -> list[str]:
    bins = np.histogram(found, bins=10, range=(0.0, 1.0))[0]
    said = []
    if chisquare(bins).pvalue < level:
        said.append(f"the ranks are not even: {bins.tolist()}")
    for band, share in zip(COVER, coverage(found), strict=True):
        low, high = binom.ppf([level / 2.0, 1.0 - level / 2.0], len(found), band) / len(found)
        if not low <= share <= high:
            said.append(f"the {band:.0%} band holds {share:.0%}")
    return said
