"""A new site with its first administrator."""

import re
import uuid
import zoneinfo

from django.db import IntegrityError, transaction
from django.utils.text import slugify

from logbook.actions.fields import needed
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import Membership, Person, Role, Site

KIND = "register-site"


def register_site(
    by: Person,
    *,
    name: str,
    time_zone: str,
    on_call_name: str,
    on_call_phone: str,
    working_weekdays: str,
    closed_days: str = "",
) -> Site:
    """Set a site up. Only a superuser of the installation can: nobody has a role there yet.

    Whether an unsigned verdict may be acted on is not asked here but by signature
    (set_unsigned_policy); until then a part with an unsigned verdict is held.
    """
    if not by.is_superuser:
        raise conflict("not-permitted", "Only the keeper of the installation sets up a site.")
    read = needed(
        {
            "name": name,
            "time_zone": time_zone,
            "on_call_name": on_call_name,
            "on_call_phone": on_call_phone,
            "working_weekdays": working_weekdays,
        },
        {
            "name": "Name the site.",
            "time_zone": "Say in which time zone it lies, such as Europe/Vienna.",
            "on_call_name": "Say who is called when a part must stand still.",
            "on_call_phone": "Give the number to call.",
            "working_weekdays": "Say on which weekdays the site works: 1 is Monday, 7 is Sunday.",
        },
    )
    if read["time_zone"] not in zoneinfo.available_timezones():
        raise invalid("No such time zone.", {"time_zone": ["Write it as Europe/Vienna."]})
    if not re.fullmatch(r"[1-7]{1,7}", read["working_weekdays"]):
        raise invalid("No such weekdays.", {"working_weekdays": ["Write digits from 1 to 7."]})
    act = uuid.uuid4()
    try:
        with transaction.atomic():
            site = Site.objects.create(
                slug=slugify(read["name"])[:60] or "site", closed_days=closed_days, **read
            )
            Membership.objects.create(person=by, site=site, role=Role.ADMINISTRATOR)
            append(KIND, {"site": site.pk, **read}, act=act, by=by, site=site)
    except IntegrityError:
        raise conflict("taken", "A site of this name is there already.") from None
    return site
