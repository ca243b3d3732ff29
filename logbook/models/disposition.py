"""Review, signature, and what follows from them."""

from django.db import models
from django.utils.translation import gettext_lazy as _

from .act import ActRow
from .assessment import Assessment, Verdict
from .component import Location
from .inspection import Crack
from .licence import Licence


class Review(ActRow):
    """An engineer's word on a proposal: accepted as it is, or another verdict with grounds."""

    class Decision(models.TextChoices):
        ACCEPT = "accept", _("accepted")
        OVERRIDE = "override", _("overridden")

    assessment = models.ForeignKey(Assessment, on_delete=models.PROTECT, related_name="reviews")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    decision = models.CharField(max_length=12, choices=Decision.choices)
    verdict = models.CharField(max_length=12, choices=Verdict.choices)
    until_on = models.DateField(null=True)
    until_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    limit = models.TextField(blank=True)
    grounds = models.TextField(blank=True)
    at = models.DateTimeField()

    class Meta(ActRow.Meta):
        constraints = [
            models.CheckConstraint(
                condition=~models.Q(decision="override", grounds=""),
                name="override_states_grounds",
            ),
            models.CheckConstraint(
                condition=models.Q(verdict__in=Verdict.values), name="review_verdict_known"
            ),
            models.CheckConstraint(
                condition=~models.Q(verdict="restrict", limit=""), name="review_limit_named"
            ),
        ]


class Disposition(ActRow):
    """A signed verdict."""

    class Meaning(models.TextChoices):
        PERFORMED = "performed", _("performed")
        REVIEWED = "reviewed", _("reviewed")
        APPROVED = "approved", _("approved")

    review = models.OneToOneField(Review, on_delete=models.PROTECT, related_name="disposition")
    assessment = models.ForeignKey(
        Assessment, on_delete=models.PROTECT, related_name="dispositions"
    )
    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="dispositions")
    crack = models.ForeignKey(
        Crack, null=True, on_delete=models.PROTECT, related_name="dispositions"
    )
    signatory = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    licence = models.ForeignKey(Licence, on_delete=models.PROTECT, related_name="+")
    meaning = models.CharField(max_length=12, choices=Meaning.choices)
    shown_digest = models.CharField(max_length=64)
    verdict = models.CharField(max_length=12, choices=Verdict.choices)
    until_on = models.DateField(null=True)
    until_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    limit = models.TextField(blank=True)
    signed_at = models.DateTimeField()
    supersedes = models.OneToOneField(
        "self", null=True, on_delete=models.PROTECT, related_name="superseded_by"
    )

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["location", "crack", "-id"])]
        constraints = [
            models.CheckConstraint(
                condition=models.Q(verdict__in=Verdict.values), name="disposition_verdict_known"
            )
        ]


class RestrictionConfirmed(ActRow):
    """The limiter is set, or the tag hangs: only then is a restriction in force."""

    disposition = models.OneToOneField(
        Disposition, on_delete=models.PROTECT, related_name="restriction_confirmed"
    )
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    how = models.TextField(help_text="limiter set to …, or tag number")
    at = models.DateTimeField()


class DeferralRequest(ActRow):
    """Asked by one person; nothing changes until another has approved it."""

    disposition = models.ForeignKey(
        Disposition, on_delete=models.PROTECT, related_name="deferral_requests"
    )
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    grounds = models.TextField()
    new_on = models.DateField()
    new_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    at = models.DateTimeField()


class Deferral(ActRow):
    """A later date for an inspection, by two people."""

    request = models.OneToOneField(
        DeferralRequest, on_delete=models.PROTECT, related_name="deferral"
    )
    disposition = models.ForeignKey(Disposition, on_delete=models.PROTECT, related_name="deferrals")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    licence = models.ForeignKey(Licence, on_delete=models.PROTECT, related_name="+")
    new_on = models.DateField()
    new_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    at = models.DateTimeField()
