"""Components and the locations on them that are inspected."""

from django.db import models

from .site import Site


class Component(models.Model):
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="components")
    tag = models.CharField(max_length=24, help_text="the number on the part")
    name = models.CharField(max_length=120)
    description = models.TextField(blank=True)
    serial = models.CharField(max_length=60, blank=True)
    picture = models.ForeignKey(
        "logbook.Photo", null=True, blank=True, on_delete=models.PROTECT, related_name="+"
    )
    counter_name = models.CharField(max_length=60, help_text="what the counter counts, e.g. lifts")
    counter_unit = models.CharField(max_length=24, help_text="one count, e.g. lift")
    per_day = models.DecimalField(
        max_digits=12, decimal_places=4, help_text="the least that is reckoned for a day"
    )

    class Meta:
        ordering = ["site_id", "tag"]
        constraints = [
            models.UniqueConstraint(fields=["site", "tag"], name="tag_once_a_site"),
            models.CheckConstraint(
                condition=models.Q(per_day__gt=0), name="component_per_day_positive"
            ),
        ]

    def __str__(self) -> str:
        return f"{self.tag} {self.name}"


class Location(models.Model):
    component = models.ForeignKey(Component, on_delete=models.PROTECT, related_name="locations")
    number = models.PositiveIntegerField(help_text="place in walking order")
    name = models.CharField(max_length=120)
    # Where it is marked on the component's picture, as fractions of width and height.
    picture_x = models.FloatField(null=True, blank=True)
    picture_y = models.FloatField(null=True, blank=True)
    provisional = models.BooleanField(default=False)
    described = models.TextField(blank=True, help_text="how to find it, as the finder said it")

    class Meta:
        ordering = ["component_id", "number"]
        constraints = [
            models.UniqueConstraint(fields=["component", "number"], name="location_number_once"),
            models.CheckConstraint(
                condition=models.Q(picture_x__isnull=True, picture_y__isnull=True)
                | models.Q(picture_x__gte=0, picture_x__lte=1, picture_y__gte=0, picture_y__lte=1),
                name="location_mark_on_picture",
            ),
        ]

    def __str__(self) -> str:
        return self.name
