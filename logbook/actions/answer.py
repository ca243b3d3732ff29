"""After an entry is in the book: its verdict at once, if it can be had within a second."""

import time

from django.conf import settings

from logbook.actions.propose import propose
from logbook.jobs.tasks import propose_one
from logbook.models import AssessmentAsked, Inspection


def answer_now(inspection: Inspection) -> bool:
    """Work out what this entry asked, one place after the other, while there is time; what is
    left goes to the worker. True where everything is answered.

    The entry is committed before this is called: if the process dies here, the sweep finds what
    is owed.
    """
    deadline = time.monotonic() + settings.VERDICT_WAIT_SECONDS
    owed = list(
        AssessmentAsked.objects.filter(because_act=inspection.leaf_id)
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


def _owed(location: int, crack: int | None) -> bool:
    return AssessmentAsked.objects.filter(location=location, crack=crack).exists()
