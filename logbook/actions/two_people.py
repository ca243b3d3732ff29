"""Which steps need two people and stated grounds, and who may not be the second."""

from logbook.cases import rows
from logbook.errors import not_permitted
from logbook.models import Assessment, Disposition, Person, Verdict, strictness

LEAVING = frozenset({Verdict.REPAIR, Verdict.REFER, Verdict.WITHDRAW, Verdict.RESTRICT})


def eases(verdict: str, standing_verdict: str) -> bool:
    """Does this leave repair, refer or withdraw, or lift a restriction?"""
    return standing_verdict in LEAVING and strictness(verdict) < strictness(standing_verdict)


def loggers_of(assessment: Assessment) -> set[int]:
    """Who wrote the looks that the verdict rests on."""
    newest = rows.last_look(assessment.location, assessment.crack)
    return set() if newest is None else {newest.inspection.author_id}


def must_not_have_logged(by: Person, assessment: Assessment) -> None:
    if by.pk in loggers_of(assessment):
        raise not_permitted(
            "You wrote the look that this verdict rests on: someone else has to sign it."
        )


def standing_before(assessment: Assessment) -> str:
    """The strictest verdict that this signature would leave behind: what is in force, or what the
    proposal itself says."""
    d = (
        Disposition.objects.filter(location=assessment.location, crack=assessment.crack)
        .order_by("-leaf__index")
        .first()
    )
    verdicts = [assessment.verdict, *([d.verdict] if d is not None else [])]
    return max(verdicts, key=strictness)
