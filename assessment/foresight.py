"""What the forecast says to the decision: rule 2, rows 1 and 3 of the table, the growth to go
by."""

from dataclasses import dataclass, replace

import numpy as np

from assessment.corners import Corner
from assessment.document import Case
from assessment.estimate import Look
from assessment.forecast.altered import Scaled
from assessment.forecast.case_forecast import Forecast, Outlook, outlook
from assessment.forecast.surprise import chance
from assessment.growth import rates
from assessment.interval import Ahead
from assessment.lifetime import blocks_for


@dataclass(frozen=True)
class Foresight:
    """ahead : what the rules read; failing, grew_faster, faster_words : what the table reads

    needs : what an engineer has to settle, since growth is faster than any law here can follow
    """

    outlook: Outlook
    ahead: Ahead
    failing: str | None
    grew_faster: bool | None
    faster_words: str
    needs: tuple[str, ...]


def foresight(case: Case, look: Look, corner: Corner, life: float | None) -> Foresight | None:
    """None where no crack was measured, or where its kind cannot be grown from its size.

    look, corner, life : best estimate
    """
    if not case.crack.found or corner.broken is not None or corner.became:
        return None
    found = outlook(case, look, corner, life)
    faster, words = _faster(case, found)
    needs: tuple[str, ...] = ()
    if faster and found.surprise is not None and found.surprise.factor is None:
        needs = (f"{words} The mean law does not bring the crack to its measured size at all.",)
    return Foresight(
        outlook=found,
        ahead=_ahead(case, found, words),
        failing=_failing(case, found.forecast),
        grew_faster=faster,
        faster_words=words,
        needs=needs,
    )


def growth_to_go_by(look: Look, corner: Corner, mean: Look, seen: Foresight | None) -> Look:
    """The bounding look with the larger of the basis's growth and the upper 95 % of what was
    measured, where that is faster than the basis explains. Larger by the rate of today's size."""
    if seen is None or not seen.grew_faster or seen.outlook.surprise is None:
        return look
    factor = seen.outlook.surprise.factor
    if factor is None or not look.cycles or corner.broken is not None:
        return look
    scaled = Scaled(mean.growth, factor)
    blocks = blocks_for(look, corner)
    measured, basis = (
        np.max(rates(corner.kind, corner.x, corner.body, law, blocks))
        for law in (scaled, look.growth)
    )
    return replace(look, growth=scaled) if measured > basis else look


def _faster(case: Case, found: Outlook) -> tuple[bool | None, str]:
    """Whether growth is faster than the basis explains, and how it lies, in words."""
    if found.surprise is None:
        why = found.why_not or "fewer than two sizes can be compared"
        return None, f"not judged: {why}"
    if case.criteria.surprise is None:
        return None, "not judged: criteria.surprise is missing"
    if found.surprise.probability < case.criteria.surprise:
        return True, found.surprise.words()
    return False, (
        "as the basis explains: on it, "
        f"{chance(found.surprise.probability)} cracks would have grown at least this much"
    )


def _ahead(case: Case, found: Outlook, growth: str) -> Ahead:
    target, one = case.criteria.failure_probability, found.forecast
    if one is None:
        return Ahead(None, found.why_not, growth)
    if target is None:
        return Ahead(None, "criteria.failure_probability is missing", growth)
    if target < one.smallest_probability:
        why = (
            f"not resolved: the target is {chance(target)}, and the smallest probability that "
            f"{one.effective:.0f} effective samples resolve is {chance(one.smallest_probability)}"
        )
        return Ahead(None, why, growth)
    remaining = float(one.quantiles(np.array([target]))[0])
    if not np.isfinite(remaining):
        return Ahead(None, "the crack does not grow to its end with this probability", growth)
    return Ahead(remaining, None, growth)


def _failing(case: Case, one: Forecast | None) -> str | None:
    """Row 1: the probability of having failed by the date of the assessment, in words."""
    target = case.criteria.failure_probability
    if one is None or target is None or target < one.smallest_probability:
        return None
    used = 0.0
    if case.as_of_at is not None and case.usage.at is not None:
        used = case.as_of_at - case.usage.at
    probability = float(one.probability_by(np.array([used]))[0])
    if probability < target:
        return None
    return (
        f"The probability of failure is already {chance(probability)}, at or above the target of "
        f"{chance(target)}."
    )
