"""One visit with one method on one date by one person, and what was seen at each location."""

from django.db import models
from django.utils.translation import gettext_lazy as _

from .act import ActRow
from .component import Component, Location


class Inspection(ActRow):
    component = models.ForeignKey(Component, on_delete=models.PROTECT, related_name="inspections")
    # Made by the author's device: the same entry sent twice is written once.
    key = models.UUIDField(unique=True)
    content_digest = models.CharField(max_length=64)
    found_on = models.DateField()
    written_at = models.DateTimeField(null=True)
    in_book_at = models.DateTimeField()
    counter = models.DecimalField(max_digits=14, decimal_places=3)
    counter_replaced_why = models.TextField(blank=True)
    late_why = models.TextField(blank=True, help_text="why an older look is written only now")
    method = models.CharField(max_length=60)
    procedure = models.CharField(max_length=60)
    procedure_revision = models.CharField(max_length=24)
    instrument = models.CharField(max_length=80)
    calibration_valid_until = models.DateField(null=True)
    surface = models.CharField(max_length=120)
    coverage = models.CharField(max_length=120)
    fell_short = models.TextField(blank=True, help_text="what the procedure asks and was not so")
    inspector_name = models.CharField(max_length=120)
    qualification_level = models.CharField(max_length=60)
    qualification_valid_until = models.DateField(null=True)
    author = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["component", "-found_on"])]
        constraints = [
            models.CheckConstraint(condition=models.Q(counter__gte=0), name="counter_not_negative")
        ]


class Crack(models.Model):
    """One crack with its number; it keeps its identity until closed."""

    component = models.ForeignKey(Component, on_delete=models.PROTECT, related_name="cracks")
    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="cracks")
    number = models.PositiveIntegerField()
    closed_at = models.DateTimeField(null=True, blank=True)
    closed_why = models.TextField(blank=True)

    class Meta:
        ordering = ["component_id", "number"]
        constraints = [
            models.UniqueConstraint(fields=["component", "number"], name="crack_number_once")
        ]

    def __str__(self) -> str:
        return f"crack {self.number}"


class What(models.TextChoices):
    NOTHING = "nothing", _("nothing found")
    COULD_NOT_LOOK = "could-not-look", _("could not look")
    KNOWN_NOT_SEEN = "known-not-seen", _("known crack not seen")
    CRACK = "crack", _("a crack")


class Finding(ActRow):
    inspection = models.ForeignKey(Inspection, on_delete=models.PROTECT, related_name="findings")
    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="findings")
    what = models.CharField(max_length=20, choices=What.choices)
    why = models.TextField(blank=True)
    part_not_seen = models.TextField(blank=True)
    remarks = models.TextField(blank=True)
    crack = models.ForeignKey(Crack, null=True, on_delete=models.PROTECT, related_name="findings")

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["location", "-id"])]
        constraints = [
            models.CheckConstraint(
                condition=models.Q(what__in=What.values), name="finding_what_known"
            ),
            models.CheckConstraint(
                condition=models.Q(what__in=[What.CRACK, What.KNOWN_NOT_SEEN], crack__isnull=False)
                | models.Q(what__in=[What.NOTHING, What.COULD_NOT_LOOK], crack__isnull=True),
                name="finding_crack_named",
            ),
            models.CheckConstraint(
                condition=~models.Q(what__in=[What.COULD_NOT_LOOK, What.KNOWN_NOT_SEEN], why=""),
                name="finding_why_said",
            ),
        ]


class DepthBasis(models.TextChoices):
    MEASURED = "measured", _("measured")
    AT_LEAST = "at-least", _("at least")
    NOT_MEASURED = "not-measured", _("not measured")


class Measurement(ActRow):
    """One size of one crack at one inspection, as typed."""

    finding = models.OneToOneField(Finding, on_delete=models.PROTECT, related_name="measurement")
    crack = models.ForeignKey(Crack, on_delete=models.PROTECT, related_name="measurements")
    depth_basis = models.CharField(max_length=16, choices=DepthBasis.choices)
    depth_mm = models.DecimalField(max_digits=9, decimal_places=3, null=True)
    length_mm = models.DecimalField(max_digits=9, decimal_places=3, null=True)
    why_smaller = models.TextField(blank=True)
    typed = models.TextField(help_text="the sizes as the person typed them")

    class Meta(ActRow.Meta):
        indexes = [models.Index(fields=["crack", "id"])]
        constraints = [
            models.CheckConstraint(
                condition=models.Q(depth_basis=DepthBasis.NOT_MEASURED, depth_mm__isnull=True)
                | models.Q(
                    depth_basis__in=[DepthBasis.MEASURED, DepthBasis.AT_LEAST], depth_mm__gt=0
                ),
                name="depth_given_or_said_missing",
            ),
            models.CheckConstraint(
                condition=models.Q(length_mm__isnull=True) | models.Q(length_mm__gt=0),
                name="length_positive",
            ),
            models.CheckConstraint(
                condition=models.Q(depth_mm__isnull=False) | models.Q(length_mm__isnull=False),
                name="some_size_given",
            ),
        ]


class StrikeOut(ActRow):
    """A finding struck out: it stays readable, and counts no more."""

    finding = models.OneToOneField(Finding, on_delete=models.PROTECT, related_name="strike_out")
    reason = models.TextField()
    replaced_by = models.OneToOneField(
        Finding, null=True, on_delete=models.PROTECT, related_name="replaces"
    )
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    at = models.DateTimeField()
