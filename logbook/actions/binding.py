"""What binds: a signature and every proposal since, folded so that nothing strict is forgotten.

A stricter verdict, a lower limit and an earlier date bind from the moment they are proposed. A
later look that is easier, a size struck out or a corrected basis does not take them back: that
takes a signature newer than all of them.
"""

import datetime
import json
from collections.abc import Sequence
from dataclasses import dataclass
from decimal import Decimal
from typing import Any

from logbook.models import Assessment, Disposition, Verdict, strictness

BINDS_UNSIGNED = frozenset({Verdict.RESTRICT, Verdict.REPAIR, Verdict.REFER, Verdict.WITHDRAW})
STANDS_STILL = frozenset({Verdict.REFER, Verdict.WITHDRAW})


@dataclass(frozen=True)
class Claim:
    """One signature, or one proposal.

    factor : the part of the largest load that a restriction leaves, where it is known as a number
    confirmed : the limiter of a signed restriction is set
    """

    verdict: str
    until_on: datetime.date | None
    until_at: Decimal | None
    limit: str
    factor: float | None
    assessment: Assessment
    disposition: Disposition | None = None
    confirmed: bool = False

    @property
    def stands_still(self) -> bool:
        """The part must not be used: refer, withdraw, and a repair that may not wait."""
        waits = self.until_on is not None or self.until_at is not None
        return self.verdict in STANDS_STILL or (self.verdict == Verdict.REPAIR and not waits)

    @property
    def held(self) -> bool:
        """A restriction counts once its limiter or tag is confirmed."""
        return self.stands_still or (self.verdict == Verdict.RESTRICT and not self.confirmed)

    @property
    def rank(self) -> tuple[int, bool, float]:
        """The higher, the stricter. A limit in words of an engineer's own is not known as a
        number: any that is known counts as lower."""
        load = float("inf") if self.factor is None else self.factor
        return (strictness(self.verdict), self.stands_still, -load)


@dataclass(frozen=True)
class Binding:
    """The claim that binds, and the earliest date and counter of all that bind with it.

    signed : the signature alone says it, dates included; proposed : nothing binds, this is only
    proposed; restriction : one that stays as a condition under a stricter verdict
    """

    claim: Claim
    due_on: datetime.date | None
    due_at: Decimal | None
    signed: bool
    proposed: bool = False
    restriction: Claim | None = None

    @property
    def limit(self) -> str:
        return self.claim.limit if self.restriction is None else self.restriction.limit

    @property
    def held(self) -> bool:
        return self.claim.held or (self.restriction is not None and self.restriction.held)


def claim_of(a: Assessment, *, counter_counts: bool = True) -> Claim:
    """A proposal as a claim; a reading of a counter that was taken out says nothing."""
    return Claim(
        a.verdict,
        a.until_on,
        a.until_at if counter_counts else None,
        a.limit,
        load_factor(a),
        a,
    )


def load_factor(a: Assessment) -> float | None:
    """The part of the largest load that a restriction leaves; None where the outcome has none."""
    if a.verdict != Verdict.RESTRICT or a.outcome_text is None:
        return None
    restriction = json.loads(a.outcome_text).get("restriction")
    return None if restriction is None else float(restriction["factor"])


def fold(signed: Claim | None, since: Sequence[Claim]) -> Binding | None:
    """since : the proposals that are newer than the signature (all where there is none), oldest
    first. None where there is neither."""
    newest_first = list(reversed(since))
    if signed is None:
        binding = [one for one in newest_first if one.verdict in BINDS_UNSIGNED]
        if not binding:
            return _only_proposed(newest_first)
    else:
        binding = [signed, *newest_first]
    strictest = max(binding, key=lambda one: one.rank)  # the first of equals: the signature
    if strictest.stands_still and strictest is not signed:
        # What stands still has no date to wait for; one would read as leave to go on till then.
        return Binding(strictest, None, None, False)
    if strictest.stands_still:
        return Binding(strictest, strictest.until_on, strictest.until_at, True)
    dates = binding if signed is not None else [*binding, newest_first[0]]
    due_on, due_at = _earliest(dates, "until_on"), _earliest(dates, "until_at")
    own = signed is not None and (strictest, due_on, due_at) == (
        signed,
        signed.until_on,
        signed.until_at,
    )
    restricting = [one for one in binding if one.verdict == Verdict.RESTRICT]
    under = max(restricting, key=lambda one: one.rank, default=None)
    return Binding(
        strictest, due_on, due_at, own, restriction=None if under is strictest else under
    )


def _only_proposed(newest_first: Sequence[Claim]) -> Binding | None:
    if not newest_first:
        return None
    newest = newest_first[0]
    return Binding(newest, newest.until_on, newest.until_at, False, proposed=True)


def _earliest(claims: Sequence[Claim], name: str) -> Any:
    given = [getattr(one, name) for one in claims if getattr(one, name) is not None]
    return min(given, default=None)
