"""Size against usage: the crack as it was found, as it is reckoned to grow, and where it must stop.

The picture is a cut through the metal: its bottom edge is this side, its top edge the far side.
Counter below, dates above. Nothing in it is computed here but where things stand on paper.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date, timedelta
from itertools import pairwise
from math import floor

from . import ink
from .drawing import Chart, Figure, Table, draw
from .hatch import slant_hatch
from .layers import Point, View, band, boxes, dots, many_words, path, segments, text_width, words
from .place import Place, Plan
from .words import MONTHS, day, millimetres, number

WIDTH, HEIGHT, STRIP = 432.0, 330.0, 56.0
# One outline a method, in the order in which the methods first appear. Octagon and triangle are
# left out: they are public safety signs.
OUTLINES = ("circle", "square", "diamond", "cross")
DOT = 90.0
# A limit is drawn where it lies within this many times the largest size seen.
FAR = 6.0


@dataclass(frozen=True)
class Look:
    """One size as somebody measured it.

    usage : counter reading; size_mm : the size that is drawn, None where it was not measured;
    low_mm, high_mm : the 95 % bar, None where the sizing error is not stated; entry : its number
    """

    usage: float
    on: date
    size_mm: float | None
    method: str
    low_mm: float | None = None
    high_mm: float | None = None
    note: str = ""
    struck_why: str = ""
    entry: int | None = None

    @property
    def struck(self) -> bool:
        return bool(self.struck_why)


@dataclass(frozen=True)
class RuleMark:
    """One of the five rules for the next look. name : as people say it; why_not : if none."""

    rule: int
    name: str
    usage: float | None = None
    on: date | None = None
    why_not: str = ""
    governs: bool = False


@dataclass(frozen=True)
class Band:
    """A part of the forecast: (usage, low, high) in mm, labelled at its end."""

    label: str
    edges: tuple[tuple[float, float, float], ...]


@dataclass(frozen=True)
class SizeStory:
    """All that the figure shows.

    of : "depth" or "length", the size that is drawn; what : who is meant, e.g. "Crack 2"
    counter : what is counted, e.g. "lifts"; per_day : for dates beyond those known
    wall_mm : from this side to the far side, None where not known
    worst, likely : (usage, mm) from the last look on; empty where nothing can be reckoned
    limit_mm : from here on it must be taken as able to break; breaks_mm : most likely breaks, or
    breaks through (breaks_how)
    stop_mm : a size found at or beyond this stops the use; sure_mm : the smallest crack that the
    method is sure to find
    next_look : (usage or None, date or None); signed : by a licensed hand
    no_growth_why : why no growth is drawn, a sentence
    """

    what: str
    of: str
    counter: str
    looks: tuple[Look, ...]
    per_day: float | None = None
    wall_mm: float | None = None
    near_side: str = "this side"
    far_side: str = "far side"
    worst: tuple[Point, ...] = ()
    likely: tuple[Point, ...] = ()
    limit_mm: float | None = None
    breaks_mm: float | None = None
    breaks_how: str = "break"
    stop_mm: float | None = None
    sure_mm: float | None = None
    next_usage: float | None = None
    next_on: date | None = None
    signed: bool = False
    rules: tuple[RuleMark, ...] = ()
    bands: tuple[Band, ...] = ()
    no_growth_why: str = ""
    decimal_sign: str = "."

    def mm(self, value: float) -> str:
        return millimetres(value, self.decimal_sign)

    def count(self, value: float) -> str:
        """Rounded down, so that a limit is never said to be later than it is."""
        small = abs(value) < 1000 and not float(value).is_integer()
        down = floor(value * 10) / 10 if small else floor(value)
        return f"{number(down, 1 if small else 0, self.decimal_sign)} {self.counter}"


def size_figure(story: SizeStory, *, name: str = "size") -> Figure:
    """Raises ValueError where there is not one look to draw."""
    if not story.looks:
        raise ValueError("size against usage needs at least one look")
    return draw(name, title(story), _chart(story), table(story), decimal_sign=story.decimal_sign)


def last_measured(story: SizeStory) -> Look | None:
    sizes = [look for look in story.looks if look.size_mm is not None and not look.struck]
    return max(sizes, key=lambda look: (look.on, look.usage)) if sizes else None


def title(story: SizeStory) -> str:
    """The answer in a sentence."""
    last = last_measured(story)
    if last is None or last.size_mm is None:
        begun = f"{story.what}: no size that counts is on record."
    else:
        across = "deep" if story.of == "depth" else "long"
        begun = f"{story.what} was {story.mm(last.size_mm)} {across} on {day(last.on)}"
        if story.limit_mm is None:
            begun += "."
        elif last.size_mm >= story.limit_mm:
            begun += f", past the {story.mm(story.limit_mm)} from which it may break."
        else:
            begun += f"; from {story.mm(story.limit_mm)} it must be taken as able to break."
    return " ".join(part for part in (begun, _next(story), story.no_growth_why) if part)


def _next(story: SizeStory) -> str:
    parts = []
    if story.next_on is not None:
        parts.append(day(story.next_on))
    if story.next_usage is not None:
        parts.append(story.count(story.next_usage))
    return f"Next look by {' or '.join(parts)}." if parts else ""


def table(story: SizeStory) -> Table:
    """Every number that the figure shows."""
    rows = []
    for look in sorted(story.looks, key=lambda look: (look.on, look.usage)):
        size = "not measured" if look.size_mm is None else story.mm(look.size_mm)
        spread = "not stated"
        if look.low_mm is not None and look.high_mm is not None:
            spread = f"{story.mm(look.low_mm)} to {story.mm(look.high_mm)}"
        said = "; ".join(
            part
            for part in (look.note, f"struck out: {look.struck_why}" if look.struck else "")
            if part
        )
        rows.append((day(look.on), story.count(look.usage), size, spread, look.method, said))
    notes = []
    if story.limit_mm is not None:
        notes.append(f"Must be taken as able to break from {story.mm(story.limit_mm)}.")
    if story.breaks_mm is not None:
        notes.append(f"Would most likely {story.breaks_how} at {story.mm(story.breaks_mm)}.")
    if story.stop_mm is not None:
        notes.append(f"Stop when {story.mm(story.stop_mm)} or more is found.")
    if story.sure_mm is not None:
        notes.append(f"Smallest crack that the method is sure to find: {story.mm(story.sure_mm)}.")
    for label, points in (("At worst", story.worst), ("Most likely", story.likely)):
        if points:
            usage, size_mm = points[-1]
            notes.append(
                f"{label} it grows to {story.mm(size_mm)} at {story.count(usage)}, where the"
                " reckoning ends."
            )
    for rule in story.rules:
        when = [] if rule.on is None else [day(rule.on)]
        when += [] if rule.usage is None else [story.count(rule.usage)]
        said = " or ".join(when) or rule.why_not or "none"
        governs = " (governs)" if rule.governs else ""
        notes.append(f"Rule {rule.rule}, {rule.name}: {said}{governs}.")
    headings = ("found on", "counter", story.of, "95 in 100 lie between", "method", "remark")
    return Table(headings, tuple(rows), tuple(notes))


def place_of(story: SizeStory, usage: float | None, on: date | None) -> float | None:
    """The counter reading of what comes first, a count or a day; None where neither is known.

    A day becomes a reading by ``per_day`` from the last look on, as the dates above the picture do.
    """
    places = [] if usage is None else [usage]
    if on is not None and story.per_day:
        last = max(story.looks, key=lambda look: (look.on, look.usage))
        places.append(last.usage + story.per_day * (on - last.on).days)
    return min(places, default=None)


# --- how far the picture reaches ---------------------------------------------------------------


def _usage_reach(story: SizeStory) -> Point:
    seen = [look.usage for look in story.looks]
    low, last = min(seen), max(seen)
    due = place_of(story, story.next_usage, story.next_on)
    ahead = [points[-1][0] for points in (story.worst,) if points]
    ahead += [
        at for rule in story.rules if (at := place_of(story, rule.usage, rule.on)) is not None
    ]
    # Far growth must not squeeze what was seen into a corner: five times its span at most, but
    # always past the next look.
    least = last if due is None else max(last, due)
    span = max(least - low, abs(last) * 0.02, 1.0)
    far = max([last, *ahead])
    high = max(least, min(far, low + 5 * span))
    room = 0.06 * max(high - low, span)
    return (max(0.0, low - room) if low >= 0 else low - room, high + room)


def _size_reach(story: SizeStory) -> Point:
    sizes = [
        value for look in story.looks for value in (look.size_mm, look.high_mm) if value is not None
    ]
    seen = max(sizes, default=0.0)
    # A limit far above what was seen is said in words, or the sizes would be a line at the foot.
    levels = [level for level in (story.limit_mm, story.breaks_mm, story.sure_mm) if level]
    sizes += [level for level in levels if seen == 0.0 or level <= FAR * seen]
    if story.limit_mm is not None and story.limit_mm not in sizes:
        sizes.append(2.5 * seen)
    biggest = max(sizes, default=1.0)
    if story.wall_mm is not None and biggest * 1.02 <= story.wall_mm <= 2.5 * biggest:
        return (0.0, story.wall_mm)
    if story.wall_mm is not None and story.wall_mm < biggest * 1.02:
        return (0.0, max(story.wall_mm, biggest) * 1.08)
    return (0.0, biggest * 1.35)


# --- drawing -----------------------------------------------------------------------------------


def _chart(story: SizeStory) -> Chart:
    usage, size = _usage_reach(story), _size_reach(story)
    view = View(usage, size, WIDTH, HEIGHT, _counter_axis(story, usage), _size_axis(story))
    strip = View((0.0, 1.0), view.y, STRIP, HEIGHT)
    row: Chart = {
        "hconcat": [
            {"width": STRIP, "height": HEIGHT, "layer": _strip(story, strip)},
            {"width": WIDTH, "height": HEIGHT, "layer": _plot(story, view)},
        ],
        "spacing": 6,
    }
    return {"vconcat": [row, _legend(story)], "spacing": 10}


def _strip(story: SizeStory, view: View) -> list[Chart]:
    """The wall, cut across the crack: its depth is to the scale of the plot beside it."""
    top = view.y[1] if story.wall_mm is None else min(story.wall_mm, view.y[1])
    layers = [boxes(view, [((0.0, 0.0), (1.0, top))], ink.SHEET)]
    sides: list[tuple[Point, Point]] = [
        ((0.0, 0.0), (0.0, top)),
        ((1.0, 0.0), (1.0, top)),
        ((0.0, 0.0), (1.0, 0.0)),
    ]
    if story.wall_mm is not None and story.wall_mm <= view.y[1]:
        sides.append(((0.0, top), (1.0, top)))
    layers.append(segments(view, sides, ink.INK, 2))
    if story.limit_mm is not None and story.limit_mm < view.y[1]:
        layers.append(segments(view, [((0.0, story.limit_mm), (1.0, story.limit_mm))], ink.INK, 4))
    name = words(view, (0.0, view.y[1]), f"{story.of}, mm", align="left", dy=-34)
    layers.append(name)
    if story.wall_mm is not None:
        layers.append(words(view, (0.5, 0.0), story.near_side, dy=15))
        if story.wall_mm <= view.y[1]:
            layers.append(words(view, (0.5, top), story.far_side, dy=-13))
    last = last_measured(story)
    if last is not None and last.size_mm is not None:
        layers += _gash(view, last.size_mm)
    return layers


def _gash(view: View, size_mm: float) -> list[Chart]:
    """An open crack: wide at the mouth, a point at its tip."""
    rows = [{"y": 0.0, "x": 0.38, "x2": 0.62}, {"y": size_mm, "x": 0.5, "x2": 0.5}]
    mark = {"type": "area", "color": ink.INK, "opacity": 1, "orient": "horizontal"}
    encoding = view.encoding(x2={"field": "x2"})
    return [{"data": {"values": rows}, "mark": mark, "encoding": encoding}]


def _plot(story: SizeStory, view: View) -> list[Chart]:
    plan = Plan(view)
    _take_what_is_drawn(story, plan)
    strokes = _dates(story, view)
    for wash, one in zip((ink.WASH_2, ink.WASH_1), story.bands[:2], strict=False):
        strokes.append(band(view, one.edges, wash))
    if len(story.likely) > 1:
        strokes.append(path(view, story.likely, ink.PENCIL, 2, strokeDash=[2, 4]))
    if len(story.worst) > 1:
        strokes.append(path(view, story.worst, ink.INK, 2))
    strokes += _next_look(story, view)
    strokes += _rule_ticks(story, view)
    strokes += _looks(story, view)
    strokes += _levels(story, view)
    _put_level_words(story, plan)
    _put_growth_words(story, plan)
    _put_rule_words(story, plan)
    return [*_hatch(story, view), *plan.plates(), *strokes, *plan.words()]


def _take_what_is_drawn(story: SizeStory, plan: Plan) -> None:
    """Before any words are placed, so that none covers a size or a line."""
    for look in story.looks:
        if look.size_mm is not None:
            plan.take_point((look.usage, look.size_mm), reach=9)
            ends = (look.low_mm, look.high_mm)
            plan.take_line([(look.usage, end) for end in ends if end is not None])
    for points in (story.worst, story.likely):
        plan.take_line(points)
    view = plan.view
    for level in (story.limit_mm, story.breaks_mm, story.sure_mm):
        if level is not None:
            plan.take_line([(view.x[0], level), (view.x[1], level)])
    due = place_of(story, story.next_usage, story.next_on)
    if due is not None:
        plan.take_line([(due, view.y[0]), (due, view.y[1])])
    for at, rule in _rules_in(story, view):
        plan.take_line([(at, view.y[0]), (at, view.y[0] + _tick(rule) * view.px_y)])


def _tick(rule: RuleMark) -> float:
    """Height in px: the governing rule's tick is the long one."""
    return 30.0 if rule.governs else 10.0


def _counter_axis(story: SizeStory, usage: Point) -> Chart:
    return {
        "orient": "bottom",
        "title": f"counter: {story.counter}",
        "titleAnchor": "start",
        "format": ",d" if usage[1] - usage[0] >= 8 else ",.1f",
        "tickCount": 5,
        "labelFlush": False,
    }


def _size_axis(story: SizeStory) -> Chart:
    return {
        "orient": "left",
        "title": None,
        "format": ",~f",
        "tickCount": 6,
    }


def _known_days(story: SizeStory) -> list[tuple[float, date]]:
    """Counter and date where both are known, each later by both; the rest cannot be told."""
    pairs = [(look.usage, look.on) for look in story.looks]
    pairs += [
        (rule.usage, rule.on)
        for rule in story.rules
        if rule.usage is not None and rule.on is not None and rule.governs
    ]
    kept: list[tuple[float, date]] = []
    for usage, on in sorted(pairs, key=lambda pair: (pair[1], pair[0])):
        if not kept or (usage > kept[-1][0] and on > kept[-1][1]):
            kept.append((usage, on))
    return kept


def _date_ticks(story: SizeStory, view: View) -> list[tuple[float, str]]:
    """Firsts of months or years as counter readings, by the counter's own history."""
    known = _known_days(story)
    if story.per_day:
        first, last = known[0], known[-1]
        before = (first[0] - view.x[0]) / story.per_day
        after = (view.x[1] - last[0]) / story.per_day
        if max(before, after) > 365 * 80:
            return []
        if before >= 1:
            known.insert(0, (view.x[0], first[1] - timedelta(days=int(before))))
        if after >= 1:
            known.append((view.x[1], last[1] + timedelta(days=int(after))))
    if len(known) < 2:
        return []
    days = (known[-1][1] - known[0][1]).days
    months = next((m for m in (1, 2, 3, 6, 12, 24, 60, 120) if days / (30.4 * m) <= 6), 240)
    ticks = []
    month = known[0][1].year * 12
    while date(month // 12, month % 12 + 1, 1) <= known[-1][1]:
        on = date(month // 12, month % 12 + 1, 1)
        if on >= known[0][1]:
            ticks.append((_usage_on(known, on), f"{MONTHS[on.month - 1]} {on.year}"))
        month += months
    return ticks


def _usage_on(known: Sequence[tuple[float, date]], on: date) -> float:
    for (usage1, on1), (usage2, on2) in pairwise(known):
        if on1 <= on <= on2:
            return usage1 + (usage2 - usage1) * (on - on1).days / (on2 - on1).days
    raise ValueError(f"{on} lies outside the days known")


def _dates(story: SizeStory, view: View) -> list[Chart]:
    top, tick = view.y[1], 6 * view.px_y
    ticks = [((view.x[0], top), (view.x[1], top))]
    put: list[tuple[Point, tuple[str, ...]]] = []
    free = view.x[0] - view.px_x * 34
    for usage, text in _date_ticks(story, view):
        ticks.append(((usage, top), (usage, top + tick)))
        half = (text_width(text) / 2 + 6) * view.px_x
        if usage - half > free and usage + half < view.x[1] + 30 * view.px_x:
            put.append(((usage, top), (text,)))
            free = usage + half
    named = [many_words(view, put, dy=-15)] if put else []
    return [segments(view, ticks, ink.RULE, 1), *named]


def _hatch(story: SizeStory, view: View) -> list[Chart]:
    if story.limit_mm is None or story.limit_mm >= view.y[1]:
        return []
    limit = story.limit_mm
    return [segments(view, slant_hatch(view, lambda x, y: y >= limit), ink.PENCIL, 1)]


def _next_look(story: SizeStory, view: View) -> list[Chart]:
    at = place_of(story, story.next_usage, story.next_on)
    if at is None or not view.x[0] <= at <= view.x[1]:
        return []
    low, high = (at, view.y[0]), (at, view.y[1])
    if not story.signed:
        return [segments(view, [(low, high)], ink.INK, 1.5)]
    aside = 2 * view.px_x
    double = [((at + s * aside, view.y[0]), (at + s * aside, view.y[1])) for s in (-1, 1)]
    return [segments(view, double, ink.VIOLET, 1.5)]


def _rules_in(story: SizeStory, view: View) -> list[tuple[float, RuleMark]]:
    """Rules with a place on the axis of this picture, from left to right."""
    placed = [(place_of(story, rule.usage, rule.on), rule) for rule in story.rules]
    within = [(at, rule) for at, rule in placed if at is not None and view.x[0] <= at <= view.x[1]]
    return sorted(within, key=lambda one: (one[0], one[1].rule))


def _rule_ticks(story: SizeStory, view: View) -> list[Chart]:
    """Ticks stand up from the axis; their numbers are explained below the picture."""
    layers = []
    for governs in (False, True):
        ticks = [
            ((at, view.y[0]), (at, view.y[0] + _tick(rule) * view.px_y))
            for at, rule in _rules_in(story, view)
            if rule.governs is governs
        ]
        if ticks:
            layers.append(segments(view, ticks, ink.INK, 4 if governs else 2))
    return layers


def _put_rule_words(story: SizeStory, plan: Plan) -> None:
    view = plan.view
    groups: list[list[tuple[float, RuleMark]]] = []
    for at, rule in _rules_in(story, view):
        before = groups[-1][-1] if groups else None
        near = before is not None and at - before[0] < 16 * view.px_x
        # The governing one stands alone: it is the one that is looked for.
        if before and near and not rule.governs and not before[1].governs:
            groups[-1].append((at, rule))
        else:
            groups.append([(at, rule)])
    for group in groups:
        first, last = group[0][0], group[-1][0]
        text = " ".join(str(rule.rule) for _, rule in group)
        beside = [
            Place((first, view.y[0]), "right", -8, -12),
            Place((last, view.y[0]), "left", 8, -12),
        ]
        if group[0][1].governs:
            plan.put(f"rule {text}", beside, bold=True)
        else:
            above = Place(((first + last) / 2, view.y[0]), "center", 0, -24)
            plan.put(text, [above, *beside])


def _outline_of(story: SizeStory) -> dict[str, str]:
    methods = list(dict.fromkeys(look.method for look in story.looks))
    return {method: OUTLINES[n % len(OUTLINES)] for n, method in enumerate(methods)}


def _looks(story: SizeStory, view: View) -> list[Chart]:
    """Bars first, then the outlines, then the lines through what was struck."""
    outline = _outline_of(story)
    drawn = [(look, (look.usage, look.size_mm)) for look in story.looks if look.size_mm is not None]
    layers = []
    for struck in (True, False):
        bars = [
            ((look.usage, max(look.low_mm, 0.0)), (look.usage, look.high_mm))
            for look, _ in drawn
            if look.struck is struck and look.low_mm is not None and look.high_mm is not None
        ]
        if bars:
            layers.append(segments(view, bars, ink.PENCIL if struck else ink.INK, 2))
    kinds = dict.fromkeys((outline[look.method], look.struck) for look, _ in drawn)
    for shape, struck in kinds:
        places = [
            at for look, at in drawn if (outline[look.method], look.struck) == (shape, struck)
        ]
        layers.append(dots(view, places, shape, DOT, hollow=struck))
    aside, rise = 9 * view.px_x, 5 * view.px_y
    through = [
        ((x - aside, y - rise), (x + aside, y + rise)) for look, (x, y) in drawn if look.struck
    ]
    if through:
        layers.append(segments(view, through, ink.INK, 2))
    return layers


def _level_places(view: View, size_mm: float) -> list[Place]:
    """Just above or below a level line, at its left, middle and right."""
    left, right = view.x[0] + 8 * view.px_x, view.x[1] - 8 * view.px_x
    middle = (view.x[0] + view.x[1]) / 2
    return [
        Place((x, size_mm), align, 0, dy)
        for dy in (-15, 15)
        for x, align in ((left, "left"), (right, "right"), (middle, "center"))
    ]


def _levels(story: SizeStory, view: View) -> list[Chart]:
    """The level lines; the limit is drawn last and heaviest."""
    sorts: list[tuple[float | None, float, list[int]]] = [
        (story.sure_mm, 1.5, [2, 3]),
        (story.breaks_mm, 2, [8, 5]),
        (story.limit_mm, 4, []),
    ]
    return [
        segments(view, [((view.x[0], mm), (view.x[1], mm))], ink.INK, width, strokeDash=dash)
        for mm, width, dash in sorts
        if mm is not None and mm < view.y[1]
    ]


def _put_level_words(story: SizeStory, plan: Plan) -> None:
    view = plan.view
    if story.limit_mm is not None and story.limit_mm >= view.y[1]:
        said = ("must be taken as able to break", f"from {story.mm(story.limit_mm)}, higher up")
        top = Place((view.x[0] + 8 * view.px_x, view.y[1]), "left", 0, 22)
        plan.put(said, [top], bold=True)
    levels = [
        (story.limit_mm, "must be taken as able to break from {}", True),
        (story.breaks_mm, f"would most likely {story.breaks_how} at {{}}", False),
        (story.sure_mm, "smallest crack this method is sure to find", False),
    ]
    for mm, text, bold in levels:
        if mm is not None and mm < view.y[1]:
            plan.put(text.format(story.mm(mm)), _level_places(view, mm), bold=bold)


def _put_growth_words(story: SizeStory, plan: Plan) -> None:
    view = plan.view
    due = place_of(story, story.next_usage, story.next_on)
    if due is not None and view.x[0] <= due <= view.x[1]:
        said = ["next look" if story.signed else "next look, proposed"]
        said += [] if story.next_on is None else [day(story.next_on)]
        if story.next_usage is not None:
            said.append(f"{'' if story.next_on is None else 'or '}{story.count(story.next_usage)}")
        heights = [part * view.y[1] for part in (0.3, 0.2, 0.4, 0.5, 0.6)]
        places = [
            Place((due, y), align, dx)
            for align, dx in (("right", -10), ("left", 10))
            for y in heights
        ]
        plan.put(said, places)
    for points, text, above in (
        (story.worst, "growth at its worst", True),
        (story.likely, "most likely", False),
    ):
        shown = _within(view, points)
        if len(shown) > 1:
            plan.put(text, _path_places(shown, above))
    for one in story.bands:
        shown = _within(view, [(usage, high) for usage, _, high in one.edges])
        if len(shown) > 1:
            plan.put(one.label, _path_places(shown, True))


def _within(view: View, points: Sequence[Point]) -> list[Point]:
    """The part of a path that the picture shows, cut at its right edge and top."""
    kept: list[Point] = []
    for x, y in points:
        if x > view.x[1] or y > view.y[1]:
            if kept:
                (x0, y0) = kept[-1]
                part = min(
                    (view.x[1] - x0) / (x - x0) if x > x0 else 1.0,
                    (view.y[1] - y0) / (y - y0) if y > y0 else 1.0,
                )
                kept.append((x0 + part * (x - x0), y0 + part * (y - y0)))
            break
        kept.append((x, y))
    return kept


def _path_places(points: Sequence[Point], above: bool) -> list[Place]:
    """Beside a rising line, nearest its middle first: above it, or below."""
    places = []
    for part in (0.6, 0.7, 0.5, 0.8, 0.4, 0.9, 0.3, 1.0, 0.2):
        at = _along(points, part)
        if above:
            sides = [("right", -10, -12), ("center", 0, -18), ("right", 0, -16), ("left", 0, -30)]
        else:
            sides = [("left", 10, 14), ("center", 0, 18), ("right", 0, 16), ("right", 40, 34)]
        places += [Place(at, align, dx, dy) for align, dx, dy in sides]
    return places


def _along(points: Sequence[Point], part: float) -> Point:
    """The point of a path at a part of its reach across."""
    reach = points[0][0] + part * (points[-1][0] - points[0][0])
    for (x1, y1), (x2, y2) in pairwise(points):
        if x1 <= reach <= x2 and x2 > x1:
            return (reach, y1 + (y2 - y1) * (reach - x1) / (x2 - x1))
    return points[-1]


# --- below the picture -------------------------------------------------------------------------


def _legend(story: SizeStory) -> Chart:
    """The outlines by method, the bar, and which rule a number stands for."""
    lines = _legend_lines(story)
    total = STRIP + WIDTH + 40
    view = View((0.0, total), (0.0, 20.0 * len(lines)), total, 20.0 * len(lines))
    layers: list[Chart] = []
    put: list[tuple[Point, tuple[str, ...]]] = []
    for n, line in enumerate(lines):
        y = 20.0 * (len(lines) - n) - 10
        x = 8.0
        for outline, text in line:
            if outline:
                layers += _sample(view, x, y, outline)
                x += 16
            put.append(((x, y), (text,)))
            x += text_width(text) + 24
    layers.append(many_words(view, put, align="left"))
    return {"width": total, "height": view.height, "layer": layers}


def _sample(view: View, x: float, y: float, outline: str) -> list[Chart]:
    if outline == "bar":
        return [segments(view, [((x, y - 9), (x, y + 9))], ink.INK, 2)]
    struck = outline == "struck"
    layers = [dots(view, [(x, y)], "circle" if struck else outline, DOT, hollow=struck)]
    if struck:
        layers.append(segments(view, [((x - 9, y - 5), (x + 9, y + 5))], ink.INK, 2))
    return layers


def _legend_lines(story: SizeStory) -> list[list[tuple[str, str]]]:
    samples = [(outline, method) for method, outline in _outline_of(story).items()]
    if any(look.high_mm is not None for look in story.looks):
        samples.append(("bar", "95 in 100 lie within the bar"))
    if any(look.struck for look in story.looks):
        samples.append(("struck", "struck out"))
    without = sum(look.size_mm is None for look in story.looks)
    if without:
        samples.append(("", f"{without} without a {story.of}: see the table"))
    lines = _wrapped(samples)
    shown = [rule for rule in story.rules if rule.usage is not None or rule.on is not None]
    if shown:
        names = [
            ("", f"{rule.rule} {rule.name}{', governs' if rule.governs else ''}") for rule in shown
        ]
        lines += _wrapped([("", "rules:"), *names])
    return lines


def _wrapped(items: Sequence[tuple[str, str]]) -> list[list[tuple[str, str]]]:
    """Items in lines no wider than the figure."""
    room = STRIP + WIDTH + 30
    lines: list[list[tuple[str, str]]] = []
    used = room + 1.0
    for outline, text in items:
        wide = (16 if outline else 0) + text_width(text) + 24
        if used + wide > room:
            lines.append([])
            used = 0.0
        lines[-1].append((outline, text))
        used += wide
    return lines
