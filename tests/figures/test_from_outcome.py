"""From contract documents to figures, complete or not."""

from copy import deepcopy

import pytest

from logbook.figures.diagram import diagram_figure
from logbook.figures.from_outcome import diagram_story, rule_marks, section_story, size_story
from logbook.figures.section import section_figure
from logbook.figures.size_usage import size_figure
from tests.figures.documents import CASE, OUTCOME
from tests.figures.stories import LOOKS


def story(case=CASE, outcome=OUTCOME, of="depth"):
    return size_story(
        what="Crack 2",
        counter="lifts",
        per_day=8.0,
        looks=LOOKS,
        of=of,
        case=case,
        outcome=outcome,
        no_growth_why="No growth is reckoned here.",
    )


def test_growth_starts_at_the_counter_of_the_last_look():
    made = story()
    assert made.worst[0] == (12600.0, 9.6)
    assert made.likely[0] == (12600.0, 8.4)
    assert made.wall_mm == 22.0
    assert made.limit_mm == pytest.approx(made.worst[-1][1])
    assert made.breaks_mm == 20.8 and made.stop_mm == 16.0
    assert made.no_growth_why == ""
    size_figure(made)


def test_a_length_is_drawn_from_its_own_column():
    made = story(of="length")
    assert made.worst[0] == (12600.0, 26.0)
    assert made.wall_mm is None


def test_a_path_that_ends_where_a_relation_ends_is_no_limit():
    outcome = deepcopy(OUTCOME)
    outcome["bounding"]["life"] |= {"ends_by": "out of range"}
    outcome["stop_size"] = {"depth_mm": 0.0001, "length_mm": 0.0003}
    made = story(outcome=outcome)
    assert made.limit_mm is None and made.worst
    assert "from which it may break" not in size_figure(made).title


def test_without_growth_the_limit_is_where_the_reserve_is_used_up():
    outcome = deepcopy(OUTCOME)
    outcome["bounding"]["life"] |= {"usage": None, "ends_by": None, "path": []}
    assert story(outcome=outcome).limit_mm == 16.0
    # A stop below a crack that holds with reserve comes from a range that ends, not from strength.
    outcome["stop_size"] = {"depth_mm": 2.0, "length_mm": 6.0}
    assert story(outcome=outcome).limit_mm is None
    outcome["bounding"]["failure"]["reserve_on_load"] = 1.1
    assert story(outcome=outcome).limit_mm == 2.0


def test_the_end_of_a_range_is_no_end_of_the_part():
    outcome = deepcopy(OUTCOME)
    outcome["critical"]["cause"] = "out of range"
    assert story(outcome=outcome).breaks_mm is None
    outcome["critical"]["cause"] = "break-through"
    assert story(outcome=outcome).breaks_how == "break through"


def test_five_rules_with_the_governing_one():
    marks = rule_marks(CASE, OUTCOME)
    assert [mark.rule for mark in marks] == [1, 2, 3, 4, 5]
    assert [mark.governs for mark in marks] == [True, False, False, False, False]
    assert marks[0].name == "life at its worst ÷ 2"
    assert marks[1].why_not == "not computed yet"


def test_the_diagram_shows_the_case_that_decides():
    made = diagram_story(what="Crack 2", case=CASE, outcome=OUTCOME)
    assert made.now == (0.42, 0.40)
    assert (made.reserve, made.asked) == (1.98, 1.4)
    diagram_figure(made)


def test_the_section_shows_the_crack_with_its_stop():
    made = section_story(what="Crack 2", case=CASE, outcome=OUTCOME)
    assert (made.shape, made.thickness_mm, made.stop_mm) == ("surface", 22.0, 16.0)
    section_figure(made)


def test_without_case_or_outcome_the_sizes_are_drawn_alone():
    made = story(case=None, outcome=None)
    assert (made.worst, made.limit_mm, made.rules) == ((), None, ())
    assert size_figure(made).title.endswith("No growth is reckoned here.")


def test_with_holes_in_the_outcome_what_is_there_is_drawn():
    hollow = {
        "bounding": {"failure": None, "life": None},
        "critical": {"depth_mm": None, "length_mm": None},
        "life": {"usage": None, "path": [], "why_not": "it does not grow"},
        "next_inspection": {"usage": None, "on": None, "governed_by": None},
        "stop_size": {"depth_mm": None, "length_mm": None},
    }
    assert diagram_story(what="Crack 2", case=CASE, outcome=hollow) is None
    assert section_story(what="Crack 2", case=CASE, outcome=hollow).stop_mm is None
    size_figure(story(outcome=hollow))


def test_a_kind_without_a_drawing_has_none():
    case = {**CASE, "crack": {"kind": "tabulated", "depth_mm": 3.0}}
    assert section_story(what="Crack 2", case=case, outcome=OUTCOME) is None
