"""The tablet's pages: nothing cut or sideways, targets for gloves, no complaint of axe, keyboard.

With LOGBOOK_SCREENSHOTS naming a folder each page is kept there as a picture, to be looked at.
"""

import os
import re
from collections.abc import Callable, Iterator
from hashlib import sha256
from pathlib import Path

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import Page, expect

from logbook import clock
from logbook.actions.add_photo import add_photo, declare_photo
from logbook.actions.register_component import mark_picture, set_picture
from tests.pages.book import Book, crack_seen
from tests.tablet.conftest import jpeg

from .tablet import begin, loaded, type_size

SIZES = {
    "10 inch, upright": {"width": 800, "height": 1280},
    "10 inch, across": {"width": 1280, "height": 800},
    "6 inch phone": {"width": 390, "height": 844},
}
LOOKS = ("day", "lamp", "sun")
SIDEWAYS = "document.documentElement.scrollWidth - window.innerWidth"
SMALL = """least => [...document.querySelectorAll(
    'main button, main a.button, main input[type=text], main .choice, .tabs a')]
  .filter(one => one.offsetParent && one.getBoundingClientRect().height < least)
  .map(one => one.textContent || one.name)"""
# Words that run out of their own box, or keys that lie over one another.
CUT = """() => [...document.querySelectorAll(
    'main button, main a, main h1, main p, main li, .tabs a')]
  .filter(one => one.offsetParent && one.scrollWidth > one.clientWidth + 1 && one.clientWidth > 0)
  .map(one => one.textContent)"""
OVER = """() => {
  const boxes = [...document.querySelectorAll('main button, main a.button, main input')]
    .filter(one => one.offsetParent).map(one => [one, one.getBoundingClientRect()]);
  const over = [];
  for (const [a, x] of boxes) for (const [b, y] of boxes) {
    if (a === b || a.contains(b) || b.contains(a)) continue;
    const wide = Math.min(x.right, y.right) - Math.max(x.left, y.left);
    const high = Math.min(x.bottom, y.bottom) - Math.max(x.top, y.top);
    if (wide > 1 && high > 1) over.push(`${a.textContent || a.name} / ${b.textContent || b.name}`);
  }
  return over;
}"""


def known_crack(book: Book) -> None:
    """A crack that is known, and a picture with its places marked."""
    picture = jpeg(900, "#9aa7a0")
    engineer = book.people["engineer"]
    declared = declare_photo(engineer, book.site, sha256(picture).hexdigest())
    set_picture(engineer, book.gate.pk, add_photo(engineer, declared.pk, picture))
    mark_picture(engineer, book.heel.pk, 0.3, 0.4)
    mark_picture(engineer, book.toe.pk, 0.7, 0.8)
    day = clock.today("Europe/Budapest").isoformat()
    book.log(day, 1200, crack_seen(book.heel, "3.1", "14"))


def leaves(page: Page, book: Book) -> Iterator[str]:
    """Walks all the pages; gives the name of each as it stands open."""
    page.goto("/tablet/#/")
    expect(page.get_by_text("As the book stood at")).to_be_visible()
    yield "today"
    page.get_by_role("link", name="who writes").click()
    yield "who"
    page.get_by_role("link", name="Round", exact=True).click()
    yield "begin"
    page.goto("/tablet/#/")
    begin(page, book, "1300", until_head=True)
    yield "head"
    page.get_by_role("button", name="Go to the places").click()
    expect(page.get_by_text("What do you see here?")).to_be_visible()
    yield "question"
    page.get_by_role("button", name="crack 1: measure it").click()
    type_size(page, "1.2")
    page.get_by_role("button", name="next", exact=True).click()
    type_size(page, "99")
    yield "keypad"
    page.get_by_role("button", name="next", exact=True).click()
    expect(page.get_by_text("Last time, ")).to_be_visible()
    yield "compared"
    page.get_by_label("Photos").set_input_files(
        {"name": "p.jpg", "mimeType": "image/jpeg", "buffer": jpeg(600, "#667")}
    )
    page.get_by_role("application").click(position={"x": 100, "y": 90})
    yield "photo"
    page.get_by_text("this size is right").click()
    page.get_by_label("Why it is smaller").fill("another probe")
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="Written down")).to_be_visible()
    yield "stop"
    page.get_by_role("link", name="Next place").click()
    expect(page.get_by_role("heading", name=re.compile("Place 2 of"))).to_be_visible()
    yield "round"
    page.goto("/tablet/#/place/" + str(book.toe.pk))
    page.get_by_role("button", name="a crack").click()
    type_size(page, "2")
    page.get_by_role("button", name="next", exact=True).click()
    type_size(page, "5")
    page.get_by_role("button", name="next", exact=True).click()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_text("No stop size here. Treat it as stop.")).to_be_visible()
    yield "treat as stop"
    page.goto("/tablet/#/part/" + str(book.gate.pk))
    yield "part"
    page.goto("/tablet/#/index")
    yield "index"
    page.goto("/tablet/#/new/" + str(book.gate.pk))
    expect(page.get_by_text("Touch the picture")).to_be_visible()
    yield "new place"
    page.goto("/tablet/#/close")
    yield "close"
    page.get_by_role("link", name="To send").click()
    yield "to send"


@pytest.mark.parametrize("look", LOOKS)
@pytest.mark.parametrize("size", SIZES)
def test_every_leaf_fits_and_axe_finds_nothing(
    book: Book, tablet: Callable[..., Page], size: str, look: str
) -> None:
    known_crack(book)
    # Mobile: a pointer as coarse as a glove, so that the tablet's own sizes hold.
    page = loaded(tablet, viewport=SIZES[size], is_mobile=True)
    page.get_by_role("button", name=look, exact=True).click()
    page.context.set_offline(True)
    folder = os.environ.get("LOGBOOK_SCREENSHOTS")
    wrong = []
    for name in leaves(page, book):
        if folder:
            Path(folder).mkdir(parents=True, exist_ok=True)
            page.evaluate("document.fonts.ready")
            # As far as the screen reaches: a picture of the whole page is taken as of a desk.
            page.screenshot(path=f"{folder}/{size}, {look}, {name}.png")
        if page.evaluate(SIDEWAYS) > 0:
            wrong.append(f"{name} scrolls sideways")
        wrong += [f"{name}: too small: {one}" for one in page.evaluate(SMALL, 64)]
        wrong += [f"{name}: cut: {one}" for one in page.evaluate(CUT)]
        wrong += [f"{name}: over one another: {one}" for one in page.evaluate(OVER)]
        found = Axe().run(page, options={"runOnly": ["wcag2a", "wcag2aa", "wcag21aa", "wcag22aa"]})
        if found.violations_count:
            wrong.append(f"{name}: {found.generate_report()}")
    assert wrong == []


def test_the_round_is_walked_by_keyboard_alone(book: Book, tablet: Callable[..., Page]) -> None:
    page = loaded(tablet)
    begin(page, book)
    expect(page.get_by_text("What do you see here?")).to_be_visible()
    press = page.keyboard.press
    focused = "document.activeElement.textContent"

    def tab_to(words: str) -> None:
        for _turn in range(60):
            if page.evaluate(focused) == words:
                return
            press("Tab")
        raise AssertionError(f"{words} is not reached by the tab key")

    tab_to("nothing found")
    press("Enter")
    page.evaluate("document.querySelector('h1').focus()")
    tab_to("Write it down")
    press("Enter")
    expect(page.get_by_role("heading", name=re.compile("Written down|The verdict"))).to_be_visible()


def test_the_round_is_usable_in_a_second_and_a_half_at_a_quarter_of_the_speed(
    book: Book, tablet: Callable[..., Page]
) -> None:
    """Printed; the bound is loose by ten, since other work on the machine must not fail it."""
    page = loaded(tablet)
    begin(page, book)
    session = page.context.new_cdp_session(page)
    session.send("Emulation.setCPUThrottlingRate", {"rate": 4})
    page.goto("/tablet/#/round")
    page.reload()
    page.locator("html[data-ready=yes]").wait_for(state="attached")
    took = page.evaluate("performance.measure('usable', {start: 0, end: 'usable'}).duration")
    print(f"round page usable after {took:.0f} ms at 4 × CPU slow-down")
    assert took < 15_000
