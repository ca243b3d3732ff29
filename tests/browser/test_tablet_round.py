"""The crew's tablet: a round with no signal, from loading it to the book, in a browser."""

import re
from collections.abc import Callable
from hashlib import sha256
from pathlib import Path
from typing import Any

from django.contrib.sessions.models import Session
from playwright.sync_api import BrowserType, Page, expect

from logbook import clock
from logbook.actions.add_photo import photos_path
from logbook.actions.register_component import add_location
from logbook.actions.tablets import revoke_tablet, set_tablet_rules
from logbook.models import (
    Device,
    Finding,
    Inspection,
    Membership,
    Photo,
    RoundDeclared,
    SentFromTablet,
    StopNote,
    TrayItem,
)
from tests.pages.book import Book, crack_seen
from tests.tablet.conftest import jpeg

from .tablet import begin, loaded, send_now, sign_in, type_size


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
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    entry = Inspection.objects.get()
    assert entry.author == book.people["crew"]
    measurement = entry.findings.get().measurement
    assert (str(measurement.depth_mm), str(measurement.length_mm)) == ("4.400", "19.000")
    assert "Treat it as stop" in SentFromTablet.objects.get().shown


def nothing_found(page: Page, place: int) -> None:
    page.goto(f"/tablet/#/place/{place}")
    page.get_by_role("button", name="nothing found").click()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="Written down")).to_be_visible()


def crack_found(page: Page, place: int, depth: str, length: str) -> None:
    page.goto(f"/tablet/#/place/{place}")
    page.get_by_role("button", name="a crack").click()
    type_size(page, depth)
    page.get_by_role("button", name="next", exact=True).click()
    type_size(page, length)
    page.get_by_role("button", name="next", exact=True).click()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="Written down")).to_be_visible()


def test_thirty_findings_with_photos_survive_a_restart_and_are_all_there_once(
    book: Book, browser_type: BrowserType, live_server: Any, tmp_path: Path
) -> None:
    engineer = book.people["engineer"]
    places = [add_location(engineer, book.gate.pk, name=f"Rib {n}") for n in range(30)]
    photos = [jpeg(120 + n, f"hsl({n * 12},60%,50%)") for n in range(30)]

    def start() -> tuple[Any, Page]:
        context = browser_type.launch_persistent_context(
            str(tmp_path), executable_path="/usr/bin/chromium", base_url=live_server.url,
            viewport={"width": 800, "height": 1280}, has_touch=True,
        )  # fmt: skip
        return context, context.pages[0]

    def could_not_look(page: Page, n: int) -> None:
        page.goto(f"/tablet/#/place/{places[n].pk}")
        page.get_by_role("button", name="could not look").click()
        page.get_by_label("Why you could not look").fill(f"scaffold {n}")
        page.get_by_label("Photos").set_input_files(
            {"name": "p.jpg", "mimeType": "image/jpeg", "buffer": photos[n]}
        )
        expect(page.get_by_role("button", name="leave this photo out")).to_be_visible()
        page.get_by_role("button", name="Write it down").click()
        expect(page.get_by_role("heading", name="Written down")).to_be_visible()

    context, page = start()
    sign_in(page, "crew")
    loaded(lambda _who: page)
    context.set_offline(True)
    begin(page, book)
    for n in range(15):
        could_not_look(page, n)
    context.close()
    context, page = start()
    context.set_offline(True)
    page.goto("/tablet/#/send")
    # Waiting, or sent in the moment before the signal was cut again: none is gone.
    expect(page.get_by_role("link", name="G-2 · Rib")).to_have_count(15)
    for n in range(15, 30):
        could_not_look(page, n)
    context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("Nothing waits to be sent.").first).to_be_visible(timeout=60_000)
    context.close()
    assert Inspection.objects.count() == SentFromTablet.objects.count() == 30
    whys = sorted(Finding.objects.values_list("why", flat=True))
    assert whys == sorted(f"scaffold {n}" for n in range(30))
    assert Photo.objects.filter(arrived_at__isnull=False).count() == 30
    for photo in photos:
        assert photos_path(sha256(photo).hexdigest()).read_bytes() == photo


def test_below_the_stop_size_is_no_permission_and_the_size_is_drawn(
    book: Book, tablet: Callable[..., Page]
) -> None:
    day = clock.today("Europe/Budapest").isoformat()
    book.log(day, 1200, crack_seen(book.heel, "3.1", "14"))
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    page.get_by_role("button", name="crack 1: measure it").click()
    type_size(page, "3.4")
    # The last size does not lead the hand: it comes after the new one.
    expect(page.get_by_text("Last time")).to_be_hidden()
    page.get_by_role("button", name="next", exact=True).click()
    type_size(page, "15")
    expect(page.get_by_role("img", name=re.compile("crack 3.4 mm deep, stop from"))).to_be_visible()
    page.get_by_role("button", name="next", exact=True).click()
    expect(page.get_by_text("Last time, ")).to_be_visible()
    page.get_by_role("button", name="Write it down").click()
    below = "Below the stop size is not permission to use the part."
    expect(page.get_by_text(below)).to_be_visible()
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    assert below in SentFromTablet.objects.get().shown


def test_a_stop_is_noted_with_its_tag_and_who_was_told(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    crack_found(page, book.toe.pk, "9", "30")
    page.get_by_label("Number of the tag").fill("T-14")
    page.get_by_label("Whom you told").fill("Ödön Várszegi")
    page.get_by_role("button", name="now, ").click()
    page.get_by_role("button", name="Note this with the entry").click()
    expect(page.get_by_text("Tag T-14")).to_be_visible()
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("Nothing waits to be sent.").first).to_be_visible()
    note = StopNote.objects.get()
    assert (note.tag_number, note.told_whom) == ("T-14", "Ödön Várszegi")
    assert note.inspection == Inspection.objects.get()


def test_undo_takes_back_what_was_not_sent(book: Book, tablet: Callable[..., Page]) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    page.get_by_role("button", name="Undo: take it back").click()
    expect(page.get_by_role("heading", name="Place 1 of 2")).to_be_visible()
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("Nothing waits to be sent.").first).to_be_visible()
    assert not Inspection.objects.exists()


def test_an_expired_session_stops_sending_and_never_writing(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    begin(page, book)
    Session.objects.all().delete()
    nothing_found(page, book.toe.pk)
    page.goto("/tablet/#/send")
    page.get_by_role("link", name="Sign in to send").click()
    sign_in(page, "crew", there=True)
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    assert Inspection.objects.get().author == book.people["crew"]


def test_two_people_share_a_tablet_and_each_sends_their_own(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    page.goto("/tablet/#/who")
    page.get_by_role("button", name="Tamás Őri").click()
    # What one person looked with is not the other's: it is asked anew.
    page.goto("/tablet/#/round")
    page.get_by_role("link", name="1 · Heel post, upper weld").click()
    expect(page.get_by_label("Instrument")).to_have_value("")
    begin(page, book, begun=True)
    nothing_found(page, book.heel.pk)
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    expect(page.get_by_text("1 of these were written by someone else")).to_be_visible()
    assert Inspection.objects.get().author == book.people["crew"]
    page.context.clear_cookies()
    sign_in(page, "engineer")
    page.goto("/tablet/")
    send_now(page)
    expect(page.get_by_text("Nothing waits to be sent.").first).to_be_visible()
    authors = Inspection.objects.order_by("pk").values_list("author__username", flat=True)
    assert list(authors) == ["crew", "engineer"]


def test_what_the_book_cannot_take_is_shown_to_be_in_the_tray(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    # Meanwhile somebody found a crack there.
    day = clock.today("Europe/Budapest").isoformat()
    book.log(day, 1200, crack_seen(book.toe, "3", "9"))
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the tray: a person decides")).to_be_visible()
    page.get_by_role("link", name="G-2 · Mitre post, foot").click()
    expect(page.get_by_text("Crack 1 is known here.")).to_be_visible()
    assert TrayItem.objects.count() == 1


def test_a_round_goes_on_on_another_tablet_and_is_declared(
    book: Book, tablet: Callable[..., Page]
) -> None:
    first = loaded(tablet)
    begin(first, book)
    nothing_found_online(first, book.heel.pk)
    second = loaded(tablet, "engineer")
    second.get_by_role("link", name="Round", exact=True).click()
    second.get_by_role("button", name="Take it up").click()
    expect(second.get_by_role("heading", name="Place 2 of 2")).to_be_visible()
    second.get_by_role("link", name="Close the round").click()
    second.get_by_role("button", name="Declare the round").click()
    expect(second.get_by_text("Say why these places were not reached.")).to_be_visible()
    second.get_by_label("Why these places were not reached").fill("under water")
    second.get_by_role("button", name="Declare the round").click()
    send_now(second)
    expect(second.get_by_text("Nothing waits to be sent.").first).to_be_visible()
    declared = RoundDeclared.objects.get()
    assert (declared.seen, declared.not_reached, declared.by) == (1, 1, book.people["engineer"])
    assert declared.key == SentFromTablet.objects.get().round


def nothing_found_online(page: Page, place: int) -> None:
    page.goto(f"/tablet/#/place/{place}")
    page.get_by_role("button", name="nothing found").click()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="The verdict")).to_be_visible()


def test_with_signal_the_verdict_comes(book: Book, tablet: Callable[..., Page]) -> None:
    page = loaded(tablet)
    begin(page, book)
    nothing_found_online(page, book.heel.pk)
    expect(page.get_by_text("Not to be used until an engineer has decided.")).to_be_visible()


def test_inches_are_converted_once_and_both_are_shown(
    book: Book, tablet: Callable[..., Page]
) -> None:
    set_tablet_rules(book.people["administrator"], book.site, keep_days=14, inches=True)
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    page.get_by_role("button", name="a crack").click()
    page.get_by_role("button", name="inch", exact=True).click()
    type_size(page, "3/8")
    expect(page.get_by_text("depth 3/8 in = 9.525\u00a0mm")).to_be_visible()
    page.get_by_role("button", name="next", exact=True).click()
    type_size(page, "1.5")
    page.get_by_role("button", name="next", exact=True).click()
    page.get_by_role("button", name="Write it down").click()
    expect(page.get_by_role("heading", name="Written down")).to_be_visible()
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    measured = Finding.objects.get().measurement
    assert (str(measured.depth_mm), str(measured.length_mm)) == ("9.525", "38.100")
    assert "3/8 in" in SentFromTablet.objects.get().shown


def test_a_scanned_label_opens_the_part_with_no_signal(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    page.goto(f"/component/{book.gate.pk}/")
    expect(page.get_by_role("heading", name="G-2 · Lower gate, north leaf")).to_be_visible()
    page.goto("/tablet/#/index")
    page.get_by_label("The number on the part").fill("g-2")
    page.get_by_role("button", name="Find it").click()
    expect(page.get_by_text("In force, as this tablet knows it")).to_be_visible()


def test_a_revoked_tablet_wipes_the_round_and_keeps_what_waits(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    revoke_tablet(book.people["administrator"], book.site, Device.objects.get().pk)
    page.context.set_offline(False)
    page.goto("/tablet/#/")
    page.get_by_role("button", name="Load the round again").click()
    expect(page.get_by_text("was revoked")).to_be_visible()
    expect(page.get_by_text("No round is on this tablet.")).to_be_visible()
    send_now(page)
    expect(page.get_by_text("in the tray: a person decides")).to_be_visible()
    assert TrayItem.objects.count() == 1


def test_what_waits_of_someone_whose_role_ended_is_kept(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    Membership.objects.filter(person=book.people["crew"]).update(ended_at=clock.now())
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the tray: a person decides")).to_be_visible()


def test_a_colleague_hands_in_what_someone_without_a_role_left_behind(
    book: Book, tablet: Callable[..., Page]
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    page.context.clear_cookies()
    page.context.set_offline(False)
    sign_in(page, "engineer")
    page.goto("/tablet/")
    send_now(page)
    hand_in = page.get_by_role("button", name="They have no role here any more: hand them in")
    hand_in.click()
    # The author still has the role: it goes on waiting for that person.
    expect(page.get_by_text("1 of these were written by someone else")).to_be_visible()
    assert not TrayItem.objects.exists()
    Membership.objects.filter(person=book.people["crew"]).update(ended_at=clock.now())
    hand_in.click()
    expect(page.get_by_text("in the tray: a person decides")).to_be_visible()
    assert TrayItem.objects.get().author == book.people["engineer"]
    assert not Inspection.objects.exists()


def test_what_waits_is_saved_to_a_file_that_the_book_takes(
    book: Book, tablet: Callable[..., Page], tmp_path: Path
) -> None:
    page = loaded(tablet)
    page.context.set_offline(True)
    begin(page, book)
    nothing_found(page, book.toe.pk)
    page.goto("/tablet/#/send")
    with page.expect_download() as saved:
        page.get_by_role("button", name="Save what waits to a file").click()
    file = tmp_path / "waiting.json"
    saved.value.save_as(file)
    crew = tablet("crew", "desk")
    crew.goto("/site/lower-mill/tablets/file/")
    crew.get_by_label("The file that the tablet saved").set_input_files(file)
    crew.get_by_role("button", name="Read it").click()
    expect(crew.get_by_text("In the book.")).to_be_visible()
    # The tablet finds its signal after all: nothing is doubled.
    page.context.set_offline(False)
    send_now(page)
    expect(page.get_by_text("in the book, entry")).to_be_visible()
    assert Inspection.objects.count() == 1
