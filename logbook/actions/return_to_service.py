"""After a repair, exchange or removal: a signatory returns the part to service."""

import uuid
from typing import Any

from django.db import transaction
from django.db.models import Q
from django.http import HttpRequest

from logbook import access, clock
from logbook.actions import ask, standing
from logbook.actions.fields import needed
from logbook.actions.password import confirm_password
from logbook.cases.text import digest as text_digest
from logbook.errors import conflict, not_permitted
from logbook.journal import append, canonical
from logbook.models import Component, Crack, Person, Repair, ReturnToService, What

KIND = "return-to-service"


def shown_text(repair: Repair) -> str:
    """Exactly what the signature covers."""
    return canonical.text(
        {
            "repair": repair.entry_number,
            "location": str(repair.location),
            "crack": repair.crack.number if repair.crack else None,
            "sort": str(repair.sort),
            "welded": repair.welded,
            "what": repair.what,
            "done_by": repair.done_by,
            "work_order": repair.work_order,
            "done_on": repair.done_on,
            "counter": repair.counter,
            "inspection_after": repair.inspection_after,
            "closes": repair.closes,
            "start_depth_mm": repair.start_depth_mm,
            "start_length_mm": repair.start_length_mm,
            "start_source": repair.start_source,
        }
    )


def shown_digest(repair: Repair) -> str:
    return text_digest(shown_text(repair))


def return_to_service(
    by: Person,
    repair_pk: Any,
    *,
    grounds: str,
    licence_pk: Any,
    password: str,
    digest: str,
    request: HttpRequest | None = None,
) -> ReturnToService:
    """Two people: who recorded the repair does not return it. Cracks that it closes are closed."""
    repair = access.repair_for(by, repair_pk, "sign")
    site = repair.location.component.site
    said = needed({"grounds": grounds}, {"grounds": "State your grounds."})
    if repair.author_id == by.pk:
        raise not_permitted("You recorded the repair: someone else has to return the part.")
    licence = access.licence_for(by, licence_pk, clock.today(site.time_zone), site)
    confirm_password(by, password, request)
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=repair.location.component_id)
        if hasattr(repair, "return_to_service"):
            raise conflict("returned", "This was signed already.")
        _must_be_newest(repair)
        if digest != shown_digest(repair):
            raise conflict(
                "not-what-was-shown", "What you saw is not what the book says now. Open it again."
            )
        made = ReturnToService.objects.create(
            leaf_id=act,
            repair=repair,
            signatory=by,
            licence=licence,
            shown_digest=digest,
            at=clock.now(),
            **said,
        )
        touched = _close(repair)
        append(
            KIND,
            {
                "return": made.pk,
                "repair": repair.pk,
                "licence": str(licence),
                "closed": [c.number for c in touched if c is not None and c.closed_at],
                **said,
            },
            act=act,
            by=by,
            site=site,
            because_of=[repair.leaf_id],
        )
        for crack in dict.fromkeys([*touched, None]):
            standing.refresh(repair.location, crack)
        if repair.closes and not repair.location.cracks.filter(closed_at__isnull=True).exists():
            # The place stands for itself again, and nothing from before the work counts.
            ask.for_assessment(repair.location, None, act)
    return made


def _must_be_newest(repair: Repair) -> None:
    """Refuse where a crack was seen here after the work was written down, or other work was."""
    later = repair.location.findings.filter(
        what=What.CRACK, leaf__index__gt=repair.leaf.index, strike_out__isnull=True
    )
    works = repair.location.repairs.filter(leaf__index__gt=repair.leaf.index)
    if repair.sort == Repair.Sort.REPAIR and repair.crack is not None:
        later = later.filter(crack=repair.crack)
        works = works.filter(Q(crack=repair.crack) | ~Q(sort=Repair.Sort.REPAIR))
    if later.exists() or works.exists():
        raise conflict(
            "newer",
            "The book has a crack seen here, or other work, since this was written down: it does "
            "not return the part. Write down what was done about that.",
        )


def _close(repair: Repair) -> list[Crack | None]:
    """Close what the repair closes; returns all whose standing changes."""
    if repair.sort == Repair.Sort.REPAIR:
        touched: list[Crack | None] = [repair.crack]
    else:
        touched = [None, *repair.location.cracks.filter(closed_at__isnull=True)]
    if repair.closes:
        for crack in touched:
            if crack is not None:
                crack.closed_at = clock.now()
                crack.closed_why = f"{repair.get_sort_display()}: {repair.what}"
                crack.save(update_fields=["closed_at", "closed_why"])
    return touched
