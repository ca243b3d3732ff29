"""Which steps need two people and stated grounds, and who may not be the second."""

from logbook import clock
from logbook.actions import standing
from logbook.cases import rows
from logbook.errors import not_permitted
from logbook.models import Assessment, Person, Review, Standing, StrikeOut, Verdict, strictness

LEAVING = frozenset({Verdict.REPAIR, Verdict.REFER, Verdict.WITHDRAW, Verdict.RESTRICT})


def eases(verdict: str, standing_verdict: str) -> bool:
    """Does this leave repair, refer or withdraw, or lift a restriction?"""
    return standing_verdict in LEAVING and strictness(verdict) < strictness(standing_verdict)


def review_eases(review: Review, before: str) -> bool:
    """Does signing this leave what stands: by its word, or by the same word with less behind it?

    A repair that may wait instead of one that may not, and a limit other than the reckoned one,
    are easier under the same word.
    """
    if eases(review.verdict, before):
        return True
    proposal = review.assessment
    if review.verdict != before:
        return False
    if review.verdict == Verdict.REPAIR:
        waits = review.until_on is not None or review.until_at is not None
        binds = standing.what_binds(proposal.location, proposal.crack)
        return waits and binds is not None and binds.claim.stands_still
    return review.verdict == Verdict.RESTRICT and review.limit != proposal.limit


def loggers_of(assessment: Assessment) -> set[int]:
    """Who wrote the looks that the verdict rests on, corrected them, or gave a new start."""
    location, crack = assessment.location, assessment.crack
    newest = rows.last_look(location, crack)
    found = set() if newest is None else {newest.inspection.author_id}
    signed = standing.latest_disposition(location, crack)
    struck = StrikeOut.objects.filter(finding__location=location, finding__crack=crack)
    if signed is not None:
        struck = struck.filter(leaf__index__gt=signed.leaf.index)
    found |= set(struck.values_list("by", flat=True))
    start = rows.new_start(crack) if crack is not None else rows.newest_work(location)
    return found if start is None else found | {start.author_id}


def must_not_have_logged(by: Person, assessment: Assessment) -> None:
    if by.pk in loggers_of(assessment):
        raise not_permitted(
            "You wrote the look that this verdict rests on: someone else has to sign it."
        )


def standing_before(assessment: Assessment) -> str:
    """The strictest verdict that this signature would leave behind: what binds today, lapsed or
    not, or what the proposal itself says."""
    verdicts = [str(assessment.verdict)]
    row = Standing.objects.filter(location=assessment.location, crack=assessment.crack).first()
    if row is not None:
        today = clock.today(assessment.location.component.site.time_zone)
        verdicts.append(standing.reading(row, today).verdict)
    signed = standing.latest_disposition(assessment.location, assessment.crack)
    if signed is not None:
        verdicts.append(signed.verdict)
    return max(verdicts, key=strictness)
