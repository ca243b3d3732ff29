"""Who may do what where."""

from django.conf import settings
from django.db import models
from django.utils.translation import gettext_lazy as _

from .site import Site


class Role(models.TextChoices):
    CREW = "crew", _("crew")
    ENGINEER = "engineer", _("engineer")
    SIGNATORY = "signatory", _("signatory")
    AUDITOR = "auditor", _("auditor")
    ADMINISTRATOR = "administrator", _("administrator")


class Membership(models.Model):
    person = models.ForeignKey(
        settings.AUTH_USER_MODEL, on_delete=models.PROTECT, related_name="memberships"
    )
    site = models.ForeignKey(Site, on_delete=models.PROTECT, related_name="memberships")
    role = models.CharField(max_length=20, choices=Role.choices)
    granted_at = models.DateTimeField(auto_now_add=True)
    ended_at = models.DateTimeField(null=True, blank=True)

    class Meta:
        constraints = [
            models.UniqueConstraint(
                fields=["person", "site", "role"],
                condition=models.Q(ended_at__isnull=True),
                name="one_live_role_each",
            ),
            models.CheckConstraint(
                condition=models.Q(role__in=Role.values), name="membership_role_known"
            ),
        ]

    def __str__(self) -> str:
        return f"{self.person} · {self.site} · {self.get_role_display()}"
