"""Materials as registered: a new revision for every change, never an edit."""

from django.db import models

from .act import ActRow
from .site import Site


class Material(ActRow):
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="materials")
    name = models.CharField(max_length=120)
    revision = models.PositiveIntegerField()
    # Canonical JSON text: the "material" part of the case document.
    body = models.TextField()
    source = models.TextField()
    author = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")

    class Meta(ActRow.Meta):
        constraints = [
            models.UniqueConstraint(
                fields=["site", "name", "revision"], name="material_revision_once"
            )
        ]

    def __str__(self) -> str:
        return f"{self.name}, revision {self.revision}"
