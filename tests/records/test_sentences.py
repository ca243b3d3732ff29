"""What a verdict says to the crew."""

from datetime import UTC, date, datetime
from decimal import Decimal

import pytest

from logbook.records.gather import working_steps
from logbook.records.sentences import CAUTION, count, held, moment, sentence, until

FORBIDDEN = ("disposition", "bounding", "basis", "criteria", "case", "outcome")


@pytest.mark.parametrize(
    ("verdict", "by", "said"),
    [
        ("continue", "14 Sep 2027", "May stay in use. Next look by 14 Sep 2027."),
        ("watch", "14 Sep 2027", "May stay in use. Look again early: by 14 Sep 2027."),
        ("restrict", "1 May 2027", "May be used only up to 12 t. Look again by 1 May 2027."),
        ("repair", "1 May 2027", "Repair before 1 May 2027."),
        ("repair", "", "Not back into use until repaired."),
        (
            "refer",
            "",
            "Not to be used until an engineer has decided. Asked: M. Ito, 0555 0100.",
        ),
        ("withdraw", "", "Take it out of use now. Hang the tag. Call M. Ito, 0555 0100."),
    ],
)
def test_each_verdict_says_what_to_do(verdict, by, said):
    assert sentence(verdict, by=by, limit="up to 12 t", on_call="M. Ito, 0555 0100") == said
    assert not [word for word in FORBIDDEN if word in (said + CAUTION).lower()]


def test_a_limit_in_whole_sentences_stands_by_itself():
    said = sentence("restrict", by="1 May", limit="Peak load limited to 83 %.", on_call="")
    assert said == "May be used only within the limit given here. Look again by 1 May."


def test_a_verdict_without_a_date_says_that_none_is_set():
    said = sentence("watch", by="", limit="", on_call="")
    assert said == "May stay in use. No date for the next look is set."


@pytest.mark.parametrize(
    ("verdict", "on", "out"),
    [
        ("continue", None, False),
        ("restrict", None, False),
        ("repair", date(2027, 5, 1), False),
        ("repair", None, True),
        ("refer", date(2027, 5, 1), True),
        ("withdraw", None, True),
    ],
)
def test_what_is_out_of_use(verdict, on, out):
    assert held(verdict, on, None) is out


def test_until_takes_what_there_is():
    said = until(date(2027, 9, 14), Decimal("14950.000"), "lift").replace("\xa0", " ")
    assert said == "14 Sep 2027 or 14,950 lifts"
    assert until(None, None, "lift") == ""
    assert count(Decimal("12.5"), "hours", ",").replace("\xa0", " ") == "12,5 hours"


def test_a_time_has_its_offset():
    at = datetime(2026, 5, 5, 14, 20, tzinfo=UTC)
    assert moment(at, "Europe/Berlin").replace("\xa0", " ") == "5 May 2026, 16:20 +02:00"


def test_a_long_source_is_printed_once_and_then_named_by_its_number():
    long, other = "A. Author, a paper with a long title, a journal, 1981", "B. Author, " * 8
    working = [
        {"step": "K", "value": 13.3612, "source": long},
        {"step": "again", "value": 84523.9, "source": long},
        {"step": "other", "value": "2027-06-08", "source": other},
        {"step": "short", "value": None, "source": "definition"},
    ]
    steps = working_steps(working)
    assert [one.source for one in steps] == [
        f"1: {long}", "source 1, above", f"2: {other}", "definition",
    ]  # fmt: skip
    assert [one.value for one in steps] == ["13.36", "84,523.9", "2027-06-08", ""]
