"""Reads ``usage``, ``as_of``, ``history`` and ``previous``: when the part was looked at."""

import datetime
from typing import Any

from assessment.document.case import Look, Missing, Previous, Usage
from assessment.document.crack import MM, SIZING_KEYS
from assessment.document.crack import read_sizing as _read_sizing
from assessment.document.fields import Fields, as_date
from assessment.document.refusal import CaseRefused

HISTORY = 500
VERDICTS = ("continue", "watch", "restrict", "repair", "withdraw", "refer")


def read_usage(value: Any, missing: list[Missing]) -> Usage:
    """The usage section; what the dates need and is not there goes to ``missing``."""
    usage = Fields("usage", {} if value is None else value, _USAGE_KEYS)
    for key, why in _USAGE_NEEDS.items():
        if key not in usage:
            missing.append(Missing(usage.path(key), f"{why} is missing."))
    return Usage(
        unit=usage.text_or_none("unit"),
        per_day=usage.number_or_none("per_day", above=0.0),
        at=usage.number_or_none("at", least=0.0),
        on=usage.date_or_none("on"),
        readings=_readings(usage),
    )


_USAGE_KEYS = ("unit", "per_day", "at", "on", "readings")
_USAGE_NEEDS = {
    "unit": "the unit of the usage counter",
    "per_day": "the least usage per day",
    "at": "the counter at the last look",
    "on": "the date of the last look",
}


def _readings(usage: Fields) -> tuple[tuple[datetime.date, float], ...]:
    if "readings" not in usage:
        return ()
    read: list[tuple[datetime.date, float]] = []
    for where, on, at in usage.pairs("readings", as_date, HISTORY):
        if read and on < read[-1][0]:
            raise CaseRefused(where, f"{on} comes before the reading above it.")
        if at < (read[-1][1] if read else 0.0):
            raise CaseRefused(where, f"the counter runs back to {at:g}.")
        read.append((on, at))
    return tuple(read)


def read_as_of(value: Any, usage: Usage) -> tuple[datetime.date | None, float | None]:
    """Date and counter of this assessment; the last look where not given."""
    if value is None:
        return usage.on, usage.at
    as_of = Fields("as_of", value, ("on", "at"))
    on = as_of.date_or_none("on") or usage.on
    at = as_of.number_or_none("at", least=0.0)
    at = usage.at if at is None else at
    if on is not None and usage.on is not None and on < usage.on:
        raise as_of.refuse("on", f"{on} comes before the last look on {usage.on}.")
    if at is not None and usage.at is not None and at < usage.at:
        raise as_of.refuse("at", f"{at:g} comes before the last look at {usage.at:g}.")
    if on is not None and usage.readings and usage.readings[-1][0] > on:
        why = f"the last reading is dated after the assessment ({on})."
        raise CaseRefused(f"usage.readings[{len(usage.readings) - 1}]", why)
    return on, at


def read_history(value: Any, usage: Usage) -> tuple[Look, ...]:
    """Earlier looks, oldest first, the last look left out."""
    if value is None:
        return ()
    looks: list[Look] = []
    section = Fields("", {"history": value}, ("history",))
    for entry in section.objects("history", _LOOK_KEYS, HISTORY):
        look = _look(entry)
        if looks and look.on < looks[-1].on:
            raise entry.refuse("on", f"{look.on} comes before the look above it.")
        if usage.on is not None and look.on > usage.on:
            raise entry.refuse("on", f"{look.on} comes after the last look on {usage.on}.")
        looks.append(look)
    return tuple(looks)


_LOOK_KEYS = ("on", "at", "depth_mm", "length_mm", "sizing")


def _look(entry: Fields) -> Look:
    sizing = None
    if "sizing" in entry and entry.says_none("sizing") is None:
        sizing = _read_sizing(Fields(entry.path("sizing"), entry.values["sizing"], SIZING_KEYS))
    depth = entry.number_or_none("depth_mm", above=0.0)
    length = entry.number_or_none("length_mm", above=0.0)
    return Look(
        on=entry.date("on"),
        at=entry.number_or_none("at", least=0.0),
        depth=None if depth is None else depth * MM,
        length=None if length is None else length * MM,
        sizing=sizing,
    )


def read_previous(value: Any) -> Previous | None:
    """What is in force, with its date and usage."""
    if value is None:
        return None
    previous = Fields("previous", value, ("verdict", "until", "grew_faster"))
    until = Fields("previous.until", previous.values.get("until") or {}, ("on", "at"))
    return Previous(
        verdict=previous.choice("verdict", VERDICTS) if "verdict" in previous else None,
        until_on=until.date_or_none("on"),
        until_at=until.number_or_none("at", least=0.0),
        grew_faster=previous.flag("grew_faster", False),
    )
