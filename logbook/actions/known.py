"""The facts about a component that an entry is read against."""

import json
from decimal import Decimal

from django.db.models import QuerySet

from logbook import clock
from logbook.cases import rows
from logbook.entry import Known, KnownCrack, KnownLocation
from logbook.models import Component, Crack, Inspection, Location


def known_of(component: Component, before: Inspection | None = None) -> Known:
    """The facts as they stand, or as they stood when an earlier entry was written."""
    looks = rows.looks_that_count(component)
    if before is not None:
        looks = looks.filter(leaf__index__lt=before.leaf.index)
    last = looks.order_by("-found_on", "-leaf__index").values_list("found_on", "counter").first()
    bodies = {
        location.pk: body
        for location in component.locations.all()
        if (body := adopted_body(location)) is not None
    }
    return Known(
        component=component.pk,
        today=clock.today(component.site.time_zone),
        last_found_on=last[0] if last else None,
        last_counter=last[1] if last else None,
        per_day=component.per_day,
        locations={
            location.pk: _location(location, bodies.get(location.pk))
            for location in component.locations.all()
        },
        cracks={
            crack.number: _crack(crack, bodies.get(crack.location_id), before)
            for crack in _cracks(component, before)
        },
    )


def _cracks(component: Component, before: Inspection | None) -> QuerySet[Crack]:
    """Cracks that had been found by then."""
    if before is None:
        return component.cracks.all()
    return component.cracks.filter(findings__leaf__index__lt=before.leaf.index).distinct()


def adopted_body(location: Location) -> dict[str, object] | None:
    basis = rows.adopted_basis(location)
    return None if basis is None else json.loads(basis.body, parse_float=Decimal)


def _number(value: object) -> Decimal | None:
    return Decimal(value) if isinstance(value, int | Decimal) else None


def _location(location: Location, body: dict[str, object] | None) -> KnownLocation:
    part = body.get("body") if body else None
    part = part if isinstance(part, dict) else {}
    kind = str(body.get("kind", "")) if body else ""
    wall = part.get("diameter_mm") if kind == "bar-surface" else part.get("thickness_mm")
    return KnownLocation(
        location.number, location.name, _number(wall), _number(part.get("width_mm"))
    )


def _crack(crack: Crack, body: dict[str, object] | None, before: Inspection | None) -> KnownCrack:
    sizes = rows.measurements(crack)
    if before is not None:
        sizes = [m for m in sizes if m.leaf.index < before.leaf.index]
    last = sizes[-1] if sizes else None
    sizing = {}
    if body and last is not None and isinstance(body.get("sizing"), dict):
        sizing = body["sizing"].get(last.finding.inspection.method, {})  # type: ignore[attr-defined]
    return KnownCrack(
        number=crack.number,
        location=crack.location_id,
        closed=crack.closed_at is not None
        and (before is None or crack.closed_at <= before.in_book_at),
        depth_mm=last.depth_mm if last else None,
        length_mm=last.length_mm if last else None,
        depth_sd_mm=_number(sizing.get("depth_sd_mm")),
        length_sd_mm=_number(sizing.get("length_sd_mm")),
    )
