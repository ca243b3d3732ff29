"""Whether an unsigned "continue" or "watch" may be acted on at a site: the owner's word, signed."""

import uuid
from typing import Any

from django.db import transaction
from django.http import HttpRequest

from logbook import access, clock
from logbook.actions import standing
from logbook.actions.fields import needed
from logbook.actions.password import confirm_password
from logbook.journal import append
from logbook.models import Location, Person, Site, Standing, UnsignedPolicy

KIND = "set-unsigned-policy"


def set_unsigned_policy(
    by: Person,
    site: Site,
    *,
    allowed: bool,
    grounds: str,
    licence_pk: Any,
    password: str,
    request: HttpRequest | None = None,
) -> UnsignedPolicy:
    access.require(by, site, "sign")
    said = needed({"grounds": grounds}, {"grounds": "Say on what grounds."})
    licence = access.licence_for(by, licence_pk, clock.today(site.time_zone), site)
    confirm_password(by, password, request)
    act = uuid.uuid4()
    with transaction.atomic():
        site = Site.objects.select_for_update().get(pk=site.pk)
        made = UnsignedPolicy.objects.create(
            leaf_id=act,
            site=site,
            allowed=allowed,
            signatory=by,
            licence=licence,
            at=clock.now(),
            **said,
        )
        site.unsigned_may_be_acted_on = allowed
        site.save(update_fields=["unsigned_may_be_acted_on"])
        append(
            KIND,
            {"policy": made.pk, "allowed": allowed, "licence": str(licence), **said},
            act=act,
            by=by,
            site=site,
        )
        _refresh_all(site)
    return made


def _refresh_all(site: Site) -> None:
    for row in Standing.objects.filter(site=site).select_related("crack"):
        location = Location.objects.select_related("component__site").get(pk=row.location_id)
        standing.refresh(location, row.crack)
