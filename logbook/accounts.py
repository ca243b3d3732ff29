"""Who may sign in: demo logins only where nothing real is kept."""

from typing import Any

from django.conf import settings
from django.contrib.auth.backends import ModelBackend


class Accounts(ModelBackend):
    def user_can_authenticate(self, user: Any) -> bool:
        """An active account; in service mode never one of the demo scenario, whose password is
        printed for everyone."""
        if settings.SERVICE and user.is_demo:
            return False
        return super().user_can_authenticate(user)
