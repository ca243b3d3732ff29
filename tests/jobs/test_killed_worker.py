"""A worker killed outright in the middle of a computation: nothing is lost, nothing is doubled.

Real processes on a database of their own; the shared fixtures stay out of it.
"""

import os
import signal
import subprocess
import sys
from pathlib import Path

ROOT = Path(__file__).parents[2]
SET_UP = "import django; django.setup(); "

WRITE = """
from django.core.management import call_command
call_command("migrate", verbosity=0)
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.entry import read_inspection
from logbook.jobs.sweep import enqueue_owed
from tests.pages.book import crack_seen, entry_data, write_book
book = write_book()
data = entry_data("2026-05-04", 1000, crack_seen(book.heel, "3", "12"))
log_inspection(book.people["crew"], read_inspection(data, known_of(book.gate)))
print(enqueue_owed(older_than_seconds=-1))
"""
# The kill comes while the computation runs, as it would from outside.
WORK_AND_DIE = """
import os, signal
from django.core.management import call_command
from logbook.actions import propose
propose.assessment.assess = lambda text: os.kill(os.getpid(), signal.SIGKILL)
call_command("worker", worker_id="first", batch=True, interval=0.1)
"""
LOOK = """
from django_tasks_db.models import DBTaskResult
from logbook.journal.verify import verify
from logbook.models import Assessment, AssessmentAsked, Inspection, Standing
print(Inspection.objects.count(), AssessmentAsked.objects.count(), Assessment.objects.count(),
      DBTaskResult.objects.get().status, Standing.objects.get().state, verify().sound)
"""
# Another worker, whose heart finds the dead one's task; no time is waited for.
GO_ON = """
from django.core.management import call_command
from logbook.jobs import sweep
sweep.DEAD_SECONDS = -1
print(sweep.release_dead_tasks())
call_command("worker", worker_id="second", batch=True, interval=0.1)
"""


def run(folder: Path, script: str) -> subprocess.CompletedProcess[str]:
    names = ("LOGBOOK_", "DJANGO_", "DATABASE_")
    env = {name: value for name, value in os.environ.items() if not name.startswith(names)}
    env |= {"LOGBOOK_DATA": str(folder), "DJANGO_SETTINGS_MODULE": "logbook.settings"}
    return subprocess.run(
        [sys.executable, "-c", SET_UP + script],
        cwd=ROOT, env=env, capture_output=True, text=True, timeout=120, check=False,
    )  # fmt: skip


def said(done: subprocess.CompletedProcess[str]) -> list[str]:
    assert done.returncode == 0, done.stderr
    return done.stdout.split()


def test_what_a_killed_worker_left_is_done_once_by_the_next(tmp_path: Path) -> None:
    assert said(run(tmp_path, WRITE)) == ["1"]
    died = run(tmp_path, WORK_AND_DIE)
    assert died.returncode == -signal.SIGKILL, died.stderr
    assert said(run(tmp_path, LOOK)) == ["1", "1", "0", "RUNNING", "not-assessed", "True"]
    assert said(run(tmp_path, GO_ON))[0] == "1"
    entries, owed, answered, task, state, sound = said(run(tmp_path, LOOK))
    assert (entries, owed, answered, task, sound) == ("1", "0", "1", "SUCCESSFUL", "True")
    assert state != "not-assessed"
