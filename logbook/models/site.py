"""A site: one place of work with its own people, parts, telephone and calendar."""

from django.db import models


class Site(models.Model):
    slug = models.SlugField(max_length=60, unique=True)
    name = models.CharField(max_length=120)
    time_zone = models.CharField(max_length=60)
    on_call_name = models.CharField(max_length=120)
    on_call_phone = models.CharField(max_length=40)
    # ISO weekdays on which work can be done, e.g. "12345"; a date falls back to one of them.
    working_weekdays = models.CharField(max_length=7)
    # Dates in ISO form, one a line, on which the site is closed.
    closed_days = models.TextField(blank=True)
    # May an unsigned "continue" or "watch" be acted on? Null until a signatory has said so by
    # signature: until then the part is held. There is no default.
    unsigned_may_be_acted_on = models.BooleanField(null=True, default=None)

    class Meta:
        ordering = ["name"]

    def __str__(self) -> str:
        return self.name
