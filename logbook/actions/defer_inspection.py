"""A later date for an inspection: asked by one person, approved by another under a licence.

It never passes what the forecast gives (rule 2), nor what the bounding life gives (rule 1): where
the forecast is not resolved, the bounding life alone is the strictest that is known.
"""

import datetime
import json
import uuid
from decimal import Decimal
from typing import Any

from django.db import transaction
from django.http import HttpRequest

from logbook import access, clock
from logbook.actions import standing
from logbook.actions.fields import needed
from logbook.actions.password import confirm_password
from logbook.actions.two_people import must_not_have_logged
from logbook.errors import conflict, invalid, not_permitted
from logbook.journal import append
from logbook.models import (
    AssessmentAsked,
    Component,
    Deferral,
    DeferralRequest,
    Disposition,
    Person,
)
from logbook.records.issue import issue, reserve_number

ASKED = "ask-deferral"
APPROVED = "approve-deferral"


def ask_deferral(
    by: Person,
    disposition_pk: Any,
    *,
    grounds: str,
    new_on: datetime.date,
    new_at: Decimal | None = None,
) -> DeferralRequest:
    d = access.disposition_for(by, disposition_pk, "engineer")
    said = needed({"grounds": grounds}, {"grounds": "Say why it has to wait."})
    _check(d, new_on, new_at)
    act = uuid.uuid4()
    with transaction.atomic():
        made = DeferralRequest.objects.create(
            leaf_id=act, disposition=d, by=by, new_on=new_on, new_at=new_at, at=clock.now(), **said
        )
        append(
            ASKED,
            {
                "request": made.pk,
                "disposition": d.pk,
                "new_on": new_on,
                "new_at": new_at,
                **said,
            },
            act=act,
            by=by,
            site=d.location.component.site,
            because_of=[d.leaf_id],
        )
    return made


def approve_deferral(
    by: Person,
    request_pk: Any,
    *,
    licence_pk: Any,
    password: str,
    request: HttpRequest | None = None,
) -> Deferral:
    asked = access.deferral_request_for(by, request_pk, "sign")
    d = asked.disposition
    site = d.location.component.site
    if asked.by_id == by.pk:
        raise not_permitted("You asked for it: someone else has to approve it.")
    must_not_have_logged(by, d.assessment)
    licence = access.licence_for(by, licence_pk, clock.today(site.time_zone), site)
    confirm_password(by, password, request)
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=d.location.component_id)
        _check(d, asked.new_on, asked.new_at)
        if hasattr(asked, "deferral"):
            raise conflict("approved", "This was approved already.")
        made = Deferral.objects.create(
            leaf_id=act,
            request=asked,
            disposition=d,
            by=by,
            licence=licence,
            new_on=asked.new_on,
            new_at=asked.new_at,
            at=clock.now(),
        )
        record = reserve_number(deferral=made)
        append(
            APPROVED,
            {
                "deferral": made.pk,
                "request": asked.pk,
                "disposition": d.pk,
                "new_on": made.new_on,
                "new_at": made.new_at,
                "licence": str(licence),
                "record": record.number,
            },
            act=act,
            by=by,
            site=site,
            because_of=[asked.leaf_id, d.leaf_id],
        )
        standing.refresh(d.location, d.crack)
    issue(record)
    return made


def _check(d: Disposition, new_on: datetime.date, new_at: Decimal | None) -> None:
    if standing.latest_disposition(d.location, d.crack) != d:
        raise conflict("newer", "A newer signed verdict exists. Open it again.")
    newest = standing.latest_assessment(d.location, d.crack)
    owed = AssessmentAsked.objects.filter(location=d.location, crack=d.crack).exists()
    if newest is None or owed or newest.leaf.index > d.leaf.index:
        raise conflict("newer", "A newer proposal exists. Decide on that first.")
    if d.until_on is None or new_on <= d.until_on:
        raise invalid("This is no later date.", {"new_on": ["Choose a day after the one set."]})
    latest_on, latest_at = _latest(d)
    if latest_on is None or new_on > latest_on:
        said = "none" if latest_on is None else f"{latest_on:%-d %b %Y}"
        raise invalid(
            "It cannot wait that long.",
            {"new_on": [f"The latest day that the crack's life allows: {said}."]},
        )
    if new_at is not None and latest_at is not None and new_at > latest_at:
        raise invalid(
            "It cannot wait that long.",
            {"new_at": [f"The highest counter that the crack's life allows: {latest_at}."]},
        )


def latest_day(d: Disposition) -> datetime.date | None:
    """The last day to which this look can be put off; None where it cannot be."""
    latest, _at = _latest(d)
    if latest is None or d.until_on is None or latest <= d.until_on:
        return None
    return latest


def _latest(d: Disposition) -> tuple[datetime.date | None, Decimal | None]:
    """The earlier day and counter of rules 1 and 2 in the outcome that was signed; None where
    rule 1 gives none."""
    if d.assessment.outcome_text is None:
        return None, None
    outcome = json.loads(d.assessment.outcome_text, parse_float=Decimal)
    life, forecast = outcome["rules"][:2]
    days = [datetime.date.fromisoformat(one["on"]) for one in (life, forecast) if one.get("on")]
    counters = [Decimal(one["usage"]) for one in (life, forecast) if one.get("usage") is not None]
    return (
        min(days) if life.get("on") else None,
        min(counters) if life.get("usage") is not None else None,
    )
