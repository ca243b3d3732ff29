"""Answering what an entry asked: the second of two transactions.

The case is frozen, the computation runs outside any transaction, and the proposal is written if
the case still reads the same. Whatever dies in between leaves ``AssessmentAsked`` standing: the
part counts as not assessed, and the sweep asks again.
"""

import datetime
import json
import logging
import math
import uuid
from dataclasses import dataclass
from decimal import ROUND_FLOOR, Decimal
from typing import Any

from django.db import transaction
from django.db.models import F

import assessment
from logbook import clock
from logbook.actions import standing
from logbook.actions.working_day import on_or_before
from logbook.cases import rows
from logbook.cases.freeze import FrozenCase, freeze
from logbook.cases.text import digest
from logbook.journal import append
from logbook.models import Assessment, AssessmentAsked, Component, Crack, Location, Verdict

KIND = "propose"
# A computation that failed this often is answered with "refer" and its reason.
MOST_TRIES = 3
ENGINE = f"{assessment.ENGINE['name']} {assessment.ENGINE['version']}"

log = logging.getLogger(__name__)


@dataclass(frozen=True)
class _Answer:
    verdict: str
    reasons: list[str]
    outcome_text: str | None = None
    until_on: datetime.date | None = None
    until_at: Decimal | None = None
    governed_by: str = ""
    limit: str = ""
    stop_depth_mm: float | None = None
    stop_length_mm: float | None = None
    gave_up: bool = False


def propose(location_id: int, crack_id: int | None) -> Assessment | None:
    """Work out and write the proposal that is owed for a place (crack None) or crack.

    None where nothing is owed, or where the computation failed and is tried again later. Running
    it twice, or twice at once, writes one proposal.
    """
    location = Location.objects.select_related("component__site").get(pk=location_id)
    crack = Crack.objects.get(pk=crack_id) if crack_id is not None else None
    for _ in range(3):
        asked = list(AssessmentAsked.objects.filter(location=location, crack=crack).order_by("pk"))
        if not asked:
            return None
        frozen = _nothing_frozen(location)
        try:
            frozen = freeze(location, crack)
            answer = _compute(frozen, location)
        except Exception as error:  # noqa: BLE001 (kept, shown and tried again: never swallowed)
            log.exception("assessment of location %s crack %s failed", location_id, crack_id)
            if not _failed(asked, error):
                return None
            answer = _gave_up()
        written = _write(location, crack, frozen, answer)
        if written is not None:
            return written
    return None  # the book keeps changing under us; the sweep comes back


def _nothing_frozen(location: Location) -> FrozenCase:
    return FrozenCase(rows.adopted_basis(location), "", "", ())


def _still_reads(
    location: Location, crack: Crack | None, frozen: FrozenCase, answer: _Answer
) -> bool:
    """Does the book still ask what was answered? What could not even be frozen is referred, and
    an entry that comes beside it asks again."""
    could_not = answer.gave_up and not frozen.text
    return could_not or freeze(location, crack) == frozen


def _failed(asked: list[AssessmentAsked], error: Exception) -> bool:
    """Count a failure; True once it is time to give up and refer."""
    rows = AssessmentAsked.objects.filter(pk__in=[a.pk for a in asked])
    rows.update(tries=F("tries") + 1, last_error=f"{type(error).__name__}: {error}"[:2000])
    return max((a.tries for a in asked), default=0) + 1 >= MOST_TRIES


def _gave_up() -> _Answer:
    return _Answer(
        Verdict.REFER,
        ["The computation did not finish. An engineer decides."],
        gave_up=True,
    )


def _compute(frozen: FrozenCase, location: Location) -> _Answer:
    if frozen.missing:
        return _Answer(Verdict.REFER, list(frozen.missing))
    try:
        outcome = assessment.assess(frozen.text)
    except assessment.CaseRefused as refused:
        return _Answer(Verdict.REFER, [f"{refused.where}: {refused.why}"])
    return _read(outcome, location)


def _read(outcome: dict[str, Any], location: Location) -> _Answer:
    proposed = outcome["disposition"]
    next_look = outcome.get("next_inspection") or {}
    stop = outcome.get("stop_size") or {}
    # What stands still has no date to wait for: with one, the part could be used until then.
    stands_still = proposed["verdict"] in (Verdict.WITHDRAW, Verdict.REFER)
    waits = not (stands_still or proposed.get("before_return"))
    on = next_look.get("on") if waits else None
    return _Answer(
        verdict=proposed["verdict"],
        reasons=list(proposed["reasons"]),
        outcome_text=assessment.outcome_text(outcome),
        until_on=on_or_before(datetime.date.fromisoformat(on), location.component.site)
        if on
        else None,
        until_at=_counter(next_look.get("usage")) if waits else None,
        governed_by=next_look.get("governed_by") or "",
        limit=_limit(outcome),
        stop_depth_mm=stop.get("depth_mm"),
        stop_length_mm=stop.get("length_mm"),
    )


def _counter(value: float | None) -> Decimal | None:
    """A whole reading, rounded down: a look is never later than reckoned."""
    if value is None:
        return None
    return Decimal(repr(value)).quantize(Decimal(1), rounding=ROUND_FLOOR)


def _limit(outcome: dict[str, Any]) -> str:
    """The limit in words that a crew member reads; rounded down."""
    restriction = outcome.get("restriction")
    if not restriction:
        return ""
    # The same number as in binding.load_factor, which tells a lower limit from a higher.
    percent = math.floor(restriction["factor"] * 100)
    return f"{percent} % of the largest load"


def _write(
    location: Location, crack: Crack | None, frozen: FrozenCase, answer: _Answer
) -> Assessment | None:
    """Write the proposal if the case still reads the same; None if it does not."""
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=location.component_id)
        asked = list(AssessmentAsked.objects.filter(location=location, crack=crack).order_by("pk"))
        if not asked:
            return None  # answered beside us
        if not _still_reads(location, crack, frozen, answer):
            return None
        made = Assessment.objects.create(
            leaf_id=act,
            location=location,
            crack=crack,
            basis=frozen.basis,
            because_act=asked[-1].because_act,
            case_text=frozen.text or None,
            case_digest=frozen.digest,
            outcome_text=answer.outcome_text,
            outcome_digest=digest(answer.outcome_text) if answer.outcome_text else "",
            engine=ENGINE,
            verdict=answer.verdict,
            reasons=json.dumps(answer.reasons, ensure_ascii=False),
            until_on=answer.until_on,
            until_at=answer.until_at,
            governed_by=answer.governed_by,
            limit=answer.limit,
            stop_depth_mm=answer.stop_depth_mm,
            stop_length_mm=answer.stop_length_mm,
            in_book_at=clock.now(),
        )
        because = list(dict.fromkeys(a.because_act for a in asked))
        AssessmentAsked.objects.filter(pk__in=[a.pk for a in asked]).delete()
        append(
            KIND,
            content_of(made),
            act=act,
            by=None,
            site=location.component.site,
            because_of=because,
        )
        standing.refresh(location, crack)
    return made


def content_of(a: Assessment) -> dict[str, Any]:
    """What the leaf says of a proposal: everything, case and outcome as their exact texts."""
    return {
        "assessment": a.pk,
        "location": a.location_id,
        "crack": a.crack_id,
        "basis": a.basis_id,
        "case": a.case_text,
        "case_digest": a.case_digest,
        "outcome": a.outcome_text,
        "outcome_digest": a.outcome_digest,
        "engine": a.engine,
        "verdict": str(a.verdict),
        "reasons": json.loads(a.reasons),
        "until_on": a.until_on,
        "until_at": a.until_at,
        "governed_by": a.governed_by,
        "limit": a.limit,
        "stop_depth_mm": _exact(a.stop_depth_mm),
        "stop_length_mm": _exact(a.stop_length_mm),
    }


def _exact(value: float | None) -> str | None:
    return None if value is None else repr(value)
