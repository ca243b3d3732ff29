"""The crew's tablet: a round with no signal, from loading it to the book, in a browser."""

from collections.abc import Callable

from playwright.sync_api import Page, expect

from logbook.models import Inspection, SentFromTablet
from tests.pages.book import Book

from .tablet import begin, loaded, type_size


def test_a_crack_is_logged_with_no_signal_and_comes_into_the_book_once(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    page.reload()
    expect(page.get_by_text("As the book stood at")).to_be_visible()
    begin(page, book)
    page.get_by_role("button", name="a crack").click()
    type_size(page, "4.4")
    page.get_by_role("button", name="next").click()
    type_size(page, "19")
    page.get_by_role("button", name="next").click()
    expect(page.get_by_text("Now: ")).to_be_visible()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="Written down")).to_be_visible()
    expect(page.get_by_text("No verdict yet.")).to_be_visible()
    expect(page.get_by_text("No stop size here. Treat it as stop.")).to_be_visible()
    assert not Inspection.objects.exists()
    page.context.set_offline(False)
    page.get_by_role("link", name="To send").click()
    page.get_by_role("button", name="Send now").click()
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    entry = Inspection.objects.get()
    assert entry.author == book.people["crew"]
    measurement = entry.findings.get().measurement
    assert (str(measurement.depth_mm), str(measurement.length_mm)) == ("4.400", "19.000")
    assert "Treat it as stop" in SentFromTablet.objects.get().shown
