"""A new account. What the person may do is granted site by site."""

import uuid

from django.contrib.auth.password_validation import validate_password
from django.core.exceptions import ValidationError
from django.db import IntegrityError, transaction

from logbook import access
from logbook.actions.fields import needed
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import Person, Site

KIND = "register-person"


def register_person(
    by: Person, site: Site, *, username: str, full_name: str, password: str, phone: str = ""
) -> Person:
    """Make an account; an administrator of a site does, for the people there."""
    access.require(by, site, "administer")
    read = needed(
        {"username": username, "full_name": full_name, "password": password},
        {
            "username": "Choose a name to sign in with.",
            "full_name": "Write the person's full name.",
            "password": "Choose a first password.",
        },
    )
    try:
        validate_password(read["password"])
    except ValidationError as error:
        raise invalid("The password is too weak.", {"password": error.messages}) from None
    act = uuid.uuid4()
    try:
        with transaction.atomic():
            person = Person.objects.create_user(
                username=read["username"],
                password=read["password"],
                full_name=read["full_name"],
                phone=phone.strip(),
            )
            append(
                KIND,
                {"person": person.pk},
                act=act,
                by=by,
                site=site,
                names={"person": f"{read['full_name']} ({read['username']})"},
            )
    except IntegrityError:
        raise conflict("taken", f"“{read['username']}” signs in already; choose another.") from None
    return person
