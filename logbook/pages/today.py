"""Today: what is due, overdue first; at the top of each group what is out of use."""

import datetime

from django.contrib.auth.decorators import login_required
from django.core.paginator import Paginator
from django.db.models import Case, F, IntegerField, Q, QuerySet, Value, When
from django.http import HttpResponse
from django.shortcuts import render
from django.utils.translation import gettext as _

from logbook import access, clock
from logbook.models import Component, Site, Standing

from .asked import Asked
from .lines import RELATED, Line, finding_words, lines

A_PAGE = 50
OVERDUE, OUT_OF_USE, THIS_WEEK, LATER, NO_DATE = range(5)


@login_required
def today(request: Asked) -> HttpResponse:
    sites = list(access.sites_of(request.user))
    rows = due_rows(sites)
    site_slug = request.GET.get("site", "")
    if site_slug:
        rows = rows.filter(site__slug=site_slug)
    leaf = Paginator(rows, A_PAGE).get_page(request.GET.get("leaf"))
    groups = grouped(list(leaf.object_list), request.user.decimal_sign)
    return render(
        request,
        "logbook/today.html",
        {
            "tab": "today",
            "sites": sites,
            "site_slug": site_slug,
            "groups": groups,
            "leaf": leaf,
            "foot_zone": sites[0].time_zone if sites else "UTC",
            "may_register": access.sites_of(request.user, "register").exists(),
            "components": Component.objects.filter(site__in=sites).exists(),
        },
    )


def due_rows(sites: list[Site]) -> QuerySet[Standing]:
    """Every standing of the sites in the order of the list: one query however many there are."""
    overdue, week = Q(pk__in=[]), Q(pk__in=[])
    for site in sites:
        day = clock.today(site.time_zone)
        overdue |= Q(site=site, due_on__lt=day)
        week |= Q(site=site, due_on__lte=day + datetime.timedelta(days=7))
    overdue |= Q(counter__gte=F("due_at"))
    group = Case(
        When(overdue, then=Value(OVERDUE)),
        When(held=True, then=Value(OUT_OF_USE)),
        When(week, then=Value(THIS_WEEK)),
        When(due_on__isnull=True, then=Value(NO_DATE)),
        default=Value(LATER),
        output_field=IntegerField(),
    )
    return (
        Standing.objects.filter(site__in=sites)
        .annotate(group=group)
        .select_related(*RELATED)
        .order_by("group", "-held", F("due_on").asc(nulls_last=True), "pk")
    )


def grouped(rows: list[Standing], decimal_sign: str) -> list[tuple[str, list[tuple[Line, str]]]]:
    """(heading, lines with what was last found), in the order of the rows."""
    headings = {
        OVERDUE: _("Overdue"),
        OUT_OF_USE: _("Out of use, waiting for a decision"),
        THIS_WEEK: _("This week"),
        LATER: _("Later"),
        NO_DATE: _("No date is set"),
    }
    groups: dict[str, list[tuple[Line, str]]] = {}
    for row, one in zip(rows, lines(rows, decimal_sign), strict=True):
        heading = headings[row.group]  # type: ignore[attr-defined]
        groups.setdefault(heading, []).append((one, finding_words(one.finding, decimal_sign)))
    return list(groups.items())
