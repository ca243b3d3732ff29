"""Row 2 of the table: everything that an engineer has to settle first, each in a sentence."""

import math
from collections.abc import Iterator

import numpy as np

from assessment.document.case import Case, Look, Sizing


def needs(case: Case) -> tuple[str, ...]:
    """What the document lacks, what fell short at the look, what contradicts the history, what is
    overdue. Ranges and the computation itself are added by the procedure."""
    found = [missing.sentence() for missing in case.missing]
    found.extend(f"The last look fell short: {short}" for short in case.shortfalls)
    found.extend(_weld_without_residual_stress(case))
    found.extend(_smaller(case))
    found.extend(_longer_than_the_front(case))
    found.extend(_overdue(case))
    return tuple(found)


def _weld_without_residual_stress(case: Case) -> Iterator[str]:
    """A weld that nobody heat treated holds residual stress, whatever the entry says."""
    as_welded = case.body.get("weld_condition") == "as-welded"
    if as_welded and case.loading.residual_said is not None and not case.loading.residual:
        yield (
            "loading.residual: the weld is as welded and its residual stress is stated as nil "
            f"({case.loading.residual_said}). Give the stress or its level, or correct the weld "
            "condition."
        )


def _smaller(case: Case) -> Iterator[str]:
    """A size smaller than one measured before, by more than the sizing error of the two."""
    crack = case.crack
    if not crack.found or crack.why_smaller is not None:
        return
    for name, now in (("depth", crack.depth), ("length", crack.length)):
        if now is None or (name == "depth" and crack.depth_basis != "measured"):
            continue
        earlier = [look for look in case.history if getattr(look, name) is not None]
        largest = max(earlier, key=lambda look: float(getattr(look, name)), default=None)
        if largest is None:
            continue
        before = float(getattr(largest, name))
        if before - now > _error(case, largest, name):
            yield (
                f"crack.why_smaller: the {name} of {now * 1e3:.4g} mm is smaller than the "
                f"{before * 1e3:.4g} mm of {largest.on} by more than the sizing error, and no "
                "reason is stated."
            )


def _longer_than_the_front(case: Case) -> Iterator[str]:
    """A kind that assumes its front knows one length for each depth: a longer crack has the
    higher stress intensity, which the published factor does not give."""
    crack = case.crack
    if crack.length is None or "length_mm" not in crack.kind.optional_sizes:
        return
    x = crack.kind.front(crack.depth, crack.length, case.body)
    assumed = float(np.asarray(crack.kind.sizes_of(x, case.body)[1]))
    deviations = case.criteria.size_confidence_sd or 0.0
    if crack.length - deviations * _sd(crack.sizing, "length") > assumed:
        yield (
            f"crack.length_mm: the crack is {crack.length * 1e3:.4g} mm long, and the front that "
            f"the published factor assumes for its depth is {assumed * 1e3:.4g} mm long."
        )


def _error(case: Case, look: Look, name: str) -> float:
    """The sizing error of a difference; nil where the document gives none."""
    deviations = case.criteria.size_confidence_sd or 0.0
    return deviations * math.hypot(_sd(case.crack.sizing, name), _sd(look.sizing, name))


def _sd(sizing: Sizing | None, name: str) -> float:
    if sizing is None:
        return 0.0
    return sizing.depth_sd if name == "depth" else sizing.length_sd


def _overdue(case: Case) -> Iterator[str]:
    previous = case.previous
    if previous is None:
        return
    until_on, until_at = previous.until_on, previous.until_at
    if until_on is not None and case.as_of_on is not None and case.as_of_on > until_on:
        yield f"The date in force, {until_on}, had passed by {case.as_of_on} with no deferral."
    if until_at is not None and case.as_of_at is not None and case.as_of_at > until_at:
        yield (
            f"The counter in force, {until_at:.10g}, had passed at {case.as_of_at:.10g} with no "
            "deferral."
        )
