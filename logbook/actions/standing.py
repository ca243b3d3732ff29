"""What binds now, for each place and crack: the only writer of Standing.

How it comes about (decisions in words, strictest first):

1. An assessment is owed (an entry was written and nothing answered it yet): not assessed, treated
   as withdraw.
2. Nothing is signed: the newest proposal. Restrict, repair, refer and withdraw bind at once;
   continue and watch only where the owner has allowed, by signature, to act on an unsigned one.
3. Signed, and nothing newer: what was signed, until its date or usage, or the deferral's.
4. Signed, and proposals since: the strictest of all, the lowest limit and the earliest date bind
   at once, shown as proposed (binding.py). An easier or later one changes nothing until signed.

The row does not know what day it is: ``reading`` judges lapse against today and the counter.
"""

import datetime
from collections.abc import Callable
from dataclasses import dataclass, replace
from decimal import Decimal

from django.db.models import Q

from logbook import clock
from logbook.actions.binding import Binding, Claim, claim_of, fold, load_factor
from logbook.cases import rows as rows_of_case
from logbook.models import (
    Assessment,
    AssessmentAsked,
    Component,
    Crack,
    Disposition,
    Location,
    Repair,
    Site,
    Standing,
    Verdict,
    strictness,
)

State = Standing.State


@dataclass(frozen=True)
class _What:
    state: str
    verdict: str
    held: bool
    due_on: datetime.date | None = None
    due_at: Decimal | None = None
    limit: str = ""
    assessment: Assessment | None = None
    disposition: Disposition | None = None


def refresh(location: Location, crack: Crack | None) -> Standing | None:
    """Work out and store what binds for one place (crack None) or crack. Inside a transaction,
    after the leaf of the act: what is newer is told by the leaves.

    None where nothing stands any more: a closed crack that was returned to service, a place that
    nobody has looked at, or one whose open cracks stand for it.
    """
    if crack is not None:
        # A computation may have run while the crack was closed.
        crack = Crack.objects.get(pk=crack.pk)
    rows = Standing.objects.filter(location=location, crack=crack)
    what = _what(location, crack)
    if what is None:
        rows.delete()
        return None
    values = {
        "site": location.component.site,
        "state": what.state,
        "verdict": what.verdict,
        "held": what.held,
        "due_on": what.due_on,
        "due_at": what.due_at,
        "limit": what.limit,
        "assessment": what.assessment,
        "disposition": what.disposition,
        "last_finding": rows_of_case.last_look(location, crack),
        "counter": last_counter(location.component),
    }
    standing = rows.first()
    if standing is None:
        return Standing.objects.create(location=location, crack=crack, since=clock.now(), **values)
    changed = any(
        getattr(standing, name) != values[name] for name in ("state", "verdict", "held", "limit")
    )
    for name, value in values.items():
        setattr(standing, name, value)
    if changed:
        standing.since = clock.now()
    standing.save()
    return standing


def refresh_counter(component: Component) -> None:
    """A new counter reading counts for every place of the component."""
    counter = last_counter(component)
    Standing.objects.filter(location__component=component).update(counter=counter)


def rebuild() -> int:
    """Work out every row anew from what is protected; returns how many stand."""
    keys = set(Assessment.objects.values_list("location", "crack"))
    keys |= set(AssessmentAsked.objects.values_list("location", "crack"))
    keys |= set(Standing.objects.values_list("location", "crack"))
    count = 0
    for location_id, crack_id in sorted(keys, key=lambda k: (k[0], k[1] or 0)):
        location = Location.objects.select_related("component__site").get(pk=location_id)
        crack = Crack.objects.get(pk=crack_id) if crack_id else None
        count += refresh(location, crack) is not None
    return count


def latest_assessment(location: Location, crack: Crack | None) -> Assessment | None:
    return (
        Assessment.objects.filter(location=location, crack=crack)
        .select_related("leaf")
        .order_by("-leaf__index")
        .first()
    )


def latest_disposition(location: Location, crack: Crack | None) -> Disposition | None:
    return (
        Disposition.objects.filter(location=location, crack=crack)
        .select_related("leaf", "assessment")
        .order_by("-leaf__index")
        .first()
    )


def last_counter(component: Component) -> Decimal | None:
    """The newest reading on the component's counter of a visit that still counts."""
    found = rows_of_case.looks_that_count(component).order_by("-found_on", "-leaf__index").first()
    return None if found is None else found.counter


def _open_repair(location: Location, crack: Crack | None) -> Repair | None:
    """The newest work here whose return to service nobody has signed. An exchange or removal is
    work on every crack of its place."""
    whole = Q(sort__in=[Repair.Sort.EXCHANGE, Repair.Sort.REMOVAL])
    newest = (
        Repair.objects.filter(Q(crack=crack) | whole, location=location)
        .select_related("leaf", "return_to_service")
        .order_by("-leaf__index")
        .first()
    )
    return None if newest is None or hasattr(newest, "return_to_service") else newest


def _what(location: Location, crack: Crack | None) -> _What | None:
    if crack is not None and crack.closed_at is not None and not _open_repair(location, crack):
        return None
    if crack is None and location.cracks.filter(closed_at__isnull=True).exists():
        return None  # the open cracks stand for their place
    if crack is None and _taken_out(location):
        return None
    assessment = latest_assessment(location, crack)
    disposition = latest_disposition(location, crack)
    if AssessmentAsked.objects.filter(location=location, crack=crack).exists():
        return _What(
            State.NOT_ASSESSED,
            Verdict.WITHDRAW,
            True,
            assessment=assessment,
            disposition=disposition,
        )
    binds = what_binds(location, crack)
    if assessment is None or binds is None:
        return None
    what = _written(binds, assessment, location.component.site_id)
    if _open_repair(location, crack) is not None:
        return replace(what, held=True)
    return what


def _taken_out(location: Location) -> bool:
    """The part is gone, and nobody has looked at another in its place."""
    work = rows_of_case.newest_work(location)
    if work is None or work.sort != Repair.Sort.REMOVAL:
        return False
    return not rows_of_case.looked_since(work)


def what_binds(location: Location, crack: Crack | None) -> Binding | None:
    """The signature and all proposals since, folded; None where there is neither."""
    disposition = latest_disposition(location, crack)
    work = rows_of_case.newest_work(location) if crack is None else None
    # What was signed or proposed before the work says nothing of the part as it is now.
    start = -1 if work is None else work.leaf.index
    if disposition is not None and disposition.leaf.index < start:
        disposition = None
    if disposition is not None:
        start = disposition.leaf.index
    since = (
        Assessment.objects.filter(location=location, crack=crack, leaf__index__gt=start)
        .select_related("leaf")
        .order_by("leaf__index")
    )
    replaced = rows_of_case.counter_replaced(location.component)

    def counts(index: int) -> bool:
        return replaced is None or index >= replaced.leaf.index

    claims = [claim_of(one, counter_counts=counts(one.leaf.index)) for one in since]
    return fold(None if disposition is None else _signed(disposition, counts), claims)


def _signed(d: Disposition, counts: Callable[[int], bool]) -> Claim:
    """A signature as a claim: until its date and counter, or those of its deferral."""
    deferral = d.deferrals.select_related("leaf").order_by("-leaf__index").first()
    until_on = deferral.new_on if deferral is not None else d.until_on
    until_at = deferral.new_at if deferral is not None and deferral.new_at else d.until_at
    own_words = d.limit != d.assessment.limit
    return Claim(
        d.verdict,
        until_on,
        until_at if counts(d.leaf.index) else None,
        d.limit,
        None if own_words else load_factor(d.assessment),
        d.assessment,
        d,
        confirmed=hasattr(d, "restriction_confirmed"),
    )


def _written(binds: Binding, newest: Assessment, site_pk: int) -> _What:
    claim = binds.claim
    if binds.proposed:
        # Read anew: the policy may have changed while something was computed.
        allowed = Site.objects.get(pk=site_pk).unsigned_may_be_acted_on is True
        state, held = State.PROPOSED, not allowed
    else:
        state, held = State.IN_FORCE if binds.signed else State.BINDING, binds.held
    return _What(
        state,
        claim.verdict,
        held,
        binds.due_on,
        binds.due_at,
        binds.limit,
        assessment=newest,
        disposition=claim.disposition or latest_disposition(newest.location, newest.crack),
    )


@dataclass(frozen=True)
class Reading:
    """What a person sees today."""

    verdict: str
    state: str
    held: bool
    lapsed: bool
    overdue: bool
    due_on: datetime.date | None
    due_at: Decimal | None
    limit: str
    signed: bool


def reading(standing: Standing, today: datetime.date) -> Reading:
    """The standing as it reads today: past its date or usage it has lapsed, treated as refer."""
    overdue = (standing.due_on is not None and standing.due_on < today) or (
        standing.due_at is not None
        and standing.counter is not None
        and standing.counter >= standing.due_at
    )
    lapsed = overdue and strictness(standing.verdict) <= strictness(Verdict.REFER)
    return Reading(
        verdict=Verdict.REFER if lapsed else standing.verdict,
        state=standing.state,
        held=standing.held or lapsed,
        lapsed=lapsed,
        overdue=overdue,
        due_on=standing.due_on,
        due_at=standing.due_at,
        limit=standing.limit,
        signed=standing.state == State.IN_FORCE,
    )
