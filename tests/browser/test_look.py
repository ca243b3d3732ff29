"""Nothing is cut or scrolls sideways, targets are large enough, and axe has no complaint."""

from collections.abc import Callable

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import Page

from logbook.models import Assessment
from tests.pages.book import Book, crack_seen

from .conftest import WIDTHS

ADDRESSES = [
    "/",
    "/index/",
    "/desk/",
    "/records/",
    "/me/",
    "/site/lower-mill/",
    "/component/{gate}/",
    "/component/{gate}/inspect/",
    "/component/{gate}/trace/",
    "/location/{heel}/",
    "/location/{heel}/basis/",
    "/location/{heel}/repair/",
    "/crack/{crack}/",
    "/proposal/{proposal}/",
    "/basis/{basis}/",
]


@pytest.fixture
def addresses(book: Book) -> list[str]:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    ids = {
        "gate": book.gate.pk,
        "heel": book.heel.pk,
        "crack": book.gate.cracks.get().pk,
        "proposal": Assessment.objects.get().pk,
        "basis": book.heel.bases.get().pk,
    }
    return [address.format(**ids) for address in ADDRESSES]


SIDEWAYS = """() => document.documentElement.scrollWidth - window.innerWidth"""
SMALL = """least => [...document.querySelectorAll(
    'main button, main a.button, main input[type=text], main .choice, .tabs a')]
  .filter(one => one.offsetParent && one.getBoundingClientRect().height < least)
  .map(one => one.textContent || one.name)"""
LEAST = {"desk": 40, "small desk": 40, "tablet": 64, "phone": 64}


@pytest.mark.parametrize("width", WIDTHS)
def test_every_page_fits_its_width(
    addresses: list[str], opened: Callable[..., Page], width: str
) -> None:
    page = opened("engineer", width)
    for address in addresses:
        page.goto(address)
        assert page.evaluate(SIDEWAYS) <= 0, address
        assert page.evaluate(SMALL, LEAST[width]) == [], address


@pytest.mark.parametrize("look", ["day", "lamp", "sun"])
def test_axe_finds_nothing(addresses: list[str], opened: Callable[..., Page], look: str) -> None:
    page = opened("engineer", "desk")
    page.context.add_cookies([{"name": "look", "value": look, "url": page.url}])
    for address in addresses:
        page.goto(address)
        found = Axe().run(page)
        assert found.violations_count == 0, f"{address}: {found.generate_report()}"


def test_the_fonts_arrive_and_are_used(addresses: list[str], opened: Callable[..., Page]) -> None:
    page = opened("crew")
    page.goto(addresses[0])
    page.evaluate("document.fonts.ready")
    loaded = page.evaluate(
        "[...document.fonts].filter(f => f.status === 'loaded').map(f => f.family + f.weight)"
    )
    assert {"B612400", "B612700"} <= {name.replace('"', "") for name in loaded}
