"""Giving a person a role at a site, and ending it."""

import uuid
from typing import Any

from django.db import IntegrityError, transaction

from logbook import access, clock
from logbook.errors import conflict, invalid, not_found, not_permitted
from logbook.journal import append
from logbook.models import Membership, Person, Role, Site

GRANTED = "grant-role"
ENDED = "end-role"


def grant_role(by: Person, site: Site, person_pk: Any, role: str) -> Membership:
    """An administrator grants; nobody grants a role to themselves, nor mixes keeping with deciding.

    An administrator of a site does not sign there, so the two roles exclude each other.
    """
    access.require(by, site, "administer")
    person = Person.objects.filter(pk=person_pk).first()
    if person is None:
        raise not_found("person")
    if role not in Role.values:
        raise invalid("No such role.", {"role": [f"Choose one of {', '.join(Role.values)}."]})
    if person.pk == by.pk:
        raise not_permitted("Nobody grants a role to themselves.")
    apart = {Role.ADMINISTRATOR: Role.SIGNATORY, Role.SIGNATORY: Role.ADMINISTRATOR}
    if role in apart and apart[Role(role)] in access.roles_at(person, site):
        raise not_permitted("An administrator of a site does not sign there.")
    act = uuid.uuid4()
    try:
        with transaction.atomic():
            made = Membership.objects.create(person=person, site=site, role=role)
            append(
                GRANTED,
                {"membership": made.pk, "person": person.pk, "role": role},
                act=act,
                by=by,
                site=site,
                names={"person": str(person)},
            )
    except IntegrityError:
        raise conflict("taken", f"{person} is {role} here already.") from None
    return made


def end_role(by: Person, site: Site, membership_pk: Any) -> Membership:
    """End a role; what the person did under it stands."""
    access.require(by, site, "administer")
    made = Membership.objects.filter(pk=membership_pk, site=site, ended_at__isnull=True).first()
    if made is None:
        raise not_found("role")
    if made.person_id == by.pk:
        raise not_permitted("Nobody ends their own role; ask another administrator.")
    act = uuid.uuid4()
    with transaction.atomic():
        made.ended_at = clock.now()
        made.save(update_fields=["ended_at"])
        append(ENDED, {"membership": made.pk, "role": made.role}, act=act, by=by, site=site)
    return made
