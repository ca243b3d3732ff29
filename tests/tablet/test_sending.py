"""What a tablet sends comes into the book once, as its author's, or into the tray."""

import json
import uuid
from collections.abc import Callable
from hashlib import sha256
from typing import Any

from django.test import Client
from django_tasks_db.models import DBTaskResult

from logbook import clock
from logbook.actions.add_photo import photos_path
from logbook.actions.propose import propose
from logbook.actions.tablets import revoke_tablet
from logbook.journal.verify import verify
from logbook.models import (
    AssessmentAsked,
    Device,
    Inspection,
    Leaf,
    Location,
    Membership,
    Photo,
    PhotoLayer,
    RoundDeclared,
    SentFromTablet,
    StopNote,
    TrayItem,
)
from tests.pages.book import Book, crack_seen

from .conftest import jpeg

Sent = Callable[..., dict[str, Any]]
Send = Callable[..., Any]


def counts() -> tuple[int, ...]:
    models = (Inspection, SentFromTablet, Leaf, TrayItem)
    return tuple(model.objects.count() for model in models)


def test_an_entry_is_written_with_what_the_tablet_showed(sent: Sent, send: Send) -> None:
    data = sent()
    answer = send(data)
    assert answer.status_code == 201
    assert answer.json()["key"] == data["entry"]["key"]
    note = SentFromTablet.objects.get()
    assert str(note.inspection.key) == data["entry"]["key"]
    assert json.loads(note.shown) == data["shown"]
    assert str(note.round) == data["round"]


def test_sent_again_it_is_written_once(sent: Sent, send: Send) -> None:
    data = sent()
    first = send(data).json()
    before = counts()
    again = send(data)
    assert again.status_code == 200
    assert again.json()["entry_number"] == first["entry_number"]
    assert counts() == before


def test_the_same_key_with_other_content_goes_to_the_tray_with_both_kept(
    book: Book, sent: Sent, send: Send
) -> None:
    data = sent()
    send(data)
    data["entry"]["findings"] = [crack_seen(book.heel, "3.4", "12")]
    answer = send(data)
    assert answer.status_code == 202
    assert answer.json()["key"] == data["entry"]["key"]
    assert answer.json()["problem"]["code"] == "same-key-other-content"
    assert Inspection.objects.count() == 1
    assert "3.4" in TrayItem.objects.get().content


def test_what_does_not_fit_is_kept_whole_and_echoed(book: Book, sent: Sent, send: Send) -> None:
    data = sent(crack_seen(book.heel, "84", "12"))
    answer = send(data)
    assert answer.status_code == 202
    assert answer.json()["key"] == data["entry"]["key"]
    assert answer.json()["problem"]["fields"]["findings.0.depth_mm"]
    kept = json.loads(TrayItem.objects.get().content)
    assert kept["findings"][0]["depth_mm"] == "84"
    assert kept["tablet"]["shown"] == data["shown"]


def test_with_more_behind_it_an_entry_does_not_wait_for_its_verdict(
    as_: Callable[[str], Client], sent: Sent
) -> None:
    data = sent()
    answer = as_("crew").post("/api/v1/tablet/lower-mill/send/entry?more", data, "application/json")
    assert answer.json()["pending"] is True
    assert answer.json()["verdicts"] == []
    # It is owed and queued: a worker gives it, and the tablet asks for it.
    assert AssessmentAsked.objects.count() == DBTaskResult.objects.count() == 1
    for asked in AssessmentAsked.objects.all():
        propose(asked.location_id, asked.crack_id)
    later = as_("crew").get(f"/api/v1/tablet/answer/{data['entry']['key']}").json()
    assert later["pending"] is False
    assert later["verdicts"][0]["word"]


def test_nobody_s_entries_go_as_another_s(sent: Sent, send: Send) -> None:
    answer = send(sent(who="crew"), who="engineer")
    assert answer.status_code == 409
    assert answer.json()["code"] == "other-person"
    assert not Inspection.objects.exists()
    assert not TrayItem.objects.exists()


def test_entries_of_someone_without_a_role_are_handed_in_to_the_tray(
    book: Book, sent: Sent, send: Send
) -> None:
    data = sent(who="crew")
    Membership.objects.filter(person=book.people["crew"]).update(ended_at=clock.now())
    handed = send(data, who="engineer")
    assert handed.status_code == 202
    assert handed.json()["problem"]["code"] == "author-has-no-role"
    own = send(sent(who="crew"), who="crew")
    assert own.status_code == 202
    assert own.json()["problem"]["code"] == "role-ended"
    assert TrayItem.objects.count() == 2
    assert not Inspection.objects.exists()


def test_a_revoked_tablet_gets_nothing_and_its_entries_go_to_the_tray(
    book: Book, device: Device, as_: Callable[[str], Client], sent: Sent, send: Send
) -> None:
    crew = as_("crew")
    address = f"/api/v1/tablet/lower-mill/package?tablet={device.key}"
    assert crew.get(address).status_code == 200
    revoke_tablet(book.people["administrator"], book.site, device.pk)
    assert crew.get(address).json()["code"] == "tablet-revoked"
    # Under a new key, by the session that the lost tablet still holds.
    again = crew.post(
        "/api/v1/tablet/lower-mill/register",
        {"key": str(uuid.uuid4()), "name": "another"},
        "application/json",
    )
    assert again.json()["code"] == "tablet-revoked"
    assert send(sent()).status_code == 202
    assert json.loads(TrayItem.objects.get().why)["code"] == "tablet-revoked"


def test_a_stranger_finds_nothing(sent: Sent, send: Send) -> None:
    assert send(sent(), who="stranger").status_code == 404


def test_nobody_signed_in_is_told_apart_from_not_permitted(book: Book) -> None:
    assert Client().get("/api/v1/tablet/me").status_code == 401


def test_a_new_place_gets_its_spot_on_the_picture(book: Book, sent: Sent, send: Send) -> None:
    new = {
        "new_location": {"name": "Sill, east", "described": "below the ladder"},
        "what": "crack", "crack": "new", "depth_basis": "measured", "depth_mm": "3",
        "length_mm": "9",
    }  # fmt: skip
    assert send(sent(new, spot=[2500, 7500])).status_code == 201
    place = Location.objects.get(name="Sill, east")
    assert place.provisional
    assert (place.picture_x, place.picture_y) == (0.25, 0.75)


def test_a_stop_is_noted_once_with_its_entry(
    book: Book, device: Device, sent: Sent, send: Send
) -> None:
    data = sent()
    note = {
        "key": str(uuid.uuid4()),
        "person": book.people["crew"].pk,
        "tablet": str(device.key),
        "entry_key": data["entry"]["key"],
        "tag_number": "T-14",
        "told_whom": "Ödön Várszegi",
        "told_when": "09:55",
        "written_at": "2026-05-04T09:58:00+02:00",
    }
    assert send(note, kind="stop-note").json()["code"] == "entry-not-here"
    send(data)
    first, again = send(note, kind="stop-note"), send(note, kind="stop-note")
    assert first.json() == again.json()
    assert first.json()["key"] == note["key"]
    made = StopNote.objects.get()
    assert (made.tag_number, made.told_whom) == ("T-14", "Ödön Várszegi")


def test_a_round_is_declared_once_and_says_why_places_were_not_reached(
    book: Book, device: Device, send: Send
) -> None:
    end = {
        "key": str(uuid.uuid4()),
        "person": book.people["crew"].pk,
        "tablet": str(device.key),
        "seen": 1,
        "not_reached": 1,
        "why_not": "",
        "written_at": "2026-05-04T09:58:00+02:00",
    }
    assert send(end, kind="round").json()["fields"]["why_not"]
    end["why_not"] = "the sill was under water"
    assert send(end, kind="round").json()["key"] == end["key"]
    assert send(end, kind="round").status_code == 200
    assert RoundDeclared.objects.get().not_reached == 1


def test_a_photo_comes_in_pieces_and_goes_on_where_it_stopped(
    as_: Callable[[str], Client], book: Book, sent: Sent, send: Send
) -> None:
    data = jpeg(400)
    digest = sha256(data).hexdigest()
    seen = crack_seen(book.heel, "3", "12") | {"photos": [digest]}
    layers = {digest: [["arrow", 10, 20, 30, 40], ["star", 1, 1, 1, 1]]}
    answer = send(sent(seen, layers=layers)).json()
    pk = answer["photos"][digest]["id"]
    crew = as_("crew")

    def piece(start: int, end: int) -> Any:
        where = f"/api/v1/tablet/photo/{pk}?start={start}&whole={len(data)}"
        return crew.put(where, data[start:end], "application/octet-stream")

    assert piece(0, 1000).json()["have"] == 1000
    assert piece(0, 1000).json()["code"] == "other-piece"
    assert crew.get(f"/api/v1/tablet/photo/{pk}").json()["have"] == 1000
    assert piece(1000, len(data)).json()["arrived"] is True
    # The answer was missed, and the last byte is sent again.
    assert piece(len(data) - 1, len(data)).json()["arrived"] is True
    assert photos_path(digest).read_bytes() == data
    assert Photo.objects.get().arrived_at is not None
    assert json.loads(PhotoLayer.objects.get().marks) == [["arrow", 10, 20, 30, 40]]


def test_the_entry_s_page_shows_what_the_tablet_showed_and_the_mark_over_the_photo(
    as_: Callable[[str], Client], book: Book, device: Device, sent: Sent, send: Send
) -> None:
    data = jpeg(400)
    digest = sha256(data).hexdigest()
    seen = crack_seen(book.heel, "3", "12") | {"photos": [digest]}
    said = send(sent(seen, layers={digest: [["circle", 5000, 5000, 6000, 7000]]})).json()
    crew = as_("crew")
    where = f"/api/v1/tablet/photo/{said['photos'][digest]['id']}?start=0&whole={len(data)}"
    crew.put(where, data, "application/octet-stream")
    page = crew.get(f"/inspection/{said['inspection']}/").content.decode()
    assert "No verdict yet." in page
    assert "tablet 3" in page
    assert 'class="layer" d="M40.0 50.0a10.0 20.0' in page


def test_pieces_that_make_another_photo_are_thrown_away(
    as_: Callable[[str], Client], book: Book, sent: Sent, send: Send
) -> None:
    data, other = jpeg(40), jpeg(40, "black")
    digest = sha256(data).hexdigest()
    seen = crack_seen(book.heel, "3", "12") | {"photos": [digest]}
    pk = send(sent(seen)).json()["photos"][digest]["id"]
    crew = as_("crew")
    where = f"/api/v1/tablet/photo/{pk}?start=0&whole="
    refused = crew.put(f"{where}{len(other)}", other, "application/octet-stream")
    assert refused.status_code == 400
    assert crew.get(f"/api/v1/tablet/photo/{pk}").json()["have"] == 0
    taken = crew.put(f"{where}{len(data)}", data, "application/octet-stream")
    assert taken.json()["arrived"] is True


def test_the_journal_holds_all_of_it(book: Book, sent: Sent, send: Send) -> None:
    send(sent())
    send(sent(crack_seen(book.heel, "84", "12")))
    assert verify().faults == ()
