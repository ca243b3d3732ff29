"""Photos: declared by digest with the entry, arriving with it or later."""

from django.db import models

from .inspection import Finding
from .site import Site


class Photo(models.Model):
    """The bytes as saved lie under LOGBOOK_DATA/photos and are never rendered; a re-encoded copy
    lies under LOGBOOK_DATA/shown. Each arrival is a leaf."""

    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="photos")
    finding = models.ForeignKey(
        Finding, null=True, blank=True, on_delete=models.PROTECT, related_name="photos"
    )
    sha256 = models.CharField(max_length=64)
    caption = models.CharField(max_length=200, blank=True)
    uploaded_by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    arrived_at = models.DateTimeField(null=True)
    media_type = models.CharField(max_length=20, blank=True)
    byte_size = models.PositiveIntegerField(null=True)
    width = models.PositiveIntegerField(null=True)
    height = models.PositiveIntegerField(null=True)

    class Meta:
        indexes = [models.Index(fields=["sha256"])]
        constraints = [
            models.UniqueConstraint(fields=["finding", "sha256"], name="photo_once_a_finding")
        ]
