"""The crack to scale in the wall."""

import re

import pytest

from logbook.figures.section import SectionStory, section_figure
from tests.figures.reading import parsed

STORIES = {
    "surface": SectionStory("Crack 2", "surface", 22.0, 24.0, 8.4, 300.0, 16.0),
    "through": SectionStory("Crack 1", "through", 12.0, 60.0, None, 400.0, 90.0),
    "edge": SectionStory("Crack 1", "edge", 10.0, 25.0, None, 120.0, 40.0),
    "bar": SectionStory("Crack 5", "bar", 60.0, 24.0, 12.0, stop_mm=20.0),
}


@pytest.mark.parametrize("story", STORIES.values(), ids=STORIES)
def test_each_shape_draws_in_ink_alone(story):
    svg = section_figure(story).page_svg
    parsed(svg)
    assert set(re.findall(r'(?:fill|stroke)="([^"]+)"', svg)) <= {
        "none", "transparent", "var(--ink)", "var(--sheet)",
    }  # fmt: skip


def test_depth_and_length_have_one_scale():
    svg = section_figure(STORIES["surface"]).print_svg
    face = next(d for d in re.findall(r'd="([^"]+)"', svg) if d.count("L") > 50)
    numbers = [tuple(map(float, p)) for p in re.findall(r"([-\d.]+),([-\d.]+)", face)]
    wide = max(x for x, _ in numbers) - min(x for x, _ in numbers)
    tall = max(y for _, y in numbers) - min(y for _, y in numbers)
    assert tall / wide == pytest.approx(8.4 / 24.0, rel=1e-3)


def test_the_title_says_how_far_in():
    assert section_figure(STORIES["surface"]).title.startswith("Crack 2 reaches 38 % into")


def test_sizes_that_are_missing_are_refused_not_guessed():
    with pytest.raises(ValueError, match="without its sizes"):
        section_figure(SectionStory("Crack 2", "surface", 22.0, 24.0))
    with pytest.raises(ValueError, match="no such shape"):
        section_figure(SectionStory("Crack 2", "star", 22.0, 24.0))
