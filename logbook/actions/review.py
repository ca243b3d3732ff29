"""An engineer's word on a proposal: accepted as it is, or another verdict with stated grounds."""

import datetime
import math
import uuid
from decimal import Decimal

from django.db import transaction

from logbook import access, clock
from logbook.actions import standing
from logbook.actions.two_people import eases
from logbook.cases import rows, text
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import (
    Assessment,
    AssessmentAsked,
    Component,
    Person,
    Review,
    Verdict,
    strictness,
)

KIND = "review"


def review(
    by: Person,
    assessment_pk: object,
    decision: str,
    *,
    verdict: str | None = None,
    until_on: datetime.date | None = None,
    until_at: Decimal | None = None,
    limit: str = "",
    grounds: str = "",
) -> Review:
    """Accept a proposal (verdict, dates and limit are then the proposal's) or override it.

    Raises Refusal: not-permitted; "newer" (409) when the book knows more than this proposal;
    "invalid" with fields when an override lacks its verdict, grounds, limit or date.
    """
    assessment = access.assessment_for(by, assessment_pk, "engineer")
    if decision == Review.Decision.ACCEPT:
        values = _accepted(assessment)
    elif decision == Review.Decision.OVERRIDE:
        values = _overridden(assessment, verdict, until_on, until_at, limit)
    else:
        raise invalid("Accept or override.", {"decision": ["Choose one."]})
    _check_grounds(assessment, decision, values["verdict"], grounds)
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=assessment.location.component_id)
        must_be_newest(assessment)
        made = Review.objects.create(
            leaf_id=act,
            assessment=assessment,
            by=by,
            decision=decision,
            grounds=grounds.strip(),
            at=clock.now(),
            **values,
        )
        append(
            KIND,
            {
                "review": made.pk,
                "assessment": assessment.pk,
                "decision": decision,
                "grounds": grounds.strip(),
                **values,
            },
            act=act,
            by=by,
            site=assessment.location.component.site,
            because_of=[assessment.leaf_id],
        )
    return made


def must_be_newest(assessment: Assessment) -> None:
    """Refuse when an entry or a proposal is newer than what is decided on."""
    owed = AssessmentAsked.objects.filter(
        location=assessment.location, crack=assessment.crack
    ).exists()
    newest = standing.latest_assessment(assessment.location, assessment.crack)
    if owed or newest is None or newest.pk != assessment.pk:
        raise conflict(
            "newer",
            "The book has something newer on this crack than what you read. Open it again.",
        )


def _accepted(a: Assessment) -> dict[str, object]:
    return {
        "verdict": str(a.verdict),
        "until_on": a.until_on,
        "until_at": a.until_at,
        "limit": a.limit,
    }


def _overridden(
    a: Assessment,
    verdict: str | None,
    until_on: datetime.date | None,
    until_at: Decimal | None,
    limit: str,
) -> dict[str, object]:
    wrong: dict[str, list[str]] = {}
    if verdict not in Verdict.values:
        wrong["verdict"] = ["Choose the verdict."]
    stays = verdict in (Verdict.CONTINUE, Verdict.WATCH, Verdict.RESTRICT)
    if stays and until_on is None:
        wrong["until_on"] = ["Say until which day. A part in use is looked at again."]
    if until_on is not None and until_on < clock.today(a.location.component.site.time_zone):
        wrong["until_on"] = ["This day has passed."]
    rule_on, rule_at = _rule_one(a)
    if rule_on is not None and until_on is not None and until_on > rule_on:
        wrong["until_on"] = [f"The crack's life allows {rule_on:%-d %b %Y} at the latest."]
    if stays and until_at is None:
        until_at = a.until_at  # a counter that is left out is not thereby lifted
    if rule_at is not None and until_at is not None and until_at > rule_at:
        wrong["until_at"] = [f"The crack's life allows {rule_at:f} at the latest."]
    longest = _longest(a)
    if until_on is not None and longest is not None and until_on > longest:
        wrong["until_on"] = [
            f"The owner's longest interval allows {longest:%-d %b %Y} at the latest."
        ]
    if verdict == Verdict.RESTRICT and not limit.strip():
        wrong["limit"] = ["Name the limit, such as “up to 12 t”."]
    if verdict != Verdict.RESTRICT and limit.strip():
        wrong["limit"] = ["A limit goes with “restrict” alone; its sentence names it."]
    if wrong:
        raise invalid("The other verdict is not complete yet.", wrong)
    return {
        "verdict": str(verdict),
        "until_on": until_on,
        "until_at": until_at,
        "limit": limit.strip(),
    }


def _rule_one(a: Assessment) -> tuple[datetime.date | None, Decimal | None]:
    """Day and counter of the bounding life cut by its factor; None where it gives none."""
    if a.outcome_text is None:
        return None, None
    rules = text.read(a.outcome_text).get("rules") or [{}]
    on, at = rules[0].get("on"), rules[0].get("usage")
    return (
        None if on is None else datetime.date.fromisoformat(on),
        None if at is None else Decimal(at),
    )


def _longest(a: Assessment) -> datetime.date | None:
    """The last day that the owner's longest interval leaves; None where the basis gives none."""
    if a.basis is None:
        return None
    days = text.read(a.basis.body).get("criteria", {}).get("longest_interval_days")
    look = rows.last_look(a.location, a.crack)
    if days is None or look is None:
        return None
    return look.inspection.found_on + datetime.timedelta(days=math.floor(days))


def _check_grounds(a: Assessment, decision: str, verdict: object, grounds: str) -> None:
    if grounds.strip():
        return
    easier = strictness(str(verdict)) < strictness(a.verdict)
    in_force = standing.latest_disposition(a.location, a.crack)
    leaves = in_force is not None and eases(str(verdict), in_force.verdict)
    if decision == Review.Decision.OVERRIDE or easier or leaves:
        raise invalid(
            "State your grounds.",
            {"grounds": ["Say on what grounds; the record carries it word for word."]},
        )
