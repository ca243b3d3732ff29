"""Tablets are registered and revoked, and the site says how long they keep its data."""

import uuid
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.entry import text
from logbook.errors import Refusal, conflict, invalid, not_found
from logbook.journal import append
from logbook.models import Device, Person, Site, TabletRules

REGISTERED = "register-tablet"
REVOKED = "revoke-tablet"
RULES = "set-tablet-rules"


def register_tablet(by: Person, site: Site, *, key: Any, name: str) -> Device:
    """Let a tablet hold this site's data. Asked again for the same tablet, the first answer.

    Raises Refusal: "tablet-revoked" where it was revoked before.
    """
    access.require(by, site, "log")
    try:
        said = text.key(key)
        called = text.line(name, longest=60)
    except text.Unreadable as error:
        raise invalid("The tablet could not be registered.", {"name": [str(error)]}) from None
    if not called:
        raise invalid("The tablet has no name yet.", {"name": ["Give the tablet a name."]})
    act = uuid.uuid4()
    with transaction.atomic():
        Site.objects.select_for_update().get(pk=site.pk)
        there = Device.objects.filter(key=said, site=site).first()
        if there is not None:
            return live(there)
        made = Device.objects.create(
            key=said, site=site, name=called, registered_by=by, registered_at=clock.now()
        )
        append(
            REGISTERED,
            {"tablet": made.pk, "key": str(said), "name": called},
            act=act,
            by=by,
            site=site,
        )
    return made


def tablet_for(site: Site, key: Any) -> Device:
    """The tablet registered at the site, live or revoked. Raises Refusal "tablet-unknown"."""
    try:
        found = Device.objects.filter(key=text.key(key), site=site).first()
    except text.Unreadable:
        found = None
    if found is None:
        raise Refusal(
            "tablet-unknown", "This tablet is not registered. Register it first.", status=404
        )
    return found


def live(device: Device) -> Device:
    if device.revoked_at is not None:
        raise conflict(
            "tablet-revoked",
            f"The tablet “{device.name}” was revoked. It keeps no data of the site; what waits on "
            "it can still be handed in.",
        )
    return device


def revoke_tablet(by: Person, site: Site, device_pk: Any) -> Device:
    """A lost tablet: it gets no data any more and wipes what it holds at its next contact."""
    access.require(by, site, "administer")
    act = uuid.uuid4()
    with transaction.atomic():
        found = Device.objects.select_for_update().filter(pk=device_pk, site=site).first()
        if found is None:
            raise not_found("tablet")
        live(found)
        found.revoked_at = clock.now()
        found.save(update_fields=["revoked_at"])
        append(REVOKED, {"tablet": found.pk}, act=act, by=by, site=site)
    return found


def set_tablet_rules(by: Person, site: Site, *, keep_days: int, inches: bool) -> TabletRules:
    """After how many days without contact a tablet wipes what it holds; whether inches are used."""
    access.require(by, site, "administer")
    if not 1 <= keep_days <= 365:
        raise invalid(
            "Say how long a tablet keeps its data.", {"keep_days": ["Write 1 to 365 days."]}
        )
    act = uuid.uuid4()
    with transaction.atomic():
        made, _new = TabletRules.objects.update_or_create(
            site=site, defaults={"keep_days": keep_days, "inches": inches}
        )
        append(RULES, {"keep_days": keep_days, "inches": inches}, act=act, by=by, site=site)
    return made


def at_contact(device: Device, waiting: int | None) -> None:
    """What a tablet says of itself at each contact."""
    Device.objects.filter(pk=device.pk).update(seen_at=clock.now(), waiting=waiting)
