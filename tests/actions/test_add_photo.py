"""Photos: the bytes as they came, typed by decoding, hostile ones refused with a sentence."""

import io
import struct
import zlib
from hashlib import sha256

import pytest
from django.test import override_settings
from PIL import Image

from logbook.actions.add_photo import add_photo, photos_path, shown_path
from logbook.errors import Refusal
from logbook.journal.verify import verify
from logbook.models import Photo

from .conftest import Deciding, Leaves


def jpeg(size: tuple[int, int] = (60, 40)) -> bytes:
    out = io.BytesIO()
    exif = Image.Exif()
    exif[0x010E] = "where it was taken"
    Image.new("RGB", size, "grey").save(out, "JPEG", exif=exif)
    return out.getvalue()


def bomb() -> bytes:
    """A PNG of a few hundred bytes that claims 30,000 × 30,000 points."""

    def chunk(kind: bytes, data: bytes) -> bytes:
        check = struct.pack(">I", zlib.crc32(kind + data))
        return struct.pack(">I", len(data)) + kind + data + check

    head = struct.pack(">IIBBBBB", 30_000, 30_000, 1, 0, 0, 0, 0)
    return (
        b"\x89PNG\r\n\x1a\n"
        + chunk(b"IHDR", head)
        + chunk(b"IDAT", zlib.compress(b"\0" * 1000))
        + chunk(b"IEND", b"")
    )


def gif() -> bytes:
    out = io.BytesIO()
    Image.new("P", (4, 4)).save(out, "GIF")
    return out.getvalue()


def declared(deciding: Deciding, data: bytes) -> Photo:
    crack = deciding.found()
    finding = crack.findings.get()
    return Photo.objects.create(
        site=deciding.book.site,
        finding=finding,
        sha256=sha256(data).hexdigest(),
        uploaded_by=deciding.book.people["crew"],
    )


def test_the_bytes_are_kept_and_a_clean_copy_is_shown(deciding: Deciding) -> None:
    data = jpeg()
    photo = declared(deciding, data)
    leaves = Leaves()
    for _ in range(2):  # sent again, it is written once
        kept = add_photo(deciding.book.people["crew"], photo.pk, data)
    assert leaves.new() == ["photo-arrived"]
    assert photos_path(photo.sha256).read_bytes() == data
    assert kept.media_type == "image/jpeg" and (kept.width, kept.height) == (60, 40)
    shown = Image.open(shown_path(photo.sha256))
    assert (
        not shown.getexif() and b"where it was taken" not in shown_path(photo.sha256).read_bytes()
    )
    assert verify().sound
    photos_path(photo.sha256).write_bytes(jpeg((8, 8)))
    assert any("not the one that was stored" in f.what for f in verify().faults)


@pytest.mark.parametrize(
    ("name", "data"),
    [
        ("bomb", bomb()),
        ("svg", b"<svg xmlns='http://www.w3.org/2000/svg'><script>alert(1)</script></svg>"),
        ("gif", gif()),
        ("text", b"not a photo"),
        ("empty", b""),
        ("cut off", jpeg((600, 400))[:700]),
    ],
    ids=["bomb", "svg", "gif", "text", "empty", "cut off"],
)
def test_a_hostile_file_is_refused_and_nothing_is_written(
    deciding: Deciding, name: str, data: bytes
) -> None:
    photo = declared(deciding, data)
    leaves = Leaves()
    with pytest.raises(Refusal) as refused:
        add_photo(deciding.book.people["crew"], photo.pk, data)
    assert refused.value.fields["photo"], name
    photo.refresh_from_db()
    assert photo.arrived_at is None and not leaves.new()
    assert not photos_path(photo.sha256).exists()


def test_other_bytes_than_declared_and_too_many_are_refused(deciding: Deciding) -> None:
    data = jpeg()
    photo = declared(deciding, data)
    crew = deciding.book.people["crew"]
    with pytest.raises(Refusal, match="another photo"):
        add_photo(crew, photo.pk, jpeg((61, 40)))
    with override_settings(PHOTO_MAX_BYTES=100), pytest.raises(Refusal, match="larger"):
        add_photo(crew, photo.pk, data)
    with override_settings(PHOTO_MAX_PIXELS=100), pytest.raises(Refusal, match="too many points"):
        add_photo(crew, photo.pk, data)
    with pytest.raises(Refusal) as refused:
        add_photo(deciding.book.people["auditor"], photo.pk, data)
    assert refused.value.status == 404
