"""An entry as it was sent: written, or kept whole in the tray where the sender cannot be asked.

API, tablet and importer come through here, so that a repeat, a refusal and a conflict are the same
thing whichever way an entry came.
"""

import uuid
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

from logbook import access
from logbook.actions.answer import answer_now
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.actions.tray import keep_in_tray
from logbook.entry import InspectionDraft, read_inspection, text
from logbook.errors import Refusal
from logbook.models import Inspection, Person

Write = Callable[[Person, InspectionDraft], Inspection]


@dataclass(frozen=True)
class Taken:
    """Either the inspection, written now or (again) before; or why it was kept, and the number of
    the tray item."""

    inspection: Inspection | None = None
    again: bool = False
    refusal: Refusal | None = None
    kept: int | None = None


def take_in(
    by: Person,
    data: Mapping[str, Any],
    *,
    keep: bool,
    write: Write = log_inspection,
    answer: Callable[[uuid.UUID], object] = answer_now,
) -> Taken:
    """Read and write a sent entry, and work out its verdict while there is time.

    keep : what does not fit goes to the tray instead of being refused
    write : the action that writes the draft
    answer : what sees to the verdict once the entry is in the book

    Raises Refusal: not-found and not-permitted always; "same-key-other-content" (both kept);
    what does not fit, unless it is kept.
    """
    component = access.component_for(by, data.get("component"), "log")
    try:
        draft = read_inspection(data, known_of(component))
    except Refusal as refusal:
        before = written_before(by, data)
        if before is not None:
            return Taken(before, again=True)
        if not keep:
            raise
        item = keep_in_tray(by, component, str(data.get("key", "")), dict(data), refusal)
        return Taken(refusal=refusal, kept=item.pk)
    again = Inspection.objects.filter(key=draft.key).exists()
    try:
        inspection = write(by, draft)
    except Refusal as refusal:
        if refusal.code != "crack-closed" or not keep:
            raise
        item = keep_in_tray(by, component, str(draft.key), dict(data), refusal)
        return Taken(refusal=refusal, kept=item.pk)
    answer(inspection.leaf_id)
    return Taken(inspection, again=again)


def written_before(person: Person, data: Mapping[str, Any]) -> Inspection | None:
    """The entry that this very content wrote before.

    Read a second time, a harmless repeat can look wrong: its own size is the last one now, and
    its own counter the last reading. The content that was kept decides.
    """
    found = _by_key(data.get("key"), person)
    if found is None:
        return None
    # What the entry was read against then: everything before it.
    try:
        draft = read_inspection(data, known_of(found.component, before=found))
    except Refusal:
        return None
    return log_inspection(person, draft)


def _by_key(sent: object, person: Person) -> Inspection | None:
    try:
        key: uuid.UUID = text.key(sent)
    except text.Unreadable:
        return None
    return Inspection.objects.filter(key=key, author=person).select_related("leaf").first()
