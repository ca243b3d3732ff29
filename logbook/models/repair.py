"""What was done to the part, and its return to service."""

from django.db import models
from django.utils.translation import gettext_lazy as _

from .act import ActRow
from .component import Location
from .inspection import Crack
from .licence import Licence


class Repair(ActRow):
    class Sort(models.TextChoices):
        REPAIR = "repair", _("repair")
        EXCHANGE = "exchange", _("exchange")
        REMOVAL = "removal", _("removal")

    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="repairs")
    crack = models.ForeignKey(Crack, null=True, on_delete=models.PROTECT, related_name="repairs")
    sort = models.CharField(max_length=12, choices=Sort.choices)
    welded = models.BooleanField(help_text="a welded repair brings residual stress back")
    what = models.TextField()
    done_by = models.CharField(max_length=120)
    work_order = models.CharField(max_length=60)
    done_on = models.DateField()
    counter = models.DecimalField(max_digits=14, decimal_places=3)
    inspection_after = models.TextField(help_text="method, result, by whom")
    # The crack is closed, or goes on with a new start: the size that the inspection after could
    # have missed.
    closes = models.BooleanField()
    start_depth_mm = models.DecimalField(max_digits=9, decimal_places=3, null=True)
    start_length_mm = models.DecimalField(max_digits=9, decimal_places=3, null=True)
    start_source = models.TextField(blank=True)
    author = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    at = models.DateTimeField()

    class Meta(ActRow.Meta):
        constraints = [
            models.CheckConstraint(
                condition=models.Q(closes=True)
                | (models.Q(start_length_mm__gt=0) | models.Q(start_depth_mm__gt=0))
                & ~models.Q(start_source=""),
                name="repair_closes_or_starts_anew",
            )
        ]


class ReturnToService(ActRow):
    repair = models.OneToOneField(
        Repair, on_delete=models.PROTECT, related_name="return_to_service"
    )
    signatory = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    licence = models.ForeignKey(Licence, on_delete=models.PROTECT, related_name="+")
    grounds = models.TextField()
    shown_digest = models.CharField(max_length=64)
    at = models.DateTimeField()
