"""The signature: a licensed person turns a reviewed proposal into what is in force.

What it needs, all at that moment: the role at the site, a licence in force, the password, and
the digest of exactly what was shown. It is refused when anything newer exists, when the signatory
wrote the look or the review that it rests on where two people are needed, and every refused
signing is journalled.
"""

import uuid

from django.db import transaction
from django.http import HttpRequest

from logbook import access, clock
from logbook.actions import standing
from logbook.actions.password import confirm_password
from logbook.actions.review import must_be_newest
from logbook.actions.shown import shown_digest
from logbook.actions.two_people import must_not_have_logged, review_eases, standing_before
from logbook.errors import Refusal, conflict, invalid, not_permitted
from logbook.journal import append
from logbook.models import Component, Disposition, Licence, Person, Review
from logbook.records.issue import issue, reserve_number

KIND = "sign-disposition"
REFUSED = "signing-refused"


def sign_disposition(
    by: Person,
    review_pk: object,
    *,
    licence_pk: object,
    meaning: str,
    password: str,
    digest: str,
    request: HttpRequest | None = None,
) -> Disposition:
    """Sign, put in force, reserve the record's number; then print the record.

    Raises Refusal and journals it (kind "signing-refused").
    """
    review = access.review_for(by, review_pk, "see")
    try:
        access.require(by, review.assessment.location.component.site, "sign")
        licence = _check(by, review, licence_pk, meaning, password, request)
        made = _sign(by, review, licence, meaning, digest)
    except Refusal as refusal:
        _journal_refusal(by, review, refusal)
        raise
    issue(made.record)
    return made


def _check(
    by: Person,
    review: Review,
    licence_pk: object,
    meaning: str,
    password: str,
    request: HttpRequest | None,
) -> Licence:
    site = review.assessment.location.component.site
    if "administrator" in access.roles_at(by, site):
        raise not_permitted("An administrator of a site does not sign there.")
    licence = access.licence_for(by, licence_pk, clock.today(site.time_zone), site)
    if meaning not in Disposition.Meaning.values:
        raise invalid("Say what your signature means.", {"meaning": ["Choose one."]})
    must_not_have_logged(by, review.assessment)
    before = standing_before(review.assessment)
    if review_eases(review, before):
        if review.by_id == by.pk:
            raise not_permitted(
                f"Leaving “{before}” needs two people: you reviewed it, so another signs."
            )
        if not review.grounds:
            raise not_permitted(f"Leaving “{before}” needs stated grounds in the review.")
    confirm_password(by, password, request)
    return licence


def _sign(by: Person, review: Review, licence: Licence, meaning: str, digest: str) -> Disposition:
    a = review.assessment
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=a.location.component_id)
        # Role and licence once more, since the password took its time.
        site = a.location.component.site
        access.require(by, site, "sign")
        access.licence_for(by, licence.pk, clock.today(site.time_zone), site)
        must_be_newest(a)
        if a.reviews.order_by("-leaf__index").first() != review:
            raise conflict("newer", "A newer review of this proposal exists. Read that one.")
        if hasattr(review, "disposition"):
            raise conflict("signed", "This was signed already.")
        if digest != shown_digest(review):
            raise conflict(
                "not-what-was-shown", "What you saw is not what the book says now. Open it again."
            )
        made = Disposition.objects.create(
            leaf_id=act,
            review=review,
            assessment=a,
            location=a.location,
            crack=a.crack,
            signatory=by,
            licence=licence,
            meaning=meaning,
            shown_digest=digest,
            verdict=review.verdict,
            until_on=review.until_on,
            until_at=review.until_at,
            limit=review.limit,
            signed_at=clock.now(),
            supersedes=standing.latest_disposition(a.location, a.crack),
        )
        record = reserve_number(disposition=made)
        append(
            KIND,
            {
                "disposition": made.pk,
                "review": review.pk,
                "licence": {
                    "body": licence.body,
                    "number": licence.number,
                    "valid_to": licence.valid_to,
                },
                "meaning": meaning,
                "shown_digest": digest,
                "verdict": str(made.verdict),
                "until_on": made.until_on,
                "until_at": made.until_at,
                "limit": made.limit,
                "supersedes": made.supersedes_id,
                "record": record.number,
            },
            act=act,
            by=by,
            site=a.location.component.site,
            because_of=[review.leaf_id, a.leaf_id],
        )
        # After the leaf, since the standing asks which of proposal and signature is newer.
        standing.refresh(a.location, a.crack)
    return made


def _journal_refusal(by: Person, review: Review, refusal: Refusal) -> None:
    with transaction.atomic():
        append(
            REFUSED,
            {"review": review.pk, "code": refusal.code, "sentence": refusal.sentence},
            act=uuid.uuid4(),
            by=by,
            site=review.assessment.location.component.site,
            because_of=[review.leaf_id],
        )
