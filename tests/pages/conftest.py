"""A book and someone signed in to it."""

from collections.abc import Callable

import pytest
from django.test import Client

from .book import Book, write_book


@pytest.fixture
def book(db: None) -> Book:
    return write_book()


@pytest.fixture
def as_(book: Book) -> Callable[[str], Client]:
    """A client signed in as one of the book's people."""

    def signed_in(name: str) -> Client:
        client = Client(raise_request_exception=True)
        client.force_login(book.people[name], backend="logbook.accounts.Accounts")
        return client

    return signed_in
