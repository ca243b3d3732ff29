"""Reading what people type: decimal comma or point, dates, plain lines."""

import datetime
import re
import uuid
from decimal import Decimal

NUMBER = re.compile(r"^\d{1,9}(?:[.,]\d+)?$")
# 1,000 is one thousand to some and one to others; 0,125 can only be the one.
THOUSANDS = re.compile(r"^[1-9]\d{0,2},\d{3}$")
SPACES = re.compile(r"[\s\u00a0\u2009\u202f]")


class Unreadable(ValueError):
    """The sentence that stands beside the field."""


def quoted(text: object) -> str:
    """What was written, short and printable, to be named in a complaint."""
    return str(text)[:40].encode("utf-8", "replace").decode()


def decimal(text: object, *, places: int = 3) -> Decimal:
    """A number as typed, exact. Comma and point both read; a sign of thousands does not."""
    if isinstance(text, bool) or not isinstance(text, str | int | float | Decimal):
        raise Unreadable("Write a number, such as 8.4.")
    bare = SPACES.sub("", str(text))
    if "." in bare and "," in bare:
        raise Unreadable(
            f'"{quoted(text)}" has both comma and point. Write it without a thousands sign.'
        )
    if THOUSANDS.match(bare):
        raise Unreadable(
            f'"{quoted(text)}" can be read as thousands or as a decimal. Write it without a '
            "thousands sign, or with one digit more or less behind the decimal sign."
        )
    if not NUMBER.match(bare):
        raise Unreadable(
            f'"{quoted(text)}" is not a number. Write it in digits, such as 8.4 or 8,4.'
        )
    value = Decimal(bare.replace(",", "."))
    if -int(value.as_tuple().exponent) > places:
        raise Unreadable(f"Write at most {places} digits behind the decimal sign.")
    return value


def date(text: object) -> datetime.date:
    """An ISO date."""
    if isinstance(text, datetime.date) and not isinstance(text, datetime.datetime):
        return text
    try:
        return datetime.date.fromisoformat(str(text).strip())
    except ValueError:
        raise Unreadable("Write the date as year-month-day, such as 2026-05-04.") from None


def moment(text: object) -> datetime.datetime:
    """A time with its offset, as the tablet's clock gave it."""
    try:
        value = datetime.datetime.fromisoformat(str(text).strip())
    except ValueError:
        raise Unreadable("Write the time as 2026-05-04T09:55:00+02:00.") from None
    if value.tzinfo is None:
        raise Unreadable("The time needs its offset, such as +02:00.")
    if not 1900 <= value.year < 2200:
        raise Unreadable(f"The year {value.year} cannot be right. Check the clock of the tablet.")
    return value


def key(text: object) -> uuid.UUID:
    try:
        return uuid.UUID(str(text))
    except ValueError:
        raise Unreadable(
            "The entry's key must be a UUID made by the device that wrote it."
        ) from None


def line(text: object, *, longest: int) -> str:
    """One or more lines of text, trimmed; control characters but line ends are refused."""
    if not isinstance(text, str):
        raise Unreadable("Write text here.")
    said = text.strip()
    if len(said) > longest:
        raise Unreadable(f"Write at most {longest} characters; there are {len(said)}.")
    if any(ord(c) < 32 and c not in "\n\r\t" or 0xD800 <= ord(c) <= 0xDFFF for c in said):
        raise Unreadable("There are characters here that cannot be printed.")
    return said
