"""Entries through the API: every bad input names its field, and nothing is half-written."""

import io
import json
from collections.abc import Callable
from hashlib import sha256
from typing import Any

import pytest
from django.test import Client
from PIL import Image

from logbook import clock
from logbook.models import Crack, Finding, Inspection, Leaf, Location, Measurement, TrayItem
from tests.pages.book import Book, crack_seen, entry_data

Send = Callable[..., Any]


def today() -> str:
    return clock.today("Europe/Budapest").isoformat()


def entry(book: Book, *findings: dict[str, Any], counter: int = 1000, **more: Any) -> Any:
    seen = findings or (crack_seen(book.heel, "3", "12"),)
    return {"component": book.gate.pk} | entry_data(today(), counter, *seen) | more


def counts() -> tuple[int, ...]:
    return tuple(
        model.objects.count()
        for model in (Inspection, Finding, Measurement, Crack, Location, Leaf, TrayItem)
    )


def seen(book: Book, **more: Any) -> dict[str, Any]:
    return crack_seen(book.heel, "3", "12") | more


BAD: list[tuple[str, Callable[[Book], dict[str, Any]], str, str]] = [
    ("a day to come", lambda b: {"found_on": "2999-01-01"}, "found_on", "in the future"),
    ("no day", lambda b: {"found_on": "4 May"}, "found_on", "year-month-day"),
    ("no counter", lambda b: {"counter": ""}, "counter", "Read the counter"),
    ("a counter in words", lambda b: {"counter": "many"}, "counter", "not a number"),
    ("two signs", lambda b: {"counter": "1.200,5"}, "counter", "both comma and point"),
    ("not a number at all", lambda b: {"counter": [1]}, "counter", "Write a number"),
    ("no method", lambda b: {"method": " "}, "method", "how you looked"),
    ("no procedure", lambda b: {"procedure": None}, "procedure", "which procedure"),
    ("no revision", lambda b: {"procedure_revision": ""}, "procedure_revision", "which revision"),
    ("no calibration", lambda b: {"calibration_valid_until": ""}, "calibration_valid_until",
     "calibration is valid"),
    ("no qualification", lambda b: {"qualification_valid_until": ""}, "qualification_valid_until",
     "qualification is valid"),
    ("no name", lambda b: {"inspector_name": ""}, "inspector_name", "who looked"),
    ("no key", lambda b: {"key": "7"}, "key", "key"),
    ("a time without offset", lambda b: {"written_at": "2026-05-04T09:55:00"}, "written_at",
     "offset"),
    ("nothing seen", lambda b: {"findings": []}, "findings", "at least one place"),
    ("findings as text", lambda b: {"findings": "crack"}, "findings", "at least one place"),
    ("too many", lambda b: {"findings": [seen(b)] * 201}, "findings", "at most 200"),
    ("no answer", lambda b: {"findings": [seen(b, what="")]}, "findings.0.what", "what you see"),
    ("no place", lambda b: {"findings": [seen(b, location="")]}, "findings.0.location",
     "which place"),
    ("another part's place", lambda b: {"findings": [seen(b, location=10**6)]},
     "findings.0.location", "not on this component"),
    ("no such crack", lambda b: {"findings": [seen(b, crack="9")]}, "findings.0.crack",
     "There is no crack"),
    ("which crack", lambda b: {"findings": [seen(b, crack="")]}, "findings.0.crack",
     "which crack it is"),
    ("deeper than the wall", lambda b: {"findings": [seen(b, depth_mm="99")]},
     "findings.0.depth_mm", "deeper than the wall"),
    ("longer than the plate", lambda b: {"findings": [seen(b, length_mm="99000")]},
     "findings.0.length_mm", "longer than the part is wide"),
    ("a kilometre", lambda b: {"findings": [seen(b, length_mm="1000000")]},
     "findings.0.length_mm", "kilometre"),
    ("no size", lambda b: {"findings": [seen(b, depth_mm="0")]}, "findings.0.depth_mm", "above 0"),
    ("below zero", lambda b: {"findings": [seen(b, depth_mm="-3")]}, "findings.0.depth_mm",
     "not a number"),
    ("four digits", lambda b: {"findings": [seen(b, depth_mm="3.1234")]}, "findings.0.depth_mm",
     "at most 3 digits"),
    ("how deep", lambda b: {"findings": [seen(b, depth_basis="about")]},
     "findings.0.depth_basis", "how the depth is known"),
    ("both", lambda b: {"findings": [seen(b, depth_basis="not-measured")]},
     "findings.0.depth_mm", "Keep one"),
    ("no reason", lambda b: {"findings": [{"location": b.heel.pk, "what": "could-not-look"}]},
     "findings.0.why", "why you could not look"),
    ("twice", lambda b: {"findings": [{"location": b.heel.pk, "what": "nothing"}] * 2},
     "findings.1.location", "stands twice"),
    ("crack and nothing",
     lambda b: {"findings": [seen(b), {"location": b.heel.pk, "what": "nothing"}]},
     "findings.0.what", "both a crack and another answer"),
    ("a photo by name", lambda b: {"findings": [seen(b, photos=["photo.jpg"])]},
     "findings.0.photos", "SHA-256"),
    ("a nameless place", lambda b: {"findings": [
        seen(b, new_location={"described": "left of it"})]}, "findings.0.new_location.name",
     "short name"),
]  # fmt: skip


@pytest.mark.parametrize(("name", "change", "field", "words"), BAD, ids=[bad[0] for bad in BAD])
def test_bad_input_is_refused_by_its_field(
    book: Book,
    send: Send,
    name: str,
    change: Callable[[Book], dict[str, Any]],
    field: str,
    words: str,
) -> None:
    before = counts()
    answer = send(entry(book) | change(book))
    said = answer.json()
    assert answer.status_code == 400 and said["code"] == "invalid" and said["status"] == 400
    assert any(words in one for one in said["fields"].get(field, [])), said
    assert counts() == before


def test_what_contradicts_the_last_look_is_asked_back(book: Book, send: Send) -> None:
    assert send(entry(book)).status_code == 201

    def again(**more: Any) -> dict[str, Any]:
        found = seen(book, crack="1") | more.pop("found", {})
        return entry(book, found, counter=more.pop("counter", 1100), **more)

    for data, field, words in (
        (again(counter=900), "counter", "cannot run back"),
        (again(found_on="2020-01-01"), "found_on", "last look here was on"),
        (again(found={"depth_mm": "17"}), "findings.0.depth_mm", "Check the decimal point"),
        (again(found={"depth_mm": "0.9"}), "findings.0.depth_mm", "does not shrink"),
        (entry(book, {"location": book.heel.pk, "what": "nothing"}, counter=1100),
         "findings.0.what", "Crack 1 is known here"),
    ):  # fmt: skip
        answer = send(data)
        assert answer.status_code == 400, words
        assert any(words in one for one in answer.json()["fields"][field]), answer.json()
    # Each can be real, and is logged with its stated reason.
    kept = [
        again(counter=5, counter_replaced_why="new counter"),
        again(counter=4, found_on="2020-01-01", late_why="found in a drawer"),
        again(counter=6, found={"depth_mm": "17", "confirm_unlikely": True}),
        again(counter=7, found={"depth_mm": "5", "why_smaller": "ground out"}),
    ]
    for data in kept:
        assert send(data).status_code == 201, send(data).json()


def test_the_answer_says_what_binds(book: Book, send: Send) -> None:
    said = send(entry(book)).json()
    (proposal,) = said["proposals"]
    assert proposal["verdict"] in ("continue", "watch", "restrict", "repair", "refer", "withdraw")
    assert proposal["reasons"] and said["inspection"]["findings"][0]["crack_number"] == 1


def test_sent_twice_is_written_once(book: Book, send: Send) -> None:
    data = entry(book)
    first = send(data)
    before = counts()
    second = send(data)
    assert (first.status_code, second.status_code) == (201, 200)
    assert first.json() == second.json() and counts() == before


def test_the_same_key_with_other_content_is_kept_in_the_tray(book: Book, send: Send) -> None:
    data = entry(book)
    send(data)
    other = send(data | {"method": "eye"})
    assert other.status_code == 409 and other.json()["code"] == "same-key-other-content"
    item = TrayItem.objects.get()
    assert json.loads(item.content)["method"] == "eye"
    assert Inspection.objects.get().method == "ultrasound"


def test_a_sender_that_cannot_ask_back_loses_nothing(
    book: Book, send: Send, as_: Callable[[str], Client]
) -> None:
    bad = entry(book, seen(book, depth_mm="99"))
    kept = send(bad, "?keep=tray")
    assert kept.status_code == 202
    item = TrayItem.objects.get(pk=kept.json()["kept"])
    assert json.loads(item.content)["findings"][0]["depth_mm"] == "99"
    assert not Inspection.objects.exists()
    assert send(bad, "?keep=tray").json()["kept"] == item.pk  # kept once
    assert as_("stranger").get(f"/tray/{item.pk}/").status_code == 404


def test_who_may_send(book: Book, send: Send) -> None:
    before = counts()
    assert Client().post("/api/v1/inspections", entry(book), "application/json").status_code in (
        401, 403,
    )  # fmt: skip
    assert send(entry(book), who="auditor").status_code == 403
    assert send(entry(book), who="stranger").status_code == 404
    assert counts()[:5] == before[:5]


@pytest.mark.parametrize("body", ["", "{", "[]", "null", '"text"', '{"component": {}}', "[1]"])
def test_what_is_no_entry_is_refused(book: Book, as_: Callable[[str], Client], body: str) -> None:
    answer = as_("crew").post("/api/v1/inspections", body, "application/json")
    assert answer.status_code in (400, 404) and answer.json()["title"]


def photo_bytes() -> bytes:
    out = io.BytesIO()
    Image.new("RGB", (60, 40), "grey").save(out, "JPEG")
    return out.getvalue()


def test_a_declared_photo_arrives_and_comes_back_byte_for_byte(
    book: Book, send: Send, as_: Callable[[str], Client]
) -> None:
    data = photo_bytes()
    said = send(entry(book, seen(book, photos=[sha256(data).hexdigest()]))).json()
    (photo,) = said["inspection"]["findings"][0]["photos"]
    address = f"/api/v1/photos/{photo['id']}"
    crew = as_("crew")
    assert crew.get(address).status_code == 404  # declared, not arrived
    wrong = crew.put(address, data + b" ", "application/octet-stream")
    assert wrong.status_code == 400 and "another photo" in wrong.json()["fields"]["photo"][0]
    for _ in range(2):  # sent again it is written once
        assert crew.put(address, data, "application/octet-stream").status_code == 200
    assert Leaf.objects.filter(kind="photo-arrived").count() == 1
    back = crew.get(address)
    assert b"".join(back.streaming_content) == data
    assert back["Content-Disposition"].startswith("attachment")
    assert as_("stranger").put(address, data, "application/octet-stream").status_code == 404


def test_what_is_no_photo_is_refused(book: Book, send: Send, as_: Callable[[str], Client]) -> None:
    for data in (b"<svg xmlns='http://www.w3.org/2000/svg'/>", b"%PDF-1.7", photo_bytes()[:200]):
        digest = sha256(data).hexdigest()
        crack = "new" if not Crack.objects.exists() else "1"
        counter = 1000 + Inspection.objects.count()
        said = send(entry(book, seen(book, photos=[digest], crack=crack), counter=counter)).json()
        (photo,) = said["inspection"]["findings"][0]["photos"]
        answer = as_("crew").put(f"/api/v1/photos/{photo['id']}", data, "application/octet-stream")
        assert answer.status_code == 400 and answer.json()["fields"]["photo"]


def test_striking_out(book: Book, send: Send, as_: Callable[[str], Client]) -> None:
    said = send(entry(book)).json()["inspection"]
    address = f"/api/v1/findings/{said['findings'][0]['id']}/strike-out"

    def strike(body: dict[str, Any], who: str = "crew") -> Any:
        return as_(who).post(address, body, "application/json")

    assert strike({}).json()["fields"]["reason"]
    bad = strike({"reason": "x", "depth_basis": "measured", "depth_mm": "99", "length_mm": "12"})
    assert bad.status_code == 400 and "wall" in bad.json()["fields"]["depth_mm"][0]
    assert strike({"reason": "x"}, "auditor").status_code == 403
    assert strike({"reason": "x"}, "stranger").status_code == 404
    right = {"reason": "x", "depth_basis": "measured", "depth_mm": "3,5", "length_mm": "12"}
    done = strike(right)
    assert done.status_code == 201 and done.json()["replaced_by"]
    assert strike(right).status_code == 409
    newest = as_("crew").get(f"/api/v1/inspections/{said['id']}").json()["inspection"]
    assert newest["findings"][0]["struck_out"] == "x"
    assert newest["findings"][1]["measurement"]["depth_mm"] == "3.500"
