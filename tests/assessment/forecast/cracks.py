"""Made-up cracks that grow by size alone, integrated step by step: not the forecast's own way."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]


@dataclass(frozen=True)
class Truth:
    """Size path on a fine grid of time, and its readings."""

    fine_times: Floats
    fine_sizes: Floats
    times: Floats
    sizes: Floats

    def at(self, time: float) -> float:
        return float(np.interp(time, self.fine_times, self.fine_sizes))

    def time_to(self, size: float) -> float:
        return float(np.interp(size, self.fine_sizes, self.fine_times, right=np.inf))


def made_up(
    rng: np.random.Generator,
    log_rate: float,
    exponent: float,
    start: float,
    times: Floats,
    *,
    wander_sd: float = 0.1,
    wander_span: float = 0.4,
    error_sd: float = 0.005,
    step: float = 0.01,
    beyond: float = 3.0,
) -> Truth:
    """One crack by small Euler steps of its log size, its rate wandering."""
    fine = np.linspace(times[0], times[0] + beyond * (times[-1] - times[0]), 3001)
    h = fine[1] - fine[0]
    keep = np.exp(-h / wander_span)
    w, log_size = wander_sd * rng.standard_normal(), np.log(start)
    logs = [log_size]
    for noise in rng.standard_normal(len(fine) - 1):
        speed = np.exp(log_rate + (exponent - 1.0) * log_size + w - 0.5 * wander_sd**2)
        log_size = min(log_size + h * speed, 6.0)
        w = keep * w + wander_sd * np.sqrt(1.0 - keep**2) * noise
        logs.append(log_size)
    sizes = np.exp(logs)
    read = np.interp(times, fine, sizes) + error_sd * rng.standard_normal(len(times))
    return Truth(fine, sizes, times, np.maximum(np.round(read / step) * step, step))
