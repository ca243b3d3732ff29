"""Puts the invented scenario into the book by the same actions that people use.

The clock is told the day of each act, so that the book reads as three years of work.
"""

import datetime
import io
import json
import uuid
from collections.abc import Callable
from dataclasses import dataclass, field
from decimal import Decimal
from functools import partial
from hashlib import sha256
from pathlib import Path
from typing import Any

from django.conf import settings

from logbook import clock
from logbook.actions.add_photo import add_photo, declare_photo
from logbook.actions.answer import answer_now
from logbook.actions.confirm_restriction import confirm_restriction
from logbook.actions.grant_role import grant_role
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.actions.propose import propose
from logbook.actions.register_component import (
    add_location,
    mark_picture,
    register_component,
    set_picture,
)
from logbook.actions.register_licence import register_licence
from logbook.actions.register_material import register_material
from logbook.actions.register_person import register_person
from logbook.actions.register_site import register_site
from logbook.actions.review import review
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.actions.set_unsigned_policy import set_unsigned_policy
from logbook.actions.shown import shown_digest
from logbook.actions.sign_disposition import sign_disposition
from logbook.actions.standing import latest_assessment, latest_disposition
from logbook.actions.strike_out import strike_out
from logbook.actions.two_people import eases, standing_before
from logbook.cases.text import exact
from logbook.entry import read_inspection
from logbook.management.scenario.picture import draw
from logbook.models import (
    Assessment,
    AssessmentAsked,
    Component,
    Disposition,
    Finding,
    Licence,
    Location,
    Person,
    Site,
    Verdict,
)

SCENARIO = Path(settings.BASE_DIR) / "fixtures" / "demo" / "scenario.json"
# Keys of entries follow from the scenario, so that loading it twice writes it once.
SPACE = uuid.UUID("6f1a2b0c-6c1e-4b54-9e0e-7a3d0c5f9b11")
SET_UP_DAYS_AGO = 1100


def logins() -> list[str]:
    """A line for each demo login."""
    scenario = _read()
    lines = [f"password of all: {scenario['password']}"]
    for person in scenario["people"]:
        roles = ", ".join(sorted({role for _, role in person["roles"]}))
        lines.append(f"{person['username']:<6} {person['full_name']:<14} {roles}")
    return lines


def _read() -> dict[str, Any]:
    made: dict[str, Any] = json.loads(SCENARIO.read_text(encoding="utf-8"), parse_float=Decimal)
    return made


def load_scenario(say: Callable[[str], Any]) -> None:
    """Load what is not there yet. Stopped half-way and started again, it goes on."""
    scenario = _read()
    if Person.objects.filter(is_demo=True, username="__loaded__").exists():
        return
    if Site.objects.exclude(slug__in=[s["slug"] for s in scenario["sites"]]).exists():
        say("There is a book here already; the demo scenario is not put into it.")
        return
    say("Loading the demo scenario: three years of inspections (half a minute or so).")
    _Loading(scenario, say).all()
    Person.objects.create(
        username="__loaded__", full_name="demo scenario", is_active=False, is_demo=True
    )


@dataclass
class _Loading:
    scenario: dict[str, Any]
    say: Callable[[str], Any]
    now: datetime.datetime = field(default_factory=clock.now)
    people: dict[str, Person] = field(default_factory=dict)
    sites: dict[str, Site] = field(default_factory=dict)

    def at(self, days_ago: int, hour: int = 9) -> datetime.datetime:
        day = self.now - datetime.timedelta(days=days_ago)
        moment = day.replace(hour=hour, minute=(days_ago * 7) % 60, second=0, microsecond=0)
        return min(moment, self.now)

    def all(self) -> None:
        with clock.told(self.at(SET_UP_DAYS_AGO)):
            self._people_and_sites()
            self._materials()
        with clock.told(self.at(SET_UP_DAYS_AGO - 5)):
            for part in self.scenario["components"]:
                self._component(part)
        visits = self.scenario["visits"]
        for done, (moment, act) in enumerate(self._in_order(visits), start=1):
            with clock.told(moment):
                act()
            if done % 20 == 0:
                self.say(f"  {done} acts")

    def _in_order(
        self, visits: list[dict[str, Any]]
    ) -> list[tuple[datetime.datetime, Callable[[], None]]]:
        """Looks and decisions by their time: the book's clock never runs back."""
        acts: list[tuple[datetime.datetime, Callable[[], None]]] = []
        for number, visit in enumerate(visits, start=1):
            acts.append((self.at(visit["days_ago"]), partial(self._visit, number, visit)))
            if visit["decided"]:
                decided = self.at(visit["days_ago"] - 2, 14)
                acts.append((decided, partial(self._decide, visit["component"])))
        return sorted(acts, key=lambda act: act[0])

    def _people_and_sites(self) -> None:
        keeper, made = Person.objects.get_or_create(
            username="keeper",
            defaults={
                "full_name": "Keeper of the installation",
                "is_superuser": True,
                "is_demo": True,
            },
        )
        if made:
            keeper.set_unusable_password()
            keeper.save()
        for site in self.scenario["sites"]:
            self.sites[site["slug"]] = Site.objects.filter(slug=site["slug"]).first() or self._site(
                keeper, site
            )
        for person in self.scenario["people"]:
            self.people[person["username"]] = Person.objects.filter(
                username=person["username"]
            ).first() or self._person(keeper, person)
        for site in self.scenario["sites"]:
            here = self.sites[site["slug"]]
            if site["unsigned_allowed"] is not None and not here.unsigned_policies.exists():
                set_unsigned_policy(
                    self.people["petra"],
                    here,
                    allowed=site["unsigned_allowed"],
                    grounds="Owner's standing order 12: a part with no worse than “watch” stays in "
                    "use until it is signed.",
                    licence_pk=_licence_at(here),
                    password=self.scenario["password"],
                )

    def _site(self, keeper: Person, site: dict[str, Any]) -> Site:
        made = register_site(
            keeper,
            name=site["name"],
            time_zone=site["time_zone"],
            on_call_name=site["on_call_name"],
            on_call_phone=site["on_call_phone"],
            working_weekdays=site["working_weekdays"],
        )
        if made.slug != site["slug"]:
            made.slug = site["slug"]
            made.save(update_fields=["slug"])
        return made

    def _person(self, keeper: Person, person: dict[str, Any]) -> Person:
        first = self.sites[person["roles"][0][0]]
        made = register_person(
            keeper,
            first,
            username=person["username"],
            full_name=person["full_name"],
            password=self.scenario["password"],
            phone=person["phone"],
        )
        Person.objects.filter(pk=made.pk).update(is_demo=True)
        for slug, role in person["roles"]:
            grant_role(keeper, self.sites[slug], made.pk, role)
        if "licence" in person:
            today = clock.now().date()
            for slug in dict.fromkeys(slug for slug, _role in person["roles"]):
                register_licence(
                    keeper,
                    self.sites[slug],
                    made.pk,
                    **person["licence"],
                    valid_from=today.replace(year=today.year - 2, day=1),
                    valid_to=today.replace(year=today.year + 5, day=1),
                )
        return made

    def _materials(self) -> None:
        for m in self.scenario["materials"]:
            site = self.sites[m["site"]]
            if not site.materials.filter(name=m["name"]).exists():
                register_material(
                    self.people["otto"], site, name=m["name"], body=m["body"], source=m["source"]
                )

    def _component(self, part: dict[str, Any]) -> None:
        site = self.sites[part["site"]]
        if Component.objects.filter(site=site, tag=part["tag"]).exists():
            return
        made = register_component(
            self.people["otto"],
            site,
            tag=part["tag"],
            name=part["name"],
            counter_name=part["counter_name"],
            counter_unit=part["counter_unit"],
            per_day=Decimal(part["per_day"]),
            description=part["description"],
            serial=part["serial"],
        )
        self._picture(made, part)
        for place in part["places"]:
            location = add_location(self.people["otto"], made.pk, name=place["name"])
            mark_picture(self.people["otto"], location.pk, *(float(f) for f in place["mark"]))
            if place["basis"] is not None:
                basis = revise_basis(
                    self.people["otto"],
                    location.pk,
                    body=_with_material(made.site, place["basis"]),
                    reason="first basis",
                )
                adopt_basis(self.people["lena"], basis.pk)

    def _picture(self, component: Component, part: dict[str, Any]) -> None:
        data = _jpeg(part["picture"], f"{part['tag']} {part['name']}")
        photo = declare_photo(self.people["otto"], component.site, sha256(data).hexdigest())
        add_photo(self.people["otto"], photo.pk, data)
        photo.refresh_from_db()
        set_picture(self.people["otto"], component.pk, photo)

    def _visit(self, number: int, visit: dict[str, Any]) -> None:
        component = Component.objects.select_related("site").get(tag=visit["component"])
        data = _entry(number, visit, component, clock.now().date())
        if component.inspections.filter(key=data["key"]).exists():
            return
        who = self.people[visit["by"]]
        inspection = log_inspection(who, read_inspection(data, known_of(component)))
        _answer_all(inspection)
        self._strike_out(visit, inspection.findings.all())

    def _strike_out(self, visit: dict[str, Any], findings: Any) -> None:
        wrong = visit.get("strike_out")
        if wrong is None:
            return
        finding: Finding = next(f for f in findings if f.location.number == wrong["place"])
        made = strike_out(
            self.people[visit["by"]],
            finding.pk,
            wrong["reason"],
            {
                "depth_basis": "measured",
                "depth_mm": wrong["depth_mm"],
                "length_mm": finding.measurement.length_mm,
                "confirm_unlikely": True,
            },
        )
        for asked in AssessmentAsked.objects.filter(because_act=made.leaf_id):
            propose(asked.location_id, asked.crack_id)

    def _decide(self, tag: str) -> None:
        for location in Location.objects.filter(component__tag=tag).order_by("number"):
            for crack in (None, *location.cracks.filter(closed_at__isnull=True)):
                a = latest_assessment(location, crack)
                if a is not None and not a.reviews.exists() and not _good_for_long(a):
                    self._sign(a)

    def _sign(self, a: Assessment) -> Disposition | None:
        """Accept and sign, but for what an engineer would not leave at that."""
        if a.verdict == Verdict.REFER:
            return None
        # Leaving what still binds from an earlier look takes stated grounds.
        binding = eases(a.verdict, standing_before(a))
        grounds = "The later look answers what the earlier one had left open." if binding else ""
        made = review(self.people["otto"], a.pk, "accept", grounds=grounds)
        signed = sign_disposition(
            self.people["petra"],
            made.pk,
            licence_pk=_licence_at(a.location.component.site),
            meaning="approved",
            password=self.scenario["password"],
            digest=shown_digest(made),
        )
        if signed.verdict == Verdict.RESTRICT:
            confirm_restriction(self.people["ivo"], signed.pk, "load limiter set; tag 0417 hung")
        return signed


def _licence_at(site: Site) -> int | None:
    """Petra's licence on the books of this site."""
    found = Licence.objects.filter(person__username="petra", site=site).first()
    return None if found is None else found.pk


def _with_material(site: Site, body: dict[str, Any]) -> dict[str, Any]:
    """The basis, naming the registered material whose values it carries."""
    said = exact(body["material"])
    for one in site.materials.order_by("pk"):
        if one.body == said:
            reference = {"id": one.pk, "name": one.name, "revision": one.revision}
            sources = {**body.get("sources", {}), "material": one.source}
            return {**body, "material_ref": reference, "sources": sources}
    raise ValueError(f"no registered material of {site} has the values of this basis")


def _good_for_long(a: Assessment) -> bool:
    """The same verdict is signed and stands for most of a year: nobody signs it again."""
    d = latest_disposition(a.location, a.crack)
    if d is None or d.verdict != a.verdict or d.until_on is None:
        return False
    return d.until_on > clock.now().date() + datetime.timedelta(days=300)


def _answer_all(inspection: Any) -> None:
    answer_now(inspection.leaf_id)
    for asked in AssessmentAsked.objects.filter(because_act=inspection.leaf_id):
        propose(asked.location_id, asked.crack_id)


def _entry(
    number: int, visit: dict[str, Any], component: Component, day: datetime.date
) -> dict[str, Any]:
    places: dict[int, Location] = {place.number: place for place in component.locations.all()}
    data = {
        name: visit[name]
        for name in (
            "method",
            "procedure",
            "procedure_revision",
            "instrument",
            "surface",
            "coverage",
            "inspector_name",
            "qualification_level",
        )
    }
    return {
        **data,
        "key": str(uuid.uuid5(SPACE, f"{visit['component']} {number}")),
        "found_on": day.isoformat(),
        "counter": str(visit["counter"]),
        "calibration_valid_until": (day + datetime.timedelta(days=200)).isoformat(),
        "qualification_valid_until": (day + datetime.timedelta(days=500)).isoformat(),
        "findings": [
            {
                **{name: value for name, value in f.items() if name != "place"},
                "location": places[f["place"]].pk,
                "confirm_unlikely": True,
                "why_smaller": "" if f["what"] != "crack" else f.get("why_smaller", ""),
            }
            for f in visit["findings"]
        ],
    }


def _jpeg(what: str, words: str) -> bytes:
    out = io.BytesIO()
    draw(what, words).save(out, "JPEG", quality=88)
    return out.getvalue()
