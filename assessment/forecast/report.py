"""The forecast as the outcome shows it: quantiles, bands, probabilities in words, what the history
did."""

import datetime
from collections.abc import Callable
from typing import Any

import numpy as np

from assessment.corners import Corner
from assessment.document import Case
from assessment.validity import Floats

from .case_forecast import OUTLIER, Forecast, Outlook
from .points import quantiles
from .surprise import chance

LEVELS = (0.01, 0.05, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95, 0.99)
BANDS = (50, 80, 90)
_POINTS = 8

DateOf = Callable[[float], datetime.date | None]


def reported(
    case: Case, corner: Corner, found: Outlook | None, date_of: DateOf
) -> dict[str, Any] | None:
    """The outcome's forecast; None where no crack was measured or nothing of it was asked for.

    date_of : the date by which so much usage is used up, or None
    """
    if found is None or case.uncertainty is None:
        return None
    if found.forecast is None:
        return {"why_not": found.why_not, "usage_quantiles": None, "growth": _growth(found)}
    one = found.forecast
    values = one.quantiles(np.array(LEVELS))
    return {
        "why_not": None,
        "usage_quantiles": _by_level(values, _finite),
        "date_quantiles": _by_level(values, lambda usage: _date(usage, date_of)),
        "smallest_probability": one.smallest_probability,
        "samples": len(one.weights),
        "effective_samples": one.effective,
        "drawn_anew": one.refined,
        "failure_by": _failure_by(one, date_of),
        "bands": _bands(case, corner, one, float(values[LEVELS.index(0.5)])),
        "growth": _growth(found),
        "history": _history(one),
    }


def _finite(value: float) -> float | None:
    return float(value) if np.isfinite(value) else None


def _date(usage: float, date_of: DateOf) -> str | None:
    on = date_of(usage) if np.isfinite(usage) else None
    return None if on is None else on.isoformat()


def _by_level(values: Floats, shown: Callable[[float], Any]) -> dict[str, Any]:
    return {f"{level:g}": shown(float(v)) for level, v in zip(LEVELS, values, strict=True)}


def _failure_by(one: Forecast, date_of: DateOf) -> list[dict[str, Any]]:
    """Probability of having failed by usages from now to where a half has failed."""
    middle = float(one.quantiles(np.array([0.5]))[0])
    if not np.isfinite(middle) or middle <= 0.0:
        usages = np.zeros(1)
    else:
        usages = np.linspace(0.0, middle, _POINTS)
    rows = []
    for usage, probability in zip(usages, one.probability_by(usages), strict=True):
        resolved = probability >= one.smallest_probability
        words = chance(probability) if resolved else f"below {chance(one.smallest_probability)}"
        rows.append(
            {
                "usage": float(usage),
                "on": _date(float(usage), date_of),
                "probability": float(probability) if resolved else None,
                "words": words.replace("below about", "fewer than"),
            }
        )
    return rows


def _bands(case: Case, corner: Corner, one: Forecast, middle: float) -> list[dict[str, Any]]:
    """Bands of size at usages ahead, over the samples that have not ended by then."""
    if not np.isfinite(middle) or middle <= 0.0:
        return []
    rows = []
    for n, usage in enumerate(np.linspace(0.0, middle, _POINTS)):
        x, lives = one.sizes_after(float(usage), case.seed + 20 + n)
        weights = np.where(lives, one.weights, 0.0)
        if not np.sum(weights) > 0.0:
            break
        weights = weights / np.sum(weights)
        row: dict[str, Any] = {"usage": float(usage)}
        for name, size in zip(
            ("depth_mm", "length_mm"), corner.kind.sizes_of(x, corner.body), strict=True
        ):
            row[name] = None if size is None else _of_size(1e3 * size, weights)
        rows.append(row)
    return rows


def _of_size(size: Floats, weights: Floats) -> dict[str, list[float]]:
    found = {}
    for band in BANDS:
        tail = 0.5 - band / 200.0
        low, high = quantiles(size, np.array([tail, 1.0 - tail]), weights)
        found[str(band)] = [float(low), float(high)]
    return found


def _growth(found: Outlook) -> dict[str, Any] | None:
    """Measured growth against what the basis explains."""
    if found.surprise is None:
        return None
    probability = found.surprise.probability
    return {
        "probability": probability,
        "upper_factor": found.surprise.factor,
        "words": f"on the basis, {chance(probability)} cracks would have grown at least this much",
    }


def _history(one: Forecast) -> dict[str, Any]:
    told = [
        {
            "which": each.reading.which,
            "on": each.reading.words,
            "deviations": each.deviations,
            "outlier": abs(each.deviations) > OUTLIER,
        }
        for each in one.told
    ]
    return {"weighed": told, "left_out": list(one.looks.left_out)}
