"""An invented book, and short ways to look at and decide on its cracks."""

import datetime
from dataclasses import dataclass
from typing import Any

import pytest

from logbook import clock
from logbook.actions.review import review
from logbook.actions.shown import shown_digest
from logbook.actions.sign_disposition import sign_disposition
from logbook.models import Assessment, Crack, Disposition, Leaf, Review, Standing
from tests.pages.book import PASSWORD, Book, crack_seen, write_book


@dataclass
class Deciding:
    book: Book

    def found(self, depth: str = "3", length: str = "12", crack: str = "new", **more: Any) -> Crack:
        """A look on the last clock's day that found a crack at the heel."""
        today = clock.today("Europe/Budapest")
        counter = more.pop("counter", 1000)
        head = more.pop("head", None)
        seen = crack_seen(self.book.heel, depth, length, crack) | more
        made = self.book.log(today.isoformat(), counter, seen, head=head)
        found: Crack = made.findings.get().crack
        return found

    def newest(self, crack: Crack) -> Assessment:
        return Assessment.objects.filter(crack=crack).order_by("-leaf__index")[0]

    def reviewed(self, crack: Crack, by: str = "engineer", **override: Any) -> Review:
        decision = "override" if override else "accept"
        return review(self.book.people[by], self.newest(crack).pk, decision, **override)

    def sign(self, made: Review, by: str = "signatory", **more: Any) -> Disposition:
        values: dict[str, Any] = {
            "licence_pk": self.book.licence.pk,
            "meaning": "approved",
            "password": PASSWORD,
            "digest": shown_digest(made),
        }
        return sign_disposition(self.book.people[by], made.pk, **(values | more))

    def standing(self, crack: Crack) -> Standing:
        return Standing.objects.get(crack=crack)


@pytest.fixture
def deciding(transactional_db: None) -> Deciding:
    return Deciding(write_book())


@pytest.fixture
def book(deciding: Deciding) -> Book:
    return deciding.book


class Leaves:
    """The kinds of the leaves written since it was made."""

    def __init__(self) -> None:
        self.before = Leaf.objects.count()

    def new(self) -> list[str]:
        rows = Leaf.objects.filter(index__gte=self.before).order_by("index")
        return list(rows.values_list("kind", flat=True))


@pytest.fixture
def leaves(deciding: Deciding) -> Leaves:
    return Leaves()


def in_days(days: int) -> datetime.date:
    return clock.today("Europe/Budapest") + datetime.timedelta(days=days)
