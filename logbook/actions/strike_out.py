"""Striking out: the finding stays readable with its reason, and counts no more."""

import uuid
from collections.abc import Mapping
from typing import Any

from django.db import IntegrityError, transaction

from logbook import access, clock
from logbook.actions import ask, standing
from logbook.actions.known import known_of
from logbook.entry import Sizes, read_correction
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import Component, Finding, Inspection, Measurement, Person, StrikeOut, What

KIND = "strike-out"


def strike_out(
    by: Person, finding_pk: Any, reason: str, right: Mapping[str, Any] | None = None
) -> StrikeOut:
    """Strike a finding out, and where the right sizes are given write them in its place.

    The new finding names the old one; both stand in the book. ``right`` is read as a size of an
    entry is (logbook/entry): against the wall, and against the size before it. With the last
    finding of a visit its counter reading goes too.
    """
    finding = access.finding_for(by, finding_pk, "log")
    if not reason.strip():
        raise invalid("Say why it is struck out.", {"reason": ["Say why it is struck out."]})
    sizes = None if right is None else _read(finding, right)
    act = uuid.uuid4()
    component = finding.inspection.component
    try:
        with transaction.atomic():
            Component.objects.select_for_update().get(pk=component.pk)
            new = None if sizes is None else _write(finding, act, sizes)
            made = StrikeOut.objects.create(
                leaf_id=act,
                finding=finding,
                reason=reason.strip(),
                replaced_by=new,
                by=by,
                at=clock.now(),
            )
            append(
                KIND,
                {
                    "strike_out": made.pk,
                    "finding": finding.pk,
                    "reason": reason.strip(),
                    "replaced_by": new.pk if new else None,
                    "right": None if sizes is None else dict(sizes.__dict__),
                },
                act=act,
                by=by,
                site=component.site,
                because_of=[finding.leaf_id],
            )
            _ask_again(finding, act)
            _take_back_reading(finding.inspection, act)
    except IntegrityError:
        raise conflict("struck", "This was struck out already.") from None
    return made


def _read(finding: Finding, right: Mapping[str, Any]) -> Sizes:
    crack = finding.crack
    if hasattr(finding, "strike_out"):
        raise conflict("struck", "This was struck out already.")
    if crack is None or finding.what != What.CRACK:
        raise invalid("Only a size can be corrected.", {"depth_basis": ["Leave the sizes empty."]})
    before = known_of(finding.inspection.component, before=finding.inspection)
    return read_correction(
        right, before.locations.get(finding.location_id), before.cracks.get(crack.number)
    )


def _write(wrong: Finding, act: uuid.UUID, sizes: Sizes) -> Finding:
    assert wrong.crack is not None, "sizes were read for a crack"
    made = Finding.objects.create(
        leaf_id=act,
        inspection=wrong.inspection,
        location=wrong.location,
        what=What.CRACK,
        part_not_seen=wrong.part_not_seen,
        remarks=wrong.remarks,
        crack=wrong.crack,
    )
    Measurement.objects.create(leaf_id=act, finding=made, crack=wrong.crack, **sizes.__dict__)
    return made


def _ask_again(finding: Finding, act: uuid.UUID) -> None:
    """A crack without any finding left stands as it is in the book, and is referred."""
    ask.for_assessment(finding.location, finding.crack, act)
    standing.refresh(finding.location, finding.crack)


def _take_back_reading(inspection: Inspection, act: uuid.UUID) -> None:
    """Nothing of the visit stands any more: its counter reading counts no more either, and if it
    had found the counter replaced, every place is assessed anew."""
    if inspection.findings.filter(strike_out__isnull=True).exists():
        return
    if inspection.counter_replaced_why:
        ask.for_all_places(inspection.component, act)
    standing.refresh_counter(inspection.component)
