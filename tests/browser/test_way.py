"""The way from the find to the signature in a browser, with script and without."""

from collections.abc import Callable

import pytest
from PIL import Image
from playwright.sync_api import Page, expect

from logbook import clock
from logbook.models import Disposition, Inspection
from tests.pages.book import PASSWORD, Book

HEAD = {
    "Counter reading": "1200",
    "How you looked": "ultrasound",
    "Procedure": "UP-7",
    "Its revision": "C",
    "Instrument": "flaw detector 12",
    "Surface": "bare",
    "How much of it you covered": "all of it",
    "Who looked": "Ilka Berend",
    "Level of the qualification": "level 2",
}


def fill_in(page: Page, book: Book, depth: str) -> None:
    page.goto(f"/component/{book.gate.pk}/inspect/")
    page.get_by_label("Day you looked").fill(clock.today("Europe/Budapest").isoformat())
    for label, value in HEAD.items():
        page.get_by_label(label, exact=True).fill(value)
    page.get_by_label("Its calibration is valid until").fill("2027-06-30")
    page.get_by_label("The qualification is valid until").fill("2028-01-31")
    place = page.get_by_role("region", name=book.heel.name)
    expect(place.get_by_label("Depth", exact=True)).to_be_hidden()
    place.get_by_text("a crack", exact=True).click()
    place.get_by_text("measured", exact=True).click()
    place.get_by_label("Depth", exact=True).fill(depth)
    place.get_by_label("Length along the surface").fill("19")
    page.get_by_role("button", name="Read it through").click()


@pytest.mark.parametrize("script", [True, False], ids=["with script", "without script"])
def test_find_verdict_review_signature(
    book: Book, opened: Callable[..., Page], script: bool
) -> None:
    crew = opened("crew", java_script_enabled=script)
    fill_in(crew, book, "44")
    expect(crew.get_by_text("44 mm is deeper than the wall (22 mm).")).to_be_visible()
    place = crew.get_by_role("region", name=book.heel.name)
    place.get_by_label("Depth", exact=True).fill("4,4")
    crew.get_by_role("button", name="Read it through").click()
    expect(crew.get_by_role("heading", name="Is this right?")).to_be_visible()
    assert not Inspection.objects.exists()
    crew.get_by_role("button", name="Write it down").click()
    expect(crew.get_by_text("Not to be used until it is signed.")).to_be_visible()

    engineer = opened("engineer", "desk", java_script_enabled=script)
    engineer.get_by_role("link", name="Desk").click()
    engineer.get_by_role("link", name="Heel post, upper weld").click()
    engineer.get_by_text("Accept what is proposed").click()
    engineer.get_by_role("button", name="Write the review").click()
    expect(engineer.get_by_text("This waits for a signatory of the site.")).to_be_visible()

    signatory = opened("signatory", "desk", java_script_enabled=script)
    signatory.get_by_role("link", name="Desk").click()
    signatory.get_by_role("link", name="Heel post, upper weld").click()
    signatory.get_by_text("I approve this verdict.").click()
    signatory.get_by_text("Invented Board V-118").click()
    signatory.get_by_label("Password of the signatory").fill(PASSWORD)
    signatory.get_by_role("button", name="Sign", exact=True).click()
    expect(signatory.get_by_role("heading", name="Signed, entry")).to_be_visible()
    assert Disposition.objects.get().verdict == "continue"

    crew.goto(f"/component/{book.gate.pk}/")
    expect(crew.get_by_text("signed, in force").first).to_be_visible()


def test_going_back_to_change_keeps_all_of_it(book: Book, opened: Callable[..., Page]) -> None:
    crew = opened("crew", java_script_enabled=False)
    fill_in(crew, book, "4.4")
    crew.get_by_role("button", name="Change something").click()
    assert crew.get_by_label("Instrument").input_value() == "flaw detector 12"
    place = crew.get_by_role("region", name=book.heel.name)
    assert place.get_by_label("Depth", exact=True).input_value() == "4.4"


@pytest.mark.parametrize("script", [True, False], ids=["with script", "without script"])
def test_a_place_is_marked_by_touching_the_picture(
    book: Book, opened: Callable[..., Page], script: bool, tmp_path: object
) -> None:
    picture = f"{tmp_path}/gate.png"
    Image.new("RGB", (1200, 800), (170, 180, 190)).save(picture)
    engineer = opened("engineer", java_script_enabled=script)
    engineer.goto(f"/component/{book.gate.pk}/picture/")
    engineer.get_by_label("Picture of the part").set_input_files(picture)
    engineer.get_by_role("button", name="Use this picture").click()
    engineer.get_by_role("link", name="1 · Heel post").click()
    # Until the picture is there, its button is only as wide as the words that stand for it.
    engineer.wait_for_url(f"**/location/{book.heel.pk}/mark/")
    engineer.wait_for_load_state("load")
    touched = engineer.locator("input[type=image]")
    box = touched.bounding_box()
    assert box is not None
    touched.click(position={"x": box["width"] / 4, "y": box["height"] / 2})
    expect(engineer.get_by_text("Marked. Touch again to move the mark.")).to_be_visible()
    book.heel.refresh_from_db()
    assert book.heel.picture_x == pytest.approx(0.25, abs=0.01)
    assert book.heel.picture_y == pytest.approx(0.5, abs=0.01)


def test_an_entry_sent_again_by_the_browser_is_written_once(
    book: Book, opened: Callable[..., Page]
) -> None:
    crew = opened("crew")
    fill_in(crew, book, "4.4")
    crew.get_by_role("button", name="Write it down").click()
    crew.wait_for_url("**/inspection/**")
    crew.go_back()
    crew.get_by_role("button", name="Write it down").click()
    crew.wait_for_url("**/inspection/**")
    assert Inspection.objects.count() == 1
