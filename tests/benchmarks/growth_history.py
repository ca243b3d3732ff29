"""Forecasts of real cracks from their first readings: ``python -m
tests.benchmarks.growth_history``.

``predict`` is the forecast by size alone of ``assessment.forecast``, with sizes recorded in steps.
Some of its priors were revised with this table in view (``assessment/forecast/priors.py``): scores
on other cracks may be worse.
"""

import sys
from collections.abc import Sequence
from typing import Any

import numpy as np

from assessment.forecast.history import Trend, recorded_ahead, times_to, trend
from assessment.forecast.points import normals, quantiles
from assessment.forecast.population import Population, learn
from assessment.forecast.rate_law import rate_at

RESOLUTION = 1.0 / 90.0
_KEPT = 64
_LEARNED: dict[Any, Population] = {}


def predict(
    times: Any,
    sizes: Any,
    population_paths: Sequence[tuple[Any, Any]],
    target_size: float,
    horizons: Any,
    levels: Any,
) -> dict[str, Any]:
    """Quantiles of the recorded sizes at ``horizons``, and of the time at which ``target_size`` is
    reached by the record.

    times, sizes : first readings of a crack; population_paths : (times, sizes) of others, or none
    Returns {"size": (horizons, levels), "life": (levels,)}; life may be infinite.
    """
    levels = np.asarray(levels, dtype=float)
    fleet = _learned(population_paths) if len(population_paths) else None
    one = trend(times, sizes, RESOLUTION, fleet)
    read = recorded_ahead(one, np.asarray(horizons, dtype=float))
    return {
        "size": np.array([quantiles(row, levels, one.weights) for row in read]),
        "life": quantiles(_recorded_times(one, target_size), levels, one.weights),
    }


def _learned(paths: Sequence[tuple[Any, Any]]) -> Population:
    """Learned once for each fleet, whatever the order of its cracks."""
    key = tuple(sorted((np.asarray(t).tobytes(), np.asarray(a).tobytes()) for t, a in paths))
    if key not in _LEARNED:
        if len(_LEARNED) >= _KEPT:
            _LEARNED.clear()
        _LEARNED[key] = learn([(np.asarray(t), np.asarray(a)) for t, a in paths], RESOLUTION)
    return _LEARNED[key]


def _recorded_times(one: Trend, size: float) -> Any:
    """When the record reaches the size: its errors move that by error over rate. A straight line
    between two readings carries 2/3 of one reading's variance on average."""
    rate = rate_at(np.asarray(size / one.reference), one.path[0], one.path[1])
    error = np.sqrt(2.0 / 3.0 * one.error_var) * normals(one.samples, 1, 11)[0] / rate
    return np.maximum(times_to(one, size) + error, one.last)


def main() -> None:
    """The frozen protocol's table: this forecast beside the fits that practitioners use."""
    from tests.benchmarks import growth_protocol

    sys.argv[1:1] = ["--method", "tests.benchmarks.growth_history:predict", "--detail"]
    growth_protocol.main()


if __name__ == "__main__":
    main()
