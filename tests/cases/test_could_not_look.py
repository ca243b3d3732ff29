"""Where nobody could look nothing new is known: no date moves, and no verdict is eased."""

import datetime
from decimal import Decimal
from typing import Any

import pytest

from logbook import clock
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.models import Assessment
from tests.pages.book import FIGURES, Book, basis_body, write_book

CURVE = {
    "dimension": "depth",
    "curve": "log-odds",
    "mu_ln_mm": Decimal("-0.9"),
    "sigma": Decimal("0.3"),
    "a90_95_mm": Decimal("0.8"),
    "source": FIGURES,
}


@pytest.fixture
def book(transactional_db: None) -> Book:
    """A place whose method can find what its basis assumes."""
    made = write_book()
    body = basis_body() | {"detection": {"ultrasound": CURVE}}
    basis = revise_basis(made.people["engineer"], made.heel.pk, body=body, reason="detection")
    adopt_basis(made.people["second"], basis.pk)
    return made


def told(book: Book, days_ago: int, counter: int, **finding: Any) -> Assessment:
    day = clock.today(book.site.time_zone) - datetime.timedelta(days=days_ago)
    book.log(day.isoformat(), counter, {"location": book.heel.pk} | finding)
    return Assessment.objects.filter(location=book.heel).order_by("-leaf__index")[0]


def could_not_look(book: Book) -> Assessment:
    return told(book, 1, 9000, what="could-not-look", why="scaffold in the way")


def test_the_date_of_the_last_real_look_stays(book: Book) -> None:
    looked = told(book, 100, 1000, what="nothing")
    assert looked.verdict == "continue" and looked.until_on is not None
    after = could_not_look(book)
    assert after.pk != looked.pk
    assert (after.verdict, after.until_on) == (looked.verdict, looked.until_on)


def test_past_its_date_the_place_stays_referred(book: Book) -> None:
    assert told(book, 500, 1000, what="nothing").verdict == "refer"
    after = could_not_look(book)
    assert after.verdict == "refer" and "already due" in after.reasons


def test_a_place_never_seen_is_referred(book: Book) -> None:
    after = could_not_look(book)
    assert after.verdict == "refer" and after.until_on is None
    assert "Nobody has looked here yet" in after.reasons
