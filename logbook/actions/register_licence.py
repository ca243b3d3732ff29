"""The licence under which a person signs: registered, and revoked, as acts of their own."""

import datetime
import uuid
from typing import Any

from django.db import IntegrityError, transaction

from logbook import access, clock
from logbook.actions.fields import needed
from logbook.errors import conflict, invalid, not_found, not_permitted
from logbook.journal import append
from logbook.models import Licence, Person, Site

REGISTERED = "register-licence"
REVOKED = "revoke-licence"


def register_licence(
    by: Person,
    site: Site,
    person_pk: Any,
    *,
    body: str,
    number: str,
    discipline: str,
    valid_from: datetime.date,
    valid_to: datetime.date,
) -> Licence:
    """An administrator of a site where the person has a role enters what the paper says."""
    access.require(by, site, "administer")
    person = Person.objects.filter(pk=person_pk).first()
    if person is None or not access.roles_at(person, site):
        raise not_found("person at this site")
    if person.pk == by.pk:
        raise not_permitted("Nobody enters their own licence.")
    read = needed(
        {"body": body, "number": number, "discipline": discipline},
        {
            "body": "Say who granted it.",
            "number": "Give its number.",
            "discipline": "Say for which discipline.",
        },
    )
    if valid_to < valid_from:
        raise invalid("The dates are out of order.", {"valid_to": ["It ends before it begins."]})
    act = uuid.uuid4()
    try:
        with transaction.atomic():
            licence = Licence.objects.create(
                person=person, site=site, valid_from=valid_from, valid_to=valid_to, **read
            )
            append(
                REGISTERED,
                {
                    "licence": licence.pk,
                    "person": person.pk,
                    "valid_from": valid_from,
                    "valid_to": valid_to,
                    **read,
                },
                act=act,
                by=by,
                site=site,
                names={"person": str(person)},
            )
    except IntegrityError:
        raise conflict(
            "taken", "This licence is on the books already, with this first day."
        ) from None
    return licence


def revoke_licence(by: Person, site: Site, licence_pk: Any, why: str) -> Licence:
    """From now on nothing is signed under it; earlier signatures stand."""
    access.require(by, site, "administer")
    licence = Licence.objects.filter(pk=licence_pk, site=site, revoked_at__isnull=True).first()
    if licence is None:
        raise not_found("licence")
    said = needed({"why": why}, {"why": "Say why it is revoked."})
    act = uuid.uuid4()
    with transaction.atomic():
        licence.revoked_at = clock.now()
        licence.revoked_why = said["why"]
        licence.save(update_fields=["revoked_at", "revoked_why"])
        append(REVOKED, {"licence": licence.pk, **said}, act=act, by=by, site=site)
    return licence
