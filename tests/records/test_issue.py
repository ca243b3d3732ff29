"""Records out of the book: numbers, issue, stored bytes, and what goes wrong."""

import hashlib
import stat
from datetime import date, timedelta
from decimal import Decimal
from io import BytesIO
from pathlib import Path

import pikepdf
import pytest
from django.conf import settings
from django.db import transaction

from logbook import clock
from logbook.errors import Refusal
from logbook.figures.of_assessment import figures_of
from logbook.journal.verify import verify
from logbook.models import Deferral, DeferralRequest, Head, Photo, Record
from logbook.records import issue as issuing
from logbook.records.gather import gather
from logbook.records.issue import issue, outstanding, path_of, reserve_number, stored_bytes
from logbook.records.render import render_record
from tests.figures.documents import CASE
from tests.records.book import SIGNED, Book, usual
from tests.records.contents import jpeg
from tests.records.test_render import drawn_on, text_of

pytestmark = pytest.mark.django_db(transaction=True)


def test_a_signed_record_is_issued_stored_and_reprinted_as_it_was():
    book, disposition = usual()
    record = issue(disposition.record)
    assert record.state == "issued", record.void_why
    pdf = stored_bytes(record)
    assert hashlib.sha256(pdf).hexdigest() == record.sha256
    assert record.byte_size == len(pdf)
    assert stat.S_IMODE(path_of(record.number, record.sha256).stat().st_mode) == 0o600
    said = text_of(pdf, 1, 1).replace("\N{NO-BREAK SPACE}", " ")
    for words in (
        "Record 1", "C-17", "4 Lower chord, weld at gusset", "crack 2", "watch",
        "May stay in use. Look again early: by 14 Dec 2026 or 14,400 lifts.",
        "approved and signed by", "Á. Wójcik", "Board of Lifting Engineers 4471, cranes",
        "5 May 2026, 16:20 +02:00",
    ):  # fmt: skip
        assert words in said
    # A later entry changes nothing of what is printed again.
    book.look(date(2026, 5, 6), Decimal(12700), Decimal("8.6"), Decimal("25"))
    assert stored_bytes(Record.objects.get(pk=record.pk)) == pdf


def test_the_root_includes_the_signature():
    _, disposition = usual()
    head = Head.objects.get(pk=1)
    record = issue(disposition.record)
    assert record.journal_size == head.size == disposition.leaf.index + 1
    assert record.journal_root == bytes(head.root).hex()
    assert record.journal_root[:32] in text_of(stored_bytes(record), 1, 1)


def test_what_was_seen_decided_and_reckoned_is_in_it():
    _, disposition = usual()
    pdf = stored_bytes(issue(disposition.record))
    said = text_of(pdf, 1, 99).replace("\N{NO-BREAK SPACE}", " ")
    for words in (
        "struck out: read from the wrong edge", "under paint", "UT-12 revision 3", "5.1 mm",
        "flaw detector 3, valid until 1 Nov 2026", "agrees with the log", "accepted by J. Brandt",
        "mill certificate 4471", "strain gauges 2024", "Newman & Raju 1981", "not computed yet",
        "K = F · σ · √(π · a / Q)", "19.04 MPa√m", "Figure 1.", "Figure 2.", "Figure 3.",
        "basis revision 1", "loading, peak, membrane", "121 MPa",
    ):  # fmt: skip
        assert words in said
    with pikepdf.open(BytesIO(pdf)) as read:
        case = read.attachments["case.json"].get_file().read_bytes().decode()
        outcome = read.attachments["outcome.json"].get_file().read_bytes().decode()
    assert case == disposition.assessment.case_text
    assert outcome == disposition.assessment.outcome_text


def test_numbers_have_no_gap_even_when_a_signing_is_taken_back():
    book, disposition = usual()
    assert disposition.record.number == 1
    with pytest.raises(ZeroDivisionError), transaction.atomic():
        second = book.signed(book.proposal("continue"))
        assert second.record.number == 2
        raise ZeroDivisionError
    assert book.signed(book.proposal("continue")).record.number == 2


def test_a_number_outside_a_transaction_is_refused():
    _, disposition = usual()
    with pytest.raises(RuntimeError, match="inside the signing transaction"):
        reserve_number(disposition=disposition)


def test_issuing_twice_gives_one_record():
    _, disposition = usual()
    first = issue(disposition.record)
    again = issue(Record.objects.get(pk=first.pk))
    assert (again.sha256, again.issued_at) == (first.sha256, first.issued_at)


def test_a_failed_issue_is_void_with_its_reason(monkeypatch):
    _, disposition = usual()

    def broken(content):
        raise OSError("no room left")

    monkeypatch.setattr(issuing, "render_record", broken)
    record = issue(disposition.record)
    assert (record.state, record.void_why) == ("void", "OSError: no room left")
    with pytest.raises(Refusal) as refused:
        stored_bytes(record)
    assert refused.value.code == "record-not-issued"
    assert "no room left" in refused.value.sentence


def test_what_died_between_signing_and_issue_is_named():
    _, disposition = usual()
    with clock.told(SIGNED + timedelta(minutes=1)):
        assert list(outstanding()) == []
    with clock.told(SIGNED + timedelta(minutes=5)):
        assert list(outstanding()) == [disposition.record]
        issue(disposition.record)
        assert list(outstanding()) == []


def test_a_file_that_changed_or_went_is_refused():
    _, disposition = usual()
    record = issue(disposition.record)
    path = path_of(record.number, record.sha256)
    path.write_bytes(path.read_bytes() + b"x")
    with pytest.raises(Refusal) as refused:
        stored_bytes(record)
    assert refused.value.code == "record-changed"
    path.unlink()
    with pytest.raises(Refusal) as refused:
        stored_bytes(record)
    assert refused.value.code == "record-lost"


def test_refer_without_any_case_prints_the_sizes_and_says_why():
    book = Book()
    for n in range(3):
        book.look(
            date(2026, 1, 1 + n), Decimal(1000 * n), None, Decimal(22 + n),
            depth_basis="not-measured",
        )  # fmt: skip
    assessment = book.proposal("refer", case=None, outcome=None)
    disposition = book.signed(assessment, until_on=None, until_at=None)
    record = issue(disposition.record)
    assert record.state == "issued", record.void_why
    said = text_of(stored_bytes(record), 1, 99)
    assert "Not to be used until an engineer has decided." in said
    assert "Not to be used" in text_of(stored_bytes(record), 1, 1)
    assert "Nothing could be reckoned" in said
    assert "not measured" in said
    assert "Figure 1." in said and "Figure 2." not in said
    with pikepdf.open(BytesIO(stored_bytes(record))) as read:
        assert not read.attachments


def test_a_place_without_a_crack_has_a_record_too():
    book = Book()
    nothing = {
        **CASE,
        "crack": {
            "kind": "plate-surface",
            "found": False,
            "assumed": {"depth_mm": 2, "length_mm": 8, "source": "trial 12"},
        },
    }
    record = issue(book.signed(book.proposal("continue", crack=False, case=nothing)).record)
    assert record.state == "issued", record.void_why
    said = text_of(stored_bytes(record), 1, 99).replace("\N{NO-BREAK SPACE}", " ")
    assert "May stay in use. Next look by 14 Dec 2026 or 14,400 lifts." in said
    assert "crack, assumed, source trial 12" in said
    assert "Figure" not in said


def test_a_restriction_says_whether_it_is_confirmed():
    book, _ = usual()
    content = gather(book.signed(book.proposal("restrict"), limit="up to 12 t").record)
    assert content.sentence.startswith("May be used only up to 12 t.")
    assert any("In force once somebody has confirmed" in notice for notice in content.notices)


def test_figures_of_the_crack_for_the_pages():
    book, disposition = usual()
    figures = figures_of(book.crack, disposition.assessment, disposition=disposition)
    assert [figure.name for figure in figures] == ["size", "diagram", "section"]
    rows = figures[0].table.rows
    assert len(rows) == 3
    assert any("struck out: read from the wrong edge" in row[-1] for row in rows)
    assert rows[-1][3].replace("\N{NO-BREAK SPACE}", " ") == "7.2 mm to 9.6 mm"
    assert figures_of(book.crack, None)[0].name == "size"


def test_the_marked_picture_and_the_photos_are_printed():
    book = Book()
    finding = book.look(date(2026, 5, 4), Decimal(12600), Decimal("8.4"), Decimal("24"))
    for n, shade in enumerate([(200, 190, 180), (90, 100, 110)]):
        save_photo(book, finding if n else None, jpeg(shade=shade))
    late = Photo.objects.create(
        site=book.site, finding=finding, sha256="f" * 64, uploaded_by=book.crew
    )
    book.component.picture = Photo.objects.order_by("pk").first()
    book.component.save()
    book.location.picture_x, book.location.picture_y = 0.25, 0.5
    book.location.save()
    content = gather(book.signed(book.proposal()).record)
    assert content.part.picture.mark == (0.25, 0.5)
    assert [photo.jpeg is None for photo in content.photos] == [False, True]
    with pikepdf.open(BytesIO(render_record(content))) as read:
        assert "/Image" in drawn_on(read.pages[0])
        assert "/Image" in drawn_on(read.pages[1])
    assert late.sha256[:32] in text_of(render_record(content), 2, 2)


def save_photo(book, finding, body):
    digest = hashlib.sha256(body).hexdigest()
    folder = Path(settings.DATA_DIR) / "shown" / digest[:2]
    folder.mkdir(parents=True, exist_ok=True)
    (folder / f"{digest}.jpg").write_bytes(body)
    return Photo.objects.create(
        site=book.site, finding=finding, sha256=digest, uploaded_by=book.crew, arrived_at=SIGNED,
        media_type="image/jpeg", byte_size=len(body), width=640, height=420,
    )  # fmt: skip


def test_a_deferral_has_a_record_of_its_own():
    book, disposition = usual()
    request = book.act(
        "ask-deferral",
        lambda act: DeferralRequest.objects.create(
            leaf_id=act, disposition=disposition, by=book.engineer, grounds="lock is drained",
            new_on=date(2027, 1, 8), at=SIGNED,
        ),
        by=book.engineer,
    )  # fmt: skip

    def make(act):
        made = Deferral.objects.create(
            leaf_id=act, request=request, disposition=disposition, by=book.signatory,
            licence=book.licence, new_on=date(2027, 1, 8), at=SIGNED,
        )  # fmt: skip
        reserve_number(deferral=made)
        return made

    deferral = book.act("approve-deferral", make, by=book.signatory)
    record = issue(deferral.record)
    assert (record.number, record.state) == (2, "issued"), record.void_why
    said = text_of(stored_bytes(record), 1, 1).replace("\N{NO-BREAK SPACE}", " ")
    assert "Record of a deferral" in said
    assert "put off from 14 Dec 2026 or 14,400 lifts to 8 Jan 2027" in said
    whole = text_of(stored_bytes(record), 1, 99)
    assert "lock is drained" in whole and "J. Brandt" in whole


def test_a_record_put_in_anothers_place_is_found():
    """File and row are changed together; the leaf written as it was issued says otherwise."""
    _, disposition = usual()
    record = issue(disposition.record)
    assert verify().sound
    forged = stored_bytes(record) + b"%%"
    digest = hashlib.sha256(forged).hexdigest()
    path_of(record.number, digest).write_bytes(forged)
    Record.objects.filter(pk=record.pk).update(sha256=digest)
    faults = [str(fault) for fault in verify().faults]
    assert any("written as it was issued" in fault for fault in faults), faults
