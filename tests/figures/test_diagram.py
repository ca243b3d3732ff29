"""The failure assessment diagram: equal scales, the ruler of load, and awkward points."""

from dataclasses import replace

import pytest

from logbook.figures.diagram import DiagramStory, diagram_figure, table, title
from tests.figures.reading import axis_values, parsed, scale, texts
from tests.figures.stories import CURVE, DIAGRAM


def test_the_title_says_whether_it_holds_and_with_what_reserve():
    assert title(DIAGRAM) == (
        "Crack 2, taken at its worst, holds at the largest load; it would break at 1.98 × this"
        " load, and 1.40 is asked for."
    )
    worse = replace(DIAGRAM, now=(0.9, 1.1), reserve=0.75)
    assert "does not hold" in title(worse)
    assert title(worse).endswith("which it lacks.")


def test_both_scales_are_equal():
    values = axis_values(diagram_figure(DIAGRAM).print_svg)
    foot = max(y for _, _, y in values)
    across = [(value, x) for value, x, y in values if abs(y - foot) < 1]
    left = min(x for _, x, _ in values)
    up = [(value, y) for value, x, y in values if abs(x - left) < 1]
    assert len(across) > 4 and len(up) > 4
    # The first and last labels are not moved inwards here, so the spacing is the scale.
    assert scale(across[1:-1])[0] == pytest.approx(-scale(up)[0], rel=0.01)


def test_the_ray_is_a_ruler_of_load():
    said = texts(diagram_figure(DIAGRAM).page_svg)
    assert {"1.2", "1.6", "1.8", "asked for: 1.40", "breaks at 1.98 ×", "2024"} <= set(said)
    for words in ("holds", "runs suddenly", "gives way by", "now, at its worst"):
        assert words in said


def test_a_residual_stress_moves_the_start_of_the_ray_and_says_so():
    story = replace(DIAGRAM, ray_start=(0.0, 0.2))
    assert "residual stress alone" in texts(diagram_figure(story).page_svg)
    assert any("residual stress alone" in note for note in table(story).notes)
    assert story.at(1.0) == pytest.approx(story.now)
    assert story.at(0.0) == (0.0, 0.2)


def test_the_limit_is_read_off_the_line_and_is_nothing_past_its_end():
    assert DIAGRAM.limit(0.0) == pytest.approx(1.0)
    assert DIAGRAM.limit(CURVE[-1][0] + 0.01) == 0.0
    assert not replace(DIAGRAM, now=(1.3, 0.01)).holds


def test_a_point_far_outside_is_said_in_words():
    story = replace(DIAGRAM, now=(0.2, 4.1), reserve=0.25, past=())
    said = texts(diagram_figure(story).page_svg)
    assert "now, beyond this picture:" in said
    assert "load ratio 0.20, toughness ratio 4.10" in said


@pytest.mark.parametrize(
    "story",
    [
        DiagramStory("Crack 1", ((0.0, 1.0), (1.0, 1.0)), (0.2, 0.5), 2.0),
        DiagramStory("Crack 1", CURVE, (0.2, 0.5)),
        replace(DIAGRAM, now=(0.0, 0.0), reserve=None),
        replace(DIAGRAM, now=(0.001, 0.001), reserve=900.0),
        replace(DIAGRAM, ring=(0.05, 0.06), decimal_sign=","),
    ],
    ids=["toughness alone", "no reserve", "no load", "hardly loaded", "ring"],
)
def test_odd_points_draw_too(story):
    parsed(diagram_figure(story).page_svg)


def test_a_line_of_one_point_is_no_line():
    with pytest.raises(ValueError, match="two points"):
        diagram_figure(replace(DIAGRAM, curve=((0.0, 1.0),)))
