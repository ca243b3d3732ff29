"""Numbers, dates and verdicts in words, one way on every page."""

import datetime
from decimal import ROUND_FLOOR, Decimal
from zoneinfo import ZoneInfo

from django.utils.formats import date_format
from django.utils.translation import gettext as _

from logbook.figures.words import counts

NO_BREAK = "\N{NO-BREAK SPACE}"


def day(on: datetime.date) -> str:
    """14 Sep 2027."""
    return date_format(on, "j M Y").replace(" ", NO_BREAK)


def moment(at: datetime.datetime, time_zone: str) -> str:
    """4 May 2026, 09:55 +02:00: never a time without its offset."""
    there = at.astimezone(ZoneInfo(time_zone))
    offset = there.strftime("%z")
    return f"{day(there.date())}, {there:%H:%M}{NO_BREAK}{offset[:3]}:{offset[3:]}"


def number(value: Decimal | float, decimal_sign: str = ".") -> str:
    """14950 → "14,950"; 8.400 → "8.4"; floats to four figures. A decimal comma moves the
    thousands apart by a space.
    """
    exact = value if isinstance(value, Decimal) else Decimal(f"{value:.4g}")
    text = f"{exact:,f}"
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    if decimal_sign == ",":
        text = text.replace(",", NO_BREAK).replace(".", ",")
    return text.replace("-", "\N{MINUS SIGN}")


def usage(at: Decimal, unit: str, decimal_sign: str) -> str:
    """14,950 hours. A reading that is reckoned falls back to the whole count before it."""
    at = at.to_integral_value(ROUND_FLOOR) if at >= 100 else at
    return f"{number(at, decimal_sign)}{NO_BREAK}{counts(unit)}"


def by(
    on: datetime.date | None, at: Decimal | None, unit: str, decimal_sign: str, *, none: str = ""
) -> str:
    """ "14 Sep 2027 or 14,950 hours", whichever of the two is known."""
    parts = [day(on)] if on else []
    if at is not None:
        parts.append(usage(at, unit, decimal_sign))
    return _(" or ").join(parts) or none
