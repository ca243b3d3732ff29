"""What stands around every page: the look of this tablet, the tabs, and what the foot says."""

from typing import Any

from django.http import HttpRequest

from logbook import clock
from logbook.models import Membership, Role

LOOKS = ("day", "lamp", "sun")
DECIDING = {Role.ENGINEER, Role.SIGNATORY, Role.AUDITOR, Role.ADMINISTRATOR}


def look_of(request: HttpRequest) -> str:
    """Kept per tablet in a cookie, so that it also holds without script."""
    look = request.COOKIES.get("look", "day")
    return look if look in LOOKS else "day"


def frame(request: HttpRequest) -> dict[str, Any]:
    person = getattr(request, "user", None)
    signed_in = person is not None and person.is_authenticated
    roles: set[str] = set()
    if signed_in:
        roles = set(
            Membership.objects.filter(person=person, ended_at__isnull=True).values_list(
                "role", flat=True
            )
        )
    return {
        "look": look_of(request),
        "looks": LOOKS,
        "person": person if signed_in else None,
        "decimal_sign": getattr(person, "decimal_sign", "."),
        "my_roles": roles,
        "decides": bool(roles & DECIDING),
        "now": clock.now(),
        # Pages of one site say its own zone.
        "foot_zone": "UTC",
    }
