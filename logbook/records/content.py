"""All that stands in a record, as plain values: no row, no clock, nothing still to be looked up.

Texts are printed as given, escaped. ``said`` marks a person's words and ``reckoned`` the program's:
they are set in two faces, so that an auditor sees whose they are.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

from logbook.figures.drawing import Figure, Table


@dataclass(frozen=True)
class Picture:
    """A re-encoded JPEG. mark : fractions of width and height where the place is, or None."""

    jpeg: bytes
    width: int
    height: int
    mark: tuple[float, float] | None = None


@dataclass(frozen=True)
class Part:
    """Which part: as on its label and in the book."""

    site: str
    tag: str
    name: str
    place: str
    crack: str = ""
    serial: str = ""
    description: str = ""
    picture: Picture | None = None

    @property
    def path(self) -> str:
        """Site · component · place · crack."""
        whole = (self.site, f"{self.tag} {self.name}", self.place, self.crack)
        return " · ".join(part for part in whole if part)


@dataclass(frozen=True)
class Signature:
    """at : with its offset; meaning : what the hand stood for; entry : its number in the book."""

    name: str
    licence: str
    meaning: str
    at: str
    entry: int


@dataclass(frozen=True)
class Line:
    """One line of a list: label, value, whose words, and where from."""

    label: str
    value: str
    said: bool = False
    source: str = ""


@dataclass(frozen=True)
class Sighting:
    """What was seen at one inspection. struck : the reason, where the line no longer counts."""

    found_on: str
    counter: str
    what: str
    depth: str
    length: str
    method: str
    by: str
    remarks: str = ""
    struck: str = ""
    entry: int = 0


@dataclass(frozen=True)
class PhotoShown:
    """jpeg is None where the photo has not arrived or is listed only."""

    caption: str
    sha256: str
    entry: int
    jpeg: bytes | None = None


@dataclass(frozen=True)
class Step:
    """One step of the working."""

    step: str
    formula: str
    numbers: str
    value: str
    unit: str
    source: str


@dataclass(frozen=True)
class Attachment:
    """name : file name in the PDF; text : its exact text; digest : SHA-256 of it, in hex."""

    name: str
    text: str
    digest: str
    what: str


@dataclass(frozen=True)
class RecordContent:
    """number : of the record; verdict : its word; sentence : for the crew; held : out of use
    decided : how the decision came about; notices : what the first page must not leave out
    """

    number: int
    verdict: str
    sentence: str
    limit: str
    until: str
    held: bool
    part: Part
    signature: Signature
    caution: str
    signed_at: datetime
    journal_size: int
    journal_root: str
    engine: str
    heading: str = "Record"
    notices: Sequence[str] = ()
    decided: Sequence[Line] = ()
    reasons: Sequence[str] = ()
    sightings: Sequence[Sighting] = ()
    look: Sequence[Line] = ()
    photos: Sequence[PhotoShown] = ()
    figures: Sequence[Figure] = ()
    not_reckoned: str = ""
    rules: Table | None = None
    inputs: Sequence[Line] = ()
    steps: Sequence[Step] = ()
    cautions: Sequence[str] = ()
    attachments: Sequence[Attachment] = ()
    language: str = "en"
