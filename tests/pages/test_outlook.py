"""The forecast on the engineer's pages: when, how likely, how sure, and drawn as bands."""

import json
from decimal import Decimal
from typing import Any

import pytest

from assessment import assess
from logbook.actions.answer import answer_now
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.figures.from_outcome import size_story
from logbook.models import Assessment, Crack
from logbook.pages.outlook import outlook
from tests.assessment.examples import surface

from .book import Book, basis_body, crack_seen

SCATTER = {
    "log10_c_sd": 0.2,
    "m_sd": 0,
    "c_m_correlation": 0,
    "toughness_cov": 0.1,
    "stress_cov": 0.05,
}
CASE = surface(uncertainty=SCATTER)
OUTCOME = json.loads(json.dumps(assess(CASE)))


def test_what_is_asked_for_is_said_in_words_and_nothing_else() -> None:
    assert outlook({}) is None and outlook(json.loads(json.dumps(assess(surface())))) is None
    found = outlook(OUTCOME)
    assert found is not None and not found.why_not
    assert any(line.what.startswith("half of such cracks") for line in found.lines)
    assert any("not resolved" in note for note in found.notes)
    assert (
        outlook({"forecast": {"usage_quantiles": None, "why_not": "too few"}}).why_not == "too few"
    )  # type: ignore[union-attr]


@pytest.mark.parametrize("of", ["depth", "length"])
def test_the_bands_are_those_of_the_forecast_from_the_last_look_on(of: str) -> None:
    story = size_story(
        what="Crack 1", counter="hours", per_day=4.0, looks=(), of=of, case=CASE, outcome=OUTCOME
    )
    wide, narrow = story.bands
    assert wide.label == "9 in 10 such cracks"
    assert wide.edges[0][0] == narrow.edges[0][0] == CASE["usage"]["at"]
    for (_, low, high), (_, inner_low, inner_high) in zip(wide.edges, narrow.edges, strict=True):
        assert low <= inner_low <= inner_high <= high
    bare = size_story(what="Crack 1", counter="hours", per_day=4.0, looks=(), of=of, case=CASE)
    assert bare.bands == ()


@pytest.mark.django_db(transaction=True)
def test_engineers_see_it_and_the_crew_does_not(book: Book, as_: Any, settings: Any) -> None:
    settings.VERDICT_WAIT_SECONDS = 60
    body = basis_body() | {"uncertainty": {k: Decimal(str(v)) for k, v in SCATTER.items()}}
    made = revise_basis(book.people["engineer"], book.heel.pk, body=body, reason="scatter known")
    answer_now(adopt_basis(book.people["second"], made.pk).leaf_id)
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    address = f"/crack/{Crack.objects.get().pk}/"
    assert "what its history says" in as_("engineer").get(address).content.decode()
    assert "what its history says" not in as_("crew").get(address).content.decode()


@pytest.mark.django_db(transaction=True)
def test_what_to_measure_next_is_worked_out_for_an_engineer(book: Book, as_: Any) -> None:
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    address = f"/proposal/{Assessment.objects.get().pk}/measure/"
    page = as_("engineer").get(address).content.decode()
    assert "What to measure next" in page and "growth rate:" in page and "load:" in page
    assert as_("crew").get(address).status_code == 403
    assert as_("stranger").get(address).status_code == 404
