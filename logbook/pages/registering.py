"""Sites, people, licences, components, places and materials."""

import hashlib
import json
from decimal import Decimal
from typing import Any

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext as _
from django.views.decorators.http import require_POST

import assessment
from logbook import access, clock
from logbook.actions.add_photo import add_photo, declare_photo
from logbook.actions.grant_role import end_role, grant_role
from logbook.actions.register_component import (
    add_location,
    mark_picture,
    register_component,
    set_picture,
)
from logbook.actions.register_licence import register_licence, revoke_licence
from logbook.actions.register_material import register_material
from logbook.actions.register_person import register_person
from logbook.actions.register_site import register_site
from logbook.actions.set_unsigned_policy import set_unsigned_policy
from logbook.cases.growth_library import typical_law, typical_laws
from logbook.errors import Refusal, invalid, not_permitted
from logbook.models import Component, Licence, Location, Material, Person, Photo, Site
from logbook.records.case_lines import case_lines

from .asked import Asked, may
from .deciding import licences_of
from .forms.registering import (
    ComponentForm,
    LicenceForm,
    LocationForm,
    MaterialForm,
    PersonForm,
    PictureForm,
    PolicyForm,
    RevokeForm,
    RoleForm,
    SiteForm,
)
from .forms.values import MATERIAL, Values
from .refusals import attempt, form_status, show_beside

# Without script the picture is marked at this width, which every screen has room for.
MARKING_WIDTH = 320


def _form_page(
    request: Asked, form: Any, site: Site | None, heading: str, verb: str, **more: Any
) -> HttpResponse:
    zone = site.time_zone if site is not None else "UTC"
    context = {"tab": "index", "site": site, "foot_zone": zone, "form": form}
    context |= {"heading": heading, "verb": verb, **more}
    return render(request, "logbook/form.html", context, status=form_status(form))


@login_required
def site(request: Asked, slug: str) -> HttpResponse:
    """The site's own page: who may do what, whom to call, what is registered."""
    one = access.site_for(request.user, slug)
    members = one.memberships.filter(ended_at__isnull=True).select_related("person")
    today = clock.today(one.time_zone)
    licences = Licence.objects.filter(site=one).select_related("person")
    return render(
        request,
        "logbook/site.html",
        {
            "tab": "index",
            "site": one,
            "foot_zone": one.time_zone,
            "members": members.order_by("person__full_name", "role"),
            "licences": [(licence, licence.in_force(today)) for licence in licences],
            "materials": one.materials.select_related("leaf").order_by("name", "-revision"),
            "policy": one.unsigned_policies.select_related("signatory", "licence")
            .order_by("-leaf__index")
            .first(),
            "components": one.components.all(),
            "may_administer": may(request, one, "administer"),
            "may_register": may(request, one, "register"),
            "may_engineer": may(request, one, "engineer"),
            "may_sign": may(request, one, "sign"),
        },
    )


@login_required
def new_site(request: Asked) -> HttpResponse:
    if not request.user.is_superuser:
        raise not_permitted(_("Only the keeper of the installation can set up a site."))
    form = SiteForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        typed = {**form.cleaned_data}
        typed["working_weekdays"] = "".join(sorted(typed["working_weekdays"]))
        made = attempt(form, register_site, request.user, **typed)
        if made is not None:
            return redirect("site", made.slug)
    return _form_page(request, form, None, _("Set up a site"), _("Set it up"))


@login_required
def policy(request: Asked, slug: str) -> HttpResponse:
    """The owner's word on unsigned verdicts, by signature; there is no default."""
    one = access.site_for(request.user, slug, "sign")
    form = PolicyForm(request.POST or None, licences=licences_of(request, one))
    if request.method == "POST" and form.is_valid():
        typed = form.cleaned_data
        done = attempt(
            form,
            set_unsigned_policy,
            request.user,
            one,
            allowed=typed["allowed"] == "yes",
            grounds=typed["grounds"],
            licence_pk=typed["licence"],
            password=typed["password"],
            request=request,
        )
        if done is not None:
            return redirect("site", one.slug)
    return _form_page(request, form, one, _("Unsigned verdicts at this site"), _("Sign"))


def _named(username: str) -> Person:
    found = Person.objects.filter(username=username.strip()).first()
    if found is None:
        raise invalid(
            _("Nobody signs in by this name."),
            {"username": [_("Check the name, or add the person first.")]},
        )
    return found


@login_required
def new_person(request: Asked, slug: str) -> HttpResponse:
    one = access.site_for(request.user, slug, "administer")
    form = PersonForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        made = attempt(form, register_person, request.user, one, **form.cleaned_data)
        if made is not None:
            return redirect("new-role", one.slug)
    return _form_page(request, form, one, _("Add a person"), _("Add"))


@login_required
def new_role(request: Asked, slug: str) -> HttpResponse:
    one = access.site_for(request.user, slug, "administer")
    form = RoleForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        typed = form.cleaned_data
        done = attempt(
            form,
            lambda: grant_role(request.user, one, _named(typed["username"]).pk, typed["role"]),
        )
        if done is not None:
            return redirect("site", one.slug)
    return _form_page(request, form, one, _("Give somebody a role here"), _("Give it"))


@login_required
@require_POST
def end(request: Asked, slug: str, pk: int) -> HttpResponse:
    one = access.site_for(request.user, slug, "administer")
    end_role(request.user, one, pk)
    return redirect("site", one.slug)


@login_required
def new_licence(request: Asked, slug: str) -> HttpResponse:
    one = access.site_for(request.user, slug, "administer")
    form = LicenceForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        typed = {**form.cleaned_data}
        username = typed.pop("username")
        done = attempt(
            form,
            lambda: register_licence(request.user, one, _named(username).pk, **typed),
        )
        if done is not None:
            return redirect("site", one.slug)
    return _form_page(request, form, one, _("Register a licence"), _("Register"))


@login_required
def revoke(request: Asked, slug: str, pk: int) -> HttpResponse:
    one = access.site_for(request.user, slug, "administer")
    form = RevokeForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        done = attempt(form, revoke_licence, request.user, one, pk, form.cleaned_data["why"])
        if done is not None:
            return redirect("site", one.slug)
    return _form_page(request, form, one, _("Revoke a licence"), _("Revoke"))


@login_required
def new_component(request: Asked, slug: str) -> HttpResponse:
    one = access.site_for(request.user, slug, "register")
    form = ComponentForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        made = attempt(form, register_component, request.user, one, **form.cleaned_data)
        if made is not None:
            return redirect("in-force", made.pk)
    return _form_page(request, form, one, _("Register a part"), _("Register"))


@login_required
def new_location(request: Asked, pk: int) -> HttpResponse:
    component = access.component_for(request.user, pk, "register")
    form = LocationForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        made = attempt(form, add_location, request.user, component.pk, **form.cleaned_data)
        if made is not None:
            return redirect("picture", component.pk)
    about = [_("It is put at the end of the walking order.")]
    return _form_page(
        request,
        form,
        component.site,
        _("Add a place"),
        _("Add it"),
        component=component,
        about=about,
    )


@login_required
def picture(request: Asked, pk: int) -> HttpResponse:
    """The picture of the part, and the places on it that can be marked."""
    component = access.component_for(request.user, pk, "register")
    form = PictureForm(request.POST or None, request.FILES or None)
    if request.method == "POST" and form.is_valid():
        file = form.cleaned_data["picture"]
        file.seek(0)
        if attempt(form, _take, request, component, file.read()) is not None:
            return redirect("picture", component.pk)
    return render(
        request,
        "logbook/picture.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "foot_zone": component.site.time_zone,
            "places": component.locations.all(),
            "form": form,
        },
        status=form_status(form),
    )


def _take(request: Asked, component: Component, data: bytes) -> Component:
    declared = declare_photo(request.user, component.site, hashlib.sha256(data).hexdigest())
    photo = add_photo(request.user, declared.pk, data)
    return set_picture(request.user, component.pk, photo)


@login_required
def mark(request: Asked, pk: int) -> HttpResponse:
    """Touch the picture where the place is. An image button sends the point without script."""
    place = access.location_for(request.user, pk, "register")
    component = place.component
    shown = component.picture
    refusal = None
    if shown is not None and not (shown.arrived_at and shown.width and shown.height):
        shown = None
    if request.method == "POST" and shown is not None:
        try:
            mark_picture(request.user, place.pk, *_fractions(request, shown))
            return redirect("mark", place.pk)
        except Refusal as said:
            if said.status in (403, 404):
                raise
            refusal = said
    height = marking_height(shown) if shown is not None else 0
    return render(
        request,
        "logbook/mark.html",
        {
            "tab": "index",
            "site": component.site,
            "component": component,
            "location": place,
            "foot_zone": component.site.time_zone,
            "shown": shown,
            "marking_width": MARKING_WIDTH,
            "marking_height": height,
            "others": _unmarked(component, place),
            "refusal": refusal,
        },
        status=400 if refusal is not None else 200,
    )


def marking_height(shown: Photo) -> int:
    return round(MARKING_WIDTH * (shown.height or 0) / (shown.width or 1))


def _fractions(request: Asked, shown: Any) -> tuple[float, float]:
    """The touched point as parts of the picture's width and height."""
    try:
        width = float(request.POST.get("width", MARKING_WIDTH))
        x, y = float(request.POST["at.x"]), float(request.POST["at.y"])
    except (KeyError, ValueError):
        raise invalid(
            _("No point was touched."), {"mark": [_("Touch the picture itself.")]}
        ) from None
    if not width > 0:
        raise invalid(_("No point was touched."), {"mark": [_("Touch the picture itself.")]})
    return x / width, y * shown.width / (width * shown.height)


def _unmarked(component: Component, place: Location) -> list[Location]:
    rows = component.locations.filter(picture_x__isnull=True)
    return [one for one in rows if one.pk != place.pk]


@login_required
def new_material(request: Asked, slug: str) -> HttpResponse:
    """A material, or the next revision of one: values by name."""
    one = access.site_for(request.user, slug, "engineer")
    given = request.GET.get("from")
    before = access.material_for(request.user, given, "engineer") if given else None
    if request.method == "POST":
        form, values = MaterialForm(request.POST), Values.posted(request.POST)
        values.sourced = False
        if form.is_valid():
            try:
                typed = form.cleaned_data
                made = register_material(
                    request.user,
                    one,
                    name=typed["name"],
                    source=typed["source"],
                    body=values.body(),
                )
                return redirect("material", made.pk)
            except Refusal as refusal:
                left = values.show(refusal.fields)
                show_beside(form, Refusal(refusal.code, refusal.sentence, status=refusal.status))
                for sentence in left:
                    form.add_error(None, sentence)
    else:
        typical = typical_law(request.GET.get("typical", ""))
        start = _body_of(before) if typical is None else typical.material()
        form = MaterialForm(initial=_revised(before))
        values = Values.of(MATERIAL, start, {})
        values.sourced = False
    return render(
        request,
        "logbook/material_form.html",
        {"tab": "index", "site": one, "foot_zone": one.time_zone, "form": form, "values": values},
        status=form_status(form),
    )


@login_required
def growth_laws(request: Asked, slug: str) -> HttpResponse:
    """Published growth laws to start a material from; typical values, never for acceptance."""
    one = access.site_for(request.user, slug, "see")
    return render(
        request,
        "logbook/growth_laws.html",
        {
            "tab": "index",
            "site": one,
            "foot_zone": one.time_zone,
            "laws": typical_laws(),
            "may_engineer": may(request, one, "engineer"),
        },
    )


def _revised(before: Material | None) -> dict[str, str]:
    """The next revision of a material starts from the one before; its source is written anew."""
    return {} if before is None else {"name": before.name}


def _body_of(before: Material | None) -> dict[str, Any]:
    return {} if before is None else json.loads(before.body, parse_float=Decimal)


@login_required
def material(request: Asked, pk: int) -> HttpResponse:
    one: Material = access.material_for(request.user, pk)
    body = json.loads(one.body)
    return render(
        request,
        "logbook/material.html",
        {
            "tab": "index",
            "site": one.site,
            "foot_zone": one.site.time_zone,
            "material": one,
            "may_engineer": may(request, one.site, "engineer"),
            "tensile": assessment.tensile_summary(body),
            "values": [
                (line.label.removeprefix("material, "), line.value)
                for line in case_lines({"material": body}, {})
            ],
        },
    )
