"""Writing an inspection into the book: the first of two transactions.

The entry, its findings, sizes, new cracks and provisional places, and its leaf are written and
acknowledged together. The assessment that it asks for is only noted here (``AssessmentAsked``):
until it is answered, the part counts as not assessed.

Sent twice, it is written once: the same key with the same content gives the first answer again,
the same key with other content goes to the tray, both kept.
"""

import json
import uuid
from dataclasses import asdict
from hashlib import sha256

from django.db import IntegrityError, transaction

from logbook import access, clock
from logbook.actions import ask, standing
from logbook.actions.tray import keep_in_tray
from logbook.entry import FindingDraft, InspectionDraft, NewLocation
from logbook.errors import Refusal, conflict
from logbook.journal import append, canonical
from logbook.models import (
    Component,
    Crack,
    Finding,
    Inspection,
    Location,
    Measurement,
    Person,
    Photo,
)

KIND = "log-inspection"


def content_of(draft: InspectionDraft) -> dict[str, object]:
    """All that the person said, in exact form; names are kept beside the leaf."""
    said = asdict(draft)
    said.pop("inspector_name")
    return json.loads(canonical.text(said))


def digest_of(draft: InspectionDraft) -> str:
    return sha256(canonical.to_bytes(asdict(draft))).hexdigest()


def log_inspection(by: Person, draft: InspectionDraft) -> Inspection:
    """Write the entry, or give the one that this key already wrote.

    Raises Refusal: not-found and not-permitted; "same-key-other-content" (409) when the key is
    taken by another content, which is kept in the tray.
    """
    component = access.component_for(by, draft.component, "log")
    digest = digest_of(draft)
    for attempt in (1, 2):
        first = Inspection.objects.filter(key=draft.key).select_related("leaf").first()
        if first is not None:
            return _again(first, by, component, draft, digest)
        try:
            return _write(by, component, draft, digest)
        except IntegrityError:
            # The same key, or the same crack number, was written beside us: look again, once.
            if attempt == 2:
                raise
    raise AssertionError("two attempts either return or raise")


def _again(
    first: Inspection, by: Person, component: Component, draft: InspectionDraft, digest: str
) -> Inspection:
    if (
        first.content_digest == digest
        and first.author_id == by.pk
        and first.component_id == component.pk
    ):
        return first
    refusal = conflict(
        "same-key-other-content",
        "This entry was sent before with other content. Both are kept; a person decides which "
        "one counts.",
    )
    keep_in_tray(by, component, str(draft.key), content_of(draft), refusal)
    raise refusal


def _write(by: Person, component: Component, draft: InspectionDraft, digest: str) -> Inspection:
    act = uuid.uuid4()
    with transaction.atomic():
        # Lock order: the component (its crack numbers), then the head of the journal.
        component = (
            Component.objects.select_for_update().select_related("site").get(pk=component.pk)
        )
        inspection = Inspection.objects.create(
            leaf_id=act,
            component=component,
            content_digest=digest,
            in_book_at=clock.now(),
            author=by,
            **{
                name: value
                for name, value in draft.__dict__.items()
                if name not in ("component", "findings")
            },
        )
        numbers, findings = [], []
        for f in draft.findings:
            finding = _write_finding(inspection, act, f, by)
            numbers.append(
                {
                    "finding": finding.pk,
                    "location": finding.location_id,
                    "crack": finding.crack.number if finding.crack else None,
                }
            )
            findings.append(finding)
        append(
            KIND,
            {**content_of(draft), "inspection": inspection.pk, "written": numbers},
            act=act,
            by=by,
            site=component.site,
            names={"inspector": draft.inspector_name},
        )
        for finding in findings:
            ask.for_assessment(finding.location, finding.crack, act)
        if inspection.counter_replaced_why:
            ask.for_all_places(component, act)
        standing.refresh_counter(component)
    return inspection


def _write_finding(inspection: Inspection, act: uuid.UUID, f: FindingDraft, by: Person) -> Finding:
    location = _location(inspection.component, f.location)
    finding = Finding.objects.create(
        leaf_id=act,
        inspection=inspection,
        location=location,
        what=f.what,
        why=f.why,
        part_not_seen=f.part_not_seen,
        remarks=f.remarks,
        crack=_crack(inspection.component, location, f),
    )
    if f.sizes is not None and finding.crack is not None:
        Measurement.objects.create(
            leaf_id=act,
            finding=finding,
            crack=finding.crack,
            depth_basis=f.sizes.depth_basis,
            depth_mm=f.sizes.depth_mm,
            length_mm=f.sizes.length_mm,
            why_smaller=f.sizes.why_smaller,
            typed=f.sizes.typed,
        )
    Photo.objects.bulk_create(
        Photo(site=inspection.component.site, finding=finding, sha256=digest, uploaded_by=by)
        for digest in f.photos
    )
    return finding


def _location(component: Component, said: int | NewLocation) -> Location:
    if not isinstance(said, NewLocation):
        return component.locations.select_related("component__site").get(pk=said)
    last = component.locations.order_by("-number").first()
    return Location.objects.create(
        component=component,
        number=(last.number if last else 0) + 1,
        name=said.name,
        described=said.described,
        provisional=True,
    )


def _crack(component: Component, location: Location, f: FindingDraft) -> Crack | None:
    if f.what not in ("crack", "known-not-seen"):
        return None
    if f.crack is None:
        last = component.cracks.order_by("-number").first()
        return Crack.objects.create(
            component=component, location=location, number=(last.number if last else 0) + 1
        )
    crack = Crack.objects.get(component=component, number=f.crack)
    if crack.closed_at is not None:
        raise Refusal("crack-closed", f"Crack {crack.number} was closed meanwhile.", status=409)
    return crack
