"""An entry as read and checked: frozen, values as typed, nothing further in parses text."""

import datetime
import uuid
from dataclasses import dataclass
from decimal import Decimal


@dataclass(frozen=True)
class NewLocation:
    """A place that nobody listed: provisional until an engineer takes it on."""

    name: str
    described: str


@dataclass(frozen=True)
class Sizes:
    """depth_mm is None where depth_basis is "not-measured"; typed keeps what was written."""

    depth_basis: str
    depth_mm: Decimal | None
    length_mm: Decimal | None
    why_smaller: str
    typed: str


@dataclass(frozen=True)
class FindingDraft:
    """What was seen at one place. location is the place's id, or a new one.

    crack is the number on the part, or None for a new crack (or where no crack is meant).
    photos are SHA-256 digests that the sender declares.
    """

    location: int | NewLocation
    what: str
    why: str
    part_not_seen: str
    remarks: str
    crack: int | None
    sizes: Sizes | None
    photos: tuple[str, ...]


@dataclass(frozen=True)
class InspectionDraft:
    key: uuid.UUID
    component: int
    found_on: datetime.date
    late_why: str
    written_at: datetime.datetime | None
    counter: Decimal
    counter_replaced_why: str
    method: str
    procedure: str
    procedure_revision: str
    instrument: str
    calibration_valid_until: datetime.date | None
    surface: str
    coverage: str
    fell_short: str
    inspector_name: str
    qualification_level: str
    qualification_valid_until: datetime.date | None
    findings: tuple[FindingDraft, ...]
