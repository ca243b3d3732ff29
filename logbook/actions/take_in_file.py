"""The file that a tablet saved of what waited on it: each thing in it is taken in as if sent.

Whoever brings the file does not become the author: what the bringer did not write goes to the tray
with the name of who did, also where that person still has a role here.
"""

import base64
import binascii
import json
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from logbook import access
from logbook.actions.add_photo import add_photo
from logbook.actions.tablets import register_tablet
from logbook.actions.take_in_from_tablet import (
    declare_round,
    note_stop,
    take_in_from_tablet,
)
from logbook.actions.tray import keep_in_tray
from logbook.errors import Refusal, invalid
from logbook.models import Inspection, Person, Photo, Site

FORM = 1
LARGEST = 400 * 1024 * 1024
WHERE = "It must be the file that the tablet saved under “Save what waits to a file”."


@dataclass(frozen=True)
class FromFile:
    """What became of one thing of the file: its key, what it is, and one sentence."""

    key: str
    kind: str
    entry_number: int | None
    said: str


def take_in_file(by: Person, site: Site, data: bytes) -> list[FromFile]:
    """Take in all of the file that is of this site; read a second time, nothing is doubled.

    Raises Refusal where it is no such file; what does not fit within it is said item by item.
    """
    access.require(by, site, "log")
    content = _read(data)
    photos = _photos(content.get("photos"))
    register_tablet(by, site, key=content.get("tablet"), name="read from a file")
    return [_one(by, site, item, content, photos) for item in _items(content, site)]


def _read(data: bytes) -> Mapping[str, Any]:
    if len(data) > LARGEST:
        raise _not_ours(f"The file is larger than {LARGEST // 2**20} MB.")
    try:
        content = json.loads(data)
    except (ValueError, RecursionError):
        raise _not_ours("This is no file of a tablet.") from None
    if not isinstance(content, Mapping) or content.get("waiting") != FORM:
        raise _not_ours("This is no file of a tablet.")
    return content


def _not_ours(sentence: str) -> Refusal:
    return invalid(sentence, {"file": [WHERE]})


def _items(content: Mapping[str, Any], site: Site) -> Iterator[Mapping[str, Any]]:
    items = content.get("items")
    for item in items if isinstance(items, list) else []:
        here = isinstance(item, Mapping) and item.get("site") == site.slug
        if here and isinstance(item.get("body"), Mapping):
            yield item


def _photos(given: Any) -> dict[str, bytes]:
    """By digest; what cannot be read is left out, and stays announced and not arrived."""
    found: dict[str, bytes] = {}
    for one in given if isinstance(given, list) else []:
        if isinstance(one, Mapping):
            try:
                found[str(one.get("sha256"))] = base64.b64decode(
                    str(one.get("base64")), validate=True
                )
            except (binascii.Error, ValueError):
                continue
    return found


def _one(
    by: Person,
    site: Site,
    item: Mapping[str, Any],
    content: Mapping[str, Any],
    photos: Mapping[str, bytes],
) -> FromFile:
    key, kind = str(item.get("key", "")), str(item.get("kind", ""))
    sent = {**item["body"], "person": item.get("person"), "tablet": content.get("tablet")}
    try:
        if kind == "entry":
            return _entry(by, site, key, sent, photos)
        if kind == "stop-note":
            return FromFile(key, kind, note_stop(by, site, sent).entry_number, "In the book.")
        if kind == "round":
            return FromFile(key, kind, declare_round(by, site, sent).entry_number, "In the book.")
    except Refusal as refusal:
        if refusal.code == "other-person" and kind == "entry":
            return _in_the_tray(by, site, key, sent, item, refusal)
        return FromFile(key, kind, None, refusal.sentence)
    return FromFile(key, kind, None, "This book does not know such a thing.")


def _entry(
    by: Person, site: Site, key: str, sent: Mapping[str, Any], photos: Mapping[str, bytes]
) -> FromFile:
    taken = take_in_from_tablet(by, site, sent)
    if taken.inspection is None:
        why = taken.refusal.sentence if taken.refusal is not None else ""
        return FromFile(key, "entry", None, f"In the tray: {why}")
    arrived, missing = _arrive(by, taken.inspection, photos)
    said = "In the book before." if taken.again else "In the book."
    if arrived:
        said += f" Photos: {arrived}."
    if missing:
        said += f" Not in the file, or not as announced: {missing} photos."
    return FromFile(key, "entry", taken.inspection.entry_number, said)


def _arrive(by: Person, inspection: Inspection, photos: Mapping[str, bytes]) -> tuple[int, int]:
    arrived = missing = 0
    for photo in Photo.objects.filter(finding__inspection=inspection, arrived_at__isnull=True):
        try:
            add_photo(by, photo.pk, photos[photo.sha256])
            arrived += 1
        except (KeyError, Refusal):
            missing += 1
    return arrived, missing


def _in_the_tray(
    by: Person,
    site: Site,
    key: str,
    sent: Mapping[str, Any],
    item: Mapping[str, Any],
    refusal: Refusal,
) -> FromFile:
    entry = sent.get("entry")
    entry = entry if isinstance(entry, Mapping) else {}
    try:
        component = access.component_of(site, entry.get("component"))
    except Refusal as gone:
        return FromFile(key, "entry", None, gone.sentence)
    whole = {**entry, "tablet": {name: sent[name] for name in sorted(sent) if name != "entry"}}
    keep_in_tray(by, component, key, whole, refusal)
    return FromFile(key, "entry", None, f"In the tray: {refusal.sentence}")
