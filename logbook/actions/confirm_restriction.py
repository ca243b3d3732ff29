"""The limiter is set or the tag hangs: from now on the restricted part may work."""

import uuid
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.actions import standing
from logbook.actions.fields import needed
from logbook.errors import conflict
from logbook.journal import append
from logbook.models import Component, Person, RestrictionConfirmed, Verdict

KIND = "confirm-restriction"


def confirm_restriction(by: Person, disposition_pk: Any, how: str) -> RestrictionConfirmed:
    d = access.disposition_for(by, disposition_pk, "log")
    said = needed({"how": how}, {"how": "Say how: limiter set to …, or the tag's number."})
    if d.verdict != Verdict.RESTRICT:
        raise conflict("no-restriction", "This verdict restricts nothing.")
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=d.location.component_id)
        if hasattr(d, "restriction_confirmed"):
            raise conflict("confirmed", "This was confirmed already.")
        if standing.latest_disposition(d.location, d.crack) != d:
            raise conflict("newer", "A newer signed verdict exists. Open it again.")
        made = RestrictionConfirmed.objects.create(
            leaf_id=act, disposition=d, by=by, at=clock.now(), **said
        )
        append(
            KIND,
            {"confirmed": made.pk, "disposition": d.pk, **said},
            act=act,
            by=by,
            site=d.location.component.site,
            because_of=[d.leaf_id],
        )
        standing.refresh(d.location, d.crack)
    return made
