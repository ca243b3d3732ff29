"""What the crew reads says nothing of the calculation's own words, whatever the verdict."""

import datetime
import json
import re
from typing import Any

import pytest
from django.test import Client
from django.urls import reverse

from logbook.models import Assessment, Crack
from logbook.templatetags.reasons import plain

from .book import Book, crack_seen

pytestmark = pytest.mark.django_db(transaction=True)

NEVER = re.compile(r"\b(disposition|bounding|basis|criteria|outcome|[a-z]+\.[a-z]+_[a-z]+)\b", re.I)


def text(client: Client, where: str) -> str:
    html = client.get(where).content.decode()
    body = html[html.index("<main") :] if "<main" in html else html
    return re.sub(r"<[^>]+>", " ", body)


@pytest.mark.parametrize(
    "finding",
    [
        {"depth_mm": "3", "length_mm": "12"},
        {"depth_mm": "15", "length_mm": "90"},
        {"depth_mm": "21.9", "length_mm": "300"},
        {"depth_basis": "at-least"},
        {"depth_basis": "not-measured", "depth_mm": ""},
    ],
)
def test_no_page_of_the_crew_says_them(book: Book, as_: Any, finding: dict[str, str]) -> None:
    made = book.log("2026-03-02", 1200, crack_seen(book.heel, "3", "12") | finding)
    crew = as_("crew")
    crack = Crack.objects.get()
    for where in (
        "/",
        f"/component/{book.gate.pk}/",
        f"/inspection/{made.pk}/",
        f"/crack/{crack.pk}/",
        f"/location/{book.heel.pk}/",
    ):
        found = NEVER.findall(text(crew, where))
        assert not found, (where, found, json.loads(Assessment.objects.get().reasons))


def test_plain_words() -> None:
    assert plain("crack.sizing: the sizing error is missing.") == "The sizing error is missing."
    assert plain("The interval is 30 days (bounding life divided by the life factor).") == (
        "The interval is 30 days (its life taken at its worst, cut for safety)."
    )


def test_the_title_of_the_figure_names_the_date_that_binds(book: Book, as_: Any) -> None:
    """A later date that is only proposed is no permission."""
    from logbook.actions.review import review
    from logbook.actions.shown import shown_digest
    from logbook.actions.sign_disposition import sign_disposition
    from logbook.models import Assessment
    from tests.pages.book import PASSWORD

    entry = book.log("2026-11-01", 1200, crack_seen(book.heel, "3.1", "14"))
    crack = entry.findings.get().crack
    made = review(
        book.people["engineer"], Assessment.objects.get().pk, "override", verdict="watch",
        until_on=datetime.date(2027, 2, 3), grounds="look early",
    )  # fmt: skip
    sign_disposition(
        book.people["signatory"], made.pk, licence_pk=book.licence.pk, meaning="approved",
        password=PASSWORD, digest=shown_digest(made),
    )  # fmt: skip
    book.log("2026-11-20", 1210, crack_seen(book.heel, "3.1", "14", str(crack.number)))
    page = as_("crew").get(reverse("crack", args=[crack.pk])).content.decode()
    later = Assessment.objects.order_by("-pk")[0].until_on
    assert later is not None and later > datetime.date(2027, 2, 3)
    assert "3\N{NO-BREAK SPACE}Feb\N{NO-BREAK SPACE}2027" in page
    assert f"{later:%-d %b %Y}" not in page.replace("\N{NO-BREAK SPACE}", " ")
