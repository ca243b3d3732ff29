"""The frozen case of a known book, byte for byte, against a stored text read over by hand.

A change of the stored text is a change of what every later proposal is signed over: it happens
on purpose, by changing fixtures/cases/frozen/heel.json.
"""

import datetime
from hashlib import sha256
from pathlib import Path

import pytest

from logbook import clock
from logbook.cases.freeze import freeze
from tests.pages.book import crack_seen, write_book

FROZEN = Path(__file__).parents[2] / "fixtures" / "cases" / "frozen" / "heel.json"

pytestmark = pytest.mark.django_db(transaction=True)


def test_rows_make_the_exact_text(monkeypatch: pytest.MonkeyPatch) -> None:
    book = write_book()
    monkeypatch.setattr(clock, "today", lambda zone: datetime.date(2026, 6, 1))
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    made = book.log("2026-05-04", 1900, crack_seen(book.heel, "3,40", "14.5", "1"))
    frozen = freeze(book.heel, made.findings.get().crack)
    stored = FROZEN.read_text().rstrip("\n")
    assert frozen.text == stored
    assert frozen.digest == sha256(stored.encode()).hexdigest()
