"""What binds now, for each place and crack: the only writer of Standing.

How it comes about (decisions in words, strictest first):

1. An assessment is owed (an entry was written and nothing answered it yet): not assessed, treated
   as withdraw.
2. Nothing is signed: the newest proposal. Restrict, repair, refer and withdraw bind at once;
   continue and watch only where the owner has allowed, by signature, to act on an unsigned one.
3. Signed, and nothing newer: what was signed, until its date or usage, or the deferral's.
4. Signed, and a newer proposal that is stricter or earlier: the stricter verdict and the earlier
   date bind at once, shown as proposed. An easier or later one changes nothing until signed.

The row does not know what day it is: ``reading`` judges lapse against today and the counter.
"""

import datetime
import json
from dataclasses import dataclass
from decimal import Decimal
from typing import Any

from logbook import clock
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
BINDS_UNSIGNED = frozenset({Verdict.RESTRICT, Verdict.REPAIR, Verdict.REFER, Verdict.WITHDRAW})


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
    """A repair whose return to service nobody has signed."""
    return (
        Repair.objects.filter(location=location, crack=crack, return_to_service__isnull=True)
        .order_by("-leaf__index")
        .first()
    )


def _what(location: Location, crack: Crack | None) -> _What | None:
    if crack is not None and crack.closed_at is not None and not _open_repair(location, crack):
        return None
    if crack is None and location.cracks.filter(closed_at__isnull=True).exists():
        return None  # the open cracks stand for their place
    asked = AssessmentAsked.objects.filter(location=location, crack=crack).exists()
    assessment = latest_assessment(location, crack)
    disposition = latest_disposition(location, crack)
    if asked:
        return _What(
            State.NOT_ASSESSED,
            Verdict.WITHDRAW,
            True,
            assessment=assessment,
            disposition=disposition,
        )
    if crack is None:
        work = rows_of_case.newest_work(location)
        if work is not None and work.sort == Repair.Sort.REMOVAL and not _looked_since(work):
            return None  # the part is gone
        if work is not None and disposition and disposition.leaf.index < work.leaf.index:
            # What was signed before the work says nothing of the part as it is now.
            disposition = None
    if assessment is None:
        return None
    what = (
        _unsigned(assessment, location.component.site)
        if disposition is None
        else _signed(assessment, disposition)
    )
    if _open_repair(location, crack) is not None:
        return _What(**{**what.__dict__, "held": True})
    return what


def _looked_since(work: Repair) -> bool:
    return work.location.findings.filter(
        leaf__index__gt=work.leaf.index, strike_out__isnull=True
    ).exists()


def _unsigned(a: Assessment, site: Site) -> _What:
    binds = a.verdict in BINDS_UNSIGNED
    allowed = site.unsigned_may_be_acted_on is True
    return _What(
        State.BINDING if binds else State.PROPOSED,
        a.verdict,
        held_by_verdict(a.verdict, a.until_on, a.until_at, confirmed=False)
        if binds
        else not allowed,
        a.until_on,
        a.until_at,
        a.limit,
        assessment=a,
    )


def _signed(a: Assessment, d: Disposition) -> _What:
    deferral = d.deferrals.order_by("-leaf__index").first()
    due_on = deferral.new_on if deferral is not None else d.until_on
    due_at = deferral.new_at if deferral is not None and deferral.new_at else d.until_at
    until_at = d.until_at
    if rows_of_case.on_an_older_counter(d.location.component, d.leaf.index):
        # A reading of the counter that was taken out says nothing on the new one: the newer
        # proposal's reading binds, or without one its verdict.
        due_at = until_at = None
    confirmed = hasattr(d, "restriction_confirmed")
    newer = a.leaf.index > d.leaf.index
    stricter = newer and (strictness(a.verdict) > strictness(d.verdict) or _lower_limit(a, d))
    earlier = newer and (_before(a.until_on, d.until_on) or _before(a.until_at, until_at))
    if not (stricter or earlier):
        return _What(
            State.IN_FORCE,
            d.verdict,
            held_by_verdict(d.verdict, due_on, due_at, confirmed),
            due_on,
            due_at,
            d.limit,
            assessment=a,
            disposition=d,
        )
    verdict = a.verdict if stricter else d.verdict
    return _What(
        State.BINDING,
        verdict,
        held_by_verdict(verdict, a.until_on, a.until_at, confirmed and not stricter),
        _earlier(a.until_on, due_on),
        _earlier(a.until_at, due_at),
        a.limit if stricter else d.limit,
        assessment=a,
        disposition=d,
    )


def _lower_limit(a: Assessment, d: Disposition) -> bool:
    """A newer restriction to less load than the signed one. A limit that an engineer wrote in
    words of their own is not known as a number, so that any newer one counts as lower."""
    if a.verdict != Verdict.RESTRICT or d.verdict != Verdict.RESTRICT or a.limit == d.limit:
        return False
    new, old = load_factor(a), load_factor(d.assessment)
    return new is None or old is None or d.limit != d.assessment.limit or new < old


def load_factor(a: Assessment) -> float | None:
    """The part of the largest load that a restriction leaves; None where the outcome has none."""
    if a.outcome_text is None:
        return None
    restriction = json.loads(a.outcome_text).get("restriction")
    return None if restriction is None else float(restriction["factor"])


def held_by_verdict(
    verdict: str,
    until_on: datetime.date | None,
    until_at: Decimal | None,
    confirmed: bool,
) -> bool:
    """Must the part stand still? A repair with a date may wait until then; a restriction counts
    once its limiter or tag is confirmed."""
    if verdict in (Verdict.REFER, Verdict.WITHDRAW):
        return True
    if verdict == Verdict.REPAIR:
        return until_on is None and until_at is None
    if verdict == Verdict.RESTRICT:
        return not confirmed
    return False


def _before(new: Any, old: Any) -> bool:
    """Earlier than what is in force; a limit where there was none is earlier too."""
    if new is None:
        return False
    return bool(old is None or new < old)


def _earlier(a: Any, b: Any) -> Any:
    given = [x for x in (a, b) if x is not None]
    return min(given) if given else None


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
