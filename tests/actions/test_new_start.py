"""After a repair the crack goes on from what the inspection after could have missed."""

import json
from decimal import Decimal
from typing import Any

from logbook import clock
from logbook.actions.propose import propose
from logbook.actions.reassess import reassess
from logbook.actions.return_to_service import return_to_service
from logbook.actions.return_to_service import shown_digest as repair_digest
from logbook.actions.review import review
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.models import Assessment, AssessmentAsked, Crack, Repair, Standing
from tests.pages.book import PASSWORD, basis_body

from .conftest import Deciding, Leaves, in_days
from .test_deciding import refused, repair_of

START = {
    "closes": False, "start_depth_mm": Decimal(1), "start_length_mm": Decimal(4),
    "start_source": "procedure UP-7, table 2",
}  # fmt: skip


def test_the_new_start_is_assessed_as_an_assumption(deciding: Deciding) -> None:
    crack = deciding.found("8", "30")
    repair_of(deciding.book, crack, **START)
    made = propose(crack.location_id, crack.pk)
    assert made is not None and made.case_text
    case = json.loads(made.case_text, parse_float=Decimal)
    assert (case["crack"]["depth_mm"], case["crack"]["length_mm"]) == (1, 4)
    assert case["crack"]["depth_basis"] == "assumed"
    assert "UP-7, table 2" in case["crack"]["depth_source"]
    assert case["usage"]["at"] == 1100 and "history" not in case
    assert made.verdict != "refer", made.reasons
    assert deciding.standing(crack).held  # until the return to service is signed


def test_a_welded_repair_is_referred_until_the_basis_knows_of_it(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found("8", "30")
    repair_of(book, crack, welded=True, **START)
    made = propose(crack.location_id, crack.pk)
    assert made is not None and made.verdict == "refer"
    assert "residual stress back" in made.reasons
    basis = revise_basis(
        book.people["engineer"], book.heel.pk, body=basis_body(), reason="after the weld repair"
    )
    adopt_basis(book.people["second"], basis.pk)
    again = propose(crack.location_id, crack.pk)
    assert again is not None and "residual stress back" not in again.reasons


def test_a_surface_or_procedure_that_fell_short_is_referred(deciding: Deciding) -> None:
    crack = deciding.found(head={"fell_short": "painted, could not be stripped"})
    newest = deciding.newest(crack)
    assert newest.verdict == "refer" and "painted, could not be stripped" in newest.reasons


def test_assessing_anew(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found()
    leaves = Leaves()
    engineer = book.people["engineer"]
    assert refused(reassess, book.people["crew"], book.heel.pk, crack.pk, why="x").status == 403
    assert refused(reassess, book.people["stranger"], book.heel.pk, crack.pk, why="x").status == 404
    assert refused(reassess, engineer, book.heel.pk, crack.pk, why=" ").fields["why"]
    assert refused(reassess, engineer, book.toe.pk, crack.pk, why="x").fields["crack"]
    assert refused(reassess, engineer, book.toe.pk, None, why="x").fields["location"]
    reassess(engineer, book.heel.pk, crack.pk, why="a new day")
    assert leaves.new() == ["reassess"]
    assert AssessmentAsked.objects.count() == 1
    assert deciding.standing(crack).state == "not-assessed"
    assert propose(book.heel.pk, crack.pk) is not None


def returned(deciding: Deciding, crack: Crack, **more: Any) -> Repair:
    book = deciding.book
    made = Repair.objects.get(pk=repair_of(book, crack, **more).pk)
    return_to_service(
        book.people["signatory"], made.pk, grounds="looked at after",
        licence_pk=book.licence.pk, password=PASSWORD, digest=repair_digest(made),
    )  # fmt: skip
    for location, one in AssessmentAsked.objects.values_list("location", "crack"):
        propose(location, one)
    return made


def test_what_was_signed_before_a_repair_is_not_revived_by_it(deciding: Deciding) -> None:
    """The place was signed "continue" before the crack; the crack is ground out and closed: the
    old signature says nothing of the part as it is now."""
    book = deciding.book
    today = clock.today("Europe/Budapest").isoformat()
    book.log(today, 900, {"location": book.heel.pk, "what": "nothing"})
    place = Assessment.objects.get()
    made = review(
        book.people["engineer"], place.pk, "override", verdict="continue",
        until_on=in_days(200), grounds="looked over",
    )  # fmt: skip
    deciding.sign(made)
    assert Standing.objects.get(location=book.heel, crack=None).verdict == "continue"
    crack = deciding.found("8", "30", counter=1000)
    returned(deciding, crack)
    row = Standing.objects.get(location=book.heel)
    assert (row.crack, row.verdict, row.held, row.state) == (
        None, "refer", True, "proposed-binding",
    )  # fmt: skip
    assert row.assessment is not None and "log the inspection after it" in row.assessment.reasons
    # Who could not look has not looked.
    book.log(today, 1150, {"location": book.heel.pk, "what": "could-not-look", "why": "water"})
    newest = Assessment.objects.order_by("-leaf__index")[0]
    assert "log the inspection after it" in newest.reasons
    # The inspection after it, as any other, is what the place stands on from now on.
    book.log(today, 1200, {"location": book.heel.pk, "what": "nothing"})
    newest = Assessment.objects.order_by("-leaf__index")[0]
    assert "log the inspection after it" not in newest.reasons


def test_a_part_that_was_taken_out_stands_nowhere(deciding: Deciding) -> None:
    crack = deciding.found("8", "30", counter=1000)
    returned(deciding, crack, sort="removal", what="plate taken out")
    assert not Standing.objects.filter(location=deciding.book.heel).exists()


def test_a_repair_counts_no_counter_backwards(deciding: Deciding) -> None:
    crack = deciding.found("8", "30", counter=1000)
    said = refused(repair_of, deciding.book, crack, counter=Decimal(100))
    assert "cannot run back" in said.fields["counter"][0]


def test_an_override_stays_within_the_owners_longest_interval(deciding: Deciding) -> None:
    crack = deciding.found()
    for wrong, field in (
        ({"until_on": in_days(4000)}, "until_on"),
        ({"until_on": in_days(100), "limit": "12 t"}, "limit"),
    ):
        said = refused(deciding.reviewed, crack, verdict="continue", grounds="I say so", **wrong)
        assert said.fields[field]
