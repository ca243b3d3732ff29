"""Sites, people, licences, components, locations and materials."""

from typing import Any

from django import forms
from django.utils.translation import gettext_lazy as _

from logbook.models import Role

from .deciding import SignatureForm
from .fields import Choice, Day, Number, Password, Pick, Text, offer


class SiteForm(forms.Form):
    name = Text(_("Name of the site"), max_length=120)
    time_zone = Text(_("Time zone"), help_text=_("such as Europe/Budapest"))
    on_call_name = Text(_("Who is called when a part must stop"))
    on_call_phone = Text(_("Telephone"))
    working_weekdays = forms.MultipleChoiceField(
        label=_("Working days"),
        choices=[
            ("1", _("Monday")),
            ("2", _("Tuesday")),
            ("3", _("Wednesday")),
            ("4", _("Thursday")),
            ("5", _("Friday")),
            ("6", _("Saturday")),
            ("7", _("Sunday")),
        ],
        widget=forms.CheckboxSelectMultiple,
    )
    working_weekdays.as_choice = True  # type: ignore[attr-defined]
    closed_days = Text(
        _("Days on which it is closed"),
        lines=3,
        required=False,
        help_text=_("2026-12-25, one a line"),
    )


class PolicyForm(SignatureForm):
    allowed = Choice(
        _("May an unsigned “continue” or “watch” be acted on here?"),
        [
            ("yes", _("Yes: the part may stay in use while the signature is awaited")),
            ("no", _("No: the part is held until it is signed")),
        ],
    )
    grounds = Text(_("Grounds"), lines=3)

    field_order = ["allowed", "grounds", "licence", "password"]


class PersonForm(forms.Form):
    username = Text(_("Sign-in name"), max_length=150)
    full_name = Text(_("Full name"), max_length=120)
    phone = Text(_("Telephone"), required=False, max_length=40)
    password = Password(_("First password"))


class RoleForm(forms.Form):
    username = Text(_("Sign-in name of the person"))
    role = Choice(_("Role here"), Role.choices)


class LicenceForm(forms.Form):
    username = Text(_("Sign-in name of the holder"))
    body = Text(_("Granted by"))
    number = Text(_("Number"))
    discipline = Text(_("For what"))
    valid_from = Day(_("Valid from"))
    valid_to = Day(_("Valid to"))


class RevokeForm(forms.Form):
    why = Text(_("Why it is revoked"), lines=2)


class ComponentForm(forms.Form):
    tag = Text(_("Number on the part"), max_length=24, help_text=_("without the letters I and O"))
    name = Text(_("What it is"), max_length=120)
    description = Text(_("How to find it"), lines=2, required=False)
    serial = Text(_("Maker's serial number"), required=False, max_length=60)
    counter_name = Text(_("What its counter counts"), help_text=_("such as: lifts, lock fillings"))
    counter_unit = Text(_("One count"), help_text=_("such as: lift"))
    per_day = Number(_("The least that is reckoned for a day"))


class PictureForm(forms.Form):
    picture = forms.ImageField(
        label=_("Picture of the part"), error_messages={"required": _("This is missing.")}
    )


class LocationForm(forms.Form):
    name = Text(_("Name of the place"), max_length=120)
    described = Text(_("How to find it"), lines=2, required=False)


class MaterialForm(forms.Form):
    name = Text(_("Name of the material"), max_length=120)
    source = Text(_("Where the values come from"), lines=2)


class BasisForm(forms.Form):
    """The values themselves stand beside it, each with its own source (values.py)."""

    reason = Text(_("Why this revision"), lines=2)
    kind = forms.CharField(widget=forms.HiddenInput)
    material = Pick(_("Material"), [], help_text=_("as registered at the site"))

    def __init__(self, *args: Any, materials: Any, **kwargs: Any) -> None:
        super().__init__(*args, **kwargs)
        named = [(str(one.pk), str(one)) for one in materials]
        offer(self.fields["material"], [("", str(_("– choose –"))), *named])
