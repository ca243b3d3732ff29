"""Noting that an assessment is owed. The first half of what the worker answers."""

import uuid

from logbook import clock
from logbook.actions import standing
from logbook.models import AssessmentAsked, Crack, Location


def for_assessment(location: Location, crack: Crack | None, because: uuid.UUID) -> None:
    """Inside the asking act's transaction, after its leaf: the standing orders what it finds by
    leaf. What is owed already is not asked twice."""
    AssessmentAsked.objects.get_or_create(
        location=location, crack=crack, because_act=because, defaults={"asked_at": clock.now()}
    )
    standing.refresh(location, crack)
    if crack is not None:
        standing.refresh(location, None)
