"""Invented cracks to draw."""

from datetime import date
from math import exp

from logbook.figures.diagram import DiagramStory
from logbook.figures.size_usage import Look, RuleMark, SizeStory


def look(usage, on, size_mm, **more):
    return Look(usage, on, size_mm, more.pop("method", "ultrasonic, angle beam"), **more)


LOOKS = (
    look(6100.0, date(2024, 1, 15), 5.1, low_mm=3.9, high_mm=6.3),
    look(8000.0, date(2024, 9, 2), 5.9, method="magnetic particle"),
    look(9900.0, date(2025, 5, 12), 7.8, struck_why="read from the wrong edge"),
    look(9900.0, date(2025, 5, 12), 6.6, low_mm=5.4, high_mm=7.8),
    look(12600.0, date(2026, 5, 4), 8.4, low_mm=7.2, high_mm=9.6),
)

STORY = SizeStory(
    what="Crack 2",
    of="depth",
    counter="lifts",
    looks=LOOKS,
    per_day=8.0,
    wall_mm=22.0,
    worst=tuple((12600.0 + 40 * n, 9.6 * exp(n / 130)) for n in range(90)),
    likely=tuple((12600.0 + 80 * n, 8.4 * exp(n / 95)) for n in range(100)),
    limit_mm=19.0,
    breaks_mm=20.8,
    next_usage=14400.0,
    next_on=date(2026, 12, 14),
    rules=(
        RuleMark(1, "worst life ÷ 2", 14400.0, date(2026, 12, 14), governs=True),
        RuleMark(2, "forecast", why_not="not computed yet"),
        RuleMark(3, "what the method can miss", why_not="not computed yet"),
        RuleMark(4, "longest interval", 15500.0, date(2027, 5, 4)),
        RuleMark(5, "fixed date of the owner", 15560.0, date(2027, 5, 10)),
    ),
)

CURVE = tuple(
    (lr, (1 + 0.5 * lr**2) ** -0.5 * (0.3 + 0.7 * exp(-0.6 * lr**6)))
    for lr in (1.2 * n / 60 for n in range(61))
)

DIAGRAM = DiagramStory(
    what="Crack 2",
    curve=CURVE,
    now=(0.42, 0.40),
    reserve=1.98,
    asked=1.4,
    past=(((0.33, 0.28), "2024"), ((0.36, 0.32), "2025")),
)
