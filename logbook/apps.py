"""The logbook application."""

from django.apps import AppConfig
from django.db.models.signals import post_migrate


class LogbookConfig(AppConfig):
    name = "logbook"
    verbose_name = "Crack logbook"

    def ready(self) -> None:
        from logbook.journal import triggers

        # SQLite drops triggers when a migration rebuilds a table, so they are put back each time.
        post_migrate.connect(triggers.install, sender=self, dispatch_uid="logbook-triggers")
