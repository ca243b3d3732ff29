"""An entry that did not fit: as sent, with its reason; a person says what was done with it."""

import json

from django import forms
from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import redirect, render
from django.utils.translation import gettext_lazy as _

from logbook import access
from logbook.actions.tray import settle_tray

from .asked import Asked
from .forms.fields import Text
from .refusals import attempt, form_status


class SettleForm(forms.Form):
    how = Text(_("What was done with it"), lines=3)


@login_required
def tray(request: Asked, pk: int) -> HttpResponse:
    item = access.tray_item_for(request.user, pk)
    form = SettleForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        done = attempt(form, settle_tray, request.user, item.pk, form.cleaned_data["how"])
        if done is not None:
            return redirect("desk")
    site = item.component.site
    return render(
        request,
        "logbook/tray.html",
        {
            "tab": "desk",
            "site": site,
            "component": item.component,
            "foot_zone": site.time_zone,
            "item": item,
            "why": json.loads(item.why),
            "content": json.dumps(json.loads(item.content), indent=2, ensure_ascii=False),
            "settled": getattr(item, "settled", None),
            "form": form,
        },
        status=form_status(form),
    )
