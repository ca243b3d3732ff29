"""After an act is in the book: the verdict it asks for at once, if it can be had in a second."""

import time
import uuid

from django.conf import settings

from logbook.actions.propose import propose
from logbook.jobs.tasks import propose_one
from logbook.models import AssessmentAsked


def answer_now(act: uuid.UUID) -> bool:
    """Work out what this act asked, one place after the other, while there is time; what is
    left goes to the worker. True where everything is answered.

    The act is committed before this is called: if the process dies here, the sweep finds what
    is owed.
    """
    deadline = time.monotonic() + settings.VERDICT_WAIT_SECONDS
    owed = list(
        AssessmentAsked.objects.filter(because_act=act)
        .order_by("pk")
        .values_list("location_id", "crack_id")
    )
    done = True
    for location, crack in owed:
        if time.monotonic() >= deadline:
            propose_one.enqueue(location, crack)
            done = False
        elif propose(location, crack) is None and _owed(location, crack):
            done = False
    return done


def answer_later(act: uuid.UUID) -> None:
    """Leave what this act asked to the worker: more entries are right behind it."""
    owed = AssessmentAsked.objects.filter(because_act=act).order_by("pk")
    for location, crack in owed.values_list("location_id", "crack_id"):
        propose_one.enqueue(location, crack)


def _owed(location: int, crack: int | None) -> bool:
    return AssessmentAsked.objects.filter(location=location, crack=crack).exists()
