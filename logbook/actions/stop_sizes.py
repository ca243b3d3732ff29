"""The size at or beyond which a part is stopped, as it goes out to the tablets.

A stop size holds for the basis it was reckoned on, until the date and counter of what binds. None
goes out where it is not sure: nothing reckoned yet, something owed, a newer basis, a part that is
held already, or a time that is up. The tablet then says: treat it as stop.
"""

import datetime
from dataclasses import dataclass
from decimal import ROUND_FLOOR, Decimal

from logbook.actions.standing import latest_assessment, reading
from logbook.cases.rows import adopted_basis
from logbook.models import AssessmentAsked, Crack, Location, Standing

TENTH = Decimal("0.1")


@dataclass(frozen=True)
class StopSize:
    """Sizes in mm, rounded down to a tenth: what is shown is what is compared with."""

    depth_mm: Decimal | None
    length_mm: Decimal | None
    basis_revision: int
    good_until_on: datetime.date | None
    good_until_at: Decimal | None


def stop_size(
    location: Location, crack: Crack | None, standing: Standing | None, today: datetime.date
) -> StopSize | None:
    """crack None: for a new crack at the place. standing: what binds for the same; may be None for
    a new crack beside known ones."""
    if AssessmentAsked.objects.filter(location=location, crack=crack).exists():
        return None
    assessment = latest_assessment(location, crack)
    basis = adopted_basis(location)
    if assessment is None or basis is None or assessment.basis_id != basis.pk:
        return None
    depth, length = _tenth(assessment.stop_depth_mm), _tenth(assessment.stop_length_mm)
    if depth is None and length is None:
        return None
    if standing is not None and reading(standing, today).lapsed:
        return None
    ends = [assessment.until_on, None if standing is None else standing.due_on]
    counts = [assessment.until_at, None if standing is None else standing.due_at]
    on = min((one for one in ends if one is not None), default=None)
    at = min((one for one in counts if one is not None), default=None)
    if (on is None and at is None) or (on is not None and on < today):
        return None
    return StopSize(depth, length, basis.revision, on, at)


def _tenth(value: float | None) -> Decimal | None:
    if value is None:
        return None
    down = Decimal(repr(value)).quantize(TENTH, ROUND_FLOOR)
    return down if down > 0 else TENTH
