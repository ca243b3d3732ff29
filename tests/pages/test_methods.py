"""The methods page shows every relation that the engine has, to everyone who is signed in."""

from typing import Any

import pytest
from django.test import Client

from assessment import chapters

from .book import Book

pytestmark = pytest.mark.django_db(transaction=True)


def test_every_relation_with_its_range_source_and_tests(book: Book, as_: Any) -> None:
    from html import unescape

    page = unescape(as_("crew").get("/methods/").content.decode())
    for chapter in chapters():
        assert f'id="{chapter.key}"' in page
        for method in chapter.methods:
            record = method.validity
            for text in (record.relation, record.source, record.accuracy, record.witness):
                assert text in page, method.key
            assert all(one in page for one in record.tests)
            assert all(one.words() in page for one in record.ranges)
        assert all(formula.text in page for formula in chapter.formulas)


def test_a_stranger_is_asked_to_sign_in(book: Book) -> None:
    assert Client().get("/methods/").status_code == 302
