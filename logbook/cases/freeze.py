"""Rows to the frozen case document: the question, in its one exact text.

Nothing is assumed here. What is missing is left out, so that the computation names it; where not
even a question can be asked (no basis, no size), the sentences say what is missing.
"""

import datetime
from dataclasses import dataclass
from decimal import Decimal
from typing import Any

import assessment
from logbook import clock
from logbook.cases import rows, text
from logbook.entry import NO_LEVEL
from logbook.models import (
    Basis,
    Component,
    Crack,
    DepthBasis,
    Disposition,
    Finding,
    Inspection,
    Location,
    Measurement,
    Repair,
    What,
)

# A crack whose depth nobody knows is taken to go through, in the kind that says so. Not so at a
# pressure boundary, where going through is an end of its own: there the depth is asked for.
THROUGH_OF = {
    "plate-surface": "plate-through-centre",
    "hole-corner-one": "hole-through-one",
    "hole-corner-two": "hole-through-two",
    "lug-corner": "lug-through",
}


@dataclass(frozen=True)
class FrozenCase:
    """text and digest are empty where no case can be made; ``missing`` then says why."""

    basis: Basis | None
    text: str
    digest: str
    missing: tuple[str, ...]


def freeze(location: Location, crack: Crack | None) -> FrozenCase:
    """The case of one crack, or of the place itself (crack None)."""
    basis = rows.adopted_basis(location)
    if basis is None:
        return _none(None, _no_basis(location))
    body = text.read(basis.body)
    look = rows.last_look(location, crack)
    work = rows.newest_work(location) if crack is None else None
    if work is not None and not rows.looked_since(work):
        return _none(
            basis,
            f"{work.get_sort_display().capitalize()} on {_day(work.done_on)}, and no look at this "
            "place is in the book since: log the inspection after it.",
        )
    if look is None:
        return _none(basis, "Nobody has looked here yet.")
    try:
        part = _found(body, crack, look) if crack is not None else _not_found(body, look)
        seen = part.get("seen", _seen_at(look.inspection))
        _same_counter(location.component, seen)
    except _NoCase as why:
        return _none(basis, str(why))
    case = _case(body, part, location, crack, look, seen)
    made = text.exact(case)
    return FrozenCase(basis, made, text.digest(made), ())


class _NoCase(Exception):
    """Why no question can be asked."""


@dataclass(frozen=True)
class _Seen:
    """When the size of the case was last known: date, counter, and the leaf that says so."""

    on: datetime.date
    at: Decimal
    leaf: int


def _seen_at(inspection: Inspection) -> _Seen:
    return _Seen(inspection.found_on, inspection.counter, inspection.leaf.index)


def _same_counter(component: Component, seen: _Seen) -> None:
    """Usage since the look is the difference of two readings of one counter, or nobody knows it."""
    replaced = rows.counter_replaced(component)
    if replaced is not None and not rows.on_this_counter(seen.on, seen.leaf, replaced):
        raise _NoCase(
            f"The counter was found replaced on {_day(replaced.found_on)}, after the last look "
            "here: how much the part was used since is not known. Look again."
        )


def _none(basis: Basis | None, *missing: str) -> FrozenCase:
    return FrozenCase(basis, "", "", missing)


def _no_basis(location: Location) -> str:
    if location.provisional:
        return (
            "This place is provisional: no stress, geometry or material is on record for it. "
            "An engineer has to write its basis."
        )
    if location.bases.exists():
        return "The basis of this place was written, and nobody has adopted it yet."
    return "No basis is on record here: no stress, geometry or material is known."


def _case(
    body: dict[str, Any],
    part: dict[str, Any],
    location: Location,
    crack: Crack | None,
    look: Finding,
    seen: _Seen,
) -> dict[str, Any]:
    component, inspection = location.component, look.inspection
    readings = [r for r in rows.readings(component) if r[0] <= seen.on]
    case: dict[str, Any] = {
        "case": 1,
        "as_of": _as_of(location, seen),
        "crack": part["crack"],
        "body": body.get("body", {}),
        "material": body.get("material", {}),
        "loading": _loading(body, part["crack"]["kind"]),
        "usage": {
            "unit": component.counter_unit,
            "per_day": component.per_day,
            "at": seen.at,
            "on": seen.on,
        },
        "criteria": body.get("criteria", {}),
        "seed": 0,
    }
    # The newest reading of the look itself is said above.
    earlier = [[on, at] for on, at in readings if (on, at) < (seen.on, seen.at)]
    if earlier:
        case["usage"]["readings"] = earlier
    for name in ("owner", "uncertainty"):
        if name in body:
            case[name] = body[name]
    if crack is None:
        detection = body.get("detection", {}).get(inspection.method)
        if detection is not None:
            case["detection"] = _without_source(detection) | {"method": inspection.method}
    if part.get("history"):
        case["history"] = part["history"]
    previous = _previous(location, crack)
    if previous is not None:
        case["previous"] = previous
    shortfalls = _shortfalls(inspection, look) + _welded(location)
    if shortfalls:
        case["look"] = {"shortfalls": shortfalls}
    return case


def _loading(body: dict[str, Any], kind: str) -> dict[str, Any]:
    loading: dict[str, Any] = body.get("loading", {})
    return _through_loading(loading) if kind != body["kind"] else loading


def _as_of(location: Location, seen: _Seen) -> dict[str, Any]:
    """Today and the newest reading: past the date in force, the answer is another."""
    today = clock.today(location.component.site.time_zone)
    newest = rows.readings(location.component)
    at = max([seen.at, *(r[1] for r in newest[-1:])])
    return {"on": max(today, seen.on), "at": at}


def _without_source(section: dict[str, Any]) -> dict[str, Any]:
    return {key: value for key, value in section.items() if key != "source"}


def _found(body: dict[str, Any], crack: Crack, look: Finding) -> dict[str, Any]:
    if look.what == What.KNOWN_NOT_SEEN:
        return {"crack": _not_found(body, look)["crack"] | {"on_record": True}}
    sizes = rows.measurements(crack)
    if not sizes:
        start = rows.new_start(crack)
        if start is None:
            raise _NoCase("No size of this crack counts any more: measure it again.")
        return {
            "crack": _new_start(body, crack, start),
            "seen": _Seen(start.done_on, start.counter, start.leaf.index),
        }
    day = sizes[-1].finding.inspection.found_on
    of_day = [one for one in sizes if one.finding.inspection.found_on == day]
    return {
        "crack": _crack(body, _largest(of_day)) | _neighbours(body, crack),
        "history": _history(body, crack, [one for one in sizes if one not in of_day]),
    }


# These kinds are two cracks already: one beside it is what they say.
PAIRS = ("plate-through-both-edges", "hole-through-two", "hole-corner-two")


def _neighbours(body: dict[str, Any], crack: Crack) -> dict[str, Any]:
    """The other open cracks of the place, as far apart as the basis says at the least. Where it
    says nothing the computation asks for it, and the case is referred."""
    others = rows.beside(crack)
    if not others or (body["kind"] in PAIRS and len(others) == 1):
        return {}
    apart = body.get("separation")
    between = {} if apart is None else {"separation_mm": apart["least_mm"]}
    return {"neighbours": [_neighbour(body, other) | between for other in others]}


def _neighbour(body: dict[str, Any], other: Crack) -> dict[str, Any]:
    sizes = rows.measurements(other)
    made: dict[str, Any] = {"name": f"crack {other.number}"}
    start = rows.new_start(other)
    if sizes:
        part = _crack(body, _largest_of_newest_day(sizes))
    elif start is not None:
        part = _new_start(body, other, start)
    else:
        raise _NoCase(f"No size of crack {other.number}, beside this one, counts any more.")
    return made | {key: part[key] for key in ("depth_mm", "length_mm") if key in part}


def _largest_of_newest_day(sizes: list[Measurement]) -> Measurement:
    day = sizes[-1].finding.inspection.found_on
    return _largest([one for one in sizes if one.finding.inspection.found_on == day])


def _largest(of_day: list[Measurement]) -> Measurement:
    """Of several sizes of one day the larger counts until a person has decided: the largest depth
    with the largest length, and an unknown depth before any that is known."""
    last = of_day[-1]
    if len(of_day) == 1:
        return last
    unknown = [one for one in of_day if one.depth_basis == DepthBasis.NOT_MEASURED]
    at_least = [one for one in of_day if one.depth_basis == DepthBasis.AT_LEAST]
    depths = [one.depth_mm for one in of_day if one.depth_mm is not None]
    lengths = [one.length_mm for one in of_day if one.length_mm is not None]
    basis = last.depth_basis
    if unknown or at_least:
        basis = DepthBasis.NOT_MEASURED if unknown else DepthBasis.AT_LEAST
    return Measurement(
        crack=last.crack,
        finding=last.finding,
        depth_basis=basis,
        depth_mm=None if unknown else max(depths, default=None),
        length_mm=max(lengths, default=None),
        why_smaller=last.why_smaller,
    )


def _new_start(body: dict[str, Any], crack: Crack, start: Repair) -> dict[str, Any]:
    """After a repair the crack goes on with the size that the inspection after could have missed:
    an assumption with its source, never a measured depth."""
    missed = Measurement(
        crack=crack,
        depth_basis=DepthBasis.NOT_MEASURED
        if start.start_depth_mm is None
        else DepthBasis.MEASURED,
        depth_mm=start.start_depth_mm,
        length_mm=start.start_length_mm,
    )
    kind = _kind_of(body, missed)
    missed_words = f"what the inspection after the repair could have missed, {start.start_source}"
    made: dict[str, Any] = {"kind": kind.name, "found": True, "sizing": f"none: {missed_words}"}
    if "depth_mm" in kind.sizes and start.start_depth_mm is not None:
        made |= {
            "depth_mm": start.start_depth_mm,
            "depth_basis": "assumed",
            "depth_source": missed_words,
        }
    elif "depth_mm" in kind.sizes:
        made |= _depth(body, missed)
    if "length_mm" in (*kind.sizes, *kind.optional_sizes) and start.start_length_mm is not None:
        made["length_mm"] = start.start_length_mm
    elif "length_mm" in kind.sizes:
        raise _NoCase("The new start after the repair has no length: measure the crack again.")
    return made


def _crack(body: dict[str, Any], m: Measurement) -> dict[str, Any]:
    kind = _kind_of(body, m)
    made: dict[str, Any] = {"kind": kind.name, "found": True}
    if "depth_mm" in kind.sizes:
        made |= _depth(body, m)
    if "length_mm" in kind.sizes:
        if m.length_mm is None:
            raise _NoCase("The length of the crack was not measured.")
        made["length_mm"] = m.length_mm
    elif "length_mm" in kind.optional_sizes and m.length_mm is not None:
        made["length_mm"] = m.length_mm
    sizing = _sizing_for(body, m.finding.inspection.method, kind)
    if sizing is not None:
        made["sizing"] = sizing
    if m.why_smaller:
        made["why_smaller"] = m.why_smaller
    return made


def _kind_of(body: dict[str, Any], m: Measurement) -> assessment.Kind:
    """The kind of the basis; where nobody knows the depth and nothing is assumed, the through
    crack of that length."""
    kind = assessment.KINDS[body["kind"]]
    unknown = m.depth_basis == DepthBasis.NOT_MEASURED and "depth_mm" in kind.sizes
    if unknown and (body.get("depth_ratio") is None or m.length_mm is None):
        through = THROUGH_OF.get(kind.name)
        if through is None:
            raise _NoCase(
                "The depth was not measured, and the basis gives no ratio of depth to length to "
                "assume."
            )
        return assessment.KINDS[through]
    return kind


def _sizing_for(body: dict[str, Any], method: str, kind: assessment.Kind) -> Any:
    """The sizing error of a method for the sizes that the kind has; None where none is known."""
    sizing = body.get("sizing", {}).get(method)
    if sizing is None or isinstance(sizing, str):
        return sizing
    has = {size.split("_")[0] for size in (*kind.sizes, *kind.optional_sizes)}
    kept = {
        key: value
        for key, value in _without_source(sizing).items()
        if key.split("_")[0] in has or not key.startswith(("depth_", "length_"))
    }
    return kept | {"method": method}


def _through_loading(loading: dict[str, Any]) -> dict[str, Any]:
    """What bends the wall, as membrane stress at its outer-fibre value: a through crack takes
    membrane stress alone, and nowhere along its front acts more than that."""
    made = dict(loading)
    if isinstance(made.get("peak"), dict):
        made["peak"] = _bending_as_membrane(made["peak"])
    if isinstance(made.get("cycles"), list):
        made["cycles"] = [_bending_as_membrane(block) for block in made["cycles"]]
    return made


def _bending_as_membrane(loads: dict[str, Any]) -> dict[str, Any]:
    made = dict(loads)
    for bending in [key for key in made if key.startswith("bending_")]:
        membrane = bending.replace("bending_", "membrane_")
        made[membrane] = made.get(membrane, 0) + abs(made.pop(bending))
    return made


def _depth(body: dict[str, Any], m: Measurement) -> dict[str, Any]:
    if m.depth_basis == DepthBasis.MEASURED:
        return {"depth_mm": m.depth_mm}
    if m.depth_basis == DepthBasis.AT_LEAST:
        return {"depth_mm": m.depth_mm, "depth_basis": "at least"}
    ratio = body["depth_ratio"]
    depth = (Decimal(m.length_mm or 0) * Decimal(ratio["value"])).quantize(Decimal("0.001"))
    return {
        "depth_mm": depth,
        "depth_basis": "assumed",
        "depth_source": f"depth taken as {ratio['value']} of the length: {ratio['source']}",
    }


def _history(body: dict[str, Any], crack: Crack, sizes: list[Measurement]) -> list[dict[str, Any]]:
    replaced = rows.counter_replaced(crack.component)
    made = []
    for m in sizes:
        inspection = m.finding.inspection
        entry: dict[str, Any] = {"on": inspection.found_on}
        if rows.on_this_counter(inspection.found_on, inspection.leaf.index, replaced):
            entry["at"] = inspection.counter
        if m.depth_mm is not None:
            entry["depth_mm"] = m.depth_mm
        if m.length_mm is not None:
            entry["length_mm"] = m.length_mm
        sizing = body.get("sizing", {}).get(inspection.method)
        if isinstance(sizing, dict):
            entry["sizing"] = _without_source(sizing) | {"method": inspection.method}
        elif sizing is not None:
            entry["sizing"] = sizing
        made.append(entry)
    return made


def _not_found(body: dict[str, Any], look: Finding) -> dict[str, Any]:
    could_miss = body.get("could_miss")
    if could_miss is None:
        raise _NoCase(
            "Nothing was found, and the basis does not say what size of crack the look could have "
            "missed."
        )
    made = {"kind": body["kind"], "found": False, "assumed": could_miss}
    kind = assessment.KINDS[body["kind"]]
    sizing = _sizing_for(body, look.inspection.method, kind)
    # Not an error of the assumed size: it serves the stop size of a crack that is found next.
    if sizing is not None:
        made["sizing"] = sizing
    return {"crack": made}


def _previous(location: Location, crack: Crack | None) -> dict[str, Any] | None:
    """What is in force, by signature or deferral."""
    d = (
        Disposition.objects.filter(location=location, crack=crack)
        .select_related("leaf")
        .order_by("-leaf__index")
        .first()
    )
    if d is None:
        return None
    deferral = d.deferrals.order_by("-leaf__index").first()
    until = {
        "on": deferral.new_on if deferral else d.until_on,
        "at": deferral.new_at if deferral and deferral.new_at is not None else d.until_at,
    }
    if rows.on_an_older_counter(location.component, d.leaf.index):
        del until["at"]
    made: dict[str, Any] = {"verdict": d.verdict}
    until = {key: value for key, value in until.items() if value is not None}
    if until:
        made["until"] = until
    return made


def _shortfalls(inspection: Inspection, look: Finding) -> list[str]:
    """What was wrong with the look itself; any leads to refer."""
    said = []
    for what, until in (
        ("the instrument's calibration", inspection.calibration_valid_until),
        ("the inspector's qualification", inspection.qualification_valid_until),
    ):
        if until is not None and until < inspection.found_on:
            said.append(f"{what} expired {_day(until)}")
    if inspection.qualification_level.strip().lower() in NO_LEVEL:
        said.append("the inspector had no qualification for the method")
    if inspection.fell_short:
        said.append(f"not as the procedure asks: {inspection.fell_short}")
    if look.part_not_seen:
        said.append(f"part of the place was not seen: {look.part_not_seen}")
    return said


def _welded(location: Location) -> list[str]:
    """A welded repair brings residual stress back; a basis adopted before it cannot know."""
    basis = rows.adopted_basis(location)
    welded = (
        location.repairs.filter(welded=True, sort=Repair.Sort.REPAIR)
        .select_related("leaf")
        .order_by("-leaf__index")
        .first()
    )
    if basis is None or welded is None or basis.adoption.leaf.index > welded.leaf.index:
        return []
    on = _day(welded.done_on)
    return [f"the welded repair of {on} brought residual stress back; the basis is older"]


def _day(day: datetime.date) -> str:
    return f"{day:%-d %b %Y}"
