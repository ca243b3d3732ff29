"""A photo arrives: its bytes are kept as they came, and a re-encoded copy is what people see."""

import hashlib
import io
import os
import uuid
import warnings
from pathlib import Path
from typing import Any

from django.conf import settings
from django.db import transaction
from PIL import Image, ImageFile, ImageOps, UnidentifiedImageError

from logbook import access, clock
from logbook.errors import invalid, not_found
from logbook.journal import append
from logbook.models import Person, Photo, Site

KIND = "photo-arrived"
FORMATS = ("JPEG", "PNG", "WEBP")
SHOWN_EDGE = 2048


def declare_photo(by: Person, site: Site, sha256: str) -> Photo:
    """A photo that belongs to no finding yet: the picture of a component, say."""
    return Photo.objects.create(site=site, sha256=sha256, uploaded_by=by)


def add_photo(by: Person, photo_pk: Any, data: bytes) -> Photo:
    """Take in the bytes of a declared photo. Sent again, it is written once.

    Raises Refusal with the field "photo" where the bytes are not the declared ones, are too large,
    or are no picture of a kind that is taken.
    """
    photo = access.photo_for(by, photo_pk, "see")
    if not access.roles_at(by, photo.site) & (access.NEEDS["log"] | access.NEEDS["register"]):
        raise not_found("photo")
    if hashlib.sha256(data).hexdigest() != photo.sha256:
        raise _wrong(
            "This is another photo than the entry names. Send the one that was chosen then."
        )
    if photo.arrived_at is not None:
        return photo
    kind, copy, size = _decode(data)
    keep(photos_path(photo.sha256), data)
    keep(shown_path(photo.sha256), copy)
    act = uuid.uuid4()
    with transaction.atomic():
        fresh = Photo.objects.select_for_update().get(pk=photo.pk)
        if fresh.arrived_at is not None:
            return fresh
        fresh.media_type = f"image/{kind.lower()}"
        fresh.byte_size = len(data)
        fresh.width, fresh.height = size
        fresh.arrived_at = clock.now()
        fresh.save()
        append(
            KIND,
            {
                "photo": fresh.pk,
                "finding": fresh.finding_id,
                "sha256": fresh.sha256,
                "media_type": fresh.media_type,
                "byte_size": fresh.byte_size,
            },
            act=act,
            by=by,
            site=fresh.site,
            because_of=[fresh.finding.leaf_id] if fresh.finding is not None else [],
        )
    return fresh


def photos_path(sha256: str) -> Path:
    return Path(settings.DATA_DIR) / "photos" / sha256[:2] / sha256


def shown_path(sha256: str) -> Path:
    return Path(settings.DATA_DIR) / "shown" / sha256[:2] / f"{sha256}.jpg"


def _wrong(sentence: str) -> Exception:
    return invalid(sentence, {"photo": [sentence]})


def small_enough(size: int | None) -> None:
    """Before anything of it is read into memory."""
    if size is None or size > settings.PHOTO_MAX_BYTES:
        raise _wrong(f"The photo is larger than {settings.PHOTO_MAX_BYTES // 2**20} MB.")


def _decode(data: bytes) -> tuple[str, bytes, tuple[int, int]]:
    """Type by decoding, never by name; the copy carries no place and no camera details."""
    # WeasyPrint switches this on for the whole process; half a photo is no photo here.
    ImageFile.LOAD_TRUNCATED_IMAGES = False
    small_enough(len(data))
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("error", Image.DecompressionBombWarning)
            with Image.open(io.BytesIO(data), formats=FORMATS) as probe:
                kind, (width, height) = str(probe.format), probe.size
                if width * height > settings.PHOTO_MAX_PIXELS:
                    raise _wrong("The photo has too many points; take it at a smaller setting.")
                probe.verify()
            with Image.open(io.BytesIO(data), formats=FORMATS) as image:
                upright = ImageOps.exif_transpose(image).convert("RGB")
                upright.thumbnail((SHOWN_EDGE, SHOWN_EDGE))
                out = io.BytesIO()
                upright.save(out, "JPEG", quality=88)
    except (
        UnidentifiedImageError,
        Image.DecompressionBombError,
        Image.DecompressionBombWarning,
        OSError,
        SyntaxError,
        ValueError,
        EOFError,
    ) as error:
        raise _wrong(
            "This is no photo that can be opened. JPEG, PNG and WebP are taken."
        ) from error
    return kind, out.getvalue(), (width, height)


def keep(path: Path, data: bytes) -> None:
    """Write a file so that it is whole or not there: synced, renamed, its folder synced."""
    made = not path.parent.exists()
    path.parent.mkdir(mode=0o700, parents=True, exist_ok=True)
    half = path.with_name(f".{path.name}.{uuid.uuid4().hex}")
    with open(os.open(half, os.O_WRONLY | os.O_CREAT | os.O_EXCL, 0o600), "wb") as f:
        f.write(data)
        f.flush()
        os.fsync(f.fileno())
    half.replace(path)
    _sync_folder(path.parent)
    if made:  # a folder's own name stands in the one above it
        _sync_folder(path.parent.parent)
        _sync_folder(path.parent.parent.parent)


def _sync_folder(path: Path) -> None:
    folder = os.open(path, os.O_RDONLY)
    try:
        os.fsync(folder)
    finally:
        os.close(folder)
