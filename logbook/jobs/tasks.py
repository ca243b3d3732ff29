"""What runs in the background. Actions are called by name, since they stand above the jobs."""

from django.utils.module_loading import import_string
from django_tasks import task


@task()
def propose_one(location: int, crack: int | None) -> str:
    """Answer what is owed for one place or crack; harmless when nothing is."""
    made = import_string("logbook.actions.propose.propose")(location, crack)
    return "nothing was owed" if made is None else str(made.verdict)
