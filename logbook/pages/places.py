"""Where things are: the index, a part in force, a place on it."""

from django.contrib.auth.decorators import login_required
from django.db.models import Prefetch
from django.http import HttpResponse
from django.shortcuts import render

from logbook import access
from logbook.models import (
    Basis,
    Component,
    Crack,
    Finding,
    Location,
    Repair,
    Site,
    Standing,
)

from .asked import Asked, may
from .lines import RELATED, Line, finding_words, line, lines, strictest_first


@login_required
def index(request: Asked) -> HttpResponse:
    """Sites, their parts and places, with the strictest mark of each part."""
    sites = list(access.sites_of(request.user))
    components = Component.objects.filter(site__in=sites).prefetch_related(
        Prefetch("locations", Location.objects.order_by("number"))
    )
    strictest = _strictest(sites, request.user.decimal_sign)
    by_site: dict[int, list[tuple[Component, Line | None]]] = {site.pk: [] for site in sites}
    for component in components:
        by_site[component.site_id].append((component, strictest.get(component.pk)))
    return render(
        request,
        "logbook/index.html",
        {"tab": "index", "by_site": [(site, by_site[site.pk]) for site in sites]},
    )


def _strictest(sites: list[Site], decimal_sign: str) -> dict[int, Line]:
    rows = Standing.objects.filter(site__in=sites).select_related(*RELATED)
    found: dict[int, Line] = {}
    for one in strictest_first(lines(rows, decimal_sign)):
        found.setdefault(one.component.pk, one)
    return found


@login_required
def in_force(request: Asked, pk: int) -> HttpResponse:
    """What a scan of the label opens: may this part work, and until when."""
    component = access.component_for(request.user, pk)
    rows = Standing.objects.filter(location__component=component).select_related(*RELATED)
    standing = strictest_first(lines(rows, request.user.decimal_sign))
    seen = {one.location.pk for one in standing}
    places = component.locations.all()
    return render(
        request,
        "logbook/in_force.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "foot_zone": component.site.time_zone,
            "lines": standing,
            "strictest": standing[0] if standing else None,
            "places": places,
            "never": [place for place in places if place.pk not in seen],
            "inspections": component.inspections.select_related("leaf").order_by(
                "-found_on", "-leaf__index"
            )[:8],
            "roles": access.roles_at(request.user, component.site),
            "may_log": may(request, component.site, "log"),
            "may_register": may(request, component.site, "register"),
        },
    )


@login_required
def location(request: Asked, pk: int) -> HttpResponse:
    """A place: everything seen there at left, what stands at right."""
    place = access.location_for(request.user, pk)
    sign = request.user.decimal_sign
    rows = Standing.objects.filter(location=place).select_related(*RELATED)
    standing = strictest_first(lines(rows, sign))
    findings = (
        Finding.objects.filter(location=place)
        .select_related("inspection", "measurement", "strike_out__leaf", "crack", "leaf")
        .order_by("-inspection__found_on", "-leaf__index")[:100]
    )
    bases = Basis.objects.filter(location=place).select_related("author", "leaf", "adoption__by")
    return render(
        request,
        "logbook/location.html",
        {
            "tab": "index",
            "site": place.component.site,
            "component": place.component,
            "location": place,
            "foot_zone": place.component.site.time_zone,
            "lines": standing,
            "own": next((one for one in standing if one.crack is None), None),
            "findings": [(finding, finding_words(finding, sign)) for finding in findings],
            "cracks": Crack.objects.filter(location=place),
            "bases": bases.order_by("-revision"),
            "repairs": Repair.objects.filter(location=place).select_related("leaf"),
            "may_log": may(request, place.component.site, "log"),
            "may_engineer": may(request, place.component.site, "engineer"),
        },
    )


def standing_line(place: Location, crack: Crack | None, decimal_sign: str) -> Line | None:
    row = Standing.objects.filter(location=place, crack=crack).select_related(*RELATED).first()
    return line(row, decimal_sign) if row is not None else None
