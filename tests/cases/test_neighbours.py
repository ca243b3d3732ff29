"""Two cracks at one place know of each other; both keep their names."""

import json
from decimal import Decimal
from typing import Any

import pytest

from logbook.actions.answer import answer_now
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.cases.freeze import freeze
from logbook.models import Assessment, Crack
from tests.pages.book import Book, basis_body, crack_seen, write_book

pytestmark = pytest.mark.django_db(transaction=True)


@pytest.fixture
def book(transactional_db: None, settings: Any) -> Book:
    settings.VERDICT_WAIT_SECONDS = 60  # every place that is asked for, however slow the machine
    return write_book()


def two_cracks(book: Book) -> tuple[Crack, Crack]:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    book.log("2026-04-02", 1500, crack_seen(book.heel, "2.0", "8"))
    one, other = Crack.objects.filter(location=book.heel).order_by("number")
    return one, other


def newest(crack: Crack) -> Assessment:
    return Assessment.objects.filter(crack=crack).order_by("-leaf__index")[0]


def neighbours(crack: Crack) -> list[dict[str, Any]]:
    return list(json.loads(freeze(crack.location, crack).text)["crack"]["neighbours"])


def test_a_second_crack_is_in_the_case_of_the_first_which_is_assessed_anew(book: Book) -> None:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    (first,) = Crack.objects.filter(location=book.heel)
    alone = newest(first)
    assert "neighbours" not in alone.case_text
    book.log("2026-04-02", 1500, crack_seen(book.heel, "2.0", "8"))
    again = newest(first)
    assert again.pk != alone.pk
    assert neighbours(first) == [{"name": "crack 2", "depth_mm": 2.0, "length_mm": 8}]
    assert again.verdict in ("refer", "withdraw")
    assert "how far crack 2 lies from this crack is missing" in again.reasons


def test_the_least_distance_of_the_basis_decides_whether_they_are_one(book: Book) -> None:
    one, other = two_cracks(book)
    for least, joined in ((Decimal(5), True), (Decimal(12), False)):
        body = basis_body() | {"separation": {"least_mm": least, "source": "sketch 3 (invented)"}}
        made = revise_basis(
            book.people["engineer"], book.heel.pk, body=body, reason="measured the gap"
        )
        adopted = adopt_basis(book.people["second"], made.pk)
        answer_now(adopted.leaf_id)
        for crack, beside in ((one, "crack 2"), (other, "crack 1")):
            combined = json.loads(newest(crack).outcome_text)["combined"]
            side = combined["joined" if joined else "apart"]
            assert [each["name"] for each in side] == [beside]
            if joined:
                assert combined["length_mm"] == pytest.approx(14 + 5 + 8)
                assert combined["depth_mm"] == pytest.approx(3.1)
    # Whatever they were assessed as, both are there and are named as before.
    assert [crack.number for crack in Crack.objects.filter(location=book.heel)] == [1, 2]


def test_a_crack_that_is_closed_no_longer_counts(book: Book) -> None:
    one, other = two_cracks(book)
    Crack.objects.filter(pk=other.pk).update(closed_at="2026-05-01T00:00:00Z")
    assert "neighbours" not in json.loads(freeze(one.location, one).text)["crack"]
