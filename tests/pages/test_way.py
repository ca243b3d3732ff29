"""The whole way through the pages, without script: log, verdict, review, sign, record, trace."""

import datetime
import io
import re
from typing import Any

import pytest
from django.test import Client
from PIL import Image

from logbook import clock
from logbook.models import (
    Assessment,
    Disposition,
    Finding,
    Inspection,
    Photo,
    Record,
    Review,
    Standing,
    StrikeOut,
)

from .book import PASSWORD, Book, crack_seen, entry_data

pytestmark = pytest.mark.django_db(transaction=True)


def words(html: bytes) -> str:
    """What a person reads: without tags, white space in one."""
    text = re.sub(r"<(script|style|svg).*?</\1>", " ", html.decode(), flags=re.S)
    return " ".join(re.sub(r"<[^>]+>", " ", text).replace("\N{NO-BREAK SPACE}", " ").split())


def typed(found_on: str, counter: str, **more: str) -> dict[str, str]:
    head = {
        name: value for name, value in entry_data(found_on, 0).items() if isinstance(value, str)
    }
    return {**head, "counter": counter, **more}


def hidden(html: bytes) -> dict[str, str]:
    found = re.findall(r'<input type="hidden" name="([^"]+)" value="([^"]*)"', html.decode())
    return {name: value for name, value in found if name != "csrfmiddlewaretoken"}


def a_crack(book: Book, depth: str = "4,4", length: str = "19") -> dict[str, str]:
    p = f"p{book.heel.pk}"
    return {
        f"{p}-what": "crack",
        f"{p}-depth_basis": "measured",
        f"{p}-depth_mm": depth,
        f"{p}-length_mm": length,
        f"{p}-remarks": "runs along the toe",
    }


def log_it(client: Client, book: Book, **more: Any) -> Any:
    """Both steps of the form; the address that the second leads to."""
    address = f"/component/{book.gate.pk}/inspect/"
    day = clock.today("Europe/Budapest").isoformat()
    check = client.post(address, {**typed(day, "1200"), **a_crack(book), "step": "check"})
    assert check.status_code == 200
    return client.post(address, {**hidden(check.content), "step": "write", **more})


def test_from_the_find_to_the_record(book: Book, as_: Any):
    crew = as_("crew")
    written = log_it(crew, book)
    assert written.status_code == 302
    finding = Finding.objects.get()
    assert str(finding.measurement.depth_mm) == "4.400", "the comma was read"

    answer = words(crew.get(written["Location"]).content)
    assert "continue" in answer
    assert "Not to be used until it is signed" in answer
    assert "the part is held until a licensed person has signed" in answer
    assert "4.4 mm deep, 19 mm long" in answer

    engineer = as_("engineer")
    desk = engineer.get("/desk/").content.decode()
    proposal = Assessment.objects.get()
    assert f'href="/proposal/{proposal.pk}/"' in desk
    page = words(engineer.get(f"/proposal/{proposal.pk}/").content)
    assert "the working, step by step" in page
    reviewed = engineer.post(f"/proposal/{proposal.pk}/", {"decision": "accept"})
    review = Review.objects.get()
    assert reviewed["Location"] == f"/review/{review.pk}/sign/"

    signatory = as_("signatory")
    to_sign = signatory.get(f"/review/{review.pk}/sign/")
    shown = hidden(to_sign.content)
    pen = {**shown, "meaning": "approved", "licence": str(book.licence.pk)}
    refused = signatory.post(f"/review/{review.pk}/sign/", {**pen, "password": "not it"})
    assert refused.status_code == 403
    assert not Disposition.objects.exists()
    signed = signatory.post(f"/review/{review.pk}/sign/", {**pen, "password": PASSWORD})
    made = Disposition.objects.get()
    assert signed["Location"] == f"/signed/{made.pk}/"

    in_force = crew.get(f"/component/{book.gate.pk}/")
    assert "signed, in force" in words(in_force.content)
    assert "May stay in use. Next look by" in words(in_force.content)
    assert b"leaf edged" not in in_force.content

    record = Record.objects.get()
    pdf = as_("auditor").get(f"/records/{record.number}/")
    assert pdf.content.startswith(b"%PDF")
    listed = words(as_("auditor").get("/records/").content)
    assert "Heel post, upper weld" in listed
    trace = words(as_("auditor").get(f"/crack/{made.crack_id}/trace/").content)
    for said in ("4.4 mm deep", "proposed “continue”", "review: accepted", "signed “continue”"):
        assert said in trace
    assert "because of" in trace
    assert "led to" in trace


def test_what_was_typed_is_kept_and_each_sentence_stands_beside_its_field(book: Book, as_: Any):
    crew = as_("crew")
    address = f"/component/{book.gate.pk}/inspect/"
    wrong = crew.post(
        address,
        {**typed("2027-13-01", "12OO", method=""), **a_crack(book, depth="44"), "step": "check"},
    )
    assert wrong.status_code == 400
    html = wrong.content.decode()
    assert 'value="12OO"' in html
    assert 'value="44"' in html
    assert "runs along the toe" in html
    page = words(wrong.content)
    assert "44 mm is deeper than the wall (22 mm)" in page
    assert "Say how you looked." in page
    assert not Inspection.objects.exists()


def test_a_slipped_point_is_asked_back_and_can_be_confirmed(book: Book, as_: Any):
    book.log("2026-03-02", 1200, crack_seen(book.heel, "1.2", "5"))
    crew = as_("crew")
    address = f"/component/{book.gate.pk}/inspect/"
    day = clock.today("Europe/Budapest").isoformat()
    sent = {
        **typed(day, "2400"),
        "c1-what": "crack",
        "c1-depth_basis": "measured",
        "c1-depth_mm": "12",
        "c1-length_mm": "20",
        "step": "check",
    }
    first = crew.get(address)
    assert "1.2" not in words(first.content), "the last size must not lead the hand"
    asked = crew.post(address, sent)
    assert "Check the decimal point" in words(asked.content)
    assert 'name="c1-confirm_unlikely"' in asked.content.decode()
    check = crew.post(address, {**sent, "c1-confirm_unlikely": "yes"})
    assert check.status_code == 200
    assert "last time: 1.2 mm deep, 5 mm long" in words(check.content)


def test_the_same_form_sent_twice_is_written_once(book: Book, as_: Any):
    crew = as_("crew")
    address = f"/component/{book.gate.pk}/inspect/"
    day = clock.today("Europe/Budapest").isoformat()
    sent = {**typed(day, "1200"), **a_crack(book), "step": "write"}
    first, second = crew.post(address, sent), crew.post(address, sent)
    assert first["Location"] == second["Location"]
    assert Inspection.objects.count() == 1
    other = crew.post(address, {**sent, "counter": "1300"})
    assert other.status_code == 409
    assert "Both are kept" in words(other.content)


def test_a_place_nobody_listed(book: Book, as_: Any):
    crew = as_("crew")
    day = clock.today("Europe/Budapest").isoformat()
    sent = {
        **typed(day, "1200"),
        "new-new_name": "Sill bracket",
        "new-new_described": "below the third plank",
        "new-what": "crack",
        "new-depth_basis": "not-measured",
        "new-length_mm": "31",
        "step": "write",
    }
    crew.post(f"/component/{book.gate.pk}/inspect/", sent)
    place = book.gate.locations.get(provisional=True)
    assert place.name == "Sill bracket"
    assert "refer" in words(crew.get(f"/location/{place.pk}/").content)


def picture() -> bytes:
    made = io.BytesIO()
    Image.new("RGB", (800, 600), (90, 100, 110)).save(made, "JPEG")
    return made.getvalue()


def test_a_photo_goes_with_the_entry(book: Book, as_: Any):
    crew = as_("crew")
    file = io.BytesIO(picture())
    file.name = "heel.jpg"
    written = log_it(crew, book, **{f"p{book.heel.pk}-photos": file})
    assert written.status_code == 302
    photo = Photo.objects.get()
    assert photo.arrived_at is not None
    as_saved = crew.get(f"/photo/{photo.pk}/")
    assert b"".join(as_saved.streaming_content) == picture()
    assert as_saved["Content-Disposition"].startswith("attachment")
    shown = crew.get(f"/photo/{photo.pk}/shown/")
    assert shown["Content-Type"] == "image/jpeg"
    assert b"".join(shown.streaming_content) != picture()


def test_what_is_no_photo_is_said_and_the_entry_stands(book: Book, as_: Any):
    crew = as_("crew")
    file = io.BytesIO(b"<svg onload='x()'/>")
    file.name = "heel.jpg"
    written = log_it(crew, book, **{f"p{book.heel.pk}-photos": file})
    answer = crew.get(written["Location"])
    assert Inspection.objects.count() == 1
    assert "The photo heel.jpg was not kept" in words(answer.content)


def test_striking_out_leaves_it_readable(book: Book, as_: Any):
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    finding = Finding.objects.get()
    crew = as_("crew")
    address = f"/finding/{finding.pk}/strike-out/"
    empty = crew.post(address, {"reason": ""})
    assert empty.status_code == 400
    done = crew.post(
        address,
        {
            "reason": "read at the wrong weld",
            "depth_basis": "measured",
            "depth_mm": "2,9",
            "length_mm": "13",
        },
    )
    assert done.status_code == 302
    assert StrikeOut.objects.get().replaced_by is not None
    page = crew.get(f"/crack/{finding.crack_id}/")
    assert "3.1 mm deep, 14 mm long" in words(page.content)
    assert "read at the wrong weld" in words(page.content)
    assert b'class="line struck"' in page.content


def test_an_override_needs_grounds(book: Book, as_: Any):
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    proposal = Assessment.objects.get()
    engineer = as_("engineer")
    refused = engineer.post(
        f"/proposal/{proposal.pk}/", {"decision": "override", "verdict": "withdraw"}
    )
    assert refused.status_code == 400
    assert "State your grounds." in words(refused.content)
    assert 'value="withdraw"' in refused.content.decode()
    assert not Review.objects.exists()


def test_repair_and_return_to_service(book: Book, as_: Any):
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    crack = book.gate.cracks.get()
    engineer = as_("engineer")
    done = engineer.post(
        f"/location/{book.heel.pk}/repair/?crack={crack.pk}",
        {
            "sort": "repair",
            "welded": "no",
            "what": "ground out and blended",
            "done_by": "Invented Works",
            "work_order": "W-77",
            "done_on": "2026-03-10",
            "counter": "1300",
            "inspection_after": "dye, nothing found, Ilka Berend",
            "closes": "yes",
        },
    )
    assert done.status_code == 302
    held = as_("crew").get(f"/component/{book.gate.pk}/")
    assert b"leaf edged" in held.content
    signatory = as_("signatory")
    shown = hidden(signatory.get(done["Location"]).content)
    back = signatory.post(
        done["Location"],
        {
            **shown,
            "grounds": "ground out, found clean",
            "licence": str(book.licence.pk),
            "password": PASSWORD,
        },
    )
    assert back.status_code == 302
    crack.refresh_from_db()
    assert crack.closed_at is not None
    assert not Standing.objects.filter(crack=crack).exists()


def test_past_its_date_a_part_is_black_edged(book: Book, as_: Any):
    with clock.told(datetime.datetime(2026, 3, 2, 9, tzinfo=datetime.UTC)):
        book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    with clock.told(datetime.datetime(2027, 6, 1, 9, tzinfo=datetime.UTC)):
        today = as_("crew").get("/")
    page = words(today.content)
    assert "Overdue" in page
    assert "Its time was up" in page
    assert b"out-of-use" in today.content
