"""A browser at the served book: the system's own chromium, never one fetched for the tests."""

from collections.abc import Callable, Iterator
from typing import Any

import pytest
from playwright.sync_api import Browser, BrowserContext, Page

from tests.pages.book import PASSWORD, Book, write_book

WIDTHS = {
    "desk": {"viewport": {"width": 1440, "height": 900}},
    "small desk": {"viewport": {"width": 1280, "height": 800}},
    "tablet": {"viewport": {"width": 800, "height": 1280}, "has_touch": True},
    "phone": {"viewport": {"width": 390, "height": 844}, "has_touch": True},
}


@pytest.fixture(scope="session")
def browser_type_launch_args(browser_type_launch_args: dict[str, Any]) -> dict[str, Any]:
    return {**browser_type_launch_args, "executable_path": "/usr/bin/chromium"}


@pytest.fixture
def book(transactional_db: None) -> Book:
    return write_book()


@pytest.fixture
def opened(browser: Browser, live_server: Any) -> Iterator[Callable[..., Page]]:
    """A page for one person at one width; whatever the console complains of fails the test."""
    yield from _opener(browser, live_server, ("status of 4",))


@pytest.fixture
def tablet(browser: Browser, live_server: Any) -> Iterator[Callable[..., Page]]:
    """The same, where the signal comes and goes: that the network is gone is no complaint."""
    yield from _opener(browser, live_server, ("status of 4", "net::ERR_"))


def _opener(
    browser: Browser, live_server: Any, expected: tuple[str, ...]
) -> Iterator[Callable[..., Page]]:
    contexts: list[BrowserContext] = []
    complaints: list[str] = []

    def open_as(name: str, width: str = "tablet", **more: Any) -> Page:
        context = browser.new_context(base_url=live_server.url, **{**WIDTHS[width], **more})
        contexts.append(context)
        page = context.new_page()
        page.on(
            "console",
            lambda said: (
                complaints.append(said.text)
                if said.type in ("error", "warning")
                and not any(one in said.text for one in expected)
                else None
            ),
        )
        page.goto("/sign-in/")
        page.get_by_label("Sign-in name").fill(name)
        page.get_by_label("Password").fill(PASSWORD)
        page.get_by_role("main").get_by_role("button", name="Sign in").click()
        page.wait_for_url("**/")
        return page

    yield open_as
    for context in contexts:
        context.close()
    assert complaints == []
