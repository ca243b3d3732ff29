"""What a verdict says to the crew, in one sentence, and when what binds ends."""

from datetime import date, datetime
from decimal import Decimal
from zoneinfo import ZoneInfo

from logbook.figures.words import counts, day, number

CAUTION = (
    "This program proposes; a licensed person decides and signs. The owner’s codes, the local rules"
    " and licensed practice come first."
)
OUT_OF_USE = frozenset({"refer", "withdraw"})


def held(verdict: str, until_on: date | None, until_at: Decimal | None) -> bool:
    """Out of use: withdraw and refer always, repair where it is not given until a date or count."""
    return verdict in OUT_OF_USE or (verdict == "repair" and until_on is None and until_at is None)


def until(
    until_on: date | None, until_at: Decimal | None, unit: str, decimal_sign: str = "."
) -> str:
    """ "14 Sep 2027 or 14,950 hours"; empty where neither is given."""
    parts = [] if until_on is None else [day(until_on)]
    if until_at is not None:
        parts.append(count(until_at, unit, decimal_sign))
    return " or ".join(parts)


def count(value: Decimal, unit: str, decimal_sign: str = ".") -> str:
    """14,950 hours; 12.5 hours: all the digits that were signed."""
    exact = value.normalize()
    exponent = exact.as_tuple().exponent
    decimals = -exponent if isinstance(exponent, int) and exponent < 0 else 0
    return f"{number(float(value), decimals, decimal_sign)}\N{NO-BREAK SPACE}{counts(unit)}"


def sentence(verdict: str, *, by: str, limit: str, on_call: str) -> str:
    """by : from ``until``; limit : the restriction; on_call : name and number. Raises KeyError."""
    again = f"Look again by {by}." if by else "No date for the next look is set."
    return {
        "continue": f"May stay in use. {f'Next look by {by}.' if by else again}",
        "watch": f"May stay in use. {f'Look again early: by {by}.' if by else again}",
        "restrict": f"{_restricted(limit)} {again}",
        "repair": f"Repair before {by}." if by else "Not back into use until repaired.",
        "refer": f"Not to be used until an engineer has decided. Asked: {on_call}.",
        "withdraw": f"Take it out of use now. Hang the tag. Call {on_call}.",
    }[verdict]


def _restricted(limit: str) -> str:
    """A few words ("12 t", "up to 12 t") join the sentence; a whole sentence stands by itself."""
    if not limit or limit.endswith("."):
        return "May be used only within the limit given here."
    return f"May be used only up to {limit.removeprefix('up to ')}."


def moment(at: datetime, time_zone: str) -> str:
    """5 May 2026, 16:20 +02:00."""
    there = at.astimezone(ZoneInfo(time_zone))
    offset = there.strftime("%z")
    return f"{day(there.date())}, {there:%H:%M} {offset[:3]}:{offset[3:]}"
