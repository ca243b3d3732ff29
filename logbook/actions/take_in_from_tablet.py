"""What a tablet sends: entries, notes of a stop, the end of a round. Each is taken in once.

What one person wrote goes into the book as that person's alone, at that person's own sign-in. What
can no longer be sent so (a role that has ended, a tablet that was revoked) goes to the tray.
"""

import json
import uuid
from collections.abc import Mapping
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.actions.answer import answer_later, answer_now
from logbook.actions.log_inspection import log_inspection
from logbook.actions.tablets import tablet_for
from logbook.actions.take_in import Taken, take_in
from logbook.actions.tray import keep_in_tray
from logbook.entry import InspectionDraft, text
from logbook.errors import Refusal, conflict, invalid
from logbook.journal import append
from logbook.models import (
    Component,
    Device,
    Inspection,
    Person,
    Photo,
    PhotoLayer,
    RoundDeclared,
    SentFromTablet,
    Site,
    StopNote,
)

NOTED = "sent-from-tablet"
STOPPED = "note-stop"
DECLARED = "declare-round"
LONGEST = 20_000
SHAPES = ("arrow", "circle")


def take_in_from_tablet(
    by: Person, site: Site, sent: Mapping[str, Any], *, more: bool = False
) -> Taken:
    """Take in one entry.

    site : where it was written; by logs there, or once did
    sent : ``person`` (who wrote it), ``tablet`` (its key), ``entry`` (as the API takes it), and
        what goes beside it: ``round``, ``shown``, ``layers`` (SHA-256 to marks), ``spot`` (where a
        new place is on the picture)
    more : further entries wait behind this one, so that its verdict is left to the worker

    Raises Refusal: "other-person" where the person who is signed in did not write it.
    """
    entry = sent.get("entry")
    if not isinstance(entry, Mapping):
        raise invalid("An entry is an object of named fields.", {})
    component = access.component_of(site, entry.get("component"))
    device = tablet_for(site, sent.get("tablet"))
    whole = {**entry, "tablet": {name: sent[name] for name in sorted(sent) if name != "entry"}}
    why_not = _not_in_own_name(by, sent.get("person"), component, device)
    if why_not is not None:
        item = keep_in_tray(by, component, str(entry.get("key", "")), whole, why_not)
        return Taken(refusal=why_not, kept=item.pk)

    def write(person: Person, draft: InspectionDraft) -> Inspection:
        try:
            with transaction.atomic():
                inspection = log_inspection(person, draft)
                if not SentFromTablet.objects.filter(inspection=inspection).exists():
                    _note(person, inspection, device, sent)
            return inspection
        except Refusal:
            # Once more outside: what it puts in the tray must stay there.
            return log_inspection(person, draft)

    answer = answer_later if more else answer_now
    return take_in(by, whole, keep=True, write=write, answer=answer)


def _not_in_own_name(
    by: Person, author_pk: Any, component: Component, device: Device
) -> Refusal | None:
    """Why this goes to the tray for a person to look at. None: it is written as usual."""
    if str(author_pk) != str(by.pk):
        author = Person.objects.filter(pk=author_pk).first() if _whole(author_pk) else None
        if author is not None and _may_log(author, component.site):
            raise conflict(
                "other-person", f"{author} wrote this. It goes when {author} signs in here."
            )
        _still_logs(by, component)
        return conflict(
            "author-has-no-role",
            f"{author or 'Someone unknown'} wrote this and has no role here any more. "
            f"{by} handed it in.",
        )
    if not _may_log(by, component.site):
        return conflict("role-ended", f"The role of {by} at this site has ended.")
    if device.revoked_at is not None:
        return conflict("tablet-revoked", f"It was written on the revoked tablet “{device.name}”.")
    return None


def _whole(value: Any) -> bool:
    return str(value).isascii() and str(value).isdecimal() and len(str(value)) < 19


def _may_log(person: Person, site: Site) -> bool:
    return bool(access.roles_at(person, site) & access.NEEDS["log"])


def _still_logs(by: Person, component: Component) -> None:
    access.require(by, component.site, "log")


def _note(
    by: Person, inspection: Inspection, device: Device, sent: Mapping[str, Any]
) -> SentFromTablet:
    act = uuid.uuid4()
    note = SentFromTablet.objects.create(
        leaf_id=act,
        inspection=inspection,
        device=device,
        round=_key_or_none(sent.get("round")),
        shown=_as_text(sent.get("shown")),
    )
    layers = _layers(inspection, act, sent.get("layers"))
    spot = _spot(inspection, sent.get("spot"))
    append(
        NOTED,
        {
            "inspection": inspection.pk,
            "tablet": device.pk,
            "round": None if note.round is None else str(note.round),
            "shown": note.shown,
            "layers": {layer.photo.sha256: layer.marks for layer in layers},
            "spot": spot,
        },
        act=act,
        by=by,
        site=inspection.component.site,
        because_of=[inspection.leaf_id],
    )
    return note


def _key_or_none(value: Any) -> uuid.UUID | None:
    try:
        return text.key(value)
    except text.Unreadable:
        return None


def _as_text(value: Any) -> str:
    """Kept as it was sent, whatever it is: it says what a person saw, and nothing reads it back."""
    said = json.dumps(value, sort_keys=True, ensure_ascii=False)
    said = said.encode("utf-8", "backslashreplace").decode()
    return said if len(said) <= LONGEST else said[:LONGEST] + " … cut here"


def _layers(inspection: Inspection, act: uuid.UUID, given: Any) -> list[PhotoLayer]:
    made = []
    for sha256, marks in given.items() if isinstance(given, Mapping) else ():
        photo = Photo.objects.filter(finding__inspection=inspection, sha256=sha256).first()
        good = [mark for mark in marks if _is_mark(mark)] if isinstance(marks, list) else []
        if photo is not None and good:
            made.append(PhotoLayer.objects.create(leaf_id=act, photo=photo, marks=json.dumps(good)))
    return made


def _is_mark(mark: Any) -> bool:
    return (
        isinstance(mark, list)
        and len(mark) == 5
        and mark[0] in SHAPES
        and all(type(n) is int and 0 <= n <= 10_000 for n in mark[1:])
    )


def _spot(inspection: Inspection, given: Any) -> list[int] | None:
    """Where the finder touched the picture for a place that nobody had listed."""
    if not (
        isinstance(given, list)
        and len(given) == 2
        and all(type(n) is int and 0 <= n <= 10_000 for n in given)
    ):
        return None
    finding = inspection.findings.select_related("location").order_by("pk").first()
    if finding is None or not finding.location.provisional:
        return None
    place = finding.location
    if place.picture_x is None:
        place.picture_x, place.picture_y = given[0] / 10_000, given[1] / 10_000
        place.save(update_fields=["picture_x", "picture_y"])
    return list(given)


def note_stop(by: Person, site: Site, sent: Mapping[str, Any]) -> StopNote:
    """Which tag was hung, and who was told when, after a stop without a verdict."""
    _own(by, sent)
    key, at = _head(sent)
    there = StopNote.objects.filter(key=key).first()
    if there is not None:
        return there
    entry_key = _key_or_none(sent.get("entry_key"))
    found = None if entry_key is None else Inspection.objects.filter(key=entry_key, author=by)
    if not found:
        raise conflict("entry-not-here", "The entry of this stop is not in the book.")
    inspection = access.inspection_for(by, found[0].pk, "log")
    device = tablet_for(site, sent.get("tablet"))
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=inspection.component_id)
        there = StopNote.objects.filter(key=key).first()
        if there is not None:
            return there
        note = StopNote.objects.create(
            leaf_id=act,
            key=key,
            inspection=inspection,
            device=device,
            by=by,
            tag_number=_line(sent, "tag_number", 60),
            told_whom=_line(sent, "told_whom", 120),
            told_when=_line(sent, "told_when", 60),
            written_at=at,
            in_book_at=clock.now(),
        )
        append(
            STOPPED,
            {
                "note": note.pk,
                "inspection": inspection.pk,
                "tag_number": note.tag_number,
                "told_when": note.told_when,
            },
            act=act,
            by=by,
            site=inspection.component.site,
            because_of=[inspection.leaf_id],
            names={"told": note.told_whom},
        )
    return note


def declare_round(by: Person, site: Site, sent: Mapping[str, Any]) -> RoundDeclared:
    """The inspector declares a round: seen, not reached, and why not."""
    access.require(by, site, "log")
    device = tablet_for(site, sent.get("tablet"))
    _own(by, sent)
    key, at = _head(sent)
    counts = {name: sent.get(name) for name in ("seen", "not_reached")}
    wrong = {
        name: ["Write how many places, in digits."]
        for name, value in counts.items()
        if not (type(value) is int and 0 <= value < 100_000)
    }
    why_not = _line(sent, "why_not", 500)
    if counts["not_reached"] and not why_not:
        wrong["why_not"] = ["Say why these places were not reached."]
    if wrong:
        raise invalid("The end of the round does not fit yet.", wrong)
    act = uuid.uuid4()
    with transaction.atomic():
        Site.objects.select_for_update().get(pk=site.pk)
        there = RoundDeclared.objects.filter(key=key, site=site).first()
        if there is not None:
            return there
        made = RoundDeclared.objects.create(
            leaf_id=act,
            key=key,
            site=site,
            device=device,
            by=by,
            why_not=why_not,
            written_at=at,
            in_book_at=clock.now(),
            **counts,
        )
        append(
            DECLARED,
            {"declared": made.pk, "round": str(key), **counts, "why_not": why_not},
            act=act,
            by=by,
            site=site,
        )
    return made


def _own(by: Person, sent: Mapping[str, Any]) -> None:
    if str(sent.get("person")) != str(by.pk):
        raise conflict("other-person", "Someone else wrote this. It goes when they sign in here.")


def _head(sent: Mapping[str, Any]) -> tuple[uuid.UUID, Any]:
    try:
        return text.key(sent.get("key")), text.moment(sent.get("written_at"))
    except text.Unreadable as said:
        raise invalid("This does not fit.", {"key": [str(said)]}) from None


def _line(sent: Mapping[str, Any], name: str, longest: int) -> str:
    try:
        return text.line(sent.get(name, ""), longest=longest)
    except text.Unreadable as said:
        raise invalid("This does not fit.", {name: [str(said)]}) from None
