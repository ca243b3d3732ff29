"""From a case and its outcome, as contract documents, to the stories that the figures tell."""

from collections.abc import Mapping, Sequence
from datetime import date
from typing import Any

from .diagram import DiagramStory
from .layers import Point
from .section import SectionStory
from .size_usage import Band, Look, RuleMark, SizeStory

Document = Mapping[str, Any]

# Rules for the next look in their order, in words that need no standard at hand.
RULE_WORDS = (
    "life at its worst ÷ {factor}",
    "forecast",
    "what the method can find",
    "longest interval",
    "fixed date",
    "growth faster than explained",
)

OUT_OF_RANGE = "out of range"
# How a part most likely ends, by the cause of an outcome; the end of a range is no end of a part.
BREAKS = {"fracture": "break", "collapse": "break", "break-through": "break through"}
# How a kind lies in its wall.
SHAPES = {
    "plate-through-centre": "through",
    "plate-through-edge": "edge",
    "plate-surface": "surface",
    "specimen-compact-tension": "edge",
    "specimen-edge-bend": "edge",
    "cylinder-axial-inside": "surface",
    "cylinder-axial-outside": "surface",
    "cylinder-axial-through": "through",
    "bar-surface": "bar",
}


def size_story(
    *,
    what: str,
    counter: str,
    per_day: float | None,
    looks: Sequence[Look],
    of: str,
    case: Document | None = None,
    outcome: Document | None = None,
    signed: bool = False,
    next_on: date | None = None,
    next_usage: float | None = None,
    no_growth_why: str = "",
    decimal_sign: str = ".",
) -> SizeStory:
    """of : "depth" or "length", the size that ``looks`` carry.

    next_on, next_usage : the look that binds or is proposed, as the book has it
    """
    case, outcome = case or {}, outcome or {}
    start = _number(case.get("usage", {}).get("at"))
    bounding = outcome.get("bounding") or {}
    column = 1 if of == "depth" else 2
    worst = _path(bounding.get("life"), column, start)
    stop = _size(outcome.get("stop_size"), of)
    limit = _limit(case, outcome, worst, stop, of)
    critical = outcome.get("critical") or {}
    how = BREAKS.get(critical.get("cause", "fracture"))
    near, far = ("edge", "far edge") if _shape(case) == "edge" else ("this side", "far side")
    return SizeStory(
        what=what,
        of=of,
        counter=counter,
        looks=tuple(looks),
        per_day=per_day,
        wall_mm=_wall(case, of),
        near_side=near,
        far_side=far,
        worst=worst,
        likely=_path(outcome.get("life"), column, start),
        limit_mm=limit,
        breaks_mm=None if how is None else _size(critical, of),
        breaks_how=how or "break",
        stop_mm=stop,
        next_usage=next_usage,
        next_on=next_on,
        signed=signed,
        rules=rule_marks(case, outcome),
        bands=_bands(outcome.get("forecast"), of, start),
        no_growth_why="" if worst else no_growth_why,
        decimal_sign=decimal_sign,
    )


# What a band is called: the part of all cracks like this one that it holds, the wider first.
BANDS = (("90", "9 in 10 such cracks"), ("50", "half of such cracks"))


def _bands(forecast: Document | None, of: str, start: float | None) -> tuple[Band, ...]:
    rows = (forecast or {}).get("bands") or ()
    if start is None:
        return ()
    found = []
    for level, label in BANDS:
        edges = tuple(
            (start + float(row["usage"]), float(low), float(high))
            for row in rows
            if row.get(f"{of}_mm")
            for low, high in (row[f"{of}_mm"][level],)
        )
        if len(edges) > 1:
            found.append(Band(label, edges))
    return tuple(found)


def rule_marks(case: Document, outcome: Document) -> tuple[RuleMark, ...]:
    """The rules of an outcome, numbered in their order."""
    governed_by = (outcome.get("next_inspection") or {}).get("governed_by")
    factor = _number(case.get("criteria", {}).get("life_factor"))
    marks = []
    for n, rule in enumerate(outcome.get("rules", ()), start=1):
        words = RULE_WORDS[n - 1] if n <= len(RULE_WORDS) else str(rule["rule"])
        on = rule.get("on")
        marks.append(
            RuleMark(
                rule=n,
                name=words.format(factor="a factor" if factor is None else f"{factor:g}"),
                usage=_number(rule.get("usage")),
                on=date.fromisoformat(on) if on else None,
                why_not=rule.get("why_not") or "",
                governs=bool(governed_by) and rule["rule"] == governed_by,
            )
        )
    return tuple(marks)


def diagram_story(
    *, what: str, case: Document, outcome: Document, decimal_sign: str = "."
) -> DiagramStory | None:
    """None where the outcome holds no limit curve or no point that decides."""
    drawn = (outcome.get("figures") or {}).get("diagram") or {}
    curve = drawn.get("limit_curve") or ()
    failure = (outcome.get("bounding") or {}).get("failure") or {}
    across, up = _number(failure.get("load_ratio")), _number(failure.get("toughness_ratio"))
    if len(curve) < 2 or across is None or up is None:
        return None
    return DiagramStory(
        what=what,
        curve=tuple((float(x), float(y)) for x, y in curve),
        now=(across, up),
        reserve=_number(failure.get("reserve_on_load")),
        asked=_number(case.get("criteria", {}).get("load_reserve")),
        method=str(drawn.get("method", "")),
        decimal_sign=decimal_sign,
    )


def section_story(
    *, what: str, case: Document, outcome: Document, decimal_sign: str = "."
) -> SectionStory | None:
    """None where the kind has no drawing here or a size is not known."""
    shape, body, crack = _shape(case), case.get("body", {}), case.get("crack", {})
    depth, length = _number(crack.get("depth_mm")), _number(crack.get("length_mm"))
    wall = _number(body.get("diameter_mm" if shape == "bar" else "thickness_mm"))
    by_depth = shape in ("surface", "bar")
    if shape is None or wall is None or (depth if by_depth else length) is None:
        return None
    if shape == "surface" and length is None:
        return None
    return SectionStory(
        what=what,
        shape=shape,
        thickness_mm=wall,
        length_mm=length,
        depth_mm=depth,
        width_mm=_number(body.get("width_mm")),
        stop_mm=_size(outcome.get("stop_size"), "depth" if by_depth else "length"),
        decimal_sign=decimal_sign,
    )


def _shape(case: Document) -> str | None:
    return SHAPES.get(str(case.get("crack", {}).get("kind", "")))


def _wall(case: Document, of: str) -> float | None:
    """From this side to the far side, in the direction of the size that is drawn."""
    body, shape = case.get("body", {}), _shape(case)
    if of == "depth":
        return _number(body.get("diameter_mm" if shape == "bar" else "thickness_mm"))
    # A centre crack's length runs both ways, so no side of the plate is its far side.
    return _number(body.get("width_mm")) if shape == "edge" else None


def _path(life: Document | None, column: int, start: float | None) -> tuple[Point, ...]:
    """(counter reading, mm). Paths are kept as usage from the last look on."""
    rows = (life or {}).get("path") or ()
    if start is None or any(row[column] is None for row in rows):
        return ()
    return tuple((start + float(row[0]), float(row[column])) for row in rows)


def _limit(
    case: Document, outcome: Document, worst: Sequence[Point], stop: float | None, of: str
) -> float | None:
    """The size from which the part must be taken as able to break.

    Where growth at its worst ends because the reserve is used up, it is the size at that end; else
    the stop size, which lies where the reserve is used up too. None where relations end before
    that: a path or a stop at the end of a range says nothing of strength.
    """
    bounding = outcome.get("bounding") or {}
    life = bounding.get("life") or {}
    if life.get("ends_by") == OUT_OF_RANGE:
        return None
    if worst and life.get("usage") is not None:
        return worst[-1][1]
    size, failure = _size(case.get("crack"), of), bounding.get("failure") or {}
    reserve = _number(failure.get("reserve_on_load"))
    asked = _number(case.get("criteria", {}).get("load_reserve"))
    enough = reserve is not None and asked is not None and reserve >= asked
    if enough and size is not None and stop is not None and size >= stop:
        return None
    return stop


def _size(sizes: Document | None, of: str) -> float | None:
    return _number((sizes or {}).get(f"{of}_mm"))


def _number(value: Any) -> float | None:
    return None if value is None else float(value)
