"""Finding what died: owed assessments that nobody took up, tasks whose worker is gone.

A task is only a hint that work waits; ``AssessmentAsked`` is the truth. Running a task twice is
harmless, since the proposal is written once.
"""

import datetime
import logging
import threading

from django.db import DatabaseError, connection
from django_tasks_db.models import DBTaskResult

from logbook import clock
from logbook.models import AssessmentAsked, Beat
from logbook.records.issue import issue, outstanding

log = logging.getLogger(__name__)

BEAT_SECONDS = 5
DEAD_SECONDS = 30
OWED_SECONDS = 20


def beat(worker_id: str) -> None:
    Beat.objects.update_or_create(worker_id=worker_id, defaults={"at": clock.now()})


def release_dead_tasks() -> int:
    """Put tasks back whose worker no longer beats; returns how many."""
    now = clock.now()
    dead = now - datetime.timedelta(seconds=DEAD_SECONDS)
    alive = set(Beat.objects.filter(at__gte=dead).values_list("worker_id", flat=True))
    count = 0
    for task in DBTaskResult.objects.running().filter(started_at__lt=dead):
        if task.worker_ids and task.worker_ids[-1] in alive:
            continue
        # Compare and set: only if it is still the run that we looked at.
        count += DBTaskResult.objects.filter(
            pk=task.pk, status="RUNNING", started_at=task.started_at
        ).update(status="READY")
    return count


def enqueue_owed(older_than_seconds: float = OWED_SECONDS) -> int:
    """Ask again for every assessment that has been owed for a while; returns how many."""
    from .tasks import propose_one

    before = clock.now() - datetime.timedelta(seconds=older_than_seconds)
    owed = (
        AssessmentAsked.objects.filter(asked_at__lt=before)
        .values_list("location_id", "crack_id")
        .distinct()
    )
    waiting = _waiting(propose_one.module_path)
    count = 0
    for location, crack in owed:
        if (location, crack) not in waiting:
            propose_one.enqueue(location, crack)
            count += 1
    return count


def _waiting(task_path: str) -> set[tuple[int, int | None]]:
    """What is queued already, so that a long queue is not made longer at each sweep."""
    rows = DBTaskResult.objects.filter(task_path=task_path, status__in=("READY", "RUNNING"))
    return {tuple(args["args"]) for args in rows.values_list("args_kwargs", flat=True)}


def issue_outstanding() -> int:
    """Print the records whose number was reserved and whose issue died; returns how many."""
    waiting = outstanding()
    for record in waiting:
        issue(record)
    return len(waiting)


class Heart(threading.Thread):
    """Beats, releases and sweeps beside a worker until told to stop.

    A database that does not answer is logged and asked again at the next beat: a worker whose
    heart had stopped would never sweep.
    """

    def __init__(self, worker_id: str) -> None:
        super().__init__(daemon=True)
        self.worker_id = worker_id
        self.stopped = threading.Event()

    def run(self) -> None:
        rounds = 0
        while not self.stopped.wait(BEAT_SECONDS if rounds else 0):
            try:
                self.round(sweep=rounds % 4 == 0)
            except DatabaseError:
                log.exception("the worker's heart missed a beat")
            finally:
                connection.close()
            rounds += 1

    def round(self, *, sweep: bool) -> None:
        beat(self.worker_id)
        release_dead_tasks()
        if sweep:
            enqueue_owed()
            issue_outstanding()
