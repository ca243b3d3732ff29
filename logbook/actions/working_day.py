"""A date falls back to a day on which the site works: earlier, never later."""

import datetime

from logbook.models import Site


def on_or_before(day: datetime.date, site: Site) -> datetime.date:
    """The day itself, or the last working day of the site before it.

    A site that names no working weekday is open every day.
    """
    weekdays = {int(c) for c in site.working_weekdays} or set(range(1, 8))
    closed = {line.strip() for line in site.closed_days.splitlines()}
    for back in range(366):
        candidate = day - datetime.timedelta(days=back)
        if candidate.isoweekday() in weekdays and candidate.isoformat() not in closed:
            return candidate
    raise ValueError(f"{site} has no working day in the year before {day}")
