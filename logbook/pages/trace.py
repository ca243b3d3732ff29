"""Trace: one ruled column in book order; because of at one side, led to at the other."""

import json
import uuid
from collections.abc import Iterable
from dataclasses import dataclass, field

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import render
from django.urls import reverse
from django.utils.translation import gettext as _

from logbook import access
from logbook.models import (
    ActRow,
    Assessment,
    Basis,
    BasisAdoption,
    Component,
    Crack,
    Deferral,
    DeferralRequest,
    Disposition,
    Finding,
    Leaf,
    Location,
    Repair,
    RestrictionConfirmed,
    ReturnToService,
    Review,
    StrikeOut,
)

from .asked import Asked
from .lines import finding_words


@dataclass
class Step:
    """One act: its leaf, who did it, what it was, and what it led to."""

    leaf: Leaf
    who: str = ""
    words: list[tuple[str, str]] = field(default_factory=list)
    signed: bool = False
    because_of: list[int] = field(default_factory=list)
    led_to: list[int] = field(default_factory=list)


@login_required
def component_trace(request: Asked, pk: int) -> HttpResponse:
    component = access.component_for(request.user, pk)
    steps = steps_of(_rows(component.locations.all(), None), request.user.decimal_sign)
    return _page(request, component, None, steps)


@login_required
def crack_trace(request: Asked, pk: int) -> HttpResponse:
    crack = access.crack_for(request.user, pk)
    rows = _rows([crack.location], crack)
    steps = steps_of(rows, request.user.decimal_sign)
    return _page(request, crack.component, crack, steps)


def _page(
    request: Asked, component: Component, crack: Crack | None, steps: list[Step]
) -> HttpResponse:
    return render(
        request,
        "logbook/trace.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "location": crack.location if crack else None,
            "crack": crack,
            "foot_zone": component.site.time_zone,
            "steps": steps,
        },
    )


def _rows(places: Iterable[Location], crack: Crack | None) -> list[ActRow]:
    """Every protected row about these places; about one crack, and what its place is reckoned on,
    where one is given.
    """
    places = list(places)
    about: dict[str, object] = {"location__in": places}
    if crack is not None:
        about["crack"] = crack
    findings = Finding.objects.filter(**about).select_related(
        "leaf", "inspection", "measurement", "crack", "location"
    )
    assessments = Assessment.objects.filter(**about).select_related("leaf", "crack", "location")
    signed = Disposition.objects.filter(**about).select_related("leaf", "licence", "signatory")
    repairs = Repair.objects.filter(**about).select_related("leaf")
    bases = Basis.objects.filter(location__in=places).select_related("leaf")
    return [
        *findings,
        *StrikeOut.objects.filter(finding__in=findings).select_related("leaf", "finding__leaf"),
        *assessments,
        *Review.objects.filter(assessment__in=assessments).select_related("leaf"),
        *signed,
        *RestrictionConfirmed.objects.filter(disposition__in=signed).select_related("leaf"),
        *DeferralRequest.objects.filter(disposition__in=signed).select_related("leaf"),
        *Deferral.objects.filter(disposition__in=signed).select_related("leaf"),
        *repairs,
        *ReturnToService.objects.filter(repair__in=repairs).select_related("leaf"),
        *bases,
        *BasisAdoption.objects.filter(basis__in=bases).select_related("leaf", "basis"),
    ]


def steps_of(rows: list[ActRow], decimal_sign: str) -> list[Step]:
    steps: dict[uuid.UUID, Step] = {}
    for row in rows:
        step = steps.setdefault(row.leaf.act, Step(row.leaf))
        words, link = words_of(row, decimal_sign)
        step.words.append((words, link))
        step.signed |= isinstance(row, Disposition | Deferral | ReturnToService)
    ordered = sorted(steps.values(), key=lambda step: step.leaf.index)
    _name_and_tie(ordered)
    return ordered


def _name_and_tie(steps: list[Step]) -> None:
    by_act = {str(step.leaf.act): step for step in steps}
    names = {
        leaf.pk: {one.key: one.details for one in leaf.names.all()}
        for leaf in Leaf.objects.filter(pk__in=[s.leaf.pk for s in steps]).prefetch_related("names")
    }
    for step in steps:
        step.who = names[step.leaf.pk].get("by", "")
        because = json.loads(bytes(step.leaf.payload)).get("because_of", [])
        for act in because:
            cause = by_act.get(str(act))
            if cause is not None:
                step.because_of.append(cause.leaf.entry_number)
                cause.led_to.append(step.leaf.entry_number)


def words_of(row: ActRow, decimal_sign: str) -> tuple[str, str]:
    """What an act's row says, and where to read more."""
    if isinstance(row, Finding):
        where = str(row.crack) if row.crack else row.location.name
        said = finding_words(row, decimal_sign)
        return f"{where}: {said}", reverse("inspection", args=[row.inspection_id])
    if isinstance(row, StrikeOut):
        words = _("struck out entry %(n)s: %(why)s") % {
            "n": row.finding.entry_number,
            "why": row.reason,
        }
        return words, reverse("inspection", args=[row.finding.inspection_id])
    if isinstance(row, Assessment):
        where = str(row.crack) if row.crack else row.location.name
        words = _("%(where)s: proposed “%(word)s”") % {
            "where": where,
            "word": row.get_verdict_display(),
        }
        return words, reverse("proposal", args=[row.pk])
    if isinstance(row, Review):
        words = _("review: %(how)s, “%(word)s”") % {
            "how": row.get_decision_display(),
            "word": row.get_verdict_display(),
        }
        return f"{words}. {row.grounds}".strip(), reverse("proposal", args=[row.assessment_id])
    if isinstance(row, Disposition):
        words = _("signed “%(word)s” under licence %(licence)s") % {
            "word": row.get_verdict_display(),
            "licence": row.licence,
        }
        return words, reverse("signed", args=[row.pk])
    return _other_words(row)


def _other_words(row: ActRow) -> tuple[str, str]:
    if isinstance(row, RestrictionConfirmed):
        return _("restriction set: %(how)s") % {"how": row.how}, reverse(
            "signed", args=[row.disposition_id]
        )
    if isinstance(row, DeferralRequest):
        return _("asked to put the look off: %(why)s") % {"why": row.grounds}, reverse(
            "deferral", args=[row.pk]
        )
    if isinstance(row, Deferral):
        return _("approved putting the look off"), reverse("deferral", args=[row.request_id])
    if isinstance(row, Repair):
        return f"{row.get_sort_display()}: {row.what}", reverse("repair", args=[row.pk])
    if isinstance(row, ReturnToService):
        return _("returned to service: %(why)s") % {"why": row.grounds}, reverse(
            "repair", args=[row.repair_id]
        )
    if isinstance(row, Basis):
        return _("basis revision %(n)s: %(why)s") % {
            "n": row.revision,
            "why": row.reason,
        }, reverse("basis", args=[row.pk])
    if isinstance(row, BasisAdoption):
        return _("adopted basis revision %(n)s") % {"n": row.basis.revision}, reverse(
            "basis", args=[row.basis_id]
        )
    raise TypeError(f"no words for {type(row).__name__}")
