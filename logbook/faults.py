"""What the framework itself refuses: a problem body below /api/, a page elsewhere."""

from typing import Any

from django.http import HttpRequest, HttpResponse, JsonResponse
from django.views import defaults

from logbook.errors import Refusal


def _body(code: str, sentence: str, status: int) -> JsonResponse:
    problem = Refusal(code, sentence, status=status).as_problem()
    return JsonResponse(problem, status=status, content_type="application/problem+json")


def _of_api(request: HttpRequest) -> bool:
    return request.path.startswith("/api/")


def bad_request(request: HttpRequest, exception: Exception) -> HttpResponse:
    if _of_api(request):
        return _body("invalid", "This request cannot be read.", 400)
    return defaults.bad_request(request, exception)


def forbidden(request: HttpRequest, exception: Exception) -> HttpResponse:
    if _of_api(request):
        return _body("not-permitted", "You may not do this.", 403)
    return defaults.permission_denied(request, exception)


def not_found(request: HttpRequest, exception: Exception) -> HttpResponse:
    if _of_api(request):
        return _body("not-found", "There is nothing under this address.", 404)
    return defaults.page_not_found(request, exception)


def fault(request: HttpRequest, *_: Any) -> HttpResponse:
    if _of_api(request):
        sentence = "The book could not do this. What was acknowledged before is kept; try again."
        return _body("fault", sentence, 500)
    return defaults.server_error(request)
