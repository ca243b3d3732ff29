"""What the tests of the tablet's page share: loading a round, answering before the look, typing."""

from collections.abc import Callable
from typing import Any

from playwright.sync_api import Page, expect

from tests.pages.book import PASSWORD, Book

TOOLS = {
    "How you looked": "ultrasound",
    "Procedure": "UP-7",
    "Its revision": "C",
    "Instrument": "flaw detector 12",
    "Its calibration is valid until": "2027-06-30",
    "Who looked": "Ilka Berend",
    "Level of the qualification": "level 2",
    "The qualification is valid until": "2028-01-31",
    "Surface": "bare",
    "How much of it you covered": "all of it",
}


# The page's policy forbids the polling of strings, so the page itself waits.
CONTROLLED = """() => new Promise((told) => {
  if (navigator.serviceWorker.controller) told();
  navigator.serviceWorker.addEventListener("controllerchange", () => told());
})"""


def loaded(tablet: Callable[..., Page], who: str = "crew", **more: Any) -> Page:
    """The tablet's page with the round on it and its worker in charge."""
    page = tablet(who, **more)
    page.goto("/tablet/")
    page.evaluate("navigator.serviceWorker.ready")
    page.reload()
    page.evaluate(CONTROLLED)
    expect(page.get_by_text("As the book stood at")).to_be_visible()
    return page


def begin(
    page: Page, book: Book, counter: str = "1200", *, until_head: bool = False, begun: bool = False
) -> None:
    """Begin a round and answer what is asked before the look."""
    if not begun:
        page.get_by_role("link", name="Round", exact=True).click()
        page.get_by_role("button", name="Begin a round").click()
        page.get_by_role("link", name="1 · Heel post, upper weld").click()
    page.get_by_role("button", name="today, ").click()
    page.get_by_label("Counter reading").fill(counter)
    for label, value in TOOLS.items():
        page.get_by_label(label, exact=True).fill(value)
    if not until_head:
        page.get_by_role("button", name="Go to the places").click()
        expect(page.get_by_text("What do you see here?")).to_be_visible()


def type_size(page: Page, size: str) -> None:
    for digit in size:
        page.get_by_role(
            "button", name="decimal sign" if digit == "." else digit, exact=True
        ).click()


def send_now(page: Page) -> None:
    page.goto("/tablet/#/send")
    page.get_by_role("button", name="Send now").click()


def sign_in(page: Page, name: str, *, there: bool = False) -> None:
    if not there:
        page.goto("/sign-in/")
    page.get_by_label("Sign-in name").fill(name)
    page.get_by_label("Password").fill(PASSWORD)
    page.get_by_role("main").get_by_role("button", name="Sign in").click()
    page.wait_for_url("**/tablet/" if there else "**/")
