"""What was reckoned: the case, the outcome, and the verdict they propose."""

from django.db import models
from django.utils.translation import gettext_lazy as _

from .act import ActRow
from .basis import Basis
from .component import Location
from .inspection import Crack


class Verdict(models.TextChoices):
    """In order of strictness."""

    CONTINUE = "continue", _("continue")
    WATCH = "watch", _("watch")
    RESTRICT = "restrict", _("restrict")
    REPAIR = "repair", _("repair")
    REFER = "refer", _("refer")
    WITHDRAW = "withdraw", _("withdraw")


def strictness(verdict: str) -> int:
    """0 for continue up to 5 for withdraw."""
    return Verdict.values.index(verdict)


class Assessment(ActRow):
    """A proposal. Without a basis there is no case, and the verdict is refer with that reason."""

    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="assessments")
    crack = models.ForeignKey(
        Crack, null=True, on_delete=models.PROTECT, related_name="assessments"
    )
    basis = models.ForeignKey(Basis, null=True, on_delete=models.PROTECT, related_name="+")
    # The entry that asked for it: an inspection, a strike-out, a basis adopted, a repair.
    because_act = models.UUIDField()
    case_text = models.TextField(null=True)
    case_digest = models.CharField(max_length=64, blank=True)
    outcome_text = models.TextField(null=True)
    outcome_digest = models.CharField(max_length=64, blank=True)
    engine = models.CharField(max_length=80)
    verdict = models.CharField(max_length=12, choices=Verdict.choices)
    # Canonical JSON text: a list of sentences.
    reasons = models.TextField()
    until_on = models.DateField(null=True)
    until_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    governed_by = models.TextField(blank=True)
    limit = models.TextField(blank=True)
    stop_depth_mm = models.FloatField(null=True)
    stop_length_mm = models.FloatField(null=True)
    in_book_at = models.DateTimeField()

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["location", "crack", "-id"])]
        constraints = [
            models.CheckConstraint(
                condition=models.Q(verdict__in=Verdict.values), name="assessment_verdict_known"
            ),
            models.CheckConstraint(
                condition=models.Q(case_text__isnull=False, outcome_text__isnull=False)
                | models.Q(case_text__isnull=True, outcome_text__isnull=True, verdict="refer")
                | models.Q(case_text__isnull=False, outcome_text__isnull=True, verdict="refer"),
                name="no_verdict_without_case",
            ),
        ]
