"""What time it is: asked here alone, so that a test or the demo scenario can say otherwise.

The server's clock is one of the three times kept apart (found on, written at, in the book at).
Nothing but `told` changes it, and `told` is refused in service mode.
"""

import datetime
from collections.abc import Iterator
from contextlib import contextmanager
from contextvars import ContextVar
from zoneinfo import ZoneInfo

from django.conf import settings
from django.utils import timezone

_told: ContextVar[datetime.datetime | None] = ContextVar("told", default=None)


def now() -> datetime.datetime:
    """This moment, in UTC."""
    return _told.get() or timezone.now()


def today(time_zone: str) -> datetime.date:
    """Today's date where the site is; ``time_zone`` is its IANA name."""
    return now().astimezone(ZoneInfo(time_zone)).date()


@contextmanager
def told(moment: datetime.datetime) -> Iterator[None]:
    """Within the block it is ``moment`` (aware). For tests and the demo scenario only."""
    if settings.SERVICE:
        raise RuntimeError("In service mode the clock cannot be told the time.")
    token = _told.set(moment)
    try:
        yield
    finally:
        _told.reset(token)
