"""A standing as a line that people read: which part, what mark, which sentence, until when."""

import datetime
from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal

from django.utils.translation import gettext as _

from logbook import clock
from logbook.actions import standing as standings
from logbook.actions.crew_words import sentence, state_words, verdict_sentence
from logbook.models import (
    Component,
    Crack,
    Finding,
    Location,
    Site,
    Standing,
    Verdict,
    What,
    strictness,
)

from . import writing

# What a line needs, in one query.
RELATED = (
    "site",
    "location__component",
    "crack",
    "assessment",
    "disposition__signatory",
    "disposition__licence",
    "disposition__assessment",
    "last_finding__measurement",
    "last_finding__inspection",
)


@dataclass(frozen=True)
class Line:
    """One place or crack as it stands today."""

    standing: Standing
    reading: standings.Reading
    sentence: str
    state: str
    until: str

    @property
    def site(self) -> Site:
        return self.standing.site

    @property
    def location(self) -> Location:
        return self.standing.location

    @property
    def component(self) -> Component:
        return self.standing.location.component

    @property
    def crack(self) -> Crack | None:
        return self.standing.crack

    @property
    def finding(self) -> Finding | None:
        return self.standing.last_finding

    @property
    def word(self) -> str:
        return str(Verdict(self.reading.verdict).label)

    @property
    def verdict(self) -> str:
        return self.reading.verdict

    @property
    def edged(self) -> bool:
        """Out of use: the black-edged leaf."""
        return self.reading.held

    @property
    def past_counter(self) -> bool:
        """Overdue by usage: the date is then not what to plan by."""
        counter, due = self.standing.counter, self.reading.due_at
        return due is not None and counter is not None and counter >= due

    @property
    def hand(self) -> str:
        """Whose hand the line's rule shows: signed or in the book."""
        return "signed" if self.reading.signed and not self.reading.lapsed else ""


def line(standing: Standing, decimal_sign: str) -> Line:
    today = clock.today(standing.site.time_zone)
    reading = standings.reading(standing, today)
    unit = standing.location.component.counter_unit
    until = writing.by(reading.due_on, reading.due_at, unit, decimal_sign)
    return Line(
        standing=standing,
        reading=reading,
        sentence=sentence(reading, until, standing.site, _past(standing, today, decimal_sign)),
        state=state_words(reading),
        until=until,
    )


def _past(standing: Standing, today: datetime.date, decimal_sign: str) -> str:
    """Of date and counter only what has passed."""
    due_on, due_at, counter = standing.due_on, standing.due_at, standing.counter
    if due_on is not None and not due_on < today:
        due_on = None
    if due_at is not None and (counter is None or counter < due_at):
        due_at = None
    unit = standing.location.component.counter_unit
    return writing.by(due_on, due_at, unit, decimal_sign)


def lines(rows: Iterable[Standing], decimal_sign: str) -> list[Line]:
    return [line(row, decimal_sign) for row in rows]


def strictest_first(rows: Iterable[Line]) -> list[Line]:
    return sorted(rows, key=lambda one: (-one.edged, -strictness(one.verdict)))


def proposed_sentence(
    verdict: str,
    until_on: datetime.date | None,
    until_at: Decimal | None,
    limit: str,
    component: Component,
    decimal_sign: str,
) -> str:
    """The sentence of a verdict that is proposed or signed, whatever binds now."""
    until = writing.by(until_on, until_at, component.counter_unit, decimal_sign)
    site = component.site
    return verdict_sentence(verdict, until, limit, site.on_call_name, site.on_call_phone)


def finding_words(finding: Finding | None, decimal_sign: str) -> str:
    """What was seen, in a few words."""
    if finding is None:
        return _("never looked at")
    if finding.what == What.CRACK and hasattr(finding, "measurement"):
        return size_words(finding.measurement, decimal_sign)
    return str(What(finding.what).label)


def size_words(measurement: object, decimal_sign: str) -> str:
    """ "8.4 mm deep, 31 mm long"; an unmeasured size is said to be so."""
    depth, length = measurement.depth_mm, measurement.length_mm  # type: ignore[attr-defined]
    basis = measurement.depth_basis  # type: ignore[attr-defined]
    space = writing.NO_BREAK
    if depth is None:
        deep = _("depth not measured")
    else:
        said = f"{writing.number(depth, decimal_sign)}{space}mm"
        deep = (_("at least %(size)s deep") if basis == "at-least" else _("%(size)s deep")) % {
            "size": said
        }
    if length is None:
        return deep
    long = _("%(size)s long") % {"size": f"{writing.number(length, decimal_sign)}{space}mm"}
    return f"{long}, {deep}" if depth is None else f"{deep}, {long}"
