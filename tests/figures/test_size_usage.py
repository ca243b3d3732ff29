"""Size against usage: what is drawn, where, and that what is not known draws too."""

import re
from dataclasses import replace
from datetime import date

import pytest

from logbook.figures import ink
from logbook.figures.size_usage import Look, SizeStory, place_of, size_figure, table, title
from tests.figures.reading import axis_values, parsed, placed, scale, texts
from tests.figures.stories import LOOKS, STORY

COLOURS = re.compile(r'(?:fill|stroke)="([^"]+)"')


def test_the_title_is_a_sentence_with_the_answer():
    said = title(STORY).replace("\N{NO-BREAK SPACE}", " ")
    assert said == (
        "Crack 2 was 8.4 mm deep on 4 May 2026; from 19.0 mm it must be taken as able to break."
        " Next look by 14 Dec 2026 or 14,400 lifts."
    )


def test_a_counter_is_never_said_to_be_later_than_it_is():
    assert STORY.count(54861.987) == "54,861 lifts"
    assert STORY.count(12.58) == "12.5 lifts"
    assert STORY.count(120.0) == "120 lifts"


def test_a_struck_size_never_is_the_answer():
    struck = replace(LOOKS[-1], struck_why="wrong crack")
    story = replace(STORY, looks=(*LOOKS[:-1], struck))
    assert "6.6" in title(story)


def test_words_of_the_picture_are_there():
    said = " | ".join(texts(size_figure(STORY).page_svg)).replace("\N{NO-BREAK SPACE}", " ")
    for words in (
        "this side", "far side", "must be taken as able to break from 19.0 mm",
        "would most likely break at 20.8 mm", "growth at its worst", "most likely",
        "next look, proposed", "14 Dec 2026", "14,400 lifts", "rule 1", "Jan 2026", "struck out",
        "ultrasonic, angle beam", "magnetic particle",
    ):  # fmt: skip
        assert words in said


def test_the_limit_line_stands_at_its_size_on_the_scale():
    svg = size_figure(STORY).print_svg
    sizes = [(value, y) for value, _, y in axis_values(svg) if value <= 22]
    slope, offset = scale(sizes)
    heavy = [(e, x, y) for e, x, y in placed(svg, "line") if e.get("stroke-width") == "4"]
    level = [y for e, x, y in heavy if float(e.get("y2")) == 0]
    assert level
    # Labels stand a little below their ticks, all by the same; the first dot tells by how much.
    dots = [y for e, x, y in placed(svg, "path") if "A" in e.get("d", "")]
    by_scale = offset + slope * 5.1
    shift = min(dots, key=lambda y: abs(y - by_scale)) - by_scale
    assert abs(shift) < 8
    assert any(abs(y - (offset + slope * 19.0 + shift)) < 1.0 for y in level)


def test_signed_is_a_violet_double_line_and_proposed_a_single_ink_line():
    proposed, signed = size_figure(STORY), size_figure(replace(STORY, signed=True))
    assert ink.VIOLET not in proposed.print_svg
    assert signed.print_svg.count(f'stroke="{ink.VIOLET}"') == 2
    assert "next look, proposed" not in texts(signed.page_svg)


def test_in_a_page_every_colour_is_a_property_of_the_page():
    found = set(COLOURS.findall(size_figure(STORY).page_svg))
    assert found <= {*ink._PROPERTIES.values(), "none", "transparent"}


@pytest.mark.parametrize("which", ["page_svg", "print_svg"])
def test_there_is_no_script_style_or_address_in_it(which):
    svg = getattr(size_figure(STORY), which)
    assert not re.search(r"<script|<style|style=|<image|href=|http(?!://www.w3.org)", svg)


def test_weight_is_said_only_where_it_is_bold():
    """The page's own weight holds else: bold in the sun."""
    svg = size_figure(STORY).page_svg
    assert set(re.findall(r'font-weight="(\w+)"', svg)) == {"bold"}


def test_two_figures_of_a_page_share_no_id():
    both = size_figure(STORY, name="a").page_svg + size_figure(STORY, name="b").page_svg
    ids = re.findall(r' id="([^"]+)"', both)
    assert ids and len(ids) == len(set(ids))
    for reference in re.findall(r"url\(#([^)]+)\)", both):
        assert reference in ids


def test_words_of_people_stay_words():
    nasty = '<script>alert(1)</script>" fill="#123456" &'
    story = SizeStory(nasty, "depth", nasty, (Look(1.0, date(2026, 1, 1), 3.0, nasty),))
    for svg in (size_figure(story).page_svg, size_figure(story).print_svg):
        root = parsed(svg)
        assert {one.tag.split("}")[1] for one in root.iter()} <= {
            "svg", "g", "path", "line", "text", "tspan", "rect", "defs", "clipPath",
        }  # fmt: skip
        assert any(nasty in text for text in texts(svg))
        assert nasty in root.get("aria-label")


def test_only_lengths_and_no_reckoning_draws_every_reading():
    looks = tuple(
        Look(10_000.0 * n, date(2026, 1, 1), 22.9 + 0.5 * n, "optical") for n in range(13)
    )
    story = SizeStory(
        "Crack 1", "length", "cycles", looks, no_growth_why="No growth: no stress is known here."
    )
    figure = size_figure(story)
    assert figure.title.endswith("No growth: no stress is known here.")
    assert len(figure.table.rows) == 13
    round_ones = re.findall(r'<path transform="translate[^>]*A[^>]*>', figure.print_svg)
    assert len(round_ones) == 13 + 1  # and one in the legend


@pytest.mark.parametrize(
    "story",
    [
        SizeStory("Crack 7", "depth", "hours", (Look(120.0, date(2026, 1, 1), None, "dye"),)),
        SizeStory("Crack 7", "length", "hours", (Look(0.0, date(2026, 1, 1), 3.2, "dye"),)),
        replace(STORY, worst=(), likely=(), next_usage=None, next_on=None, rules=()),
        replace(STORY, limit_mm=None, breaks_mm=None),
        replace(STORY, limit_mm=120.0, breaks_mm=150.0, wall_mm=300.0),
        replace(STORY, sure_mm=4.0, decimal_sign=","),
        replace(STORY, per_day=0.0001),
    ],
    ids=["no depth", "one at zero", "no reckoning", "no limit", "far limit", "sure", "slow"],
)
def test_what_is_not_known_draws_too(story):
    parsed(size_figure(story).page_svg)


def test_the_next_look_stands_at_what_comes_first_a_day_or_a_count():
    # 8 lifts a day from 12,600 on 4 May 2026: 14 Dec 2026 is 224 days on.
    assert place_of(STORY, 20000.0, date(2026, 12, 14)) == 12600 + 8 * 224
    assert place_of(STORY, 13000.0, date(2026, 12, 14)) == 13000
    assert place_of(replace(STORY, per_day=None), None, date(2026, 12, 14)) is None


def test_growth_that_goes_on_for_ages_does_not_squeeze_what_was_seen():
    worst = tuple((12600.0 + 1e5 * n, 9.6 + 0.1 * n) for n in range(50))
    svg = size_figure(replace(STORY, worst=worst, likely=())).print_svg
    assert "growth at its worst" in texts(svg)
    assert max(value for value, _, _ in axis_values(svg)) < 100_000


def test_what_most_likely_ends_it_is_named():
    through = replace(STORY, breaks_how="break through")
    assert "would most likely break through at 20.8\N{NO-BREAK SPACE}mm" in texts(
        size_figure(through).page_svg
    )


def test_nothing_at_all_is_refused():
    with pytest.raises(ValueError, match="at least one look"):
        size_figure(replace(STORY, looks=()))


def test_the_table_has_every_number_and_says_what_was_struck():
    told = table(STORY)
    assert len(told.rows) == len(LOOKS)
    assert any("struck out: read from the wrong edge" in row[-1] for row in told.rows)
    notes = " ".join(told.notes).replace("\N{NO-BREAK SPACE}", " ")
    assert "Rule 2, forecast: not computed yet." in notes
    assert "Rule 1, worst life ÷ 2: 14 Dec 2026 or 14,400 lifts (governs)." in notes


def test_same_story_same_bytes():
    assert size_figure(STORY) == size_figure(STORY)
