"""Review, signature and what follows from them."""

from typing import Any

from django import forms
from django.utils.translation import gettext_lazy as _

from logbook.models import DepthBasis, Disposition, Licence, Review, Verdict

from .fields import Choice, Day, Number, Password, Text, offer

CREW_VERDICTS = [
    (Verdict.CONTINUE, _("continue: may stay in use")),
    (Verdict.WATCH, _("watch: may stay in use, look again early")),
    (Verdict.RESTRICT, _("restrict: only up to a limit")),
    (Verdict.REPAIR, _("repair: before a date, or before it goes back into use")),
    (Verdict.REFER, _("refer: not to be used until decided")),
    (Verdict.WITHDRAW, _("withdraw: take it out of use now")),
]


class ReviewForm(forms.Form):
    decision = Choice(
        _("Your decision"),
        [
            (Review.Decision.ACCEPT, _("Accept what is proposed")),
            (Review.Decision.OVERRIDE, _("Override it: another verdict, with grounds")),
        ],
    )
    verdict = Choice(_("If you override: which verdict"), CREW_VERDICTS, required=False)
    until_on = Day(_("If you override: until which day"), required=False)
    until_at = Number(_("If you override: until which counter reading"), required=False)
    limit = Text(
        _("Limit, where the part is restricted"),
        help_text=_("in the crew's words, such as: 12 t, one hook only"),
        required=False,
    )
    grounds = Text(
        _("Grounds"), lines=4, required=False, help_text=_("needed for an override; they are kept")
    )


class SignatureForm(forms.Form):
    """The licence, what signing means, and the password on the signature line."""

    licence = Choice(_("Signed under licence"), [])
    password = Password(_("Password of the signatory"))

    def __init__(self, *args: Any, licences: list[Licence], **kwargs: Any) -> None:
        super().__init__(*args, **kwargs)
        offer(
            self.fields["licence"],
            [(str(one.pk), f"{one} · {one.discipline}") for one in licences],
        )


class SignForm(SignatureForm):
    meaning = Choice(
        _("What your signature means"),
        [
            (Disposition.Meaning.PERFORMED, _("I did this assessment.")),
            (Disposition.Meaning.REVIEWED, _("I reviewed this assessment.")),
            (Disposition.Meaning.APPROVED, _("I approve this verdict.")),
        ],
    )
    shown_digest = forms.CharField(widget=forms.HiddenInput)

    field_order = ["meaning", "licence", "password", "shown_digest"]


class ReturnForm(SignatureForm):
    grounds = Text(_("Why it may go back into service"), lines=3)
    shown_digest = forms.CharField(widget=forms.HiddenInput)

    field_order = ["grounds", "licence", "password", "shown_digest"]


class ConfirmForm(forms.Form):
    how = Text(
        _("What limits it now"),
        help_text=_("such as: limiter set to 12 t, sealed; or: tag 118 hung at the hook"),
    )


class DeferForm(forms.Form):
    new_on = Day(_("New day"))
    new_at = Number(_("New counter reading"), required=False)
    grounds = Text(_("Why it cannot be looked at in time, and why waiting is safe"), lines=4)


class ApproveForm(SignatureForm):
    pass


class StrikeOutForm(forms.Form):
    reason = Text(_("What is wrong with it"), lines=3)


class CorrectForm(StrikeOutForm):
    """A size struck out can be written anew in the same act."""

    depth_basis = Choice(
        _("The right depth, if you know it"),
        [*DepthBasis.choices, ("", _("leave it out: strike out only"))],
        required=False,
    )
    depth_mm = Text(_("Depth in mm"), required=False)
    length_mm = Text(_("Length along the surface in mm"), required=False)
    why_smaller = Text(_("Why it is smaller than the time before, if it is"), required=False)
    confirm_unlikely = Choice(
        _("If a size is asked back"),
        [("", _("not asked")), ("yes", _("this size is right"))],
        required=False,
    )

    RIGHT = ("depth_basis", "depth_mm", "length_mm", "why_smaller", "confirm_unlikely")


class ReassessForm(forms.Form):
    why = Text(_("Why it is assessed anew"), lines=2)


class RepairForm(forms.Form):
    sort = Choice(
        _("What was done"),
        [
            ("repair", _("Repaired in place")),
            ("exchange", _("Exchanged for another part")),
            ("removal", _("Taken out for good")),
        ],
    )
    welded = Choice(_("Was there welding?"), [("yes", _("yes")), ("no", _("no"))])
    what = Text(_("What exactly"), lines=3)
    done_by = Text(_("Done by"))
    work_order = Text(_("Work order"))
    done_on = Day(_("Done on"))
    counter = Number(_("Counter reading then"))
    inspection_after = Text(
        _("Inspection after it"), lines=3, help_text=_("method, result, by whom")
    )
    closes = Choice(
        _("Is the crack gone?"),
        [
            ("yes", _("yes, the crack is closed")),
            ("no", _("no, or it cannot be ruled out: it goes on with a new start")),
        ],
    )
    start_depth_mm = Number(
        _("New start: depth in mm"),
        required=False,
        help_text=_("what the inspection after it could have missed"),
    )
    start_length_mm = Number(_("New start: length in mm"), required=False)
    start_source = Text(_("Where this size comes from"), required=False)
