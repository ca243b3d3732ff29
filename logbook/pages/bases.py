"""What a place is reckoned on: read, revised, adopted."""

import json
from decimal import Decimal
from typing import Any

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext_lazy as _
from django.views.decorators.http import require_POST

from logbook import access
from logbook.actions.answer import answer_now
from logbook.actions.revise_basis import adopt_basis, eased_criteria, revise_basis
from logbook.cases.basis import kinds
from logbook.cases.rows import adopted_basis
from logbook.errors import Refusal, not_permitted
from logbook.models import Basis, Location, Material
from logbook.records.case_lines import case_lines

from .asked import Asked, may
from .forms.registering import BasisForm
from .forms.values import Values, names_for
from .refusals import form_status, show_beside

# These are chosen by their own questions, not typed by name.
ASKED_APART = ("kind", "material", "material_ref", "sources", "usage")


def _read(text: str) -> dict[str, Any]:
    return json.loads(text, parse_float=Decimal)


def _around(request: Asked, place: Location) -> dict[str, Any]:
    site = place.component.site
    return {
        "tab": "desk",
        "site": site,
        "component": place.component,
        "location": place,
        "foot_zone": site.time_zone,
    }


def _must_decide(request: Asked, place: Location) -> None:
    access.require(request.user, place.component.site, "audit")


@login_required
def basis(request: Asked, pk: int) -> HttpResponse:
    """Value, unit, source in the margin; the former value struck above the new."""
    one = access.basis_for(request.user, pk)
    _must_decide(request, one.location)
    before = (
        Basis.objects.filter(location=one.location, revision__lt=one.revision)
        .order_by("-revision")
        .first()
    )
    roles = access.roles_at(request.user, one.location.component.site)
    newest = one.location.bases.order_by("-revision").first()
    return render(
        request,
        "logbook/basis.html",
        {
            **_around(request, one.location),
            "basis": one,
            "before": before,
            "values": _compared(one, before),
            "body": _read(one.body),
            "adoption": getattr(one, "adoption", None),
            "newest": newest is not None and newest.pk == one.pk,
            "eased": eased_criteria(one.location, one) if not hasattr(one, "adoption") else [],
            "may_adopt": bool(roles & {"engineer", "signatory"})
            and one.author_id != request.user.pk,
            "own": one.author_id == request.user.pk,
            "may_engineer": may(request, one.location.component.site, "engineer"),
        },
    )


def _compared(one: Basis, before: Basis | None) -> list[dict[str, str]]:
    """Each line with the value it had in the revision before, where that was another."""
    was = {} if before is None else {line.label: line.value for line in _lines(before)}
    now = _lines(one)
    rows = [
        {
            "label": line.label.removeprefix("crack, "),
            "value": line.value,
            "source": line.source,
            "was": was.get(line.label, "") if was.get(line.label) != line.value else "",
        }
        for line in now
    ]
    here = {line.label for line in now}
    gone = [
        {"label": label.removeprefix("crack, "), "value": "", "source": "", "was": value}
        for label, value in was.items()
        if label not in here
    ]
    return rows + gone


def _lines(one: Basis) -> list[Any]:
    body = _read(one.body)
    sources = {str(k): str(v) for k, v in body.get("sources", {}).items()}
    extra = {"sizing", "detection", "depth_ratio", "separation", "could_miss", "uncertainty"}
    shown = {**body, "crack": {k: body[k] for k in extra if k in body}}
    return list(case_lines(json.loads(json.dumps(shown, default=float)), sources))


@login_required
@require_POST
def adopt(request: Asked, pk: int) -> HttpResponse:
    one = access.basis_for(request.user, pk)
    _must_decide(request, one.location)
    answer_now(adopt_basis(request.user, one.pk).leaf_id)
    return redirect("basis", one.pk)


@login_required
def revise(request: Asked, pk: int) -> HttpResponse:
    """Write the next revision: nothing changes until someone else adopts it."""
    place = access.location_for(request.user, pk, "engineer")
    materials = Material.objects.filter(site=place.component.site).order_by("name", "-revision")
    newest = place.bases.order_by("-revision").first()
    body = _read(newest.body) if newest is not None else {}
    chosen = request.POST.get("kind") or request.GET.get("kind") or str(body.get("kind", ""))
    if chosen not in dict(kinds()) or "choose" in request.GET:
        return _choose_kind(request, place, chosen)
    if request.method == "POST":
        form = BasisForm(request.POST, materials=materials)
        values = Values.posted(request.POST)
        if request.POST.get("step") == "write" and form.is_valid():
            try:
                made = _write(request, place, form.cleaned_data, values)
                return redirect("basis", made.pk)
            except Refusal as refusal:
                left = values.show(refusal.fields)
                show_beside(form, Refusal(refusal.code, refusal.sentence, status=refusal.status))
                for sentence in left:
                    form.add_error(None, sentence)
    else:
        reference = body.get("material_ref") or {}
        start = {"kind": chosen, "material": reference.get("id", "")}
        form = BasisForm(materials=materials, initial=start)
        have = {name: part for name, part in body.items() if name not in ASKED_APART}
        values = Values.of(names_for(chosen), have, body.get("sources", {}))
    return render(
        request,
        "logbook/basis_form.html",
        {
            **_around(request, place),
            "form": form,
            "values": values,
            "newest": newest,
            "adopted": adopted_basis(place),
            "kind_words": dict(kinds())[chosen],
        },
        status=form_status(form),
    )


# What is the body: the first of the questions that find the kind of crack.
BODIES = (
    ("plate", _("a plate, or a wall that may be taken as flat")),
    ("hole", _("a plate, beside a hole")),
    ("lug", _("a lug")),
    ("cylinder", _("a cylinder or a pipe")),
    ("bar", _("a round bar or shaft")),
    ("weld-toe", _("a plate, at the toe of a weld")),
    ("specimen", _("a test specimen")),
    ("tabulated", _("another body")),
)


def _choose_kind(request: Asked, place: Location, chosen: str) -> HttpResponse:
    """What is the body, where does it start, does it go through: as links, without script."""
    named = kinds()
    groups = [
        (words, [(name, said) for name, said in named if name.startswith(start)])
        for start, words in BODIES
    ]
    return render(
        request,
        "logbook/basis_kind.html",
        {
            **_around(request, place),
            "groups": [(words, found) for words, found in groups if found],
            "chosen": chosen,
        },
    )


def _write(request: Asked, place: Location, typed: dict[str, Any], values: Values) -> Basis:
    material = access.material_for(request.user, typed["material"])
    if material.site_id != place.component.site_id:
        raise not_permitted(str(_("This material is registered at another site.")))
    body = values.body()
    sources = {**values.sources(), "material": material.source}
    reference = {"id": material.pk, "name": material.name, "revision": material.revision}
    whole = {
        **body,
        "kind": typed["kind"],
        "material": _read(material.body),
        "material_ref": reference,
        "sources": sources,
    }
    return revise_basis(request.user, place.pk, body=whole, reason=typed["reason"])
