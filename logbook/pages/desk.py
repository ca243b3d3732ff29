"""The desk: what needs an engineer or a signatory, one sentence a line, most urgent first."""

import datetime
from dataclasses import dataclass

from django.contrib.auth.decorators import login_required
from django.core.paginator import Paginator
from django.db.models import F, Min, Q, QuerySet
from django.http import HttpResponse
from django.shortcuts import render
from django.urls import reverse
from django.utils.translation import gettext as _

from logbook import access
from logbook.errors import not_permitted
from logbook.models import (
    Basis,
    DeferralRequest,
    Location,
    Repair,
    Review,
    Site,
    Standing,
    TrayItem,
    Verdict,
    strictness,
)

from .asked import Asked
from .lines import RELATED, Line, lines

A_PAGE = 50


@dataclass(frozen=True)
class Matter:
    """One thing that waits. urgency : the higher, the sooner."""

    urgency: int
    since: datetime.datetime
    where: str
    why: str
    link: str
    mark: str = ""
    site: Site | None = None


@login_required
def desk(request: Asked) -> HttpResponse:
    sites = list(access.sites_of(request.user, "audit"))
    if not sites:
        raise not_permitted(access.NEED_SENTENCES["audit"])
    pile = pile_of(sites, request.user.decimal_sign)
    leaf = Paginator(pile, A_PAGE).get_page(request.GET.get("leaf"))
    return render(
        request,
        "logbook/desk.html",
        {"tab": "desk", "leaf": leaf, "sites": sites, "foot_zone": sites[0].time_zone},
    )


def pile_of(sites: list[Site], decimal_sign: str) -> list[Matter]:
    """Everything that waits at these sites, in a constant number of queries."""
    matters = [
        *_standing(sites, decimal_sign),
        *_bases(sites),
        *_repairs(sites),
        *_deferrals(sites),
        *_provisional(sites),
        *_tray(sites),
    ]
    return sorted(matters, key=lambda one: (-one.urgency, one.since))


def _unsettled(sites: list[Site]) -> QuerySet[Standing]:
    """What is not simply in force: proposals, bindings, what is held."""
    return (
        Standing.objects.filter(site__in=sites)
        .filter(
            ~Q(state=Standing.State.IN_FORCE)
            | Q(held=True)
            # A newer proposal that asks for nothing stricter: the old date runs out meanwhile.
            | ~Q(assessment=F("disposition__assessment"))
        )
        .select_related(*RELATED)
    )


def _standing(sites: list[Site], decimal_sign: str) -> list[Matter]:
    found = lines(_unsettled(sites), decimal_sign)
    newest = _newest_reviews([one.standing.assessment_id for one in found])
    return [_standing_matter(one, newest.get(one.standing.assessment_id)) for one in found]


def _newest_reviews(assessments: list[int | None]) -> dict[int | None, Review]:
    rows = (
        Review.objects.filter(assessment__in=[pk for pk in assessments if pk])
        .select_related("by", "leaf", "disposition")
        .order_by("leaf__index")
    )
    return {row.assessment_id: row for row in rows}


def _standing_matter(one: Line, review: Review | None) -> Matter:
    where = f"{one.component.tag} · {one.location.name}"
    if one.crack is not None:
        where += f" · {one.crack}"
    if one.standing.assessment is None:
        link = reverse("in-force", args=[one.component.pk])
        why = _("An entry has no verdict yet.")
    elif one.reading.signed and not one.reading.held and review is None:
        link = reverse("proposal", args=[one.standing.assessment.pk])
        why = _("A newer look, and nothing stricter is proposed; waits for a review.")
    elif one.reading.signed and one.reading.held:
        link = (
            reverse("crack", args=[one.crack.pk])
            if one.crack is not None
            else reverse("location", args=[one.location.pk])
        )
        why = _("Signed “%(word)s”: waits for what was asked for.") % {
            "word": Verdict(one.standing.verdict).label
        }
    elif review is not None and not hasattr(review, "disposition"):
        link = reverse("sign", args=[review.pk])
        why = _("Reviewed by %(who)s as “%(word)s”; waits for a signature.") % {
            "who": review.by,
            "word": review.get_verdict_display(),
        }
    else:
        link = reverse("proposal", args=[one.standing.assessment.pk])
        why = _("Proposed “%(word)s”; waits for a review.") % {
            "word": one.standing.assessment.get_verdict_display()
        }
    urgency = 10 + strictness(one.verdict) + (10 if one.edged else 0)
    return Matter(urgency, one.standing.since, where, why, link, one.verdict, one.site)


def _bases(sites: list[Site]) -> list[Matter]:
    rows = Basis.objects.filter(
        location__component__site__in=sites, adoption__isnull=True
    ).select_related("location__component__site", "author")
    newest: dict[int, Basis] = {}
    for row in rows.order_by("revision"):
        newest[row.location_id] = row
    return [
        Matter(
            8,
            row.created_at,
            f"{row.location.component.tag} · {row.location.name}",
            _("Basis revision %(n)s by %(who)s waits for someone else to adopt it.")
            % {"n": row.revision, "who": row.author},
            reverse("basis", args=[row.pk]),
            site=row.location.component.site,
        )
        for row in newest.values()
    ]


def _repairs(sites: list[Site]) -> list[Matter]:
    rows = Repair.objects.filter(
        location__component__site__in=sites, return_to_service__isnull=True
    ).select_related("location__component__site", "author")
    return [
        Matter(
            21,
            row.at,
            f"{row.location.component.tag} · {row.location.name}",
            _("A %(sort)s is in the book; the return to service waits for a signature.")
            % {"sort": row.get_sort_display()},
            reverse("repair", args=[row.pk]),
            site=row.location.component.site,
        )
        for row in rows
    ]


def _deferrals(sites: list[Site]) -> list[Matter]:
    rows = DeferralRequest.objects.filter(
        disposition__location__component__site__in=sites, deferral__isnull=True
    ).select_related("disposition__location__component__site", "by")
    return [
        Matter(
            15,
            row.at,
            f"{row.disposition.location.component.tag} · {row.disposition.location.name}",
            _("%(who)s asks to put the next look off; waits for a second person.")
            % {"who": row.by},
            reverse("deferral", args=[row.pk]),
            site=row.disposition.location.component.site,
        )
        for row in rows
    ]


def _provisional(sites: list[Site]) -> list[Matter]:
    rows = (
        Location.objects.filter(component__site__in=sites, provisional=True)
        .annotate(first_seen=Min("findings__inspection__in_book_at"))
        .select_related("component__site")
    )
    return [
        Matter(
            9,
            row.first_seen,
            f"{row.component.tag} · {row.name}",
            _("A place that nobody had listed; it needs a basis."),
            reverse("location", args=[row.pk]),
            site=row.component.site,
        )
        for row in rows.exclude(first_seen__isnull=True)
    ]


def _tray(sites: list[Site]) -> list[Matter]:
    rows = TrayItem.objects.filter(component__site__in=sites, settled__isnull=True).select_related(
        "component__site", "author"
    )
    return [
        Matter(
            12,
            row.at,
            f"{row.component.tag} {row.component.name}",
            _("An entry by %(who)s did not fit and lies in the tray.") % {"who": row.author},
            reverse("tray", args=[row.pk]),
            site=row.component.site,
        )
        for row in rows
    ]
