"""Intake: once each, whole or not at all, acknowledged before anything is reckoned."""

import threading
from typing import Any

import pytest
from django.db import connections

from logbook.actions import propose as proposing
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.actions.propose import propose
from logbook.entry import read_inspection
from logbook.errors import Refusal
from logbook.jobs.sweep import enqueue_owed
from logbook.journal.verify import verify
from logbook.models import (
    Assessment,
    AssessmentAsked,
    Crack,
    Finding,
    Inspection,
    Leaf,
    Standing,
    TrayItem,
)
from tests.pages.book import Book, crack_seen, entry_data

from .conftest import Deciding, Leaves


def draft(book: Book, *findings: dict[str, Any], **more: Any) -> Any:
    data = entry_data("2026-05-04", 1000, *findings) | more
    return read_inspection(data, known_of(book.gate))


def test_written_and_held_until_it_is_answered(book: Book, leaves: Leaves) -> None:
    made = log_inspection(book.people["crew"], draft(book, crack_seen(book.heel, "3", "12")))
    assert leaves.new() == ["log-inspection"]
    crack = Crack.objects.get()
    standing = Standing.objects.get(crack=crack)
    assert (standing.state, standing.verdict, standing.held) == ("not-assessed", "withdraw", True)
    answered = propose(book.heel.pk, crack.pk)
    assert answered is not None and answered.case_text and answered.outcome_text
    assert leaves.new() == ["log-inspection", "propose"]
    assert not AssessmentAsked.objects.exists()
    assert Standing.objects.get(crack=crack).state != "not-assessed"
    assert made.entry_number == leaves.before + 1
    assert verify().sound


def test_sent_twice_is_written_once(book: Book, leaves: Leaves) -> None:
    one = draft(book, crack_seen(book.heel, "3", "12"))
    first = log_inspection(book.people["crew"], one)
    again = log_inspection(book.people["crew"], one)
    assert first.pk == again.pk
    assert leaves.new() == ["log-inspection"]


def test_the_same_key_with_other_content_is_kept_for_a_person(book: Book, leaves: Leaves) -> None:
    one = draft(book, crack_seen(book.heel, "3", "12"))
    log_inspection(book.people["crew"], one)
    other = draft(book, crack_seen(book.heel, "4", "12"), key=str(one.key))
    for _ in range(2):
        with pytest.raises(Refusal) as refused:
            log_inspection(book.people["crew"], other)
        assert (refused.value.status, refused.value.code) == (409, "same-key-other-content")
    assert Inspection.objects.count() == 1
    assert '"depth_mm": "4"' in TrayItem.objects.get().content
    assert leaves.new() == ["log-inspection", "keep-in-tray"]


def test_another_person_cannot_take_over_a_key(book: Book) -> None:
    one = draft(book, crack_seen(book.heel, "3", "12"))
    log_inspection(book.people["crew"], one)
    with pytest.raises(Refusal):
        log_inspection(book.people["engineer"], one)


def test_twelve_at_once_with_one_key_are_one(book: Book) -> None:
    one = draft(book, crack_seen(book.heel, "3", "12"))
    made: list[int] = []
    errors: list[BaseException] = []

    def send() -> None:
        try:
            made.append(log_inspection(book.people["crew"], one).pk)
        except Exception as error:  # noqa: BLE001 (shown below)
            errors.append(error)
        finally:
            connections.close_all()

    threads = [threading.Thread(target=send) for _ in range(12)]
    for t in threads:
        t.start()
    for t in threads:
        t.join()
    assert not errors
    assert len(made) == 12 and len(set(made)) == 1
    assert Inspection.objects.count() == Finding.objects.count() == Crack.objects.count() == 1


def test_new_cracks_at_once_get_numbers_of_their_own(book: Book) -> None:
    drafts = [draft(book, crack_seen(book.heel, "3", "12")) for _ in range(8)]
    errors: list[BaseException] = []

    def send(one: Any) -> None:
        try:
            log_inspection(book.people["crew"], one)
        except Exception as error:  # noqa: BLE001 (shown below)
            errors.append(error)
        finally:
            connections.close_all()

    threads = [threading.Thread(target=send, args=(one,)) for one in drafts]
    for t in threads:
        t.start()
    for t in threads:
        t.join()
    assert not errors
    assert sorted(Crack.objects.values_list("number", flat=True)) == list(range(1, 9))


@pytest.mark.parametrize("who", ["auditor", "signatory", "administrator", "stranger"])
def test_who_may_not_write(book: Book, leaves: Leaves, who: str) -> None:
    with pytest.raises(Refusal) as refused:
        log_inspection(book.people[who], draft(book, crack_seen(book.heel, "3", "12")))
    assert refused.value.status == (404 if who == "stranger" else 403)
    assert not Inspection.objects.exists() and not leaves.new()


def test_a_place_nobody_listed_is_provisional_and_referred(deciding: Deciding) -> None:
    new = {
        "new_location": {"name": "lug behind", "described": "behind the ladder"},
        "what": "crack",
        "crack": "new",
        "depth_basis": "not-measured",
        "length_mm": "9",
    }
    deciding.book.log("2026-05-04", 1000, new)
    a = Assessment.objects.get()
    assert a.location.provisional and a.verdict == "refer" and a.case_text is None
    assert "provisional" in a.reasons


def test_a_computation_that_dies_is_found_and_done_again(
    book: Book, monkeypatch: pytest.MonkeyPatch
) -> None:
    log_inspection(book.people["crew"], draft(book, crack_seen(book.heel, "3", "12")))
    crack = Crack.objects.get()
    with monkeypatch.context() as broken:
        broken.setattr(
            proposing.assessment, "assess", lambda text: (_ for _ in ()).throw(MemoryError("gone"))
        )
        assert propose(book.heel.pk, crack.pk) is None
    owed = AssessmentAsked.objects.get()
    assert owed.tries == 1 and "MemoryError: gone" in owed.last_error
    assert Standing.objects.get(crack=crack).state == "not-assessed"
    assert enqueue_owed(older_than_seconds=-1) == 1
    assert propose(book.heel.pk, crack.pk) is not None
    assert enqueue_owed(older_than_seconds=-1) == 0


def test_one_that_always_dies_is_referred_with_its_reason(
    book: Book, monkeypatch: pytest.MonkeyPatch
) -> None:
    log_inspection(book.people["crew"], draft(book, crack_seen(book.heel, "3", "12")))
    crack = Crack.objects.get()
    monkeypatch.setattr(
        proposing.assessment, "assess", lambda text: (_ for _ in ()).throw(ValueError("bad"))
    )
    answers = [propose(book.heel.pk, crack.pk) for _ in range(proposing.MOST_TRIES)]
    assert answers[:-1] == [None, None]
    last = answers[-1]
    assert last is not None and last.verdict == "refer" and "did not finish" in last.reasons
    assert last.case_text is not None  # what was asked is kept


def test_what_changes_while_it_is_reckoned_is_reckoned_again(
    book: Book, monkeypatch: pytest.MonkeyPatch
) -> None:
    log_inspection(book.people["crew"], draft(book, crack_seen(book.heel, "3", "12")))
    crack = Crack.objects.get()
    real, calls = proposing.assessment.assess, []

    def slow(text: str) -> Any:
        calls.append(text)
        if len(calls) == 1:
            second = draft(book, crack_seen(book.heel, "4", "13", "1"), counter="1100")
            log_inspection(book.people["crew"], second)
        return real(text)

    monkeypatch.setattr(proposing.assessment, "assess", slow)
    made = propose(book.heel.pk, crack.pk)
    assert made is not None and len(calls) == 2
    assert '"depth_mm":4' in str(made.case_text)
    assert Assessment.objects.filter(crack=crack).count() == 1


def test_a_failed_write_leaves_nothing(book: Book, monkeypatch: pytest.MonkeyPatch) -> None:
    from logbook.actions import log_inspection as module

    before = Leaf.objects.count()
    monkeypatch.setattr(
        module, "append", lambda *a, **k: (_ for _ in ()).throw(RuntimeError("power"))
    )
    with pytest.raises(RuntimeError):
        log_inspection(book.people["crew"], draft(book, crack_seen(book.heel, "3", "12")))
    assert not Inspection.objects.exists() and not Crack.objects.exists()
    assert Leaf.objects.count() == before and verify().sound
