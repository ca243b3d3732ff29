"""What the crew reads says nothing of the calculation's own words, whatever the verdict."""

import json
import re
from typing import Any

import pytest
from django.test import Client

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
