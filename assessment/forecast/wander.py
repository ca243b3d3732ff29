"""A growth rate that wanders in time, and what measured sizes say of it.

The rate is its nominal value times e^w, with w an Ornstein-Uhlenbeck process of mean nil, standard
deviation s and correlation time T. The crack then runs along its nominal path by a clock that is
ahead by D(t) = ∫ (e^w − 1) dt ≈ ∫ w dt: a size measured at t is a(t) + a'(t)·D(t) + error. In D and
w that is linear and normal, so that a Kalman filter gives the likelihood of a whole history without
sampling the wander, for every sample of the nominal path at once.

Sources: G. E. Uhlenbeck & L. S. Ornstein, Phys. Rev. 36 (1930) 823-841; R. E. Kalman, J. Basic
Eng. 82 (1960) 35-45; a rate with a correlated random factor: K. Ortiz & A. S. Kiremidjian, Eng.
Fract. Mech. 29 (1988) 317-334 (along the size there, along the time here).
Accuracy: first order in D, that is, in the share of the rate by which it wanders.
"""

from dataclasses import dataclass

import numpy as np

from assessment.validity import Floats


@dataclass(frozen=True)
class Transition:
    """(D, w) after a time h: D += gain·w₀ + noise, w = keep·w₀ + noise. Shapes broadcast."""

    keep: Floats
    gain: Floats
    var_d: Floats
    cov: Floats
    var_w: Floats


def transition(time: Floats | float, sd: Floats | float, span: Floats | float) -> Transition:
    """Exact transition of the integrated Ornstein-Uhlenbeck process.

    time : h ≥ 0; sd : of w, stationary; span : correlation time T > 0
    """
    x = np.asarray(time, dtype=float) / span
    keep = np.exp(-x)
    gain = -np.expm1(-x)
    variance = np.square(sd)
    # 2x − 3 + 4e⁻ˣ − e⁻²ˣ loses its digits below x ≈ 0.01; its series starts 2x³/3 − x⁴/2.
    direct = 2.0 * x - 3.0 + 4.0 * keep - keep**2
    series = x**3 * (2.0 / 3.0 - x * (0.5 - x * (7.0 / 30.0)))
    return Transition(
        keep=np.asarray(keep),
        gain=np.asarray(span * gain),
        var_d=np.asarray(variance * np.square(span) * np.where(x < 0.01, series, direct)),
        cov=np.asarray(variance * span * gain**2),
        var_w=np.asarray(-variance * np.expm1(-2.0 * x)),
    )


def clock_covariance(times: Floats, sd: Floats | float, span: Floats | float) -> Floats:
    """Covariance of D at ``times`` counted from the first, shape (..., n, n).

    With u = t/T ≤ v: s²T²·(2u − 1 + e⁻ᵘ + e⁻ᵛ − e^(u−v)); w is stationary at the first.
    """
    elapsed = times - times[..., :1]
    scale = np.asarray(span, dtype=float)[..., None, None]
    low = np.minimum(elapsed[..., :, None], elapsed[..., None, :]) / scale
    high = np.maximum(elapsed[..., :, None], elapsed[..., None, :]) / scale
    shape = 2.0 * low - 1.0 + np.exp(-low) + np.exp(-high) - np.exp(low - high)
    return np.asarray(np.square(np.asarray(sd, dtype=float)[..., None, None] * scale) * shape)


@dataclass(frozen=True)
class State:
    """Normal distribution of (D, w) for each sample, and the log likelihood of the history."""

    d: Floats
    w: Floats
    var_d: Floats
    cov: Floats
    var_w: Floats
    log_likelihood: Floats


def start(samples: int, sd: Floats | float) -> State:
    """At the first reading: the clock agrees, the rate wanders as at any time."""
    nil = np.zeros(samples)
    return State(nil, nil, nil, nil, np.broadcast_to(np.square(sd), (samples,)), nil)


def advance(state: State, time: Floats | float, sd: Floats | float, span: Floats | float) -> State:
    """The state a time later, nothing measured."""
    t = transition(time, sd, span)
    return State(
        d=state.d + t.gain * state.w,
        w=t.keep * state.w,
        var_d=state.var_d + 2.0 * t.gain * state.cov + t.gain**2 * state.var_w + t.var_d,
        cov=t.keep * (state.cov + t.gain * state.var_w) + t.cov,
        var_w=t.keep**2 * state.var_w + t.var_w,
        log_likelihood=state.log_likelihood,
    )


def measured(state: State, error: Floats, rate: Floats, variance: Floats | float) -> State:
    """The state after a size was measured.

    error : measured size less nominal size; rate : nominal rate there; variance : of the error of
    measurement. A sample whose error is not finite gets a likelihood of nil.
    """
    possible = np.isfinite(error) & np.isfinite(rate)
    error, rate = np.where(possible, error, 0.0), np.where(possible, rate, 0.0)
    left = error - rate * state.d
    spread = rate**2 * state.var_d + variance
    gain_d, gain_w = rate * state.var_d / spread, rate * state.cov / spread
    log_density = -0.5 * (np.log(2.0 * np.pi * spread) + left**2 / spread)
    return State(
        d=state.d + gain_d * left,
        w=state.w + gain_w * left,
        var_d=state.var_d - gain_d * rate * state.var_d,
        cov=state.cov - gain_d * rate * state.cov,
        var_w=state.var_w - gain_w * rate * state.cov,
        log_likelihood=state.log_likelihood + np.where(possible, log_density, -np.inf),
    )


def drawn(state: State, first: Floats, second: Floats) -> tuple[Floats, Floats]:
    """(D, w) of each sample from two standard normals."""
    sd_d = np.sqrt(np.maximum(state.var_d, 0.0))
    slope = np.divide(state.cov, sd_d, out=np.zeros_like(sd_d), where=sd_d > 0.0)
    rest = np.sqrt(np.maximum(state.var_w - slope**2, 0.0))
    return state.d + sd_d * first, state.w + slope * first + rest * second


def ahead(
    d: Floats, w: Floats, time: Floats, sd: Floats | float, span: Floats | float, steps: Floats
) -> tuple[Floats, Floats]:
    """The clock's lead and the wander along a way of equal steps, the factor e^w kept.

    time : length of one step, shape (samples,); steps : standard normals, shape (n, samples)
    Returns arrays of shape (n + 1, samples). The mean of the factor is 1: e^(w − s²/2).
    """
    t = transition(time, sd, span)
    noise, shift = np.sqrt(t.var_w), 0.5 * np.square(sd)
    leads, wanders = [d], [w]
    for step in steps:
        new = t.keep * wanders[-1] + noise * step
        mean = 0.5 * (np.exp(wanders[-1] - shift) + np.exp(new - shift))
        leads.append(leads[-1] + time * (mean - 1.0))
        wanders.append(new)
    return np.array(leads), np.array(wanders)


def time_through(
    way: Floats, w: Floats, sd: Floats | float, span: Floats | float, noise: Floats
) -> Floats:
    """Time in which the clock goes ``way``, from a wander of w now.

    way : on the nominal clock, (samples,); nil or less takes no time, infinite takes for ever
    noise : standard normals, (steps, samples); two in three steps fall inside the nominal way, and
    what wanders more slowly goes on as it was at the last.
    """
    goes = (way > 0.0) & np.isfinite(way)
    far = np.where(goes, way, 1.0)
    part = 1.5 * far / len(noise)
    leads, wanders = ahead(np.zeros_like(far), w, part, sd, span, noise)
    gone = np.arange(len(leads))[:, None] * part + leads
    past = np.vstack([gone >= far, np.ones_like(far, dtype=bool)])
    after = np.argmax(past, axis=0)
    rows = np.arange(len(far))
    low = np.clip(after - 1, 0, len(gone) - 2)
    step = gone[low + 1, rows] - gone[low, rows]
    share = np.divide(far - gone[low, rows], step, out=np.zeros_like(far), where=step > 0.0)
    speed = np.exp(wanders[-1] - 0.5 * np.square(sd))
    # A speed of nil is a wander beyond all bounds; it then takes for ever.
    with np.errstate(divide="ignore"):
        beyond = (len(gone) - 1) * part + (far - gone[-1]) / speed
    time = np.where(after >= len(gone), beyond, (low + share) * part)
    return np.where(goes, time, np.where(way > 0.0, np.inf, 0.0))
