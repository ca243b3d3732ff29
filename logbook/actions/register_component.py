"""A component, and the places on it that are looked at."""

import uuid
from decimal import Decimal
from typing import Any

from django.db import IntegrityError, transaction

from logbook import access
from logbook.actions.fields import needed
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import Component, Location, Person, Photo, Site

KIND = "register-component"
PLACE = "add-location"
MARKED = "mark-picture"
PICTURE = "set-picture"


def register_component(
    by: Person,
    site: Site,
    *,
    tag: str,
    name: str,
    counter_name: str,
    counter_unit: str,
    per_day: Decimal,
    description: str = "",
    serial: str = "",
) -> Component:
    """Put a component on the books. per_day is the least that is reckoned for a day: a date that
    is reckoned from usage is never later than it gives."""
    access.require(by, site, "register")
    read = needed(
        {"tag": tag, "name": name, "counter_name": counter_name, "counter_unit": counter_unit},
        {
            "tag": "Give the number on the part.",
            "name": "Say what it is.",
            "counter_name": "Say what its counter counts.",
            "counter_unit": "Name one count, such as lift.",
        },
    )
    if any(c in "OI" for c in read["tag"].upper()):
        raise invalid(
            "Tags leave out the letters O and I.",
            {"tag": ["O and I are read as 0 and 1; leave them out."]},
        )
    if per_day <= 0:
        raise invalid("Usage a day is above 0.", {"per_day": ["Write a number above 0."]})
    act = uuid.uuid4()
    try:
        with transaction.atomic():
            made = Component.objects.create(
                site=site,
                per_day=per_day,
                description=description.strip(),
                serial=serial.strip(),
                **read,
            )
            append(
                KIND,
                {
                    "component": made.pk,
                    "per_day": per_day,
                    "description": made.description,
                    "serial": made.serial,
                    **read,
                },
                act=act,
                by=by,
                site=site,
            )
    except IntegrityError:
        raise conflict("taken", f"{read['tag']} is on the books of this site already.") from None
    return made


def set_picture(by: Person, component_pk: Any, photo: Photo) -> Component:
    """The picture on which the places are marked. Marks stay where they are, as fractions."""
    component = access.component_for(by, component_pk, "register")
    if photo.site_id != component.site_id or photo.arrived_at is None:
        raise invalid("This picture has not arrived.", {"picture": ["Send the picture again."]})
    with transaction.atomic():
        component.picture = photo
        component.save(update_fields=["picture"])
        append(
            PICTURE,
            {"component": component.pk, "photo": photo.pk, "sha256": photo.sha256},
            act=uuid.uuid4(),
            by=by,
            site=component.site,
        )
    return component


def add_location(by: Person, component_pk: Any, *, name: str, described: str = "") -> Location:
    """A place at the end of the walking order."""
    component = access.component_for(by, component_pk, "register")
    read = needed({"name": name}, {"name": "Name the place."})
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=component.pk)
        if component.locations.filter(name__iexact=read["name"]).exists():
            raise invalid(
                "A place of this name is on the part already.",
                {"name": ["Choose another name, so that nobody takes one place for the other."]},
            )
        last = component.locations.order_by("-number").first()
        made = Location.objects.create(
            component=component,
            number=(last.number if last else 0) + 1,
            described=described.strip(),
            **read,
        )
        append(
            PLACE,
            {"location": made.pk, "component": component.pk, "number": made.number, **read},
            act=uuid.uuid4(),
            by=by,
            site=component.site,
        )
    return made


def mark_picture(by: Person, location_pk: Any, x: float, y: float) -> Location:
    """Mark a place on the component's picture; x and y are fractions of width and height."""
    location = access.location_for(by, location_pk, "register")
    if location.component.picture is None:
        raise invalid("The component has no picture yet.", {"picture": ["Add a picture first."]})
    if not (0 <= x <= 1 and 0 <= y <= 1):
        raise invalid("The mark lies beside the picture.", {"mark": ["Touch the picture itself."]})
    with transaction.atomic():
        location.picture_x, location.picture_y = x, y
        location.save(update_fields=["picture_x", "picture_y"])
        append(
            MARKED,
            {"location": location.pk, "x": repr(x), "y": repr(y)},
            act=uuid.uuid4(),
            by=by,
            site=location.component.site,
        )
    return location
