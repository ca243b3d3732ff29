"""Asking for the computation anew, with a reason: after a change of engine, say, or of the day."""

import uuid
from typing import Any

from django.db import transaction

from logbook import access
from logbook.actions import ask
from logbook.actions.fields import needed
from logbook.errors import invalid
from logbook.journal import append
from logbook.models import Component, Person

KIND = "reassess"


def reassess(by: Person, location_pk: Any, crack_pk: Any | None, *, why: str) -> uuid.UUID:
    """Ask for a new proposal for a place (crack None) or crack; gives the act.

    Until it is answered the part counts as not assessed, as after an entry.
    """
    location = access.location_for(by, location_pk, "engineer")
    crack = access.crack_for(by, crack_pk, "engineer") if crack_pk else None
    if crack is not None and crack.location_id != location.pk:
        raise invalid("This crack is at another place.", {"crack": ["Choose it at its place."]})
    if crack is not None and crack.closed_at is not None:
        raise invalid("This crack was closed.", {"crack": ["A closed crack is not assessed."]})
    if crack is None and not location.findings.exists():
        raise invalid("Nobody has looked here yet.", {"location": ["Log an inspection first."]})
    said = needed({"why": why}, {"why": "Say why it is assessed anew."})
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=location.component_id)
        append(
            KIND,
            {"location": location.pk, "crack": crack.pk if crack else None, **said},
            act=act,
            by=by,
            site=location.component.site,
        )
        ask.for_assessment(location, crack, act)
    return act
