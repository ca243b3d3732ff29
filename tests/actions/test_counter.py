"""A replaced counter and a mistyped reading: usage is never a difference of two counters."""

import json
from decimal import Decimal

from logbook import clock
from logbook.actions import standing
from logbook.actions.propose import propose
from logbook.actions.strike_out import strike_out
from logbook.models import Assessment, AssessmentAsked, Finding, Standing

from .conftest import Deciding


def answer_all() -> None:
    for location, crack in AssessmentAsked.objects.values_list("location", "crack").distinct():
        propose(location, crack)


def replaced(deciding: Deciding, crack_number: int, counter: int = 10) -> None:
    deciding.found(
        "3.1", "12.4", str(crack_number), counter=counter, head={"counter_replaced_why": "broke"}
    )


def test_a_date_in_readings_of_the_old_counter_does_not_outlive_it(deciding: Deciding) -> None:
    crack = deciding.found(counter=1000)
    d = deciding.sign(deciding.reviewed(crack))
    assert d.until_at is not None and d.until_at > 1000
    replaced(deciding, crack.number)
    row, newest = deciding.standing(crack), deciding.newest(crack)
    assert newest.until_at is not None and newest.until_at < d.until_at
    # The signed limit in old readings would never come: the new one binds, as a proposal.
    assert (row.state, row.due_at) == ("proposed-binding", newest.until_at)
    assert row.counter == 10


def test_a_place_last_looked_at_on_the_old_counter_is_referred(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found(counter=1000)
    toe = {"location": book.toe.pk, "what": "could-not-look", "why": "flooded"}
    book.log(
        clock.today("Europe/Budapest").isoformat(),
        5,
        toe,
        head={"counter_replaced_why": "new counter fitted"},
    )
    answer_all()
    newest = deciding.newest(crack)
    assert newest.verdict == "refer" and "found replaced" in json.loads(newest.reasons)[0]
    assert deciding.standing(crack).held


def test_a_visit_struck_out_whole_takes_its_reading_back(deciding: Deciding) -> None:
    crack = deciding.found(counter=1000)
    leap = {"confirm_counter": "yes"}
    deciding.found("3.1", "12.4", str(crack.number), counter=900_000, head=leap)
    assert standing.last_counter(deciding.book.gate) == 900_000
    wrong = Finding.objects.order_by("-pk")[0]
    strike_out(deciding.book.people["crew"], wrong.pk, "the counter was misread by a digit")
    answer_all()
    assert standing.last_counter(deciding.book.gate) == 1000
    assert Standing.objects.get(crack=crack).counter == 1000
    case = json.loads(str(deciding.newest(crack).case_text), parse_float=Decimal)
    assert case["as_of"]["at"] == 1000 and case["usage"]["at"] == 1000
    # The right reading is not taken for a counter that runs back.
    deciding.found("3.1", "12.4", str(crack.number), counter=1100)


def test_a_corrected_size_leaves_the_reading(deciding: Deciding) -> None:
    crack = deciding.found(counter=1000)
    deciding.found("3.1", "12.4", str(crack.number), counter=1100)
    wrong = Finding.objects.order_by("-pk")[0]
    right = {"depth_basis": "measured", "depth_mm": "3,3", "length_mm": "12.6"}
    strike_out(deciding.book.people["crew"], wrong.pk, "read upside down", right)
    assert standing.last_counter(deciding.book.gate) == 1100
    assert Assessment.objects.filter(crack=crack).count() == 2
