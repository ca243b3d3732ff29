"""The verdict: two tables, read from the top. Pure; facts in, verdict and reasons out.

The first row that applies gives the verdict, and every row that applies gives a reason, so that
nobody learns of the second reason only after the first has been dealt with. A restriction stays as
a condition under a stricter verdict: a part that is referred may still be one that must not be
loaded fully meanwhile. A fact that could not be found is never taken as favourable: it leads to
refer, which is treated as withdraw until an engineer has decided.

One thing is added to the tables: where as_of has reached the date or reading that the rules give,
the look that they ask for has not taken place, and the verdict is at least refer. Where growth
could not be judged against the basis, a second time of row 3 is not ruled out; nothing is eased by
that.
"""

from collections.abc import Iterator
from dataclasses import dataclass

from assessment.interval import Next

_OTHERWISE = 8
_BEFORE_RETURN = "Repair before return to service."
STRICTNESS = ("continue", "watch", "restrict", "repair", "refer", "withdraw")


@dataclass(frozen=True)
class Restriction:
    """A reduced load that restores the reserve: its words, and the interval at that load."""

    words: str
    interval: Next | None


@dataclass(frozen=True)
class CrackFacts:
    """What the table for a crack reads.

    acceptable : bounding crack at the peak load; None where it could not be computed
    why_not_acceptable : what fails, in words
    needs : row 2, each need in a sentence
    grew_faster_before : growth was faster than its basis explains at the last assessment
    reserve, demanded : bounding reserve on load, and criteria.load_reserve
    restriction : a reduced load that restores the reserve, where the owner allows it
    why_no_restriction : why there is none
    interval : the governing interval at the full load
    shortest, longest : criteria, in days
    failing : the probability of having failed by now is at or above the target, in words; else None
    grew_faster : growth is faster than the basis explains; None where it could not be judged
    faster_words : that, in words
    """

    acceptable: bool | None
    why_not_acceptable: str
    needs: tuple[str, ...]
    grew_faster_before: bool
    reserve: float | None
    demanded: float | None
    restriction: Restriction | None
    why_no_restriction: str
    interval: Next | None
    shortest: float | None
    longest: float | None
    failing: str | None = None
    grew_faster: bool | None = None
    faster_words: str = ""


@dataclass(frozen=True)
class PlaceFacts:
    """What the table for a place where no crack was measured reads.

    on_record : a crack is known here and was not seen
    needs : what is missing or fell short, each in a sentence
    method_finds : the method can find what the rules assume; None where not known
    method_words : what it finds against what is assumed
    interval : the interval that the size it could have missed allows
    """

    on_record: bool
    needs: tuple[str, ...]
    method_finds: bool | None
    method_words: str
    interval: Next | None
    shortest: float | None
    longest: float | None


@dataclass(frozen=True)
class Decision:
    """Verdict, a reason from every row that applies, conditions, and what repair is tied to."""

    verdict: str
    reasons: tuple[str, ...]
    conditions: tuple[str, ...] = ()
    before_return: bool = False


@dataclass(frozen=True)
class _Row:
    """One row that applies: its number in the table, verdict and reason."""

    number: int
    verdict: str
    reason: str
    before_return: bool = False


def decide_crack(facts: CrackFacts) -> Decision:
    """The table for a crack."""
    restriction = facts.restriction
    conditions = () if restriction is None else (restriction.words,)
    return _decision(_crack_rows(facts), conditions)


def decide_place(facts: PlaceFacts) -> Decision:
    """The table for a place where no crack was measured."""
    return _decision(_place_rows(facts), ())


def _decision(rows: Iterator[_Row], conditions: tuple[str, ...]) -> Decision:
    applying = sorted(rows, key=lambda row: row.number)
    if applying[0].number != _OTHERWISE:
        applying = [row for row in applying if row.number != _OTHERWISE]
    first = applying[0]
    reasons = tuple(dict.fromkeys(row.reason for row in applying))
    return Decision(first.verdict, reasons, conditions, first.before_return)


def _crack_rows(facts: CrackFacts) -> Iterator[_Row]:
    interval = facts.interval if facts.restriction is None else facts.restriction.interval
    if facts.acceptable is False:
        yield _Row(1, "withdraw", facts.why_not_acceptable)
    if facts.failing is not None:
        yield _Row(1, "withdraw", facts.failing)
    for need in facts.needs:
        yield _Row(2, "refer", need)
    if facts.acceptable is None and not facts.needs:
        yield _Row(2, "refer", "Whether the bounding crack is acceptable could not be computed.")
    yield from _growth_rows(facts)
    yield from _reserve_rows(facts)
    yield from _interval_rows(interval, facts.shortest, facts.longest)


def _growth_rows(facts: CrackFacts) -> Iterator[_Row]:
    before = "At the last assessment too the crack had grown faster than its basis explains."
    if facts.grew_faster and facts.grew_faster_before:
        yield _Row(3, "refer", f"{facts.faster_words} {before}")
    elif facts.grew_faster:
        # At best watch: the rows in between may be stricter, and continue gives way.
        yield _Row(7, "watch", facts.faster_words)
    elif facts.grew_faster is None and facts.grew_faster_before:
        # Whether it grew faster again could not be judged, so a second time is not ruled out.
        yield _Row(
            3,
            "refer",
            "At the last assessment the crack had grown faster than its basis explains; "
            "whether it did so again could not be judged.",
        )


def _reserve_rows(facts: CrackFacts) -> Iterator[_Row]:
    if facts.reserve is None or facts.demanded is None or facts.reserve >= facts.demanded:
        return
    short = (
        f"The bounding reserve on load is {facts.reserve:.3g}, below the "
        f"{facts.demanded:.3g} demanded."
    )
    if facts.restriction is not None:
        yield _Row(4, "restrict", f"{short} {facts.restriction.words}")
    else:
        why = f" {facts.why_no_restriction}" if facts.why_no_restriction else ""
        yield _Row(5, "repair", f"{short}{why} {_BEFORE_RETURN}", True)


def _interval_rows(
    interval: Next | None, shortest: float | None, longest: float | None
) -> Iterator[_Row]:
    if interval is None or shortest is None or longest is None:
        yield _Row(2, "refer", "No interval to the next inspection could be decided.")
        return
    says = _says(interval)
    if interval.days < shortest:
        tail = f"Repair before {_until(interval)}." if interval.left else _BEFORE_RETURN
        reason = f"The interval is {says}, shorter than the shortest of {shortest:g} days. {tail}"
        yield _Row(6, "repair", reason, before_return=not interval.left)
    elif not interval.left:
        # What the rules give has gone by with no look: as row 2 has it for the date in force.
        reason = f"The inspection that the rules give, by {_until(interval)}, is already due."
        yield _Row(2, "refer", reason)
    if interval.days < int(longest):
        reason = f"The interval is {says}, shorter than the longest of {longest:g} days."
        yield _Row(7, "watch", reason)
    else:
        yield _Row(
            _OTHERWISE, "continue", f"The interval is {says}, as long as the longest allowed."
        )


def _says(interval: Next) -> str:
    unit = "day" if interval.days == 1 else "days"
    return f"{interval.days} {unit} from the last look ({interval.governed_by})"


def _until(interval: Next) -> str:
    usage = "" if interval.usage is None else f" or counter {interval.usage:.10g}"
    return f"{interval.on.isoformat()}{usage}"


def _place_rows(facts: PlaceFacts) -> Iterator[_Row]:
    interval, shortest, longest = facts.interval, facts.shortest, facts.longest
    if facts.on_record:
        yield _Row(1, "refer", "A crack is on record here and was not seen this time.")
    for need in facts.needs:
        yield _Row(2, "refer", need)
    if facts.method_finds is not True:
        yield _Row(2, "refer", facts.method_words)
    if interval is None or shortest is None or longest is None:
        yield _Row(2, "refer", "No interval to the next inspection could be decided.")
        return
    says = _says(interval)
    if interval.days < shortest:
        yield _Row(
            3,
            "refer",
            f"A crack that this look could have missed leaves an interval of {says}, shorter than "
            f"the shortest of {shortest:g} days: this method cannot find a crack here early "
            "enough.",
        )
    elif not interval.left:
        reason = f"The inspection that the rules give, by {_until(interval)}, is already due."
        yield _Row(2, "refer", reason)
    verdict = "watch" if interval.days < int(longest) else "continue"
    yield _Row(_OTHERWISE, verdict, f"No crack was found. The interval is {says}.")
