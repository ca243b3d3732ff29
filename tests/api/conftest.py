"""A book and someone signed in to its API."""

from collections.abc import Callable
from typing import Any

import pytest
from django.test import Client

from tests.pages.book import Book, write_book


@pytest.fixture
def book(transactional_db: None) -> Book:
    return write_book()


@pytest.fixture
def as_(book: Book) -> Callable[[str], Client]:
    def signed_in(name: str) -> Client:
        client = Client(raise_request_exception=True)
        client.force_login(book.people[name], backend="logbook.accounts.Accounts")
        return client

    return signed_in


@pytest.fixture
def send(as_: Callable[[str], Client]) -> Callable[..., Any]:
    """POST an entry as the crew, by JSON."""

    def sent(data: Any, query: str = "", who: str = "crew") -> Any:
        return as_(who).post(f"/api/v1/inspections{query}", data, "application/json")

    return sent
