"""Ground that is taken in a view."""

from logbook.figures.layers import View
from logbook.figures.place import Plan


def view() -> View:
    return View(x=(0.0, 100.0), y=(0.0, 50.0), width=400.0, height=200.0)


def test_a_line_that_runs_far_out_of_the_view_takes_only_what_it_crosses():
    plan = Plan(view())
    plan.take_line([(0.0, 0.0), (1e9, 5e8)])
    assert 30 < len(plan.taken) < 100
    assert all(rect.left < 410 and rect.bottom < 210 for rect in plan.taken)


def test_a_line_outside_the_view_takes_nothing():
    plan = Plan(view())
    plan.take_line([(200.0, 10.0), (1e9, 20.0)])
    plan.take_line([(10.0, 60.0), (20.0, 60.0)])
    assert plan.taken == []
