"""Who may see and do what, page by page; strangers find nothing."""

from typing import Any

import pytest
from django.test import Client
from django.urls import reverse

from logbook.models import Assessment, Basis, Finding, Inspection

from .book import PASSWORD, Book, crack_seen
from .test_way import words

pytestmark = pytest.mark.django_db(transaction=True)

READABLE = ["in-force", "component-trace", "location", "crack", "inspection", "proposal"]
WRITABLE: dict[str, set[str]] = {
    "inspect": {"crew", "engineer"},
    "strike-out": {"crew", "engineer"},
    "record-repair": {"crew", "engineer"},
    "assess-anew": {"engineer"},
    "revise-basis": {"engineer"},
    "add-location": {"engineer", "administrator"},
    "picture": {"engineer", "administrator"},
    "basis": {"engineer", "signatory", "auditor", "administrator"},
}


@pytest.fixture
def ids(book: Book) -> dict[str, int]:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    gate, heel = book.gate.pk, book.heel.pk
    return {
        "in-force": gate,
        "component-trace": gate,
        "inspect": gate,
        "add-location": gate,
        "picture": gate,
        "location": heel,
        "assess-anew": heel,
        "revise-basis": heel,
        "record-repair": heel,
        "crack": book.gate.cracks.get().pk,
        "inspection": Inspection.objects.get().pk,
        "strike-out": Finding.objects.get().pk,
        "proposal": Assessment.objects.get().pk,
        "basis": Basis.objects.get().pk,
    }


@pytest.mark.parametrize("name", READABLE)
def test_everyone_of_the_site_reads_and_nobody_else(
    book: Book, as_: Any, ids: dict[str, int], name: str
):
    address = reverse(name, args=[ids[name]])
    for who in ("crew", "engineer", "signatory", "auditor", "administrator"):
        assert as_(who).get(address).status_code == 200, who
    assert as_("stranger").get(address).status_code == 404
    nobody = Client().get(address)
    assert nobody.status_code == 302
    assert nobody["Location"].startswith("/sign-in/")


@pytest.mark.parametrize("name", WRITABLE)
def test_only_the_roles_that_may_get_to_a_form(
    book: Book, as_: Any, ids: dict[str, int], name: str
):
    address = reverse(name, args=[ids[name]])
    for who in ("crew", "engineer", "signatory", "auditor", "administrator"):
        expected = 200 if who in WRITABLE[name] else 403
        assert as_(who).get(address).status_code == expected, who
    assert as_("stranger").get(address).status_code == 404


def test_the_crew_s_pages_speak_the_crew_s_words(book: Book, as_: Any, ids: dict[str, int]):
    crew = as_("crew")
    for name in ("in-force", "location", "crack", "inspection", "inspect"):
        page = words(crew.get(reverse(name, args=[ids[name]])).content).lower()
        for word in ("disposition", "bounding", "basis", "criteria", "outcome"):
            assert word not in page, f"{name}: {word}"


def test_the_desk_is_not_for_the_crew(book: Book, as_: Any):
    assert as_("crew").get("/desk/").status_code == 403
    assert as_("auditor").get("/desk/").status_code == 200


def test_signing_in_and_out(book: Book):
    client = Client()
    wrong = client.post("/sign-in/", {"username": "crew", "password": "no"})
    assert "do not belong together" in words(wrong.content)
    right = client.post("/sign-in/", {"username": "crew", "password": PASSWORD})
    assert right["Location"] == "/"
    assert client.get("/").status_code == 200
    client.post("/sign-out/")
    assert client.get("/").status_code == 302


def test_guessing_is_locked_out(book: Book):
    client = Client()
    for _ in range(6):
        client.post("/sign-in/", {"username": "crew", "password": "no"})
    locked = client.post("/sign-in/", {"username": "crew", "password": PASSWORD})
    assert locked.status_code == 429
    assert client.get("/").status_code == 302


def test_the_look_is_kept_by_a_cookie(book: Book, as_: Any):
    crew = as_("crew")
    answer = crew.post("/look/", {"look": "lamp", "next": "/index/"})
    assert answer["Location"] == "/index/"
    assert b'data-look="lamp"' in crew.get("/index/").content
    crew.post("/look/", {"look": "neon"})
    assert b'data-look="lamp"' in crew.get("/index/").content
    away = crew.post("/look/", {"look": "sun", "next": "https://far.example/"})
    assert away["Location"] == "/"


def test_a_page_that_is_not_there_says_so(book: Book, as_: Any):
    page = as_("crew").get("/component/999999/")
    assert page.status_code == 404
    assert "There is no such component here." in words(page.content)
    assert as_("crew").get("/no/such/page/").status_code == 404


def test_pages_carry_a_strict_policy(book: Book, as_: Any):
    policy = as_("crew").get("/")["Content-Security-Policy"]
    assert "default-src 'none'" in policy
    assert "unsafe-inline" not in policy
