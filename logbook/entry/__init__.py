"""Text and units become one frozen draft, checked once."""

from .draft import FindingDraft, InspectionDraft, NewLocation, Sizes
from .inspection import NO_LEVEL, read_correction, read_inspection
from .known import Known, KnownCrack, KnownLocation

__all__ = [
    "NO_LEVEL",
    "FindingDraft",
    "InspectionDraft",
    "Known",
    "KnownCrack",
    "KnownLocation",
    "NewLocation",
    "Sizes",
    "read_correction",
    "read_inspection",
]
