"""Which rows a case is made from: the adopted basis and the sizes that count."""

import datetime
from decimal import Decimal

from django.db.models import Exists, OuterRef, QuerySet

from logbook.models import (
    Basis,
    Component,
    Crack,
    Finding,
    Inspection,
    Location,
    Measurement,
    Repair,
    What,
)


def adopted_basis(location: Location) -> Basis | None:
    """The newest basis that someone other than its author has adopted."""
    return (
        Basis.objects.filter(location=location, adoption__isnull=False)
        .select_related("leaf", "adoption__leaf")
        .order_by("-revision")
        .first()
    )


def newest_work(location: Location) -> Repair | None:
    """The newest repair, exchange or removal at a place after which no crack goes on: what was
    found and decided there before it says nothing of the part as it is now."""
    return (
        Repair.objects.filter(location=location, closes=True, return_to_service__isnull=False)
        .select_related("leaf")
        .order_by("-leaf__index")
        .first()
    )


def looked_since(work: Repair) -> bool:
    """Somebody looked at the place after the work, by the day and by the book."""
    looks = work.location.findings.exclude(what=What.COULD_NOT_LOOK)
    return looks.filter(
        leaf__index__gt=work.leaf.index,
        inspection__found_on__gte=work.done_on,
        strike_out__isnull=True,
    ).exists()


def measurements(crack: Crack) -> list[Measurement]:
    """The sizes that count, oldest first: not struck out, and since the newest start.

    Of several sizes of one day the larger counts until a person has decided: it stands last.
    """
    rows = (
        Measurement.objects.filter(crack=crack, finding__strike_out__isnull=True)
        .select_related("finding__inspection__leaf", "leaf")
        .order_by("finding__inspection__found_on", "leaf__index")
    )
    start = new_start(crack)
    if start is not None:
        rows = rows.filter(leaf__index__gt=start.leaf.index)
    return sorted(
        rows,
        key=lambda m: (
            m.finding.inspection.found_on,
            m.depth_mm or Decimal(0),
            m.length_mm or Decimal(0),
        ),
    )


def beside(crack: Crack) -> list[Crack]:
    """The other open cracks of the same place, by number."""
    others = Crack.objects.filter(location=crack.location, closed_at__isnull=True)
    return list(others.exclude(pk=crack.pk).order_by("number"))


def new_start(crack: Crack) -> Repair | None:
    """The newest repair after which the crack goes on with a new start."""
    return (
        Repair.objects.filter(crack=crack, closes=False)
        .select_related("leaf")
        .order_by("-leaf__index")
        .first()
    )


def last_look(location: Location, crack: Crack | None) -> Finding | None:
    """The newest finding that says something about this place or crack and was not struck out.

    Where nobody could look nothing new is known: the look before it counts, with its date.
    """
    rows = Finding.objects.filter(location=location, strike_out__isnull=True).exclude(
        what=What.COULD_NOT_LOOK
    )
    rows = rows.filter(crack=crack) if crack is not None else rows.filter(crack__isnull=True)
    return (
        rows.select_related("inspection__leaf", "leaf")
        # A size written anew keeps the place of the one it corrects.
        .order_by("-inspection__found_on", "-inspection__leaf__index", "-leaf__index")
        .first()
    )


def looks_that_count(component: Component) -> QuerySet[Inspection]:
    """Visits of which something still stands. One whose every finding was struck out read no
    counter either: a mistyped reading goes with it."""
    left = Finding.objects.filter(inspection=OuterRef("pk"), strike_out__isnull=True)
    return Inspection.objects.filter(Exists(left), component=component)


def readings(component: Component) -> list[tuple[datetime.date, Decimal]]:
    """Counter readings, oldest first, since the counter was last replaced; never running back."""
    kept: list[tuple[datetime.date, Decimal]] = []
    rows = looks_that_count(component).order_by("found_on", "leaf__index")
    for on, at, replaced in rows.values_list("found_on", "counter", "counter_replaced_why"):
        if replaced:
            kept = []
        if not kept or at >= kept[-1][1]:
            kept.append((on, at))
    return kept


def counter_replaced(component: Component) -> Inspection | None:
    """The visit that found the counter replaced, the newest, if ever: readings before it are in
    other units than readings since."""
    return (
        looks_that_count(component)
        .exclude(counter_replaced_why="")
        .select_related("leaf")
        .order_by("-found_on", "-leaf__index")
        .first()
    )


def on_this_counter(on: datetime.date, leaf_index: int, replaced: Inspection | None) -> bool:
    """Was a reading of this day and leaf taken from the counter that runs today?"""
    if replaced is None:
        return True
    return (on, leaf_index) >= (replaced.found_on, replaced.leaf.index)


def on_an_older_counter(component: Component, leaf_index: int) -> bool:
    """Was what stands at this leaf said in readings of a counter that was replaced since?"""
    replaced = counter_replaced(component)
    return replaced is not None and leaf_index < replaced.leaf.index
