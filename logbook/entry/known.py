"""What is known of a component when an entry for it is read: facts, no rows."""

import datetime
from collections.abc import Mapping
from dataclasses import dataclass, field
from decimal import Decimal


@dataclass(frozen=True)
class KnownCrack:
    """The newest size that counts, with the sizing error of its method (None: not known)."""

    number: int
    location: int
    closed: bool = False
    depth_mm: Decimal | None = None
    length_mm: Decimal | None = None
    depth_sd_mm: Decimal | None = None
    length_sd_mm: Decimal | None = None


@dataclass(frozen=True)
class KnownLocation:
    """wall_mm and longest_mm: what a crack here cannot exceed, None where no basis says."""

    number: int
    name: str
    wall_mm: Decimal | None = None
    longest_mm: Decimal | None = None


@dataclass(frozen=True)
class Known:
    component: int
    today: datetime.date
    last_found_on: datetime.date | None = None
    last_counter: Decimal | None = None
    per_day: Decimal | None = None
    locations: Mapping[int, KnownLocation] = field(default_factory=dict)
    cracks: Mapping[int, KnownCrack] = field(default_factory=dict)
