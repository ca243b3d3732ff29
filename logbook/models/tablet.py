"""Tablets, and what comes with an entry that was written on one."""

from django.db import models

from .act import ActRow
from .inspection import Inspection
from .photo import Photo
from .site import Site


class Device(models.Model):
    """A tablet that may hold data of a site. Registering and revoking are journalled acts."""

    key = models.UUIDField(help_text="made on the tablet, one at all its sites")
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="devices")
    name = models.CharField(max_length=60)
    registered_by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    registered_at = models.DateTimeField()
    revoked_at = models.DateTimeField(null=True)
    # What the tablet said at its last contact, for whoever looks for a lost one.
    seen_at = models.DateTimeField(null=True)
    waiting = models.PositiveIntegerField(null=True)

    class Meta:
        ordering = ["site_id", "name", "pk"]
        constraints = [models.UniqueConstraint(fields=["site", "key"], name="tablet_once_a_site")]

    def __str__(self) -> str:
        return self.name


class TabletRules(models.Model):
    """What a site has laid down for its tablets."""

    site = models.OneToOneField(Site, on_delete=models.PROTECT, related_name="tablet_rules")
    # Days without contact after which a tablet wipes what it holds of the site; never what waits.
    keep_days = models.PositiveIntegerField()
    inches = models.BooleanField(help_text="sizes may be typed in inches")


class SentFromTablet(ActRow):
    """Beside the entry: which tablet, in which round, and what it showed the person."""

    inspection = models.OneToOneField(
        Inspection, on_delete=models.PROTECT, related_name="sent_from_tablet"
    )
    device = models.ForeignKey(Device, on_delete=models.PROTECT, related_name="+")
    round = models.UUIDField(null=True, help_text="made on the tablet that began the round")
    shown = models.TextField(help_text="JSON text: what the tablet showed, as it showed it")

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["round"])]


class PhotoLayer(ActRow):
    """Arrows and circles drawn over a photo: they lie beside its bytes, never in them."""

    photo = models.OneToOneField(Photo, on_delete=models.PROTECT, related_name="layer")
    # JSON text: [["arrow" | "circle", x1, y1, x2, y2], …] in ten-thousandths of width and height.
    marks = models.TextField()


class StopNote(ActRow):
    """What was done at a stop without a verdict: the tag, and who was told when."""

    key = models.UUIDField(unique=True)
    inspection = models.ForeignKey(Inspection, on_delete=models.PROTECT, related_name="stop_notes")
    device = models.ForeignKey(Device, on_delete=models.PROTECT, related_name="+")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    tag_number = models.CharField(max_length=60)
    told_whom = models.CharField(max_length=120)
    told_when = models.CharField(max_length=60, help_text="as the person said it")
    written_at = models.DateTimeField()
    in_book_at = models.DateTimeField()


class RoundDeclared(ActRow):
    """The end of a round: what was seen and what was not reached, declared by the inspector."""

    key = models.UUIDField(unique=True, help_text="the key of the round")
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="rounds")
    device = models.ForeignKey(Device, on_delete=models.PROTECT, related_name="+")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    seen = models.PositiveIntegerField()
    not_reached = models.PositiveIntegerField()
    why_not = models.TextField(blank=True)
    written_at = models.DateTimeField()
    in_book_at = models.DateTimeField()
