"""What was found, written as the outcome of the case contract: sizes back in mm, dates as text.

Beside the contract's keys an outcome carries:

criterion          what failure was judged by: "toughness" or "diagram"
failure            also reference_stress_mpa, cause, criterion, why_not
bounding.kind      the kind it is assessed as; bounding.became_through; bounding.lacks: keys that
                   are missing, with best-estimate values in their place
forecast           also date_quantiles, failure_by, bands, growth (measured against the basis),
                   history (what was weighed, outliers, what was left out), or why_not
rules              also "growth measured …" (row 3 of the table)
rate               usage per day behind the dates, and how it came about
restriction        null, or {"factor", "peak": {…}, "words"} where a reduced load restores reserve
life.beyond        null, or where the life ends by break-through: what the crack becomes then, each
                   change with its usage and sizes, and how long it holds; never part of the life
combined           null, or what the crack and its neighbours are assessed as, which of them
                   joined or stand apart, and why
leak               null, or for a pressure boundary whose life ends by break-through: whether it
                   leaks before it breaks
stop_size          also new_crack {"depth_mm", "length_mm"} or null, and why_not
disposition        also conditions, and before_return (repair before return to service)
figures            what the plots need: diagram (limit curve and points), growth (paths)
"""

import datetime
from collections.abc import Mapping
from typing import Any

import numpy as np

from assessment.cautions import cautions, of_yielding
from assessment.document.case import Case
from assessment.engine import ENGINE
from assessment.estimate import Estimate, Look, arrays, loads_for
from assessment.failure import Point, diagram_of, limit_curve
from assessment.forecast.report import reported
from assessment.interaction import INTERACTION, Combined
from assessment.interval import Next, Rule, date_of, rate
from assessment.leak import Leak
from assessment.lifetime import Critical, LifeFound, growth_now
from assessment.procedure import Found
from assessment.stop_size import StopSize
from assessment.transitions import Beyond
from assessment.working import working


def outcome_of(case: Case, found: Found) -> dict[str, Any]:
    """The outcome as plain values, still to be settled."""
    return {
        "outcome": 1,
        "engine": dict(ENGINE),
        "criterion": found.best.point.fracture,
        "stress_intensity": _stress_intensity(case, found.best_look, found.best),
        "toughness_mpa_sqrt_m": found.best_look.toughness,
        "failure": _failure(found.best_look, found.best),
        "critical": _critical(found.best_critical),
        "growth_now": growth_now(found.best_look, found.best.corner),
        "life": {**_life(found.best_life), "beyond": _beyond(found.best_beyond)},
        "bounding": _bounding(case, found),
        "forecast": _forecast(case, found),
        "rules": [_rule(one) for one in found.rules],
        "rate": _rate(case),
        "next_inspection": _next(found.next),
        "restriction": _restriction(found),
        "stop_size": _stop(found),
        "leak": _leak(found.leak),
        "disposition": {
            "verdict": found.decision.verdict,
            "reasons": list(found.decision.reasons),
            "conditions": list(found.decision.conditions),
            "before_return": found.decision.before_return,
        },
        "combined": _combined(case.crack.combined),
        "cautions": _cautions(case, found),
        "working": working(case, found),
        "figures": _figures(found),
    }


def _cautions(case: Case, found: Found) -> list[str]:
    largest = float(np.nanmax(found.best.k)) if np.any(np.isfinite(found.best.k)) else 0.0
    yielding = tuple(of_yielding(case, largest, found.best_toughness.value))
    became = found.bounding.corner.became
    return list(cautions(case, found.marks, became, found.leak, yielding))


def _combined(one: Combined | None) -> dict[str, Any] | None:
    if one is None:
        return None
    return {
        "depth_mm": mm(one.depth),
        "length_mm": mm(one.length),
        "joined": [{"name": other.name, "why": why} for other, why in one.joined],
        "apart": [{"name": other.name, "why": why} for other, why in one.apart],
        "rule": INTERACTION.source,
    }


def mm(metres: float | None) -> float | None:
    """m → mm; None stays None."""
    return None if metres is None else 1e3 * float(metres)


def finite(value: float | None) -> float | None:
    """The number, or None where it is not finite and stands for "no limit"."""
    return None if value is None or not np.isfinite(value) else float(value)


def _stress_intensity(case: Case, look: Look, one: Estimate) -> list[dict[str, Any]]:
    corner = one.corner
    loads = arrays(loads_for(corner, look.peak))
    nominal = corner.kind.nominal_stress(loads, corner.body)
    size = float(corner.x[0])  # a of the contract: depth, or half or whole of a length
    # Null where nothing is known of residual stress: nil would be a claim.
    unknown = case.loading.residual_said is None
    held = np.zeros_like(one.k) if one.residual_k is None else one.residual_k
    return [
        {
            "at": name,
            "k_mpa_sqrt_m": float(k),
            "geometry_factor": None
            if not nominal
            else float(k) / (float(nominal) * float(np.sqrt(np.pi * size))),
            "residual_k_mpa_sqrt_m": None if unknown else float(residual),
        }
        for name, k, residual in zip(
            corner.kind.points, np.ravel(one.k), np.ravel(held), strict=True
        )
    ]


def _failure(look: Look, one: Estimate | None) -> dict[str, Any] | None:
    if one is None:
        return None
    point = one.point
    return {
        "load_ratio": finite(point.load_ratio),
        "toughness_ratio": finite(point.toughness_ratio),
        "reserve_on_load": finite(point.reserve),
        "acceptable": point.acceptable,
        "reference_stress_mpa": finite(point.load_ratio * look.material.yield_strength),
        "cause": point.cause,
        "criterion": point.fracture,
        "why_not": _why_no_reserve(point),
    }


def _why_no_reserve(point: Point) -> str | None:
    if point.reserve is not None:
        return None
    if point.acceptable is None:
        return "stress intensity or reference stress could not be computed at this size"
    return "no factor on this load brings the crack to the limit: nothing opens it"


def _critical(one: Critical) -> dict[str, Any]:
    return {
        "depth_mm": mm(one.depth),
        "length_mm": mm(one.length),
        "stress_mpa": finite(one.stress),
        "cause": one.cause,
        "why_not": one.why,
    }


def _life(one: LifeFound) -> dict[str, Any]:
    return {
        "cycles": finite(one.cycles),
        "usage": finite(one.usage),
        "ends_by": one.ends_by,
        "why_not": one.why,
        "path": [list(row) for row in one.path],
    }


def _beyond(one: Beyond | None) -> dict[str, Any] | None:
    if one is None:
        return None
    return {
        "usage": finite(one.usage),
        "ends_by": one.ends_by,
        "why_not": one.why,
        "transitions": [
            {
                "usage": step.usage,
                "from": step.before,
                "to": step.after,
                "depth_mm": step.depth,
                "length_mm": step.length,
            }
            for step in one.transitions
        ],
    }


def _bounding(case: Case, found: Found) -> dict[str, Any]:
    bounding = found.bounding
    return {
        "depth_mm": mm(bounding.corner.depth),
        "length_mm": mm(bounding.corner.length),
        "kind": bounding.corner.kind.name,
        "became_through": bounding.corner.became,
        "toughness_mpa_sqrt_m": found.bounding_look.toughness,
        "stands_for": case.material.bounding.stands_for,
        "failure": _failure(found.bounding_look, bounding.estimate),
        "life": _life(bounding.life),
        "lacks": list(found.lacks),
    }


def _rule(one: Rule) -> dict[str, Any]:
    return {
        "rule": one.rule,
        "usage": one.usage,
        "on": None if one.on is None else one.on.isoformat(),
        "why_not": one.why_not,
    }


def _forecast(case: Case, found: Found) -> dict[str, Any] | None:
    per_day, start = rate(case.usage), case.usage.on

    def on(remaining: float) -> datetime.date | None:
        return (
            None if per_day is None or start is None else date_of(remaining, per_day.per_day, start)
        )

    outlook = None if found.seen is None else found.seen.outlook
    return reported(case, found.best.corner, outlook, on)


def _rate(case: Case) -> dict[str, Any] | None:
    found = rate(case.usage)
    return None if found is None else {"per_day": found.per_day, "from": found.words}


def _next(one: Next | None) -> dict[str, Any]:
    if one is None:
        return {"usage": None, "on": None, "governed_by": None, "days": None}
    return {
        "usage": one.usage,
        "on": one.on.isoformat(),
        "governed_by": one.governed_by,
        "days": one.days,
    }


def _restriction(found: Found) -> dict[str, Any] | None:
    if found.reduced is None:
        return None
    factor = found.reduced.factor
    return {
        "factor": factor,
        "peak": {name: factor * value for name, value in found.bounding_look.peak.items()},
        "reserve_on_load": finite(found.reduced.bounding.reserve),
        "words": found.reduced.words,
    }


def _leak(one: Leak | None) -> dict[str, Any] | None:
    if one is None:
        return None
    return {
        "leak_before_break": one.holds,
        "length_mm": mm(one.length),
        "reserve_on_load": finite(one.reserve),
        "words": one.words,
    }


def _stop(found: Found) -> dict[str, Any]:
    known, new = found.stop.known, found.stop.new
    shown = known or new
    return {
        "depth_mm": None if shown is None else mm(shown.depth),
        "length_mm": None if shown is None else mm(shown.length),
        "new_crack": _size(new),
        "why_not": found.stop.why_not,
    }


def _size(one: StopSize | None) -> dict[str, Any] | None:
    return None if one is None else {"depth_mm": mm(one.depth), "length_mm": mm(one.length)}


def _figures(found: Found) -> dict[str, Any]:
    look = found.best_look
    material = look.material
    drawn = [list(point) for point in limit_curve(material)] if look.has_diagram else []
    points: list[Mapping[str, Any]] = [_point("best estimate", found.best)]
    if found.bounding.estimate is not None:
        points.append(_point("bounding", found.bounding.estimate))
    return {
        "diagram": {
            "method": diagram_of(material).relation,
            "limit_curve": drawn,
            "points": [dict(point) for point in points],
        },
        "growth": {
            "best_estimate": [list(row) for row in found.best_life.path],
            "bounding": [list(row) for row in found.bounding.life.path],
        },
    }


def _point(name: str, one: Estimate) -> dict[str, Any]:
    return {
        "name": name,
        "load_ratio": finite(one.point.load_ratio),
        "toughness_ratio": finite(one.point.toughness_ratio),
        "acceptable": one.point.acceptable,
    }
