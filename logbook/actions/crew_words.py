"""What the crew reads: one sentence a verdict, said the same on every page and tablet."""

from django.utils.translation import gettext as _

from logbook.actions import standing as standings
from logbook.models import Site, Standing, Verdict


def sentence(reading: standings.Reading, until: str, site: Site, past: str = "") -> str:
    """What the crew does now, in one sentence or two."""
    if reading.state == Standing.State.NOT_ASSESSED:
        return _("No verdict yet: do not return it to service.")
    if reading.lapsed:
        return _("Its time was up at %(past)s. Not to be used until it has been looked at.") % {
            "past": past or until
        }
    said = verdict_sentence(
        reading.verdict, until, reading.limit, site.on_call_name, site.on_call_phone
    )
    if reading.held and reading.verdict in (Verdict.CONTINUE, Verdict.WATCH):
        return _("Not to be used until it is signed. Then: %(said)s") % {"said": said}
    if reading.held and reading.verdict == Verdict.RESTRICT:
        return unconfirmed(said)
    return said


def unconfirmed(said: str) -> str:
    """A restriction is no permission before its limiter or tag is confirmed."""
    return _("Not to be used until its limiter or tag is confirmed. Then: %(said)s") % {
        "said": said
    }


def verdict_sentence(verdict: str, until: str, limit: str, name: str, phone: str) -> str:
    """The sentence of a verdict alone."""
    words = {"until": until, "limit": limit, "name": name, "phone": phone}
    if verdict == Verdict.CONTINUE:
        return (
            _("May stay in use. Next look by %(until)s.") % words
            if until
            else _("May stay in use. No next look is set.")
        )
    if verdict == Verdict.WATCH:
        return (
            _("May stay in use. Look again early: by %(until)s.") % words
            if until
            else _("May stay in use. Look again early.")
        )
    if verdict == Verdict.RESTRICT:
        said = _("May be used only so: %(limit)s.") % {"limit": limit.rstrip(". ")}
        return said + (" " + _("Look again by %(until)s.") % words if until else "")
    if verdict == Verdict.REPAIR:
        return (
            _("Repair before %(until)s.") % words
            if until
            else _("Not back into use until repaired.")
        )
    if verdict == Verdict.REFER:
        return (
            _("Not to be used until an engineer has decided. Asked: %(name)s, %(phone)s.") % words
        )
    return _("Take it out of use now. Hang the tag. Call %(name)s, %(phone)s.") % words


def state_words(reading: standings.Reading) -> str:
    """Proposed, proposed and binding, or signed: always said beside the rule."""
    if reading.lapsed:
        return _("past its date")
    return {
        Standing.State.NOT_ASSESSED: _("not yet assessed"),
        Standing.State.PROPOSED: _("proposed"),
        Standing.State.BINDING: _("proposed, binding"),
        Standing.State.IN_FORCE: _("signed, in force"),
    }[Standing.State(reading.state)]
