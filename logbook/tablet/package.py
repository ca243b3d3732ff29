"""All that a tablet needs of one site to work with no signal, as one JSON document.

Numbers that are compared or shown travel as text, exact; nothing is left to be reckoned there.
"""

import datetime
from collections import defaultdict
from collections.abc import Iterable
from decimal import Decimal
from typing import Any

from django.db.models import Prefetch
from django.urls import reverse

from logbook import access, clock
from logbook.actions import standing as standings
from logbook.actions.crew_words import sentence, state_words
from logbook.actions.known import known_of
from logbook.actions.stop_sizes import StopSize, stop_size
from logbook.cases.rows import measurements
from logbook.entry import Known, KnownCrack
from logbook.entry.asked_back import asked_back, counter_asked_above
from logbook.figures.marks import mark_svg
from logbook.models import (
    Component,
    Crack,
    Location,
    Membership,
    Person,
    RoundDeclared,
    SentFromTablet,
    Site,
    Standing,
    TabletRules,
    Verdict,
    strictness,
)
from logbook.records.sentences import until

PACKAGE = 1
MOST_ROUNDS = 20


def package(person: Person, site: Site) -> dict[str, Any]:
    """What the person may see of the site. Everything in it is as of ``made_at``."""
    rules = TabletRules.objects.filter(site=site).first()
    today = clock.today(site.time_zone)
    return {
        "package": PACKAGE,
        "made_at": clock.now().isoformat(),
        "made_for": person.pk,
        "keep_days": None if rules is None else rules.keep_days,
        "inches": rules is not None and rules.inches,
        "site": {
            "slug": site.slug,
            "name": site.name,
            "time_zone": site.time_zone,
            "on_call": [{"name": site.on_call_name, "phone": site.on_call_phone}],
        },
        "people": _people(site),
        "rounds": _rounds(site),
        "marks": {verdict: mark_svg(verdict, 32, key="tablet") for verdict in Verdict.values},
        "components": [
            _component(component, site, today, person.decimal_sign)
            for component in _components(site)
        ],
    }


def _components(site: Site) -> Iterable[Component]:
    return (
        Component.objects.filter(site=site)
        .select_related("site", "picture")
        .prefetch_related(
            Prefetch("locations", Location.objects.order_by("number")),
            Prefetch("cracks", Crack.objects.order_by("number")),
        )
        .order_by("tag")
    )


def _people(site: Site) -> list[dict[str, Any]]:
    """Who may write here: a tablet changes hands with no signal."""
    who = Membership.objects.filter(
        site=site, role__in=access.NEEDS["log"], ended_at__isnull=True, person__is_active=True
    ).select_related("person")
    people = {one.person.pk: one.person for one in who}
    return [
        {"id": person.pk, "name": str(person), "decimal_sign": person.decimal_sign}
        for person in sorted(people.values(), key=str)
    ]


def _rounds(site: Site) -> list[dict[str, Any]]:
    """Rounds that were begun and not declared: any tablet of the site may take one up."""
    declared = RoundDeclared.objects.filter(site=site).values("key")
    rows = (
        SentFromTablet.objects.filter(inspection__component__site=site, round__isnull=False)
        .exclude(round__in=declared)
        .select_related("inspection__author")
        .prefetch_related("inspection__findings__crack")
        .order_by("pk")
    )
    rounds: dict[Any, dict[str, Any]] = {}
    for row in rows:
        one = rounds.setdefault(
            row.round,
            {
                "key": str(row.round),
                "by": str(row.inspection.author),
                "begun": _moment(row.inspection.written_at or row.inspection.in_book_at),
                "seen": [],
            },
        )
        one["seen"] += [
            {
                "location": finding.location_id,
                "crack": finding.crack.number if finding.crack else None,
                "what": finding.what,
                "key": str(row.inspection.key),
            }
            for finding in row.inspection.findings.all()
        ]
    return list(rounds.values())[-MOST_ROUNDS:]


def _moment(at: datetime.datetime) -> str:
    return at.isoformat()


def _component(
    component: Component, site: Site, today: datetime.date, decimal_sign: str
) -> dict[str, Any]:
    known = known_of(component)
    rows = Standing.objects.filter(location__component=component).select_related(
        "site", "location", "crack"
    )
    by_place: dict[tuple[int, int | None], Standing] = {
        (row.location_id, row.crack_id): row for row in rows
    }
    cracks: dict[int, list[Crack]] = defaultdict(list)
    for crack in component.cracks.all():
        if crack.closed_at is None:
            cracks[crack.location_id].append(crack)
    picture = component.picture
    return {
        "id": component.pk,
        "tag": component.tag,
        "name": component.name,
        "description": component.description,
        "counter_name": component.counter_name,
        "counter_unit": component.counter_unit,
        "last_counter": _text(known.last_counter),
        "last_found_on": known.last_found_on and known.last_found_on.isoformat(),
        "counter_asked_above": _text(_asked_above(known)),
        "picture": None
        if picture is None or picture.arrived_at is None
        else {
            "url": reverse("photo-shown", args=[picture.pk]),
            "width": picture.width,
            "height": picture.height,
        },
        "standing": _strictest(by_place.values(), component, today, decimal_sign),
        "locations": [
            _location(location, cracks[location.pk], known, by_place, today, decimal_sign)
            for location in component.locations.all()
        ],
    }


def _asked_above(known: Known) -> Decimal | None:
    """As of today: a day later a little more would pass; a tablet asks too often at most."""
    last, per_day, on = known.last_counter, known.per_day, known.last_found_on
    if last is None or per_day is None or on is None:
        return None
    return counter_asked_above(last, per_day, (known.today - on).days)


def _location(
    location: Location,
    cracks: list[Crack],
    known: Known,
    standing: dict[tuple[int, int | None], Standing],
    today: datetime.date,
    decimal_sign: str,
) -> dict[str, Any]:
    place = known.locations[location.pk]
    own = standing.get((location.pk, None))
    return {
        "id": location.pk,
        "number": location.number,
        "name": location.name,
        "described": location.described,
        "provisional": location.provisional,
        "x": location.picture_x,
        "y": location.picture_y,
        "wall_mm": _text(place.wall_mm),
        "longest_mm": _text(place.longest_mm),
        "standing": None if own is None else _standing(own, location, today, decimal_sign),
        "stop_new": _stop(stop_size(location, None, own, today)),
        "cracks": [
            _crack(
                crack,
                known.cracks[crack.number],
                location,
                standing.get((location.pk, crack.pk)),
                today,
                decimal_sign,
            )
            for crack in cracks
        ],
    }


def _crack(
    crack: Crack,
    known: KnownCrack,
    location: Location,
    standing: Standing | None,
    today: datetime.date,
    decimal_sign: str,
) -> dict[str, Any]:
    sizes = measurements(crack)
    last = sizes[-1] if sizes else None
    return {
        "number": crack.number,
        "last": None
        if last is None
        else {
            "on": last.finding.inspection.found_on.isoformat(),
            "depth_mm": _text(last.depth_mm),
            "length_mm": _text(last.length_mm),
            "depth_basis": last.depth_basis,
        },
        "asks": {
            "depth": _asks(known.depth_mm, known.depth_sd_mm),
            "length": _asks(known.length_mm, known.length_sd_mm),
        },
        "standing": None
        if standing is None
        else _standing(standing, location, today, decimal_sign),
        "stop": _stop(stop_size(location, crack, standing, today)),
    }


def _asks(last: Decimal | None, sd: Decimal | None) -> dict[str, str | None] | None:
    if last is None:
        return None
    limits = asked_back(last, sd)
    return {
        "at_most_mm": _text(limits.at_most_mm),
        "at_least_mm": _text(limits.at_least_mm),
        "shrunk_below_mm": _text(limits.shrunk_below_mm),
    }


def _stop(size: StopSize | None) -> dict[str, Any] | None:
    if size is None:
        return None
    return {
        "depth_mm": _text(size.depth_mm),
        "length_mm": _text(size.length_mm),
        "basis_revision": size.basis_revision,
        "good_until_on": size.good_until_on and size.good_until_on.isoformat(),
        "good_until_at": _text(size.good_until_at),
    }


def _strictest(
    rows: Iterable[Standing], component: Component, today: datetime.date, decimal_sign: str
) -> dict[str, Any] | None:
    read = sorted(
        rows,
        key=lambda row: (
            standings.reading(row, today).held,
            strictness(standings.reading(row, today).verdict),
        ),
    )
    if not read:
        return None
    strictest = read[-1]
    because = strictest.location.name
    if strictest.crack is not None:
        because = f"{because} · {strictest.crack}"
    # The first date that comes ends what is said of the part.
    dates = [row.due_on for row in read if row.due_on is not None]
    made = _standing(strictest, strictest.location, today, decimal_sign, component)
    return made | {
        "because": because,
        "due_on": min(dates).isoformat() if dates else None,
    }


def _standing(
    row: Standing,
    location: Location,
    today: datetime.date,
    decimal_sign: str,
    component: Component | None = None,
) -> dict[str, Any]:
    reading = standings.reading(row, today)
    unit = (component or location.component).counter_unit
    by = until(reading.due_on, reading.due_at, unit, decimal_sign)
    return {
        "verdict": reading.verdict,
        "word": str(Verdict(reading.verdict).label),
        "sentence": sentence(reading, by, row.site, by),
        "state": state_words(reading),
        "held": reading.held,
        "signed": reading.signed,
        "due_on": row.due_on and row.due_on.isoformat(),
        "due_at": _text(row.due_at),
    }


def _text(value: Decimal | None) -> str | None:
    """The number as people write it, exact."""
    return None if value is None else f"{value.normalize():f}"
