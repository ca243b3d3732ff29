"""What a tablet gets: the sites the person may see, the last sizes, and stop sizes that hold."""

import datetime
import uuid
from collections.abc import Callable
from typing import Any

import pytest
from django.test import Client

from logbook import clock
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.actions.tablets import set_tablet_rules
from logbook.models import Assessment, AssessmentAsked, Device
from tests.pages.book import Book, basis_body, crack_seen

Send = Callable[..., Any]


@pytest.fixture
def package(device: Device, as_: Callable[[str], Client]) -> Callable[..., Any]:
    def asked(who: str = "crew") -> Any:
        return as_(who).get(f"/api/v1/tablet/lower-mill/package?tablet={device.key}&waiting=3")

    return asked


def heel_of(package: Any) -> Any:
    return package.json()["components"][0]["locations"][0]


def test_it_holds_the_site_and_no_other(book: Book, package: Callable[..., Any]) -> None:
    made = package().json()
    assert made["site"]["name"] == "Lower Mill lock"
    assert made["site"]["on_call"] == [{"name": "Ödön Várszegi", "phone": "+36 00 555 0100"}]
    assert [one["tag"] for one in made["components"]] == ["G-2"]
    assert {one["name"] for one in made["people"]} == {"Ilka Berend", "Tamás Őri", "Réka Sólyom"}
    assert package("stranger").status_code == 404
    # An auditor sees the site on the pages; a tablet's round is for those who write.
    assert package("auditor").status_code == 403


def test_last_contact_and_what_waited_are_kept(device: Device, package: Callable[..., Any]) -> None:
    package()
    device.refresh_from_db()
    assert device.seen_at is not None
    assert device.waiting == 3


def test_the_last_size_travels_with_the_bounds_of_what_is_asked_back(
    book: Book, package: Callable[..., Any]
) -> None:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    crack = heel_of(package())["cracks"][0]
    assert crack["last"] == {
        "on": "2026-03-02", "depth_mm": "3.1", "length_mm": "14", "depth_basis": "measured",
    }  # fmt: skip
    # Five times and a fifth; smaller than 2.83 of the method's own error (0.5 mm) below.
    assert crack["asks"]["depth"] == {
        "at_most_mm": "0.62", "at_least_mm": "15.5", "shrunk_below_mm": "1.685",
    }  # fmt: skip


def test_a_stop_size_says_its_basis_and_its_end_and_is_rounded_down(
    book: Book, package: Callable[..., Any]
) -> None:
    day = clock.today("Europe/Budapest").isoformat()
    book.log(day, 1200, crack_seen(book.heel, "3.1", "14"))
    stop = heel_of(package())["cracks"][0]["stop"]
    made = Assessment.objects.get()
    assert made.stop_depth_mm is not None
    assert 0 <= made.stop_depth_mm - float(stop["depth_mm"]) < 0.1
    assert stop["basis_revision"] == 1
    assert stop["good_until_on"] > day


def no_longer(book: Book, how: str) -> None:
    if how == "something is owed":
        crack = book.gate.cracks.get()
        AssessmentAsked.objects.create(
            location=book.heel, crack=crack, because_act=uuid.uuid4(), asked_at=clock.now()
        )
    elif how == "a newer basis":
        made = revise_basis(
            book.people["engineer"], book.heel.pk, body=basis_body(130), reason="measured load"
        )
        adopt_basis(book.people["second"], made.pk)
        AssessmentAsked.objects.all().delete()


@pytest.mark.parametrize("how", ["something is owed", "a newer basis"])
def test_a_stop_size_that_is_not_sure_does_not_travel(
    book: Book, package: Callable[..., Any], how: str
) -> None:
    day = clock.today("Europe/Budapest").isoformat()
    book.log(day, 1200, crack_seen(book.heel, "3.1", "14"))
    assert heel_of(package())["cracks"][0]["stop"] is not None
    no_longer(book, how)
    assert heel_of(package())["cracks"][0]["stop"] is None


def test_a_stop_size_whose_time_is_up_does_not_travel(
    book: Book, package: Callable[..., Any]
) -> None:
    book.log("2024-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    assert heel_of(package())["cracks"][0]["stop"] is None


def test_a_round_that_was_not_declared_can_be_taken_up(
    book: Book, sent: Callable[..., Any], send: Send, package: Callable[..., Any]
) -> None:
    data = sent()
    send(data)
    rounds = package("engineer").json()["rounds"]
    assert [one["key"] for one in rounds] == [data["round"]]
    assert rounds[0]["by"] == "Ilka Berend"
    assert rounds[0]["seen"][0]["location"] == book.heel.pk


def test_the_site_says_how_long_and_in_which_units(book: Book, package: Callable[..., Any]) -> None:
    assert package().json()["keep_days"] is None
    set_tablet_rules(book.people["administrator"], book.site, keep_days=14, inches=True)
    made = package().json()
    assert (made["keep_days"], made["inches"]) == (14, True)


def test_what_stands_is_said_in_the_words_of_the_pages(
    book: Book, as_: Callable[[str], Client], package: Callable[..., Any]
) -> None:
    day = clock.today("Europe/Budapest")
    book.log(day.isoformat(), 1200, crack_seen(book.heel, "3.1", "14"))
    standing = package().json()["components"][0]["standing"]
    page = as_("crew").get(f"/component/{book.gate.pk}/").content.decode()
    assert standing["word"] in page
    # The page parts days and thousands in the same way.
    assert standing["sentence"].split(".")[0] in page
    assert datetime.date.fromisoformat(standing["due_on"]) > day
