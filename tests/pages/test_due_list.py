"""Today's list: its order, its pages, and as many queries for many places as for few."""

from typing import Any

import pytest
from django.db import connection
from django.test.utils import CaptureQueriesContext

from .book import Book, crack_seen

pytestmark = pytest.mark.django_db(transaction=True)


def queries(client: Any, address: str) -> int:
    with CaptureQueriesContext(connection) as caught:
        assert client.get(address).status_code == 200
    return len(caught)


@pytest.mark.parametrize("address", ["/", "/index/", "/desk/"])
def test_the_number_of_queries_does_not_grow(book: Book, as_: Any, address: str):
    engineer = as_("engineer")
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    few = queries(engineer, address)
    new = [crack_seen(book.toe, "1", "4") for _ in range(6)]
    book.log("2026-04-02", 1500, *new)
    assert queries(engineer, address) == few


def test_black_edged_lines_come_first(book: Book, as_: Any):
    book.log(
        "2026-03-02",
        1200,
        crack_seen(book.heel, "3.1", "14"),
        {"location": book.toe.pk, "what": "nothing"},
    )
    html = as_("crew").get("/").content.decode()
    lines = html.split('<li class="line due')[1:]
    assert len(lines) == 2
    edged = ["out-of-use" in line.split(">", 1)[0] for line in lines]
    assert edged == sorted(edged, reverse=True)


def test_an_empty_book_says_what_to_do(book: Book, as_: Any):
    page = as_("crew").get("/").content.decode()
    assert "no place has been looked at yet" in page
