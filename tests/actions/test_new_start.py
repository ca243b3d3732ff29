"""After a repair the crack goes on from what the inspection after could have missed."""

import json
from decimal import Decimal

from logbook.actions.propose import propose
from logbook.actions.reassess import reassess
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.models import AssessmentAsked
from tests.pages.book import basis_body

from .conftest import Deciding, Leaves
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
