"""Photos and records as files."""

from django import forms
from django.contrib.auth.decorators import login_required
from django.http import FileResponse, HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy

from logbook import access
from logbook.actions.add_photo import add_photo, photos_path, shown_path
from logbook.errors import not_found

from .asked import Asked
from .forms.fields import MISSING
from .refusals import attempt, form_status

ENDINGS = {"image/jpeg": "jpg", "image/png": "png", "image/webp": "webp"}


class PhotoForm(forms.Form):
    photo = forms.FileField(label=gettext_lazy("The photo"), error_messages=MISSING)


@login_required
def photo(request: Asked, pk: int) -> FileResponse:
    """The bytes as they were saved: never rendered here, only handed out as a file."""
    one = access.photo_for(request.user, pk)
    if one.arrived_at is None or not photos_path(one.sha256).is_file():
        raise not_found("photo")
    ending = ENDINGS.get(one.media_type, "bin")
    answer = FileResponse(
        photos_path(one.sha256).open("rb"),
        as_attachment=True,
        filename=f"photo-{one.sha256[:12]}.{ending}",
        content_type="application/octet-stream",
    )
    answer["Cache-Control"] = "private, max-age=3600"
    return answer


@login_required
def shown(request: Asked, pk: int) -> FileResponse:
    """The re-encoded copy, which alone is shown."""
    one = access.photo_for(request.user, pk)
    if one.arrived_at is None or not shown_path(one.sha256).is_file():
        raise not_found("photo")
    answer = FileResponse(shown_path(one.sha256).open("rb"), content_type="image/jpeg")
    answer["Content-Disposition"] = "inline"
    answer["Cache-Control"] = "private, max-age=3600"
    return answer


@login_required
def send(request: Asked, pk: int) -> HttpResponse:
    """A photo that its entry announced and that never came."""
    one = access.photo_for(request.user, pk, "log")
    form = PhotoForm(request.POST or None, request.FILES or None)
    if request.method == "POST" and form.is_valid():
        data = form.cleaned_data["photo"].read()
        if attempt(form, add_photo, request.user, one.pk, data) is not None:
            return _after(one.finding)
    return render(
        request,
        "logbook/form.html",
        {
            "tab": "today",
            "site": one.site,
            "foot_zone": one.site.time_zone,
            "form": form,
            "heading": _("Send the photo that has not arrived"),
            "about": [_("It must be the very file that the entry announced.")],
            "verb": _("Send it"),
        },
        status=form_status(form),
    )


def _after(finding: object) -> HttpResponse:
    if finding is None:
        return redirect("today")
    return redirect("inspection", finding.inspection_id)  # type: ignore[attr-defined]
