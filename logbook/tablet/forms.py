"""The two forms of the tablets' pages, and how a refusal is shown in one."""

from typing import Any

from django import forms
from django.utils.translation import gettext_lazy as _

from logbook.errors import Refusal

MISSING = {"required": _("This is missing.")}


class YesOrNo(forms.ChoiceField):
    """Neither is chosen beforehand."""

    as_choice = True


class RulesForm(forms.Form):
    keep_days = forms.IntegerField(
        label=_("Days without contact after which a tablet wipes what it holds of the site"),
        help_text=_("never what waits to be sent"),
        widget=forms.TextInput(attrs={"inputmode": "numeric"}),
        error_messages=MISSING | {"invalid": _("Write whole days, such as 30.")},
    )
    inches = YesOrNo(
        label=_("May sizes be typed in inches?"),
        choices=[("no", _("No, in millimetres only")), ("yes", _("Yes, both are shown"))],
        widget=forms.RadioSelect,
        error_messages=MISSING,
    )


class FileForm(forms.Form):
    file = forms.FileField(label=_("The file that the tablet saved"), error_messages=MISSING)


def show(form: forms.Form, refusal: Refusal) -> int:
    """The refusal's sentences in the form; gives the status of the answer."""
    form.add_error(None, refusal.sentence)
    for name, sentences in refusal.fields.items():
        for sentence in sentences:
            form.add_error(name if name in form.fields else None, sentence)
    return refusal.status


def context(site: Any, form: forms.Form, heading: str, verb: str, **more: Any) -> dict[str, Any]:
    return {
        "tab": "index",
        "site": site,
        "foot_zone": site.time_zone,
        "form": form,
        "heading": heading,
        "verb": verb,
        **more,
    }
