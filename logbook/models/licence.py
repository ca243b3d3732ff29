"""The licence under which a signatory signs."""

import datetime

from django.conf import settings
from django.db import models


class Licence(models.Model):
    person = models.ForeignKey(
        settings.AUTH_USER_MODEL, on_delete=models.PROTECT, related_name="licences"
    )
    # A site vouches for the papers of its own people; another site's word does not count here.
    site = models.ForeignKey(
        "logbook.Site", null=True, on_delete=models.PROTECT, related_name="licences"
    )
    body = models.CharField(max_length=160, help_text="who granted it")
    number = models.CharField(max_length=60)
    discipline = models.CharField(max_length=120)
    valid_from = models.DateField()
    valid_to = models.DateField()
    revoked_at = models.DateTimeField(null=True, blank=True)
    revoked_why = models.TextField(blank=True)

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["site", "body", "number", "valid_from"], name="licence_number_once"
            ),
            models.CheckConstraint(
                condition=models.Q(valid_to__gte=models.F("valid_from")),
                name="licence_dates_in_order",
            ),
        ]

    def __str__(self) -> str:
        return f"{self.body} {self.number}"

    def in_force(self, day: datetime.date) -> bool:
        return self.revoked_at is None and self.valid_from <= day <= self.valid_to
