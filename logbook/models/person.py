"""People: one account a person; what each may do is given site by site in Membership."""

from django.contrib.auth.models import AbstractUser
from django.db import models
from django.utils.translation import gettext_lazy as _


class Person(AbstractUser):
    class DecimalSign(models.TextChoices):
        POINT = ".", _("8.4 (point)")
        COMMA = ",", _("8,4 (comma)")

    full_name = models.CharField(max_length=120)
    phone = models.CharField(max_length=40, blank=True)
    decimal_sign = models.CharField(
        max_length=1, choices=DecimalSign.choices, default=DecimalSign.POINT
    )
    # Demo logins are refused in service mode.
    is_demo = models.BooleanField(default=False, editable=False)

    def __str__(self) -> str:
        return self.full_name or self.username
