"""What the owner has laid down for a site, by signature."""

from django.db import models

from .act import ActRow
from .licence import Licence
from .site import Site


class UnsignedPolicy(ActRow):
    """May an unsigned "continue" or "watch" be acted on here? The latest row counts; Site carries
    it as a projection. Without a row the part is held."""

    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="unsigned_policies")
    allowed = models.BooleanField()
    grounds = models.TextField()
    signatory = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    licence = models.ForeignKey(Licence, on_delete=models.PROTECT, related_name="+")
    at = models.DateTimeField()
