"""Every address, for every role and for nobody, with the real ids of another site.

The table below names every address of the application. A new one without a rule fails.
"""

import io
import uuid
from collections.abc import Iterator
from dataclasses import dataclass
from hashlib import sha256
from typing import Any

import pytest
from django.test import Client
from django.urls import URLPattern, URLResolver, get_resolver, reverse
from PIL import Image

from logbook import clock
from logbook.actions.add_photo import add_photo
from logbook.actions.defer_inspection import ask_deferral
from logbook.actions.record_repair import record_repair
from logbook.actions.review import review
from logbook.actions.shown import shown_digest
from logbook.actions.sign_disposition import sign_disposition
from logbook.actions.tablets import register_tablet
from logbook.actions.tray import keep_in_tray
from logbook.errors import Refusal
from logbook.models import Assessment, Leaf, Material, Membership, Photo, Role
from tests.pages.book import PASSWORD, Book, crack_seen, write_book

pytestmark = pytest.mark.django_db(transaction=True)

ALL = frozenset(Role.values)
ENGINEER, SIGNATORY = frozenset({Role.ENGINEER}), frozenset({Role.SIGNATORY})
LOG = frozenset({Role.CREW, Role.ENGINEER})
ADMIN = frozenset({Role.ADMINISTRATOR})
REGISTER = ENGINEER | ADMIN


@dataclass(frozen=True)
class Rule:
    """Which roles get the page of their own site by GET (200), and which object its id names.

    None in ``sees``: the address has no object of a site; it is listed for completeness.
    """

    sees: frozenset[str] | None
    ids: tuple[str, ...] = ()


# Addresses without an object of a site: what they show is scoped, and tested with the pages.
OPEN = Rule(None)
# Pages that hold nothing of anybody: a tablet keeps them, whoever has it in hand.
PUBLIC = ("tablet", "tablet-worker", "tablet-manifest")
UNSCOPED = (
    "today",
    "sign-in",
    "sign-out",
    "look",
    "me",
    "new-password",
    "index",
    "desk",
    "records",
    "methods",
    "new-site",
    "api-schema",
    "api-docs",
    "api-sites",
    "api-components",
    "api-standings",
    "api-cracks",
    "api-assessments",
    "api-inspections",
    "api-records",
    "tablet-me",
    *PUBLIC,
)
RULES: dict[str, Rule] = dict.fromkeys(UNSCOPED, OPEN) | {
    "record": Rule(ALL, ("record",)),
    "in-force": Rule(ALL, ("component",)),
    "inspect": Rule(LOG, ("component",)),
    "component-trace": Rule(ALL, ("component",)),
    "picture": Rule(REGISTER, ("component",)),
    "add-location": Rule(REGISTER, ("component",)),
    "inspection": Rule(ALL, ("inspection",)),
    "strike-out": Rule(LOG, ("finding",)),
    "location": Rule(ALL, ("location",)),
    "revise-basis": Rule(ENGINEER, ("location",)),
    "record-repair": Rule(LOG, ("location",)),
    "assess-anew": Rule(ENGINEER, ("location",)),
    "mark": Rule(REGISTER, ("location",)),
    "crack": Rule(ALL, ("crack",)),
    "crack-trace": Rule(ALL, ("crack",)),
    "basis": Rule(ALL - {Role.CREW}, ("basis",)),
    "adopt-basis": Rule(frozenset(), ("basis",)),
    "proposal": Rule(ALL, ("assessment",)),
    "measure-next": Rule(ENGINEER, ("assessment",)),
    "sign": Rule(ALL, ("review",)),
    "signed": Rule(ALL, ("disposition",)),
    "confirm": Rule(LOG, ("disposition",)),
    "defer": Rule(ENGINEER, ("disposition",)),
    "deferral": Rule(ALL, ("deferral",)),
    "repair": Rule(ALL, ("repair",)),
    "tray": Rule(ENGINEER, ("tray",)),
    "photo": Rule(ALL, ("photo",)),
    "photo-shown": Rule(ALL, ("photo",)),
    "send-photo": Rule(LOG, ("photo",)),
    "material": Rule(ALL, ("material",)),
    "site": Rule(ALL, ("site",)),
    "policy": Rule(SIGNATORY, ("site",)),
    "new-person": Rule(ADMIN, ("site",)),
    "new-role": Rule(ADMIN, ("site",)),
    "end-role": Rule(frozenset(), ("site", "membership")),
    "new-licence": Rule(ADMIN, ("site",)),
    "revoke": Rule(ADMIN, ("site", "licence")),
    "new-component": Rule(REGISTER, ("site",)),
    "new-material": Rule(ENGINEER, ("site",)),
    "growth-laws": Rule(ALL, ("site",)),
    "api-component": Rule(ALL, ("component",)),
    "api-crack": Rule(ALL, ("crack",)),
    "api-assessment": Rule(ALL, ("assessment",)),
    "api-inspection": Rule(ALL, ("inspection",)),
    "api-strike-out": Rule(frozenset(), ("finding",)),
    "api-photo": Rule(ALL, ("photo",)),
    "api-record-pdf": Rule(ALL, ("record",)),
    "tablets": Rule(ALL, ("site",)),
    "tablet-rules": Rule(ADMIN, ("site",)),
    "tablet-file": Rule(LOG, ("site",)),
    "revoke-tablet": Rule(frozenset(), ("site", "tablet")),
    "labels": Rule(ALL, ("site",)),
    "tablet-register": Rule(frozenset(), ("site",)),
    "tablet-package": Rule(frozenset(), ("site",)),
    "tablet-send": Rule(frozenset(), ("site", "sort")),
    "tablet-answer": Rule(ALL, ("key",)),
    "tablet-photo": Rule(LOG, ("photo",)),
}  # fmt: skip


def addresses(patterns: Any = None) -> Iterator[str]:
    for pattern in patterns if patterns is not None else get_resolver().url_patterns:
        if isinstance(pattern, URLResolver):
            yield from addresses(pattern.url_patterns)
        elif isinstance(pattern, URLPattern):
            yield str(pattern.name)


def test_every_address_has_a_rule() -> None:
    assert set(addresses()) == set(RULES)


@pytest.fixture
def ids(transactional_db: None) -> dict[str, Any]:
    """A book with one of everything, by the words of the rules."""
    book = write_book()
    crew, engineer = book.people["crew"], book.people["engineer"]
    signatory = book.people["signatory"]
    out = io.BytesIO()
    Image.new("RGB", (40, 30), "grey").save(out, "JPEG")
    data = out.getvalue()
    seen = crack_seen(book.heel, "3", "12") | {"photos": [sha256(data).hexdigest()]}
    inspection = book.log(clock.today("UTC").isoformat(), 1000, seen)
    finding = inspection.findings.get()
    photo = Photo.objects.get(finding=finding)
    add_photo(crew, photo.pk, data)
    a = Assessment.objects.get(crack=finding.crack)
    made = review(engineer, a.pk, "accept")
    signed = sign_disposition(
        signatory, made.pk, licence_pk=book.licence.pk, meaning="approved", password=PASSWORD,
        digest=shown_digest(made),
    )  # fmt: skip
    waiting = review(engineer, a.pk, "accept")
    assert signed.until_on is not None
    asked = ask_deferral(
        engineer, signed.pk, grounds="drained later",
        new_on=signed.until_on.replace(year=signed.until_on.year + 1),
    )  # fmt: skip
    repair = record_repair(
        crew, book.heel.pk, finding.crack_id, sort="repair", welded=False, what="ground",
        done_by="shop", work_order="W", done_on=clock.today("UTC"), counter=1000,
        inspection_after="nothing found", closes=True,
    )  # fmt: skip
    tablet = register_tablet(crew, book.site, key=uuid.uuid4(), name="tablet 3")
    item = keep_in_tray(crew, book.gate, "k", {"a": 1}, Refusal("x", "why"))
    return {
        "book": book, "component": book.gate.pk, "location": book.heel.pk, "inspection":
        inspection.pk, "finding": finding.pk, "crack": finding.crack_id, "assessment": a.pk,
        "review": waiting.pk, "disposition": signed.pk, "record": signed.record.number,
        "deferral": asked.pk, "repair": repair.pk, "tray": item.pk, "photo": photo.pk,
        "material": Material.objects.get().pk, "basis": book.heel.bases.get().pk,
        "key": inspection.key, "sort": "entry", "tablet": tablet.pk,
        "site": book.site.slug, "licence": book.licence.pk,
        "membership": Membership.objects.filter(person=crew).get().pk,
    }  # fmt: skip


def client_of(person: Any) -> Client:
    client = Client(raise_request_exception=False)
    client.force_login(person, backend="logbook.accounts.Accounts")
    return client


def address(name: str, ids: dict[str, Any]) -> str:
    return reverse(name, args=[ids[word] for word in RULES[name].ids])


SCOPED = [name for name, rule in RULES.items() if rule.sees is not None]


def strangers(book: Book) -> Iterator[tuple[str, Client]]:
    """One person of each role at the other site, and at this one nothing at all."""
    person = book.people["stranger"]
    Membership.objects.filter(person=person).delete()
    for role in Role.values:
        Membership.objects.filter(person=person).delete()
        Membership.objects.create(person=person, site=book.elsewhere, role=role)
        yield role, client_of(person)


def test_other_sites_find_nothing_and_change_nothing(ids: dict[str, Any]) -> None:
    before = list(Leaf.objects.values_list("kind", flat=True))
    for role, client in strangers(ids["book"]):
        for name in SCOPED:
            where = address(name, ids)
            for answer in (
                client.get(where),
                client.post(where, "{}", content_type="application/json")
                if where.startswith("/api/")
                else client.post(where, {}),
                client.put(where, b"", content_type="application/octet-stream"),
            ):
                said = f"{answer.request['REQUEST_METHOD']} {where} as {role} of another site"
                assert answer.status_code in (404, 405), f"{said}: {answer.status_code}"
    assert list(Leaf.objects.values_list("kind", flat=True)) == before


def test_nobody_is_asked_to_sign_in(ids: dict[str, Any]) -> None:
    before = Leaf.objects.count()
    client = Client(raise_request_exception=False)
    for name, rule in RULES.items():
        if name in ("sign-in", "look", *PUBLIC):
            continue
        where = address(name, ids) if rule.sees is not None else reverse(name)
        for answer in (client.get(where), client.post(where, {})):
            if where.startswith("/api/"):
                assert answer.status_code in (401, 403), (where, answer.status_code)
            elif name != "sign-out":
                assert answer.status_code == 302, (where, answer.status_code)
                assert answer.headers["Location"].startswith("/sign-in/"), where
    assert Leaf.objects.count() == before


def test_each_role_sees_what_its_rule_says(ids: dict[str, Any]) -> None:
    book: Book = ids["book"]
    before = Leaf.objects.count()
    wrong = []
    for role in Role.values:
        client = client_of(book.people[role])
        for name in SCOPED:
            answer = client.get(address(name, ids))
            expected = (200,) if role in (RULES[name].sees or ()) else (302, 403, 404, 405)
            if answer.status_code not in expected:
                wrong.append(f"GET {name} as {role}: {answer.status_code}")
    assert not wrong
    assert Leaf.objects.count() == before, "looking changes nothing"


def test_lists_show_the_own_site_alone(ids: dict[str, Any]) -> None:
    book: Book = ids["book"]
    own, other = client_of(book.people["auditor"]), client_of(book.people["stranger"])
    for name in ("api-components", "api-cracks", "api-assessments", "api-inspections",
                 "api-records", "api-standings"):  # fmt: skip
        assert own.get(reverse(name)).json()["count"] > 0, name
        assert other.get(reverse(name)).json()["count"] == 0, name
    for name in ("today", "index", "desk", "records"):
        assert "G-2" in own.get(reverse(name)).content.decode() or name in ("desk", "records")
        assert "G-2" not in other.get(reverse(name)).content.decode(), name


def test_an_ended_role_and_a_closed_account_see_nothing(ids: dict[str, Any]) -> None:
    book: Book = ids["book"]
    client = client_of(book.people["crew"])
    Membership.objects.filter(person=book.people["crew"]).update(ended_at=clock.now())
    assert client.get(address("crack", ids)).status_code == 404
    auditor = book.people["auditor"]
    client = client_of(auditor)
    auditor.is_active = False
    auditor.save()
    assert client.get(address("crack", ids)).status_code in (302, 404)


@pytest.mark.parametrize("pk", [0, 2**31, 2**63 - 1, 2**64])
def test_ids_that_do_not_exist_are_not_found(ids: dict[str, Any], pk: int) -> None:
    client = client_of(ids["book"].people["engineer"])
    for name in ("crack", "in-force", "api-crack", "inspection"):
        assert client.get(reverse(name, args=[pk])).status_code == 404
