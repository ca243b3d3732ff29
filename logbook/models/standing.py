"""What binds now, one row a place or crack: a projection, rebuilt from what is protected."""

from django.db import models

from .assessment import Assessment, Verdict
from .component import Location
from .disposition import Disposition
from .inspection import Crack, Finding
from .site import Site


class Standing(models.Model):
    """logbook/actions/standing.py is the only writer, and says how each field comes about.

    Whether a date or usage has passed is judged when it is read, against today and the last
    counter; the row itself does not know what day it is.
    """

    class State(models.TextChoices):
        NOT_ASSESSED = "not-assessed"  # treated as withdraw
        PROPOSED = "proposed"  # unsigned; held, or acted on where the owner allows it
        BINDING = "proposed-binding"  # unsigned, and stricter: binds at once
        IN_FORCE = "in-force"

    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="+")
    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="standings")
    crack = models.OneToOneField(
        Crack, null=True, on_delete=models.PROTECT, related_name="standing"
    )
    state = models.CharField(max_length=20, choices=State.choices)
    assessment = models.ForeignKey(
        Assessment, null=True, on_delete=models.PROTECT, related_name="+"
    )
    disposition = models.ForeignKey(
        Disposition, null=True, on_delete=models.PROTECT, related_name="+"
    )
    last_finding = models.ForeignKey(Finding, null=True, on_delete=models.PROTECT, related_name="+")
    verdict = models.CharField(max_length=12, choices=Verdict.choices)
    held = models.BooleanField(help_text="not to be used until signed, repaired or decided")
    due_on = models.DateField(null=True)
    due_at = models.DecimalField(max_digits=16, decimal_places=3, null=True)
    # The component's last counter reading, so that "overdue by usage" needs no second look.
    counter = models.DecimalField(max_digits=14, decimal_places=3, null=True)
    limit = models.TextField(blank=True)
    since = models.DateTimeField()

    class Meta:
        indexes = [
            models.Index(fields=["site", "due_on"]),
        ]
        constraints = [
            models.UniqueConstraint(
                fields=["location"],
                condition=models.Q(crack__isnull=True),
                name="standing_once_a_place",
            )
        ]
