"""The sweep and the heart: what died is found, and a database that hiccups stops neither."""

import datetime

import pytest
from django.db import OperationalError
from django_tasks_db.models import DBTaskResult

from logbook import clock
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.entry import read_inspection
from logbook.jobs import sweep
from logbook.models import Beat
from tests.pages.book import crack_seen, entry_data, write_book

pytestmark = pytest.mark.django_db(transaction=True)


def owe_one() -> None:
    book = write_book()
    data = entry_data("2026-05-04", 1000, crack_seen(book.heel, "3", "12"))
    log_inspection(book.people["crew"], read_inspection(data, known_of(book.gate)))


def test_what_is_queued_already_is_not_queued_again() -> None:
    owe_one()
    assert sweep.enqueue_owed(older_than_seconds=-1) == 1
    assert sweep.enqueue_owed(older_than_seconds=-1) == 0
    assert DBTaskResult.objects.count() == 1


def test_a_task_of_a_dead_worker_is_put_back_and_one_of_a_living_worker_is_not() -> None:
    owe_one()
    sweep.enqueue_owed(older_than_seconds=-1)
    long_ago = clock.now() - datetime.timedelta(seconds=sweep.DEAD_SECONDS + 5)
    DBTaskResult.objects.update(status="RUNNING", started_at=long_ago, worker_ids=["w1"])
    sweep.beat("w1")
    assert sweep.release_dead_tasks() == 0
    Beat.objects.update(at=long_ago)
    assert sweep.release_dead_tasks() == 1
    assert DBTaskResult.objects.get().status == "READY"


def test_a_missed_beat_does_not_stop_the_heart(monkeypatch: pytest.MonkeyPatch) -> None:
    heart = sweep.Heart("w1")
    rounds: list[bool] = []

    def round_(*, sweep: bool) -> None:
        rounds.append(sweep)
        if len(rounds) == 1:
            raise OperationalError("locked")
        heart.stopped.set()

    monkeypatch.setattr(heart, "round", round_)
    monkeypatch.setattr(sweep, "BEAT_SECONDS", 0.01)
    heart.run()
    assert rounds == [True, False]
