"""Striking out, repairs and the return to service."""

from typing import Any

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext as _

from logbook import access
from logbook.actions.answer import answer_now
from logbook.actions.reassess import reassess
from logbook.actions.record_repair import record_repair
from logbook.actions.return_to_service import return_to_service, shown_digest
from logbook.actions.strike_out import strike_out
from logbook.models import Finding, What

from .asked import Asked, may
from .deciding import licences_of
from .forms.deciding import CorrectForm, ReassessForm, RepairForm, ReturnForm, StrikeOutForm
from .lines import finding_words
from .refusals import attempt, form_status


@login_required
def strike(request: Asked, pk: int) -> HttpResponse:
    """Strike one finding out; a wrong size can be written anew in the same act."""
    finding = access.finding_for(request.user, pk, "log")
    kind = CorrectForm if finding.what == What.CRACK else StrikeOutForm
    form = kind(request.POST or None)
    if request.method == "POST" and form.is_valid():
        struck = attempt(form, _strike, request, finding, form.cleaned_data)
        if struck is not None:
            answer_now(struck.leaf_id)
            return redirect("inspection", finding.inspection_id)
    component = finding.inspection.component
    said = finding_words(finding, request.user.decimal_sign)
    return render(
        request,
        "logbook/form.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "location": finding.location,
            "crack": finding.crack,
            "foot_zone": component.site.time_zone,
            "form": form,
            "heading": _("Strike out: %(said)s") % {"said": said},
            "about": [_("It stays readable, with your reason beside it, and counts no more.")],
            "verb": _("Strike it out"),
        },
        status=form_status(form),
    )


def _strike(request: Asked, finding: Finding, typed: dict[str, Any]) -> Any:
    # The sizes stay as typed: the action reads them as those of an entry are read.
    right = {name: request.POST.get(name, "") for name in CorrectForm.RIGHT}
    given = any(right[name].strip() for name in ("depth_basis", "depth_mm", "length_mm"))
    return strike_out(request.user, finding.pk, typed["reason"], right if given else None)


@login_required
def new_repair(request: Asked, pk: int) -> HttpResponse:
    """What was done to the part. It is held until its return to service is signed."""
    place = access.location_for(request.user, pk, "log")
    crack_pk = request.GET.get("crack") or None
    crack = access.crack_for(request.user, crack_pk) if crack_pk else None
    form = RepairForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        typed = {**form.cleaned_data}
        typed["welded"] = typed["welded"] == "yes"
        typed["closes"] = typed["closes"] == "yes"
        made = attempt(form, record_repair, request.user, place.pk, crack_pk, **typed)
        if made is not None:
            answer_now(made.leaf_id)
            return redirect("repair", made.pk)
    component = place.component
    about = _("The part is held until a signatory has signed its return to service.")
    return render(
        request,
        "logbook/form.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "location": place,
            "crack": crack,
            "foot_zone": component.site.time_zone,
            "form": form,
            "heading": _("A repair, an exchange or a removal"),
            "about": [about],
            "verb": _("Write it down"),
        },
        status=form_status(form),
    )


@login_required
def repair(request: Asked, pk: int) -> HttpResponse:
    """A repair as it stands in the book; a signatory returns the part to service here."""
    one = access.repair_for(request.user, pk)
    site = one.location.component.site
    form = ReturnForm(
        request.POST or None,
        licences=licences_of(request, site),
        initial={"shown_digest": shown_digest(one)},
    )
    if request.method == "POST" and form.is_valid():
        returned = attempt(form, _return, request, one.pk, form.cleaned_data)
        if returned is not None:
            answer_now(returned.leaf_id)
            return redirect("repair", one.pk)
    return render(
        request,
        "logbook/repair.html",
        {
            "tab": "desk",
            "site": site,
            "component": one.location.component,
            "location": one.location,
            "crack": one.crack,
            "foot_zone": site.time_zone,
            "repair": one,
            "returned": getattr(one, "return_to_service", None),
            "form": form,
            "may_sign": may(request, site, "sign"),
        },
        status=form_status(form),
    )


def _return(request: Asked, pk: int, typed: dict[str, Any]) -> Any:
    return return_to_service(
        request.user,
        pk,
        grounds=typed["grounds"],
        licence_pk=typed["licence"],
        password=typed["password"],
        digest=typed["shown_digest"],
        request=request,
    )


@login_required
def assess_anew(request: Asked, pk: int) -> HttpResponse:
    """An engineer asks for the computation anew, with a reason that stays in the book."""
    place = access.location_for(request.user, pk, "engineer")
    crack_pk = request.GET.get("crack") or None
    crack = access.crack_for(request.user, crack_pk) if crack_pk else None
    form = ReassessForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        act = attempt(
            form, reassess, request.user, place.pk, crack_pk, why=form.cleaned_data["why"]
        )
        if act is not None:
            answer_now(act)
            return redirect("crack", crack.pk) if crack else redirect("location", place.pk)
    component = place.component
    return render(
        request,
        "logbook/form.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "location": place,
            "crack": crack,
            "foot_zone": component.site.time_zone,
            "form": form,
            "heading": _("Assess it anew"),
            "about": [_("Nothing that was signed changes; a stricter answer binds at once.")],
            "verb": _("Assess it anew"),
        },
        status=form_status(form),
    )
