"""The procedure from top to bottom: case → best estimate → bounding → interval → verdict → stop.

Each step is computed as far as it can be; what cannot is a reason, never a guess.
"""

from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from assessment.bounding import Bounding, bounding
from assessment.corners import corners, in_mm, sizes_to_corner
from assessment.detectability import from_missed
from assessment.document import Case, CaseRefused, read_case
from assessment.document.case import Missing
from assessment.document.writing import settled
from assessment.estimate import (
    Estimate,
    Look,
    diagram_marks,
    estimate,
    fracture_for,
    toughness_of,
)
from assessment.foresight import Foresight, foresight, growth_to_go_by
from assessment.interval import FromMissed, Next, Rule, governing, rules
from assessment.leak import THROUGH_NOW, Leak, leak_before_break, leaks_now
from assessment.lifetime import Critical, LifeFound, critical, life
from assessment.needs import needs
from assessment.restriction import ReducedLoad, reduced_load
from assessment.stop_size import StopSizes, stop_sizes
from assessment.toughness import ToughnessResult
from assessment.transitions import Beyond, beyond
from assessment.validity import Mark
from assessment.verdict import (
    CrackFacts,
    Decision,
    PlaceFacts,
    Restriction,
    decide_crack,
    decide_place,
)


@dataclass(frozen=True)
class Found:
    """All that was computed for one case, before it is written as an outcome.

    lacks : keys of what the bounding look needs and the document does not give; where there are
        any, the bounding look has best-estimate values in their place and gives no interval
    """

    best_look: Look
    best_toughness: ToughnessResult
    best: Estimate
    best_critical: Critical
    best_life: LifeFound
    best_beyond: Beyond | None
    lacks: tuple[str, ...]
    bounding_look: Look
    bounding_toughness: ToughnessResult
    bounding: Bounding
    rules: tuple[Rule, ...]
    next: Next | None
    reduced: ReducedLoad | None
    decision: Decision
    stop: StopSizes
    marks: tuple[Mark, ...]
    leak: Leak | None
    seen: Foresight | None = None


def assess(document: str | bytes | dict[str, Any]) -> dict[str, Any]:
    """The outcome of one case, as in the case contract.

    Raises CaseRefused, with the key and the reason, where the case cannot be computed.
    """
    from assessment.outcome import outcome_of

    case = read_case(document)
    # What is not finite is data here: it becomes null with a reason, or the end of a range.
    with np.errstate(all="ignore"):
        outcome: dict[str, Any] = settled(outcome_of(case, compute(case)))
    return outcome


def compute(case: Case) -> Found:
    """Everything that follows from a case."""
    toughness = toughness_of(case.material.toughness, case, "material.toughness")
    best_corner = sizes_to_corner(case.crack.kind, case.body, case.crack.depth, case.crack.length)
    best_look = Look(
        material=case.material,
        toughness=toughness.value,
        growth=case.material.growth,
        fracture=fracture_for(case),
        peak=case.loading.peak,
        cycles=case.loading.cycles,
        reserve=1.0,
        residual=case.loading.residual,
    )
    best = estimate(best_look, best_corner)
    best_life = life(best_look, best_corner)
    bounding_toughness, bounding_needs = _bounding_toughness(case, toughness)
    seen = foresight(case, best_look, best_corner, best_life.usage)
    look = _bounding_look(case, best_look, bounding_toughness)
    look = growth_to_go_by(look, best_corner, best_look, seen)
    missed = from_missed(case, look)
    # An assumed size is what could have been missed: it has no sizing error on top.
    measured = case.crack if case.crack.found else replace(case.crack, sizing=None)
    sizes = corners(measured, case.body, case.criteria.size_confidence_sd or 0.0)
    decides = bounding(look, sizes)
    if leaks_now(case, decides.corner):
        ended = LifeFound(cycles=0.0, usage=0.0, ends_by="break-through", path=())
        decides = replace(decides, acceptable=False, life=ended)
    lacks = _lacks(case, bounding_needs)

    def days_of(one: Bounding) -> int | None:
        following = governing(case, _rules(case, one, lacks, seen, missed))
        return None if following is None else following.days

    reduced, why_none = (
        reduced_load(case, look, sizes, decides, days_of)
        if case.crack.found and _short(case, decides)
        else (None, "")
    )
    full_rules = _rules(case, decides, lacks, seen, missed)
    in_force = (
        full_rules if reduced is None else _rules(case, reduced.bounding, lacks, seen, missed)
    )
    row_two = (
        *needs(case),
        *(one.sentence() for one in bounding_needs),
        *_outside(case, decides, bounding_toughness),
        *_unconverged(decides),
        *(seen.needs if seen else ()),
    )
    decision = _decide(case, decides, row_two, reduced, why_none, full_rules, in_force, seen)
    return Found(
        best_look=best_look,
        best_toughness=toughness,
        best=best,
        best_critical=critical(best_look, best, best_life),
        best_life=best_life,
        best_beyond=beyond(best_look, best_corner, best_life),
        lacks=lacks,
        bounding_look=look,
        bounding_toughness=bounding_toughness,
        bounding=decides,
        rules=in_force,
        next=governing(case, in_force),
        reduced=reduced,
        decision=decision,
        stop=StopSizes(why_not=THROUGH_NOW)
        if leaks_now(case, decides.corner)
        else stop_sizes(case, look, lacks, bool(decides.outside)),
        marks=(*best.marks, *toughness.marks),
        leak=leak_before_break(case, look, decides.corner, decides.life),
        seen=seen,
    )


def _bounding_toughness(
    case: Case, best: ToughnessResult
) -> tuple[ToughnessResult, tuple[Missing, ...]]:
    model = case.material.bounding.toughness
    if model is None:
        return best, ()
    try:
        return toughness_of(model, case, "material.bounding.toughness"), ()
    except CaseRefused as refused:
        return best, (Missing(refused.where, refused.why),)


def _bounding_look(case: Case, best: Look, toughness: ToughnessResult) -> Look:
    return replace(
        best,
        toughness=toughness.value,
        growth=case.material.bounding.growth or case.material.growth,
        reserve=case.criteria.load_reserve or 1.0,
        decides=True,
    )


# What the bounding look cannot do without. A missing date or a lower bound of depth is a need
# too, but leaves its numbers as they are.
_BOUNDING_KEYS = ("crack.sizing", "material.", "loading.", "criteria.load", "criteria.size")


def _lacks(case: Case, also: tuple[Missing, ...]) -> tuple[str, ...]:
    keys = [missing.key for missing in (*case.missing, *also)]
    return tuple(
        key
        for key in dict.fromkeys(keys)
        if key.startswith(_BOUNDING_KEYS)
        and key not in ("material.typical", "material.bounding.stands_for")
    )


def _rules(
    case: Case,
    decides: Bounding,
    lacks: tuple[str, ...],
    seen: Foresight | None,
    missed: FromMissed,
) -> tuple[Rule, ...]:
    # Forecast and detectability are of the full load, also where a reduced one is looked at: no
    # credit is taken for that.
    ahead = None if seen is None else seen.ahead
    if lacks:
        why = f"what it needs is missing: {', '.join(lacks)}"
        return rules(case, None, why, ahead, FromMissed(None, why))
    return rules(case, decides.life.usage, decides.life.why, ahead, missed)


def _short(case: Case, decides: Bounding) -> bool:
    """The reserve on load is below what is demanded."""
    demanded = case.criteria.load_reserve
    return demanded is not None and decides.reserve is not None and decides.reserve < demanded


def _outside(case: Case, decides: Bounding, toughness: ToughnessResult) -> tuple[str, ...]:
    drawn = diagram_marks(case.material) if case.criteria.fracture != "toughness" else ()
    sentences = (*decides.outside, *(mark.sentence() for mark in (*toughness.marks, *drawn)))
    found = tuple(f"Outside a published range today: {sentence}" for sentence in sentences)
    return found if decides.unsettled is None else (*found, decides.unsettled)


def _unconverged(decides: Bounding) -> tuple[str, ...]:
    if decides.life.converged:
        return ()
    return (f"The growth computation did not converge: {decides.life.why}",)


def _decide(
    case: Case,
    decides: Bounding,
    row_two: tuple[str, ...],
    reduced: ReducedLoad | None,
    why_no_restriction: str,
    full_rules: tuple[Rule, ...],
    in_force: tuple[Rule, ...],
    seen: Foresight | None,
) -> Decision:
    criteria = case.criteria
    if not case.crack.found:
        finds, words = _method_finds(case)
        return decide_place(
            PlaceFacts(
                on_record=case.crack.on_record,
                needs=row_two,
                method_finds=finds,
                method_words=words,
                interval=governing(case, full_rules),
                shortest=criteria.shortest_interval_days,
                longest=criteria.longest_interval_days,
            )
        )
    restriction = None
    if reduced is not None:
        restriction = Restriction(reduced.words, governing(case, in_force))
    return decide_crack(
        CrackFacts(
            acceptable=decides.acceptable,
            why_not_acceptable=THROUGH_NOW
            if leaks_now(case, decides.corner)
            else _why_not_acceptable(decides),
            needs=row_two,
            grew_faster_before=case.previous is not None and case.previous.grew_faster,
            reserve=decides.reserve,
            demanded=criteria.load_reserve,
            restriction=restriction,
            why_no_restriction=why_no_restriction,
            interval=governing(case, full_rules),
            shortest=criteria.shortest_interval_days,
            longest=criteria.longest_interval_days,
            failing=None if seen is None else seen.failing,
            grew_faster=None if seen is None else seen.grew_faster,
            faster_words="" if seen is None else seen.faster_words,
        )
    )


def _why_not_acceptable(decides: Bounding) -> str:
    if decides.estimate is None:
        return f"At its bounding size the crack is through: {decides.corner.broken}"
    point = decides.estimate.point
    reserve = "unknown" if point.reserve is None else f"{point.reserve:.3g}"
    return (
        f"At its bounding size ({in_mm(decides.corner.depth, decides.corner.length)}) the crack is "
        f"not acceptable at the peak load: load ratio {point.load_ratio:.3g}, toughness ratio "
        f"{point.toughness_ratio:.3g}, reserve on load {reserve}."
    )


def _method_finds(case: Case) -> tuple[bool | None, str]:
    """Whether the size that the rules assume could be missed is one that the method finds."""
    detection, crack = case.detection, case.crack
    if detection is None:
        return None, "What the method finds is not known."
    assumed = crack.length if detection.dimension == "length" else crack.depth
    if assumed is None:
        return None, f"The assumed crack has no {detection.dimension} to compare with the method's."
    finds = detection.a90_95 <= assumed * (1.0 + 1e-9)
    verb = "is not above" if finds else "is above"
    return finds, (
        f"The {detection.dimension} that the method finds (90 % with 95 % confidence), "
        f"{detection.a90_95 * 1e3:.4g} mm, {verb} the assumed {assumed * 1e3:.4g} mm."
    )
