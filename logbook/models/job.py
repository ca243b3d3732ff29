"""Assessments asked for and not yet written: what dies between is found and done again."""

from django.db import models

from .component import Location
from .inspection import Crack


class AssessmentAsked(models.Model):
    """One row a place or crack whose assessment is owed. Written in the same transaction as the
    entry that asks; removed in the same transaction as the proposal that answers."""

    location = models.ForeignKey(Location, on_delete=models.PROTECT, related_name="+")
    crack = models.ForeignKey(Crack, null=True, on_delete=models.PROTECT, related_name="+")
    because_act = models.UUIDField()
    asked_at = models.DateTimeField()
    tries = models.PositiveIntegerField(default=0)
    last_error = models.TextField(blank=True)

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["location", "crack", "because_act"], name="asked_once_a_crack"
            ),
            models.UniqueConstraint(
                fields=["location", "because_act"],
                condition=models.Q(crack__isnull=True),
                name="asked_once_a_place",
            ),
        ]


class Beat(models.Model):
    """A worker's sign of life, for the sweep."""

    worker_id = models.CharField(max_length=64, primary_key=True)
    at = models.DateTimeField()
