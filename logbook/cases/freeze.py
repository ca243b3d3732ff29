"""Rows to the frozen case document: the question, in its one exact text.

Nothing is assumed here. What is missing is left out, so that the computation names it; where not
even a question can be asked (no basis, no size), the sentences say what is missing.
"""

import datetime
from dataclasses import dataclass
from decimal import Decimal
from typing import Any

from logbook import clock
from logbook.cases import rows, text
from logbook.models import (
    Basis,
    Crack,
    DepthBasis,
    Disposition,
    Finding,
    Inspection,
    Location,
    Measurement,
    What,
)

# A crack whose depth nobody knows is taken to go through, in the kind that says so.
THROUGH_OF = {"plate-surface": "plate-through-centre"}
NO_DEPTH = frozenset({"plate-through-centre", "plate-through-edge"})
NO_LENGTH = frozenset({"tabulated"})


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
    if look is None:
        return _none(basis, "Nobody has looked here yet.")
    try:
        part = _found(body, crack, look) if crack is not None else _not_found(body)
    except _NoCase as why:
        return _none(basis, str(why))
    case = _case(body, part, location, crack, look)
    made = text.exact(case)
    return FrozenCase(basis, made, text.digest(made), ())


class _NoCase(Exception):
    """Why no question can be asked."""


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
) -> dict[str, Any]:
    component, inspection = location.component, look.inspection
    readings = [r for r in rows.readings(component) if r[0] <= inspection.found_on]
    case: dict[str, Any] = {
        "case": 1,
        "as_of": _as_of(location, inspection),
        "crack": part["crack"],
        "body": body.get("body", {}),
        "material": body.get("material", {}),
        "loading": body.get("loading", {}),
        "usage": {
            "unit": component.counter_unit,
            "per_day": component.per_day,
            "at": inspection.counter,
            "on": inspection.found_on,
        },
        "criteria": body.get("criteria", {}),
        "seed": 0,
    }
    if len(readings) > 1:
        case["usage"]["readings"] = [[on, at] for on, at in readings[:-1]]
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
    shortfalls = _shortfalls(inspection, look)
    if shortfalls:
        case["look"] = {"shortfalls": shortfalls}
    return case


def _as_of(location: Location, inspection: Inspection) -> dict[str, Any]:
    """Today and the newest reading: past the date in force, the answer is another."""
    today = clock.today(location.component.site.time_zone)
    newest = rows.readings(location.component)
    at = max([inspection.counter, *(r[1] for r in newest[-1:])])
    return {"on": max(today, inspection.found_on), "at": at}


def _without_source(section: dict[str, Any]) -> dict[str, Any]:
    return {key: value for key, value in section.items() if key != "source"}


def _found(body: dict[str, Any], crack: Crack, look: Finding) -> dict[str, Any]:
    if look.what == What.KNOWN_NOT_SEEN:
        return {"crack": _not_found(body)["crack"] | {"on_record": True}}
    sizes = rows.measurements(crack)
    if not sizes:
        start = rows.new_start(crack)
        if start is None:
            raise _NoCase("No size of this crack counts any more: measure it again.")
        raise _NoCase(
            "The crack goes on with a new start after its repair, and nobody has looked since."
        )
    last = sizes[-1]
    return {
        "crack": _crack(body, last),
        "history": _history(body, crack, sizes[:-1]),
    }


def _crack(body: dict[str, Any], m: Measurement) -> dict[str, Any]:
    kind = body["kind"]
    made: dict[str, Any] = {"kind": kind, "found": True}
    sizing = body.get("sizing", {}).get(m.finding.inspection.method)
    if sizing is not None:
        made["sizing"] = _sizing(sizing, m.finding.inspection.method)
    if m.why_smaller:
        made["why_smaller"] = m.why_smaller
    made |= _depth(body, kind, m)
    if kind not in NO_LENGTH:
        if m.length_mm is None:
            raise _NoCase("The length of the crack was not measured.")
        made["length_mm"] = m.length_mm
    if kind in NO_DEPTH or made["kind"] in NO_DEPTH:
        made.pop("depth_mm", None)
        made.pop("depth_basis", None)
        made.pop("depth_source", None)
        _drop_depth_sizing(made)
    return made


def _drop_depth_sizing(made: dict[str, Any]) -> None:
    if isinstance(made.get("sizing"), dict):
        made["sizing"] = {
            key: value for key, value in made["sizing"].items() if not key.startswith("depth_")
        }


def _sizing(sizing: Any, method: str) -> Any:
    """The sizing error of a method, or the text that says there is none."""
    if isinstance(sizing, str):
        return sizing
    return _without_source(sizing) | {"method": method}


def _depth(body: dict[str, Any], kind: str, m: Measurement) -> dict[str, Any]:
    if kind in NO_DEPTH:
        return {}
    if m.depth_basis == DepthBasis.MEASURED:
        return {"depth_mm": m.depth_mm}
    if m.depth_basis == DepthBasis.AT_LEAST:
        return {"depth_mm": m.depth_mm, "depth_basis": "at least"}
    ratio = body.get("depth_ratio")
    if ratio is not None and m.length_mm is not None:
        depth = (m.length_mm * Decimal(ratio["value"])).quantize(Decimal("0.001"))
        return {
            "depth_mm": depth,
            "depth_basis": "assumed",
            "depth_source": f"depth taken as {ratio['value']} of the length: {ratio['source']}",
        }
    if kind in THROUGH_OF:
        return {"kind": THROUGH_OF[kind]}
    raise _NoCase(
        "The depth was not measured, and the basis gives no ratio of depth to length to assume."
    )


def _history(body: dict[str, Any], crack: Crack, sizes: list[Measurement]) -> list[dict[str, Any]]:
    since = rows.counter_since(crack.component)
    made = []
    for m in sizes:
        inspection = m.finding.inspection
        entry: dict[str, Any] = {"on": inspection.found_on}
        if since is None or inspection.found_on >= since:
            entry["at"] = inspection.counter
        if m.depth_mm is not None:
            entry["depth_mm"] = m.depth_mm
        if m.length_mm is not None:
            entry["length_mm"] = m.length_mm
        sizing = body.get("sizing", {}).get(inspection.method)
        if sizing is not None:
            entry["sizing"] = _sizing(sizing, inspection.method)
        made.append(entry)
    return made


def _not_found(body: dict[str, Any]) -> dict[str, Any]:
    could_miss = body.get("could_miss")
    if could_miss is None:
        raise _NoCase(
            "Nothing was found, and the basis does not say what size of crack the look could have "
            "missed."
        )
    return {"crack": {"kind": body["kind"], "found": False, "assumed": could_miss}}


def _previous(location: Location, crack: Crack | None) -> dict[str, Any] | None:
    """What is in force, by signature or deferral."""
    d = Disposition.objects.filter(location=location, crack=crack).order_by("-leaf__index").first()
    if d is None:
        return None
    deferral = d.deferrals.order_by("-leaf__index").first()
    until = {
        "on": deferral.new_on if deferral else d.until_on,
        "at": deferral.new_at if deferral and deferral.new_at is not None else d.until_at,
    }
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
    if look.part_not_seen:
        said.append(f"part of the place was not seen: {look.part_not_seen}")
    return said


def _day(day: datetime.date) -> str:
    return f"{day:%-d %b %Y}"
