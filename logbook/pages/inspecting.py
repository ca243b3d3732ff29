"""Logging an inspection, and the answer that comes back."""

import datetime
import hashlib
from decimal import Decimal
from typing import Any

from django.contrib.auth.decorators import login_required
from django.core.files.base import File
from django.db.models import QuerySet
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext as _

from logbook import access
from logbook.actions.add_photo import add_photo, small_enough
from logbook.actions.answer import answer_now
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.cases.rows import measurements
from logbook.entry import InspectionDraft, read_inspection
from logbook.errors import Refusal
from logbook.models import (
    AssessmentAsked,
    Component,
    Finding,
    Inspection,
    Photo,
    Standing,
)

from . import writing
from .asked import Asked, may
from .forms.inspection import HEAD, Block, Box, InspectionForm
from .lines import RELATED, finding_words, lines, size_words, strictest_first


@login_required
def inspect(request: Asked, pk: int) -> HttpResponse:
    """The form; then the same once more to be read through; then it is written."""
    component = access.component_for(request.user, pk, "log")
    form = _form(component, request)
    if request.method != "POST" or request.POST.get("step") == "change":
        return _page(request, form)
    try:
        draft = read_inspection(form.data(), known_of(component))
        if request.POST.get("step") != "write":
            return _check_page(request, form, draft)
        return _write(request, form)
    except Refusal as refusal:
        if refusal.status in (403, 404):
            raise
        form.show(refusal)
        return _page(request, form, status=refusal.status)


def _form(component: Component, request: Asked) -> InspectionForm:
    open_cracks = component.cracks.filter(closed_at__isnull=True)
    posted = request.POST if request.method == "POST" else None
    return InspectionForm(
        component, component.locations.all(), open_cracks, posted, _written_before(component)
    )


def _written_before(component: Component) -> dict[str, list[str]]:
    """What was written in the same boxes before: offered while typing, never filled in."""
    names = [name for name, _label, _hint, kind in HEAD if kind == "text"]
    rows = component.site.components.values_list("pk", flat=True)
    looks = Inspection.objects.filter(component__in=rows).order_by("-pk").values(*names)[:40]
    return {name: sorted({look[name] for look in looks if look[name]}) for name in names}


def _around(form: InspectionForm) -> dict[str, Any]:
    component = form.component
    return {
        "form": form,
        "tab": "today",
        "site": component.site,
        "component": component,
        "foot_zone": component.site.time_zone,
    }


def _page(request: Asked, form: InspectionForm, status: int = 200) -> HttpResponse:
    return render(request, "logbook/inspect.html", _around(form), status=status)


def _check_page(request: Asked, form: InspectionForm, draft: InspectionDraft) -> HttpResponse:
    """All of it as it will be written, with the last sizes beside the new ones."""
    sign = request.user.decimal_sign
    answered = [block for block in form.blocks if block.answered]
    findings = []
    for block, finding in zip(answered, draft.findings, strict=True):
        block.last = _last(block, sign)
        sizes = size_words(finding.sizes, sign) if finding.sizes is not None else ""
        findings.append((block, finding, sizes))
    boxes = [*form.head, *(box for box in form.later if box.value)]
    told = {block.location.pk for block in answered if block.location is not None}
    return render(
        request,
        "logbook/inspect_check.html",
        {
            **_around(form),
            "findings": findings,
            "head": [(box.label, _as_read(box, draft, sign)) for box in boxes],
            "untold": [one for one, _blocks in form.places if one and one.pk not in told],
        },
    )


def _as_read(box: Box, draft: InspectionDraft, decimal_sign: str) -> str:
    """What the book will hold, not what was typed: a slipped sign shows here."""
    value = getattr(draft, box.name, box.value)
    if isinstance(value, datetime.date):
        return writing.day(value)
    if isinstance(value, Decimal):
        return writing.number(value, decimal_sign)
    return value or ""


def _last(block: Block, decimal_sign: str) -> str:
    sizes = measurements(block.crack) if block.crack is not None else []
    return size_words(sizes[-1], decimal_sign) if sizes else ""


def _write(request: Asked, form: InspectionForm) -> HttpResponse:
    """Declare the photos with the entry, write it, then let each photo arrive."""
    data = form.data()
    sent = {
        block.sent_as: request.FILES.getlist(f"{block.prefix}-photos")
        for block in form.blocks
        if block.sent_as is not None
    }
    for number, files in sent.items():
        data["findings"][number]["photos"] = [_digest(file) for file in files]
    inspection = log_inspection(request.user, read_inspection(data, known_of(form.component)))
    answer_now(inspection.leaf_id)
    findings = list(inspection.findings.order_by("pk"))
    for number, files in sent.items():
        declared = {photo.sha256: photo for photo in findings[number].photos.all()}
        for file in files:
            _arrive(request, declared[_digest(file)], file)
    return redirect("inspection", inspection.pk)


def _digest(file: File[bytes]) -> str:
    digest = hashlib.sha256()
    for chunk in file.chunks():
        digest.update(chunk)
    return digest.hexdigest()


def _arrive(request: Asked, photo: Photo, file: File[bytes]) -> None:
    """The entry is in the book already: a photo that cannot be kept is said, and can be sent
    again from the entry's page.
    """
    from django.contrib import messages

    try:
        small_enough(file.size)
        file.seek(0)
        add_photo(request.user, photo.pk, file.read())
    except Refusal as refusal:
        messages.warning(
            request,
            _("The photo %(name)s was not kept: %(why)s The entry itself is in the book.")
            % {"name": file.name, "why": refusal.sentence},
        )


@login_required
def inspection(request: Asked, pk: int) -> HttpResponse:
    """The answer: for each place the mark, the word, the sentence, and what binds until signed."""
    entry = access.inspection_for(request.user, pk)
    findings = list(
        entry.findings.select_related(
            "location", "crack", "measurement", "strike_out__leaf", "leaf"
        ).prefetch_related("photos")
    )
    sign = request.user.decimal_sign
    standing = strictest_first(lines(_standing_of(findings), sign))
    pending = AssessmentAsked.objects.filter(because_act=entry.leaf_id).exists()
    site = entry.component.site
    return render(
        request,
        "logbook/inspection.html",
        {
            "tab": "today",
            "site": site,
            "component": entry.component,
            "foot_zone": site.time_zone,
            "entry": entry,
            "findings": [(finding, finding_words(finding, sign)) for finding in findings],
            "lines": standing,
            "strictest": standing[0] if standing else None,
            "pending": pending,
            "may_log": may(request, site, "log"),
        },
        status=200,
    )


def _standing_of(findings: list[Finding]) -> QuerySet[Standing]:
    places = [finding.location_id for finding in findings]
    cracks = [finding.crack_id for finding in findings if finding.crack_id]
    rows = Standing.objects.filter(location__in=places).select_related(*RELATED)
    return rows.filter(crack__isnull=True) | rows.filter(crack__in=cracks)
