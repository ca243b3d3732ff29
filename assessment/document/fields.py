"""Reads the keys of one object of the document, refusing by full key name.

An object is told the keys it may hold; any other is refused with the nearest known one as a hint,
because a mistyped key would otherwise be a missing value that nobody sees.
"""

import datetime
import difflib
import re
from collections.abc import Callable, Iterable, Iterator
from typing import Any

from assessment.document.reading import is_finite
from assessment.document.refusal import CaseRefused

_DATE = re.compile(r"\d{4}-\d{2}-\d{2}")
_NONE = re.compile(r"none:\s*\S", re.IGNORECASE)

# Far above any size, stress, count or counter of this trade; squares of it are still finite.
LARGEST = 1e15


class Fields:
    """One object of the document at ``where``, with the keys it may hold."""

    def __init__(self, where: str, value: Any, known: Iterable[str]) -> None:
        if not isinstance(value, dict):
            raise CaseRefused(where or "case", f"an object is needed here, not {named(value)}.")
        self.where = where
        self.values: dict[str, Any] = value
        known = tuple(known)
        for key in value:
            if key not in known:
                raise CaseRefused(self.path(key), _unknown(key, known))

    def path(self, key: str) -> str:
        """The full name of a key of this object, e.g. ``crack.depth_mm``."""
        short = key if len(key) <= 60 else key[:57] + "..."
        return f"{self.where}.{short}" if self.where else short

    def __contains__(self, key: str) -> bool:
        return self.values.get(key) is not None

    def refuse(self, key: str, why: str) -> CaseRefused:
        """The refusal of one key, to be raised."""
        return CaseRefused(self.path(key), why)

    def raw(self, key: str) -> Any:
        """The value as read; refused where it is missing."""
        if key not in self:
            raise self.refuse(key, "this is needed and missing.")
        return self.values[key]

    def number(
        self,
        key: str,
        *,
        above: float | None = None,
        least: float | None = None,
        below: float | None = None,
        most: float | None = None,
    ) -> float:
        """A finite number inside the bounds given."""
        value = as_number(self.raw(key), self.path(key))
        for fails, words in (
            (above is not None and value <= above, f"above {above}"),
            (least is not None and value < least, f"at least {least}"),
            (below is not None and value >= below, f"below {below}"),
            (most is not None and value > most, f"at most {most}"),
        ):
            if fails:
                raise self.refuse(key, f"{value:g} cannot be: it must be {words}.")
        return value

    def number_or_none(self, key: str, **bounds: float | None) -> float | None:
        """As ``number``; None where the key is missing."""
        return self.number(key, **bounds) if key in self else None

    def text(self, key: str) -> str:
        """Text that is not blank."""
        value = self.raw(key)
        if not isinstance(value, str) or not value.strip():
            raise self.refuse(key, f"text is needed here, not {named(value)}.")
        return value.strip()

    def text_or_none(self, key: str) -> str | None:
        """As ``text``; None where the key is missing."""
        return self.text(key) if key in self else None

    def choice(self, key: str, among: Iterable[str]) -> str:
        """One of the given words."""
        value = self.text(key)
        among = tuple(among)
        if value not in among:
            raise self.refuse(key, f"{value[:60]!r} is not known here.{_hint(value, among)}")
        return value

    def flag(self, key: str, otherwise: bool) -> bool:
        """True or false; ``otherwise`` where the key is missing."""
        if key not in self:
            return otherwise
        value = self.values[key]
        if not isinstance(value, bool):
            raise self.refuse(key, f"true or false is needed here, not {named(value)}.")
        return value

    def date(self, key: str) -> datetime.date:
        """A date written 2026-05-04."""
        return as_date(self.raw(key), self.path(key))

    def date_or_none(self, key: str) -> datetime.date | None:
        """As ``date``; None where the key is missing."""
        return self.date(key) if key in self else None

    def items(self, key: str, most: int) -> list[Any]:
        """A list of at most ``most`` entries."""
        value = self.raw(key)
        if not isinstance(value, list):
            raise self.refuse(key, f"a list is needed here, not {named(value)}.")
        if len(value) > most:
            raise self.refuse(key, f"{len(value)} entries are over the limit of {most}.")
        return value

    def objects(self, key: str, known: Iterable[str], most: int) -> Iterator["Fields"]:
        """The entries of a list of objects."""
        known = tuple(known)
        for index, value in enumerate(self.items(key, most)):
            yield Fields(f"{self.path(key)}[{index}]", value, known)

    def pairs(
        self, key: str, first: Callable[[Any, str], Any], most: int
    ) -> Iterator[tuple[str, Any, float]]:
        """The entries of a list of pairs: the entry's key, its first value, its number."""
        for index, value in enumerate(self.items(key, most)):
            where = f"{self.path(key)}[{index}]"
            if not isinstance(value, list) or len(value) != 2:
                raise CaseRefused(where, "a pair of two values is needed here.")
            yield where, first(value[0], where), as_number(value[1], where)

    def says_none(self, key: str) -> str | None:
        """The text of ``"none: why"``; None where the key is no text. Other text is refused."""
        value = self.values.get(key)
        if not isinstance(value, str):
            return None
        if not _NONE.match(value.strip()):
            raise self.refuse(key, 'text here must read "none: " and say why there is none.')
        return value.strip()


def as_number(value: Any, where: str) -> float:
    """A finite number; true and false are none."""
    if isinstance(value, bool) or not isinstance(value, int | float):
        raise CaseRefused(where, f"a number is needed here, not {named(value)}.")
    if not is_finite(value):
        raise CaseRefused(where, "this number is not finite.")
    if abs(value) > LARGEST:
        why = f"{value:.4g} is larger than any quantity here: check the decimal point and the unit."
        raise CaseRefused(where, why)
    return float(value)


def as_date(value: Any, where: str) -> datetime.date:
    """A date written 2026-05-04."""
    if isinstance(value, str) and _DATE.fullmatch(value):
        try:
            return datetime.date.fromisoformat(value)
        except ValueError:
            raise CaseRefused(where, f"{value} is not a day of the calendar.") from None
    raise CaseRefused(where, f"a date written 2026-05-04 is needed here, not {named(value)}.")


def named(value: Any) -> str:
    """What a JSON value is, in words."""
    if value is None:
        return "null"
    if isinstance(value, bool):
        return "true or false"
    if isinstance(value, str):
        return f"the text {value[:40]!r}" if value.strip() else "empty text"
    if isinstance(value, list):
        return "a list"
    return "an object" if isinstance(value, dict) else f"the number {value:g}"


def _unknown(key: str, known: tuple[str, ...]) -> str:
    return f"this key is not known here.{_hint(key, known)}"


def _hint(word: str, known: tuple[str, ...]) -> str:
    near = difflib.get_close_matches(word[:60], known, n=1, cutoff=0.6)
    if near:
        return f" Did you mean {near[0]!r}?"
    return f" Known are: {', '.join(known)}."
