"""A correction is read as an entry is: against the wall, and against the size before."""

import pytest

from logbook.actions.strike_out import strike_out
from logbook.models import Finding

from .conftest import Deciding
from .test_deciding import refused


@pytest.fixture
def wrong(deciding: Deciding) -> Finding:
    crack = deciding.found("3", "12", counter=1000)
    deciding.found("3.4", "13", str(crack.number), counter=1100)
    return Finding.objects.order_by("-pk")[0]


@pytest.mark.parametrize(
    ("right", "field", "words"),
    [
        ({"depth_mm": "2400", "length_mm": "13"}, "depth_mm", "deeper than the wall"),
        ({"depth_mm": "16", "length_mm": "13"}, "depth_mm", "Check the decimal point"),
        ({"depth_mm": "0", "length_mm": "13"}, "depth_mm", "above 0"),
        ({"depth_mm": "three", "length_mm": "13"}, "depth_mm", "not a number"),
        ({"depth_mm": "1.0", "length_mm": "13"}, "depth_mm", "does not shrink"),
        ({"length_mm": "13"}, "depth_mm", "Type the depth"),
        ({"depth_basis": "guessed", "depth_mm": "3"}, "depth_basis", "how the depth is known"),
    ],
)
def test_each_size_that_cannot_be_is_refused_beside_its_field(
    deciding: Deciding, wrong: Finding, right: dict[str, str], field: str, words: str
) -> None:
    said = refused(
        strike_out, deciding.book.people["crew"], wrong.pk, "wrong gate",
        {"depth_basis": "measured"} | right,
    )  # fmt: skip
    assert any(words in one for one in said.fields[field]), said.fields
    assert not hasattr(Finding.objects.get(pk=wrong.pk), "strike_out")


def test_a_smaller_size_takes_its_reason(deciding: Deciding, wrong: Finding) -> None:
    right = {
        "depth_basis": "measured", "depth_mm": "1.0", "length_mm": "5",
        "why_smaller": "other flaw measured before",
    }  # fmt: skip
    made = strike_out(deciding.book.people["crew"], wrong.pk, "wrong gate", right)
    assert made.replaced_by is not None
    assert made.replaced_by.measurement.why_smaller == "other flaw measured before"


def test_what_is_no_crack_has_no_size_to_correct(deciding: Deciding) -> None:
    book = deciding.book
    made = book.log("2026-11-20", 1000, {"location": book.heel.pk, "what": "nothing"})
    right = {"depth_basis": "measured", "depth_mm": "1", "length_mm": "4"}
    said = refused(strike_out, book.people["crew"], made.findings.get().pk, "x", right)
    assert said.fields["depth_basis"]
