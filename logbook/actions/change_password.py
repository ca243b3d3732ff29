"""A person's own new password, after the old one."""

import uuid

from django.contrib.auth.password_validation import validate_password
from django.core.exceptions import ValidationError
from django.db import transaction
from django.http import HttpRequest

from logbook.actions.password import confirm_password
from logbook.errors import invalid
from logbook.journal import append
from logbook.models import Person

KIND = "change-password"


def change_password(by: Person, old: str, new: str, request: HttpRequest | None = None) -> Person:
    """Raises Refusal where the old one is not theirs (it counts as a try), or the new one weak."""
    confirm_password(by, old, request)
    try:
        validate_password(new, by)
    except ValidationError as error:
        raise invalid("The new password is too weak.", {"new": error.messages}) from None
    with transaction.atomic():
        by.set_password(new)
        by.save(update_fields=["password"])
        append(KIND, {"person": by.pk}, act=uuid.uuid4(), by=by, site=None)
    return by
