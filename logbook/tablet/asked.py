"""Who asks, by session alone: a tablet has no token."""

from collections.abc import Mapping
from typing import Any

from rest_framework.authentication import SessionAuthentication
from rest_framework.exceptions import NotAuthenticated
from rest_framework.request import Request
from rest_framework.views import APIView

from logbook.errors import invalid
from logbook.models import Person


class BySession(SessionAuthentication):
    """Nobody signed in is 401, so that a tablet can tell "sign in again" from "not permitted"."""

    def authenticate_header(self, request: Request) -> str:
        return "Session"


class TabletView(APIView):
    authentication_classes = (BySession,)


def who(request: Request) -> Person:
    if not isinstance(request.user, Person):
        raise NotAuthenticated
    return request.user


def sent(request: Request) -> Mapping[str, Any]:
    if not isinstance(request.data, Mapping):
        raise invalid("What a tablet sends is an object of named fields.", {})
    return request.data
