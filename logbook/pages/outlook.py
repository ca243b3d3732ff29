"""The forecast of an outcome in lines that an engineer reads: when, how likely, and how sure."""

from dataclasses import dataclass
from typing import Any

from django.utils.translation import gettext as _

# The parts of all cracks like this one that have failed by a date, from early to late.
SHOWN = (("0.01", "1 in 100"), ("0.05", "1 in 20"), ("0.5", "half"))


@dataclass(frozen=True)
class Line:
    what: str
    value: str


@dataclass(frozen=True)
class Outlook:
    """lines : what and when; notes : how sure that is; why_not : where there is no forecast"""

    lines: tuple[Line, ...] = ()
    notes: tuple[str, ...] = ()
    why_not: str = ""


def outlook(outcome: dict[str, Any]) -> Outlook | None:
    """None where nothing was asked for."""
    forecast = outcome.get("forecast")
    if not forecast:
        return None
    if forecast.get("usage_quantiles") is None:
        return Outlook(why_not=str(forecast.get("why_not") or ""))
    lines = [_by(forecast, level, part) for level, part in SHOWN]
    lines += [
        Line(_("failed by %(on)s") % {"on": one["on"]}, str(one["words"]))
        for one in forecast.get("failure_by") or ()
        if one.get("on") and one.get("words")
    ]
    return Outlook(tuple(line for line in lines if line is not None), tuple(_notes(forecast)))


def _by(forecast: dict[str, Any], level: str, part: str) -> Line | None:
    usage, on = forecast["usage_quantiles"].get(level), forecast["date_quantiles"].get(level)
    if usage is None:
        return None
    when = f"{usage:,.0f}" if on is None else f"{usage:,.0f} · {on}"
    return Line(_("%(part)s of such cracks have failed after") % {"part": part}, when)


def _notes(forecast: dict[str, Any]) -> list[str]:
    notes = [
        _("%(n)s samples, of which %(effective).0f count after weighing by what was measured.")
        % {"n": forecast["samples"], "effective": forecast["effective_samples"]},
        _("Probabilities below about %(least).2g are not resolved.")
        % {"least": forecast["smallest_probability"]},
    ]
    growth = forecast.get("growth") or {}
    if growth.get("words"):
        notes.append(_sentence(growth["words"]))
    history = forecast.get("history") or {}
    odd = [one for one in history.get("weighed") or () if one.get("outlier")]
    notes += [
        _("The %(which)s of %(on)s lies far from all others; it was counted all the same.")
        % {"which": one["which"], "on": one["on"]}
        for one in odd
    ]
    return notes


def _sentence(words: str) -> str:
    return f"{words[0].upper()}{words[1:]}."
