"""A request by someone who is signed in, and what that person may do."""

from django.http import HttpRequest

from logbook import access
from logbook.models import Person, Site


class Asked(HttpRequest):
    """What a view behind ``login_required`` gets."""

    user: Person


def may(request: Asked, site: Site, need: str) -> bool:
    """Whether to show the way to something; the action itself checks again."""
    return bool(access.roles_at(request.user, site) & access.NEEDS[need])
