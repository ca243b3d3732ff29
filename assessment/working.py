"""The working: every number of the outcome as a line an engineer can check with a calculator."""

from collections.abc import Iterable, Iterator
from dataclasses import fields
from typing import TYPE_CHECKING, Any

import numpy as np

from assessment.corners import in_mm
from assessment.document.case import Case
from assessment.estimate import Estimate, Look, arrays, loads_for
from assessment.failure import RHO, diagram_of
from assessment.growth import CLOSURE, Forman, FormanMettu, GrowthLaw, TwoStage, Walker
from assessment.interval import LIFE, rate
from assessment.kinds.base import WorkingStep
from assessment.kinds.parts import said

if TYPE_CHECKING:
    from assessment.procedure import Found

_HERE = "the case document"


def working(case: Case, found: "Found") -> list[dict[str, Any]]:
    """All steps: best estimate, bounding, growth and life, interval."""
    return [_written(step) for step in _steps(case, found)]


def _written(step: WorkingStep) -> dict[str, Any]:
    value = step.value
    if not isinstance(value, str) and not np.isfinite(value):
        value = "no limit"
    return {
        "step": step.step,
        "formula": step.formula,
        "with": step.numbers,
        "value": value,
        "unit": step.unit,
        "source": step.source,
    }


def _steps(case: Case, found: "Found") -> Iterator[WorkingStep]:
    yield from _titled("Best estimate", found.best_toughness.working)
    yield from _titled("Best estimate", _of_estimate(found.best_look, found.best))
    yield _bounding_size(case, found)
    if found.bounding.estimate is not None:
        yield from _titled("Bounding", found.bounding_toughness.working)
        yield from _titled("Bounding", _of_estimate(found.bounding_look, found.bounding.estimate))
    yield from _growth(found)
    yield from _interval(case, found)


def _titled(title: str, steps: Iterable[WorkingStep]) -> Iterator[WorkingStep]:
    for step in steps:
        words = f"{title}: {step.step}"
        yield WorkingStep(words, step.formula, step.numbers, step.value, step.unit, step.source)


def _of_estimate(look: Look, one: Estimate) -> Iterator[WorkingStep]:
    corner = one.corner
    loads = arrays(loads_for(corner, look.peak))
    yield from corner.kind.working(corner.x, loads, corner.body)
    yield from _of_point(look, one)


def _toughness_ratio(look: Look, one: Estimate) -> Iterator[WorkingStep]:
    point, source = one.point, diagram_of(look.material).source
    held = one.residual_k
    if not look.residual or held is None:
        numbers = f"{float(np.max(one.k)):.6g} / {look.toughness:.6g}"
        formula = "K_r = largest K of the front / K_mat"
        yield WorkingStep("toughness ratio", formula, numbers, point.toughness_ratio, "", source)
        return
    stresses = said(arrays(look.residual), one.corner.body)
    for name, k in zip(one.corner.kind.points, np.ravel(held), strict=True):
        formula = "K_s: as K, with the residual stress; nil where it presses the crack shut"
        words = f"Residual stress intensity factor, {name}"
        yield WorkingStep(words, formula, stresses, max(float(k), 0.0), "MPa√m", _HERE)
    drawn = point.fracture == "diagram"
    yield WorkingStep(
        "toughness ratio",
        "K_r = largest of (K + K_s)/K_mat + ρ(χ, L_r), χ = K_s L_r / K"
        if drawn
        else "K_r = largest of (K + K_s)/K_mat",
        f"K_mat = {look.toughness:.6g} MPa√m, L_r = {point.load_ratio:.6g}",
        point.toughness_ratio,
        "",
        f"{source}; {RHO.source}" if drawn else source,
    )


def _of_point(look: Look, one: Estimate) -> Iterator[WorkingStep]:
    point, material = one.point, look.material
    source = diagram_of(material).source
    reference = point.load_ratio * material.yield_strength
    numbers = f"{reference:.6g} / {material.yield_strength:g}"
    yield WorkingStep("load ratio", "L_r = σ_ref / σ_Y", numbers, point.load_ratio, "", source)
    yield from _toughness_ratio(look, one)
    if point.limit is not None:
        yield WorkingStep(
            "limit of the diagram at this load ratio",
            f"f(L_r), Option 1, {material.yielding} yielding"
            if material.drawn_from is None
            else "f = [E ε/(L_r σ_Y) + L_r³ σ_Y/(2 E ε)]^(-½), Option 2, ε at L_r σ_Y",
            f"L_r = {point.load_ratio:.6g}, cut-off (σ_Y + σ_U)/(2 σ_Y), σ_U = "
            f"{material.ultimate_strength:g} MPa",
            point.limit,
            "",
            source,
        )
    formula = "F: F·K_r = f(F·L_r)"
    if point.fracture == "toughness":
        formula = "smaller of K_mat / K and flow strength / σ_ref, flow = (σ_Y + σ_U)/2"
        source = "criteria.fracture of the document"
    reserve = "no limit" if point.reserve is None else point.reserve
    yield WorkingStep("reserve on load", formula, point.cause or "", reserve, "", source)


def _bounding_size(case: Case, found: "Found") -> WorkingStep:
    deviations, sizing = case.criteria.size_confidence_sd, case.crack.sizing
    numbers = "sizing error or size_confidence_sd missing: sizes as measured"
    if sizing is not None and deviations is not None:
        numbers = (
            f"{deviations:g} × (depth {sizing.depth_sd * 1e3:.4g} mm, length "
            f"{sizing.length_sd * 1e3:.4g} mm), bias (depth {sizing.depth_bias * 1e3:.4g} mm, "
            f"length {sizing.length_bias * 1e3:.4g} mm); {sizing.said}"
        )
    if not case.crack.found:
        numbers = f"the size assumed: {case.crack.source}"
    corner = found.bounding.corner
    if case.crack.combined is not None and case.crack.combined.joined:
        names = ", ".join(one.name for one, _ in case.crack.combined.joined)
        numbers = f"one crack with {names}; {numbers}"
    return WorkingStep(
        "Bounding size, worst of the corners",
        "size − bias ± size_confidence_sd · sd",
        numbers,
        f"{in_mm(corner.depth, corner.length)} ({corner.kind.name})",
        "",
        _HERE,
    )


def _growth(found: "Found") -> Iterator[WorkingStep]:
    for title, look, one in (
        ("Best estimate", found.best_look, found.best_life),
        ("Bounding", found.bounding_look, found.bounding.life),
    ):
        ends = one.why if one.usage is None else f"ends by {one.ends_by}"
        yield WorkingStep(
            f"{title}: life from the last look",
            "N = ∫ da / (da/dN), all points of the front at once, until the reserve on load is "
            f"{look.reserve:g}",
            f"{look.growth.formula}, {_constants(look.growth)}; {len(look.cycles)} cycle blocks; "
            f"{ends}",
            "none" if one.usage is None else one.usage,
            "usage",
            _source(look.growth),
        )


def _constants(law: GrowthLaw) -> str:
    """The law's constants as they were put in."""
    given = ((f.name, getattr(law, f.name)) for f in fields(law))  # type: ignore[arg-type]
    return ", ".join(f"{name} = {value}" for name, value in given if value is not None)


def _source(law: GrowthLaw) -> str:
    if isinstance(law, TwoStage):
        return "BS 7910:2013, 8.2.3"
    if isinstance(law, Walker):
        return "K. Walker, ASTM STP 462 (1970) 1-14"
    if isinstance(law, Forman):
        return "R. G. Forman, V. E. Kearney & R. M. Engle, J. Basic Eng. 89 (1967) 459-464"
    if isinstance(law, FormanMettu):
        return f"R. G. Forman & S. R. Mettu, ASTM STP 1131 (1992) 519-546; {CLOSURE.source}"
    return "P. C. Paris & F. Erdogan, J. Basic Eng. 85 (1963) 528-533"


def _interval(case: Case, found: "Found") -> Iterator[WorkingStep]:
    usage, factor = case.usage, case.criteria.life_factor
    rule = next(one for one in found.rules if one.rule == LIFE)
    if rule.usage is not None and factor is not None:
        life = found.reduced.bounding.life if found.reduced else found.bounding.life
        yield WorkingStep(
            "Rule 1: counter reading at the next inspection",
            "at + life / life_factor",
            f"{usage.at:.10g} + {life.usage:.6g} / {factor:g}",
            rule.usage,
            usage.unit or "usage",
            "factor of the document's criteria (common practice: at least 2)",
        )
    per_day = rate(usage)
    if per_day is not None:
        yield WorkingStep(
            "Rate that turns a counter reading into a date",
            "the fastest of per_day, plain rate, and upper end of the rate's 90 % interval",
            per_day.words,
            per_day.per_day,
            f"{usage.unit or 'usage'}/day",
            "common practice, no source",
        )
    if found.next is not None:
        yield WorkingStep(
            "Next inspection",
            "the earliest of the rules, rounded down to a day",
            found.next.governed_by,
            found.next.on.isoformat(),
            "",
            _HERE,
        )
