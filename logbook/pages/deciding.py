"""Review, signature, and what follows from a signed verdict."""

from typing import Any

from django.contrib import messages
from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.urls import reverse
from django.utils.translation import gettext as _

from logbook import access, clock
from logbook.actions import standing as standings
from logbook.actions.confirm_restriction import confirm_restriction
from logbook.actions.crew_words import unconfirmed
from logbook.actions.defer_inspection import approve_deferral, ask_deferral, latest_day
from logbook.actions.review import must_be_newest
from logbook.actions.review import review as review_proposal
from logbook.actions.shown import shown_digest
from logbook.actions.sign_disposition import sign_disposition
from logbook.errors import Refusal
from logbook.models import Assessment, AssessmentAsked, Disposition, Licence, Review, Site, Verdict

from .asked import Asked, may
from .cracks import figures, outcome_of, working
from .forms.deciding import ApproveForm, ConfirmForm, DeferForm, ReviewForm, SignForm
from .lines import proposed_sentence
from .outlook import outlook
from .places import standing_line
from .refusals import attempt, form_status
from .writing import by as by_words
from .writing import day


def around(request: Asked, assessment: Assessment) -> dict[str, Any]:
    """What stands around every page about one proposal."""
    place = assessment.location
    component, site = place.component, place.component.site
    sign = request.user.decimal_sign
    return {
        "tab": "desk",
        "site": site,
        "component": component,
        "location": place,
        "crack": assessment.crack,
        "foot_zone": site.time_zone,
        "proposal": assessment,
        "sentence": proposed_sentence(
            assessment.verdict,
            assessment.until_on,
            assessment.until_at,
            assessment.limit,
            component,
            sign,
        ),
        "until": by_words(assessment.until_on, assessment.until_at, component.counter_unit, sign),
        "line": standing_line(place, assessment.crack, sign),
    }


@login_required
def proposal(request: Asked, pk: int) -> HttpResponse:
    """A proposal's spread: reasons and figures; an engineer accepts or overrides it here."""
    assessment = access.assessment_for(request.user, pk)
    form = ReviewForm(request.POST or None)
    if request.method == "POST":
        access.assessment_for(request.user, pk, "engineer")
        if form.is_valid():
            made = attempt(form, _review, request, assessment, form.cleaned_data)
            if made is not None:
                messages.success(
                    request, _("Entry %(n)s is in the book.") % {"n": made.entry_number}
                )
                return redirect("sign", made.pk)
    place, one = assessment.location, assessment.crack
    newest = standings.latest_assessment(place, one)
    owed = AssessmentAsked.objects.filter(location=place, crack=one).exists()
    signed = assessment.dispositions.order_by("-leaf__index").first()
    return render(
        request,
        "logbook/proposal.html",
        {
            **around(request, assessment),
            "form": form,
            "newest": newest is not None and newest.pk == assessment.pk and not owed,
            "newer": newest,
            "reviews": assessment.reviews.select_related("by", "leaf").order_by("-leaf__index"),
            "signed": signed,
            "may_review": may(request, place.component.site, "engineer"),
            "figures": figures(one, assessment, signed, request.user.decimal_sign) if one else (),
            "working": working(assessment),
            "outlook": outlook(outcome_of(assessment)),
        },
        status=form_status(form),
    )


def _review(request: Asked, assessment: Assessment, typed: dict[str, Any]) -> Review:
    return review_proposal(
        request.user,
        assessment.pk,
        typed["decision"],
        verdict=typed["verdict"] or None,
        until_on=typed["until_on"],
        until_at=typed["until_at"],
        limit=typed["limit"],
        grounds=typed["grounds"],
    )


def licences_of(request: Asked, site: Site) -> list[Licence]:
    """Those in force today on the books of the site; an expired one cannot be chosen."""
    today = clock.today(site.time_zone)
    mine = Licence.objects.filter(person=request.user, site=site).order_by("valid_to")
    return [one for one in mine if one.in_force(today)]


@login_required
def sign(request: Asked, pk: int) -> HttpResponse:
    """Page 1 of the record as it will print, and the password on the signature line."""
    one = access.review_for(request.user, pk)
    assessment = one.assessment
    site = assessment.location.component.site
    digest = shown_digest(one)
    form = SignForm(
        request.POST or None,
        licences=licences_of(request, site),
        initial={"shown_digest": digest},
    )
    if request.method == "POST" and form.is_valid():
        made = attempt(form, _sign, request, one, form.cleaned_data)
        if made is not None:
            return redirect("signed", made.pk)
    before = standings.latest_disposition(assessment.location, assessment.crack)
    component = assessment.location.component
    sign_of = request.user.decimal_sign
    return render(
        request,
        "logbook/sign.html",
        {
            **around(request, assessment),
            "review": one,
            "form": form,
            "digest": digest,
            "before": before,
            "reviewed_sentence": proposed_sentence(
                one.verdict, one.until_on, one.until_at, one.limit, component, sign_of
            ),
            "reviewed_until": by_words(one.until_on, one.until_at, component.counter_unit, sign_of),
            "may_sign": may(request, site, "sign"),
            "signed": getattr(one, "disposition", None),
            "passed": _passed(one),
            "newer": reverse("crack", args=[assessment.crack_id])
            if assessment.crack_id
            else reverse("location", args=[assessment.location_id]),
        },
        status=form_status(form),
    )


def _passed(one: Review) -> bool:
    """Not signed, and something newer is in the book: nothing to read as permission."""
    if hasattr(one, "disposition"):
        return False
    try:
        must_be_newest(one.assessment)
    except Refusal:
        return True
    return one.assessment.reviews.filter(leaf__index__gt=one.leaf.index).exists()


def _sign(request: Asked, one: Review, typed: dict[str, Any]) -> Disposition:
    return sign_disposition(
        request.user,
        one.pk,
        licence_pk=typed["licence"],
        meaning=typed["meaning"],
        password=typed["password"],
        digest=typed["shown_digest"],
        request=request,
    )


def _signed_sentence(one: Disposition, sign_of: str) -> str:
    said = proposed_sentence(
        one.verdict, one.until_on, one.until_at, one.limit, one.location.component, sign_of
    )
    if one.verdict == Verdict.RESTRICT and not hasattr(one, "restriction_confirmed"):
        return unconfirmed(said)
    return said


@login_required
def signed(request: Asked, pk: int) -> HttpResponse:
    """What was signed, by whom, and what can be done from here."""
    one = access.disposition_for(request.user, pk)
    component = one.location.component
    sign_of = request.user.decimal_sign
    about = around(request, one.assessment)
    line = about["line"]
    return render(
        request,
        "logbook/signed.html",
        {
            **about,
            "in_force": line is not None
            and line.reading.signed
            and line.standing.disposition_id == one.pk,
            "signed": one,
            "signed_sentence": _signed_sentence(one, sign_of),
            "signed_until": by_words(one.until_on, one.until_at, component.counter_unit, sign_of),
            "newest": not hasattr(one, "superseded_by"),
            "record": getattr(one, "record", None),
            "confirmed": getattr(one, "restriction_confirmed", None),
            "requests": one.deferral_requests.select_related("by", "leaf", "deferral__by"),
            "may_log": may(request, component.site, "log"),
            "may_engineer": may(request, component.site, "engineer"),
        },
    )


def _form_page(
    request: Asked, form: Any, assessment: Assessment, heading: str, verb: str, **more: Any
) -> HttpResponse:
    context = {**around(request, assessment), "form": form, "heading": heading, "verb": verb}
    return render(request, "logbook/form.html", {**context, **more}, status=form_status(form))


@login_required
def confirm(request: Asked, pk: int) -> HttpResponse:
    """The limiter is set, or the tag hangs."""
    one = access.disposition_for(request.user, pk, "log")
    form = ConfirmForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        done = attempt(form, confirm_restriction, request.user, one.pk, form.cleaned_data["how"])
        if done is not None:
            return redirect("signed", one.pk)
    about = [_("The part may be used only so: %(limit)s") % {"limit": one.limit}]
    return _form_page(
        request, form, one.assessment, _("Confirm the restriction"), _("It is set"), about=about
    )


@login_required
def defer(request: Asked, pk: int) -> HttpResponse:
    """Ask to put the next look off: nothing changes until a second person has agreed."""
    one = access.disposition_for(request.user, pk, "engineer")
    form = DeferForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        done = attempt(form, ask_deferral, request.user, one.pk, **form.cleaned_data)
        if done is not None:
            return redirect("signed", one.pk)
    latest = latest_day(one)
    about = [_("Nothing changes until a signatory, who is someone else, has approved it.")]
    if latest is None:
        about.append(
            _("It cannot be put off: the crack's life allows no day after the one that is set.")
        )
    else:
        about.append(
            _("The latest day that the crack's life allows is %(day)s.") % {"day": day(latest)}
        )
    return _form_page(
        request, form, one.assessment, _("Put the next look off"), _("Ask for it"), about=about
    )


@login_required
def deferral(request: Asked, pk: int) -> HttpResponse:
    """A deferral that was asked for; a signatory approves it here."""
    asked = access.deferral_request_for(request.user, pk)
    one = asked.disposition
    site = one.location.component.site
    form = ApproveForm(request.POST or None, licences=licences_of(request, site))
    if request.method == "POST" and form.is_valid():
        done = attempt(form, _approve, request, asked.pk, form.cleaned_data)
        if done is not None:
            return redirect("signed", one.pk)
    return render(
        request,
        "logbook/deferral.html",
        {
            **around(request, one.assessment),
            "asked": asked,
            "form": form,
            "signed": one,
            "may_sign": may(request, site, "sign"),
            "approved": getattr(asked, "deferral", None),
        },
        status=form_status(form),
    )


def _approve(request: Asked, pk: int, typed: dict[str, Any]) -> Any:
    return approve_deferral(
        request.user,
        pk,
        licence_pk=typed["licence"],
        password=typed["password"],
        request=request,
    )
