"""Slant hatch as plain strokes, cut to a region by asking of points along each stroke."""

from collections.abc import Callable

from .layers import Point, View

APART = 9.0
STEPS = 240


def slant_hatch(
    view: View, inside: Callable[[float, float], bool], *, apart: float = APART
) -> list[tuple[Point, Point]]:
    """Strokes that rise to the right at 45 degrees, ``apart`` px across, where inside says so.

    inside : (x, y) in the view's data units -> bool
    """
    found: list[tuple[Point, Point]] = []
    step = apart * 2**0.5
    start = -view.height
    while start < view.width:
        found += _runs(view, inside, start)
        start += step
    return found


def _runs(
    view: View, inside: Callable[[float, float], bool], start: float
) -> list[tuple[Point, Point]]:
    """The parts inside of the stroke that leaves the view's bottom edge ``start`` px from left."""
    low, high = max(0.0, -start), min(view.height, view.width - start)
    if high <= low:
        return []
    runs: list[tuple[Point, Point]] = []
    begun: Point | None = None
    last: Point | None = None
    for n in range(STEPS + 1):
        up = low + (high - low) * n / STEPS
        here = (view.x[0] + (start + up) * view.px_x, view.y[0] + up * view.px_y)
        if inside(*here):
            begun = begun or here
            last = here
        elif begun and last:
            runs.append((begun, last))
            begun = last = None
    if begun and last:
        runs.append((begun, last))
    return runs
