"""The verdict marks: told apart by shape and hatch, drawn in the ink of the text."""

import re
from xml.etree import ElementTree

import pytest

from logbook.figures.marks import MARKS, mark_svg

WORDS = ["continue", "watch", "restrict", "repair", "refer", "withdraw"]


def test_there_is_a_mark_for_each_verdict_in_order_of_strictness():
    assert list(MARKS) == WORDS


@pytest.mark.parametrize("word", WORDS)
def test_a_mark_is_one_wellformed_svg_without_colour_or_style(word):
    svg = mark_svg(word, 18, unit="mm")
    root = ElementTree.fromstring(svg)
    assert root.get("width") == root.get("height") == "18mm"
    assert "style" not in svg
    assert set(re.findall(r'(?:fill|stroke)="([^"]+)"', svg)) <= {
        "currentColor",
        "none",
    }


def test_outlines_and_hatches_all_differ():
    assert len({mark.outline for mark in MARKS.values()}) == 6
    hatches = [mark.hatch for mark in MARKS.values() if mark.hatch]
    assert len(hatches) == len(set(hatches)) == 4
    assert [word for word in WORDS if MARKS[word].solid] == ["withdraw"]


def test_two_marks_on_a_page_have_ids_of_their_own():
    ids = re.findall(r'id="([^"]+)"', mark_svg("watch") + mark_svg("watch"))
    assert len(ids) == len(set(ids)) == 2


def test_a_given_key_gives_the_same_bytes_and_cannot_break_out():
    assert mark_svg("repair", key="p1") == mark_svg("repair", key="p1")
    assert '"><' not in re.search(r'id="([^"]*)', mark_svg("repair", key='"><script>')).group(1)
    ElementTree.fromstring(mark_svg("repair", key='"><script>'))


def test_a_word_that_is_no_verdict_has_no_mark():
    with pytest.raises(KeyError):
        mark_svg("acceptable")
