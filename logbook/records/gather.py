"""From the book's rows to what a record says. Reads only; every lookup of a record is here."""

import json
from collections.abc import Iterable, Mapping
from pathlib import Path
from typing import Any

from django.conf import settings
from django.db.models import Q

from logbook.figures.drawing import Table
from logbook.figures.from_outcome import rule_marks
from logbook.figures.of_assessment import figures_of
from logbook.figures.words import day
from logbook.models import (
    Assessment,
    Crack,
    Deferral,
    Disposition,
    Finding,
    Head,
    Inspection,
    Licence,
    Location,
    Photo,
    Record,
    RestrictionConfirmed,
    Site,
)

from .case_lines import case_lines
from .content import (
    Attachment,
    Line,
    Part,
    PhotoShown,
    Picture,
    RecordContent,
    Sighting,
    Signature,
    Step,
)
from .sentences import CAUTION, count, held, moment, sentence, until

PHOTOS_SHOWN = 4
SHORT_SOURCE = 48
SIGHTINGS_SHOWN = 24


def gather(record: Record) -> RecordContent:
    """The content of a record, with the journal as it stands now, the signature included."""
    if record.deferral is not None:
        return gather_deferral(record, record.deferral)
    if record.disposition is None:
        raise ValueError(f"record {record.number} stands for nothing")
    return gather_disposition(record, record.disposition)


def gather_disposition(record: Record, disposition: Disposition) -> RecordContent:
    return _content(
        record,
        disposition,
        by=until(
            disposition.until_on, disposition.until_at, _unit(disposition), _sign(disposition)
        ),
        signature=_signature(
            disposition.signatory,
            disposition.licence,
            disposition.get_meaning_display(),
            moment(disposition.signed_at, record.site.time_zone),
            disposition.entry_number,
        ),
        signed_at=disposition.signed_at,
        up_to=disposition.leaf.index,
    )


def gather_deferral(record: Record, deferral: Deferral) -> RecordContent:
    """An inspection put off: the decision stays, its date moves, two people answer for it."""
    disposition, zone = deferral.disposition, record.site.time_zone
    # Where no new counter was given the old one binds on.
    new_at = disposition.until_at if deferral.new_at is None else deferral.new_at
    by = until(deferral.new_on, new_at, _unit(disposition), _sign(disposition))
    before = until(
        disposition.until_on, disposition.until_at, _unit(disposition), _sign(disposition)
    )
    asked = deferral.request
    extra = (
        Line("put off", f"from {before} to {by}", source=f"entry {deferral.entry_number}"),
        Line(
            "asked by",
            f"{asked.by}, {moment(asked.at, zone)}: {asked.grounds}",
            said=True,
            source=f"entry {asked.entry_number}",
        ),
        Line("approved by", f"{deferral.by}, {moment(deferral.at, zone)}", said=True),
    )
    return _content(
        record,
        disposition,
        by=by,
        signature=_signature(
            deferral.by,
            deferral.licence,
            "deferral approved",
            moment(deferral.at, zone),
            deferral.entry_number,
        ),
        signed_at=deferral.at,
        up_to=deferral.leaf.index,
        heading="Record of a deferral",
        extra=extra,
        notices=(f"The next look was put off from {before} to {by}.",),
    )


def _content(
    record: Record,
    disposition: Disposition,
    *,
    by: str,
    signature: Signature,
    signed_at: Any,
    up_to: int,
    heading: str = "Record",
    extra: tuple[Line, ...] = (),
    notices: tuple[str, ...] = (),
) -> RecordContent:
    site, assessment = record.site, disposition.assessment
    out = held(disposition.verdict, disposition.until_on, disposition.until_at)
    size, root = _journal()
    outcome = _document(assessment.outcome_text)
    case = _document(assessment.case_text)
    findings = _findings(disposition, up_to)
    figures = (
        figures_of(
            disposition.crack,
            assessment,
            disposition=disposition,
            decimal_sign=_sign(disposition),
            up_to=up_to,
        )
        if disposition.crack is not None
        else ()
    )
    return RecordContent(
        number=record.number,
        verdict=disposition.verdict,
        sentence=sentence(
            disposition.verdict, by=by, limit=disposition.limit, on_call=_on_call(site)
        ),
        limit=disposition.limit,
        until="until another decision is signed" if out else by or "no date set",
        held=out,
        part=_part(site, disposition.location, disposition.crack),
        signature=signature,
        caution=CAUTION,
        signed_at=signed_at,
        journal_size=size,
        journal_root=root,
        engine=assessment.engine,
        heading=heading,
        notices=(*notices, *_notices(disposition)),
        decided=(*extra, *_decided(disposition, site)),
        reasons=tuple(json.loads(assessment.reasons)),
        sightings=tuple(_sighting(one, site, _sign(disposition)) for one in findings),
        look=_look_lines(findings),
        photos=_photos(findings),
        figures=figures,
        not_reckoned=""
        if outcome
        else "Nothing could be reckoned; the reasons say what is missing.",
        rules=_rules(case, outcome, _unit(disposition)),
        inputs=case_lines(case, _sources(assessment)),
        steps=working_steps(outcome.get("working", ())),
        cautions=tuple(outcome.get("cautions", ())),
        attachments=_attachments(assessment),
    )


# --- parts -------------------------------------------------------------------------------------


def _part(site: Site, location: Location, crack: Crack | None) -> Part:
    component = location.component
    return Part(
        site=site.name,
        tag=component.tag,
        name=component.name,
        place=f"{location.number} {location.name}",
        crack="" if crack is None else str(crack),
        serial=component.serial,
        description=component.description,
        picture=_picture(location),
    )


def _picture(location: Location) -> Picture | None:
    photo = location.component.picture
    jpeg = None if photo is None else shown_copy(photo)
    if photo is None or jpeg is None or not photo.width or not photo.height:
        return None
    mark = None
    if location.picture_x is not None and location.picture_y is not None:
        mark = (location.picture_x, location.picture_y)
    return Picture(jpeg, photo.width, photo.height, mark)


def shown_copy(photo: Photo) -> bytes | None:
    """The re-encoded copy; None where the photo has not arrived."""
    if photo.arrived_at is None:
        return None
    path = Path(settings.DATA_DIR) / "shown" / photo.sha256[:2] / f"{photo.sha256}.jpg"
    return path.read_bytes() if path.is_file() else None


def _signature(person: Any, licence: Licence, meaning: str, at: str, entry: int) -> Signature:
    words = f"{licence.body} {licence.number}, {licence.discipline}"
    return Signature(str(person), words, meaning, at, entry)


def _on_call(site: Site) -> str:
    return f"{site.on_call_name}, {site.on_call_phone}"


def _unit(disposition: Disposition) -> str:
    return disposition.location.component.counter_unit


def _sign(disposition: Disposition) -> str:
    """A record is written the way its signatory writes numbers."""
    return disposition.signatory.decimal_sign


def _journal() -> tuple[int, str]:
    head = Head.objects.get(pk=1)
    return head.size, bytes(head.root).hex()


def _document(text: str | None) -> dict[str, Any]:
    return {} if text is None else json.loads(text)


def _sources(assessment: Assessment) -> Mapping[str, str]:
    if assessment.basis is None:
        return {}
    sources = json.loads(assessment.basis.body).get("sources", {})
    return {str(path): str(text) for path, text in sources.items()}


def _notices(disposition: Disposition) -> tuple[str, ...]:
    if disposition.verdict != "restrict":
        return ()
    confirmed = RestrictionConfirmed.objects.filter(disposition=disposition).first()
    if confirmed is None:
        return ("In force once somebody has confirmed that the limiter is set or the tag hangs.",)
    return (f"Confirmed by {confirmed.by}: {confirmed.how}",)


def _decided(disposition: Disposition, site: Site) -> tuple[Line, ...]:
    assessment, review = disposition.assessment, disposition.review
    zone, unit, sign = site.time_zone, _unit(disposition), _sign(disposition)
    by = until(assessment.until_on, assessment.until_at, unit, sign)
    proposed = f"{assessment.get_verdict_display()}{f', by {by}' if by else ''}"
    lines = [
        Line(
            "proposed",
            f"{proposed}; {moment(assessment.in_book_at, zone)}",
            source=f"entry {assessment.entry_number}",
        )
    ]
    if assessment.governed_by:
        lines.append(Line("date governed by", assessment.governed_by))
    if assessment.basis is not None:
        basis = assessment.basis
        lines.append(
            Line(
                "reckoned on",
                f"basis revision {basis.revision}",
                source=f"entry {basis.entry_number}",
            )
        )
    word = f"{review.get_decision_display()} by {review.by}, {moment(review.at, zone)}"
    grounds = f": {review.grounds}" if review.grounds else ""
    lines.append(Line("review", word + grounds, said=True, source=f"entry {review.entry_number}"))
    if disposition.supersedes is not None:
        before = disposition.supersedes
        lines.append(
            Line(
                "takes the place of",
                f"{before.get_verdict_display()}, signed {moment(before.signed_at, zone)}",
                source=f"entry {before.entry_number}",
            )
        )
    return tuple(lines)


# --- what was seen -----------------------------------------------------------------------------


def _findings(disposition: Disposition, up_to: int) -> list[Finding]:
    """The latest findings of the crack, or of the place, oldest first, struck ones too."""
    which = Q(location=disposition.location)
    if disposition.crack is not None:
        which = Q(crack=disposition.crack)
    rows = (
        Finding.objects.filter(which, leaf__index__lte=up_to)
        .select_related("inspection", "measurement", "strike_out", "leaf", "crack")
        .order_by("-inspection__found_on", "-pk")[:SIGHTINGS_SHOWN]
    )
    return list(reversed(rows))


def _sighting(finding: Finding, site: Site, decimal_sign: str) -> Sighting:
    inspection = finding.inspection
    measurement = getattr(finding, "measurement", None)
    struck = getattr(finding, "strike_out", None)
    unit = inspection.component.counter_unit
    depth = length = ""
    if measurement is not None:
        depth = _size(measurement.depth_mm, measurement.get_depth_basis_display(), decimal_sign)
        length = _size(measurement.length_mm, "not measured", decimal_sign)
    why = "; ".join(part for part in (finding.why, finding.remarks) if part)
    return Sighting(
        found_on=day(inspection.found_on),
        counter=count(inspection.counter, unit, decimal_sign),
        what=str(finding.crack or finding.get_what_display()),
        depth=depth,
        length=length,
        method=inspection.method,
        by=inspection.inspector_name,
        remarks=why,
        struck="" if struck is None else struck.reason,
        entry=finding.entry_number,
    )


def _size(value: Any, words: str, decimal_sign: str) -> str:
    """The size as it was written, to its last digit; "at least" is said."""
    if value is None:
        return words
    text = f"{value.normalize():f}".replace(".", decimal_sign)
    lead = "at least " if words == "at least" else ""
    return f"{lead}{text}\N{NO-BREAK SPACE}mm"


def _look_lines(findings: list[Finding]) -> tuple[Line, ...]:
    """How the last look was done."""
    if not findings:
        return ()
    inspection: Inspection = findings[-1].inspection

    def valid(on: Any) -> str:
        return "" if on is None else f", valid until {day(on)}"

    procedure = f"{inspection.procedure} revision {inspection.procedure_revision}"
    lines = (
        ("last look", f"{day(inspection.found_on)}, {inspection.method}"),
        ("procedure", procedure),
        ("instrument", inspection.instrument + valid(inspection.calibration_valid_until)),
        (
            "inspector",
            f"{inspection.inspector_name}, {inspection.qualification_level}"
            + valid(inspection.qualification_valid_until),
        ),
        ("surface", inspection.surface),
        ("coverage", inspection.coverage),
        ("not as the procedure asks", inspection.fell_short or "nothing said"),
    )
    entry = f"entry {inspection.entry_number}"
    return tuple(
        Line(label, value, said=True, source=entry if n == 0 else "")
        for n, (label, value) in enumerate(lines)
    )


def _photos(findings: list[Finding]) -> tuple[PhotoShown, ...]:
    """Of the latest findings first; the first few are shown, all are listed."""
    entries = {finding.pk: finding.entry_number for finding in findings}
    rows = list(Photo.objects.filter(finding__in=entries).order_by("-finding_id", "pk"))
    return tuple(
        PhotoShown(
            caption=photo.caption,
            sha256=photo.sha256,
            entry=entries[photo.finding_id] if photo.finding_id else 0,
            jpeg=shown_copy(photo) if n < PHOTOS_SHOWN else None,
        )
        for n, photo in enumerate(rows)
    )


# --- what was reckoned -------------------------------------------------------------------------


def _rules(case: Mapping[str, Any], outcome: Mapping[str, Any], unit: str) -> Table | None:
    marks = rule_marks(case, outcome)
    if not marks:
        return None
    rows = tuple(
        (
            f"{mark.rule} {mark.name}{' (governs)' if mark.governs else ''}",
            "" if mark.on is None else day(mark.on),
            "" if mark.usage is None else f"{mark.usage:,.0f}",
            mark.why_not,
        )
        for mark in marks
    )
    return Table(("rule", "date", f"counter, {unit}", "why not"), rows)


def working_steps(working: Iterable[Mapping[str, Any]]) -> tuple[Step, ...]:
    """The working as it is printed. A long source is printed once and then named by its number."""
    numbers: dict[str, int] = {}
    return tuple(_step(one, numbers) for one in working)


def _step(one: Mapping[str, Any], numbers: dict[str, int]) -> Step:
    return Step(
        step=str(one.get("step", "")),
        formula=str(one.get("formula") or ""),
        numbers=str(one.get("with") or ""),
        value=_value(one.get("value")),
        unit=str(one.get("unit") or ""),
        source=_source(str(one.get("source") or ""), numbers),
    )


def _source(source: str, numbers: dict[str, int]) -> str:
    if len(source) <= SHORT_SOURCE:
        return source
    if source in numbers:
        return f"source {numbers[source]}, above"
    numbers[source] = len(numbers) + 1
    return f"{numbers[source]}: {source}"


def _value(value: Any) -> str:
    """Four figures; counts from ten thousand on in full, never with an exponent."""
    if isinstance(value, float):
        large = 1e4 <= abs(value) < 1e12
        return f"{value:,.1f}".removesuffix(".0") if large else f"{value:.4g}"
    return "" if value is None else str(value)


def _attachments(assessment: Assessment) -> tuple[Attachment, ...]:
    both = (
        ("case.json", assessment.case_text, assessment.case_digest, "the case as it was assessed"),
        ("outcome.json", assessment.outcome_text, assessment.outcome_digest, "its outcome"),
    )
    return tuple(Attachment(name, text, digest, what) for name, text, digest, what in both if text)
