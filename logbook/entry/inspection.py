"""Text to one frozen draft, checked once. Every complaint goes beside its field.

The same reading serves the page's form, the API and the importer. Questions that a person can
answer ("is that really 84 mm?") are asked back once, and ``confirm_unlikely`` answers them.
"""

from collections.abc import Callable, Mapping, Sequence
from decimal import Decimal
from typing import Any, TypeVar

from logbook.errors import invalid

from . import text
from .asked_back import asked_back, counter_asked_above
from .draft import FindingDraft, InspectionDraft, NewLocation, Sizes
from .known import Known, KnownCrack, KnownLocation

T = TypeVar("T")

WHATS = ("nothing", "could-not-look", "known-not-seen", "crack")
DEPTH_BASES = ("measured", "at-least", "not-measured")
MOST_FINDINGS = 200
MOST_PHOTOS = 20
# No part is a kilometre long, and the book has no room for more digits.
TOO_LARGE_MM = Decimal(1_000_000)
NEW = "new"
CONFIRMED = (True, "on", "true", "yes", "1")
NO_LEVEL = ("none", "no")
# Nothing in service was looked at for this book before: the year has slipped.
EARLIEST_YEAR = 1970


class _Reader:
    """Collects complaints by field while reading."""

    def __init__(self, data: Mapping[str, Any], path: str = "") -> None:
        self.data = data
        self.path = path
        self.complaints: dict[str, list[str]] = {}

    def complain(self, name: str, sentence: str) -> None:
        self.complaints.setdefault(f"{self.path}{name}", []).append(sentence)

    def blank(self, name: str) -> bool:
        value = self.data.get(name)
        return value is None or (isinstance(value, str) and not value.strip())

    def read(self, name: str, how: Callable[[Any], T], missing: str | None) -> T | None:
        """The value, or None with a complaint. ``missing`` None: it may be left out."""
        if self.blank(name):
            if missing is not None:
                self.complain(name, missing)
            return None
        try:
            return how(self.data[name])
        except text.Unreadable as said:
            self.complain(name, str(said))
            return None

    def line(self, name: str, longest: int, missing: str | None) -> str:
        return self.read(name, lambda v: text.line(v, longest=longest), missing) or ""


def read_inspection(data: Mapping[str, Any], known: Known) -> InspectionDraft:
    """Read an entry.

    data : field names to text (form) or JSON values (API); ``findings`` is a list of mappings
    known : the facts about the component

    Raises Refusal ("invalid", 400) with a sentence for every field that does not fit.
    """
    if not isinstance(data, Mapping):
        raise invalid("An entry is an object of named fields.", {})
    r = _Reader(data)
    head = {
        "key": r.read("key", text.key, "The entry has no key; load the page again."),
        "found_on": r.read("found_on", text.date, "Say on which day you looked."),
        "late_why": r.line("late_why", 500, None),
        "written_at": r.read("written_at", text.moment, None),
        "counter": r.read("counter", text.decimal, "Read the counter and write it here."),
        "counter_replaced_why": r.line("counter_replaced_why", 500, None),
        "method": r.line("method", 60, "Say how you looked."),
        "procedure": r.line("procedure", 60, "Say by which procedure."),
        "procedure_revision": r.line("procedure_revision", 24, "Say which revision of it."),
        "instrument": r.line("instrument", 80, 'Say with which instrument, or "none".'),
        "calibration_valid_until": r.read(
            "calibration_valid_until",
            text.date,
            None if _no_instrument(data) else "Say until when its calibration is valid.",
        ),
        "surface": r.line("surface", 120, "Say how the surface was: bare, painted, wet."),
        "coverage": r.line("coverage", 120, "Say how much was covered: all, or which part."),
        "fell_short": r.line("fell_short", 500, None),
        "inspector_name": r.line("inspector_name", 120, "Say who looked."),
        "qualification_level": r.line("qualification_level", 60, "Say which level, or none."),
        "qualification_valid_until": r.read(
            "qualification_valid_until",
            text.date,
            None if _unqualified(data) else "Say until when the qualification is valid.",
        ),
    }
    _check_dates(r, head, known)
    _check_counter(r, head, known)
    _check_jump(r, head, known)
    findings = _findings(r, data.get("findings"), known)
    if r.complaints:
        raise invalid("Some of this does not fit yet. The rest is kept.", r.complaints)
    return InspectionDraft(component=known.component, findings=findings, **head)  # type: ignore[arg-type]


def _no_instrument(data: Mapping[str, Any]) -> bool:
    """The eye needs no calibration; anything with a name does."""
    return str(data.get("instrument", "")).strip().lower() in ("", "none", "eye")


def _unqualified(data: Mapping[str, Any]) -> bool:
    """Someone without a level says so; the look is then one for an engineer."""
    return str(data.get("qualification_level", "")).strip().lower() in NO_LEVEL


def _check_dates(r: _Reader, head: dict[str, Any], known: Known) -> None:
    found_on = head["found_on"]
    if found_on is None:
        return
    if found_on > known.today:
        r.complain("found_on", f"{found_on:%-d %b %Y} is in the future. Check the date.")
    if found_on.year < EARLIEST_YEAR:
        r.complain("found_on", f"The year {found_on.year} cannot be right. Check the date.")
    last = known.last_found_on
    if last is not None and found_on < last and not head["late_why"]:
        r.complain(
            "found_on",
            f"The last look here was on {last:%-d %b %Y}. If this one really was earlier, say in "
            "“why so late” why it is written only now.",
        )


def _check_counter(r: _Reader, head: dict[str, Any], known: Known) -> None:
    counter, found_on = head["counter"], head["found_on"]
    if counter is None or known.last_counter is None or found_on is None:
        return
    older = known.last_found_on is not None and found_on < known.last_found_on
    if counter < known.last_counter and not older and not head["counter_replaced_why"]:
        r.complain(
            "counter",
            f"The counter stood at {known.last_counter.normalize():f} at the last look; it cannot "
            "run back. If it was replaced or reset, say so in “counter replaced”.",
        )


def _check_jump(r: _Reader, head: dict[str, Any], known: Known) -> None:
    """A leap of the counter is asked back once: it would put every place out of use."""
    counter, found_on, last = head["counter"], head["found_on"], known.last_counter
    if counter is None or found_on is None or last is None:
        return
    if known.per_day is None or known.last_found_on is None:
        return
    days = (found_on - known.last_found_on).days
    explained = counter_asked_above(last, known.per_day, days)
    if counter > explained and r.data.get("confirm_counter") not in CONFIRMED:
        r.complain(
            "counter",
            f"The counter stood at {last.normalize():f} at the last look, and now "
            f"{counter.normalize():f}. Check the digits. If it is right, tick “this reading is "
            "right”.",
        )


def _findings(r: _Reader, given: Any, known: Known) -> tuple[FindingDraft, ...]:
    if not isinstance(given, Sequence) or isinstance(given, str) or not given:
        r.complain("findings", "Say for at least one place what you saw there.")
        return ()
    if len(given) > MOST_FINDINGS:
        r.complain("findings", f"One entry holds at most {MOST_FINDINGS} findings.")
        return ()
    read: list[FindingDraft] = []
    for n, item in enumerate(given):
        f = _Reader(item if isinstance(item, Mapping) else {}, f"findings.{n}.")
        draft = _finding(f, known)
        r.complaints.update(f.complaints)
        if draft is not None and not f.complaints:
            read.append(draft)
    _once_each(r, read)
    return tuple(read)


def _once_each(r: _Reader, read: Sequence[FindingDraft]) -> None:
    seen: set[tuple[object, object]] = set()
    for n, f in enumerate(read):
        mark = (f.location, f.crack) if f.crack is not None else (f.location, f.what)
        if f.what == "crack" and f.crack is None:
            continue  # two new cracks at one place are two cracks
        if mark in seen:
            r.complain(f"findings.{n}.location", "This place or crack stands twice in the entry.")
        seen.add(mark)
    places = [f.location for f in read if f.what in ("nothing", "could-not-look")]
    for n, f in enumerate(read):
        if f.what == "crack" and f.location in places and not isinstance(f.location, NewLocation):
            r.complain(
                f"findings.{n}.what", "This place has both a crack and another answer. Keep one."
            )


def _finding(r: _Reader, known: Known) -> FindingDraft | None:
    location = _location(r, known)
    what = str(r.data.get("what", "")).strip()
    if what not in WHATS:
        r.complain("what", "Say what you see here: nothing found, a crack, or could not look.")
        return None
    why_missing = {
        "could-not-look": "Say why you could not look.",
        "known-not-seen": "Say why the crack could not be seen: paint, dirt, the method, other.",
    }.get(what)
    why = r.line("why", 500, why_missing)
    place = known.locations.get(location) if isinstance(location, int) else None
    if what == "nothing":
        _known_here(r, location, known)
    crack, of = _crack(r, what, location, known)
    sizes = _sizes(r, place, of) if what == "crack" else None
    if location is None:
        return None
    return FindingDraft(
        location=location,
        what=what,
        why=why,
        part_not_seen=r.line("part_not_seen", 500, None),
        remarks=r.line("remarks", 2000, None),
        crack=crack,
        sizes=sizes,
        photos=_photos(r),
    )


def _known_here(r: _Reader, location: int | NewLocation | None, known: Known) -> None:
    """A known crack does not end by not being mentioned: it was seen, or it was not."""
    for crack in known.cracks.values():
        if crack.location == location and not crack.closed:
            r.complain(
                "what",
                f"Crack {crack.number} is known here. Say that you saw it, with its size, or "
                "choose “known crack not seen” and say why.",
            )


def _location(r: _Reader, known: Known) -> int | NewLocation | None:
    new = r.data.get("new_location")
    if isinstance(new, Mapping) and (new.get("name") or new.get("described")):
        n = _Reader(new, f"{r.path}new_location.")
        made = NewLocation(
            n.line("name", 120, "Give the place a short name."),
            n.line("described", 500, "Say where on the part it is, so that others find it."),
        )
        if made.name.casefold() in {one.name.casefold() for one in known.locations.values()}:
            n.complain("name", "A place of this name is listed already: answer there.")
        r.complaints.update(n.complaints)
        return made
    given = str(r.data.get("location", "")).strip()
    if not (given.isdecimal() and given.isascii() and len(given) < 19):
        r.complain("location", "Say at which place.")
        return None
    pk = int(given)
    if pk not in known.locations:
        r.complain("location", "This place is not on this component.")
        return None
    return pk


def _crack(
    r: _Reader, what: str, location: int | NewLocation | None, known: Known
) -> tuple[int | None, KnownCrack | None]:
    if what not in ("crack", "known-not-seen"):
        return None, None
    given = str(r.data.get("crack", "")).strip()
    if what == "crack" and given == NEW:
        return None, None
    if not given:
        r.complain("crack", "Say which crack it is: one that is known here, or a new one.")
        return None, None
    found = (
        known.cracks.get(int(given))
        if given.isdecimal() and given.isascii() and len(given) < 9
        else None
    )
    if found is None or found.location != location:
        r.complain(
            "crack", f"There is no crack {text.quoted(given)} at this place. Choose one, or “new”."
        )
        return None, None
    if found.closed:
        r.complain("crack", f"Crack {given} was closed. If one opened here again, it is a new one.")
        return None, None
    return found.number, found


def _sizes(r: _Reader, place: KnownLocation | None, last: KnownCrack | None) -> Sizes | None:
    basis = str(r.data.get("depth_basis", "")).strip()
    if basis not in DEPTH_BASES:
        r.complain("depth_basis", "Say how the depth is known: measured, at least, not measured.")
        return None
    depth = None
    if basis != "not-measured":
        depth = r.read("depth_mm", text.decimal, "Type the depth, or choose “not measured”.")
    elif not r.blank("depth_mm"):
        r.complain("depth_mm", "A depth stands here, and beside it “not measured”. Keep one.")
    length = r.read(
        "length_mm", text.decimal, "Type the length along the surface." if depth is None else None
    )
    for name, value in (("depth_mm", depth), ("length_mm", length)):
        if value is not None and value <= 0:
            r.complain(name, "A crack has a size above 0.")
        elif value is not None and value >= TOO_LARGE_MM:
            r.complain(name, "No crack is a kilometre long. Check the decimal point.")
    why_smaller = r.line("why_smaller", 500, None)
    _check_room(r, place, depth, length)
    if last is not None and not r.complaints:
        confirmed = r.data.get("confirm_unlikely") in CONFIRMED
        _check_history(r, "depth", depth, last.depth_mm, last.depth_sd_mm, why_smaller, confirmed)
        _check_history(
            r, "length", length, last.length_mm, last.length_sd_mm, why_smaller, confirmed
        )
    typed = " × ".join(
        f"{label} {r.data.get(name)} mm"
        for name, label in (("depth_mm", "depth"), ("length_mm", "length"))
        if not r.blank(name)
    )
    return Sizes(basis, depth, length, why_smaller, typed)


def read_correction(
    data: Mapping[str, Any], place: KnownLocation | None, before: KnownCrack | None
) -> Sizes:
    """The right size in place of one that is struck out, read as a new one is.

    before : the crack as it was known at the visit; None where the visit found it

    Raises Refusal ("invalid", 400) with a sentence for every field that does not fit.
    """
    r = _Reader(data)
    sizes = _sizes(r, place, before)
    if r.complaints or sizes is None:
        raise invalid("The right size does not fit yet.", r.complaints)
    return sizes


def _check_room(
    r: _Reader, place: KnownLocation | None, depth: Decimal | None, length: Decimal | None
) -> None:
    if place is None:
        return
    if depth is not None and place.wall_mm is not None and depth > place.wall_mm:
        r.complain(
            "depth_mm",
            f"{depth.normalize():f} mm is deeper than the wall ({place.wall_mm.normalize():f} mm). "
            "Check the decimal point, or ask the engineer to correct the wall. The rest is kept.",
        )
    if length is not None and place.longest_mm is not None and length > place.longest_mm:
        r.complain(
            "length_mm",
            f"{length.normalize():f} mm is longer than the part is wide here "
            f"({place.longest_mm.normalize():f} mm). Check the decimal point, or ask the engineer "
            "to correct the width. The rest is kept.",
        )


def _check_history(
    r: _Reader,
    name: str,
    new: Decimal | None,
    old: Decimal | None,
    sd: Decimal | None,
    why_smaller: str,
    confirmed: bool,
) -> None:
    """A size against the last one: slipped decimals are asked back, shrinking wants a reason."""
    if new is None or old is None:
        return
    field = f"{name}_mm"
    was, said = f"{old.normalize():f} mm", f"{new.normalize():f} mm"
    limits = asked_back(old, sd)
    if (new >= limits.at_least_mm or new <= limits.at_most_mm) and not confirmed:
        r.complain(
            field,
            f"Last time the {name} was {was}, and now {said}. Check the decimal point. If it is "
            "right, tick “this size is right”.",
        )
    if new < limits.shrunk_below_mm and not why_smaller:
        r.complain(
            field,
            f"Last time the {name} was {was}; a crack does not shrink. If {said} is right, say "
            "why it is smaller: other method, other place, ground out.",
        )


def _photos(r: _Reader) -> tuple[str, ...]:
    given = r.data.get("photos") or ()
    if not isinstance(given, Sequence) or isinstance(given, str) or len(given) > MOST_PHOTOS:
        r.complain("photos", f"At most {MOST_PHOTOS} photos, each named by its SHA-256.")
        return ()
    for digest in given:
        if not (
            isinstance(digest, str)
            and len(digest) == 64
            and all(c in "0123456789abcdef" for c in digest)
        ):
            r.complain("photos", "A photo is named by its SHA-256 in 64 small hexadecimal digits.")
            return ()
    return tuple(dict.fromkeys(given))
