"""Twelve seeded runs on a bad line; two hundred: python -m tests.full.tablet."""

from pathlib import Path

from playwright.sync_api import Playwright

from tests.tablet.faults import runs


def test_what_was_acknowledged_is_in_the_book_once(playwright: Playwright, tmp_path: Path) -> None:
    count = runs(playwright, tmp_path, range(12))
    assert count.wrong == []
    assert count.acknowledged == count.in_the_book > 24
    assert count.photos == count.photos_identical > 5
