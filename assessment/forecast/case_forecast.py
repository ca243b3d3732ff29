"""The forecast of one crack with its basis: what its own sizes and the basis say of its remaining
life.

Without a history the samples are the basis's own scatter. With one, each sample starts at the
oldest size that counts and is weighed by how well it meets all later ones, its rate wandering; a
sample that would have failed before the last look has no weight. Where too few samples keep weight,
new ones are drawn where the weight lies.
"""

from dataclasses import dataclass

import numpy as np
from scipy.special import ndtr
from scipy.stats import chi2

from assessment.corners import Corner
from assessment.document import Case
from assessment.estimate import Look
from assessment.validity import Floats

from . import priors
from .looks import Looks, Reading, looks_of
from .paths import Paths, at_usage, run
from .points import effective_size, normals, quantiles, weights_of
from .scatter import DIMENSIONS, Drawn, Scatter, draw, scatter_of, span_of
from .surprise import Surprise
from .wander import State, advance, clock_covariance, drawn, measured, start, time_through

SAMPLES = 8192
ENOUGH = 1000.0
"""Effective samples below which new ones are drawn."""
LEAST = 100.0
"""Effective samples below which there is no forecast."""
_STAGE, _STAGES = 2048, 10
_STEPS = 16
_UPPER = 1.6448536269514722
"""Standard normal quantile of 95 %."""
_FINE = 200
_FREEDOM = 7
_WIDER = 1.15
# A probability is resolved where its relative standard error is at most about 30 %: (1 − p)/(n p) ≤
# 0.09, so n·p of 10 or more.
_COUNTS = 10.0
OUTLIER = 3.0


@dataclass(frozen=True)
class Told:
    """How one reading lies against what the rest and the basis say, in standard deviations."""

    reading: Reading
    deviations: float


@dataclass(frozen=True)
class Forecast:
    """Weighted samples of remaining life.

    remaining : usage from the last look to the end, (samples,); infinite where it does not grow
    effective : effective sample size; refined : True where samples were drawn anew
    probability_resolved : the smallest probability that the sampling resolves
    """

    looks: Looks
    scatter: Scatter
    drawn: Drawn
    paths: Paths
    elapsed: float
    lead: Floats
    wander: Floats
    weights: Floats
    remaining: Floats
    effective: float
    refined: bool
    told: tuple[Told, ...]

    @property
    def smallest_probability(self) -> float:
        return _COUNTS / self.effective

    def quantiles(self, levels: Floats) -> Floats:
        """Remaining usage at these probabilities of having failed."""
        return quantiles(self.remaining, levels, self.weights)

    def probability_by(self, usage: Floats) -> Floats:
        """Probability of having failed within ``usage`` from the last look, (usages,)."""
        failed = self.remaining <= np.asarray(usage)[:, None]
        return np.asarray(np.sum(np.where(failed, self.weights, 0.0), axis=1))

    def sizes_after(self, usage: float, seed: int) -> tuple[Floats, Floats]:
        """Front (front variables, samples) after a further usage, and True where it has not ended.

        The wander on the way is drawn anew: right for each usage by itself.
        """
        from .wander import ahead

        part = np.full(len(self.weights), usage / 4.0)
        steps = normals(len(self.weights), 4, seed)
        sd, span = self.drawn.wander_sd, self.drawn.wander_span
        lead = ahead(self.lead, self.wander, part, sd, span, steps)[0][-1]
        clock = self.drawn.speed * np.maximum(self.elapsed + usage + lead, 0.0)
        return at_usage(self.paths, clock)[0], clock < self.paths.end


@dataclass(frozen=True)
class Outlook:
    """What could be said ahead: the forecast or why there is none, and growth against the basis."""

    forecast: Forecast | None
    why_not: str | None
    surprise: Surprise | None


def outlook(case: Case, look: Look, corner: Corner, life: float | None) -> Outlook:
    """Forecast and surprise of a crack that was measured.

    look, corner : best estimate; life : best-estimate life in usage, or None where there is none
    """
    try:
        if case.uncertainty is None:
            raise ValueError("uncertainty is missing")
        problem = _Problem(case, look, corner, scatter_of(case.uncertainty), looks_of(case), life)
    except ValueError as missing:
        return Outlook(None, str(missing), None)
    z = normals(SAMPLES, DIMENSIONS, case.seed)
    found = problem.weighed(z, np.zeros(SAMPLES))
    surprise = problem.surprise(found)
    try:
        if problem.looks.readings and found.effective < ENOUGH:
            found = problem.refined()
        return Outlook(problem.lived(found), None, surprise)
    except ValueError as contradiction:
        return Outlook(None, str(contradiction), surprise)


def forecast(case: Case, look: Look, corner: Corner, life: float | None) -> Forecast:
    """As ``outlook``, raising ValueError, in words, where there is no forecast."""
    found = outlook(case, look, corner, life)
    if found.forecast is None:
        raise ValueError(found.why_not)
    return found.forecast


@dataclass(frozen=True)
class _Weighed:
    drawn: Drawn
    paths: Paths
    state: State
    weights: Floats
    effective: float
    told: tuple[Told, ...]
    log_likelihood: Floats
    refined: bool = False


class _Problem:
    """One crack: from standard normals to weights."""

    def __init__(
        self,
        case: Case,
        look: Look,
        corner: Corner,
        scatter: Scatter,
        looks: Looks,
        life: float | None,
    ) -> None:
        self.case, self.look, self.corner = case, look, corner
        self.scatter, self.looks = scatter, looks
        self.span = span_of(case, looks.start, life or 1.0)
        self.elapsed = 0.0
        if looks.readings and looks.start.at is not None:
            self.elapsed = looks.readings[-1].at - looks.start.at

    def drawn(self, z: Floats) -> Drawn:
        return draw(z, self.scatter, self.looks.start, self.corner, self.span)

    def weighed(self, z: Floats, log_ratio: Floats, refined: bool = False) -> _Weighed:
        """log_ratio : log of what the samples should be drawn from over what they were."""
        made = self.drawn(z)
        paths = run(self.look, self.corner, made.samples)
        state, told = self._filtered(made, paths)
        survived = made.speed * self.elapsed < paths.end
        likelihood = state.log_likelihood
        if self.looks.readings:
            likelihood = np.where(survived, likelihood, -np.inf)
        logs = likelihood + log_ratio
        if not np.any(np.isfinite(logs)):
            weights, effective = np.zeros(len(logs)), 0.0
        else:
            weights = weights_of(logs)
            effective = effective_size(weights)
        return _Weighed(
            made, paths, state, weights, effective, _told(told, weights), likelihood, refined
        )

    def _filtered(
        self, made: Drawn, paths: Paths
    ) -> tuple[State, list[tuple[Reading, Floats, Floats]]]:
        """(D, w) at the last look, and each reading's error against the nominal size."""
        sd, span = made.wander_sd, made.wander_span
        state, before, told = start(len(made.speed), sd), self.looks.start.at, []
        for reading in self.looks.readings:
            elapsed = reading.at - (self.looks.start.at or 0.0)
            if reading.at != before:
                state = advance(state, reading.at - (before or 0.0), sd, span)
            size, rate = self.size_at(made, paths, elapsed, reading.which)
            error = reading.size - size
            told.append((reading, error, rate**2 * self.usual_wander(elapsed) + reading.sd**2))
            state = measured(state, error, rate, reading.sd**2)
            before = reading.at
        return state, told

    def usual_wander(self, elapsed: float) -> float:
        """Variance of the clock's lead by the wander that is usual. A reading is held against that:
        the rate of a sample may wander so much that it explains any reading."""
        sd, span = priors.WANDER.median, priors.WANDER_SPAN.median * self.span
        return float(clock_covariance(np.array([0.0, elapsed]), sd, span)[1, 1])

    def size_at(
        self, made: Drawn, paths: Paths, elapsed: float, which: str
    ) -> tuple[Floats, Floats]:
        """Nominal depth or length after a usage, and its rate in usage, m."""
        x, slope = at_usage(paths, made.speed * elapsed)
        index = 0 if which == "depth" else 1
        size = self.corner.kind.sizes_of(x, self.corner.body)[index]
        # Sizes are sums of front variables, so growing the front by its slope shows their growth.
        more = self.corner.kind.sizes_of(x + slope, self.corner.body)[index]
        if size is None or more is None:
            raise ValueError(f"a {which} was measured, and this kind of crack has none")
        return size, (more - size) * made.speed

    def surprise(self, found: _Weighed) -> Surprise | None:
        """How improbable the growth from the first to the last size is on the basis alone.

        ``found`` : samples of the basis's own scatter from the first size on; their weights, which
        the later sizes gave them, are not used.
        """
        last = self.looks.readings[-1].at if self.looks.readings else None
        made, paths = found.drawn, found.paths
        state = start(len(made.speed), made.wander_sd)
        state = advance(state, self.elapsed, made.wander_sd, made.wander_span)
        seen = [one for one in self.looks.readings if one.at == last]
        # One that would have failed by then has grown at least as much.
        failed = made.speed * self.elapsed >= paths.end
        tails = []
        for reading in seen:
            size, rate = self.size_at(made, paths, self.elapsed, reading.which)
            spread = np.sqrt(rate**2 * state.var_d + reading.sd**2)
            tail = np.where(failed, 1.0, ndtr((size - reading.size) / spread))
            tails.append(float(np.mean(tail)))
        if not tails:
            return None
        # The more improbable of depth and length counts, and that two were looked at counts too.
        probability = min(1.0, min(tails) * len(tails))
        return Surprise(probability, self._upper_factor(seen))

    def _upper_factor(self, seen: list[Reading]) -> float | None:
        """Upper 95 % of the growth that was measured, over what the mean law gives from the first
        size; None where the mean law does not bring the crack there at all."""
        made = self.drawn(np.zeros((DIMENSIONS, 1)))
        paths = run(self.look, self.corner, made.samples)
        end = float(paths.end[0]) if np.isfinite(paths.end[0]) else float(paths.usage[-1, 0])
        usages = np.linspace(0.0, end, _FINE)
        factors = []
        for reading in seen:
            start_sd = getattr(self.looks.start, f"{reading.which}_sd")
            upper = reading.size + _UPPER * float(np.hypot(reading.sd, start_sd))
            sizes = [float(self.size_at(made, paths, u, reading.which)[0][0]) for u in usages]
            if upper > max(sizes):
                return None
            factors.append(float(np.interp(upper, sizes, usages)) / self.elapsed)
        return max(factors)

    def refined(self) -> _Weighed:
        """Samples drawn where the weight lies, found by raising the likelihood from nil to whole.

        At each stage as much of its logarithm is used as leaves a quarter of the samples effective;
        their mean and covariance give the next Student t. Source: importance sampling with
        tempering (R. M. Neal, Stat. Comput. 11 (2001) 125-139) and moments matched (O. Cappé et
        al., J. Comput. Graph. Stat. 13 (2004) 907-929).
        """
        z = normals(_STAGE, DIMENSIONS, self.case.seed + 3)
        ratio = np.zeros(_STAGE)
        for stage in range(_STAGES):
            found = self.weighed(z, np.zeros(_STAGE))
            share = _share(found.log_likelihood, ratio)
            mean, root = _moments(z, weights_of(share * found.log_likelihood + ratio))
            if share == 1.0:
                break
            z, ratio = _student(mean, root, _STAGE, self.case.seed + 4 + stage)
        z, ratio = _student(mean, root, SAMPLES, self.case.seed + 1)
        return self.weighed(z, ratio, refined=True)

    def lived(self, found: _Weighed) -> Forecast:
        if not found.effective >= LEAST:
            far = [one for one in found.told if abs(one.deviations) > OUTLIER]
            words = ", ".join(f"the {one.reading.which} of {one.reading.words}" for one in far)
            raise ValueError(
                f"only {found.effective:.0f} of {len(found.weights)} samples explain the history: "
                "what was measured contradicts the basis" + (f" ({words})" if words else "")
            )
        made, count = found.drawn, len(found.weights)
        points = normals(count, 2 + _STEPS, self.case.seed + 2)
        lead, wander = drawn(found.state, points[0], points[1])
        way = found.paths.end / made.speed - (self.elapsed + lead)
        remaining = time_through(way, wander, made.wander_sd, made.wander_span, points[2:])
        return Forecast(
            looks=self.looks,
            scatter=self.scatter,
            drawn=made,
            paths=found.paths,
            elapsed=self.elapsed,
            lead=lead,
            wander=wander,
            weights=found.weights,
            remaining=remaining,
            effective=found.effective,
            refined=found.refined,
            told=found.told,
        )


def _told(rows: list[tuple[Reading, Floats, Floats]], weights: Floats) -> tuple[Told, ...]:
    """Mean error of each reading over its whole spread: within samples and between them."""
    found = []
    for reading, error, spread in rows:
        held = weights > 0.0
        share, off = weights[held], error[held]
        mean = float(share @ off) if share.size else float("nan")
        total = float(share @ spread[held] + share @ (off - mean) ** 2) if share.size else 1.0
        found.append(Told(reading, mean / float(np.sqrt(total))))
    return tuple(found)


def _share(log_likelihood: Floats, log_ratio: Floats) -> float:
    """The largest share of the log likelihood that leaves a quarter of the samples effective."""
    wanted = 0.25 * len(log_likelihood)

    def enough(share: float) -> bool:
        return effective_size(weights_of(share * log_likelihood + log_ratio)) >= wanted

    if not np.any(np.isfinite(log_likelihood)):
        raise ValueError("every sample would have failed before the last look")
    if enough(1.0):
        return 1.0
    low, high = 0.0, 1.0
    for _ in range(30):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if enough(middle) else (low, middle)
    # Where even a hair of it leaves too few, a hair it is: the next stage starts from those.
    return max(low, high)


def _moments(z: Floats, weights: Floats) -> tuple[Floats, Floats]:
    mean = z @ weights
    off = z - mean[:, None]
    covariance = (off * weights) @ off.T
    return mean, np.asarray(np.linalg.cholesky(covariance + 1e-9 * np.eye(len(mean))))


def _student(mean: Floats, root: Floats, count: int, seed: int) -> tuple[Floats, Floats]:
    """Samples of a Student t, and log of the standard normal over its density."""
    points = normals(count, len(mean) + 1, seed)
    stretch = np.sqrt(_FREEDOM / chi2.ppf(ndtr(points[-1]), _FREEDOM))
    student = points[:-1] * stretch
    z = mean[:, None] + _WIDER * root @ student
    tail = -0.5 * (_FREEDOM + len(mean)) * np.log1p(np.sum(student**2, axis=0) / _FREEDOM)
    return z, np.asarray(-0.5 * np.sum(z**2, axis=0) - tail)
