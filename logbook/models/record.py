"""The printed, numbered page sets."""

from django.db import models

from .disposition import Deferral, Disposition
from .site import Site


class Record(models.Model):
    """The number is reserved when it is signed; a failed issue is listed void with its reason."""

    class State(models.TextChoices):
        RESERVED = "reserved"
        ISSUED = "issued"
        VOID = "void"

    number = models.PositiveIntegerField(primary_key=True)
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="records")
    disposition = models.OneToOneField(
        Disposition, null=True, on_delete=models.PROTECT, related_name="record"
    )
    deferral = models.OneToOneField(
        Deferral, null=True, on_delete=models.PROTECT, related_name="record"
    )
    state = models.CharField(max_length=10, choices=State.choices, default=State.RESERVED)
    void_why = models.TextField(blank=True)
    sha256 = models.CharField(max_length=64, blank=True)
    byte_size = models.PositiveIntegerField(null=True)
    journal_size = models.PositiveBigIntegerField(null=True)
    journal_root = models.CharField(max_length=64, blank=True)
    issued_at = models.DateTimeField(null=True)

    class Meta:
        constraints = [
            models.CheckConstraint(
                condition=models.Q(disposition__isnull=False, deferral__isnull=True)
                | models.Q(disposition__isnull=True, deferral__isnull=False),
                name="record_of_one_thing",
            ),
            models.CheckConstraint(
                condition=~models.Q(state="issued", sha256=""), name="record_issued_has_bytes"
            ),
            models.CheckConstraint(
                condition=~models.Q(state="void", void_why=""), name="record_void_says_why"
            ),
        ]
