"""Striking out: the finding stays readable with its reason, and counts no more."""

import uuid
from typing import Any

from django.db import IntegrityError, transaction

from logbook import access, clock
from logbook.actions import ask, standing
from logbook.entry.inspection import TOO_LARGE_MM
from logbook.errors import conflict, invalid
from logbook.journal import append
from logbook.models import Component, DepthBasis, Finding, Measurement, Person, StrikeOut, What

KIND = "strike-out"


def strike_out(
    by: Person,
    finding_pk: Any,
    reason: str,
    *,
    depth_basis: str | None = None,
    depth_mm: Any = None,
    length_mm: Any = None,
    typed: str = "",
) -> StrikeOut:
    """Strike a finding out, and where new sizes are given write the right ones in its place.

    The new finding names the old one; both stand in the book. depth_mm and length_mm are Decimals
    already read (logbook.entry.text).
    """
    finding = access.finding_for(by, finding_pk, "log")
    if not reason.strip():
        raise invalid("Say why it is struck out.", {"reason": ["Say why it is struck out."]})
    new = depth_basis is not None
    if new and finding.what != What.CRACK:
        raise invalid("Only a size can be corrected.", {"depth_basis": ["Leave the sizes empty."]})
    if new:
        _check_sizes(str(depth_basis), depth_mm, length_mm)
    act = uuid.uuid4()
    component = finding.inspection.component
    try:
        with transaction.atomic():
            Component.objects.select_for_update().get(pk=component.pk)
            right = (
                _right(finding, act, depth_basis, depth_mm, length_mm, typed)
                if depth_basis is not None
                else None
            )
            made = StrikeOut.objects.create(
                leaf_id=act,
                finding=finding,
                reason=reason.strip(),
                replaced_by=right,
                by=by,
                at=clock.now(),
            )
            append(
                KIND,
                {
                    "strike_out": made.pk,
                    "finding": finding.pk,
                    "reason": reason.strip(),
                    "replaced_by": right.pk if right else None,
                    "depth_basis": depth_basis,
                    "depth_mm": depth_mm,
                    "length_mm": length_mm,
                    "typed": typed,
                },
                act=act,
                by=by,
                site=component.site,
                because_of=[finding.leaf_id],
            )
            _ask_again(finding, act)
    except IntegrityError:
        raise conflict("struck", "This was struck out already.") from None
    return made


def _check_sizes(depth_basis: str, depth_mm: Any, length_mm: Any) -> None:
    wrong: dict[str, list[str]] = {}
    if depth_basis not in DepthBasis.values:
        wrong["depth_basis"] = ["Say how the depth is known."]
    if (depth_basis == DepthBasis.NOT_MEASURED) != (depth_mm is None):
        wrong["depth_mm"] = ["Type the depth, or say that it was not measured."]
    if depth_mm is None and length_mm is None:
        wrong["length_mm"] = ["Type the length along the surface."]
    for name, value in (("depth_mm", depth_mm), ("length_mm", length_mm)):
        if value is not None and value <= 0:
            wrong[name] = ["A crack has a size above 0."]
        elif value is not None and value >= TOO_LARGE_MM:
            wrong[name] = ["No crack is a kilometre long. Check the decimal point."]
    if wrong:
        raise invalid("The right size is not complete yet.", wrong)


def _right(
    wrong: Finding, act: uuid.UUID, depth_basis: str, depth: Any, length: Any, typed: str
) -> Finding:
    crack = wrong.crack
    if crack is None:
        raise invalid("Only a size can be corrected.", {"depth_basis": ["Leave them empty."]})
    made = Finding.objects.create(
        leaf_id=act,
        inspection=wrong.inspection,
        location=wrong.location,
        what=What.CRACK,
        remarks=wrong.remarks,
        crack=wrong.crack,
    )
    Measurement.objects.create(
        leaf_id=act,
        finding=made,
        crack=crack,
        depth_basis=depth_basis,
        depth_mm=depth,
        length_mm=length,
        why_smaller="corrects a size that was struck out",
        typed=typed or f"depth {depth} mm × length {length} mm",
    )
    return made


def _ask_again(finding: Finding, act: uuid.UUID) -> None:
    """A crack without any finding left stands as it is in the book, and is referred."""
    ask.for_assessment(finding.location, finding.crack, act)
    standing.refresh(finding.location, finding.crack)
