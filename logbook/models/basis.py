"""What a location is assessed on: revised, never edited; adopted by someone else."""

from django.db import models

from .act import ActRow
from .component import Location


class Basis(ActRow):
    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="bases")
    revision = models.PositiveIntegerField()
    author = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    reason = models.TextField()
    # Canonical JSON text; logbook/cases/basis.py says what it holds.
    body = models.TextField()
    digest = models.CharField(max_length=64)
    created_at = models.DateTimeField()

    class Meta(ActRow.Meta):
        verbose_name_plural = "bases"
        constraints = [
            models.UniqueConstraint(fields=["location", "revision"], name="basis_revision_once")
        ]

    def __str__(self) -> str:
        return f"{self.location}, basis revision {self.revision}"


class BasisAdoption(ActRow):
    basis = models.OneToOneField(Basis, on_delete=models.PROTECT, related_name="adoption")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    at = models.DateTimeField()
