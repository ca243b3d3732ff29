"""The password again, at the moment of signing, through the same limiter as signing in."""

from django.contrib.auth import authenticate
from django.http import HttpRequest

from logbook.errors import Refusal
from logbook.models import Person


def confirm_password(by: Person, password: str, request: HttpRequest | None) -> None:
    """Refuse unless it is the person's own password.

    The request lets the limiter count the attempt; a command without one passes its own.
    """
    if not password:
        raise Refusal(
            "password",
            "Type your password on the signature line.",
            fields={"password": ["Type your password."]},
            status=403,
        )
    found = authenticate(request or _no_request(), username=by.get_username(), password=password)
    if found is None or found.pk != by.pk:
        raise Refusal(
            "password",
            "That is not your password, or it was tried too often; after six tries it rests for a "
            "quarter of an hour.",
            fields={"password": ["Not your password, or tried too often."]},
            status=403,
        )


def _no_request() -> HttpRequest:
    request = HttpRequest()
    request.META["REMOTE_ADDR"] = "127.0.0.1"
    request.META["HTTP_USER_AGENT"] = "command line"
    return request
