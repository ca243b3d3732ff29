"""Noting that an assessment is owed. The first half of what the worker answers."""

import uuid

from logbook import clock
from logbook.actions import standing
from logbook.cases import rows
from logbook.models import AssessmentAsked, Component, Crack, Location, Standing


def for_assessment(location: Location, crack: Crack | None, because: uuid.UUID) -> None:
    """Inside the asking act's transaction, after its leaf: the standing orders what it finds by
    leaf. What is owed already is not asked twice."""
    AssessmentAsked.objects.get_or_create(
        location=location, crack=crack, because_act=because, defaults={"asked_at": clock.now()}
    )
    standing.refresh(location, crack)
    if crack is not None:
        standing.refresh(location, None)
        _ask_for_neighbours(location, crack, because)


def _ask_for_neighbours(location: Location, crack: Crack, because: uuid.UUID) -> None:
    """What is known of one crack can change what the cracks beside it are assessed as."""
    for other in rows.beside(crack):
        AssessmentAsked.objects.get_or_create(
            location=location, crack=other, because_act=because, defaults={"asked_at": clock.now()}
        )
        standing.refresh(location, other)


def for_all_places(component: Component, because: uuid.UUID) -> None:
    """What counts for the whole component, its counter say, asks for every place that stands."""
    stands = Standing.objects.filter(location__component=component).select_related(
        "location__component__site", "crack"
    )
    for row in list(stands):
        for_assessment(row.location, row.crack, because)
