"""A worker: takes tasks from the database, beats, and sweeps up after workers that died."""

from typing import Any

from django_tasks_db.management.commands import db_worker

from logbook.jobs.sweep import Heart


class Command(db_worker.Command):
    help = "Works through the background tasks until it is told to stop (SIGTERM or Ctrl-C)."

    def handle(self, *, worker_id: str, **options: Any) -> None:
        heart = Heart(worker_id)
        heart.start()
        try:
            super().handle(worker_id=worker_id, **options)
        finally:
            heart.stopped.set()
