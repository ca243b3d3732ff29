"""A photo in pieces: a line that breaks costs the last piece, not the photo."""

import os
from pathlib import Path
from typing import Any

from django.conf import settings
from django.db import transaction

from logbook import access
from logbook.actions.add_photo import add_photo, photos_path, small_enough
from logbook.errors import conflict, invalid
from logbook.models import Person, Photo

LARGEST_PIECE = 1024 * 1024


def _part(by: Person, photo: Photo) -> Path:
    return Path(settings.DATA_DIR) / "pieces" / f"{photo.pk}-{by.pk}"


def have(by: Person, photo_pk: Any) -> int:
    """How many bytes of the photo are here; all of them where it has arrived."""
    photo = access.photo_for(by, photo_pk, "log")
    if photo.arrived_at is not None:
        return photos_path(photo.sha256).stat().st_size
    part = _part(by, photo)
    return part.stat().st_size if part.exists() else 0


def add_piece(by: Person, photo_pk: Any, start: int, whole: int, data: bytes) -> Photo:
    """Put a piece behind those that are here; the last one makes the photo arrive.

    start : the place of its first byte; whole : the size of the photo

    Raises Refusal: "other-piece" (409) where ``start`` is not where the next piece belongs: ask
    what is here and go on from there. A whole that is not the declared photo is thrown away and
    said to be so.
    """
    photo = access.photo_for(by, photo_pk, "log")
    if photo.arrived_at is not None:
        return photo
    small_enough(whole)
    if not data or len(data) > LARGEST_PIECE or start + len(data) > whole:
        raise invalid("This piece does not fit.", {"photo": ["This piece does not fit."]})
    part = _part(by, photo)
    part.parent.mkdir(mode=0o700, parents=True, exist_ok=True)
    with transaction.atomic():
        # Two sends of one photo at once: the second waits, and finds its piece there already.
        Photo.objects.select_for_update().get(pk=photo.pk)
        here = part.stat().st_size if part.exists() else 0
        # All of it may be here already, if the process died before the photo was taken in.
        if here < whole:
            if start != here:
                raise conflict("other-piece", f"{here} bytes are here; go on from there.")
            here += _append(part, data)
    if here < whole:
        return photo
    try:
        return add_photo(by, photo.pk, part.read_bytes())
    finally:
        part.unlink(missing_ok=True)


def _append(part: Path, data: bytes) -> int:
    with open(os.open(part, os.O_WRONLY | os.O_CREAT | os.O_APPEND, 0o600), "ab") as f:
        f.write(data)
        f.flush()
        os.fsync(f.fileno())
    return len(data)
