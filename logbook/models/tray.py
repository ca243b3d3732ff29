"""What was sent and did not fit: kept whole, for a person to look at."""

from django.db import models

from .act import ActRow
from .component import Component


class TrayItem(ActRow):
    """An authenticated send is never refused for its content: it lands here with its reason."""

    component = models.ForeignKey(Component, on_delete=models.PROTECT, related_name="tray")
    key = models.CharField(max_length=80)
    content = models.TextField(help_text="as sent")
    content_digest = models.CharField(max_length=64)
    why = models.TextField(help_text="canonical JSON text: the refusal")
    author = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    at = models.DateTimeField()

    class Meta(ActRow.Meta):
        constraints = [models.UniqueConstraint(fields=["key", "content_digest"], name="tray_once")]


class TraySettled(ActRow):
    item = models.OneToOneField(TrayItem, on_delete=models.PROTECT, related_name="settled")
    by = models.ForeignKey("logbook.Person", on_delete=models.PROTECT, related_name="+")
    how = models.TextField()
    at = models.DateTimeField()
