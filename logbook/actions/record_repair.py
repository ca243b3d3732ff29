"""What was done to the part: repair, exchange or removal. The part is held until its return is
signed."""

import datetime
import uuid
from decimal import Decimal
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.actions import ask, standing
from logbook.actions.fields import needed
from logbook.errors import invalid
from logbook.journal import append
from logbook.models import Component, Crack, Location, Person, Repair

KIND = "record-repair"
# A repair may be written down late, not years late.
LONGEST_LATE = datetime.timedelta(days=366)


def record_repair(
    by: Person,
    location_pk: Any,
    crack_pk: Any | None,
    *,
    sort: str,
    welded: bool,
    what: str,
    done_by: str,
    work_order: str,
    done_on: datetime.date,
    counter: Decimal,
    inspection_after: str,
    closes: bool,
    start_depth_mm: Decimal | None = None,
    start_length_mm: Decimal | None = None,
    start_source: str = "",
) -> Repair:
    """Record it. The crack is closed, or goes on with a new start: the size that the inspection
    after could have missed, with its source. An exchange or removal closes every crack there."""
    location = access.location_for(by, location_pk, "log")
    crack = access.crack_for(by, crack_pk, "log") if crack_pk else None
    read = needed(
        {
            "what": what,
            "done_by": done_by,
            "work_order": work_order,
            "inspection_after": inspection_after,
        },
        {
            "what": "Say what was done.",
            "done_by": "Say who did it.",
            "work_order": "Give the work order.",
            "inspection_after": "Say how it was looked at afterwards, and what was found.",
        },
    )
    _check(
        location,
        crack,
        sort,
        done_on,
        counter,
        closes,
        start_depth_mm,
        start_length_mm,
        start_source,
    )
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=location.component_id)
        made = Repair.objects.create(
            leaf_id=act,
            location=location,
            crack=crack,
            sort=sort,
            welded=welded,
            done_on=done_on,
            counter=counter,
            closes=closes,
            start_depth_mm=start_depth_mm,
            start_length_mm=start_length_mm,
            start_source=start_source.strip(),
            author=by,
            at=clock.now(),
            **read,
        )
        append(
            KIND,
            {
                "repair": made.pk,
                "location": location.pk,
                "crack": crack.pk if crack else None,
                "sort": sort,
                "welded": welded,
                "done_on": done_on,
                "counter": counter,
                "closes": closes,
                "start_depth_mm": start_depth_mm,
                "start_length_mm": start_length_mm,
                "start_source": made.start_source,
                **read,
            },
            act=act,
            by=by,
            site=location.component.site,
        )
        for touched in _touched(made):
            if not closes and touched is not None:
                ask.for_assessment(location, touched, act)
            standing.refresh(location, touched)
    return made


def _touched(repair: Repair) -> list[Crack | None]:
    if repair.sort == Repair.Sort.REPAIR:
        return [repair.crack]
    return [None, *repair.location.cracks.filter(closed_at__isnull=True)]


def _check(
    location: Location,
    crack: Crack | None,
    sort: str,
    done_on: datetime.date,
    counter: Decimal,
    closes: bool,
    depth: Decimal | None,
    length: Decimal | None,
    source: str,
) -> None:
    wrong: dict[str, list[str]] = {}
    last = standing.last_counter(location.component)
    if last is not None and counter < last and done_on >= _last_day(location.component):
        back = (
            f"The counter stood at {last.normalize():f} at the last look and cannot run back. "
            "If it was replaced, log a look that says so first."
        )
        wrong["counter"] = [back]
    if done_on < _last_day(location.component) - LONGEST_LATE:
        wrong["done_on"] = ["This day lies long before the last look. Check the year."]
    if sort != Repair.Sort.REPAIR and not closes:
        wrong["closes"] = ["What is exchanged or taken out goes on with no crack: say yes."]
    if sort == Repair.Sort.REPAIR and crack is None and _open_cracks(location):
        wrong["crack"] = ["There are open cracks here: write the repair down at the crack's page."]
    if sort not in Repair.Sort.values:
        wrong["sort"] = ["Say whether it was repaired, exchanged or removed."]
    if crack is not None and crack.location_id != location.pk:
        wrong["crack"] = ["This crack is at another place."]
    if crack is not None and crack.closed_at is not None:
        wrong["crack"] = ["This crack was closed already."]
    if done_on > clock.today(location.component.site.time_zone):
        wrong["done_on"] = ["This day is in the future."]
    if closes and (depth is not None or length is not None):
        wrong["closes"] = ["A closed crack has no new start. Keep one of the two."]
    if not closes:
        if depth is None and length is None:
            wrong["start_length_mm"] = [
                "Say what size the inspection after could have missed; the crack goes on from it."
            ]
        if not source.strip():
            wrong["start_source"] = ["Say where this size comes from."]
    if wrong:
        raise invalid("Some of this does not fit yet.", wrong)


def _last_day(component: Component) -> datetime.date:
    """The day of the newest look; the beginning of time where nobody has looked."""
    found = component.inspections.order_by("-found_on").values_list("found_on", flat=True).first()
    return found or datetime.date.min + LONGEST_LATE


def _open_cracks(location: Location) -> bool:
    return location.cracks.filter(closed_at__isnull=True).exists()
