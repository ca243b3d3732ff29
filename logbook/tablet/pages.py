"""With signal, on any machine: the site's tablets, the file of one that could not send, labels."""

from typing import cast

from django.contrib.auth.decorators import login_required
from django.http import HttpRequest, HttpResponse
from django.shortcuts import redirect, render
from django.urls import reverse
from django.utils.translation import gettext as _
from django.views.decorators.http import require_POST

from logbook import access
from logbook.actions.tablets import revoke_tablet, set_tablet_rules
from logbook.actions.take_in_file import take_in_file
from logbook.errors import Refusal
from logbook.models import Component, Device, Person, Site, TabletRules

from . import forms
from .labels import Label, sheet


def _person(request: HttpRequest) -> Person:
    return cast(Person, request.user)


def _may(request: HttpRequest, site: Site, need: str) -> bool:
    return bool(access.roles_at(_person(request), site) & access.NEEDS[need])


@login_required
def tablets(request: HttpRequest, slug: str) -> HttpResponse:
    """Which tablets hold this site's data, when each was last heard of, and what it said waits."""
    site = access.site_for(_person(request), slug)
    return render(
        request,
        "logbook/tablet/tablets.html",
        {
            "tab": "index",
            "site": site,
            "foot_zone": site.time_zone,
            "devices": Device.objects.filter(site=site).select_related("registered_by"),
            "rules": TabletRules.objects.filter(site=site).first(),
            "may_administer": _may(request, site, "administer"),
            "may_log": _may(request, site, "log"),
        },
    )


@login_required
@require_POST
def revoke(request: HttpRequest, slug: str, pk: int) -> HttpResponse:
    site = access.site_for(_person(request), slug, "administer")
    revoke_tablet(_person(request), site, pk)
    return redirect("tablets", slug)


@login_required
def rules(request: HttpRequest, slug: str) -> HttpResponse:
    site = access.site_for(_person(request), slug, "administer")
    form = forms.RulesForm(request.POST or None)
    status = 200
    if request.method == "POST":
        status = 400
        if form.is_valid():
            typed = form.cleaned_data
            try:
                set_tablet_rules(
                    _person(request),
                    site,
                    keep_days=typed["keep_days"],
                    inches=typed["inches"] == "yes",
                )
                return redirect("tablets", slug)
            except Refusal as refusal:
                status = forms.show(form, refusal)
    page = forms.context(site, form, _("The tablets of this site"), _("Lay it down"), about=[])
    return render(request, "logbook/form.html", page, status=status)


@login_required
def from_file(request: HttpRequest, slug: str) -> HttpResponse:
    """What waited on a tablet that could not send."""
    site = access.site_for(_person(request), slug, "log")
    form = forms.FileForm(request.POST or None, request.FILES or None)
    status = 200
    if request.method == "POST":
        status = 400
        if form.is_valid():
            try:
                taken = take_in_file(_person(request), site, form.cleaned_data["file"].read())
                return render(
                    request,
                    "logbook/tablet/from_file.html",
                    {"tab": "index", "site": site, "foot_zone": site.time_zone, "taken": taken},
                )
            except Refusal as refusal:
                status = forms.show(form, refusal)
    about = [_("Entries that somebody else wrote go to the tray, for a person to decide.")]
    page = forms.context(site, form, _("Read the file of a tablet"), _("Read it"), about=about)
    return render(request, "logbook/form.html", page, status=status)


@login_required
def labels(request: HttpRequest, slug: str) -> HttpResponse:
    """A4 sheets of labels, one a part: a scan opens what is in force for it."""
    site = access.site_for(_person(request), slug)
    made = [
        Label(
            one.tag,
            one.name,
            request.build_absolute_uri(reverse("in-force", args=[one.pk])),
        )
        for one in Component.objects.filter(site=site).order_by("tag")
    ]
    answer = HttpResponse(sheet(site.name, made), content_type="application/pdf")
    answer["Content-Disposition"] = f'attachment; filename="labels-{site.slug}.pdf"'
    return answer
