"""Reading an entry: every complaint beside its field, nothing guessed, nothing lost."""

import datetime
import uuid
from dataclasses import replace
from decimal import Decimal
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from logbook.entry import Known, KnownCrack, KnownLocation, read_inspection, text
from logbook.errors import Refusal

TODAY = datetime.date(2026, 5, 4)
KNOWN = Known(
    component=7,
    today=TODAY,
    last_found_on=datetime.date(2026, 1, 12),
    last_counter=Decimal(1200),
    locations={
        1: KnownLocation(1, "heel", Decimal(22), Decimal(300)),
        2: KnownLocation(2, "toe"),
    },
    cracks={
        2: KnownCrack(2, 1, False, Decimal("8.4"), Decimal(30), Decimal("0.5"), Decimal(1)),
        3: KnownCrack(3, 1, True),
        4: KnownCrack(4, 2),
    },
)


def crack(**more: Any) -> dict[str, Any]:
    return {
        "location": 1,
        "what": "crack",
        "crack": "2",
        "depth_basis": "measured",
        "depth_mm": "8.6",
        "length_mm": "31",
    } | more


def entry(*findings: dict[str, Any], **more: Any) -> dict[str, Any]:
    return {
        "key": str(uuid.uuid4()),
        "found_on": "2026-05-04",
        "counter": "1260",
        "method": "ultrasound",
        "procedure": "UT-07",
        "procedure_revision": "C",
        "instrument": "flaw detector 12",
        "calibration_valid_until": "2026-12-31",
        "surface": "bare",
        "coverage": "all of it",
        "inspector_name": "I. Brandt",
        "qualification_level": "level 2",
        "qualification_valid_until": "2027-01-31",
        "findings": list(findings) or [crack()],
    } | more


def complaints(data: Any) -> dict[str, list[str]]:
    with pytest.raises(Refusal) as refused:
        read_inspection(data, KNOWN)
    assert refused.value.status == 400
    return refused.value.fields


def test_a_good_entry_is_frozen_as_typed() -> None:
    draft = read_inspection(entry(crack(depth_mm="8,6")), KNOWN)
    sizes = draft.findings[0].sizes
    assert sizes is not None
    assert (sizes.depth_mm, sizes.length_mm) == (Decimal("8.6"), Decimal(31))
    assert "8,6" in sizes.typed
    with pytest.raises(AttributeError):
        draft.counter = Decimal(0)  # type: ignore[misc]


@pytest.mark.parametrize(
    ("change", "field", "words"),
    [
        ({"found_on": "2026-05-05"}, "found_on", "in the future"),
        ({"found_on": "2025-12-01"}, "found_on", "The last look here was on 12 Jan 2026"),
        ({"found_on": "4 May"}, "found_on", "year-month-day"),
        ({"counter": "1100"}, "counter", "cannot run back"),
        ({"counter": "1,234.5"}, "counter", "both comma and point"),
        ({"counter": "-5"}, "counter", "not a number"),
        ({"counter": True}, "counter", "Write a number"),
        ({"counter": ""}, "counter", "Read the counter"),
        ({"method": " "}, "method", "how you looked"),
        ({"calibration_valid_until": ""}, "calibration_valid_until", "calibration"),
        ({"qualification_valid_until": ""}, "qualification_valid_until", "qualification"),
        ({"key": "7"}, "key", "UUID"),
        ({"written_at": "2026-05-04T09:55:00"}, "written_at", "offset"),
        ({"surface": "x" * 200}, "surface", "at most 120"),
        ({"surface": "a\x00b"}, "surface", "cannot be printed"),
        ({"surface": "a\ud800b"}, "surface", "cannot be printed"),
        ({"written_at": "0001-01-01T00:00:00+00:00"}, "written_at", "clock of the tablet"),
        ({"findings": []}, "findings", "at least one place"),
        ({"findings": "all"}, "findings", "at least one place"),
        ({"findings": [crack()] * 201}, "findings", "at most 200"),
    ],
)
def test_complaints_about_the_visit(change: dict[str, Any], field: str, words: str) -> None:
    said = complaints(entry(**change))
    assert words in " ".join(said[field])


@pytest.mark.parametrize(
    ("finding", "field", "words"),
    [
        (crack(depth_mm="24"), "depth_mm", "24 mm is deeper than the wall (22 mm)"),
        (crack(length_mm="310"), "length_mm", "longer than the part is wide here (300 mm)"),
        (crack(depth_mm="0.86"), "depth_mm", "Check the decimal point"),
        (crack(length_mm="299"), "length_mm", "Check the decimal point"),
        (crack(depth_mm="6.5"), "depth_mm", "a crack does not shrink"),
        (crack(depth_mm="0"), "depth_mm", "above 0"),
        (crack(location=2, crack="new", length_mm="1000000"), "length_mm", "a kilometre"),
        (crack(depth_mm="8.12345"), "depth_mm", "at most 3 digits"),
        (crack(depth_mm=""), "depth_mm", "Type the depth"),
        (crack(depth_basis="guessed"), "depth_basis", "how the depth is known"),
        (crack(depth_basis="not-measured"), "depth_mm", "Keep one"),
        (crack(depth_basis="not-measured", depth_mm="", length_mm=""), "length_mm", "Type the"),
        (crack(crack="9"), "crack", "no crack 9 at this place"),
        (crack(crack="4"), "crack", "no crack 4 at this place"),
        (crack(crack="3"), "crack", "was closed"),
        (crack(crack=""), "crack", "which crack it is"),
        (crack(location=99), "location", "not on this component"),
        (crack(location="x"), "location", "at which place"),
        ({"location": 1, "what": "gone"}, "what", "what you see here"),
        ({"location": 1, "what": "could-not-look"}, "why", "why you could not look"),
        ({"location": 1, "what": "known-not-seen", "crack": "2"}, "why", "could not be seen"),
        (crack(photos=["nonsense"]), "photos", "SHA-256"),
        (
            {"new_location": {"name": "", "described": "behind"}, "what": "nothing"},
            "new_location.name",
            "short name",
        ),
    ],
)
def test_complaints_about_a_finding(finding: dict[str, Any], field: str, words: str) -> None:
    said = complaints(entry(finding))
    assert words in " ".join(said[f"findings.0.{field}"])


@pytest.mark.parametrize(
    "data",
    [
        entry(counter="20", counter_replaced_why="new counter fitted"),
        entry(found_on="2025-12-01", counter="1000", late_why="found in a note book"),
        entry(crack(depth_mm="6.5", why_smaller="ground out by 2 mm")),
        entry(crack(depth_mm="8.0")),  # within the sizing error of both looks
        entry(crack(length_mm="180", confirm_unlikely="on")),
        entry(crack(depth_basis="at-least")),
        entry(crack(depth_basis="not-measured", depth_mm="")),
        entry(instrument="eye", calibration_valid_until=""),
        entry(crack(crack="new"), crack(crack="new", depth_mm="3")),
        entry({"new_location": {"name": "lug", "described": "behind it"}, "what": "nothing"}),
    ],
)
def test_what_can_be_real_is_read(data: dict[str, Any]) -> None:
    read_inspection(data, KNOWN)


def test_one_place_has_one_answer() -> None:
    nothing = {"location": 1, "what": "nothing"}
    assert complaints(entry(nothing, nothing))
    assert complaints(entry(crack(), {"location": 1, "what": "could-not-look", "why": "wet"}))
    assert complaints(entry(crack(), crack()))


def test_nothing_found_where_a_crack_is_known_is_asked_back() -> None:
    said = complaints(entry({"location": 1, "what": "nothing"}))
    assert "Crack 2 is known here" in " ".join(said["findings.0.what"])


@given(
    st.recursive(
        st.none() | st.booleans() | st.floats() | st.text() | st.integers(),
        lambda inner: st.lists(inner) | st.dictionaries(st.text(), inner),
        max_leaves=20,
    )
)
def test_odd_content_is_refused_and_never_a_fault(odd: Any) -> None:
    for data in (odd, entry(odd), entry(counter=odd), entry(crack(depth_mm=odd, location=odd))):
        try:
            read_inspection(data, KNOWN)
        except Refusal as refused:
            assert refused.sentence


@given(st.decimals(0, 99999, places=2, allow_nan=False))
def test_comma_and_point_read_alike(value: Decimal) -> None:
    typed = f"{value:f}"
    assert text.decimal(typed) == text.decimal(typed.replace(".", ",")) == value


def test_someone_without_a_qualification_needs_no_date_for_it() -> None:
    data = entry(qualification_level="none", qualification_valid_until="")
    assert read_inspection(data, KNOWN).qualification_valid_until is None
    with pytest.raises(Refusal):
        read_inspection(entry(qualification_level="2", qualification_valid_until=""), KNOWN)


def test_a_listed_place_is_not_written_as_an_unlisted_one() -> None:
    name = next(iter(KNOWN.locations.values())).name
    new = {"name": name.upper(), "described": "there"}
    with pytest.raises(Refusal) as refused:
        read_inspection(entry({"new_location": new, "what": "nothing"}), KNOWN)
    assert "listed already" in refused.value.fields["findings.0.new_location.name"][0]


def test_a_leap_of_the_counter_is_asked_back_once() -> None:
    """20 a day explain about 20 × 20 × (112 + 30) more than the 1,200 of January."""
    known = replace(KNOWN, per_day=Decimal(20))
    assert read_inspection(entry(counter="50000"), known).counter == 50000
    with pytest.raises(Refusal) as refused:
        read_inspection(entry(counter="126000"), known)
    assert "Check the digits" in refused.value.fields["counter"][0]
    data = entry(counter="126000", confirm_counter="yes")
    assert read_inspection(data, known).counter == 126_000
