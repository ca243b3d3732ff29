"""The file that a tablet saved: taken in once, as its authors', photos with it."""

import base64
import json
from collections.abc import Callable
from hashlib import sha256
from typing import Any

import pytest
from django.core.files.uploadedfile import SimpleUploadedFile
from django.test import Client

from logbook.actions.add_photo import photos_path
from logbook.actions.take_in_file import take_in_file
from logbook.errors import Refusal
from logbook.models import Inspection, SentFromTablet, TrayItem
from tests.pages.book import Book, crack_seen

from .conftest import jpeg


def file_of(data: dict[str, Any], photo: bytes = b"") -> bytes:
    key = data["entry"]["key"]
    body = {name: data[name] for name in ("entry", "round", "shown")}
    item = {
        "key": key, "kind": "entry", "site": "lower-mill", "person": data["person"],
        "person_name": "Ilka Berend", "body": body,
    }  # fmt: skip
    photos = [{"key": key, "sha256": sha256(photo).hexdigest(),
               "base64": base64.b64encode(photo).decode()}] if photo else []  # fmt: skip
    made = {"waiting": 1, "tablet": data["tablet"], "items": [item], "photos": photos}
    return json.dumps(made).encode()


def test_it_is_taken_in_with_its_photos_and_only_once(book: Book, sent: Callable[..., Any]) -> None:
    photo = jpeg()
    digest = sha256(photo).hexdigest()
    data = file_of(sent(crack_seen(book.heel, "3", "12") | {"photos": [digest]}), photo)
    [first] = take_in_file(book.people["crew"], book.site, data)
    [again] = take_in_file(book.people["crew"], book.site, data)
    assert first.entry_number == again.entry_number is not None
    assert again.said == "In the book before."
    assert Inspection.objects.count() == SentFromTablet.objects.count() == 1
    assert photos_path(digest).read_bytes() == photo


def test_what_somebody_else_wrote_goes_to_the_tray(book: Book, sent: Callable[..., Any]) -> None:
    [one] = take_in_file(book.people["engineer"], book.site, file_of(sent()))
    assert one.entry_number is None
    assert "Ilka Berend wrote this" in one.said
    assert TrayItem.objects.get().author == book.people["engineer"]
    assert not Inspection.objects.exists()


@pytest.mark.parametrize(
    "data", [b"", b"{", b"[]", b'{"waiting": 2}', b"\xff\xfe", b"[" * 100_000], ids=repr
)
def test_another_file_is_refused_with_the_way_to_mend_it(book: Book, data: bytes) -> None:
    with pytest.raises(Refusal) as refused:
        take_in_file(book.people["crew"], book.site, data)
    assert "Save what waits" in refused.value.fields["file"][0]


def test_things_that_are_no_entries_are_said_and_harm_nothing(book: Book, sent: Any) -> None:
    made = json.loads(file_of(sent()))
    made["items"] += [1, {}, {"site": "lower-mill", "body": {}, "kind": "joke", "key": "k"}]
    made["photos"] = [{"sha256": "x", "base64": "%%"}, 7]
    taken = take_in_file(book.people["crew"], book.site, json.dumps(made).encode())
    assert [one.said for one in taken] == ["In the book.", "This book does not know such a thing."]


def test_the_page_reads_it(book: Book, as_: Callable[[str], Client], sent: Any) -> None:
    crew = as_("crew")
    where = "/site/lower-mill/tablets/file/"
    assert "The file that the tablet saved" in crew.get(where).content.decode()
    answer = crew.post(where, {"file": SimpleUploadedFile("waiting.json", file_of(sent()))})
    assert "In the book." in answer.content.decode()
    wrong = crew.post(where, {"file": SimpleUploadedFile("waiting.json", b"no")})
    assert wrong.status_code == 400
    assert "This is no file of a tablet." in wrong.content.decode()
