"""One shape for every refusal: what the framework raises is put into our own words."""

from typing import Any

from django.core.exceptions import PermissionDenied
from django.http import Http404
from rest_framework import exceptions
from rest_framework.response import Response
from rest_framework.views import exception_handler

from logbook.errors import Refusal

CODES = {
    400: "invalid",
    401: "not-signed-in",
    403: "not-permitted",
    404: "not-found",
    405: "method-not-allowed",
    406: "not-acceptable",
    413: "too-large",
    415: "unsupported-media-type",
    429: "too-many",
}


def handle(error: Exception, context: dict[str, Any]) -> Response | None:
    """Answer a refusal as a problem body; anything unforeseen stays an error and is logged."""
    if isinstance(error, Refusal):
        return _response(error)
    answer = exception_handler(error, context)
    if answer is None:
        return None
    refusal = Refusal(
        CODES.get(answer.status_code, "refused"),
        _sentence(error),
        status=answer.status_code,
    )
    made = _response(refusal)
    for header in ("WWW-Authenticate", "Retry-After", "Allow"):
        if header in answer:
            made[header] = answer[header]
    return made


def _response(refusal: Refusal) -> Response:
    return Response(
        refusal.as_problem(), status=refusal.status, content_type="application/problem+json"
    )


def _sentence(error: Exception) -> str:
    if isinstance(error, Http404 | exceptions.NotFound):
        return "There is nothing here for you under this address."
    if isinstance(error, PermissionDenied | exceptions.PermissionDenied):
        return f"You may not do this: {error}"
    if isinstance(error, exceptions.APIException):
        return str(error.detail)
    return str(error)
